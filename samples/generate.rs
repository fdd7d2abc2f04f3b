//! Writes the invented samples, the files for speed tests and the lots whose truth is known.
//!
//! Shares no code with the crate, on purpose: what the crate reads here was written by somebody
//! who knows only the file formats and the physics. Pure standard library, own random numbers.
//!
//! ```text
//! cargo run --release --example samples -- write samples
//! cargo run --release --example samples -- lots lots
//! cargo run --release --example samples -- large big.csv --springs 10000 --rows 1000
//! cargo run --release --example samples -- many fifty --springs 50 --rows 2000
//! cargo run --release --example samples -- known known --lots 2000 --seed 1
//! ```

#[path = "generate/accepted.rs"]
mod accepted;
#[path = "generate/bench.rs"]
mod bench;
#[path = "generate/check.rs"]
mod check;
#[path = "generate/known.rs"]
mod known;
#[path = "generate/known_text.rs"]
mod known_text;
#[path = "generate/lots.rs"]
mod lots;
#[path = "generate/nested.rs"]
mod nested;
#[path = "generate/plans.rs"]
mod plans;
#[path = "generate/random.rs"]
mod random;
#[path = "generate/rejected.rs"]
mod rejected;
#[path = "generate/rigs.rs"]
mod rigs;
#[path = "generate/speed.rs"]
mod speed;
#[path = "generate/spring.rs"]
mod spring;
#[path = "generate/study.rs"]
mod study;
#[path = "generate/text.rs"]
mod text;
#[path = "generate/undecided.rs"]
mod undecided;

use std::error::Error;
use std::io::Write;
use std::path::Path;
use std::process::ExitCode;

/// Whatever went wrong, as one message.
type Outcome = Result<(), Box<dyn Error>>;

const USAGE: &str = "usage: samples write DIR | large FILE [--springs N] [--rows N] \
    | lots DIR | many DIR [--springs N] [--rows N] | known DIR [--lots N] [--seed S]";

fn main() -> ExitCode {
    let words: Vec<String> = std::env::args().skip(1).collect();
    match run(&words) {
        Ok(()) => ExitCode::SUCCESS,
        Err(fault) => {
            // Nothing is left to do if the message cannot be written either.
            let _ = writeln!(std::io::stderr(), "samples: {fault}");
            ExitCode::from(2)
        }
    }
}

fn run(words: &[String]) -> Outcome {
    let (Some(task), Some(place)) = (words.first(), words.get(1)) else {
        return Err(USAGE.into());
    };
    let rest = words.get(2..).unwrap_or_default();
    let place = Path::new(place);
    match task.as_str() {
        "lots" => {
            options(rest, [])?;
            lots::write(place)
        }
        "write" => {
            options(rest, [])?;
            accepted::write(&place.join("accepted"))?;
            rejected::write(&place.join("rejected"))?;
            undecided::write(&place.join("undecided"))?;
            nested::write(&place.join("nested"))?;
            check::write(&place.join("check"))?;
            study::write(&place.join("study"))?;
            plans::write(&place.join("plans"))
        }
        "large" => {
            let [springs, rows] = options(rest, [("--springs", 10_000), ("--rows", 1000)])?;
            speed::one_file(place, springs, rows)
        }
        "many" => {
            let [springs, rows] = options(rest, [("--springs", 50), ("--rows", 2000)])?;
            speed::many_files(place, springs, rows)
        }
        "known" => {
            let [lots, seed] = options(rest, [("--lots", 2000), ("--seed", 1)])?;
            known::write(place, lots, seed)
        }
        _ => Err(USAGE.into()),
    }
}

/// Reads `--name number` pairs; a name not in `known` is refused, one not given keeps its default.
fn options<const N: usize>(
    words: &[String],
    known: [(&str, u64); N],
) -> Result<[u64; N], Box<dyn Error>> {
    let mut values = known.map(|(_, default)| default);
    for pair in words.chunks(2) {
        let [name, number] = pair else {
            return Err(format!("{} needs a number; {USAGE}", pair.join(" ")).into());
        };
        let found = known
            .iter()
            .zip(values.iter_mut())
            .find(|((k, _), _)| k == name);
        let Some((_, value)) = found else {
            return Err(format!("unknown option {name}; {USAGE}").into());
        };
        *value = number
            .parse()
            .map_err(|_| format!("{name} {number}: not a whole number"))?;
    }
    Ok(values)
}

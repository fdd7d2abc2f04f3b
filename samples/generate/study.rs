//! Sample `study`: six springs, two operators, three trials, in one export.

use crate::Outcome;
use crate::bench::{Bench, Programme, run};
use crate::random::Random;
use crate::rigs::{EVERY_SPRING, FORCE_TRAVEL_FRAME, RATE_AND_LOADS, drawing, spring};
use crate::text;
use std::io::Write;
use std::path::Path;

const SPRINGS: u64 = 6;
const OPERATORS: [(&str, f64); 2] = [("Ash", 0.006), ("Birch", -0.006)];
const TRIALS: u64 = 3;

/// Writes the sample.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    text::file(&folder.join("study.toml"), STUDY)?;
    text::file(
        &folder.join("tg-204.toml"),
        drawing(RATE_AND_LOADS, EVERY_SPRING),
    )?;
    text::file(
        &folder.join("bench-5.toml"),
        format!("{RIG}\n{FORCE_TRAVEL_FRAME}\n{REPEATABILITY}"),
    )?;
    text::file(&folder.join("study.csv"), export()?)?;
    Ok(())
}

fn export() -> std::io::Result<Vec<u8>> {
    let mut out = Vec::new();
    writeln!(out, "Specimen;Length;Load")?;
    writeln!(out, ";mm;N")?;
    for trial in 1..=TRIALS {
        for (operator, shift) in OPERATORS {
            for id in 1..=SPRINGS {
                let mut own = Random::new(600, id);
                let specimen = spring(
                    own.bounded(0.008, 0.02),
                    89.85 + own.bounded(0.15, 0.3),
                    &mut own,
                );
                let name = format!("S{id}/{operator}/{trial}");
                let mut random = Random::new(601, id * 100 + trial * 10 + u64::from(shift > 0.0));
                measured(&mut out, &name, &specimen, shift, &mut random);
            }
        }
    }
    Ok(out)
}

/// One measurement; every time the spring is put in anew it sits a little differently.
fn measured(
    out: &mut Vec<u8>,
    name: &str,
    specimen: &crate::spring::Specimen,
    shift: f64,
    random: &mut Random,
) {
    let mut specimen = specimen.clone();
    for member in &mut specimen.members {
        member.line += random.normal(0.012);
        member.rate *= 1.0 + random.normal(0.0006);
        member.toe = 1.6 + random.bounded(0.05, 0.1);
    }
    let bench = Bench {
        force_scale: 0.0008,
        travel_scale: -0.0006,
        length_zero: 0.006 + shift,
        set_at_length: 70.0,
        compliance: 0.000_122,
        empty: 0.05,
        noise: 0.04,
        ..Bench::perfect()
    };
    let programme = Programme {
        air: 2.2,
        bottom: 46.0,
        cycles: 1,
        loading: 70,
        unloading: 12,
        dwell: 0,
        slow_below: 0.0,
    };
    run(&specimen, &bench, &programme, random, |reading| {
        out.extend(name.as_bytes());
        for (value, decimals) in [(reading.travel, 3), (reading.force, 2)] {
            out.push(b';');
            text::number(out, value, decimals, b',');
        }
        out.push(b'\n');
    });
}

const STUDY: &str = r#"# Invented study.
rig = "bench-5.toml"
exports = ["study.csv"]
names = "{part}/{operator}/{trial}"    # of the specimens; where a file is a spring, of the file without extension
drawing = "tg-204.toml"

[study]
note = "Invented sample: six springs, two operators"

[conditions]
temperature = 20.3
presetting_strokes = 3
"#;

const RIG: &str = r#"# Invented bench. Reads the distance between its platens.
units = "mm-N"

[rig]
name = "Bench 5"

[export]
header_line = 1
units_line = 2
delimiter = ";"
decimal = ","
load = { column = "Load", unit = "N", pushing = "positive" }
travel = { column = "Length", unit = "mm", means = "length" }
spring = { column = "Specimen" }
"#;

const REPEATABILITY: &str = r#"[[repeatability]]
of = "rate"
standard_deviation = 0.009             # a guess; a study is due
"#;

//! The flags of `plan` as written: what they ask for, and how they are kept with the result, so that it can be asked again.

use std::str::FromStr;

use jiff::civil::Date;

use super::super::accept::Past;
use super::asked::{Asked, BenchAsked, PlanOptions};
use crate::drawing::{Level, Level414, State};
use crate::sampling::Points;

/// The flags, but for files, output and date.
#[derive(Clone, Debug, Default, PartialEq)]
#[expect(missing_docs, reason = "the names are the flags'")]
pub struct PlanFlags {
    pub lot_size: u64,
    pub aql: Vec<f64>,
    pub level: Vec<String>,
    pub state: Vec<String>,
    pub mil_std_414: Vec<f64>,
    pub level_414: String,
    pub designed: Vec<String>,
    pub zero_accept: Vec<String>,
    pub bench: Option<String>,
    pub reduced_agreed: bool,
}

impl PlanFlags {
    /// What they ask for.
    ///
    /// # Errors
    /// A report that names the flag whose words mean nothing.
    pub fn options(&self, past: Option<Past>, date: Date) -> miette::Result<PlanOptions> {
        Ok(PlanOptions {
            lot_size: self.lot_size,
            asked: asked(self)?,
            bench: self.bench.as_deref().map(bench).transpose()?,
            past,
            reduced_agreed: self.reduced_agreed,
            date,
            flags: self.kept(),
        })
    }

    /// As the result keeps them, each with its value.
    fn kept(&self) -> Vec<String> {
        let mut kept = vec![format!("--lot-size {}", self.lot_size)];
        let mut keep = |flag: &str, values: &[String]| {
            kept.extend(values.iter().map(|value| format!("{flag} {value}")));
        };
        let numbers = |values: &[f64]| values.iter().map(f64::to_string).collect::<Vec<_>>();
        keep("--aql", &numbers(&self.aql));
        keep("--level", &self.level);
        keep("--state", &self.state);
        keep("--mil-std-414", &numbers(&self.mil_std_414));
        keep("--level-414", std::slice::from_ref(&self.level_414));
        keep("--designed", &self.designed);
        keep("--zero-accept", &self.zero_accept);
        keep("--bench", self.bench.as_slice());
        if self.reduced_agreed {
            kept.push("--reduced-agreed".to_owned());
        }
        kept
    }

    /// From what a result kept; else what of it is not known.
    pub(in super::super) fn of_kept(kept: &[String]) -> Result<Self, String> {
        let mut found = Self::default();
        let mut lot_size = None;
        for flag in kept {
            let (name, value) = flag.split_once(' ').unwrap_or((flag, ""));
            let known = match name {
                "--lot-size" => value.parse().map(|size| lot_size = Some(size)).is_ok(),
                "--aql" => push(&mut found.aql, value),
                "--level" => push(&mut found.level, value),
                "--state" => push(&mut found.state, value),
                "--mil-std-414" => push(&mut found.mil_std_414, value),
                "--designed" => push(&mut found.designed, value),
                "--zero-accept" => push(&mut found.zero_accept, value),
                "--level-414" => {
                    value.clone_into(&mut found.level_414);
                    true
                }
                "--bench" => {
                    found.bench = Some(value.to_owned());
                    true
                }
                "--reduced-agreed" => {
                    found.reduced_agreed = true;
                    value.is_empty()
                }
                _ => false,
            };
            if !known {
                return Err(format!("the flag `{flag}`"));
            }
        }
        found.lot_size = lot_size.ok_or("no `--lot-size`")?;
        Ok(found)
    }
}

/// Adds `value`; whether it could be read.
fn push<T: FromStr>(into: &mut Vec<T>, value: &str) -> bool {
    value.parse().map(|value| into.push(value)).is_ok()
}

/// Every plan the flags ask for: levels, AQLs and states each with each, then the others.
fn asked(flags: &PlanFlags) -> miette::Result<Vec<Asked>> {
    let levels = words(&flags.level, "--level", &Level::WORDS)?;
    let levels = if levels.is_empty() {
        vec![Level::II]
    } else {
        levels
    };
    let states = words(&flags.state, "--state", &State::WORDS)?;
    let states: Vec<Option<State>> = if states.is_empty() {
        vec![None]
    } else {
        states.into_iter().map(Some).collect()
    };
    let mut all = Vec::new();
    for level in levels {
        for aql in &flags.aql {
            all.extend(states.iter().map(|state| Asked::Attributes {
                level,
                aql: *aql,
                state: *state,
            }));
        }
    }
    let level = word(&flags.level_414, "--level-414", &Level414::WORDS)?;
    for aql in &flags.mil_std_414 {
        all.extend(states.iter().map(|state| Asked::Variables {
            level,
            aql: *aql,
            state: state.unwrap_or(State::Normal),
        }));
    }
    for written in &flags.designed {
        let [p1, alpha, p2, beta] = shares(written, "--designed", "1%:5%:5%:10%")?;
        all.push(Asked::Designed(Points {
            p1,
            alpha,
            p2,
            beta,
        }));
    }
    for written in &flags.zero_accept {
        let [limiting_quality, consumer_risk] = shares(written, "--zero-accept", "4%:10%")?;
        all.push(Asked::ZeroAccept {
            limiting_quality,
            consumer_risk,
        });
    }
    Ok(all)
}

fn bench(written: &str) -> miette::Result<BenchAsked> {
    let [expanded, spread, common] = shares(written, "--bench", "25%:33%:80%")?;
    Ok(BenchAsked {
        expanded,
        spread,
        common,
    })
}

fn words<T: Copy>(written: &[String], flag: &str, known: &[(&str, T)]) -> miette::Result<Vec<T>> {
    written.iter().map(|one| word(one, flag, known)).collect()
}

fn word<T: Copy>(written: &str, flag: &str, known: &[(&str, T)]) -> miette::Result<T> {
    let found = known.iter().find(|(word, _)| *word == written);
    found.map(|(_, meaning)| *meaning).ok_or_else(|| {
        let words: Vec<&str> = known.iter().map(|(word, _)| *word).collect();
        let help = format!("one of: {}", words.join(", "));
        miette::miette!(help = help, "{flag} is `{written}`")
    })
}

/// Shares written as `1%:5%`.
fn shares<const N: usize>(written: &str, flag: &str, example: &str) -> miette::Result<[f64; N]> {
    let share = |part: &str| {
        let number = part.trim().strip_suffix('%')?.trim().parse::<f64>().ok()?;
        number.is_finite().then_some(number / 100.0)
    };
    let read: Option<Vec<f64>> = written.split(':').map(share).collect();
    read.and_then(|read| read.try_into().ok()).ok_or_else(|| {
        let help = format!("write it as {example}");
        miette::miette!(help = help, "{flag} is `{written}`")
    })
}

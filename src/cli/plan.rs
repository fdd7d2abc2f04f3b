//! `plan`: reads flags, calls, writes, prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::drawing::{Level, Level414, State};
use crate::job::{self, Asked, BenchAsked, PlanOptions};
use crate::report;
use crate::sampling::Points;

use super::accept::{date, history, listed};
use super::args::PlanArgs;
use super::folder::{self, Target};

pub(super) fn run(args: &PlanArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let options = PlanOptions {
        lot_size: args.lot_size,
        asked: asked(args)?,
        bench: args.bench.as_deref().map(bench).transpose()?,
        past: history(args.history.as_deref())?,
        reduced_agreed: args.reduced_agreed,
        date: date(args.date)?,
        flags: Vec::new(),
    };
    let mut record = job::plan(&options)?;
    if let Some(target) = &target {
        let files = report::offers(&record)?;
        record.files = files.iter().map(listed).collect();
        target.write(&files, &record)?;
    }
    if let (Some(dir), false) = (&args.out, quiet) {
        // A notice; where stderr is gone there is nobody to read it.
        let _ = writeln!(std::io::stderr(), "written: {}", dir.display());
    }
    if args.json {
        folder::json(&record, out).into_diagnostic()?;
    } else {
        write!(out, "{}", report::offers_summary(&record)).into_diagnostic()?;
    }
    Ok(0)
}

/// Every plan the flags ask for: levels, AQLs and states each with each, then the others.
fn asked(args: &PlanArgs) -> miette::Result<Vec<Asked>> {
    let levels = words(&args.level, "--level", &Level::WORDS)?;
    let levels = if levels.is_empty() {
        vec![Level::II]
    } else {
        levels
    };
    let states = words(&args.state, "--state", &State::WORDS)?;
    let states: Vec<Option<State>> = if states.is_empty() {
        vec![None]
    } else {
        states.into_iter().map(Some).collect()
    };
    let mut all = Vec::new();
    for level in levels {
        for aql in &args.aql {
            all.extend(states.iter().map(|state| Asked::Attributes {
                level,
                aql: *aql,
                state: *state,
            }));
        }
    }
    let level = word(&args.level_414, "--level-414", &Level414::WORDS)?;
    for aql in &args.mil_std_414 {
        all.extend(states.iter().map(|state| Asked::Variables {
            level,
            aql: *aql,
            state: state.unwrap_or(State::Normal),
        }));
    }
    for written in &args.designed {
        let [p1, alpha, p2, beta] = shares(written, "--designed", "1%:5%:5%:10%")?;
        all.push(Asked::Designed(Points {
            p1,
            alpha,
            p2,
            beta,
        }));
    }
    for written in &args.zero_accept {
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

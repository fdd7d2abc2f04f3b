//! `accept`: a lot file in, a decided and documented lot out.

mod alike;
mod cautions;
mod drawing_cautions;
mod error;
mod figures;
mod files;
mod group;
mod plan;
mod requirements;
mod rig_cautions;
mod springs;

use std::path::Path;

use jiff::civil::Date;
use rayon::prelude::*;

use crate::characteristic::{Setup, wanted};
use crate::curve::{Reduced, full_load, nominal_rate, window_of};
use crate::doubt::doubt;
use crate::drawing::{Drawing, Requirement, Rule};
use crate::lot::{class_terms, decide};
use crate::quantity::Class;
use crate::record::{AcceptRecord, FORMAT, Kind, LedgerFacts, Provenance, SimpleAcceptance, TOOL};
use crate::rig::SpringFrom;
use crate::text::{InputFile, announce};

use super::facts;
use super::read::{How, Reading, read};
use super::threads::side_by_side;
use error::AcceptError;
use files::Files;
use group::Spring;
use springs::Judged;

/// Faults of exports shown at once.
const SHOWN: usize = 20;

/// What the command line adds to the files.
#[derive(Clone, Debug)]
pub struct Options {
    /// Date of the judgement.
    pub date: Date,
    /// Someone stands for the units although they look mixed up.
    pub units_confirmed: bool,
    /// A warning on the rig ends the run.
    pub strict: bool,
    /// Whether curves are kept for charts.
    pub drawn: bool,
    /// Bytes read at once, where a test wants other blocks.
    pub block_bytes: Option<usize>,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
}

/// A judged lot.
#[derive(Debug)]
pub struct Accepted {
    /// The result.
    pub record: AcceptRecord,
    /// The curves for the charts, in the order of the springs; empty where they were not wanted.
    pub curves: Vec<Reduced>,
}

/// Judges the lot of the file at `path`, written as `as_written`.
///
/// # Errors
/// A report that names file, line and column where a file or an export cannot be used, or why nothing is judged.
pub fn accept(path: &Path, as_written: &str, options: &Options) -> miette::Result<Accepted> {
    let files = files::open(path, as_written)?;
    let wanted = wanted(&files.drawing);
    let setup = Setup {
        rig: &files.rig,
        conditions: files.lot.conditions,
        bounds: window_of(&files.drawing),
        stroke: files.drawing.rate_test.stroke,
        method: files.drawing.rate_test.method,
        full_load: Some(full_load(&files.drawing)),
        wanted: &wanted,
        caliper: &files.lot.caliper,
    };
    let how = How {
        setup: &setup,
        caliper: &files.caliper.springs,
        drawn: options.drawn,
        block_bytes: options.block_bytes,
    };
    let (readings, sources) = read_all(&files, how)?;
    let finding = plausible(&files.drawing, &readings, options.units_confirmed)?;
    let readings = readings
        .into_iter()
        .collect::<Result<Vec<Reading>, _>>()
        .map_err(|fault| AcceptError::Measure(Box::new(fault)))?;
    let by_column = matches!(files.rig.dialect.spring, SpringFrom::Column(_));
    let springs = group::springs(&files.lot, readings, by_column)?;
    files::check_findings(&files.caliper, &springs)?;
    judge(&files, springs, sources, finding, options)
}

struct Sources {
    inputs: Vec<InputFile>,
    ledgers: Vec<LedgerFacts>,
}

type Readings = Vec<Result<Reading, crate::characteristic::MeasureError>>;

fn read_all(files: &Files, how: How<'_>) -> miette::Result<(Readings, Sources)> {
    let repeats = files.lot.repeats.iter().map(|repeat| &repeat.export);
    let exports: Vec<_> = files.lot.exports.iter().chain(repeats).collect();
    announce(exports.iter().map(|export| export.path.as_path()));
    let batches = side_by_side(&exports, |export| read(export, how));
    let mut inputs = vec![
        files.lot.input(),
        files.drawing.input.clone(),
        files.rig.input.clone(),
    ];
    inputs.extend(files.caliper.input.clone());
    let mut sources = Sources {
        inputs,
        ledgers: Vec::new(),
    };
    let mut readings = Vec::new();
    let mut faults = Vec::new();
    for batch in batches {
        match batch {
            Ok(batch) => {
                readings.extend(batch.readings);
                sources.inputs.push(batch.input);
                sources.ledgers.push(batch.ledger);
            }
            Err(fault) => faults.push(fault),
        }
    }
    if let [_, _, ..] = faults.as_slice() {
        let count = faults.len();
        faults.truncate(SHOWN);
        return Err(AcceptError::Exports {
            count,
            shown: faults,
        }
        .into());
    }
    if let Some(fault) = faults.pop() {
        return Err(fault.into());
    }
    Ok((readings, sources))
}

/// Withholds judgement from a lot whose units look mixed up; the finding, where someone stands for the units.
fn plausible(
    drawing: &Drawing,
    readings: &[Result<Reading, crate::characteristic::MeasureError>],
    confirmed: bool,
) -> Result<Option<String>, crate::doubt::DoubtError> {
    let rates: Vec<f64> = readings
        .iter()
        .filter_map(|one| one.as_ref().ok()?.plain_rate)
        .collect();
    let expected = nominal_rate(drawing);
    match doubt(&rates, expected) {
        None => Ok(None),
        Some(found) if confirmed => Ok(Some(found.finding)),
        Some(found) => Err(found.into_error(expected)),
    }
}

fn judge(
    files: &Files,
    springs: Vec<Spring>,
    sources: Sources,
    finding: Option<String>,
    options: &Options,
) -> miette::Result<Accepted> {
    let Files {
        lot,
        drawing,
        rig,
        caliper: _,
    } = files;
    let Some(terms) = &drawing.acceptance else {
        return Err(AcceptError::NoTerms {
            drawing: drawing.input.path.clone(),
        }
        .into());
    };
    let judge = |spring| springs::judge(files, terms, spring);
    let mut judged = springs
        .into_par_iter()
        .map(judge)
        .collect::<Result<Vec<_>, _>>()?;
    let (sampled, others) = group::sample_order(lot, &judged)?;
    let plans = class_terms(&terms.plan, lot.size.value, &classes(files, &judged))?;
    let outcome = decide(&plans, &sampled, &others, terms.undecided);
    let widest = plans.iter().map(|plan| plan.sample_size).max().unwrap_or(0);
    springs::mark_sample(&mut judged, &sampled, widest);
    let cautions = cautions::cautions(files, terms.rule, &judged, finding, options);
    if options.strict {
        rig_cautions::refuse(&cautions)?;
    }
    let curves = judged
        .iter_mut()
        .filter_map(|spring| spring.reduced.take())
        .collect();
    let requirements = requirements::facts(drawing, &judged);
    let record = AcceptRecord {
        format: FORMAT,
        kind: Kind::Accept,
        decision: outcome.decision,
        simple: SimpleAcceptance {
            decision: outcome.simple,
            failing: outcome.simple_failing,
        },
        cautions,
        lot: facts::lot(lot),
        drawing: facts::drawing(drawing, terms, requirements),
        theory: facts::theory(drawing, full_load(drawing))?,
        window: facts::window(drawing, window_of(drawing)),
        rig: facts::rig(rig),
        plan: plan::facts(&terms.plan, &outcome)?,
        reasons: outcome.reasons,
        springs: judged.into_iter().map(|spring| spring.result).collect(),
        provenance: provenance(sources, options),
        files: Vec::new(),
    };
    Ok(Accepted { record, curves })
}

fn provenance(sources: Sources, options: &Options) -> Provenance {
    Provenance {
        tool: TOOL.to_owned(),
        version: env!("CARGO_PKG_VERSION").to_owned(),
        date: options.date.to_string(),
        flags: options.flags.clone(),
        inputs: sources.inputs,
        ledgers: sources.ledgers,
    }
}

/// The classes that are decided on, gravest first: those of inspected requirements, of findings, and of proven failures.
fn classes(files: &Files, judged: &[Judged]) -> Vec<Class> {
    let Files { lot, drawing, .. } = files;
    let left_out = |one: &Requirement| {
        lot.not_inspected
            .iter()
            .any(|not| not.quantity == one.quantity)
    };
    let used = |class: &Class| {
        drawing
            .requirements
            .iter()
            .any(|one| one.class == *class && !left_out(one))
            || lot.findings.iter().any(|one| one.class == *class)
            || judged
                .iter()
                .any(|spring| spring.overall.failing == Some(*class))
    };
    Class::ALL.into_iter().filter(used).collect()
}

/// Whether the rule guards.
const fn guards(rule: Rule) -> bool {
    matches!(rule, Rule::Guarded)
}

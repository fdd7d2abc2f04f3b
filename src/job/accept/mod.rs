//! `accept`: a lot file in, a decided and documented lot out.

mod alike;
mod cautions;
mod deciding;
mod drawing_cautions;
mod error;
pub(super) mod figures;
mod files;
mod group;
mod memory;
mod plan;
mod process;
mod requirements;
pub(super) mod rig_cautions;
mod settling;
mod springs;
mod variables;

use std::path::Path;

use jiff::civil::Date;
use rayon::prelude::*;

use crate::characteristic::{Setup, stage_windows, wanted};
use crate::curve::{Kept, Reduced, full_load, nominal_rate, window_of};
use crate::doubt::doubt;
use crate::drawing::{Drawing, Requirement, Rule};
use crate::quantity::Class;
use crate::record::{AcceptRecord, FORMAT, Kind, LedgerFacts, Provenance};
use crate::rig::SpringFrom;
use crate::text::{InputFile, announce};

use super::facts;
use super::read::{How, Keep, Reading, read};
use super::threads::side_by_side;
use error::AcceptError;
use files::Files;
use group::Spring;
use springs::Judged;

pub use deciding::Past;
pub use memory::Memory;

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
    /// What is kept of the curves.
    pub keep: Keep,
    /// Bytes read at once, where a test wants other blocks.
    pub block_bytes: Option<usize>,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
    /// Where earlier checks and lots are looked for.
    pub memory: Memory,
    /// The lots before this one, for the switching rules.
    pub past: Option<Past>,
}

/// A judged lot.
#[derive(Debug)]
pub struct Accepted {
    /// The result.
    pub record: AcceptRecord,
    /// The curves for the charts, in the order of the springs; empty where they were not wanted.
    pub curves: Vec<Reduced>,
    /// The curves for an archive, in the order of the springs, each spring's measurements in the order of measuring; empty
    /// where they were not wanted.
    pub kept: Vec<Vec<Kept>>,
}

/// Judges the lot of the file at `path`, written as `as_written`.
///
/// # Errors
/// A report that names file, line and column where a file or an export cannot be used, or why nothing is judged.
pub fn accept(path: &Path, as_written: &str, options: &Options) -> miette::Result<Accepted> {
    let files = files::open(path, as_written)?;
    let options = &options.asked(&files)?;
    let wanted = wanted(&files.drawing);
    let stages = stage_windows(&files.drawing);
    let setup = Setup {
        rig: &files.rig,
        conditions: files.lot.conditions,
        bounds: window_of(&files.drawing),
        stroke: files.drawing.rate_test.stroke,
        method: files.drawing.rate_test.method,
        full_load: Some(full_load(&files.drawing)),
        wanted: &wanted,
        stages: &stages,
        caliper: &files.lot.caliper,
    };
    let how = How {
        setup: &setup,
        caliper: &files.caliper.springs,
        keep: options.keep,
        of_all: &[],
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
    files::check_findings(&files, &springs)?;
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
    inputs.extend(files.drawing.materials.clone());
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
    let decided = deciding::decide_lot(files, terms, &judged, options.past().as_ref())?;
    springs::mark_sample(&mut judged, &decided.sampled, decided.plan.sample_size);
    let cautions = cautions::cautions(files, terms.rule, &judged, finding, options);
    if options.strict {
        rig_cautions::refuse(&cautions)?;
    }
    let curves = judged
        .iter_mut()
        .filter_map(|spring| spring.reduced.take())
        .collect();
    let kept = judged
        .iter_mut()
        .map(|spring| std::mem::take(&mut spring.kept))
        .collect();
    let requirements = requirements::facts(drawing, &judged);
    let process = process::facts(drawing, &judged, &decided.sampled)
        .map_err(|cause| AcceptError::Process { cause })?;
    let record = AcceptRecord {
        format: FORMAT,
        kind: Kind::Accept,
        decision: decided.decision,
        reasons: decided.reasons,
        simple: decided.simple,
        cautions,
        lot: facts::lot(lot),
        drawing: facts::drawing(drawing, terms, requirements),
        theory: facts::theory(drawing, full_load(drawing))?,
        window: facts::window(drawing, window_of(drawing)),
        rig: facts::rig(rig, rig_cautions::holding(rig, options)),
        plan: decided.plan,
        process,
        springs: judged.into_iter().map(|spring| spring.result).collect(),
        provenance: provenance(sources, options),
        files: Vec::new(),
    };
    Ok(Accepted {
        record,
        curves,
        kept,
    })
}

fn provenance(mut sources: Sources, options: &Options) -> Provenance {
    let history = options.past.as_ref().and_then(|past| past.input.clone());
    sources.inputs.extend(history);
    Provenance {
        archive: options.memory.told().cloned(),
        ..Provenance::new(
            options.date,
            options.flags.clone(),
            sources.inputs,
            sources.ledgers,
        )
    }
}

/// The classes that are decided on, gravest first: those of inspected requirements, of findings, and of proven failures.
fn classes(files: &Files, judged: &[Judged]) -> Vec<Class> {
    let Files { lot, drawing, .. } = files;
    let used = |class: &Class| {
        drawing
            .requirements
            .iter()
            .any(|one| one.class == *class && !left_out(files, one))
            || lot.findings.iter().any(|one| one.class == *class)
            || judged
                .iter()
                .any(|spring| spring.overall.failing == Some(*class))
    };
    Class::ALL.into_iter().filter(used).collect()
}

/// Whether the lot file lists a requirement as not inspected.
fn left_out(files: &Files, one: &Requirement) -> bool {
    files
        .lot
        .not_inspected
        .iter()
        .any(|not| not.quantity == one.quantity)
}

/// Whether the rule guards.
const fn guards(rule: Rule) -> bool {
    matches!(rule, Rule::Guarded)
}

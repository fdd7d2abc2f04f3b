//! `rig repeat`: a study file in, a studied rig out.

use std::collections::BTreeMap;
use std::path::Path;

use crate::bench::{Crossed, Observation};
use crate::characteristic::{Setup, wanted};
use crate::curve::{Bounds, WindowOf, full_load, window_of};
use crate::drawing::{self, Drawing, Method, Requirement, Stroke, Way};
use crate::intake::{StudyFile, open_study};
use crate::quantity::Quantity;
use crate::record::{
    BenchCaution, FORMAT, ProposedFigure, RepeatKind, RepeatRecord, StudyFacts, StudyValue,
};
use crate::rig::{self, Change, Rig, edit};
use crate::text::Source;

use super::super::accept::rig_cautions::{of_rig, refused};
use super::super::facts::{self, figure};
use super::super::read::{How, Keep, Reading};
use super::assigned::{Placed, laid_out, placed, value_of};
use super::error::RigJobError;
use super::exports::{Sources, measurements};
use super::repeat_outcome::{decision, of_layout, of_study, reasons};
use super::shares::{Analysed, analysed};
use super::{Proposal, RigOptions, provenance};

/// The window of the rate where there is no drawing: as `rate` has it.
const WINDOW: (f64, f64) = (0.3, 0.7);

/// A studied rig.
#[derive(Debug)]
pub struct Repeated {
    /// The result.
    pub record: RepeatRecord,
    /// The rig file with the within-spring standard deviations in it.
    pub proposal: Option<Proposal>,
}

/// Studies the rig of the study file at `path`, written as `as_written`.
///
/// # Errors
/// A report that names file, line and column where a file or an export cannot be used, or what `--strict` refuses.
pub fn rig_repeat(path: &Path, as_written: &str, options: &RigOptions) -> miette::Result<Repeated> {
    let file = open_study(path, as_written)?;
    let rig_source = Source::open(&file.rig.1, &file.rig.0)?;
    let rig = rig::from_source(&rig_source)?;
    let drawing = file
        .drawing
        .as_ref()
        .map(|(written, path)| drawing::open(path, written))
        .transpose()?;
    let mut inputs = vec![file.source.input("study"), rig_source.input("rig")];
    inputs.extend(drawing.as_ref().map(|drawing| drawing.input.clone()));
    let mut sources = Sources::default();
    let quantities = quantities(&file, drawing.as_ref());
    let readings = read(&file, &rig, drawing.as_ref(), &quantities, &mut sources)?;
    let placed = placed(&file, readings, &mut inputs)?;
    let layout = laid_out(&placed, |_| Some(0.0)).map(|found| Crossed::new(&found));
    let layout = layout.map_err(|_| RigJobError::NotFinite { of: "study" })?;
    let layout = layout.map_err(RigJobError::from)?;
    let of_bench = of_rig(&rig, options.date);
    if let (true, Some(what)) = (options.strict, refused(&of_bench)) {
        return Err(RigJobError::Strict { what }.into());
    }
    let (studies, mut cautions) = studies(&placed, &quantities, drawing.as_ref())?;
    cautions.splice(0..0, of_layout(&file, &layout, studies.first()));
    cautions.extend(
        of_bench
            .into_iter()
            .map(|caution| BenchCaution::Rig { caution }),
    );
    let reasons = reasons(&studies, drawing.as_ref());
    let changes = changes(&studies);
    let record = RepeatRecord {
        format: FORMAT,
        kind: RepeatKind::RigRepeat,
        decision: decision(&reasons),
        reasons,
        judged_at: options.date,
        rig: rig.name.clone(),
        note: file.note.clone(),
        drawing: drawing.as_ref().map(numbered),
        parts: layout.parts.clone(),
        operators: layout.operators.clone(),
        trials: u32::try_from(layout.trials).unwrap_or(u32::MAX),
        cautions,
        bench: facts::rig(&rig, None),
        proposed: changes
            .iter()
            .filter_map(|change| proposed(change, &rig))
            .collect(),
        studies: studies.into_iter().map(|one| one.facts).collect(),
        provenance: provenance(inputs, sources, options),
        files: Vec::new(),
    };
    let proposal = if changes.is_empty() {
        None
    } else {
        let edited = edit(&rig_source, &changes)?;
        rig::from_source(&edited.source)?;
        Some(Proposal { edited })
    };
    Ok(Repeated { record, proposal })
}

fn numbered(drawing: &Drawing) -> String {
    match &drawing.revision {
        Some(revision) => format!("{} rev. {revision}", drawing.number),
        None => drawing.number.clone(),
    }
}

/// What is studied: all that the bench measures for the drawing, else rate, the loads named, free length.
fn quantities(file: &StudyFile, drawing: Option<&Drawing>) -> Vec<Quantity> {
    if let Some(drawing) = drawing {
        let mut all = wanted(drawing);
        all.retain(|one| !one.by_caliper());
        return all;
    }
    let mut all = vec![Quantity::Rate];
    all.extend(&file.loads);
    all.push(Quantity::FreeLength);
    all
}

fn read(
    file: &StudyFile,
    rig: &Rig,
    drawing: Option<&Drawing>,
    quantities: &[Quantity],
    sources: &mut Sources,
) -> Result<Vec<Reading>, RigJobError> {
    let travel = Bounds {
        of: WindowOf::Travel,
        from: WINDOW.0,
        to: WINDOW.1,
    };
    let last = Stroke {
        index: None,
        way: Way::Loading,
    };
    let setup = Setup {
        rig,
        conditions: file.conditions,
        bounds: drawing.map_or(travel, window_of),
        stroke: drawing.map_or(last, |drawing| drawing.rate_test.stroke),
        method: drawing.map_or(Method::Fit, |drawing| drawing.rate_test.method),
        full_load: drawing.map(full_load),
        wanted: quantities,
        stages: &[],
        caliper: &[],
    };
    let how = How {
        setup: &setup,
        caliper: &BTreeMap::new(),
        of_all: &[],
        keep: Keep::default(),
        block_bytes: None,
    };
    measurements(&file.exports, how, sources)
}

/// Every quantity that every measurement has a value of, and what is to be said of the others.
fn studies(
    placed: &[Placed],
    quantities: &[Quantity],
    drawing: Option<&Drawing>,
) -> Result<(Vec<Analysed>, Vec<BenchCaution>), RigJobError> {
    let mut found = Vec::new();
    let mut cautions = Vec::new();
    for quantity in quantities.iter().copied() {
        let requirement = requirement(drawing, quantity);
        match laid_out(placed, |reading| value_of(reading, quantity)) {
            Ok(observations) => {
                let study = Crossed::new(&observations)?;
                let one = analysed(quantity, &study, values(observations)?, requirement)?;
                cautions.extend(one.negative.iter().cloned());
                cautions.extend(of_study(&one));
                found.push(one);
            }
            // What nobody asked for and nobody measured needs no words.
            Err(missing)
                if missing.len() == placed.len() && requirement.is_none() && drawing.is_some() => {}
            Err(measurements) => cautions.push(BenchCaution::NotAnalysed {
                name: quantity.name().to_owned(),
                at_length_mm: quantity.at_length(),
                measurements,
            }),
        }
    }
    Ok((found, cautions))
}

fn requirement(drawing: Option<&Drawing>, quantity: Quantity) -> Option<&Requirement> {
    let all = drawing.map(|drawing| &drawing.requirements)?;
    all.iter().find(|one| one.quantity == quantity)
}

fn values(observations: Vec<Observation>) -> Result<Vec<StudyValue>, RigJobError> {
    let value = |one: Observation| {
        Some(StudyValue {
            part: one.part,
            operator: one.operator,
            trial: one.trial,
            value: figure(one.value)?,
        })
    };
    let all: Option<Vec<StudyValue>> = observations.into_iter().map(value).collect();
    all.ok_or(RigJobError::NotFinite { of: "study" })
}

/// What goes into the rig file: of several loads the largest, for one figure stands for all lengths.
fn changes(studies: &[Analysed]) -> Vec<Change> {
    const KNOWN: [&str; 7] = [
        "rate",
        "load",
        "free_length",
        "solid_length",
        "hysteresis",
        "set",
        "straightness",
    ];
    let largest = |of: &'static str| {
        let mine = studies.iter().map(|one| &one.facts);
        let all = mine.filter(|facts: &&StudyFacts| facts.name == of);
        let standard_deviation = all
            .map(|facts| facts.within_spring.get())
            .reduce(f64::max)?;
        (standard_deviation > 0.0).then_some(Change::Repeatability {
            of,
            standard_deviation,
        })
    };
    KNOWN.into_iter().filter_map(largest).collect()
}

fn proposed(change: &Change, rig: &Rig) -> Option<ProposedFigure> {
    let Change::Repeatability {
        of,
        standard_deviation,
    } = change
    else {
        return None;
    };
    let at = (*of == "load").then_some(crate::units::Millimetres::ZERO);
    let stated = rig.repeatability.iter().find(|(known, _)| known == of);
    Some(ProposedFigure {
        of: (*of).to_owned(),
        standard_deviation: figure(*standard_deviation)?,
        unit: Quantity::from_name(of, at)?.unit(),
        stated: stated.and_then(|(_, value)| figure(*value)),
    })
}

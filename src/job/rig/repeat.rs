//! `rig repeat`: a study file in, a studied rig out.

use std::collections::BTreeMap;
use std::path::Path;

use crate::bench::{Crossed, Observation, Serving, overall};
use crate::characteristic::{Measured, Setup, wanted};
use crate::curve::{Bounds, WindowOf, full_load, window_of};
use crate::drawing::{self, Drawing, Method, Requirement, Stroke, Way};
use crate::export::read_small;
use crate::intake::{Assigned, Belongs, StudyFile, natural_order, open_study};
use crate::quantity::Quantity;
use crate::record::{
    BenchCaution, FORMAT, ProposedFigure, RepeatKind, RepeatReason, RepeatRecord, StudyFacts,
    StudyValue,
};
use crate::rig::{self, Change, Rig, edit};
use crate::text::{InputFile, Source};
use crate::units::Finite;

use super::super::accept::rig_cautions::{of_rig, refused};
use super::super::facts::{self, figure};
use super::super::read::{How, Keep, Reading};
use super::error::RigJobError;
use super::exports::{Sources, measurements};
use super::shares::{Analysed, GOOD, analysed};
use super::{Proposal, RigOptions, provenance};

/// Degrees of freedom under which a standard deviation is itself uncertain by more than a fifth.
const FEW: f64 = 10.0;
/// Distinct categories under which parts are hardly told apart (AIAG MSA, from memory).
const CATEGORIES: u32 = 5;
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

/// A measurement and where it belongs.
struct Placed {
    reading: Reading,
    belongs: Belongs,
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

/// Every measurement with its part, operator and trial, in natural order of these.
fn placed(
    file: &StudyFile,
    readings: Vec<Reading>,
    inputs: &mut Vec<InputFile>,
) -> Result<Vec<Placed>, RigJobError> {
    for (place, one) in readings.iter().enumerate() {
        if readings.iter().take(place).any(|other| other.id == one.id) {
            return Err(RigJobError::Twice {
                measurement: one.id.clone(),
            });
        }
    }
    let mut placed = Vec::new();
    match &file.assigned {
        Assigned::Names(names) => {
            for reading in readings {
                let belongs = names.read(&reading.id).ok_or_else(|| RigJobError::Name {
                    measurement: reading.id.clone(),
                })?;
                placed.push(Placed { reading, belongs });
            }
        }
        Assigned::Table((written, path)) => {
            let mut rows = table(path, written, inputs)?;
            for reading in readings {
                let belongs = rows
                    .remove(&reading.id)
                    .ok_or_else(|| RigJobError::Unassigned {
                        measurement: reading.id.clone(),
                    })?;
                placed.push(Placed { reading, belongs });
            }
            if let Some(measurement) = rows.into_keys().next() {
                return Err(RigJobError::NoMeasurement { measurement });
            }
        }
    }
    placed.sort_by(|a, b| {
        let (a, b) = (&a.belongs, &b.belongs);
        natural_order(&a.operator, &b.operator)
            .then_with(|| natural_order(&a.part, &b.part))
            .then_with(|| natural_order(&a.trial, &b.trial))
    });
    Ok(placed)
}

/// The table of the study: what belongs where, by measurement.
fn table(
    path: &Path,
    written: &str,
    inputs: &mut Vec<InputFile>,
) -> Result<BTreeMap<String, Belongs>, RigJobError> {
    let table = read_small(path, written).map_err(|fault| RigJobError::Export(Box::new(fault)))?;
    let wanted: Vec<&str> = table.header.iter().map(String::as_str).collect();
    let operators = match wanted.as_slice() {
        ["measurement", "part", "operator", "trial"] => true,
        ["measurement", "part", "trial"] => false,
        _ => {
            return Err(RigJobError::Columns {
                name: table.name.clone(),
                found: table.header.join(", "),
            });
        }
    };
    inputs.push(InputFile {
        role: "study table".to_owned(),
        path: table.name.clone(),
        sha256: table.sha256.clone(),
    });
    let mut rows = BTreeMap::new();
    for (_, cells) in table.rows {
        let mut cells = cells.into_iter();
        let mut next = || cells.next().unwrap_or_default();
        let (measurement, part) = (next(), next());
        let operator = if operators { next() } else { String::new() };
        let belongs = Belongs {
            part,
            operator,
            trial: next(),
        };
        if rows.insert(measurement.clone(), belongs).is_some() {
            return Err(RigJobError::Twice { measurement });
        }
    }
    Ok(rows)
}

/// The observations of one value of each measurement.
///
/// # Errors
/// The measurements that have none.
fn laid_out(
    placed: &[Placed],
    of: impl Fn(&Reading) -> Option<f64>,
) -> Result<Vec<Observation>, Vec<String>> {
    let mut missing = Vec::new();
    let mut found = Vec::new();
    for one in placed {
        match of(&one.reading) {
            Some(value) => found.push(Observation {
                part: one.belongs.part.clone(),
                operator: one.belongs.operator.clone(),
                trial: one.belongs.trial.clone(),
                value,
            }),
            None => missing.push(one.reading.id.clone()),
        }
    }
    if missing.is_empty() {
        Ok(found)
    } else {
        Err(missing)
    }
}

fn value_of(reading: &Reading, quantity: Quantity) -> Option<f64> {
    let all = &reading.measurement.characteristics;
    match &all.iter().find(|one| one.quantity == quantity)?.measured {
        Measured::Value(estimate) => Some(estimate.value),
        Measured::Below(_) | Measured::Absent(_) => None,
    }
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

/// What is to be said of one quantity besides its figures.
fn of_study(one: &Analysed) -> Vec<BenchCaution> {
    let (name, at_length_mm) = (one.facts.name.clone(), one.facts.at_length_mm);
    let mut found = Vec::new();
    if let Some(share) = one.share.filter(|share| *share > GOOD).and_then(figure) {
        found.push(BenchCaution::LargeShare {
            name: name.clone(),
            at_length_mm,
            share,
        });
    }
    if let Some(categories) = one.facts.categories.filter(|number| *number < CATEGORIES) {
        found.push(BenchCaution::FewCategories {
            name,
            at_length_mm,
            categories,
        });
    }
    found
}

/// What is to be said of the study's layout.
fn of_layout(file: &StudyFile, layout: &Crossed, first: Option<&Analysed>) -> Vec<BenchCaution> {
    let mut found = Vec::new();
    let preset = file.conditions.presetting_strokes.unwrap_or(0) > 0
        || file.conditions.presetting_recorded > 0;
    if !preset {
        found.push(BenchCaution::PresettingNotStated);
    }
    if layout.operators.len() < 2 {
        found.push(BenchCaution::OneOperator);
    }
    if let Some(dof) = first.map(|one| one.dof).filter(|dof| *dof < FEW) {
        // JCGM 100:2008, E.4.3: the relative uncertainty of a standard deviation of ν degrees of freedom is 1/√(2ν).
        let relative = figure(1.0 / (2.0 * dof).sqrt());
        if let (Some(degrees_of_freedom), Some(relative)) = (figure(dof), relative) {
            found.push(BenchCaution::FewRepeats {
                degrees_of_freedom,
                relative,
            });
        }
    }
    found
}

fn reasons(studies: &[Analysed], drawing: Option<&Drawing>) -> Vec<RepeatReason> {
    let mut found = Vec::new();
    let required = drawing.iter().flat_map(|drawing| &drawing.requirements);
    let on_bench = required.filter(|one| !one.quantity.by_caliper());
    for one in on_bench.filter(|one| one.limits.half_width().is_some()) {
        let (name, at_length_mm) = (one.quantity.name().to_owned(), one.quantity.at_length());
        let study = studies
            .iter()
            .find(|study| study.facts.name == name && study.facts.at_length_mm == at_length_mm);
        match study {
            None => found.push(RepeatReason::NotAnalysed { name, at_length_mm }),
            Some(study) if study.facts.serving == Some(Serving::Fails) => {
                let share = study.share.and_then(figure).unwrap_or(Finite::ZERO);
                found.push(RepeatReason::BeyondTolerance {
                    name,
                    at_length_mm,
                    share,
                });
            }
            Some(_) => {}
        }
    }
    if found.is_empty() {
        let largest = studies.iter().filter_map(|one| one.share).reduce(f64::max);
        found.push(match largest.and_then(figure) {
            Some(largest) => RepeatReason::WithinTolerance { largest },
            None => RepeatReason::NoTolerance,
        });
    }
    found
}

fn decision(reasons: &[RepeatReason]) -> Serving {
    overall(reasons.iter().map(|reason| match reason {
        RepeatReason::WithinTolerance { .. } => Serving::Serves,
        RepeatReason::BeyondTolerance { .. } => Serving::Fails,
        RepeatReason::NotAnalysed { .. } | RepeatReason::NoTolerance => Serving::Undecided,
    }))
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

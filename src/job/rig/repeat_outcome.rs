//! What a study comes to, and what is to be said besides.

use crate::bench::{Crossed, Serving, overall};
use crate::drawing::Drawing;
use crate::intake::StudyFile;
use crate::record::{BenchCaution, RepeatReason};
use crate::units::Finite;

use super::super::facts::figure;
use super::shares::{Analysed, GOOD};

/// Degrees of freedom under which a standard deviation is itself uncertain by more than a fifth.
const FEW: f64 = 10.0;
/// Distinct categories under which parts are hardly told apart (AIAG MSA, from memory).
const CATEGORIES: u32 = 5;

/// What is to be said of one quantity besides its figures.
pub(super) fn of_study(one: &Analysed) -> Vec<BenchCaution> {
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
pub(super) fn of_layout(
    file: &StudyFile,
    layout: &Crossed,
    first: Option<&Analysed>,
) -> Vec<BenchCaution> {
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

pub(super) fn reasons(studies: &[Analysed], drawing: Option<&Drawing>) -> Vec<RepeatReason> {
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

pub(super) fn decision(reasons: &[RepeatReason]) -> Serving {
    overall(reasons.iter().map(|reason| match reason {
        RepeatReason::WithinTolerance { .. } => Serving::Serves,
        RepeatReason::BeyondTolerance { .. } => Serving::Fails,
        RepeatReason::NotAnalysed { .. } | RepeatReason::NoTolerance => Serving::Undecided,
    }))
}

//! What page one must say besides the decision.

use std::collections::BTreeMap;

use crate::curve::{full_load, nominal_rate};
use crate::doubt::{is_odd, reading};
use crate::drawing::{Drawing, Requirement, Rule};
use crate::quantity::Quantity;
use crate::record::{BudgetFigure, Caution, CharacteristicResult, Oddity, Reason};
use crate::rig::Rig;
use crate::stats::median;
use crate::units::{Finite, Millimetres};

use super::super::facts::figure;
use super::super::odd::{KINDS, oddity};
use super::alike::alike;
use super::drawing_cautions::of_drawing;
use super::figures::value_of;
use super::rig_cautions::{beyond_table, large_compliance, of_check, of_rig};
use super::springs::{Basis, Judged};
use super::{Files, Options, guards};

/// U over the half tolerance beyond which a requirement carries a caution: a third under the guarded rule, a quarter
/// under simple acceptance.
const LARGE: (f64, f64) = (1.0 / 3.0, 1.0 / 4.0);
/// Relative spread of the rate from stroke to stroke that is odd, and scatter about the line that is, over Fn.
const STROKES: f64 = 0.01;
const SCATTER: f64 = 0.005;
/// Share of the springs whose free length must be off alike, and by how much of the drawn one, to doubt the length zero.
const SHIFTED: (f64, f64) = (0.8, 0.03);

/// Every caution of a lot, gravest matters first.
pub(super) fn cautions(
    files: &Files,
    rule: Rule,
    judged: &[Judged],
    finding: Option<String>,
    options: &Options,
) -> Vec<Caution> {
    let mut found: Vec<Caution> = finding
        .into_iter()
        .map(|finding| Caution::UnitsConfirmed { finding })
        .collect();
    found.extend(of_drawing(&files.drawing));
    found.extend(odd_rates(&files.drawing, judged));
    found.extend(shifted(&files.drawing, judged));
    found.extend(alike(&ids(judged.iter())));
    for requirement in &files.drawing.requirements {
        found.extend(of_requirement(requirement, rule, judged));
    }
    found.extend(of_rig(&files.rig, options.date));
    found.extend(of_check(&files.rig, options));
    found.extend(large_compliance(&files.rig, nominal_rate(&files.drawing)));
    found.extend(of_curves(&files.rig, full_load(&files.drawing), judged));
    found.extend(of_points(judged));
    found.extend(of_measurements(files, judged));
    let beyond = judged
        .iter()
        .filter(|spring| !spring.result.in_sample)
        .count();
    if beyond > 0 {
        let springs = u32::try_from(beyond).unwrap_or(u32::MAX);
        found.push(Caution::BeyondSample { springs });
    }
    found
}

fn ids<'a>(judged: impl Iterator<Item = &'a Judged>) -> Vec<String> {
    judged.map(|spring| spring.result.id.clone()).collect()
}

fn odd_rates(drawing: &Drawing, judged: &[Judged]) -> Option<Caution> {
    let expected = nominal_rate(drawing);
    let odd: Vec<&Judged> = judged
        .iter()
        .filter(|spring| rate_of(spring).is_some_and(|rate| is_odd(rate, expected)))
        .collect();
    let against_theory = odd
        .iter()
        .filter_map(|spring| rate_of(spring))
        .map(|rate| rate / drawing.theory.rate.get())
        .collect();
    let against_stated = odd
        .iter()
        .filter_map(|spring| rate_of(spring))
        .map(|rate| rate / expected)
        .collect();
    let ratio = median(against_stated).and_then(figure)?;
    let reading = median(against_theory).and_then(|ratio| reading(drawing, ratio));
    Some(Caution::OddRatio {
        springs: ids(odd.into_iter()),
        ratio,
        reading,
    })
}

/// Nearly all free lengths off the drawn one by much the same: the springs may be wrong, or the length zero.
fn shifted(drawing: &Drawing, judged: &[Judged]) -> Option<Caution> {
    let drawn = drawing.theory.free.get();
    let lengths = judged
        .iter()
        .filter_map(|spring| value_of(&spring.result, Quantity::FreeLength)?.value);
    let shifts: Vec<f64> = lengths.map(|length| length.get() - drawn).collect();
    let middle = median(shifts.clone())?;
    let alike = shifts
        .iter()
        .filter(|shift| (*shift - middle).abs() < middle.abs() / 2.0)
        .count();
    let enough =
        alike as f64 >= SHIFTED.0 * shifts.len() as f64 && middle.abs() > SHIFTED.1 * drawn;
    if enough {
        Some(Caution::LengthsShifted {
            shift_mm: middle.try_into().ok()?,
        })
    } else {
        None
    }
}

/// The measured rate, or the first idea of it where the window was not reached. N/mm.
fn rate_of(spring: &Judged) -> Option<f64> {
    let measured = value_of(&spring.result, Quantity::Rate)
        .and_then(|one| one.value)
        .map(Finite::get);
    measured.or(spring.plain_rate)
}

fn of_requirement(requirement: &Requirement, rule: Rule, judged: &[Judged]) -> Option<Caution> {
    let quantity = requirement.quantity;
    let (name, at_length_mm) = (quantity.name().to_owned(), quantity.at_length());
    let results = || {
        judged
            .iter()
            .filter_map(|spring| value_of(&spring.result, quantity))
    };
    if results().any(|one| one.reason == Some(Reason::GuardBandsMeet)) {
        return Some(Caution::CannotProve { name, at_length_mm });
    }
    let half = requirement.limits.half_width()?;
    let share = |one: &CharacteristicResult| {
        one.expanded_uncertainty
            .map(|expanded| expanded.get() / half)
    };
    let largest = results().filter_map(share).reduce(f64::max)?;
    let bound = if guards(rule) { LARGE.0 } else { LARGE.1 };
    if largest <= bound {
        return None;
    }
    Some(Caution::UncertaintyLarge {
        name,
        at_length_mm,
        share: figure(largest)?,
    })
}

fn of_curves(rig: &Rig, full_load: f64, judged: &[Judged]) -> Vec<Caution> {
    let usual = usual_strokes(judged);
    let named = |of: &dyn Fn(&Judged) -> bool| {
        let springs = ids(judged.iter().filter(|spring| of(spring)));
        if springs.is_empty() {
            None
        } else {
            Some(springs)
        }
    };
    let odd = |what: Oddity, of: &dyn Fn(&Judged) -> bool| {
        named(of).map(|springs| Caution::OddCurves { springs, what })
    };
    let outside = |spring: &Judged| {
        rig.force
            .range
            .is_some_and(|(_, most)| spring.loads.1 > most)
    };
    let below = |spring: &Judged| {
        let least = rig.force.usable_from();
        let judged_loads = spring
            .result
            .characteristics
            .iter()
            .filter(|one| one.at_length_mm.is_some())
            .filter_map(|one| one.value);
        least.is_some_and(|least| judged_loads.map(Finite::get).any(|load| load < least))
    };
    [
        named(&|spring| outside(spring) || below(spring))
            .map(|springs| Caution::LoadOutsideRange { springs }),
        named(&|spring| beyond_table(rig, spring))
            .map(|springs| Caution::FrameBeyondTable { springs }),
        named(&robust_differs).map(|springs| Caution::RobustDiffers { springs }),
        named(&bends).map(|springs| Caution::LackOfFit { springs }),
        odd(Oddity::StrokesLeftOut, &|spring| spring.short_strokes),
        odd(Oddity::OtherStrokeCount, &|spring| {
            spring.result.loading_strokes != usual
        }),
        odd(Oddity::StrokesDiffer, &strokes_differ),
        odd(Oddity::Scatter, &|spring| scatters(spring, full_load)),
        odd(Oddity::GaugeDiffers, &|spring| spring.gauge_differs),
        odd(Oddity::RepeatsDiffer, &repeats_differ),
        named(&|spring| !spring.zero_read).map(|springs| Caution::NoZeroReading { springs }),
    ]
    .into_iter()
    .flatten()
    .chain(KINDS.into_iter().filter_map(|kind| {
        let what = oddity(kind);
        odd(what, &|spring| {
            spring.result.odd.iter().any(|one| one.what == what)
        })
    }))
    .collect()
}

/// The number of loading strokes that most springs have; of two such the larger.
fn usual_strokes(judged: &[Judged]) -> u32 {
    let mut counts: BTreeMap<u32, usize> = BTreeMap::new();
    for spring in judged {
        *counts.entry(spring.result.loading_strokes).or_default() += 1;
    }
    let most = counts
        .into_iter()
        .max_by_key(|(strokes, springs)| (*springs, *strokes));
    most.map_or(0, |(strokes, _)| strokes)
}

/// Springs of which only loads at a few lengths are known, by the two that their rates are drawn from.
fn of_points(judged: &[Judged]) -> Vec<Caution> {
    let mut seen: Vec<Basis> = Vec::new();
    for spring in judged {
        if !seen.contains(&spring.basis) {
            seen.push(spring.basis);
        }
    }
    let length = |value: f64| Millimetres::try_from(value).ok();
    let told = |basis: Basis| {
        let Basis::Readings(between) = basis else {
            return None;
        };
        Some(Caution::PointReadings {
            springs: ids(judged.iter().filter(|spring| spring.basis == basis)),
            from_mm: between.and_then(|(from, _)| length(from)),
            to_mm: between.and_then(|(_, to)| length(to)),
        })
    };
    seen.into_iter().filter_map(told).collect()
}

/// Robust and fitted rate differ by more than 0.5 % and more than three standard uncertainties of the fit.
fn robust_differs(spring: &Judged) -> bool {
    let Some(fit) = &spring.result.fit else {
        return false;
    };
    let rate = value_of(&spring.result, Quantity::Rate);
    let line = |one: &CharacteristicResult| {
        one.budget
            .iter()
            .find(|line| line.source == "fit")
            .map(|line| line.contribution.get())
    };
    let (Some(rate), Some(robust)) = (rate, fit.robust_rate) else {
        return false;
    };
    let type_a = line(rate).unwrap_or(fit.standard_error.get());
    rate.value.is_some_and(|value| {
        (value.get() - robust.get()).abs() > (0.005 * value.get()).max(3.0 * type_a)
    })
}

/// A budget line of a characteristic.
fn line<'a>(of: &'a CharacteristicResult, source: &str) -> Option<&'a BudgetFigure> {
    of.budget.iter().find(|line| line.source == source)
}

fn strokes_differ(spring: &Judged) -> bool {
    let rate = value_of(&spring.result, Quantity::Rate);
    let share = rate.and_then(|rate| {
        Some(line(rate, "stroke to stroke")?.contribution.get() / rate.value?.get())
    });
    share.is_some_and(|share| share.abs() > STROKES)
}

fn scatters(spring: &Judged, full_load: f64) -> bool {
    spring
        .result
        .fit
        .as_ref()
        .is_some_and(|fit| fit.residual_sd_n.get() > SCATTER * full_load)
}

fn repeats_differ(spring: &Judged) -> bool {
    spring
        .result
        .characteristics
        .iter()
        .any(|one| line(one, "repeat to repeat").is_some_and(|line| line.counted))
}

fn bends(spring: &Judged) -> bool {
    spring
        .result
        .fit
        .as_ref()
        .and_then(|fit| fit.lack_of_fit.as_ref())
        .is_some_and(|lack| lack.warns)
}

fn of_measurements(files: &Files, judged: &[Judged]) -> Vec<Caution> {
    let mut found = Vec::new();
    for spring in judged {
        for one in &spring.result.measurements {
            if let Some(why) = &one.invalid {
                found.push(Caution::SetAsideInvalid {
                    spring: spring.result.id.clone(),
                    export: one.export.clone(),
                    why: why.clone(),
                });
            }
        }
    }
    let repeated = ids(judged
        .iter()
        .filter(|spring| spring.result.measurements.len() > 1));
    if !repeated.is_empty() {
        found.push(Caution::Repeated { springs: repeated });
    }
    let what: Vec<String> = files
        .lot
        .not_inspected
        .iter()
        .map(super::super::facts::not_inspected)
        .collect();
    if !what.is_empty() {
        found.push(Caution::NotInspected { what });
    }
    found
}

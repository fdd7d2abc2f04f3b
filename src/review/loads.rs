//! Do loads, rate and free length agree?

use crate::curve::nominal_rate;
use crate::drawing::{Drawing, Limits, Requirement};
use crate::quantity::Quantity;

use super::finding::DrawingFinding;
use super::rate::nominal_loads;

/// Where nothing is toleranced, two loads may point this far from the drawn free length, as a share of it.
const FREE: f64 = 0.05;
/// Sizes that differ by less are one, mm: sums of inch sizes round.
const ROUNDING: f64 = 1e-6;

/// Loads that do not follow.
pub(super) fn findings(drawing: &Drawing) -> Vec<DrawingFinding> {
    let mut found = not_as_drawn(drawing);
    if drawing.theory.stages.len() > 1 {
        let by_stage = |one: &Requirement| matches!(one.quantity, Quantity::RateOf(_));
        if drawing.requirements.iter().any(by_stage) {
            found.extend(misses(drawing));
        }
        return found;
    }
    let rate = required(drawing, Quantity::Rate);
    match rate {
        Some(rate) => {
            found.extend(two_loads(drawing, &rate.limits));
            found.extend(misses(drawing));
        }
        None => found.extend(free_length(drawing)),
    }
    found
}

fn required(drawing: &Drawing, quantity: Quantity) -> Option<&Requirement> {
    drawing
        .requirements
        .iter()
        .find(|one| one.quantity == quantity)
}

/// A spring that carries both nominal loads exactly would fail the rate.
fn two_loads(drawing: &Drawing, rate: &Limits) -> Option<DrawingFinding> {
    let loads = nominal_loads(drawing);
    let ((first, low), (second, high)) = (loads.first()?, loads.last()?);
    if loads.len() < 2 {
        return None;
    }
    let implied = (high - low) / (first - second);
    let outside = rate.lower.is_some_and(|lower| implied < lower)
        || rate.upper.is_some_and(|upper| implied > upper);
    if !outside {
        return None;
    }
    let limit = |value: Option<f64>| value.and_then(|value| value.try_into().ok());
    Some(DrawingFinding::LoadsNotFromRate {
        first_mm: (*first).try_into().ok()?,
        second_mm: (*second).try_into().ok()?,
        implied: implied.try_into().ok()?,
        lower: limit(rate.lower),
        upper: limit(rate.upper),
    })
}

fn misses(drawing: &Drawing) -> Vec<DrawingFinding> {
    drawing
        .requirements
        .iter()
        .filter_map(|one| missed(drawing, one))
        .collect()
}

/// The rate of a stage, counted from 0: as stated, or else theory's.
fn stage_rate(drawing: &Drawing, stage: usize) -> f64 {
    if drawing.theory.stages.len() == 1 {
        return nominal_rate(drawing);
    }
    let number = u8::try_from(stage + 1).unwrap_or(u8::MAX);
    let stated = required(drawing, Quantity::RateOf(number)).and_then(|one| one.limits.nominal);
    let theory = drawing.theory.stages.get(stage);
    stated.unwrap_or_else(|| theory.map_or(0.0, |stage| stage.rate.get()))
}

/// Load at a length (mm) with the nominal rates and the drawn free lengths, N, and the rate there.
fn nominal_load(drawing: &Drawing, length: f64) -> (f64, f64) {
    let stages = &drawing.theory.stages;
    let (mut load, mut rate) = (0.0, stage_rate(drawing, 0));
    for (place, stage) in stages.iter().enumerate() {
        let from = stage.from.get();
        if length >= from {
            break;
        }
        let to = stages
            .get(place + 1)
            .map_or(length, |next| next.from.get().max(length));
        rate = stage_rate(drawing, place);
        load += rate * (from - to);
    }
    (load, rate)
}

/// A spring of nominal rate and free length would fail this load.
fn missed(drawing: &Drawing, load: &Requirement) -> Option<DrawingFinding> {
    let at_length_mm = load.quantity.at_length()?;
    let limits = &load.limits;
    let (expected, rate) = nominal_load(drawing, at_length_mm.get());
    let outside = limits.lower.is_some_and(|lower| expected < lower)
        || limits.upper.is_some_and(|upper| expected > upper);
    if !outside {
        return None;
    }
    let middle = limits
        .nominal
        .or_else(|| match (limits.lower, limits.upper) {
            (Some(lower), Some(upper)) => Some(f64::midpoint(lower, upper)),
            (one, other) => one.or(other),
        })?;
    let limit = |value: Option<f64>| value.and_then(|value| value.try_into().ok());
    let fitting = drawing.theory.free.get() + (middle - expected) / rate;
    Some(DrawingFinding::LoadNotFromRate {
        at_length_mm,
        expected: expected.try_into().ok()?,
        lower: limit(limits.lower),
        upper: limit(limits.upper),
        fitting_free_length_mm: fitting.try_into().ok()?,
    })
}

/// Two loads, prolonged to zero load, against the drawn free length with its tolerance and theirs.
fn free_length(drawing: &Drawing) -> Option<DrawingFinding> {
    let loads: Vec<&Requirement> = drawing
        .requirements
        .iter()
        .filter(|one| one.quantity.at_length().is_some() && one.limits.nominal.is_some())
        .collect();
    let (first, second) = (loads.first()?, loads.last()?);
    let of = |one: &Requirement| Some((one.quantity.at_length()?.get(), one.limits.nominal?));
    let ((long, low), (short, high)) = (of(first)?, of(second)?);
    if loads.len() < 2 || high <= low {
        return None;
    }
    let slack = |one: &Requirement| one.limits.half_width().unwrap_or(0.0);
    let softness = (long - short) / (high - low);
    let implied = long + low * softness;
    // Both loads at the ends of their tolerances that turn the line most, worst case.
    let lever = (implied - long) / (long - short);
    let turned = softness * (slack(first) * (1.0 + lever) + slack(second) * lever);
    let drawn = drawing.theory.free.get();
    let tolerance: f64 = drawing
        .members
        .iter()
        .map(|member| member.free.tolerance)
        .sum();
    let allowed = (tolerance + turned).max(FREE * drawn);
    if (implied - drawn).abs() <= allowed {
        return None;
    }
    Some(DrawingFinding::FreeLengthNotFromLoads {
        drawn: drawing.theory.free,
        implied: implied.try_into().ok()?,
    })
}

/// Required sizes whose limits leave out the drawn one.
fn not_as_drawn(drawing: &Drawing) -> Vec<DrawingFinding> {
    let mut sizes = vec![(Quantity::FreeLength, drawing.theory.free.get())];
    if let [member] = drawing.members.as_slice() {
        let (wire, coil) = (member.wire.nominal, member.mean_coil());
        sizes.extend([
            (Quantity::OutsideDiameter, coil + wire),
            (Quantity::InsideDiameter, coil - wire),
            (Quantity::WireDiameter, wire),
        ]);
    }
    let outside = |(quantity, drawn): (Quantity, f64)| {
        let limits = required(drawing, quantity)?.limits;
        let outside = limits.lower.is_some_and(|lower| drawn < lower - ROUNDING)
            || limits.upper.is_some_and(|upper| drawn > upper + ROUNDING);
        if !outside {
            return None;
        }
        Some(DrawingFinding::SizeNotAsDrawn {
            name: quantity.name().to_owned(),
            drawn: drawn.try_into().ok()?,
        })
    };
    sizes.into_iter().filter_map(outside).collect()
}

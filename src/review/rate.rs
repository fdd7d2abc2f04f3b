//! Does the rate follow from the geometry?

use crate::drawing::{Drawing, Limits, Stage};
use crate::quantity::Quantity;

use super::finding::{Basis, DrawingFinding};
use super::readings::{fitting, needed};

/// How many standard uncertainties of theory a stated rate may be off.
const COVERAGE: f64 = 2.0;

/// A rate the drawing asks for: stated, or given by its loads.
#[derive(Clone, Copy, Debug)]
struct Asked {
    basis: Basis,
    /// Counted from 0.
    stage: usize,
    /// The smallest and largest value that would do, N/mm: the nominal one twice, or the limits.
    between: (f64, f64),
}

/// Rates that do not follow.
pub(super) fn findings(drawing: &Drawing) -> Vec<DrawingFinding> {
    asked(drawing)
        .into_iter()
        .filter_map(|asked| {
            let stage = drawing.theory.stages.get(asked.stage)?;
            not_from_geometry(drawing, asked, stage)
        })
        .collect()
}

fn asked(drawing: &Drawing) -> Vec<Asked> {
    let stated = |quantity: Quantity, stage: usize| {
        let found = drawing
            .requirements
            .iter()
            .find(|one| one.quantity == quantity)?;
        Some(Asked {
            basis: Basis::Stated,
            stage,
            between: between(&found.limits),
        })
    };
    let stages = drawing.theory.stages.len();
    let of_stage: Vec<Asked> = (1..=stages)
        .filter_map(|stage| {
            let number = u8::try_from(stage).ok()?;
            stated(Quantity::RateOf(number), stage - 1)
        })
        .collect();
    if !of_stage.is_empty() || stages > 1 {
        return of_stage;
    }
    if let Some(found) = stated(Quantity::Rate, 0) {
        return vec![found];
    }
    from_loads(drawing).into_iter().collect()
}

/// The nominal value, or the limits.
fn between(limits: &Limits) -> (f64, f64) {
    match limits.nominal {
        Some(nominal) => (nominal, nominal),
        None => (
            limits.lower.unwrap_or(f64::NEG_INFINITY),
            limits.upper.unwrap_or(f64::INFINITY),
        ),
    }
}

/// The rate that two nominal loads ask for, else one load and the free length.
fn from_loads(drawing: &Drawing) -> Option<Asked> {
    let loads = nominal_loads(drawing);
    let (basis, rate) = match (loads.first(), loads.last()) {
        (Some((long, low)), Some((short, high))) if loads.len() > 1 => {
            (Basis::TwoLoads, (high - low) / (long - short))
        }
        (Some((length, load)), _) => (
            Basis::LoadAndFreeLength,
            load / (drawing.theory.free.get() - length),
        ),
        _ => return None,
    };
    rate.is_finite().then_some(Asked {
        basis,
        stage: 0,
        between: (rate, rate),
    })
}

/// Required loads with a nominal value: length (mm) and load (N), from the longest length down.
pub(super) fn nominal_loads(drawing: &Drawing) -> Vec<(f64, f64)> {
    let of = |one: &crate::drawing::Requirement| {
        Some((one.quantity.at_length()?.get(), one.limits.nominal?))
    };
    drawing.requirements.iter().filter_map(of).collect()
}

fn not_from_geometry(drawing: &Drawing, asked: Asked, stage: &Stage) -> Option<DrawingFinding> {
    let theory = stage.rate.get();
    let (low, high) = asked.between;
    let stated = theory.clamp(low.min(high), high.max(low));
    let expanded = COVERAGE * stage.spread.standard;
    if (stated - theory).abs() <= expanded {
        return None;
    }
    let set = &drawing.theory;
    let alone = set.stages.len() == 1;
    Some(DrawingFinding::RateNotFromGeometry {
        basis: asked.basis,
        stage: u32::try_from(asked.stage + 1).ok()?,
        stated: stated.try_into().ok()?,
        theory: stage.rate,
        expanded_uncertainty: expanded.try_into().ok()?,
        readings: if alone {
            fitting(&drawing.members, set, stated)
        } else {
            Vec::new()
        },
        needed: needed(&drawing.members, set, stated).filter(|_| stated > 0.0),
    })
}

//! Can the spring be tested as the drawing asks: test lengths, the window, the solid length?

use crate::curve::{WindowOf, nominal_rate, window_of};
use crate::drawing::{Arrangement, Drawing};
use crate::formula::{Forming, smallest_gaps, solid_length};
use crate::quantity::Quantity;

use super::finding::DrawingFinding;

/// The stretch of the deflection in which a rate is measured: SMI practice and JIS B 2704-1.
const USUAL: (f64, f64) = (0.2, 0.8);
/// A share this far past the bound is rounding.
const ROUNDING: f64 = 1e-6;
/// A coil more or less by the way the ends are ground, in coils.
const GROUND: f64 = 0.25;

/// What is wrong with the lengths.
pub(super) fn findings(drawing: &Drawing) -> Vec<DrawingFinding> {
    let smallest_mm = drawing.theory.smallest;
    let mut found: Vec<DrawingFinding> = drawing
        .requirements
        .iter()
        .filter_map(|one| one.quantity.at_length())
        .filter(|at| *at < smallest_mm)
        .map(|at_length_mm| DrawingFinding::LengthBelowSmallest {
            at_length_mm,
            smallest_mm,
        })
        .collect();
    found.extend(service(drawing));
    found.extend(window(drawing));
    found.extend(solid(drawing));
    found
}

/// Under dynamic load the gaps must be 1.5 times as large (coiled hot: twice; EN 13906-1:2013).
fn service(drawing: &Drawing) -> Option<DrawingFinding> {
    let (_, upper) = drawing.service.load?;
    if drawing.theory.arrangement == Arrangement::Stacked {
        return None;
    }
    let length = drawing.theory.length_at(upper);
    let smallest = drawing
        .members
        .iter()
        .map(|member| {
            let (d, n) = (member.wire.nominal, member.active.nominal);
            let gaps = smallest_gaps(member.forming, d, member.mean_coil(), n);
            let times = match member.forming {
                Forming::Cold => 1.5,
                Forming::Hot => 2.0,
            };
            solid_length(member.ends, member.forming, member.total, d) + times * gaps
        })
        .fold(0.0, f64::max);
    if length >= smallest {
        return None;
    }
    Some(DrawingFinding::ServiceBelowSmallest {
        at_length_mm: length.try_into().ok()?,
        smallest_mm: smallest.try_into().ok()?,
    })
}

fn window(drawing: &Drawing) -> Option<DrawingFinding> {
    let asked = |one: &crate::drawing::Requirement| one.quantity == Quantity::Rate;
    if drawing.theory.stages.len() > 1 && !drawing.requirements.iter().any(asked) {
        return None; // the stages have windows of their own
    }
    let bounds = window_of(drawing);
    let (free, smallest) = (drawing.theory.free.get(), drawing.theory.smallest.get());
    let deflection = |bound: f64| match bounds.of {
        WindowOf::Load if drawing.theory.stages.len() > 1 => free - drawing.theory.length_at(bound),
        WindowOf::Load => bound / nominal_rate(drawing),
        WindowOf::Length => free - bound,
        WindowOf::Deflection | WindowOf::Travel => bound,
    };
    let share = |bound: f64| deflection(bound) / (free - smallest);
    let (from, to) = (share(bounds.from), share(bounds.to));
    if from >= USUAL.0 - ROUNDING && to <= USUAL.1 + ROUNDING {
        return None;
    }
    Some(DrawingFinding::WindowOutside {
        from: from.try_into().ok()?,
        to: to.try_into().ok()?,
    })
}

/// The coils of the thinnest wire, a quarter of a coil ground away, by the convention that counts fewest.
fn solid(drawing: &Drawing) -> Option<DrawingFinding> {
    let required = drawing
        .requirements
        .iter()
        .find(|one| one.quantity == Quantity::SolidLength)?;
    let maximum = required.limits.upper?;
    let least = |member: &crate::drawing::Member| {
        let wire = member.wire.nominal - member.wire.tolerance;
        let by_en = solid_length(member.ends, member.forming, member.total, wire);
        // Textbooks and JIS count (nt + 1)·d where EN 13906-1 has (nt + 1.5)·d.
        let not_ground = if member.ends.ground() {
            0.0
        } else {
            0.5 * wire
        };
        by_en - not_ground - GROUND * wire
    };
    let all = drawing.members.iter().map(least);
    let least = match drawing.theory.arrangement {
        Arrangement::Stacked => all.sum(),
        Arrangement::Single | Arrangement::Nested => all.fold(0.0, f64::max),
    };
    if maximum >= least {
        return None;
    }
    Some(DrawingFinding::SolidLengthTooShort {
        maximum: maximum.try_into().ok()?,
        least: least.try_into().ok()?,
    })
}

//! Where the drawing does not agree with itself.

use crate::curve::nominal_rate;
use crate::drawing::{Drawing, Requirement};
use crate::quantity::Quantity;
use crate::record::Caution;

/// A limit farther than this from nominal is wide, relative.
const WIDE: f64 = 0.3;
/// A load without a tolerance of its own disagrees with rate and length from here on, relative.
const LOAD: f64 = 0.1;

/// Every caution of the drawing.
pub(super) fn of_drawing(drawing: &Drawing) -> Vec<Caution> {
    let mut found = Vec::new();
    let theory = &drawing.theory;
    let stated = drawing
        .requirements
        .iter()
        .find(|one| one.quantity == Quantity::Rate)
        .and_then(|one| one.limits.nominal);
    let expanded = 2.0 * theory.standard_uncertainty;
    if let Some(stated) = stated
        && (stated - theory.rate.get()).abs() > expanded
        && let (Ok(stated), Ok(expanded_uncertainty)) = (stated.try_into(), expanded.try_into())
    {
        found.push(Caution::RateNotFromGeometry {
            stated,
            theory: theory.rate,
            expanded_uncertainty,
        });
    }
    for at_length_mm in drawing
        .requirements
        .iter()
        .filter_map(|one| one.quantity.at_length())
    {
        if at_length_mm < theory.smallest {
            found.push(Caution::LengthBelowSmallest {
                at_length_mm,
                smallest_mm: theory.smallest,
            });
        }
    }
    found.extend(drawing.requirements.iter().filter_map(wide));
    found.extend(
        drawing
            .requirements
            .iter()
            .filter_map(|one| load_not_from_rate(drawing, one)),
    );
    found.extend(free_not_as_drawn(drawing));
    let required = |quantity: Quantity| {
        drawing
            .requirements
            .iter()
            .any(|one| one.quantity == quantity)
    };
    let toleranced = drawing
        .members
        .iter()
        .any(|member| member.free.tolerance > 0.0);
    if toleranced && !required(Quantity::FreeLength) {
        found.push(Caution::GeometryNotJudged {
            what: Quantity::FreeLength.title().to_owned(),
        });
    }
    found
}

fn wide(requirement: &Requirement) -> Option<Caution> {
    let nominal = requirement.limits.nominal?.abs();
    let wide = requirement.limits.half_width()? > WIDE * nominal;
    let quantity = requirement.quantity;
    wide.then(|| Caution::LimitsWide {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
    })
}

/// A nominal load that lies farther from nominal rate times deflection than its own limits allow.
fn load_not_from_rate(drawing: &Drawing, requirement: &Requirement) -> Option<Caution> {
    let at_length_mm = requirement.quantity.at_length()?;
    let stated = requirement.limits.nominal?;
    let deflection = drawing.members.first()?.free.nominal - at_length_mm.get();
    let expected = nominal_rate(drawing) * deflection;
    let allowed = requirement
        .limits
        .half_width()
        .unwrap_or(0.0)
        .max(LOAD * expected);
    if (stated - expected).abs() <= allowed {
        return None;
    }
    Some(Caution::LoadNotFromRate {
        at_length_mm,
        stated: stated.try_into().ok()?,
        expected: expected.try_into().ok()?,
    })
}

fn free_not_as_drawn(drawing: &Drawing) -> Option<Caution> {
    let required = drawing
        .requirements
        .iter()
        .find(|one| one.quantity == Quantity::FreeLength)?;
    let drawn = drawing.members.first()?.free.nominal;
    let outside = required.limits.lower.is_some_and(|lower| drawn < lower)
        || required.limits.upper.is_some_and(|upper| drawn > upper);
    if outside {
        Some(Caution::FreeLengthNotAsDrawn {
            drawn: drawn.try_into().ok()?,
        })
    } else {
        None
    }
}

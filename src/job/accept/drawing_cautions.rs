//! What page one must say of the drawing: where it does not agree with itself, and what looks like a slip.

use crate::drawing::{Drawing, Requirement};
use crate::quantity::Quantity;
use crate::record::Caution;
use crate::review::{Weight, review};

/// A limit farther than this from nominal is wide, relative.
const WIDE: f64 = 0.3;

/// Every caution of the drawing: its contradictions as `expect` finds them, then what may be a slip of the pen.
pub(super) fn of_drawing(drawing: &Drawing) -> Vec<Caution> {
    let contradictions = review(drawing)
        .findings
        .into_iter()
        .filter(|finding| finding.weight() == Weight::Contradicts);
    let mut found: Vec<Caution> = contradictions
        .map(|finding| Caution::Drawing { finding })
        .collect();
    found.extend(drawing.requirements.iter().filter_map(wide));
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

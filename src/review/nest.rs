//! Springs in one another: clearance with growth under load, hands, which goes solid first.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drawing::{Arrangement, Coil, Drawing, Member, MemberTheory};
use crate::formula::{growth_held, growth_turning, pitch};
use crate::units::Millimetres;

use super::finding::DrawingFinding;

/// The room between two neighbours of a nest, radially.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Clearance {
    /// Outer member.
    pub outer: String,
    /// Inner member.
    pub inner: String,
    /// At no load, nominal sizes.
    pub free_mm: Millimetres,
    /// With the inner one grown as at solid, the outer one not grown.
    pub loaded_mm: Millimetres,
    /// The same with the tolerances of both diameters and wires used up.
    pub least_mm: Millimetres,
}

type Drawn<'a> = (&'a Member, &'a MemberTheory);

/// The members from the outside in.
fn from_outside(drawing: &Drawing) -> Vec<Drawn<'_>> {
    if drawing.theory.arrangement != Arrangement::Nested {
        return Vec::new();
    }
    let mut order: Vec<Drawn<'_>> = drawing
        .members
        .iter()
        .zip(&drawing.theory.members)
        .collect();
    order.sort_by(|a, b| b.1.coil.get().total_cmp(&a.1.coil.get()));
    order
}

/// Clearances between neighbours, from the outside in.
pub(super) fn clearances(drawing: &Drawing) -> Vec<Clearance> {
    from_outside(drawing)
        .windows(2)
        .filter_map(|pair| match pair {
            [outer, inner] => clearance(*outer, *inner),
            _ => None,
        })
        .collect()
}

fn clearance(outer: Drawn<'_>, inner: Drawn<'_>) -> Option<Clearance> {
    let free =
        (outer.1.coil.get() - outer.0.wire.nominal) - (inner.1.coil.get() + inner.0.wire.nominal);
    let loaded = free - growth(inner);
    let used = tolerance(outer.0, true) + tolerance(inner.0, false);
    let radial = |across: f64| Millimetres::try_from(across / 2.0).ok();
    Some(Clearance {
        outer: outer.0.name.clone(),
        inner: inner.0.name.clone(),
        free_mm: radial(free)?,
        loaded_mm: radial(loaded)?,
        least_mm: radial(loaded - used)?,
    })
}

/// Growth of the outside diameter at solid, mm: the larger of ends held and ends turning, never a shrinking.
fn growth((member, theory): Drawn<'_>) -> f64 {
    let (d, coil) = (member.wire.nominal, theory.coil.get());
    let pitch = pitch(member.ends, member.free.nominal, d, member.active.nominal);
    let held = growth_held(d, coil, pitch) - (coil + d);
    held.max(growth_turning(d, coil, pitch)).max(0.0)
}

/// Half-width of the inside (or outside) diameter as the drawn diameter and the wire leave it, mm.
fn tolerance(member: &Member, inside: bool) -> f64 {
    let wires = match (member.coil, inside) {
        (Coil::Inside(_), true) | (Coil::Outside(_), false) => 0.0,
        (Coil::Mean(_), _) => 1.0,
        (Coil::Outside(_), true) | (Coil::Inside(_), false) => 2.0,
    };
    member.coil.sized().tolerance + wires * member.wire.tolerance
}

/// What is wrong with a nest.
pub(super) fn findings(drawing: &Drawing, clearances: &[Clearance]) -> Vec<DrawingFinding> {
    let mut found: Vec<DrawingFinding> = clearances
        .iter()
        .filter(|one| one.least_mm.get() <= 0.0)
        .map(|one| DrawingFinding::NestTouches {
            outer: one.outer.clone(),
            inner: one.inner.clone(),
            clearance_mm: one.loaded_mm,
            least_mm: one.least_mm,
        })
        .collect();
    let order = from_outside(drawing);
    for pair in order.windows(2) {
        let [(outer, _), (inner, _)] = pair else {
            continue;
        };
        let (outer_name, inner_name) = (outer.name.clone(), inner.name.clone());
        match (outer.hand, inner.hand) {
            (Some(a), Some(b)) if a == b => found.push(DrawingFinding::SameHand {
                outer: outer_name,
                inner: inner_name,
            }),
            (Some(_), Some(_)) => {}
            _ => found.push(DrawingFinding::HandNotStated {
                outer: outer_name,
                inner: inner_name,
            }),
        }
    }
    found
}

/// The members in the order in which they would go solid: in a nest the longest at solid first, in a stack the one that
/// needs the least load.
pub(super) fn solid_order(drawing: &Drawing) -> Vec<String> {
    let theory = &drawing.theory;
    let key = |one: &MemberTheory| match theory.arrangement {
        Arrangement::Stacked => one.rate.get() * (one.free.get() - one.solid.get()),
        Arrangement::Single | Arrangement::Nested => -one.solid.get(),
    };
    let mut order: Vec<Drawn<'_>> = drawing.members.iter().zip(&theory.members).collect();
    order.sort_by(|a, b| key(a.1).total_cmp(&key(b.1)));
    order
        .into_iter()
        .map(|(member, _)| member.name.clone())
        .collect()
}

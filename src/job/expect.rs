//! `expect`: what the drawn spring should do, before anything is measured.

use std::path::Path;

use serde::Serialize;

use crate::curve::{full_load, window_of};
use crate::drawing::{self, Drawing};
use crate::quantity::Quantity;
use crate::record::{MemberFacts, TheoryFacts, WindowFacts};
use crate::units::{Millimetres, Newtons, NewtonsPerMillimetre};

use super::facts;

/// Where theory is asked besides the drawing's test lengths.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ask {
    /// The drawing's own test lengths.
    Drawing,
    /// At this load.
    Load(Newtons),
    /// At this length.
    Length(Millimetres),
}

/// One member's answer at the deflection asked for.
#[derive(Clone, Debug, Serialize)]
pub struct MemberAnswer {
    /// Its name.
    pub name: String,
    /// Index w.
    pub index: f64,
    /// Its rate.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Its load there.
    pub load_n: Option<Newtons>,
    /// Its stresses there, MPa.
    pub stress_mpa: Option<StressAnswer>,
    /// Lc.
    pub solid_length_mm: Millimetres,
    /// Ln.
    pub smallest_length_mm: Millimetres,
}

/// Stresses in MPa; theory.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct StressAnswer {
    /// 8FD/(πd³).
    pub uncorrected: f64,
    /// Direct shear.
    pub r#static: f64,
    /// EN 13906-1.
    pub dynamic: f64,
    /// Wahl.
    pub wahl: f64,
}

/// What `expect --json` prints, with the whole theory behind it.
#[derive(Clone, Debug, Serialize)]
pub struct Expected {
    /// Drawing number.
    pub drawing: String,
    /// Rate of the set.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Deflection asked for.
    pub deflection_mm: Option<Millimetres>,
    /// The members there.
    pub members: Vec<MemberAnswer>,
    /// Whether the stated rate follows from the geometry within theory's uncertainty; absent without a stated rate.
    pub stated_rate_n_per_mm: Option<NewtonsPerMillimetre>,
    /// The same as a yes or no.
    pub agrees: bool,
    /// The whole theory.
    pub theory: TheoryFacts,
    /// The window of the rate.
    pub window: WindowFacts,
}

/// Computes the theory of the drawing at `path`.
///
/// # Errors
/// A report where the drawing cannot be used or a load or length lies outside its travel.
pub fn expect(path: &Path, as_written: &str, ask: Ask) -> miette::Result<Expected> {
    let drawing = drawing::open(path, as_written)?;
    let deflection = deflection(&drawing, ask)?;
    let theory = facts::theory(&drawing, full_load(&drawing))?;
    let stated = drawing
        .requirements
        .iter()
        .find(|one| one.quantity == Quantity::Rate)
        .and_then(|one| one.limits.nominal);
    let agrees = stated.is_none_or(|stated| {
        (stated - drawing.theory.rate.get()).abs() <= 2.0 * drawing.theory.standard_uncertainty
    });
    Ok(Expected {
        drawing: drawing.number.clone(),
        rate_n_per_mm: drawing.theory.rate,
        deflection_mm: deflection,
        members: members(&drawing, deflection, &theory.members),
        stated_rate_n_per_mm: stated.and_then(|stated| stated.try_into().ok()),
        agrees,
        window: facts::window(&drawing, window_of(&drawing)),
        theory,
    })
}

fn deflection(drawing: &Drawing, ask: Ask) -> miette::Result<Option<Millimetres>> {
    let free = drawing
        .members
        .first()
        .map_or(0.0, |member| member.free.nominal);
    let solid = drawing.theory.solid.get();
    let asked = match ask {
        Ask::Drawing => return Ok(None),
        Ask::Load(load) => load.get() / drawing.theory.rate.get(),
        Ask::Length(length) => free - length.get(),
    };
    if !(0.0..=free - solid).contains(&asked) {
        return Err(miette::miette!(
            code = "coilassay::expect::outside",
            help = "ask for a load or a length between free and solid",
            "the deflection there would be {asked:.3} mm; the drawn spring has 0 to {:.3} mm",
            free - solid
        ));
    }
    Ok(Millimetres::try_from(asked).ok())
}

fn members(
    drawing: &Drawing,
    deflection: Option<Millimetres>,
    facts: &[MemberFacts],
) -> Vec<MemberAnswer> {
    let mut answers = Vec::new();
    for (drawn, (theory, fact)) in drawing
        .members
        .iter()
        .zip(drawing.theory.members.iter().zip(facts))
    {
        let load = deflection.and_then(|deflection| theory.rate.times(deflection));
        let stress = load
            .and_then(|load| crate::drawing::stress(load, drawn.wire.nominal, theory.coil.get()));
        answers.push(MemberAnswer {
            name: fact.name.clone(),
            index: theory.index,
            rate_n_per_mm: theory.rate,
            load_n: load,
            stress_mpa: stress.map(|stress| StressAnswer {
                uncorrected: stress.uncorrected.get(),
                r#static: stress.with_static.get(),
                dynamic: stress.with_dynamic.get(),
                wahl: stress.with_wahl.get(),
            }),
            solid_length_mm: theory.solid,
            smallest_length_mm: theory.smallest,
        });
    }
    answers
}

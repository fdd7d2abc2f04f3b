//! Index, buckling, natural frequency, growth, energy and mass of each spring.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drawing::{Drawing, Member, MemberTheory};
use crate::formula::{
    Buckling, Ends, Forming, Seating, buckling, energy, growth_held, growth_turning, mass,
    natural_frequency, pitch,
};
use crate::units::{Finite, Millimetres};

use super::finding::DrawingFinding;

/// Indices that standards cover: EN 13906-1 and EN 15800.
const INDEX: (f64, f64) = (4.0, 20.0);
/// The natural frequency should exceed this many times the one a spring is driven at: Shigley's, 15 to 20 (from memory).
const APART: f64 = 15.0;
/// More than this between the drawn and the usual number of dead coils is worth a word, in coils.
const COILS: f64 = 0.5;

/// Whether a spring buckles.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "buckles", rename_all = "snake_case")]
pub enum SpringBuckling {
    /// It is guided.
    Guided,
    /// At no deflection.
    Never,
    /// From this deflection on.
    From {
        /// Its own deflection.
        deflection_mm: Millimetres,
    },
    /// No modulus of elasticity is tabled.
    Unknown,
}

/// What one spring is like, beside rate and stress.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Outlook {
    /// Its name.
    pub member: String,
    /// L0/D.
    pub slenderness: Finite,
    /// Pitch at no load.
    pub pitch_mm: Millimetres,
    /// Buckling.
    pub buckling: SpringBuckling,
    /// The seating taken for it.
    pub seating: String,
    /// Whether the drawing states the seating.
    pub seating_stated: bool,
    /// Lowest natural frequency, Hz, both ends held.
    pub natural_frequency_hz: Option<Finite>,
    /// Growth of the outside diameter at solid, ends held.
    pub growth_held_mm: Millimetres,
    /// The same, ends free to turn.
    pub growth_turning_mm: Millimetres,
    /// Energy stored at Ln of the set, N·mm.
    pub energy_n_mm: Finite,
    /// Mass of the wire, g.
    pub mass_g: Option<Finite>,
    /// Clash allowance: what is left to solid at the shortest test length (Ln without one), as a share of the deflection to solid.
    pub clash_allowance: Finite,
}

/// One outlook for each member.
pub(super) fn all(drawing: &Drawing) -> Vec<Outlook> {
    let members = drawing.members.iter().zip(&drawing.theory.members);
    members
        .filter_map(|(member, theory)| one(drawing, member, theory))
        .collect()
}

/// The shortest test length, or Ln.
pub(super) fn shortest(drawing: &Drawing) -> f64 {
    drawing
        .requirements
        .iter()
        .filter_map(|one| one.quantity.at_length())
        .map(Millimetres::get)
        .reduce(f64::min)
        .unwrap_or(drawing.theory.smallest.get())
}

fn one(drawing: &Drawing, member: &Member, theory: &MemberTheory) -> Option<Outlook> {
    let (d, coil, n) = (
        member.wire.nominal,
        theory.coil.get(),
        member.active.nominal,
    );
    let (free, material) = (member.free.nominal, &member.material);
    let seating = drawing.service.seating;
    let taken = seating.unwrap_or(Seating::Flat);
    let pitch = pitch(member.ends, free, d, n);
    let set = &drawing.theory;
    let (s, load) = set.member_at(theory, set.smallest.get());
    let (at_shortest, _) = set.member_at(theory, shortest(drawing));
    let to_solid = free - theory.solid.get();
    let held = growth_held(d, coil, pitch) - (coil + d);
    let frequency = material
        .density
        .map(|density| natural_frequency(d, coil, n, material.shear, density));
    let wire = material
        .density
        .map(|density| mass(d, coil, member.total, density));
    let finite = |value: Option<f64>| value.and_then(|value| Finite::try_from(value).ok());
    Some(Outlook {
        member: member.name.clone(),
        slenderness: (free / coil).try_into().ok()?,
        pitch_mm: pitch.try_into().ok()?,
        buckling: buckles(member, theory, taken),
        seating: taken.word().to_owned(),
        seating_stated: seating.is_some(),
        natural_frequency_hz: finite(frequency),
        growth_held_mm: held.try_into().ok()?,
        growth_turning_mm: growth_turning(d, coil, pitch).try_into().ok()?,
        energy_n_mm: energy(load, s).try_into().ok()?,
        mass_g: finite(wire),
        clash_allowance: ((to_solid - at_shortest) / to_solid).try_into().ok()?,
    })
}

fn buckles(member: &Member, theory: &MemberTheory, seating: Seating) -> SpringBuckling {
    let Some(coefficient) = seating.coefficient() else {
        return SpringBuckling::Guided;
    };
    let material = &member.material;
    let Some(young) = material.young else {
        return SpringBuckling::Unknown;
    };
    let free = member.free.nominal;
    match buckling(free, theory.coil.get(), material.shear, young, coefficient) {
        Buckling::Never => SpringBuckling::Never,
        Buckling::From(deflection) => deflection
            .try_into()
            .map_or(SpringBuckling::Unknown, |deflection_mm| {
                SpringBuckling::From { deflection_mm }
            }),
    }
}

/// What is unusual about the members.
pub(super) fn findings(drawing: &Drawing, outlooks: &[Outlook]) -> Vec<DrawingFinding> {
    let mut found = Vec::new();
    let members = drawing.members.iter().zip(&drawing.theory.members);
    for ((member, theory), outlook) in members.zip(outlooks) {
        found.extend(coils(member));
        found.extend(index(member, theory));
        found.extend(buckling_on_the_way(drawing, theory, outlook));
        found.extend(frequency(drawing, outlook));
    }
    found
}

fn coils(member: &Member) -> Option<DrawingFinding> {
    let drawn = member.total - member.active.nominal;
    let usual = member.ends.dead_coils(member.forming);
    // Closed ends are made with one and a half to two and a half dead coils; open ones have none to spare.
    let off = (drawn - usual).abs() > COILS + 1e-9;
    let closed = matches!(member.ends, Ends::Closed | Ends::ClosedGround);
    if !off || (closed && member.forming == Forming::Hot && (drawn - 2.0).abs() <= COILS) {
        return None;
    }
    Some(DrawingFinding::CoilsNotFromEnds {
        member: member.name.clone(),
        drawn: drawn.try_into().ok()?,
        usual: usual.try_into().ok()?,
    })
}

fn index(member: &Member, theory: &MemberTheory) -> Option<DrawingFinding> {
    if (INDEX.0..=INDEX.1).contains(&theory.index) {
        return None;
    }
    Some(DrawingFinding::IndexUnusual {
        member: member.name.clone(),
        index: theory.index.try_into().ok()?,
    })
}

fn buckling_on_the_way(
    drawing: &Drawing,
    theory: &MemberTheory,
    outlook: &Outlook,
) -> Option<DrawingFinding> {
    let SpringBuckling::From { deflection_mm } = outlook.buckling else {
        return None;
    };
    let (wanted, _) = drawing.theory.member_at(theory, shortest(drawing));
    if deflection_mm.get() > wanted {
        return None;
    }
    Some(DrawingFinding::Buckles {
        member: outlook.member.clone(),
        deflection_mm,
        wanted_mm: wanted.try_into().ok()?,
        seating: outlook.seating.clone(),
        stated: outlook.seating_stated,
    })
}

fn frequency(drawing: &Drawing, outlook: &Outlook) -> Option<DrawingFinding> {
    let driven = drawing.service.frequency?;
    let natural_hz = outlook.natural_frequency_hz?;
    if natural_hz.get() >= APART * driven {
        return None;
    }
    Some(DrawingFinding::FrequencyNear {
        member: outlook.member.clone(),
        natural_hz,
        driven_hz: driven.try_into().ok()?,
    })
}

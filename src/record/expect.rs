//! The result of `expect`: what the drawn springs should do, and whether the drawing agrees with itself.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::accept::{Kind, OutputFile, Provenance};
use super::facts::{TheoryFacts, WindowFacts};
use crate::quantity::{Class, Unit};
use crate::review::{Clearance, DrawingFinding, Fatigue, Outlook, StrengthGap, StrengthLine};
use crate::units::{Finite, Megapascals, Millimetres, Newtons, NewtonsPerMillimetre};

/// Stresses in MPa; theory.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StressAnswer {
    /// 8FD/(πd³).
    pub uncorrected: Megapascals,
    /// Direct shear.
    pub r#static: Megapascals,
    /// EN 13906-1.
    pub dynamic: Megapascals,
    /// Wahl.
    pub wahl: Megapascals,
}

/// One member at the deflection asked for.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct MemberAnswer {
    /// Its name.
    pub name: String,
    /// Index w.
    pub index: Finite,
    /// Its rate.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Its load there.
    pub load_n: Option<Newtons>,
    /// Its share of the load of the set there, 0 … 1.
    pub load_share: Option<Finite>,
    /// Its stresses there, MPa.
    pub stress_mpa: Option<StressAnswer>,
    /// Lc.
    pub solid_length_mm: Millimetres,
    /// Ln.
    pub smallest_length_mm: Millimetres,
}

/// A stretch of lengths over which the same members carry.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StageFacts {
    /// Length at which it begins: the free length, or a knee.
    pub from_length_mm: Millimetres,
    /// Load there.
    pub from_load_n: Newtons,
    /// Rate.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Standard uncertainty of it from the drawing's tolerances.
    pub rate_standard_uncertainty: NewtonsPerMillimetre,
    /// Worst case: lowest rate.
    pub rate_lowest: NewtonsPerMillimetre,
    /// Highest rate.
    pub rate_highest: NewtonsPerMillimetre,
}

/// What the drawing says of service, and the rate at its temperature.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ServiceFacts {
    /// Lower and upper service load.
    pub load_n: Option<(Newtons, Newtons)>,
    /// Lengths at them, theory.
    pub length_mm: Option<(Millimetres, Millimetres)>,
    /// Temperature, °C.
    pub temperature_c: Option<Finite>,
    /// Rate there, G by the coefficient of temperature used.
    pub rate_at_temperature: Option<NewtonsPerMillimetre>,
    /// Rate there by the other source's coefficient; `null` where there is only one.
    pub rate_at_temperature_other: Option<NewtonsPerMillimetre>,
    /// Frequency at which it is driven, Hz.
    pub frequency_hz: Option<Finite>,
}

/// One requirement of the drawing beside what theory expects.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ExpectedRequirement {
    /// The quantity's name.
    pub name: String,
    /// The length a load is asked at.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Nominal value.
    pub nominal: Option<Finite>,
    /// Lower limit.
    pub lower: Option<Finite>,
    /// Upper limit.
    pub upper: Option<Finite>,
    /// How grave a departure is.
    pub class: Class,
    /// The standard the limits come from, and what of it was read from memory; `null` where the drawing states them.
    pub standard: Option<String>,
    /// What theory expects.
    pub theory: Option<Finite>,
}

/// The result of `expect`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Expected {
    /// Version of this layout.
    pub format: u32,
    /// `expect`.
    pub kind: Kind,
    /// Drawing number.
    pub drawing: String,
    /// Revision.
    pub revision: Option<String>,
    /// Title.
    pub title: Option<String>,
    /// Whether nothing contradicts.
    pub agrees: bool,
    /// What does not agree, contradictions first, then remarks.
    pub findings: Vec<DrawingFinding>,
    /// Rate of the set where all members carry.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Deflection of the set asked for.
    pub deflection_mm: Option<Millimetres>,
    /// The members there.
    pub members: Vec<MemberAnswer>,
    /// The stated rate.
    pub stated_rate_n_per_mm: Option<NewtonsPerMillimetre>,
    /// What the drawing requires.
    pub requirements: Vec<ExpectedRequirement>,
    /// The whole theory.
    pub theory: TheoryFacts,
    /// Half-width of the free length of the set as drawn; 0 where none is stated.
    pub free_length_tolerance_mm: Millimetres,
    /// The stages, from the free length on.
    pub stages: Vec<StageFacts>,
    /// The window of the rate.
    pub window: WindowFacts,
    /// Service.
    pub service: ServiceFacts,
    /// Stresses held against what the wire bears.
    pub strength: Vec<StrengthLine>,
    /// Where no stress can be held against anything.
    pub strength_gaps: Vec<StrengthGap>,
    /// Fatigue, for a stated load range.
    pub fatigue: Vec<Fatigue>,
    /// Buckling, frequency, growth, one for each member.
    pub outlooks: Vec<Outlook>,
    /// Radial clearances of a nest, from the outside in.
    pub clearances: Vec<Clearance>,
    /// Members in the order in which they would go solid.
    pub solid_order: Vec<String>,
    /// What other sources say of G, one for each member that has some.
    pub modulus_notes: Vec<String>,
    /// What it was made from.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

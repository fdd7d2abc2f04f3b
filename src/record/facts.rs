//! What a result says of theory, window and rig.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::curve::WindowOf;
use crate::units::{Finite, Megapascals, Millimetres, Newtons, NewtonsPerMillimetre};

/// Stresses at a load or length; theory, see the formulas in the report.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StressFacts {
    /// Where: a test length, or the solid length.
    pub at_length_mm: Millimetres,
    /// Deflection from the nominal free length.
    pub deflection_mm: Millimetres,
    /// Load of this member there.
    pub load_n: Newtons,
    /// 8FD/(πd³).
    pub uncorrected_mpa: Megapascals,
    /// With the direct-shear factor 1 + 1/(2w).
    pub static_mpa: Megapascals,
    /// With the factor (w + 0.5)/(w − 0.75) of EN 13906-1.
    pub dynamic_mpa: Megapascals,
    /// With Wahl's factor.
    pub wahl_mpa: Megapascals,
}

/// One spring of the set, in theory.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct MemberFacts {
    /// Its name.
    pub name: String,
    /// Material as written, or `stated G`.
    pub material: String,
    /// Source of G.
    pub shear_modulus_source: String,
    /// G.
    pub shear_modulus_mpa: Megapascals,
    /// Wire diameter d.
    pub wire_mm: Millimetres,
    /// Mean coil diameter D.
    pub coil_mm: Millimetres,
    /// Active coils n.
    pub active_coils: Finite,
    /// Total coils nt.
    pub total_coils: Finite,
    /// Index w = D/d.
    pub index: Finite,
    /// G·d⁴/(8·D³·n).
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Its share of the set's rate, 0 … 1.
    pub share: Finite,
    /// Solid length Lc.
    pub solid_length_mm: Millimetres,
    /// Smallest permitted test length Ln.
    pub smallest_length_mm: Millimetres,
    /// Stress at each test length and at solid.
    pub stress: Vec<StressFacts>,
}

/// What the drawn spring should do.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TheoryFacts {
    /// Rate of the whole set.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Standard uncertainty of it from the drawing's tolerances.
    pub rate_standard_uncertainty: NewtonsPerMillimetre,
    /// The worst case of the drawing's tolerances: lowest rate.
    pub rate_lowest: NewtonsPerMillimetre,
    /// Highest rate.
    pub rate_highest: NewtonsPerMillimetre,
    /// Nominal free length L0.
    pub free_length_mm: Millimetres,
    /// Solid length of the set (its longest member's).
    pub solid_length_mm: Millimetres,
    /// Smallest permitted test length of the set.
    pub smallest_length_mm: Millimetres,
    /// Fn, the load at Ln.
    pub full_load_n: Newtons,
    /// The members.
    pub members: Vec<MemberFacts>,
}

/// The window of the rate, one for the whole lot.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct WindowFacts {
    /// What the bounds are.
    pub of: WindowOf,
    /// Start, in N or mm.
    pub from: Finite,
    /// End, in N or mm.
    pub to: Finite,
    /// How the drawing says it, in words.
    pub stated: String,
    /// The stroke that is judged, in words.
    pub stroke: String,
    /// `fit` or `two-point`.
    pub method: String,
}

/// The rig, as its file states it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RigFacts {
    /// Name.
    pub name: String,
    /// What is known of the force scale, in words.
    pub force: String,
    /// Its calibration, `YYYY-MM-DD … YYYY-MM-DD`.
    pub force_calibrated: Option<String>,
    /// What is known of the travel scale.
    pub travel: String,
    /// Its calibration.
    pub travel_calibrated: Option<String>,
    /// Frame compliance, in words.
    pub compliance: String,
    /// The last passed check on a reference spring, `YYYY-MM-DD (name)`; `null` where none holds on the day.
    pub checked: Option<String>,
    /// What the export's travel means: `deflection`, `length`, `platen position`.
    pub travel_means: String,
}

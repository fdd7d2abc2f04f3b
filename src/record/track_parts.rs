//! What moved over lots: components, change points, trend, capability, groups.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drift::Culprit;
use crate::units::Finite;

/// Variance components.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ComponentFacts {
    /// Standard deviation between lots.
    pub between: Finite,
    /// Within lots: springs and measurement.
    pub within: Finite,
    /// Between springs; `null` where the measurement's is not known.
    pub springs: Option<Finite>,
    /// Of the measurement.
    pub measurement: Option<Finite>,
    /// F of the mean squares.
    pub f: Option<Finite>,
    /// Chance of such an F.
    pub p: Option<Finite>,
}

/// What the reference spring did at a change point.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ReferenceMoved {
    /// Checks before.
    pub checks_before: u32,
    /// Checks after.
    pub checks_after: u32,
    /// How far the reference moved, as a shift of the lots would look.
    pub moved: Finite,
    /// Standard uncertainty of it.
    pub standard_uncertainty: Finite,
}

/// A change point.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StepFacts {
    /// Place in `lots` of the first lot after it.
    pub at: u32,
    /// The last lot before it.
    pub lot_before: String,
    /// The first lot after it.
    pub lot_after: String,
    /// Earliest place of the first lot after it, 95 %.
    pub from: u32,
    /// Latest place.
    pub to: u32,
    /// Mean before it.
    pub before: Finite,
    /// Mean after it.
    pub after: Finite,
    /// After less before.
    pub jump: Finite,
    /// Standard uncertainty of the jump, from the scatter of the lots.
    pub standard_uncertainty: Finite,
    /// Chance of such a jump somewhere in the stretch, at most.
    pub chance: Finite,
    /// Springs or rig.
    pub culprit: Culprit,
    /// What the reference did, where it can be compared.
    pub reference: Option<ReferenceMoved>,
    /// Tags, supplier and rig that are one thing on all lots before the interval of its place and another on all lots after it, as `name: before, then after`.
    pub changed_with: Vec<String>,
}

/// The trend.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TrendFacts {
    /// Theil–Sen slope per lot.
    pub slope_per_lot: Finite,
    /// Lower end of its interval of 95 %.
    pub lower: Finite,
    /// Upper end.
    pub upper: Finite,
    /// Mann–Kendall's deviate.
    pub z: Finite,
    /// Its p.
    pub p: Finite,
    /// Whether p is below 0.05.
    pub moves: bool,
    /// When it would cross a limit; `null` where it would not.
    pub crossing: Option<CrossingFacts>,
}

/// When the trend would cross a limit, in lots from the newest.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CrossingFacts {
    /// The limit.
    pub limit: Finite,
    /// By the median slope.
    pub lots: Finite,
    /// At the earliest, 95 %.
    pub earliest: Finite,
    /// At the latest; `null` where that may never be.
    pub latest: Option<Finite>,
}

/// Capability of a stretch of lots.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct AbleFacts {
    /// Place of its first lot.
    pub from: u32,
    /// Place of its last lot.
    pub to: u32,
    /// Pp.
    pub pp: Option<Finite>,
    /// Ppk.
    pub ppk: Finite,
    /// Lower end of its interval of 95 %.
    pub lower: Finite,
    /// Upper end.
    pub upper: Finite,
}

/// Lots of one supplier, rig or tag.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct GroupFacts {
    /// Its value; `null` for lots that state none.
    pub value: Option<String>,
    /// Lots.
    pub lots: u32,
    /// Springs.
    pub springs: u64,
    /// Mean over its springs.
    pub mean: Finite,
    /// Standard deviation between its lots.
    pub between: Option<Finite>,
    /// Within them.
    pub within: Option<Finite>,
}

//! The plan of a lot, how its classes and characteristics stand, and what would settle it.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::lot::{Comparison, Decision};
use crate::quantity::{Class, Unit};
use crate::sampling::Reason;
use crate::units::{Finite, Millimetres};

/// The plan of one class.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ClassPlan {
    /// Class.
    pub class: Class,
    /// AQL in percent nonconforming; `null` where every spring is measured or a class is zero-accept.
    pub aql: Option<Finite>,
    /// Code letter from lot size and level.
    pub code_letter: Option<String>,
    /// Letter of the plan an arrow led to.
    pub used_letter: Option<String>,
    /// Springs to measure.
    pub sample_size: u64,
    /// Acceptance number Ac.
    pub accept: u64,
    /// Rejection number Re.
    pub reject: u64,
    /// Springs proven failing in this class.
    pub failing: u64,
    /// Springs undecided for a requirement of this class.
    pub undecided: u64,
    /// Probability that a lot exactly at the AQL is accepted, 0 … 1 (binomial).
    pub accepted_at_aql: Option<Finite>,
    /// Springs of the sample not measured yet.
    #[serde(default)]
    pub missing: u64,
    /// Further springs, or undecided ones settled, that must prove conforming before the class is accepted; `null` where
    /// proven failures forbid it.
    #[serde(default)]
    pub to_accept: Option<u64>,
    /// Springs that must yet prove failing before it is rejected; `null` where too few are left for that.
    #[serde(default)]
    pub to_reject: Option<u64>,
    /// What the plan says if every undecided spring conforms.
    pub if_undecided_conform: Decision,
    /// What the plan says if every undecided spring fails.
    pub if_undecided_fail: Decision,
}

/// The state of inspection.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct StateFacts {
    /// `normal`, `tightened`, `reduced`.
    pub state: String,
    /// Where the past lots stand; `null` where the drawing states the state.
    pub history: Option<String>,
    /// Past lots looked at.
    pub lots: u64,
    /// Why the switching rules give this state.
    pub reason: Option<Reason>,
}

/// A zero-accept plan.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ZeroAcceptFacts {
    /// Limiting quality, percent nonconforming.
    pub limiting_quality_percent: Finite,
    /// Consumer's risk agreed, 0 … 1.
    pub consumer_risk: Finite,
    /// Nonconforming springs in a lot of that quality.
    pub nonconforming: u64,
    /// Probability that such a lot is accepted, 0 … 1 (hypergeometric).
    pub accepted: Finite,
}

/// One characteristic under a plan by variables.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VariablesFacts {
    /// The characteristic.
    pub name: String,
    /// Length of a load.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of mean and standard deviation.
    pub unit: Unit,
    /// Class.
    pub class: Class,
    /// AQL in percent; `null` for a designed plan.
    pub aql: Option<Finite>,
    /// Code letter of MIL-STD-414.
    pub code_letter: Option<String>,
    /// Letter of the plan an arrow led to.
    pub used_letter: Option<String>,
    /// Springs the plan asks for.
    pub sample_size: u64,
    /// Springs a rejection asks for on this bench; `null` where no number is enough.
    pub raised_sample_size: Option<u64>,
    /// Springs with a value that were used.
    pub measured: u64,
    /// Mean of the sample.
    pub mean: Option<Finite>,
    /// Its standard deviation.
    pub standard_deviation: Option<Finite>,
    /// Common standard uncertainty of the mean.
    pub common_uncertainty: Option<Finite>,
    /// What is compared.
    pub compared: Option<Comparison>,
    /// As measured.
    pub found: Option<Finite>,
    /// Where the common error leans the worse way.
    pub worse: Option<Finite>,
    /// Where it leans the better way.
    pub better: Option<Finite>,
    /// k, or M as a share.
    pub wanted: Option<Finite>,
    /// What the plan says.
    pub decision: Decision,
}

/// What a re-measurement of one undecided characteristic must reach to settle it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SettlingFacts {
    /// The spring.
    pub spring: String,
    /// The characteristic.
    pub name: String,
    /// Length of a load.
    pub at_length_mm: Option<Millimetres>,
    /// Class.
    pub class: Class,
    /// Unit of the uncertainties.
    pub unit: Unit,
    /// Expanded uncertainty now.
    pub expanded_uncertainty: Option<Finite>,
    /// Largest expanded uncertainty that settles it if the value stays; `null` where the value lies on the limit or there is none.
    pub wanted_uncertainty: Option<Finite>,
    /// Share of the variance that repeating reduces (the spring's own), 0 … 1.
    pub own_share: Option<Finite>,
}

/// The sampling plan, in the terms of its source.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct PlanFacts {
    /// `attributes`, `variables`, `zero-accept` or `every-spring`.
    pub by: String,
    /// The table or the design the numbers come from.
    #[serde(default)]
    pub source: String,
    /// Inspection level.
    pub level: Option<String>,
    /// Code letter of the first class.
    pub code_letter: Option<String>,
    /// Sample size (the largest over the classes).
    pub sample_size: u64,
    /// Ac of the major class, or of the first one there is; `null` where no class is counted.
    pub accept: Option<u64>,
    /// Re of the same class.
    pub reject: Option<u64>,
    /// The plan of each class.
    pub classes: Vec<ClassPlan>,
    /// State of inspection, where the plan has one.
    #[serde(default)]
    pub state: Option<StateFacts>,
    /// Whether the lot would also have been accepted with every AQL one step tighter; `null` where the plan has none.
    #[serde(default)]
    pub accepted_tighter: Option<bool>,
    /// The zero-accept plan.
    #[serde(default)]
    pub zero_accept: Option<ZeroAcceptFacts>,
    /// The characteristics under a plan by variables.
    #[serde(default)]
    pub variables: Vec<VariablesFacts>,
    /// Where the lot is undecided: what would settle each undecided characteristic of the sample.
    #[serde(default)]
    pub settling: Vec<SettlingFacts>,
}

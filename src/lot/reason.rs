//! The words of a lot decision and its grounds.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::quantity::Class;
use crate::units::{Finite, Millimetres};

/// The decision on a lot.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Decision {
    /// The plan accepts the lot.
    Accepted,
    /// The plan rejects the lot.
    Rejected,
    /// The measurements do not settle it.
    Undecided,
}

/// What a plan by variables compares.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Comparison {
    /// Standard deviations inside the one limit, at least k.
    Distance,
    /// Estimated share outside both limits, at most M.
    Share,
}

/// Why the lot has the decision it has.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum LotReason {
    /// Proven failing springs reach the rejection number of a class.
    ProvenFailures {
        /// Class.
        class: Class,
        /// Springs proven failing.
        failing: u64,
        /// Rejection number.
        reject: u64,
    },
    /// Even all undecided springs failing, the acceptance number holds.
    WithinAcceptance {
        /// Class.
        class: Class,
        /// Springs proven failing.
        failing: u64,
        /// Springs undecided.
        undecided: u64,
        /// Acceptance number.
        accept: u64,
    },
    /// Undecided springs could turn the decision.
    UndecidedMatter {
        /// Class.
        class: Class,
        /// Springs proven failing.
        failing: u64,
        /// Springs undecided.
        undecided: u64,
        /// Acceptance number.
        accept: u64,
    },
    /// Springs without a value for a requirement cannot be counted as conforming, whatever is agreed on undecided ones.
    Unmeasured {
        /// Class.
        class: Class,
        /// Springs proven failing.
        failing: u64,
        /// Springs without a value.
        unmeasured: u64,
        /// Acceptance number.
        accept: u64,
    },
    /// Undecided springs count as conforming, as agreed.
    UndecidedPass {
        /// Class.
        class: Class,
        /// Springs undecided.
        undecided: u64,
    },
    /// Undecided springs count as failing, as agreed; this rejection proves nothing.
    UndecidedFail {
        /// Class.
        class: Class,
        /// Springs proven failing.
        failing: u64,
        /// Springs undecided.
        undecided: u64,
        /// Rejection number.
        reject: u64,
    },
    /// Fewer springs measured than the plan asks for.
    Missing {
        /// Class.
        class: Class,
        /// Springs measured.
        measured: u64,
        /// Springs the plan asks for.
        wanted: u64,
        /// Springs that must yet prove conforming before the class is accepted; `null` where proven failures forbid it.
        to_accept: Option<u64>,
        /// Springs that must yet prove failing before it is rejected; `null` where too few are left for that.
        to_reject: Option<u64>,
    },
    /// A characteristic decided by a plan by variables.
    ByVariables {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// What the plan says of it.
        decision: Decision,
        /// What was compared.
        compared: Comparison,
        /// As measured: standard deviations inside the one limit, or estimated share outside both, 0 … 1.
        found: Finite,
        /// The same where the bench's common error leans the worse way.
        worse: Finite,
        /// The same where it leans the better way.
        better: Finite,
        /// k, or M as a share.
        wanted: Finite,
    },
    /// A characteristic has too few values for its plan by variables, or for a rejection by it on this bench.
    TooFewValues {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// Springs of the sample with a value and its uncertainty.
        measured: u64,
        /// Springs the plan asks for; `null` where the bench's own scatter explains all that was seen and no number is enough.
        wanted: Option<u64>,
        /// Springs it asks for on a bench without scatter.
        plan: u64,
    },
    /// Springs proven failing, named beside a decision by variables.
    ProvenBeside {
        /// The springs.
        springs: Vec<String>,
    },
    /// Something seen counts against a spring, and the terms agree no number for that.
    FindingWithoutNumber {
        /// The spring.
        spring: String,
        /// Class.
        class: Class,
    },
    /// A spring beyond the sample is proven failing.
    FailureBeyondSample {
        /// The spring.
        spring: String,
        /// Class of the failure.
        class: Class,
    },
}

//! The words of a lot decision and its grounds.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::quantity::Class;

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
    },
    /// A spring beyond the sample is proven failing.
    FailureBeyondSample {
        /// The spring.
        spring: String,
        /// Class of the failure.
        class: Class,
    },
}

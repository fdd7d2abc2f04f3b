//! What a decision on a lot is made of.

use super::reason::{Decision, LotReason};
use super::terms::ClassTerms;

/// How one class stands.
#[derive(Clone, Debug, PartialEq)]
pub struct Standing {
    /// The terms.
    pub terms: ClassTerms,
    /// Springs of the sample proven failing, counted in their gravest class.
    pub failing: u64,
    /// Springs of the sample that may yet prove failing in this class.
    pub undecided: u64,
    /// Those of them without a value for a requirement of this class.
    pub unmeasured: u64,
    /// Springs of the sample that are not there.
    pub missing: u64,
}

/// The decision and its grounds.
#[derive(Clone, Debug, PartialEq)]
pub struct Outcome {
    /// The decision.
    pub decision: Decision,
    /// Why, class by class, gravest first.
    pub reasons: Vec<LotReason>,
    /// How each class stands.
    pub standings: Vec<Standing>,
    /// What simple acceptance would have said.
    pub simple: Decision,
    /// Springs of the sample that simple acceptance calls failing.
    pub simple_failing: u64,
}

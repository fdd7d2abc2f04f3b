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

impl Standing {
    /// What the plan says once every undecided spring here conforms, or fails; missing springs stay missing.
    pub const fn read(&self, undecided_fail: bool) -> Decision {
        let failing = if undecided_fail {
            self.failing + self.undecided
        } else {
            self.failing
        };
        if failing >= self.terms.reject {
            Decision::Rejected
        } else if failing + self.missing <= self.terms.accept {
            Decision::Accepted
        } else {
            Decision::Undecided
        }
    }

    /// Further springs, or undecided ones settled, that must prove conforming before the class is accepted; 0 where it is
    /// already, `None` where proven failures forbid it.
    pub const fn to_accept(&self) -> Option<u64> {
        if self.failing > self.terms.accept {
            return None;
        }
        Some((self.failing + self.undecided + self.missing).saturating_sub(self.terms.accept))
    }

    /// Springs that must yet prove failing before the class is rejected; `None` where too few are left for that.
    pub const fn to_reject(&self) -> Option<u64> {
        let wanted = self.terms.reject.saturating_sub(self.failing);
        if wanted > self.undecided + self.missing {
            return None;
        }
        Some(wanted)
    }
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

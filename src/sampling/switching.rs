//! Switching between normal, tightened and reduced inspection: ISO 2859-1:1999 clause 9, from a list of past lots.
//! Elsewhere: where the list comes from (`intake::history`, an archive), what is then done (`job`).

use jiff::civil::Date;
use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drawing::State;

/// What came out for a lot on original inspection.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Outcome {
    /// Accepted.
    Accepted,
    /// Rejected.
    Rejected,
    /// Left undecided: it ends a run of accepted lots and is not counted as not accepted.
    Undecided,
    /// No lot: the supplier has acted, and inspection that was discontinued begins anew, tightened.
    Resumed,
}

/// One past lot, as far as switching needs it.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct PastLot {
    /// Date of the decision.
    #[schemars(with = "String")]
    pub date: Date,
    /// Lot number.
    pub lot: String,
    /// What came out.
    pub outcome: Outcome,
    /// Ac of its plan.
    pub accept: u64,
    /// Whether it would have been accepted with the AQL one step tighter; `None` where nobody noted it.
    pub accepted_tighter: Option<bool>,
}

/// Why a state holds.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum Reason {
    /// No lot changed the state that inspection began with.
    Start,
    /// Normal and nothing to change it; the switching score so far.
    Stays {
        /// The score; 30 allows reduced inspection.
        score: u32,
    },
    /// Two of five or fewer consecutive lots were not accepted.
    TwoOfFive {
        /// Those two lots.
        lots: [String; 2],
    },
    /// Tightened, and fewer than five consecutive lots accepted since.
    StaysTightened {
        /// Consecutive lots accepted.
        accepted: u32,
        /// Lots not accepted while tightened; the fifth discontinues.
        rejected: u32,
    },
    /// Five consecutive lots were accepted under tightened inspection.
    FiveAccepted {
        /// The fifth of them.
        lot: String,
    },
    /// The score reached 30, and reduced inspection is agreed.
    Score {
        /// The lot with which it did.
        lot: String,
    },
    /// A lot under reduced inspection was not accepted.
    ReducedEnded {
        /// That lot.
        lot: String,
    },
    /// The supplier has acted after inspection was discontinued.
    Resumed {
        /// When, YYYY-MM-DD.
        date: String,
    },
    /// Five lots were not accepted while tightened: nothing is to be accepted by sampling until the supplier has acted.
    Discontinued {
        /// The fifth of them.
        lot: String,
    },
}

/// The state for the next lot, and why. The state of a discontinued inspection is tightened.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Next {
    /// The state.
    pub state: State,
    /// Why.
    pub reason: Reason,
}

/// Lots not accepted while tightened that discontinue.
const DISCONTINUE: u32 = 5;
/// Lots accepted in a row that end tightened inspection.
const RELIEVE: u32 = 5;
/// Lots that two failures must lie within.
const WITHIN: usize = 5;
/// Score that allows reduced inspection.
const SCORE: u32 = 30;

/// What has been seen since the state began.
struct Count {
    state: State,
    reason: Reason,
    /// Lots under normal inspection, newest last: not accepted or not.
    recent: Vec<(bool, String)>,
    score: u32,
    accepted: u32,
    rejected: u32,
    stopped: bool,
}

impl Count {
    fn begin(state: State, reason: Reason) -> Self {
        Self {
            state,
            reason,
            recent: Vec::new(),
            score: 0,
            accepted: 0,
            rejected: 0,
            stopped: false,
        }
    }

    fn add(self, lot: &PastLot, reduced_agreed: bool) -> Self {
        if lot.outcome == Outcome::Resumed {
            let resumed = Self::begin(
                State::Tightened,
                Reason::Resumed {
                    date: lot.date.to_string(),
                },
            );
            return if self.stopped { resumed } else { self };
        }
        match self.state {
            _ if self.stopped => self,
            State::Normal => self.normal(lot, reduced_agreed),
            State::Tightened => self.tightened(lot),
            State::Reduced => self.reduced(lot),
        }
    }

    fn normal(mut self, lot: &PastLot, reduced_agreed: bool) -> Self {
        self.recent
            .push((lot.outcome == Outcome::Rejected, lot.lot.clone()));
        if self.recent.len() > WITHIN {
            self.recent.remove(0);
        }
        let rejected: Vec<String> = self
            .recent
            .iter()
            .filter(|(rejected, _)| *rejected)
            .map(|(_, lot)| lot.clone())
            .collect();
        if let [first, second] = rejected.as_slice() {
            let lots = [first.clone(), second.clone()];
            return Self::begin(State::Tightened, Reason::TwoOfFive { lots });
        }
        self.score = match (lot.outcome, lot.accept) {
            (Outcome::Accepted, 0 | 1) => self.score + 2,
            (Outcome::Accepted, _) if lot.accepted_tighter == Some(true) => self.score + 3,
            _ => 0,
        };
        self.reason = Reason::Stays { score: self.score };
        if self.score >= SCORE && reduced_agreed {
            let lot = lot.lot.clone();
            return Self::begin(State::Reduced, Reason::Score { lot });
        }
        self
    }

    fn tightened(mut self, lot: &PastLot) -> Self {
        match lot.outcome {
            Outcome::Accepted => self.accepted += 1,
            Outcome::Rejected => {
                self.accepted = 0;
                self.rejected += 1;
            }
            Outcome::Undecided | Outcome::Resumed => self.accepted = 0,
        }
        let number = lot.lot.clone();
        if self.rejected >= DISCONTINUE {
            let reason = Reason::Discontinued { lot: number };
            let stopped = true;
            return Self {
                stopped,
                ..Self::begin(State::Tightened, reason)
            };
        }
        if self.accepted >= RELIEVE {
            return Self::begin(State::Normal, Reason::FiveAccepted { lot: number });
        }
        self.reason = Reason::StaysTightened {
            accepted: self.accepted,
            rejected: self.rejected,
        };
        self
    }

    fn reduced(self, lot: &PastLot) -> Self {
        if lot.outcome == Outcome::Accepted {
            return self;
        }
        let lot = lot.lot.clone();
        Self::begin(State::Normal, Reason::ReducedEnded { lot })
    }
}

/// The state of inspection for the lot that comes after `past`, which is in the order of the decisions.
///
/// Inspection begins in the state `start`. Reduced inspection needs more than the score: a steady production and an agreement, which `reduced_agreed` states.
/// Source: ISO 2859-1:1999, 9.3 and 9.4; the score of 9.3.3.2 from memory.
pub fn next(past: &[PastLot], start: State, reduced_agreed: bool) -> Next {
    let start = Count::begin(start, Reason::Start);
    let end = past
        .iter()
        .fold(start, |count, lot| count.add(lot, reduced_agreed));
    Next {
        state: end.state,
        reason: end.reason,
    }
}

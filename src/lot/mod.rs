//! What the verdicts on springs do to a lot: plan tables, the decision, advice on undecided springs.
//! Elsewhere: the terms as agreed (`drawing`), the verdicts (`verdict`).

mod advice;
mod decide;
mod outcome;
mod plan;
mod plan_table;
mod reason;
mod terms;

pub use advice::{Advice, advise};
pub use decide::decide;
pub use outcome::{Outcome, Standing};
pub use plan::{
    Aql, Arrow, CodeLetter, PlanError, SinglePlan, normal_single, probability_of_acceptance,
};
pub use reason::{Decision, LotReason};
pub use terms::{ClassTerms, class_terms};

pub use crate::drawing::Level;

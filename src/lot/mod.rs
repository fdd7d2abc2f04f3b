//! What the verdicts on springs do to a lot: the plan of each class, the decision, advice on undecided springs.
//! Elsewhere: the terms as agreed (`drawing`), plan tables (`sampling`), the verdicts (`verdict`).

mod advice;
mod decide;
mod outcome;
mod reason;
mod terms;
mod variables;

pub use advice::{Advice, advise, settling};
pub use decide::{decide, gravest};
pub use outcome::{Outcome, Standing};
pub use reason::{Comparison, Decision, LotReason};
pub use terms::{Basis, ClassTerms, aql_of_class, class_terms, one_step_tighter, variables_terms};
pub use variables::{ByVariables, Compared, Statistic, by_variables};

//! Sampling plans: what a table, a design or a risk asks for, what it lets through, and when inspection changes its state.
//! Here: ISO 2859-1, MIL-STD-414 Table B, plans designed from two points, zero-accept, operating characteristics, switching.
//! Elsewhere: the terms as agreed (`drawing`), the decision on a lot (`lot`).

mod curve;
mod design;
mod error;
mod iso2859;
mod iso2859_table;
mod mil_std_414;
mod mil_std_414_table;
mod offer;
mod switching;
mod zero_accept;

pub use curve::{Bench, Chances, Counted, Measured, attributes_chances, variables_chances};
pub use design::{Designed, Points, designed};
pub use error::PlanError;
pub use iso2859::{Aql, Arrow, CodeLetter, SinglePlan, probability_of_acceptance, single, tighter};
pub use mil_std_414::{FREE_OF_SCATTER, VariablesPlan, most_share, variables_plan};
pub use offer::Offer;
pub use switching::{Next, Outcome, PastLot, Reason, next};
pub use zero_accept::{ZeroAccept, zero_accept};

pub use crate::drawing::{AQLS_414, Level, Level414, State};

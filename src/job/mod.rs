//! One folder or file per command: the only places that string rooms together.

mod accept;
mod expect;
mod facts;
mod history;
mod plan;
mod rate;
mod read;
mod threads;

pub use accept::{Accepted, Options, Past, accept};
pub use expect::{Ask, Expected, MemberAnswer, StressAnswer, expect};
pub use history::read_history;
pub use plan::{Asked, BenchAsked, CompareError, PlanOptions, plan};
pub use rate::{Bench, Guess, LoadAt, RateOptions, RateResult, rate};

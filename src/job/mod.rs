//! One folder or file per command: the only places that string rooms together.

mod accept;
mod draft;
mod expect;
mod facts;
mod odd;
mod rate;
mod read;
mod threads;

pub use accept::{Accepted, Options, accept};
pub use draft::draft_rig;
pub use expect::{Ask, Expected, MemberAnswer, StressAnswer, expect};
pub use rate::{Bench, Guess, LoadAt, RateOptions, RateResult, rate};

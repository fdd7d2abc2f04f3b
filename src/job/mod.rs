//! One folder or file per command: the only places that string rooms together.

mod accept;
mod draft;
mod draft_files;
mod expect;
mod facts;
mod history;
mod lots;
mod odd;
mod plan;
mod points;
mod rate;
mod read;
mod recheck;
mod rig;
mod threads;
mod track;

pub use accept::{Accepted, Memory, Options, Past, accept};
pub use draft::draft_rig;
pub use draft_files::{Starter, starter};
pub use expect::{Ask, expect};
pub use history::read_history;
pub use lots::{Listing, LotsError, Query, lots};
pub use plan::{Asked, BenchAsked, CompareError, PlanFlags, PlanOptions, plan};
pub use rate::{Bench, Guess, LoadAt, RateOptions, RateResult, rate};
pub use read::Keep;
pub use recheck::{
    ChangedInput, Outcome, RecheckError, Rechecked, recheck, recheck_run, stored_runs,
};
pub use rig::{Proposal, Repeated, RigOptions, Verified, rig_repeat, rig_verify};
pub use track::{TrackError, TrackOptions, track};

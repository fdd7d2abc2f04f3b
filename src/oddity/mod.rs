//! What is odd in one spring's rows as measured: a load cell at its end, a stuck travel, stray readings, rows twice or
//! missing, a step in load, steps coarser than stated. Imports `stats` only; works on plain numbers, travel growing with
//! compression.
//! Here: recognising. Elsewhere: what it costs (`curve` sets rows aside, `characteristic` withholds values).

mod coarse;
mod gaps;
mod rows;
mod steps;
mod stray;

pub use coarse::{coarser, step_of};
pub use gaps::{Gap, gaps, uneven};
pub use rows::{Saturation, doubled, saturation, travel_jumps};
pub use steps::{Step, steps};
pub use stray::stray;

/// What is odd.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Odd {
    /// The load cell stands at its end while the platen goes on.
    Saturated,
    /// The travel stands still while the load changes.
    TravelStuck,
    /// A single reading far off its neighbours.
    Stray,
    /// A row that repeats the one before digit for digit.
    Doubled,
    /// Rows are missing: the travel leaps.
    RowsMissing,
    /// The load steps, or the travel leaps back: the spring, the grip or the scale slipped.
    LoadSteps,
    /// The empty platens show another load than before the first contact.
    ZeroShifted,
    /// The recording starts on a loaded spring.
    LateStart,
    /// Loads come in steps coarser than the rig file states.
    LoadCoarse,
    /// Travel comes in steps coarser than the rig file states.
    TravelCoarse,
    /// Some stretches of the stroke are sampled much more densely than others.
    Uneven,
}

impl Odd {
    /// Whether the rows concerned are in no figure.
    pub const fn sets_aside(self) -> bool {
        matches!(
            self,
            Self::Saturated | Self::TravelStuck | Self::Stray | Self::Doubled
        )
    }
}

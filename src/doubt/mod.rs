//! Grounds to judge nothing: units mixed up, a sign turned, columns swapped. And what an odd ratio may mean.
//! Elsewhere: the rates themselves (`curve`, `characteristic`), whether the drawing agrees with itself (`drawing`).

mod mix_up;
mod reading;

pub use mix_up::{Doubt, DoubtError, doubt, lengths};
pub use reading::{is_odd, reading};

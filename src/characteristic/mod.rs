//! One value with its uncertainty budget, per judged quantity of one spring.
//! Here: which points make a value, and what makes it uncertain, own or common to the rig.
//! Elsewhere: the curve itself (`curve`), limits and verdicts (`drawing`, `verdict`).

mod average;
mod budget;
mod length;
mod load;
mod loops;
mod measure;
mod odd;
mod points;
mod rate;
mod scales;
mod stage;

pub use average::average;
pub use budget::{Estimate, Line, Part, Uncertainty, combine};
pub use length::OwnFree;
pub use measure::{
    Absence, Characteristic, MeasureError, Measured, Measurement, Setup, measure, wanted,
};
pub use points::measure_points;
pub use rate::{RateFit, judged};
pub use scales::scale_lines;
pub use stage::{StageWindow, stage_windows};

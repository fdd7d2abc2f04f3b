//! What the bench is worth, computed from what was measured on it: the check on a reference spring, the give of the
//! frame from a run of plate on plate, the repeatability study.
//! Here: arithmetic only. Elsewhere: reading the exports (`export`, `characteristic`), what a record says (`record`).

mod anova;
mod check;
mod error;
mod frame;
mod knots;
mod passes;
mod ranges;
mod study;

pub use anova::{Anova, Component, Components, Effect, Model, analyse};
pub use check::{Certified, Comparison, Finding, Serving, compare, overall};
pub use error::BenchError;
pub use frame::{Frame, Plates, frame};
pub use ranges::{AverageAndRange, average_and_range};
pub use study::{Cell, Crossed, Observation, categories};

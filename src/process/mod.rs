//! What a sample says of the lot it was drawn from: mean, spread, capability, share outside, tolerance intervals, shape,
//! values that stand out; each interval with the bench's common uncertainty whole.
//! Elsewhere: the distributions (`stats`), the decision (`lot`), words (`wording`).

mod capability;
mod common;
mod figures;
mod shape;

pub use common::{CommonPart, Observation, common_of_mean};
pub use figures::{Capability, Estimated, Figures, Interval, Outside, figures};
pub use shape::Shape;

/// Confidence of every interval.
pub const CONFIDENCE: f64 = 0.95;
/// Share of the springs that a tolerance interval holds.
pub const CONTENT: f64 = 0.99;

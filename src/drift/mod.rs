//! Series over lots: charts and their rules, change points, variance components, trend, and whose a shift is.
//! Here: pure computing over per-lot figures in one unit, in the order given.
//! Elsewhere: where lots come from (`archive`), which are charted (`job`), what is printed (`model`).

mod capability;
mod charts;
mod components;
mod constants;
mod culprit;
mod rules;
mod run_length;
mod steps;
mod trend;

pub use capability::{Able, able};
pub use charts::{
    Cusum, H, K, L, LAMBDA, Limits, MOVING_RANGE, individuals, moving_ranges, spread_limits,
    tabular_cusum, weighted,
};
pub use components::{Components, components};
pub use constants::c4;
pub use culprit::{AFTER, BEFORE, ChecksCompared, Culprit, ReferencePoint, Side, Unclear, culprit};
pub use rules::{Rule, fired};
pub use run_length::{Spread, combined_run_length, true_run_length};
pub use steps::{SHORTEST, Step, steps};
pub use trend::{Crossing, Trend, crossing, trend};

/// One lot's figures of one characteristic.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LotPoint {
    /// Springs with a value.
    pub springs: u64,
    /// Their mean.
    pub mean: f64,
    /// Their standard deviation, n − 1; none of a single spring.
    pub deviation: Option<f64>,
    /// Root mean square of the springs' own standard uncertainties.
    pub own: Option<f64>,
}

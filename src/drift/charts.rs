//! Charts over lots: individuals, spread, EWMA and CUSUM.

use super::constants::c4;
use crate::stats::mean;

/// λ of the EWMA.
pub const LAMBDA: f64 = 0.2;
/// Its limits, in standard deviations of the weighted mean once it has settled.
pub const L: f64 = 2.86;
/// Reference value of the CUSUM, in standard deviations.
pub const K: f64 = 0.5;
/// Its decision interval.
pub const H: f64 = 5.0;
/// d2 of two values: the mean distance of two normal values, 2/√π, over the standard deviation.
pub const MOVING_RANGE: f64 = std::f64::consts::FRAC_2_SQRT_PI;
/// Limits stand this many standard deviations off.
const SIGMAS: f64 = 3.0;

/// A centre line and its limits.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Limits {
    /// Centre line.
    pub centre: f64,
    /// Standard deviation of what is charted.
    pub sigma: f64,
    /// Lower limit.
    pub lower: f64,
    /// Upper limit.
    pub upper: f64,
}

impl Limits {
    /// Limits `width` standard deviations about a centre.
    pub fn about(centre: f64, sigma: f64, width: f64) -> Self {
        Self {
            centre,
            sigma,
            lower: centre - width * sigma,
            upper: centre + width * sigma,
        }
    }
}

/// Distances of neighbours.
pub fn moving_ranges(values: &[f64]) -> Vec<f64> {
    values
        .iter()
        .zip(values.iter().skip(1))
        .map(|(one, next)| (next - one).abs())
        .collect()
}

/// Limits of an individuals chart from a baseline: the mean ± 3·MR̄/d2. `None` below two values or without any scatter.
pub fn individuals(baseline: &[f64]) -> Option<Limits> {
    let sigma = mean(&moving_ranges(baseline))? / MOVING_RANGE;
    let limits = Limits::about(mean(baseline)?, sigma, SIGMAS);
    (sigma > 0.0 && limits.upper.is_finite()).then_some(limits)
}

/// Limits of a chart of standard deviations for a lot of `n` springs whose true deviation is `sigma`: c4·σ ± 3σ√(1 − c4²),
/// none below zero.
pub fn spread_limits(n: u64, sigma: f64) -> Option<Limits> {
    let c4 = c4(n)?;
    let limits = Limits::about(c4 * sigma, sigma * (1.0 - c4 * c4).sqrt(), SIGMAS);
    Some(Limits {
        lower: limits.lower.max(0.0),
        ..limits
    })
}

/// The exponentially weighted mean after each value, from `centre` on.
pub fn weighted(values: &[f64], centre: f64, lambda: f64) -> Vec<f64> {
    let mut z = centre;
    values
        .iter()
        .map(|value| {
            z += lambda * (value - z);
            z
        })
        .collect()
}

/// Both sums of a tabular CUSUM after a value.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Cusum {
    /// Above the target.
    pub high: f64,
    /// Below it.
    pub low: f64,
}

/// The tabular CUSUM of `values` about `target` with the reference value `k`, in the unit of the values.
pub fn tabular_cusum(values: &[f64], target: f64, k: f64) -> Vec<Cusum> {
    let mut sums = Cusum::default();
    values
        .iter()
        .map(|value| {
            sums = Cusum {
                high: (sums.high + value - target - k).max(0.0),
                low: (sums.low + target - k - value).max(0.0),
            };
            sums
        })
        .collect()
}

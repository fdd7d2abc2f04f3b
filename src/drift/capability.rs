//! Capability of a stretch of lots.

use super::components::Components;
use crate::stats::normal_quantile;

/// Ppk of a stretch of lots with its interval of 95 %.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Able {
    /// Pp, where there are two limits.
    pub pp: Option<f64>,
    /// Ppk.
    pub ppk: f64,
    /// Lower end of its interval.
    pub lower: f64,
    /// Upper end.
    pub upper: f64,
}

/// Ppk from the variance between lots and within them together; `None` without a limit or a spread.
///
/// The springs of a lot share its level, so the interval counts lots: the variance MSB/n0 + MSW(1 − 1/n0) has the degrees of
/// freedom of Welch and Satterthwaite, the mean the variance MSB/N. Normal approximation: √(u²(mean)/9σ² + Ppk²/2ν).
pub fn able(of: &Components, lower: Option<f64>, upper: Option<f64>) -> Option<Able> {
    let variance = of.between + of.within;
    let sigma = variance.sqrt();
    let distance = |limit: f64, side: f64| side * (limit - of.mean) / (3.0 * sigma);
    let sides = [
        lower.map(|limit| distance(limit, -1.0)),
        upper.map(|limit| distance(limit, 1.0)),
    ];
    let ppk = sides.into_iter().flatten().min_by(f64::total_cmp)?;
    let (msb, share) = (of.mean_square_between(), 1.0 / of.size);
    let (one, two) = (msb * share, of.within * (1.0 - share));
    let dof = (one + two).powi(2) / (one * one / of.dof_between + two * two / of.dof_within);
    let mean = msb.max(of.within) / of.springs / (9.0 * variance);
    let half = normal_quantile(0.975).ok()? * (mean + ppk * ppk / (2.0 * dof)).sqrt();
    let pp = lower.zip(upper);
    Some(Able {
        pp: pp.map(|(lower, upper)| (upper - lower) / (6.0 * sigma)),
        ppk,
        lower: ppk - half,
        upper: ppk + half,
    })
    .filter(|able| able.ppk.is_finite() && able.lower.is_finite())
}

//! Whether a series rises or falls, how fast, and when it would cross a limit.

use crate::stats::{median, normal_cdf, normal_quantile};

/// Share of certainty of the interval of the slope.
const CERTAINTY: f64 = 0.95;
/// A trend is one where chance alone would show such a one in at most this share of series.
const CHANCE: f64 = 0.05;

/// Mann–Kendall and Theil–Sen over a series with equal steps.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Trend {
    /// Pairs that rise less pairs that fall.
    pub s: i64,
    /// Variance of it where nothing moves, ties counted in.
    pub variance: f64,
    /// Its deviate.
    pub z: f64,
    /// Chance of such a deviate or a larger one, either way.
    pub p: f64,
    /// Median slope of all pairs, per step.
    pub slope: f64,
    /// Lower end of its interval of 95 %.
    pub slope_lower: f64,
    /// Upper end.
    pub slope_upper: f64,
    /// The level at the last value, by the median slope.
    pub level: f64,
}

impl Trend {
    /// Whether chance alone would seldom show it.
    pub fn moves(&self) -> bool {
        self.p < CHANCE
    }
}

/// The trend of `values`; `None` for fewer than four, or where all are equal.
pub fn trend(values: &[f64]) -> Option<Trend> {
    if values.len() < 4 || !values.iter().all(|value| value.is_finite()) {
        return None;
    }
    let mut s = 0_i64;
    let mut slopes = Vec::with_capacity(values.len() * (values.len() - 1) / 2);
    for (place, from) in values.iter().enumerate() {
        for (apart, to) in (1_u32..).zip(values.iter().skip(place + 1)) {
            let rise = to - from;
            s += i64::from(rise > 0.0) - i64::from(rise < 0.0);
            slopes.push(rise / f64::from(apart));
        }
    }
    let variance = variance(values);
    let z = (s - s.signum()) as f64 / variance.sqrt();
    let p = (2.0 * normal_cdf(-z.abs()).ok()?).min(1.0);
    let half = normal_quantile(f64::midpoint(1.0, CERTAINTY)).ok()? * variance.sqrt() / 2.0;
    let middle = slopes.len() as f64 / 2.0;
    let (slope_lower, slope_upper) = (
        ranked(&mut slopes, (middle - half).round())?,
        ranked(&mut slopes, (middle + half + 1.0).round())?,
    );
    let slope = median(slopes)?;
    let last = values.len() - 1;
    let level = |(place, value): (usize, &f64)| value + slope * (last - place) as f64;
    Some(Trend {
        s,
        variance,
        z,
        p,
        slope,
        slope_lower,
        slope_upper,
        level: median(values.iter().enumerate().map(level).collect())?,
    })
}

/// Variance of S: [n(n−1)(2n+5) − Σt(t−1)(2t+5)]/18 over ties of t values.
fn variance(values: &[f64]) -> f64 {
    let term = |n: f64| n * (n - 1.0) * (2.0 * n + 5.0);
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    let ties = sorted.chunk_by(|a, b| a.total_cmp(b).is_eq());
    let counted: f64 = ties.map(|tie| term(tie.len() as f64)).sum();
    (term(values.len() as f64) - counted) / 18.0
}

/// The value of a rank counted from 1, held inside the ranks there are.
#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "clamped to the ranks there are"
)]
fn ranked(slopes: &mut [f64], rank: f64) -> Option<f64> {
    let last = slopes.len().checked_sub(1)?;
    let place = ((rank - 1.0).max(0.0) as usize).min(last);
    Some(*slopes.select_nth_unstable_by(place, f64::total_cmp).1)
}

/// When a trend would cross a limit, in steps from the last value.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Crossing {
    /// The limit.
    pub limit: f64,
    /// Steps by the median slope.
    pub steps: f64,
    /// By the steeper end of its interval.
    pub earliest: f64,
    /// By the flatter end; `None` where that never crosses.
    pub latest: Option<f64>,
}

/// When the trend would cross one of the limits it moves towards; `None` where it does not move, or towards none.
pub fn crossing(trend: &Trend, lower: Option<f64>, upper: Option<f64>) -> Option<Crossing> {
    if !trend.moves() {
        return None;
    }
    let limit = if trend.slope > 0.0 { upper } else { lower }?;
    let steps = |slope: f64| {
        let steps = (limit - trend.level) / slope;
        // A level already beyond the limit has crossed it: 0, and not a time in the past.
        (slope * trend.slope > 0.0).then(|| steps.max(0.0))
    };
    let (flat, steep) = if trend.slope > 0.0 {
        (trend.slope_lower, trend.slope_upper)
    } else {
        (trend.slope_upper, trend.slope_lower)
    };
    Some(Crossing {
        limit,
        steps: steps(trend.slope)?,
        earliest: steps(steep)?,
        latest: steps(flat),
    })
}

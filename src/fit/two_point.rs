//! The slope as a tester reads it off two points.
//! Elsewhere: the fitted slope it is held against (`line`).

use crate::stats::mean;

/// Share of the window's span at each end whose points are averaged: wide enough that one reading does not decide,
/// narrow enough to stay an end. By hand.
const END: f64 = 0.05;

/// Slope between the mean of the points within 1/20 of the span from the smallest x and the mean of those within
/// 1/20 from the largest, in y per x.
///
/// Each end holds at least the extreme point. `None` for slices of different length, a value that is not finite, or
/// points without span.
pub fn two_point_slope(x: &[f64], y: &[f64]) -> Option<f64> {
    let finite = |values: &[f64]| values.iter().all(|value| value.is_finite());
    if x.len() != y.len() || !finite(x) || !finite(y) {
        return None;
    }
    let low = x.iter().copied().reduce(f64::min)?;
    let high = x.iter().copied().reduce(f64::max)?;
    let reach = END * (high - low);
    let (x1, y1) = centre(x, y, |x| x - low <= reach)?;
    let (x2, y2) = centre(x, y, |x| high - x <= reach)?;
    Some((y2 - y1) / (x2 - x1)).filter(|slope| slope.is_finite())
}

/// Mean x and mean y of the points whose x is wanted.
fn centre(x: &[f64], y: &[f64], wanted: impl Fn(f64) -> bool) -> Option<(f64, f64)> {
    let points = x.iter().zip(y).filter(|(x, _)| wanted(**x));
    let (near, loads): (Vec<f64>, Vec<f64>) = points.unzip();
    Some((mean(&near)?, mean(&loads)?))
}

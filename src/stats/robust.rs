//! Slopes that a few bad points cannot carry away.
//! Elsewhere: the caution where it leaves the least-squares slope (`characteristic`).

use super::sample::median;

/// Slope of y on x by Theil's incomplete method, in units of y per unit of x.
///
/// The points are ordered by x, point i is paired with point i + ⌈n/2⌉, and the median of the pairs' slopes is
/// taken; pairs of one x are left out. O(n log n), no result of chance, and up to a quarter of the points may be
/// bad. `None` for slices of different length, a value that is not finite, or no pair.
/// Source: "A rank-invariant method of linear and polynomial regression analysis", Proc. Kon. Ned.
/// Akad. v. Wetensch. A 53 (1950), the incomplete method; from memory.
pub fn incomplete_theil_slope(x: &[f64], y: &[f64]) -> Option<f64> {
    let finite = |values: &[f64]| values.iter().all(|value| value.is_finite());
    if x.len() != y.len() || !finite(x) || !finite(y) {
        return None;
    }
    let mut points: Vec<(f64, f64)> = x.iter().copied().zip(y.iter().copied()).collect();
    // By y within one x, so that the order of the rows never decides which points meet.
    points.sort_unstable_by(|a, b| a.0.total_cmp(&b.0).then(a.1.total_cmp(&b.1)));
    let half = points.len().div_ceil(2);
    let slopes = points
        .iter()
        .zip(points.iter().skip(half))
        .filter(|(low, high)| low.0 < high.0)
        .map(|(low, high)| (high.1 - low.1) / (high.0 - low.0))
        .collect();
    median(slopes)
}

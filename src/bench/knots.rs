//! The give of a frame as a table of loads, where a straight line does not do.

use crate::fit::LineFit;
use crate::rig::Give;

/// Loads of a table, at most, and readings that each of its stretches needs.
const KNOTS: usize = 16;
const READINGS_PER_KNOT: usize = 6;

/// Load and give at evenly spread loads, each from a line through the readings about it.
pub(super) fn knots(load: &[f64], give: &[f64], whole: &LineFit) -> Vec<(f64, f64)> {
    let low = load.iter().copied().fold(f64::INFINITY, f64::min);
    let high = load.iter().copied().fold(0.0, f64::max);
    let count = (load.len() / READINGS_PER_KNOT).min(KNOTS);
    if count < 3 {
        return vec![(low, whole.at(low)), (high, whole.at(high))];
    }
    let step = (high - low) / (count - 1) as f64;
    let mut knots = Vec::new();
    for number in 0..count {
        let at = low + step * number as f64;
        let near = |x: f64| (x - at).abs() <= step;
        let (x, y): (Vec<f64>, Vec<f64>) = load
            .iter()
            .zip(give)
            .filter(|(x, _)| near(**x))
            .map(|(x, y)| (*x, *y))
            .unzip();
        if let Ok(line) = LineFit::through(&x, &y) {
            knots.push((at, line.at(at)));
        }
    }
    knots
}

/// The table through the knots, from no give at no load; `None` where it does not rise.
pub(super) fn table(knots: &[(f64, f64)]) -> Option<Give> {
    let [(x0, y0), (x1, y1), ..] = knots else {
        return None;
    };
    let start = y0 - (y1 - y0) / (x1 - x0) * x0; // the first stretch, drawn back to no load
    let mut points = vec![(0.0, 0.0)];
    points.extend(knots.iter().map(|(load, give)| (*load, give - start)));
    let rises = points
        .windows(2)
        .all(|pair| matches!(pair, [a, b] if b.0 > a.0 && b.1 > a.1));
    rises.then_some(Give::Table(points))
}

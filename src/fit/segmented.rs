//! Two straight stages that meet at a knee, by least squares: every interval between two points is searched.
//! Here: the knee, its interval from the profile of the fit, and the rounded transition that is left out.
//! Elsewhere: the budget of the knee (`characteristic`).

use super::FitError;
use super::hinge::Sums;
use crate::stats::{Dof, corrected_lag1, effective_n, lag1, student_quantile};

/// Fewest points on either side of a knee.
const LEAST: usize = 5;
/// Below this effective number of points the fit does not give its own uncertainty.
const LEAST_EFFECTIVE: f64 = 10.0;
/// Widths tried for the transition, as shares of the shorter side: 0 to 40 %.
const STEPS: u32 = 21;
const STEP: f64 = 0.02;
/// By how much more than the transition that shows is left out.
const MARGIN: f64 = 2.0;
/// The least zone whose leaving out is tried on the knee, as a share of the shorter side.
const UNSEEN: f64 = 0.1;
/// The probability below +1 standard deviation of a normal distribution.
const ONE_SIGMA: f64 = 0.841_344_746_068_542_9;

/// Two stages and the knee between them, in the units of x and y.
#[derive(Clone, Debug, PartialEq)]
pub struct Segmented {
    /// Where the two lines meet.
    pub knee: f64,
    /// y there.
    pub at_knee: f64,
    /// Slope before the knee.
    pub before: f64,
    /// Slope after it.
    pub after: f64,
    /// Half-width of the transition about the knee whose points are in no line.
    pub transition: f64,
    /// By how much the knee moves when twice as much is left out, a tenth of the shorter side at least.
    pub moved: f64,
    /// Standard uncertainty of the knee, from the profile of the fit, with its degrees of freedom; `None` under ten
    /// independent points.
    pub standard: Option<(f64, Dof)>,
    /// Standard uncertainty of the difference of the two slopes, errors taken as independent.
    pub slope_difference_error: f64,
    /// Points in the two lines.
    pub count: usize,
}

/// Fits two stages to points in growing x.
///
/// # Errors
/// [`FitError`] where the points cannot carry two lines.
pub fn segmented(x: &[f64], y: &[f64]) -> Result<Segmented, FitError> {
    if x.len() != y.len() {
        return Err(FitError::LengthsDiffer {
            x: x.len(),
            y: y.len(),
        });
    }
    if let Some(point) = x
        .iter()
        .zip(y)
        .position(|(x, y)| !(x.is_finite() && y.is_finite()))
    {
        return Err(FitError::NotFinite { point: point + 1 });
    }
    let few = FitError::TooFewAbscissae { found: x.len() };
    let whole = Sums::of(x, y);
    let first = whole.best(LEAST).ok_or(few.clone())?;
    let tried = transitions(x, y, first.knee);
    let chosen = tried.first().copied().ok_or(few.clone())?;
    let least = tried
        .iter()
        .map(|one| one.variance)
        .fold(f64::INFINITY, f64::min);
    // The narrowest transition whose scatter about the lines is no more than chance above the least; as much again is
    // left out, for the last of a rounding is smaller than chance and still pulls at both lines.
    let enough = |one: &&Tried| one.variance <= least * (1.0 + (2.0 / one.count).sqrt());
    let narrowest = tried.iter().find(enough).copied().unwrap_or(chosen);
    let chosen = widened(x, y, narrowest, narrowest.width * MARGIN).unwrap_or(narrowest);
    // A rounding too small to show pulls as well: at least the narrowest zones are tried.
    let wider = (chosen.width * MARGIN).max(UNSEEN * side(x, first.knee));
    let moved =
        widened(x, y, narrowest, wider).map_or(0.0, |other| (other.knee - chosen.knee).abs());
    finished(x, y, chosen, moved).ok_or(few)
}

#[derive(Clone, Copy)]
struct Tried {
    /// Middle of the zone left out.
    middle: f64,
    /// Half its width.
    width: f64,
    knee: f64,
    variance: f64,
    count: f64,
}

/// The shorter of the two stretches about a knee.
fn side(x: &[f64], knee: f64) -> f64 {
    match (x.first(), x.last()) {
        (Some(low), Some(high)) => (knee - low).min(high - knee),
        _ => 0.0,
    }
}

/// The fit with a zone of this half-width left out.
fn widened(x: &[f64], y: &[f64], of: Tried, width: f64) -> Option<Tried> {
    let kept = outside(x, y, of.knee, width)?;
    let best = Sums::of(&kept.0, &kept.1).best(LEAST)?;
    let count = kept.0.len() as f64;
    Some(Tried {
        middle: of.knee,
        width,
        knee: best.knee,
        variance: best.squares / (count - 4.0),
        count,
    })
}

/// The points outside `knee ± width`.
fn outside(x: &[f64], y: &[f64], knee: f64, width: f64) -> Option<(Vec<f64>, Vec<f64>)> {
    let kept = |x: &f64| width <= 0.0 || (x - knee).abs() > width;
    let points = x.iter().zip(y).filter(|(x, _)| kept(x));
    let kept: (Vec<f64>, Vec<f64>) = points.unzip();
    let before = kept.0.iter().filter(|x| **x <= knee).count();
    (before >= LEAST && kept.0.len() - before >= LEAST).then_some(kept)
}

/// The fits with growing transitions left out, narrowest first; the zone follows the knee once.
fn transitions(x: &[f64], y: &[f64], start: f64) -> Vec<Tried> {
    let side = side(x, start);
    let mut knee = start;
    let mut tried = Vec::new();
    for step in 0..STEPS {
        let width = f64::from(step) * STEP * side;
        let Some(kept) = outside(x, y, knee, width) else {
            break;
        };
        let Some(best) = Sums::of(&kept.0, &kept.1).best(LEAST) else {
            break;
        };
        let count = kept.0.len() as f64;
        tried.push(Tried {
            middle: knee,
            width,
            knee: best.knee,
            variance: best.squares / (count - 4.0),
            count,
        });
        knee = best.knee;
    }
    tried
}

fn finished(x: &[f64], y: &[f64], chosen: Tried, moved: f64) -> Option<Segmented> {
    let kept = outside(x, y, chosen.middle, chosen.width)?;
    let sums = Sums::of(&kept.0, &kept.1);
    let best = sums.best(LEAST)?;
    let hinge = sums.at(best.knee)?;
    let residuals: Vec<f64> = kept
        .0
        .iter()
        .zip(&kept.1)
        .map(|(x, y)| y - hinge.value(*x))
        .collect();
    let count = kept.0.len();
    let rho = lag1(&residuals)
        .and_then(|rho| corrected_lag1(rho, count))
        .unwrap_or(0.0);
    let effective = effective_n(count, rho);
    let variance = best.squares / (count as f64 - 4.0);
    let standard = if effective < LEAST_EFFECTIVE {
        None
    } else {
        let dof = Dof::Finite((effective - 4.0).max(1.0));
        let factor = student_quantile(ONE_SIGMA, dof).ok()?;
        let allowed = best.squares + variance * count as f64 / effective * factor * factor;
        let (low, high) = sums.profile(best.knee, allowed);
        Some(((high - low) / 2.0, dof))
    };
    Some(Segmented {
        knee: best.knee,
        at_knee: hinge.value(best.knee),
        before: hinge.slope,
        after: hinge.slope + hinge.bend,
        transition: chosen.width,
        moved,
        standard,
        slope_difference_error: (variance * hinge.bend_variance).sqrt(),
        count,
    })
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use approx::assert_relative_eq;

    /// Two exact lines, 3 and 7 per unit, meeting between two points: the knee, slopes and load there come back.
    #[test]
    fn exact_lines_give_their_meeting() {
        for knee in [4.03, 5.0, 6.999] {
            let x: Vec<f64> = (0..=100).map(|i| f64::from(i) / 10.0).collect();
            let y: Vec<f64> = x
                .iter()
                .map(|x| 2.0 + 3.0 * x + 4.0 * (x - knee).max(0.0))
                .collect();
            let found = segmented(&x, &y).unwrap();
            assert_relative_eq!(found.knee, knee, epsilon = 1e-9);
            assert_relative_eq!(found.before, 3.0, epsilon = 1e-9);
            assert_relative_eq!(found.after, 7.0, epsilon = 1e-9);
            assert_relative_eq!(found.at_knee, 2.0 + 3.0 * knee, epsilon = 1e-9);
        }
    }

    /// A transition rounded by a parabola over ±0.5 about the knee is left out: the lines' meeting, not the bend's middle.
    #[test]
    fn a_rounded_transition_is_left_out() {
        let x: Vec<f64> = (0..=400).map(|i| f64::from(i) / 40.0).collect();
        // From 4.7 on the slope grows evenly for 1 mm: the lines meet at 5.2.
        let bend = |x: f64| {
            let into = (x - 4.7).clamp(0.0, 1.0);
            4.0 * (into * into / 2.0 + (x - 5.7).max(0.0))
        };
        let y: Vec<f64> = x
            .iter()
            .enumerate()
            .map(|(i, x)| 3.0 * x + bend(*x) + if i % 2 == 0 { 0.01 } else { -0.01 })
            .collect();
        let found = segmented(&x, &y).unwrap();
        assert!((found.knee - 5.2).abs() < 0.02, "{found:?}");
        assert!(
            found.transition > 0.3 && found.transition < 1.2,
            "{found:?}"
        );
    }

    #[test]
    fn too_few_points_carry_no_two_lines() {
        let x: Vec<f64> = (0..8).map(f64::from).collect();
        assert!(segmented(&x, &x).is_err());
        assert!(segmented(&x, x.get(..4).unwrap_or(&[])).is_err());
        assert!(segmented(&[1.0, f64::NAN], &[1.0, 2.0]).is_err());
    }
}

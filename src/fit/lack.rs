//! Whether a straight line is the right shape for the points.
//! Here: two F tests and the bend they speak of. Both take the errors as independent: neighbours that hang together
//! make p too small, which is why a warning needs a bend of some size besides.
//! Elsewhere: the budget line `shape` (`characteristic`).

use super::LineFit;
use crate::stats::f_upper_tail;

/// Below this p a lack of fit is taken as shown.
const SHOWN: f64 = 0.01;
/// Up to this bend a shown lack of fit is not worth a warning: 1 % between the ends of the window, by hand, a
/// fifth of the narrowest usual rate tolerance.
const BEND: f64 = 0.01;
/// Groups of repeated abscissae that a pure-error test needs: two are always met by a line.
const LEAST_GROUPS: usize = 3;

/// What the line was held against.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LackKind {
    /// The spread of points repeated at one abscissa.
    PureError,
    /// A parabola through the same points.
    Curvature,
}

/// An F test of a line against a better shape.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LackOfFit {
    /// What the line was held against.
    pub kind: LackKind,
    /// The F statistic; infinite where nothing is left beside the lack of fit.
    pub f: f64,
    /// Degrees of freedom of its numerator.
    pub dof1: f64,
    /// Degrees of freedom of its denominator.
    pub dof2: f64,
    /// Chance of such an F or a larger one, if the line is right and the errors independent.
    pub p: f64,
    /// Slope of the fitted parabola at the largest x over its slope at the smallest, less 1; `None` where the slope at
    /// the smallest x is 0.
    pub bend: Option<f64>,
}

impl LackOfFit {
    /// Whether an inspector should be told: p under 0.01 and a bend of more than 1 % either way.
    ///
    /// Either alone is no ground: thousands of points show a bend that matters to nobody, and noise bends a few.
    pub fn warns(&self) -> bool {
        self.p < SHOWN && self.bend.is_none_or(|bend| bend.abs() > BEND)
    }
}

/// Tests the line fitted through the points `x`, `y` for lack of fit.
///
/// By pure error where three or more abscissae occur exactly more than once and those points do scatter, otherwise by a
/// parabola. `None` for slices of another length than the fit, or too few points for either test.
pub fn lack_of_fit(x: &[f64], y: &[f64], line: &LineFit) -> Option<LackOfFit> {
    if x.len() != line.count || y.len() != line.count {
        return None;
    }
    let parabola = Parabola::beside(line, x)?;
    let sse = squares(&line.residuals);
    let by_groups = pure_error(x, y).and_then(|(within, dof2, groups)| {
        let lack = ((sse - within).max(0.0), (groups - 2) as f64);
        test(LackKind::PureError, lack, (within, dof2), &parabola)
    });
    by_groups.or_else(|| {
        let dof2 = line.count.checked_sub(3).filter(|dof| *dof > 0)? as f64;
        let (gain, left) = ((parabola.gain, 1.0), (parabola.left, dof2));
        test(LackKind::Curvature, gain, left, &parabola)
    })
}

/// Numerator and denominator as (sum of squares, degrees of freedom).
fn test(kind: LackKind, of: (f64, f64), over: (f64, f64), bent: &Parabola) -> Option<LackOfFit> {
    let f = (of.0 / of.1) / (over.0 / over.1);
    Some(LackOfFit {
        kind,
        f,
        dof1: of.1,
        dof2: over.1,
        p: f_upper_tail(f, of.1, over.1).ok()?, // NaN, 0/0, ends here
        bend: bent.bend,
    })
}

/// Sum of squares within groups of one abscissa, its degrees of freedom, and the number of different abscissae.
fn pure_error(x: &[f64], y: &[f64]) -> Option<(f64, f64, usize)> {
    let mut points: Vec<(f64, f64)> = x.iter().copied().zip(y.iter().copied()).collect();
    points.sort_by(|a, b| a.0.total_cmp(&b.0));
    let (mut within, mut groups, mut repeated) = (0.0, 0, 0);
    for group in points.chunk_by(|a, b| a.0 >= b.0) {
        groups += 1;
        repeated += usize::from(group.len() > 1);
        let centre = group.iter().map(|point| point.1).sum::<f64>() / group.len() as f64;
        within += group.iter().map(|at| (at.1 - centre).powi(2)).sum::<f64>();
    }
    let dof = points.len().checked_sub(groups)? as f64;
    (repeated >= LEAST_GROUPS && within > 0.0).then_some((within, dof, groups))
}

/// The parabola that least squares adds to a line.
struct Parabola {
    gain: f64, // sum of squares it explains beyond the line
    left: f64, // sum of squares it leaves
    bend: Option<f64>,
}

impl Parabola {
    /// Fits the residuals of `line` on t² − a·t − b, which is orthogonal to 1 and t, t = (x − x̄)/(span of x).
    fn beside(line: &LineFit, x: &[f64]) -> Option<Self> {
        let (low, high) = (
            x.iter().copied().reduce(f64::min)? - line.x_mean,
            x.iter().copied().reduce(f64::max)? - line.x_mean,
        );
        let unit = high - low;
        let t: Vec<f64> = x.iter().map(|x| (x - line.x_mean) / unit).collect();
        let second = squares(&t);
        let a = t.iter().map(|t| t.powi(3)).sum::<f64>() / second;
        let b = second / t.len() as f64;
        let shape: Vec<f64> = t.iter().map(|t| t * t - a * t - b).collect();
        let product: f64 = shape.iter().zip(&line.residuals).map(|(s, r)| s * r).sum();
        let factor = product / squares(&shape);
        let left = line.residuals.iter().zip(&shape);
        let left = left.map(|(r, s)| (r - factor * s).powi(2)).sum();
        let slope_at = |u: f64| line.slope + factor * (2.0 * u / unit - a) / unit;
        let bend = slope_at(high) / slope_at(low) - 1.0;
        Some(Self {
            gain: factor * product,
            left,
            bend: Some(bend).filter(|bend| bend.is_finite()),
        })
    }
}

fn squares(values: &[f64]) -> f64 {
    values.iter().map(|value| value * value).sum()
}

//! Student's t, normal, F and binomial, the only place that asks `statrs`.
//! Here: argument checks, the large-ν roads, and the proof of every quantile by its own cdf.
//! Elsewhere: which probability a verdict or a coverage factor needs (`characteristic`, `verdict`).

use statrs::distribution::{Binomial, ContinuousCDF, DiscreteCDF, Normal, StudentsT};
use statrs::function::beta::checked_beta_reg;

use super::StatsError;

/// Degrees of freedom of a variance estimate; `Infinite` is a known variance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Dof {
    /// A number from 0.5 up, fractions allowed (Welch–Satterthwaite gives them).
    Finite(f64),
    /// The variance is known: Student's t is the normal distribution.
    Infinite,
}

/// Above this ν the series take over: `statrs` loses digits with ν and from 10⁸ never returns.
const SERIES_ABOVE: f64 = 1000.0;
/// Least ν asked of `statrs`; one repeated reading already gives 1.
const LEAST_DOF: f64 = 0.5;
/// Least tail probability of a quantile; no verdict asks beyond, and the proof below holds to here.
const LEAST_TAIL: f64 = 1e-12;
/// A quantile may miss its tail probability by this share of it.
const MISS: f64 = 1e-7;
/// F: up to here the continued fraction in `statrs` (140 terms) holds 8 digits; at 10⁶ it is off in the third.
const MOST_F_DOF: f64 = 1e5;
/// Binomial: the same limit, on the number of trials.
const MOST_TRIALS: u64 = 100_000;

/// Quantile of Student's t, a pure number: the t that a share `p` (0 < p < 1) lies below.
///
/// Source: `statrs` up to ν = 1000; above, the series in 1/ν to the third power (Handbook of Mathematical
/// Functions, NBS 1964, 26.7.5), whose next term is below 1e-7 of t for tails down to 1e-12.
///
/// # Errors
/// [`StatsError::Probability`] for a p outside 0…1 or a tail under 1e-12, [`StatsError::Dof`] for ν under 0.5,
/// [`StatsError::Missed`] where the quantile does not lead back to p.
pub fn student_quantile(p: f64, dof: Dof) -> Result<f64, StatsError> {
    let Dof::Finite(nu) = dof else {
        return normal_quantile(p);
    };
    let nu = checked_dof(nu)?;
    // The lower tail keeps all its digits; 1 − p is exact for p of 0.5 and more.
    let (tail, sign) = lower_tail(p)?;
    let t = if nu > SERIES_ABOVE {
        large_dof_quantile(normal_quantile(tail)?, nu)
    } else {
        student(nu)?
            .try_inverse_cdf(tail)
            .map_err(|_| StatsError::Probability { found: p })?
    };
    proven(t, tail, student_cdf(t, dof)?).map(|t| sign * t)
}

/// Share of Student's t below `t`, 0 to 1.
///
/// Source: `statrs` up to ν = 1000; above, the normal deviate of "Algorithm 395", Communications of the
/// ACM 13 (1970) 617, a road of its own, so that it can prove the quantile.
///
/// # Errors
/// [`StatsError::Argument`] for a t that is no finite number, [`StatsError::Dof`] for ν under 0.5.
pub fn student_cdf(t: f64, dof: Dof) -> Result<f64, StatsError> {
    let Dof::Finite(nu) = dof else {
        return normal_cdf(t);
    };
    let (t, nu) = (finite(t)?, checked_dof(nu)?);
    if nu > SERIES_ABOVE {
        normal_cdf(large_dof_deviate(t, nu))
    } else {
        Ok(student(nu)?.cdf(t))
    }
}

/// Quantile of the standard normal distribution: the z that a share `p` (0 < p < 1) lies below.
///
/// # Errors
/// [`StatsError::Probability`] for a p outside 0…1 or a tail under 1e-12, [`StatsError::Missed`] where the
/// quantile does not lead back to p.
pub fn normal_quantile(p: f64) -> Result<f64, StatsError> {
    let (tail, sign) = lower_tail(p)?;
    let z = Normal::standard()
        .try_inverse_cdf(tail)
        .map_err(|_| StatsError::Probability { found: p })?;
    proven(z, tail, normal_cdf(z)?).map(|z| sign * z)
}

/// Share of the standard normal distribution below `z`, 0 to 1.
///
/// # Errors
/// [`StatsError::Argument`] for a z that is no finite number.
pub fn normal_cdf(z: f64) -> Result<f64, StatsError> {
    finite(z).map(|z| Normal::standard().cdf(z))
}

/// Share of the F distribution above `f`, the p value of an F test; `d1` belongs to the numerator.
///
/// An infinite `f` (nothing left under the fraction) has 0 above it.
/// Source: for d1 = 1 both tails of Student's t at √f; else the regularised incomplete beta at d2/(d2 + d1·f), which
/// keeps the digits of small shares, where one minus the lower share would lose them.
///
/// # Errors
/// [`StatsError::Argument`] for f negative or not a number, [`StatsError::Dof`] for degrees of freedom under 0.5 or
/// above 100 000 (d2 has no upper limit where d1 is 1).
pub fn f_upper_tail(f: f64, d1: f64, d2: f64) -> Result<f64, StatsError> {
    if f.is_nan() || f < 0.0 {
        return Err(StatsError::Argument { found: f });
    }
    let single = (d1 - 1.0).abs() < f64::EPSILON;
    let to = if single { f64::MAX } else { MOST_F_DOF };
    for found in [d1, d2] {
        let from = LEAST_DOF;
        if !(from..=to).contains(&found) {
            return Err(StatsError::Dof { found, from, to });
        }
    }
    if f.is_infinite() {
        return Ok(0.0);
    }
    if single {
        return student_cdf(-f.sqrt(), Dof::Finite(d2)).map(|tail| 2.0 * tail);
    }
    let ratio = d1 / d2 * f;
    if f < 1.0 {
        // Near 0, `1 / (1 + ratio)` would round to 1. The share above is large here and loses nothing.
        return checked_beta_reg(d1 / 2.0, d2 / 2.0, ratio / (1.0 + ratio))
            .map(|below| 1.0 - below)
            .map_err(|_| StatsError::Argument { found: f });
    }
    checked_beta_reg(d2 / 2.0, d1 / 2.0, 1.0 / (1.0 + ratio))
        .map_err(|_| StatsError::Argument { found: f })
}

/// Chance of at most `k` hits in `n` independent trials, each with the share `p` (0 to 1) of hits.
///
/// # Errors
/// [`StatsError::Share`] for a p outside 0…1, [`StatsError::Trials`] above 100 000 trials.
pub fn binomial_cdf(k: u64, n: u64, p: f64) -> Result<f64, StatsError> {
    if n > MOST_TRIALS {
        return Err(StatsError::Trials {
            found: n,
            most: MOST_TRIALS,
        });
    }
    Binomial::new(p, n)
        .map(|binomial| binomial.cdf(k))
        .map_err(|_| StatsError::Share { found: p })
}

/// A finite argument, or the fault.
pub(super) fn finite(found: f64) -> Result<f64, StatsError> {
    if found.is_finite() {
        Ok(found)
    } else {
        Err(StatsError::Argument { found })
    }
}

fn checked_dof(found: f64) -> Result<f64, StatsError> {
    if found.is_finite() && found >= LEAST_DOF {
        Ok(found)
    } else {
        let (from, to) = (LEAST_DOF, f64::MAX);
        Err(StatsError::Dof { found, from, to })
    }
}

fn student(nu: f64) -> Result<StudentsT, StatsError> {
    StudentsT::new(0.0, 1.0, nu).map_err(|_| StatsError::Dof {
        found: nu,
        from: LEAST_DOF,
        to: SERIES_ABOVE,
    })
}

/// The smaller tail of `p` and the sign its quantile's value is to be given: a lower tail's is negative already.
fn lower_tail(p: f64) -> Result<(f64, f64), StatsError> {
    let (tail, sign) = if p > 0.5 { (1.0 - p, -1.0) } else { (p, 1.0) };
    if (LEAST_TAIL..=0.5).contains(&tail) {
        Ok((tail, sign))
    } else {
        Err(StatsError::Probability { found: p })
    }
}

/// Lets a quantile through only if its cdf is the wanted tail.
fn proven(quantile: f64, wanted: f64, got: f64) -> Result<f64, StatsError> {
    if (got - wanted).abs() <= MISS * wanted {
        Ok(quantile)
    } else {
        Err(StatsError::Missed {
            quantile,
            got,
            wanted,
        })
    }
}

/// t from the normal deviate z of the same share (Handbook of Mathematical Functions 26.7.5, to ν⁻³).
fn large_dof_quantile(z: f64, nu: f64) -> f64 {
    let z2 = z * z;
    let g1 = (z2 + 1.0) * z / 4.0;
    let g2 = ((5.0 * z2 + 16.0) * z2 + 3.0) * z / 96.0;
    let g3 = (((3.0 * z2 + 19.0) * z2 + 17.0) * z2 - 15.0) * z / 384.0;
    z + (g1 + (g2 + g3 / nu) / nu) / nu
}

/// Normal deviate of the same share as t (Algorithm 395, in the sign of t).
fn large_dof_deviate(t: f64, nu: f64) -> f64 {
    let a = nu - 0.5;
    let b = 48.0 * a * a;
    let y = a * (t * t / nu).ln_1p();
    let tail = (((-0.4 * y - 3.3) * y - 24.0) * y - 85.5) / (0.8 * y * y + 100.0 + b);
    ((tail + y + 3.0) / b + 1.0) * y.sqrt() * t.signum()
}

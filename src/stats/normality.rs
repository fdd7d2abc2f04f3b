//! Whether a sample looks normal, and which of its values stand out.

use super::StatsError;
use super::distributions::{Dof, normal_cdf, student_quantile};
use super::sample::{mean, standard_deviation};

/// Fewer values tell nothing about the shape.
pub const FEWEST: usize = 8;
/// Beyond this the normal tail is given by its leading term, or it would be 0 and its logarithm nothing.
const FAR: f64 = 30.0;
/// The fitted p value turns up again far beyond here; what lies beyond has at most the p value of this.
const MOST_STATISTIC: f64 = 10.0;

/// The Anderson–Darling test for a normal population of unknown mean and spread.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Normality {
    /// A².
    pub statistic: f64,
    /// A² corrected for the size of the sample, A²·(1 + 0.75/n + 2.25/n²).
    pub corrected: f64,
    /// Chance of as large a value from a normal population.
    pub p: f64,
}

/// The test; `None` for fewer than eight values or values without spread.
///
/// Source: D'Agostino and Stephens, Goodness-of-Fit Techniques (1986), table 4.9 and its p values; from memory.
///
/// # Errors
/// [`StatsError::Argument`] for a value that is not finite.
pub fn anderson_darling(values: &[f64]) -> Result<Option<Normality>, StatsError> {
    let (Some(centre), Some(sd)) = (mean(values), standard_deviation(values)) else {
        return Ok(None);
    };
    if values.len() < FEWEST || sd <= 0.0 {
        return Ok(None);
    }
    let mut sorted: Vec<f64> = values.iter().map(|value| (value - centre) / sd).collect();
    sorted.sort_by(f64::total_cmp);
    let n = values.len() as f64;
    let mut sum = 0.0;
    for ((place, low), high) in sorted.iter().enumerate().zip(sorted.iter().rev()) {
        sum += (2.0 * place as f64 + 1.0) * (ln_below(*low)? + ln_below(-high)?);
    }
    let statistic = -n - sum / n;
    let corrected = statistic * (1.0 + 0.75 / n + 2.25 / (n * n));
    let p = p_value(corrected.min(MOST_STATISTIC));
    Ok(Some(Normality {
        statistic,
        corrected,
        p,
    }))
}

fn ln_below(z: f64) -> Result<f64, StatsError> {
    if z < -FAR {
        return Ok(-z * z / 2.0 - (-z).ln() - 0.5 * std::f64::consts::TAU.ln());
    }
    normal_cdf(z).map(f64::ln)
}

fn p_value(a: f64) -> f64 {
    if a >= 0.6 {
        (1.2937 - 5.709 * a + 0.0186 * a * a).exp()
    } else if a >= 0.34 {
        (0.9177 - 4.279 * a - 1.38 * a * a).exp()
    } else if a >= 0.2 {
        1.0 - (-8.318 + 42.796 * a - 59.938 * a * a).exp()
    } else {
        1.0 - (-13.436 + 101.14 * a - 223.73 * a * a).exp()
    }
}

/// Grubbs' critical value for the largest departure from the mean in standard deviations, among `n` values, at the
/// one-sided level `alpha`; for either side give half the level.
///
/// (n − 1)/√n·√(t²/(n − 2 + t²)), t the upper alpha/n point of Student's t with n − 2 degrees of freedom.
/// Source: NIST/SEMATECH e-Handbook 1.3.5.17.1.
///
/// # Errors
/// [`StatsError`] as [`student_quantile`]; [`StatsError::Dof`] for fewer than 3 values.
pub fn grubbs_critical(n: usize, alpha: f64) -> Result<f64, StatsError> {
    let count = n as f64;
    if n < 3 {
        let (found, from, to) = (count - 2.0, 1.0, f64::MAX);
        return Err(StatsError::Dof { found, from, to });
    }
    let t = student_quantile(1.0 - alpha / count, Dof::Finite(count - 2.0))?;
    Ok((count - 1.0) / count.sqrt() * (t * t / (count - 2.0 + t * t)).sqrt())
}

/// The place of the value that stands out by Grubbs' test on either side at the level `alpha`; `None` where none does,
/// for fewer than three values, or without spread.
///
/// # Errors
/// As [`grubbs_critical`].
pub fn grubbs_outlier(values: &[f64], alpha: f64) -> Result<Option<usize>, StatsError> {
    let (Some(centre), Some(sd)) = (mean(values), standard_deviation(values)) else {
        return Ok(None);
    };
    if values.len() < 3 || sd <= 0.0 {
        return Ok(None);
    }
    let critical = grubbs_critical(values.len(), alpha / 2.0)?;
    let off = |value: &f64| (value - centre).abs() / sd;
    let farthest = values
        .iter()
        .enumerate()
        .max_by(|a, b| off(a.1).total_cmp(&off(b.1)));
    Ok(farthest
        .filter(|(_, value)| off(value) > critical)
        .map(|(place, _)| place))
}

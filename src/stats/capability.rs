//! Intervals of capability figures and of a standard deviation, from a normal sample.

use super::StatsError;
use super::chi_square::chi_square_quantile;
use super::distributions::normal_quantile;
use super::noncentral::noncentrality;

/// The factors on s between which σ lies at the two-sided `confidence`: √(ν/χ²) at both tails.
///
/// # Errors
/// [`StatsError`] for n under 2 or a confidence outside 0…1.
pub fn spread_factors(n: u64, confidence: f64) -> Result<(f64, f64), StatsError> {
    let nu = n.saturating_sub(1) as f64;
    let tail = (1.0 - confidence) / 2.0;
    let factor = |p: f64| Ok((nu / chi_square_quantile(p, nu)?).sqrt());
    Ok((factor(1.0 - tail)?, factor(tail)?))
}

/// Bounds of Cp (or Pp) found as `found` from `n` values.
///
/// # Errors
/// As [`spread_factors`].
pub fn cp_bounds(found: f64, n: u64, confidence: f64) -> Result<(f64, f64), StatsError> {
    let (least, most) = spread_factors(n, confidence)?;
    Ok((found / most, found / least))
}

/// Bounds of Cpk (or Ppk) found as `found` from `n` values with two limits: found·(1 ± z·√(1/(9n·found²) + 1/(2(n − 1)))).
///
/// Source: Bissell, Applied Statistics 39 (1990) 331; from memory. Where only one limit counts, [`distance_bounds`]
/// is exact.
///
/// # Errors
/// [`StatsError::Probability`] for a confidence outside 0…1.
pub fn cpk_bounds(found: f64, n: u64, confidence: f64) -> Result<(f64, f64), StatsError> {
    let count = n as f64;
    let z = normal_quantile(0.5 + confidence / 2.0)?;
    let reach = z * (1.0 / (9.0 * count) + found * found / (2.0 * (count - 1.0))).sqrt();
    Ok((found - reach, found + reach))
}

/// Bounds of (limit − μ)/σ after the mean of `n` values was found `q` sample standard deviations inside the limit; exact,
/// each bound at the one-sided probability `tail`.
///
/// # Errors
/// [`StatsError`] as [`noncentrality`].
pub fn distance_bounds(q: f64, n: u64, tail: f64) -> Result<(f64, f64), StatsError> {
    let root = (n as f64).sqrt();
    let nu = n.saturating_sub(1) as f64;
    let bound = |p: f64| Ok(noncentrality(p, nu, q * root)? / root);
    Ok((bound(1.0 - tail)?, bound(tail)?))
}

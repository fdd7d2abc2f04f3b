//! Series in which neighbours resemble each other: lag-1 coefficient and what it costs.
//! All factors are for a first-order autoregressive series of coefficient ρ, in the order given.
//! Elsewhere: the uncertainty of a fitted slope (`fit::type_a`).

use super::sample::mean;

/// Largest coefficient returned: at 1 a series has no spread of its own and no effective count.
const MOST: f64 = 0.999;

/// Lag-1 autocorrelation coefficient, Σ(y_i − ȳ)(y_{i+1} − ȳ) / Σ(y_i − ȳ)²; a pure number.
///
/// `None` for fewer than two values, or values without spread.
/// Source: the definition of NIST StRD, univariate data sets.
pub fn lag1(values: &[f64]) -> Option<f64> {
    if values.len() < 2 {
        return None;
    }
    let centre = mean(values)?;
    let squares: f64 = values.iter().map(|value| (value - centre).powi(2)).sum();
    let products: f64 = values
        .iter()
        .zip(values.iter().skip(1))
        .map(|(one, next)| (one - centre) * (next - centre))
        .sum();
    Some(products / squares).filter(|rho| rho.is_finite())
}

/// Lag-1 coefficient of the errors from that of the residuals about a straight line, (nρ̂ + 2)/(n − 4), limited
/// to 0…0.999; `None` for n ≤ 4 or a ρ̂ that is not a number.
///
/// The line takes up part of a slow wander, so that the residuals' coefficient is short of the errors' by
/// (2 + 4ρ)/n on the average: ρ̂ = ρ − (2 + 4ρ)/n, solved for ρ. A negative coefficient would promise a better
/// slope than independent errors and is mostly chance: 0. Above 0.999 nothing can be told from a drift.
/// Source: bias to the order 1/n as for the mean and trend of an AR(1) series; checked by the coverage simulation.
pub fn corrected_lag1(rho: f64, n: usize) -> Option<f64> {
    if n <= 4 || rho.is_nan() {
        return None;
    }
    let n = n as f64;
    Some(((n * rho + 2.0) / (n - 4.0)).clamp(0.0, MOST))
}

/// Factor by which AR(1) errors raise the variance of a least-squares slope over the abscissae `x`, taken in
/// their order: ΣΣ c_i c_j ρ^|i−j| / Σc², c = x − x̄. 1 for ρ = 0.
///
/// Exact for any spacing, in one pass. The usual (1 + ρ)/(1 − ρ) overstates it for a short series.
/// `None` for abscissae without spread.
pub fn slope_inflation(x: &[f64], rho: f64) -> Option<f64> {
    let centre = mean(x)?;
    let squares: f64 = x.iter().map(|x| (x - centre).powi(2)).sum();
    let sum = lagged_sum(x.iter().map(|x| x - centre), rho);
    Some(sum / squares).filter(|factor| factor.is_finite())
}

/// Factor by which AR(1) errors raise the variance of the mean of `n` values, 1 + 2Σ(1 − k/n)ρ^k; `None` for n = 0.
pub fn mean_inflation(n: usize, rho: f64) -> Option<f64> {
    let sum = lagged_sum(std::iter::repeat_n(1.0, n), rho);
    Some(sum / n as f64).filter(|factor| factor.is_finite())
}

/// Number of independent values that `n` values of coefficient ρ are worth, n(1 − ρ)/(1 + ρ): the limit for a
/// long series.
pub fn effective_n(n: usize, rho: f64) -> f64 {
    n as f64 * (1.0 - rho) / (1.0 + rho)
}

/// ΣΣ c_i c_j ρ^|i−j| in O(n): what precedes c_i enters as one number, ρ·(what preceded the one before + it).
fn lagged_sum(weights: impl Iterator<Item = f64>, rho: f64) -> f64 {
    let mut before = 0.0;
    let mut sum = 0.0;
    for weight in weights {
        sum += weight * (weight + 2.0 * before);
        before = rho * (before + weight);
    }
    sum
}

//! χ², by the incomplete gamma function of `statrs` and a root of our own, because its quantile fails at extremes.

use statrs::function::gamma::{checked_gamma_lr, checked_gamma_ur};

use super::StatsError;
use super::numeric::root;

/// Degrees of freedom that the incomplete gamma function of `statrs` was held against oracles for.
const DOF: (f64, f64) = (1.0, 1e5);

/// Share of χ² of `nu` degrees of freedom above `x`.
///
/// # Errors
/// [`StatsError::Dof`] for ν outside 1 … 100 000, [`StatsError::Argument`] for an x that is negative or no number.
pub fn chi_square_upper(x: f64, nu: f64) -> Result<f64, StatsError> {
    let (from, to) = DOF;
    if !(from..=to).contains(&nu) {
        let found = nu;
        return Err(StatsError::Dof { found, from, to });
    }
    if x.is_nan() || x < 0.0 {
        return Err(StatsError::Argument { found: x });
    }
    if x == 0.0 {
        return Ok(1.0);
    }
    if x.is_infinite() {
        return Ok(0.0);
    }
    let (a, half) = (nu / 2.0, x / 2.0);
    let found = if half > a {
        checked_gamma_ur(a, half)
    } else {
        checked_gamma_lr(a, half).map(|below| 1.0 - below)
    };
    found.map_err(|_| StatsError::Argument { found: x })
}

/// The x that a share `p` of χ² lies below.
///
/// # Errors
/// [`StatsError::Probability`] for a p outside 0…1 or a tail under 1e-9, [`StatsError::Dof`] as above.
pub fn chi_square_quantile(p: f64, nu: f64) -> Result<f64, StatsError> {
    if !(1e-9..=1.0 - 1e-9).contains(&p) {
        return Err(StatsError::Probability { found: p });
    }
    // 7 standard deviations of a normal tail, and room for the skewness of few degrees of freedom
    let high = nu + 7.0 * (2.0 * nu).sqrt() + 50.0;
    root(0.0, high, |x| {
        chi_square_upper(x, nu).map(|above| (1.0 - p) - above)
    })
}

//! Non-central Student's t, which `statrs` does not have.
//! Elsewhere: what it decides (`tolerance`, `sampling::design`), its oracles (`tests/it/stats_published.rs`).

use statrs::function::gamma::ln_gamma;

use super::distributions::{normal_cdf, normal_quantile};
use super::numeric::{integral, root};
use super::{StatsError, proper};

/// Degrees of freedom from and to which the integral below was held against oracles.
const DOF: (f64, f64) = (1.0, 1e5);
/// Standard deviations of s about 1 beyond which nothing is left (the density falls as a normal one at least).
const REACH: f64 = 9.0;
/// Widths of the step of Φ(t·s − δ) on either side of its middle.
const STEP: f64 = 8.5;
/// Panels of 16 points on each of at most four stretches.
const PANELS: u32 = 10;
/// From here on ln Γ(a) is a power series in 1/a, whose next term is under 1e-14.
const SERIES_FROM: f64 = 50.0;

/// Share below `t` of the non-central t of `nu` degrees of freedom and non-centrality `delta`; within 1e-11.
///
/// T = (Z + δ)/S with S = √(χ²_ν/ν): P(T ≤ t) = ∫ Φ(t·s − δ) f(s) ds. Both factors are smooth; the stretch is cut where
/// the step of Φ lies, so that neither a narrow step nor a narrow f is passed over. The usual series of incomplete beta
/// terms starts from exp(−δ²/2), which is 0 for δ above 38: 300 springs at k 2.3 are beyond that.
///
/// # Errors
/// [`StatsError::Dof`] for ν outside 1 … 100 000, [`StatsError::Argument`] for a t or δ that is no finite number.
pub fn noncentral_cdf(t: f64, nu: f64, delta: f64) -> Result<f64, StatsError> {
    let (from, to) = DOF;
    if !(from..=to).contains(&nu) {
        let found = nu;
        return Err(StatsError::Dof { found, from, to });
    }
    let (t, delta) = (proper(t)?, proper(delta)?);
    let spread = (0.5 / nu).sqrt();
    let (low, high) = (
        (1.0 - REACH * spread).max(0.0),
        1.0 + REACH * spread.max(0.1),
    );
    let constant = ln_constant(nu);
    let density = |s: f64| {
        let h = s - 1.0;
        (constant + (nu - 1.0) * s.ln() - nu * (h + h * h / 2.0)).exp()
    };
    let value = |s: f64| normal_cdf(t * s - delta).unwrap_or(0.0) * density(s);
    let mut cuts = vec![low, 1.0, high];
    if t != 0.0 {
        let middle = delta / t;
        let reach = STEP / t.abs();
        cuts.extend([middle - reach, middle, middle + reach]);
    }
    cuts.retain(|cut| (low..=high).contains(cut));
    cuts.sort_by(f64::total_cmp);
    let stretches = cuts.iter().zip(cuts.iter().skip(1));
    let sum: f64 = stretches
        .filter(|(a, b)| b > a)
        .map(|(a, b)| integral(*a, *b, PANELS, value))
        .sum();
    Ok(sum.clamp(0.0, 1.0))
}

/// ln of the constant of the density of S, with e^(−ν/2) taken out: ln 2 + (ν/2)·ln(ν/2) − ln Γ(ν/2) − ν/2.
fn ln_constant(nu: f64) -> f64 {
    let a = nu / 2.0;
    if a < SERIES_FROM {
        return std::f64::consts::LN_2 + a * a.ln() - ln_gamma(a) - a;
    }
    // Stirling; the large terms have cancelled
    let rest = (1.0 / 12.0 - (1.0 / 360.0 - 1.0 / (1260.0 * a * a)) / (a * a)) / a;
    std::f64::consts::LN_2 + 0.5 * (a / std::f64::consts::TAU).ln() - rest
}

/// The t that a share `p` of the non-central t lies below.
///
/// # Errors
/// [`StatsError::Probability`] for a p outside 0…1 or a tail under 1e-9, and as [`noncentral_cdf`].
pub fn noncentral_quantile(p: f64, nu: f64, delta: f64) -> Result<f64, StatsError> {
    if !(1e-9..=1.0 - 1e-9).contains(&p) {
        return Err(StatsError::Probability { found: p });
    }
    let off = |t: f64| noncentral_cdf(t, nu, delta).map(|share| share - p);
    let start = delta + normal_quantile(p)? * (1.0 + delta * delta / (2.0 * nu)).sqrt();
    let (low, high) = around(start, off)?;
    root(low, high, off)
}

/// The non-centrality δ at which a share `p` lies below `t`: the confidence bound of δ that an observed t gives.
///
/// # Errors
/// As [`noncentral_quantile`].
pub fn noncentrality(p: f64, nu: f64, t: f64) -> Result<f64, StatsError> {
    if !(1e-9..=1.0 - 1e-9).contains(&p) {
        return Err(StatsError::Probability { found: p });
    }
    // falls with δ
    let off = |delta: f64| noncentral_cdf(t, nu, delta).map(|share| p - share);
    let start = proper(t)? - normal_quantile(p)? * (1.0 + t * t / (2.0 * nu)).sqrt();
    let (low, high) = around(start, off)?;
    root(low, high, off)
}

/// Two places about `start` between which the rising `off` crosses zero.
fn around(
    start: f64,
    off: impl Fn(f64) -> Result<f64, StatsError>,
) -> Result<(f64, f64), StatsError> {
    let mut step = 0.5 + start.abs() * 0.1;
    let (mut low, mut high) = (start - step, start + step);
    for _ in 0..200 {
        let (below, above) = (off(low)? < 0.0, off(high)? > 0.0);
        if below && above {
            return Ok((low, high));
        }
        step *= 2.0;
        if !below {
            low -= step;
        }
        if !above {
            high += step;
        }
    }
    Err(StatsError::NoRoot { low, high })
}

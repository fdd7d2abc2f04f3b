//! Exact factors of normal tolerance intervals: mean ± k·s holds at least a share of the population at a confidence.

use super::StatsError;
use super::chi_square::chi_square_upper;
use super::distributions::{normal_cdf, normal_quantile};
use super::noncentral::noncentral_quantile;
use super::numeric::{root, rule};

/// Standard deviations of the mean beyond which nothing is left.
const REACH: f64 = 8.5;

fn shares(content: f64, confidence: f64) -> Result<(), StatsError> {
    for found in [content, confidence] {
        if !(0.5..1.0).contains(&found) {
            return Err(StatsError::Probability { found });
        }
    }
    Ok(())
}

fn freedom(n: u64) -> Result<(f64, f64), StatsError> {
    let count = n as f64;
    if n < 2 {
        let (from, to) = (1.0, 1e5);
        let found = count - 1.0;
        return Err(StatsError::Dof { found, from, to });
    }
    Ok((count, count - 1.0))
}

/// k of the one-sided interval of a sample of `n`: a share `content` lies below mean + k·s with this `confidence`.
///
/// Source: exact, by the non-central t: t(confidence; n − 1, √n·z)/√n.
///
/// # Errors
/// [`StatsError::Probability`] for shares outside 0.5 … 1, [`StatsError::Dof`] for n under 2.
pub fn one_sided_factor(n: u64, content: f64, confidence: f64) -> Result<f64, StatsError> {
    shares(content, confidence)?;
    let (count, nu) = freedom(n)?;
    let delta = count.sqrt() * normal_quantile(content)?;
    Ok(noncentral_quantile(confidence, nu, delta)? / count.sqrt())
}

/// k of the two-sided interval: a share `content` lies within mean ± k·s with this `confidence`.
///
/// Source: exact, the root in k of 2·√(n/2π)·∫₀^∞ P(χ²_ν ≥ ν·R²/k²)·exp(−n·z²/2) dz = confidence, with R(z) from
/// Φ(z + R) − Φ(z − R) = content; ISO 16269-6, from memory. Howe's and Wald and Wolfowitz' factors are approximations.
///
/// # Errors
/// As [`one_sided_factor`].
pub fn two_sided_factor(n: u64, content: f64, confidence: f64) -> Result<f64, StatsError> {
    shares(content, confidence)?;
    let (count, nu) = freedom(n)?;
    let scale = 2.0 * (count / std::f64::consts::TAU).sqrt();
    let mut nodes = Vec::new();
    for (z, weight) in rule(0.0, REACH / count.sqrt(), 6) {
        let radius = half_width(z, content)?;
        nodes.push((
            radius * radius * nu,
            scale * weight * (-count * z * z / 2.0).exp(),
        ));
    }
    let off = |k: f64| {
        let mut held = -confidence;
        for (squared, weight) in &nodes {
            held += weight * chi_square_upper(squared / (k * k), nu)?;
        }
        Ok(held)
    };
    let least = normal_quantile(0.5 + content / 2.0)? * 0.9;
    let mut most = least * 2.0;
    while off(most)? < 0.0 {
        most *= 2.0;
        if most > 1e6 {
            let (low, high) = (least, most);
            return Err(StatsError::NoRoot { low, high });
        }
    }
    root(least, most, off)
}

/// R with Φ(z + R) − Φ(z − R) = content.
fn half_width(z: f64, content: f64) -> Result<f64, StatsError> {
    let high = z + normal_quantile(0.5 + content / 2.0)? + 1.0;
    root(0.0, high, |radius| {
        Ok(normal_cdf(z + radius)? - normal_cdf(z - radius)? - content)
    })
}

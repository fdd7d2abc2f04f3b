//! Plans by variables designed from two points of the operating characteristic, by the exact non-central t.

use super::mil_std_414::{VariablesPlan, most_share};
use super::{PlanError, zero_accept::checked_share};
use crate::stats::{noncentral_cdf, noncentral_quantile, normal_quantile};

/// More springs than anyone measures; also where the non-central t was proven.
const MOST: u64 = 20_000;
/// Fewest springs of a plan: two limits need the estimator, which needs three.
const LEAST: u64 = 3;

/// Two points of the operating characteristic, shares 0 to 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Points {
    /// Quality that is to be accepted with chance 1 − `alpha`.
    pub p1: f64,
    /// Producer's risk.
    pub alpha: f64,
    /// Quality that is to be accepted with chance `beta` at most.
    pub p2: f64,
    /// Consumer's risk.
    pub beta: f64,
}

/// A designed plan and what it does at its two points.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Designed {
    /// The plan; its k meets alpha exactly.
    pub plan: VariablesPlan,
    /// The k that would meet beta exactly: any k between serves.
    pub least_k: f64,
    /// Chance of acceptance at p2.
    pub accepted_at_p2: f64,
}

/// The smallest plan that keeps both risks.
///
/// P(accept | p) = P(T ≥ k·√n), T non-central with n − 1 degrees of freedom and δ = √n·z(1 − p).
///
/// # Errors
/// [`PlanError`] for points that are no shares, reversed, or beyond 20 000 springs.
pub fn designed(points: Points) -> Result<Designed, PlanError> {
    let Points {
        p1,
        alpha,
        p2,
        beta,
    } = points;
    let named = [("p1", p1), ("alpha", alpha), ("p2", p2), ("beta", beta)];
    for (what, share) in named {
        checked_share(what, share)?;
    }
    if p1 >= p2 {
        let (p1, p2) = (100.0 * p1, 100.0 * p2);
        return Err(PlanError::PointsReversed { p1, p2 });
    }
    if alpha + beta >= 1.0 {
        let (alpha, beta) = (100.0 * alpha, 100.0 * beta);
        return Err(PlanError::RisksTooLarge { alpha, beta });
    }
    let keeps = |n| Ok::<_, PlanError>(at(n, points)?.accepted_at_p2 <= beta);
    let mut high = LEAST;
    while !keeps(high)? {
        if high >= MOST {
            return Err(PlanError::TooMany { most: MOST });
        }
        high = (2 * high).min(MOST);
    }
    let mut low = LEAST - 1;
    while high - low > 1 {
        let middle = low.midpoint(high);
        if keeps(middle)? {
            high = middle;
        } else {
            low = middle;
        }
    }
    at(high, points)
}

/// The plan of `n` springs that meets alpha exactly.
fn at(n: u64, points: Points) -> Result<Designed, PlanError> {
    let root = (n as f64).sqrt();
    let nu = n as f64 - 1.0;
    let delta = |p: f64| Ok::<_, PlanError>(root * normal_quantile(1.0 - p)?);
    let k = noncentral_quantile(points.alpha, nu, delta(points.p1)?)? / root;
    let least_k = noncentral_quantile(1.0 - points.beta, nu, delta(points.p2)?)? / root;
    let accepted_at_p2 = 1.0 - noncentral_cdf(k * root, nu, delta(points.p2)?)?;
    let plan = VariablesPlan {
        letters: None,
        sample_size: n,
        k,
        most: most_share(n, k)?,
    };
    Ok(Designed {
        plan,
        least_k,
        accepted_at_p2,
    })
}

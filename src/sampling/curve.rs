//! Operating characteristics: the chance that a lot of a quality is accepted, rejected or left undecided, also with the
//! bench's uncertainty. Model: one limit, springs normal about a mean that puts the share p beyond it.

use super::PlanError;
use super::mil_std_414::VariablesPlan;
use crate::stats::{binomial_cdf, noncentral_cdf, normal_cdf, normal_quantile};

/// Factor of the guard band and of the common shifts: the one-sided 95 % point of the normal distribution.
const PROOF: f64 = 1.644_853_626_951_472_2;
/// Standard deviations of the common error that are integrated over, and steps across them.
const REACH: f64 = 6.0;
const STEPS: u32 = 120;

/// What a lot of one quality may expect; the three add up to 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Chances {
    /// Chance of acceptance.
    pub accepted: f64,
    /// Chance of rejection.
    pub rejected: f64,
    /// Chance that the bench leaves the lot undecided.
    pub undecided: f64,
}

/// The bench in units of the springs' standard deviation; both 0 for a bench without uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bench {
    /// Own standard uncertainty of a value.
    pub own: f64,
    /// Common standard uncertainty.
    pub common: f64,
}

/// A plan by attributes: springs, Ac and Re.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Counted {
    /// Springs measured.
    pub sample_size: u64,
    /// Ac.
    pub accept: u64,
    /// Re.
    pub reject: u64,
}

/// A plan by variables as it is carried out on a bench.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Measured {
    /// Springs measured, raised for the bench's own scatter.
    pub sample_size: u64,
    /// Acceptance constant.
    pub k: f64,
}

impl Measured {
    /// `plan` on `bench`: where the own uncertainty exceeds 0.1 of the springs' standard deviation, n grows by
    /// 1 + (own/σ)².
    pub fn on(plan: &VariablesPlan, bench: Bench) -> Self {
        let raised = if bench.own > super::mil_std_414::FREE_OF_SCATTER {
            plan.raised(bench.own)
        } else {
            plan.sample_size
        };
        Self {
            sample_size: raised,
            k: plan.k,
        }
    }
}

/// The chances of a stream of lots of the share `p` nonconforming under a plan by attributes and the guarded rule, with
/// undecided springs left as they are.
///
/// # Errors
/// [`PlanError::Statistics`] for a p outside 0…1.
pub fn attributes_chances(plan: Counted, bench: Bench, p: f64) -> Result<Chances, PlanError> {
    let spread = 1.0_f64.hypot(bench.own);
    let guard = PROOF * bench.own.hypot(bench.common);
    let given = |failing: f64, perhaps: f64| {
        let accepted = binomial_cdf(plan.accept, plan.sample_size, failing + perhaps)?;
        let rejected = if plan.reject == 0 {
            1.0
        } else {
            1.0 - binomial_cdf(plan.reject - 1, plan.sample_size, failing)?
        };
        Ok::<_, PlanError>((accepted, rejected))
    };
    if bench.own <= 0.0 && bench.common <= 0.0 {
        return given(p, 0.0).map(chances);
    }
    if p <= 0.0 || p >= 1.0 {
        // the model's mean lies infinitely far off
        return given(p, 0.0).map(chances);
    }
    let inside = normal_quantile(1.0 - p)?;
    over_common(bench.common, |shift| {
        let failing = normal_cdf((shift - inside - guard) / spread)?;
        let not_conforming = normal_cdf((shift - inside + guard) / spread)?;
        given(failing, (not_conforming - failing).max(0.0))
    })
}

/// The chances under a plan by variables for one limit, decided only where both shifts of ±1.645 common uncertainties agree.
///
/// # Errors
/// [`PlanError::Statistics`] for a p outside 0…1 or a sample beyond the non-central t.
pub fn variables_chances(plan: Measured, bench: Bench, p: f64) -> Result<Chances, PlanError> {
    if p <= 0.0 {
        return Ok(chances((1.0, 0.0)));
    }
    if p >= 1.0 {
        return Ok(chances((0.0, 1.0)));
    }
    let spread = 1.0_f64.hypot(bench.own);
    let root = (plan.sample_size as f64).sqrt();
    let nu = plan.sample_size as f64 - 1.0;
    let inside = normal_quantile(1.0 - p)?;
    let accepted = |shift: f64| {
        let delta = root * (inside - shift) / spread;
        Ok::<_, PlanError>(1.0 - noncentral_cdf(plan.k * root, nu, delta)?)
    };
    let reach = PROOF * bench.common;
    over_common(bench.common, |shift| {
        Ok((accepted(shift + reach)?, 1.0 - accepted(shift - reach)?))
    })
}

/// The mean of two chances over a normal common error of this standard deviation (trapezia: exact to all digits for a
/// smooth function under a normal weight).
fn over_common(
    common: f64,
    of: impl Fn(f64) -> Result<(f64, f64), PlanError>,
) -> Result<Chances, PlanError> {
    if common <= 0.0 {
        return of(0.0).map(chances);
    }
    let step = 2.0 * REACH / f64::from(STEPS);
    let (mut sum, mut total) = ((0.0, 0.0), 0.0);
    for place in 0..=STEPS {
        let z = step * f64::from(place) - REACH;
        let weight = (-z * z / 2.0).exp();
        let (accepted, rejected) = of(z * common)?;
        sum = (sum.0 + weight * accepted, sum.1 + weight * rejected);
        total += weight;
    }
    Ok(chances((sum.0 / total, sum.1 / total)))
}

fn chances((accepted, rejected): (f64, f64)) -> Chances {
    Chances {
        accepted,
        rejected,
        undecided: (1.0 - accepted - rejected).max(0.0),
    }
}

//! One characteristic against its limits.

use crate::characteristic::{Estimate, Measured, Uncertainty};
use crate::drawing::{Guard, Limits, Rule};
use crate::stats::{StatsError, student_cdf, student_quantile};
use crate::units::Millimetres;

use super::reason::{Reason, Verdict};

/// Probability of conformance (or of failure) that counts as proof: ISO 14253-1:2017 (from memory).
const PROOF: f64 = 0.95;

/// A characteristic judged. The limits of proof are those at this value's uncertainty.
#[derive(Clone, Debug, PartialEq)]
pub struct Judged {
    /// The verdict under the drawing's rule.
    pub verdict: Verdict,
    /// What the value against the limits as drawn would say; `Undecided` without a value.
    pub simple: Verdict,
    /// Why, where it does not plainly conform.
    pub reason: Option<Reason>,
    /// Half-width of the guard band; 0 under simple acceptance.
    pub guard: Option<f64>,
    /// Probability that the true value lies inside the limits, flat prior, 0 … 1.
    pub probability: Option<f64>,
}

/// Judges one characteristic.
///
/// `guarded`: with g = t₀.₉₅(ν)·u (or U), conforms if TL + g ≤ y ≤ TU − g, fails if y < TL − g or y > TU + g, else
/// undecided. `simple`: y against TL and TU.
///
/// # Errors
/// [`StatsError`] where a quantile cannot be had.
pub fn judge(
    measured: &Measured,
    limits: &Limits,
    rule: Rule,
    guard: Guard,
) -> Result<Judged, StatsError> {
    match measured {
        Measured::Absent(why) => Ok(undecided(why.into())),
        Measured::Below(bound) => below(bound, limits, rule, guard),
        Measured::Value(estimate) => value(estimate, limits, rule, guard),
    }
}

const fn undecided(reason: Reason) -> Judged {
    Judged {
        verdict: Verdict::Undecided,
        simple: Verdict::Undecided,
        reason: Some(reason),
        guard: None,
        probability: None,
    }
}

fn width(uncertainty: &Uncertainty, guard: Guard) -> Result<f64, StatsError> {
    match guard {
        Guard::T95 => Ok(student_quantile(PROOF, uncertainty.dof)? * uncertainty.standard),
        Guard::U => Ok(uncertainty.expanded),
    }
}

fn value(
    estimate: &Estimate,
    limits: &Limits,
    rule: Rule,
    guard: Guard,
) -> Result<Judged, StatsError> {
    let y = estimate.value;
    let (simple, plain_reason) = against(y, limits, 0.0);
    let probability = estimate
        .uncertainty
        .as_ref()
        .map(|u| probability(y, u, limits))
        .transpose()?;
    if rule == Rule::Simple {
        return Ok(Judged {
            verdict: simple,
            simple,
            reason: plain_reason,
            guard: Some(0.0),
            probability,
        });
    }
    let Some(uncertainty) = &estimate.uncertainty else {
        return Ok(Judged {
            simple,
            ..undecided(Reason::UncertaintyUnknown)
        });
    };
    let g = width(uncertainty, guard)?;
    let (verdict, mut reason) = against(y, limits, g);
    let meets = limits
        .lower
        .zip(limits.upper)
        .is_some_and(|(lower, upper)| 2.0 * g >= upper - lower);
    if verdict == Verdict::Undecided && meets {
        reason = Some(Reason::GuardBandsMeet);
    }
    Ok(Judged {
        verdict,
        simple,
        reason,
        guard: Some(g),
        probability,
    })
}

/// `y` against limits with a guard band of `g` on either side of each.
fn against(y: f64, limits: &Limits, g: f64) -> (Verdict, Option<Reason>) {
    if limits.lower.is_some_and(|lower| y < lower - g) {
        return (Verdict::Fails, Some(Reason::BelowLower));
    }
    if limits.upper.is_some_and(|upper| y > upper + g) {
        return (Verdict::Fails, Some(Reason::AboveUpper));
    }
    if limits.lower.is_some_and(|lower| y < lower + g) {
        return (Verdict::Undecided, Some(Reason::LowerWithinUncertainty));
    }
    if limits.upper.is_some_and(|upper| y > upper - g) {
        return (Verdict::Undecided, Some(Reason::UpperWithinUncertainty));
    }
    (Verdict::Conforms, None)
}

/// T_ν((TU − y)/u) − T_ν((TL − y)/u), 1 or 0 for a missing limit or no uncertainty.
fn probability(y: f64, uncertainty: &Uncertainty, limits: &Limits) -> Result<f64, StatsError> {
    let below = |limit: f64| {
        if uncertainty.standard > 0.0 {
            student_cdf((limit - y) / uncertainty.standard, uncertainty.dof)
        } else {
            Ok(if y <= limit { 1.0 } else { 0.0 })
        }
    };
    let upper = limits.upper.map_or(Ok(1.0), below)?;
    let lower = limits.lower.map_or(Ok(0.0), below)?;
    Ok((upper - lower).clamp(0.0, 1.0))
}

/// The true value lies below `bound`: that proves a maximum if bound + g is within it, and the failing of a minimum
/// if bound + g is below it; nothing else.
fn below(
    bound: &Estimate,
    limits: &Limits,
    rule: Rule,
    guard: Guard,
) -> Result<Judged, StatsError> {
    let g = match (rule, &bound.uncertainty) {
        (Rule::Guarded, Some(uncertainty)) => width(uncertainty, guard)?,
        _ => 0.0,
    };
    let shortest_mm = Millimetres::try_from(bound.value).unwrap_or(Millimetres::ZERO);
    let under = |limit: Option<f64>| limit.is_some_and(|limit| bound.value + g <= limit);
    let (verdict, reason) = if under(limits.lower) {
        (Verdict::Fails, Reason::BelowLower)
    } else if limits.lower.is_none() && under(limits.upper) {
        (
            Verdict::Conforms,
            Reason::SolidBelowShortest { shortest_mm },
        )
    } else {
        (Verdict::Undecided, Reason::SolidNotReached { shortest_mm })
    };
    Ok(Judged {
        verdict,
        simple: verdict,
        reason: Some(reason),
        guard: None,
        probability: None,
    })
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use crate::characteristic::{Line, Part};
    use approx::assert_abs_diff_eq;

    fn judged(y: f64, u: f64, lower: Option<f64>, upper: Option<f64>) -> Judged {
        let estimate = Estimate::new(y, vec![Line::new("u", Part::Own, u)]).unwrap();
        let limits = Limits {
            nominal: None,
            lower,
            upper,
        };
        judge(
            &Measured::Value(estimate),
            &limits,
            Rule::Guarded,
            Guard::T95,
        )
        .unwrap()
    }

    /// JCGM 106:2012, examples of breakdown voltage (limit −5.40, y −5.47, u 0.05: 0.92) and burst strength
    /// (limit 490, y 509.7, u 8.6: 0.99); from memory.
    #[test]
    fn conformance_probabilities_of_jcgm_106() {
        let rows = [
            (-5.47, 0.05, None, Some(-5.40), 0.92),
            (509.7, 8.6, Some(490.0), None, 0.99),
        ];
        for (y, u, lower, upper, printed) in rows {
            assert_abs_diff_eq!(
                judged(y, u, lower, upper).probability.unwrap(),
                printed,
                epsilon = 0.005
            );
        }
    }

    /// JCGM 106:2012: at an acceptance limit one guard band of 1.645 u inside, conformance is 95 % sure (from memory).
    #[test]
    fn at_the_acceptance_limit_conformance_is_95_percent_sure() {
        let g = judged(0.0, 0.1, None, Some(1.0)).guard.unwrap();
        assert_abs_diff_eq!(g, 0.164_485, epsilon = 1e-6);
        let at = judged(1.0 - g, 0.1, None, Some(1.0));
        assert_abs_diff_eq!(at.probability.unwrap(), 0.95, epsilon = 1e-9);
        assert_eq!(
            judged(1.0 - g - 1e-9, 0.1, None, Some(1.0)).verdict,
            Verdict::Conforms
        );
        assert_eq!(
            judged(1.0 - g + 1e-9, 0.1, None, Some(1.0)).verdict,
            Verdict::Undecided
        );
        assert_eq!(
            judged(1.0 + g - 1e-9, 0.1, None, Some(1.0)).verdict,
            Verdict::Undecided
        );
        assert_eq!(
            judged(1.0 + g + 1e-9, 0.1, None, Some(1.0)).verdict,
            Verdict::Fails
        );
    }

    #[test]
    fn a_bench_too_coarse_proves_no_conformance_but_still_a_gross_failure() {
        let middle = judged(0.0, 1.0, Some(-1.0), Some(1.0));
        assert_eq!(
            (middle.verdict, middle.reason),
            (Verdict::Undecided, Some(Reason::GuardBandsMeet))
        );
        assert_eq!(
            judged(5.0, 1.0, Some(-1.0), Some(1.0)).verdict,
            Verdict::Fails
        );
    }

    #[test]
    fn a_length_not_reached_proves_only_a_maximum() {
        let bound =
            || Measured::Below(Estimate::new(27.0, vec![Line::new("u", Part::Own, 0.1)]).unwrap());
        let verdict = |lower, upper| {
            let limits = Limits {
                nominal: None,
                lower,
                upper,
            };
            judge(&bound(), &limits, Rule::Guarded, Guard::T95)
                .unwrap()
                .verdict
        };
        assert_eq!(verdict(None, Some(28.0)), Verdict::Conforms);
        assert_eq!(verdict(None, Some(27.1)), Verdict::Undecided);
        assert_eq!(verdict(None, Some(26.0)), Verdict::Undecided);
        assert_eq!(verdict(Some(28.0), None), Verdict::Fails);
        assert_eq!(verdict(Some(26.0), Some(28.0)), Verdict::Undecided);
    }
}

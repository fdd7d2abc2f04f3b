//! The marginal likelihood of the findings under each cause, and what it supports.

use super::findings::{Compared, Findings};
use super::integrate;
use super::matrix::{Factor, dot};
use super::models::{Cause, Suspect, change, model_error};
use super::sights::ln_chance;
use super::{CauseError, Change, Form, Measure};
use crate::stats::normal_cdf;

/// Ratio of supports below which neither of two causes is preferred.
pub const NO_PREFERENCE: f64 = 3.0;
/// Prior weight of a cause together with permanent set, as a share of the cause alone; judgement.
const PAIR: f64 = 0.1;
/// Spread of "none of these", in spreads of an unchanged spring.
const WIDE: f64 = 10.0;
/// Largest set, as a share of the free length; the bound of permanent set alone.
const LARGEST_SET: f64 = 0.15;

/// One cause, weighed.
#[derive(Clone, Debug, PartialEq)]
pub struct Support {
    /// Which.
    pub cause: Cause,
    /// Whether permanent set is a second cause beside it.
    pub with_set: bool,
    /// Prior weight, pairs included.
    pub prior: f64,
    /// Share of all support; never a probability.
    pub support: f64,
    /// ln of the marginal likelihood of changes and sights.
    pub ln_likelihood: f64,
    /// The part of it that the sights gave.
    pub ln_sights: f64,
    /// The severity that fits best with its standard deviation, where it has one.
    pub severity: Option<(f64, f64)>,
    /// What it would change at that severity.
    pub predicted: Change,
    /// Per compared finding: the change left over, in standard uncertainties of that finding.
    pub left: Vec<(Measure, f64)>,
}

/// All causes, the best supported first.
#[derive(Clone, Debug, PartialEq)]
pub struct Weighing {
    /// Their supports, which sum to one.
    pub supports: Vec<Support>,
}

impl Weighing {
    /// The best supported cause; whether it stands out is for the bars to say.
    pub fn leader(&self) -> Option<&Support> {
        self.supports.first()
    }
}

/// Weighs `suspects` by what was found on a spring that was of `form`.
///
/// # Errors
/// [`CauseError::Covariance`] where the findings' covariance is none.
pub fn weigh(
    form: &Form,
    suspects: &[Suspect],
    findings: &Findings,
) -> Result<Weighing, CauseError> {
    let covariance = findings.covariance();
    Factor::of(&covariance).ok_or(CauseError::Covariance)?;
    let scale = Scale {
        form,
        findings,
        covariance,
    };
    let mut supports = Vec::new();
    for suspect in suspects {
        supports.push(scale.support(suspect, false));
        if suspect.cause.pairs_with_set() && scale.adds_to_set(suspect) {
            supports.push(scale.support(suspect, true));
        }
    }
    let total: f64 = supports.iter().map(|one| one.prior).sum();
    let top = supports
        .iter()
        .map(|one| one.ln_likelihood)
        .fold(f64::NEG_INFINITY, f64::max);
    let weight = |one: &Support| one.prior * (one.ln_likelihood - top).exp();
    let sum: f64 = supports.iter().map(weight).sum();
    if !(sum.is_finite() && sum > 0.0) {
        return Err(CauseError::Covariance);
    }
    for one in &mut supports {
        one.support = weight(one) / sum;
        one.prior /= total;
    }
    supports.sort_by(|a, b| b.support.total_cmp(&a.support));
    Ok(Weighing { supports })
}

/// Standard deviations from which the tail is taken from its limiting form, right to 1/20².
const FAR: f64 = 20.0;

struct Scale<'a> {
    form: &'a Form,
    findings: &'a Findings,
    covariance: Vec<Vec<f64>>,
}

impl Scale<'_> {
    /// Whether the findings could tell the cause with a set from the set alone: a length was compared, and something
    /// besides that the cause changes.
    fn adds_to_set(&self, suspect: &Suspect) -> bool {
        let length =
            |one: &Compared| matches!(one.measure, Measure::FreeLength | Measure::GaugeLength);
        let severity = suspect.severity.into_iter();
        let mut changes: Vec<Change> = severity
            .map(|severity| change(suspect.cause, self.form, severity.to))
            .collect();
        changes.extend(suspect.fixed.iter().cloned());
        let shows = |one: &Compared| {
            !length(one)
                && changes
                    .iter()
                    .any(|change| change.get(one.measure).abs() > 0.0)
        };
        let compared = self.findings.compared();
        compared.iter().any(length) && compared.iter().any(shows)
    }

    fn support(&self, suspect: &Suspect, with_set: bool) -> Support {
        let cause = suspect.cause;
        let (ln_changes, severity, predicted) = self.changes(suspect, with_set);
        let ln_sights = ln_chance(cause, self.findings.sights());
        let compared = self.findings.compared().iter();
        let left = compared.map(|one| {
            let rest = one.change - predicted.get(one.measure);
            (one.measure, rest / self.findings.uncertainty(one))
        });
        Support {
            cause,
            with_set,
            prior: suspect.weight * if with_set { PAIR } else { 1.0 },
            support: 0.0,
            ln_likelihood: ln_changes + ln_sights,
            ln_sights,
            severity,
            left: left.collect(),
            predicted,
        }
    }

    fn changes(&self, suspect: &Suspect, with_set: bool) -> (f64, Option<(f64, f64)>, Change) {
        let cause = suspect.cause;
        if cause == Cause::NoneOfThese {
            return (self.ln_none(), None, Change::default());
        }
        let Some(severity) = suspect.severity else {
            let each = suspect
                .fixed
                .iter()
                .map(|change| (self.ln_density(cause, change, with_set), change));
            let all: Vec<(f64, &Change)> = each.collect();
            let best = all.iter().max_by(|a, b| a.0.total_cmp(&b.0));
            let Some((top, change)) = best else {
                return (f64::NEG_INFINITY, None, Change::default());
            };
            let sum: f64 = all.iter().map(|(ln, _)| (ln - top).exp()).sum();
            return (top + (sum / all.len() as f64).ln(), None, (*change).clone());
        };
        let ln_f = |x: f64| self.ln_density(cause, &change(cause, self.form, x), with_set);
        let found = integrate::mean(severity.from, severity.to, ln_f);
        let best = change(cause, self.form, found.mode);
        (found.ln_mean, Some((found.mode, found.sd)), best)
    }

    /// ln of the density of the changes if `predicted` came about, any set on top of it averaged out.
    fn ln_density(&self, cause: Cause, predicted: &Change, with_set: bool) -> f64 {
        let compared = self.findings.compared();
        let mut rows = self.covariance.clone();
        for (place, (row, one)) in rows.iter_mut().zip(compared).enumerate() {
            if let Some(diagonal) = row.get_mut(place) {
                *diagonal += model_error(cause, one.measure, predicted.get(one.measure)).powi(2);
            }
        }
        let Some(factor) = Factor::of(&rows) else {
            return f64::NEG_INFINITY;
        };
        let rest: Vec<f64> = compared
            .iter()
            .map(|one| one.change - predicted.get(one.measure))
            .collect();
        let white = factor.whiten(&rest);
        let size = compared.len() as f64 * std::f64::consts::TAU.ln();
        let ln_at = -0.5 * (dot(&white, &white) + factor.ln_determinant() + size);
        if !with_set {
            return ln_at;
        }
        let set = change(Cause::PermanentSet, self.form, 1.0);
        let along: Vec<f64> = compared.iter().map(|one| set.get(one.measure)).collect();
        let along = factor.whiten(&along);
        let largest = LARGEST_SET * self.form.free();
        ln_at + ln_over_set(dot(&along, &along), dot(&along, &white), largest)
    }

    fn ln_none(&self) -> f64 {
        let each = self.findings.compared().iter().map(|one| {
            let sd = WIDE * self.findings.uncertainty(one);
            -0.5 * ((one.change / sd).powi(2) + std::f64::consts::TAU.ln()) - sd.ln()
        });
        each.sum()
    }
}

/// ln of the mean over set 0 … `largest` of `exp(−½·(square·s² − 2·cross·s))`: a normal density's stretch, exact.
fn ln_over_set(square: f64, cross: f64, largest: f64) -> f64 {
    let (root, best) = (square.sqrt(), cross / square);
    let ln_stretch = ln_stretch(-best * root, (largest - best) * root);
    0.5 * cross * best + ln_stretch + 0.5 * std::f64::consts::TAU.ln() - root.ln() - largest.ln()
}

/// ln of the share of the standard normal distribution between `low` and `high`.
fn ln_stretch(low: f64, high: f64) -> f64 {
    // A stretch in the upper tail is its mirror in the lower one, where the function loses no digits.
    let (low, high) = if low > 0.0 {
        (-high, -low)
    } else {
        (low, high)
    };
    let below = |z: f64| normal_cdf(z).unwrap_or(f64::NAN);
    if high > -FAR {
        return (below(high) - below(low)).ln();
    }
    // Mills' ratio: the tail below z is φ(z)/|z| but for 1/z², and falls off by exp(z·step).
    let rest = -(high * (high - low)).exp();
    -0.5 * high * high - (-high * std::f64::consts::TAU.sqrt()).ln() + rest.ln_1p()
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// ln Φ(−20) = −203.917155 (Abramowitz & Stegun 26.2.12 by hand: −200 − ln 20 − 0.918939 − 0.002488); the limiting
    /// form takes over there, and leaves out the last term.
    #[test]
    fn the_far_tail_goes_on_where_the_near_one_ends() {
        assert_relative_eq!(
            ln_stretch(19.999, 60.0),
            -203.897_1,
            epsilon = 0.0,
            max_relative = 2e-5
        );
        assert_relative_eq!(
            ln_stretch(20.001, 60.0),
            -203.937_2,
            epsilon = 0.0,
            max_relative = 2e-5
        );
        assert!(ln_stretch(400.0, 500.0).is_finite() && ln_stretch(-500.0, -400.0).is_finite());
    }

    /// The set averaged out in closed form against the plain sum over sets.
    #[test]
    fn a_set_is_averaged_as_by_the_plain_sum() {
        for (square, cross) in [(4.0, 3.0), (4.0, -3.0), (0.3, 2.0), (25.0, 80.0)] {
            let steps = 200_000;
            let sets = (0..steps).map(|i| 5.0 * (f64::from(i) + 0.5) / f64::from(steps));
            let sum: f64 = sets
                .map(|s: f64| (-0.5 * (square * s * s - 2.0 * cross * s)).exp())
                .sum();
            let wanted = (sum / f64::from(steps)).ln();
            assert_relative_eq!(ln_over_set(square, cross, 5.0), wanted, epsilon = 1e-8);
        }
    }
}

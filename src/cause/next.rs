//! Which check would settle most: what it is expected to tell about the cause, in nats.

use super::findings::Findings;
use super::models::change;
use super::sights::chance;
use super::weigh::{Support, Weighing};
use super::{Form, Measure, Sight};

/// A check not made yet.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Check {
    /// Measure this, to this standard uncertainty (lot spread included).
    Measure(Measure, f64),
    /// Look for this.
    Look(Sight),
}

/// A check and what it is expected to settle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct NextCheck {
    /// Which.
    pub check: Check,
    /// Expected fall of the entropy of the supports, nats; 0.69 tells two equal causes apart.
    pub settles: f64,
}

/// Points of the integral over a measured value, within five standard deviations of each cause's prediction.
const POINTS: u32 = 40;

/// The `offered` checks that were not made yet, the one that settles most first.
pub fn next_checks(
    form: &Form,
    weighing: &Weighing,
    findings: &Findings,
    offered: &[Check],
) -> Vec<NextCheck> {
    let new = offered.iter().filter(|check| match check {
        Check::Measure(measure, _) => findings
            .compared()
            .iter()
            .all(|one| one.measure != *measure),
        Check::Look(sight) => findings.sights().iter().all(|(looked, _)| looked != sight),
    });
    let rated = new.map(|check| NextCheck {
        check: *check,
        settles: settles(form, weighing, *check),
    });
    let mut found: Vec<NextCheck> = rated.collect();
    found.sort_by(|a, b| b.settles.total_cmp(&a.settles));
    found
}

fn settles(form: &Form, weighing: &Weighing, check: Check) -> f64 {
    let supports = &weighing.supports;
    match check {
        Check::Look(sight) => {
            let seen: Vec<(f64, f64)> = supports
                .iter()
                .map(|one| (one.support, chance(one.cause, sight)))
                .collect();
            let mean: f64 = seen.iter().map(|(weight, chance)| weight * chance).sum();
            let told = |p: f64| -> f64 {
                [(p, mean), (1.0 - p, 1.0 - mean)]
                    .iter()
                    .map(|(a, b)| a * (a / b).ln())
                    .sum()
            };
            seen.iter()
                .map(|(weight, chance)| weight * told(*chance))
                .sum()
        }
        Check::Measure(measure, u) => {
            let normals: Vec<(f64, f64, f64)> = supports
                .iter()
                .map(|one| {
                    (
                        one.support,
                        one.predicted.get(measure),
                        spread(form, one, measure).hypot(u),
                    )
                })
                .collect();
            told_by(&normals)
        }
    }
}

/// How far the severity's own spread moves what is predicted.
fn spread(form: &Form, one: &Support, measure: Measure) -> f64 {
    let Some((mode, sd)) = one.severity else {
        return 0.0;
    };
    let at = |x: f64| change(one.cause, form, x).get(measure);
    let moved = f64::midpoint(at(mode + sd) - at(mode), at(mode) - at(mode - sd)).abs();
    if moved.is_finite() { moved } else { 0.0 }
}

/// Mutual information of a mixture of normals (weight, mean, SD) and its component.
fn told_by(normals: &[(f64, f64, f64)]) -> f64 {
    let density = |y: f64, mean: f64, sd: f64| {
        (-0.5 * ((y - mean) / sd).powi(2)).exp() / (sd * std::f64::consts::TAU.sqrt())
    };
    let step = 10.0 / f64::from(POINTS);
    let of_one = |mean: f64, sd: f64| -> f64 {
        let points = (0..POINTS).map(|i| -5.0 + (f64::from(i) + 0.5) * step);
        let parts = points.map(|z| {
            let y = mean + z * sd;
            let own = density(y, mean, sd);
            let all: f64 = normals
                .iter()
                .map(|(weight, mean, sd)| weight * density(y, *mean, *sd))
                .sum();
            if all > 0.0 {
                own * (own / all).ln() * sd * step
            } else {
                0.0
            }
        });
        parts.sum()
    };
    normals
        .iter()
        .map(|(weight, mean, sd)| weight * of_one(*mean, *sd))
        .sum::<f64>()
        .max(0.0)
}

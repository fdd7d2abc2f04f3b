//! Causes that the findings cannot tell apart share one bar.

use super::findings::Findings;
use super::matrix::{Factor, dot};
use super::sights::ln_chance;
use super::weigh::{NO_PREFERENCE, Support, Weighing};
use super::{Cause, CauseError};

/// One bar: its causes, the best supported first.
#[derive(Clone, Debug, PartialEq)]
pub struct Bar {
    /// Cause, and whether permanent set is beside it.
    pub causes: Vec<(Cause, bool)>,
    /// Their supports together.
    pub support: f64,
}

/// The bars, the longest first.
///
/// Two causes of one group, or two that change nothing that was compared, share a bar where the ratio of their likelihoods, expected if one of them is true, is
/// under [`NO_PREFERENCE`]: half the squared distance of their best predictions, and the sights.
///
/// # Errors
/// [`CauseError::Covariance`] where the findings' covariance is none.
pub fn bars(weighing: &Weighing, findings: &Findings) -> Result<Vec<Bar>, CauseError> {
    let factor = Factor::of(&findings.covariance()).ok_or(CauseError::Covariance)?;
    let mut open: Vec<(Bar, &Support)> = Vec::new();
    for one in &weighing.supports {
        let home = open
            .iter_mut()
            .find(|(_, first)| alike(first, one, findings, &factor));
        if let Some((bar, _)) = home {
            bar.causes.push((one.cause, one.with_set));
            bar.support += one.support;
        } else {
            let causes = vec![(one.cause, one.with_set)];
            open.push((
                Bar {
                    causes,
                    support: one.support,
                },
                one,
            ));
        }
    }
    let mut found: Vec<Bar> = open.into_iter().map(|(bar, _)| bar).collect();
    found.sort_by(|a, b| b.support.total_cmp(&a.support));
    Ok(found)
}

fn alike(a: &Support, b: &Support, findings: &Findings, factor: &Factor) -> bool {
    let compared = findings.compared().iter();
    let unseen = |one: &Support| {
        let mut changes = compared.clone().map(|of| one.predicted.get(of.measure));
        one.cause != Cause::NoneOfThese && changes.all(|change| change.abs() < f64::MIN_POSITIVE)
    };
    let one_sort = a.cause.group() == b.cause.group() || unseen(a) && unseen(b);
    if a.with_set != b.with_set || !one_sort {
        return false;
    }
    let apart = compared.map(|one| a.predicted.get(one.measure) - b.predicted.get(one.measure));
    let white = factor.whiten(&apart.collect::<Vec<f64>>());
    let sights = ln_chance(a.cause, findings.sights()) - ln_chance(b.cause, findings.sights());
    0.5 * dot(&white, &white) + sights.abs() < NO_PREFERENCE.ln()
}

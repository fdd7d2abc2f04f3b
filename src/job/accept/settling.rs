//! What would settle the undecided characteristics of a sample.

use crate::drawing::{Drawing, Guard};
use crate::record::{CharacteristicResult, SettlingFacts, Verdict};

use super::super::facts::figure;
use super::springs::Judged;

/// What would settle each undecided characteristic of the sample: the nearest springs first, for fewest of them are
/// needed.
pub(super) fn settling(
    drawing: &Drawing,
    guard: Guard,
    sample: &[&Judged],
    size: u64,
) -> Vec<SettlingFacts> {
    let size = usize::try_from(size).unwrap_or(usize::MAX);
    let mut found: Vec<SettlingFacts> = Vec::new();
    for spring in sample.iter().take(size) {
        let open = |of: &&CharacteristicResult| of.verdict == Some(Verdict::Undecided);
        for of in spring.result.characteristics.iter().filter(open) {
            found.extend(settled_by(drawing, guard, &spring.result.id, of));
        }
    }
    found.sort_by(|a, b| share(b).total_cmp(&share(a)));
    found
}

/// How much of today's uncertainty may stay; the larger, the easier.
fn share(of: &SettlingFacts) -> f64 {
    let both = of.wanted_uncertainty.zip(of.expanded_uncertainty);
    both.map_or(0.0, |(wanted, now)| wanted.get() / now.get())
}

fn settled_by(
    drawing: &Drawing,
    guard: Guard,
    spring: &str,
    of: &CharacteristicResult,
) -> Option<SettlingFacts> {
    let requirement = drawing.requirements.iter().find(|one| {
        one.quantity.name() == of.name && one.quantity.at_length() == of.at_length_mm
    })?;
    let limits = requirement.limits;
    let distance = of.value.and_then(|value| {
        let limits = [limits.lower, limits.upper].into_iter().flatten();
        limits
            .map(|limit| (value.get() - limit).abs())
            .reduce(f64::min)
    });
    let wanted = distance.and_then(|distance| crate::lot::settling(distance, guard).ok()?);
    let own_share = of
        .own_uncertainty
        .zip(of.standard_uncertainty)
        .and_then(|(own, all)| figure((own.get() / all.get()).powi(2)));
    Some(SettlingFacts {
        spring: spring.to_owned(),
        name: of.name.clone(),
        at_length_mm: of.at_length_mm,
        class: requirement.class,
        unit: of.unit,
        expanded_uncertainty: of.expanded_uncertainty,
        wanted_uncertainty: wanted.and_then(figure),
        own_share,
    })
}

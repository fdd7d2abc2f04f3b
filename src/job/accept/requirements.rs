//! Each requirement over the whole lot: counts of verdicts, mean and spread of the values.

use crate::drawing::{Drawing, Requirement};
use crate::record::{CharacteristicResult, RequirementFacts};
use crate::stats::{mean, standard_deviation};
use crate::verdict::Verdict;

use super::super::facts::figure;
use super::figures::value_of;
use super::springs::Judged;

/// The requirements of `drawing` with what the springs gave.
pub(super) fn facts(drawing: &Drawing, judged: &[Judged]) -> Vec<RequirementFacts> {
    drawing
        .requirements
        .iter()
        .map(|requirement| one(requirement, judged))
        .collect()
}

fn one(requirement: &Requirement, judged: &[Judged]) -> RequirementFacts {
    let quantity = requirement.quantity;
    let results: Vec<&CharacteristicResult> = judged
        .iter()
        .filter_map(|spring| value_of(&spring.result, quantity))
        .collect();
    let values: Vec<f64> = results
        .iter()
        .filter_map(|one| one.value)
        .map(crate::units::Finite::get)
        .collect();
    let largest = |of: &dyn Fn(&CharacteristicResult) -> Option<f64>| {
        results.iter().filter_map(|one| of(one)).reduce(f64::max)
    };
    let count = |verdict| {
        u32::try_from(
            results
                .iter()
                .filter(|one| one.verdict == Some(verdict))
                .count(),
        )
        .unwrap_or(u32::MAX)
    };
    RequirementFacts {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
        unit: quantity.unit(),
        nominal: requirement.limits.nominal.and_then(figure),
        lower: requirement.limits.lower.and_then(figure),
        upper: requirement.limits.upper.and_then(figure),
        class: requirement.class,
        mean: mean(&values).and_then(figure),
        standard_deviation: standard_deviation(&values).and_then(figure),
        smallest: values.iter().copied().reduce(f64::min).and_then(figure),
        largest: values.iter().copied().reduce(f64::max).and_then(figure),
        largest_expanded_uncertainty: largest(&|one| {
            one.expanded_uncertainty.map(crate::units::Finite::get)
        })
        .and_then(figure),
        conforming: count(Verdict::Conforms),
        failing: count(Verdict::Fails),
        undecided: count(Verdict::Undecided),
    }
}

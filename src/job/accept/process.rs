//! Process figures of every requirement, from the springs that may form the sample.

use std::collections::HashSet;

use rayon::prelude::*;

use crate::drawing::{Drawing, Requirement};
use crate::process::{CommonPart, Estimated, Figures, Interval, Observation, Shape, figures};
use crate::quantity::Quantity;
use crate::record::{
    CharacteristicResult, EstimatedFacts, IntervalFacts, Part, ProcessFacts, ShapeFacts,
    SpringResult,
};
use crate::stats::{Dof, StatsError};
use crate::units::Finite;

use super::super::facts::figure;
use super::figures::value_of;
use super::springs::Judged;

/// The process figures, where a requirement has values.
///
/// # Errors
/// [`StatsError`] where a distribution cannot answer.
pub(super) fn facts(
    drawing: &Drawing,
    judged: &[Judged],
    sampled: &[String],
) -> Result<Vec<ProcessFacts>, StatsError> {
    let named: HashSet<&str> = sampled.iter().map(String::as_str).collect();
    let springs: Vec<&SpringResult> = judged
        .iter()
        .map(|one| &one.result)
        .filter(|one| named.contains(one.id.as_str()))
        .collect();
    let found = drawing
        .requirements
        .par_iter()
        .map(|requirement| one(requirement, &springs))
        .collect::<Result<Vec<_>, _>>()?;
    Ok(found.into_iter().flatten().collect())
}

fn one(
    requirement: &Requirement,
    springs: &[&SpringResult],
) -> Result<Option<ProcessFacts>, StatsError> {
    let quantity = requirement.quantity;
    let with: Vec<(&str, Observation)> = springs
        .iter()
        .filter_map(|spring| Some((spring.id.as_str(), observation(spring, quantity)?)))
        .collect();
    let observations: Vec<Observation> = with.iter().map(|(_, one)| one.clone()).collect();
    let Some(found) = figures(&observations, &requirement.limits)? else {
        return Ok(None);
    };
    let outliers = found
        .outliers
        .iter()
        .filter_map(|place| with.get(*place))
        .map(|(id, _)| (*id).to_owned())
        .collect();
    Ok(told(quantity, &found, outliers))
}

/// The value of a spring with its uncertainty; `None` where either is absent.
pub(super) fn observation(spring: &SpringResult, quantity: Quantity) -> Option<Observation> {
    let of: &CharacteristicResult = value_of(spring, quantity)?;
    let common = of
        .budget
        .iter()
        .filter(|line| line.counted && line.part == Part::Common)
        .map(|line| CommonPart {
            source: line.source.clone(),
            contribution: line.contribution.get(),
            dof: line
                .degrees_of_freedom
                .map_or(Dof::Infinite, |dof| Dof::Finite(dof.get())),
        });
    Some(Observation {
        value: of.value?.get(),
        own: of.own_uncertainty?.get(),
        common: common.collect(),
    })
}

fn told(quantity: Quantity, found: &Figures, outliers: Vec<String>) -> Option<ProcessFacts> {
    let capability = found.capability;
    Some(ProcessFacts {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
        unit: quantity.unit(),
        springs: found.count,
        mean: figure(found.mean.0)?,
        mean_interval: found.mean.1.and_then(interval),
        common_uncertainty: figure(found.common)?,
        standard_deviation: found.spread.and_then(figure),
        own_uncertainty: figure(found.own)?,
        springs_deviation: found.springs.and_then(estimated),
        bench_dominates: found.hidden,
        shape: shape(found.shape)?,
        outliers,
        outside_count: found.outside.map(|outside| outside.count),
        outside_share: found.outside.and_then(|outside| interval(outside.share)),
        pp: capability.and_then(|one| one.pp).and_then(estimated),
        ppk: capability.and_then(|one| estimated(one.ppk)),
        outside_by_model: capability.and_then(|one| estimated(one.outside)),
        tolerance: found.tolerance.and_then(interval),
        one_sided: found.one_sided.and_then(interval),
    })
}

fn interval(of: Interval) -> Option<IntervalFacts> {
    Some(IntervalFacts {
        lower: figure(of.lower)?,
        upper: figure(of.upper)?,
    })
}

fn estimated(of: Estimated) -> Option<EstimatedFacts> {
    Some(EstimatedFacts {
        value: figure(of.value)?,
        interval: interval(of.interval)?,
    })
}

fn shape(of: Shape) -> Option<ShapeFacts> {
    let both = |statistic: f64, p: f64| Some::<(Finite, Finite)>((figure(statistic)?, figure(p)?));
    Some(match of {
        Shape::TooFew => ShapeFacts::TooFew,
        Shape::NoSpread => ShapeFacts::NoSpread,
        Shape::Normal { statistic, p } => {
            let (statistic, p) = both(statistic, p)?;
            ShapeFacts::Normal { statistic, p }
        }
        Shape::NotNormal { statistic, p } => {
            let (statistic, p) = both(statistic, p)?;
            ShapeFacts::NotNormal { statistic, p }
        }
    })
}

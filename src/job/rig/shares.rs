//! One quantity of a study, analysed, as the record tells it.

use crate::bench::{
    Anova, AverageAndRange, Components, Crossed, Effect, Model, Serving, analyse,
    average_and_range, categories,
};
use crate::drawing::Requirement;
use crate::quantity::Quantity;
use crate::record::{
    BenchCaution, RangeFacts, StudyFacts, StudyValue, VarianceRow, VariationShare,
};
use crate::units::Finite;

use super::super::facts::figure;
use super::error::RigJobError;

/// 6 s over the tolerance up to which a bench is good, and up to which it serves (AIAG MSA, from memory).
pub(super) const GOOD: f64 = 0.1;
pub(super) const SERVES: f64 = 0.3;
/// Standard deviations that a tolerance is held against.
const SPREAD: f64 = 6.0;

/// One quantity, analysed.
pub(super) struct Analysed {
    pub(super) facts: StudyFacts,
    /// 6 s over the tolerance, where there is one.
    pub(super) share: Option<f64>,
    /// Degrees of freedom of the repeats.
    pub(super) dof: f64,
    pub(super) negative: Vec<BenchCaution>,
}

/// Analyses one quantity of a study.
///
/// # Errors
/// [`RigJobError::NotFinite`] where a figure is not.
pub(super) fn analysed(
    quantity: Quantity,
    study: &Crossed,
    values: Vec<StudyValue>,
    requirement: Option<&Requirement>,
) -> Result<Analysed, RigJobError> {
    let table = analyse(study);
    let components = *table.components();
    let limits = requirement.map(|one| one.limits);
    let tolerance = limits.and_then(|limits| Some(2.0 * limits.half_width()?));
    let within = components.within().sqrt();
    let share = tolerance.map(|tolerance| SPREAD * within / tolerance);
    let other = match table.model {
        Model::Pooled => Some(&table.full),
        Model::Full => table.pooled.as_ref(),
    };
    let part = components.part.variance().sqrt();
    let facts = StudyFacts {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
        unit: quantity.unit(),
        lower: limits.and_then(|limits| limits.lower).and_then(figure),
        upper: limits.and_then(|limits| limits.upper).and_then(figure),
        required: requirement.is_some(),
        variance: rows(&table)?,
        model: match table.model {
            Model::Full => "full",
            Model::Pooled => "pooled",
        }
        .to_owned(),
        shares: shares(&components, tolerance)?,
        other_shares: match other {
            Some(other) => shares(other, tolerance)?,
            None => Vec::new(),
        },
        within_spring: finite(within)?,
        categories: categories(part, within),
        ranges: average_and_range(study)
            .map(|found| ranges(&found))
            .transpose()?,
        serving: share.map(|share| {
            if share <= SERVES {
                Serving::Serves
            } else {
                Serving::Fails
            }
        }),
        values,
    };
    Ok(Analysed {
        negative: negative(quantity, &components),
        dof: table.repeatability_dof(),
        share,
        facts,
    })
}

fn finite(value: f64) -> Result<Finite, RigJobError> {
    figure(value).ok_or(RigJobError::NotFinite { of: "study" })
}

fn rows(table: &Anova) -> Result<Vec<VarianceRow>, RigJobError> {
    let row = |(source, effect): (&str, Effect)| {
        Ok(VarianceRow {
            source: source.to_owned(),
            sum_of_squares: finite(effect.sum)?,
            degrees_of_freedom: finite(effect.dof)?,
            mean_square: match source {
                "total" => None,
                _ => figure(effect.mean_square()),
            },
            f: effect.f.and_then(figure),
            p: effect.p.and_then(figure),
        })
    };
    let mut all = vec![("part", table.part)];
    all.extend(table.operator.map(|effect| ("operator", effect)));
    all.extend(table.interaction.map(|effect| ("interaction", effect)));
    all.extend([("repeats", table.error), ("total", table.total)]);
    all.into_iter().map(row).collect()
}

fn shares(of: &Components, tolerance: Option<f64>) -> Result<Vec<VariationShare>, RigJobError> {
    let total = of.total();
    let mut all = vec![("repeatability", of.repeatability.variance())];
    all.extend(of.operator.map(|one| ("operator", one.variance())));
    all.extend(of.interaction.map(|one| ("interaction", one.variance())));
    all.extend([
        ("within", of.within()),
        ("part", of.part.variance()),
        ("total", total),
    ]);
    let share = |(source, variance): (&str, f64)| {
        Ok(VariationShare {
            source: source.to_owned(),
            standard_deviation: finite(variance.sqrt())?,
            contribution: figure(variance / total),
            of_study: figure((variance / total).sqrt()),
            of_tolerance: tolerance
                .and_then(|tolerance| figure(SPREAD * variance.sqrt() / tolerance)),
        })
    };
    all.into_iter().map(share).collect()
}

fn ranges(of: &AverageAndRange) -> Result<RangeFacts, RigJobError> {
    Ok(RangeFacts {
        mean_range: finite(of.mean_range)?,
        operator_range: of.operator_range.and_then(figure),
        part_range: finite(of.part_range)?,
        repeatability: finite(of.repeatability)?,
        reproducibility: finite(of.reproducibility)?,
        within: finite(of.within())?,
        part: finite(of.part)?,
        total: finite(of.total())?,
    })
}

/// The components that came out below zero.
fn negative(quantity: Quantity, of: &Components) -> Vec<BenchCaution> {
    let named = [
        ("operator", of.operator),
        ("interaction", of.interaction),
        ("part", Some(of.part)),
    ];
    let below = named
        .into_iter()
        .filter(|(_, one)| one.is_some_and(|one| one.raw < 0.0));
    let caution = |(component, _): (&str, _)| BenchCaution::NegativeComponent {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
        component: component.to_owned(),
    };
    below.map(caution).collect()
}

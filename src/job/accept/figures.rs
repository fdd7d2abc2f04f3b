//! One spring's figures, as the result tells them.

use crate::characteristic::{Characteristic, Estimate, Line, Measured, RateFit};
use crate::drawing::{Limits, Requirement};
use crate::fit::TypeA;
use crate::quantity::Quantity;
use crate::record::{BudgetFigure, CharacteristicResult, FitFacts, LackFacts, SpringResult};
use crate::stats::Dof;
use crate::units::{Finite, Millimetres, Newtons, NewtonsPerMillimetre};
use crate::verdict::{self, Reason};

use super::super::facts::figure;

pub(super) fn result(
    characteristic: &Characteristic,
    requirement: Option<&Requirement>,
    judged: Option<&verdict::Judged>,
    not_inspected: bool,
) -> CharacteristicResult {
    let quantity = characteristic.quantity;
    let none = Limits {
        nominal: None,
        lower: None,
        upper: None,
    };
    let limits = requirement.map_or(none, |one| one.limits);
    let estimate = match &characteristic.measured {
        Measured::Value(estimate) => Some(estimate),
        Measured::Below(_) | Measured::Absent(_) => None,
    };
    let uncertainty = estimate.and_then(|one| one.uncertainty);
    let guard = judged.and_then(|one| one.guard);
    let shifted = |limit: Option<f64>, sign: f64| {
        limit
            .zip(guard)
            .and_then(|(limit, guard)| figure(limit + sign * guard))
    };
    CharacteristicResult {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
        value: estimate.and_then(|one| figure(one.value)),
        standard_uncertainty: uncertainty.and_then(|one| figure(one.standard)),
        own_uncertainty: uncertainty.and_then(|one| figure(one.own)),
        common_uncertainty: uncertainty.and_then(|one| figure(one.common)),
        expanded_uncertainty: uncertainty.and_then(|one| figure(one.expanded)),
        coverage_factor: uncertainty.and_then(|one| figure(one.factor)),
        degrees_of_freedom: uncertainty.and_then(|one| dof(one.dof)),
        unit: quantity.unit(),
        nominal: limits.nominal.and_then(figure),
        lower: limits.lower.and_then(figure),
        upper: limits.upper.and_then(figure),
        accept_lower: shifted(limits.lower, 1.0),
        accept_upper: shifted(limits.upper, -1.0),
        reject_lower: shifted(limits.lower, -1.0),
        reject_upper: shifted(limits.upper, 1.0),
        verdict: judged.map(|one| one.verdict),
        reason: reason(characteristic, judged, not_inspected),
        conformance_probability: judged.and_then(|one| one.probability).and_then(figure),
        class: requirement.map(|one| one.class),
        budget: estimate.map_or(Vec::new(), budget),
    }
}

fn reason(
    characteristic: &Characteristic,
    judged: Option<&verdict::Judged>,
    not_inspected: bool,
) -> Option<Reason> {
    match (&characteristic.measured, judged) {
        _ if not_inspected => Some(Reason::NotInspected),
        (_, Some(judged)) => judged.reason.clone(),
        (Measured::Absent(why), None) => Some(why.into()),
        _ => None,
    }
}

fn dof(dof: Dof) -> Option<Finite> {
    match dof {
        Dof::Finite(dof) => figure(dof),
        Dof::Infinite => None,
    }
}

pub(in crate::job) fn budget(estimate: &Estimate) -> Vec<BudgetFigure> {
    let line = |line: &Line| {
        Some(BudgetFigure {
            source: line.source.to_owned(),
            part: line.part,
            contribution: figure(line.contribution)?,
            degrees_of_freedom: dof(line.dof),
            counted: line.counted,
        })
    };
    estimate.lines.iter().filter_map(line).collect()
}

pub(super) fn fit_facts(fit: &RateFit, origin: Option<f64>) -> FitFacts {
    let length = |u: f64| {
        origin
            .map_or(u, |origin| origin - u)
            .try_into()
            .unwrap_or(Millimetres::ZERO)
    };
    let rate = |value: Option<f64>| value.and_then(|value| value.try_into().ok());
    let (effective, lag1) = match fit.type_a {
        TypeA::Known {
            effective_count,
            lag1,
            ..
        }
        | TypeA::TooFewEffective {
            effective_count,
            lag1,
        } => (effective_count, lag1),
    };
    let lack = fit.lack.as_ref().and_then(|lack| {
        let bend_percent = lack.bend.and_then(|bend| figure(100.0 * bend))?;
        Some(LackFacts {
            f: figure(lack.f)?,
            p: figure(lack.p)?,
            bend_percent,
            warns: lack.warns(),
        })
    });
    FitFacts {
        export: fit.export.clone(),
        first_line: fit.lines.0,
        last_line: fit.lines.1,
        from_mm: length(fit.window.0),
        to_mm: length(fit.window.1),
        points: fit.line.count as u64,
        effective_points: figure(effective),
        lag1: figure(lag1),
        standard_error: rate(Some(fit.line.slope_error)).unwrap_or(NewtonsPerMillimetre::ZERO),
        residual_sd_n: fit.line.residual_sd.try_into().unwrap_or(Newtons::ZERO),
        straightness_percent: figure(100.0 * fit.straightness),
        lack_of_fit: lack,
        two_point_rate: rate(fit.two_point),
        robust_rate: rate(fit.robust),
    }
}

/// The value of one characteristic of a result.
pub(super) fn value_of(result: &SpringResult, quantity: Quantity) -> Option<&CharacteristicResult> {
    result
        .characteristics
        .iter()
        .find(|one| one.name == quantity.name() && one.at_length_mm == quantity.at_length())
}

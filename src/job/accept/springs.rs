//! One spring judged, as the result tells it.

use std::collections::HashSet;

use crate::characteristic::{Characteristic, Estimate, Measured, Measurement, RateFit, average};
use crate::curve::Reduced;
use crate::drawing::{Acceptance, Limits, Requirement};
use crate::fit::TypeA;
use crate::lot::advise;
use crate::quantity::{Class, Quantity};
use crate::record::{
    BudgetFigure, CharacteristicResult, FindingResult, FitFacts, LackFacts, SpringResult,
};
use crate::stats::{Dof, StatsError};
use crate::units::Finite;
use crate::verdict::{self, Overall, Reason, Verdict, overall};

use super::super::facts::figure;
use super::Files;
use super::group::{self, Spring};

/// A judged spring with what the lot still needs of it.
pub(super) struct Judged {
    pub(super) overall: Overall,
    pub(super) result: SpringResult,
    pub(super) reduced: Option<Reduced>,
    /// A first idea of its rate, N/mm.
    pub(super) plain_rate: Option<f64>,
    /// Whether the empty platen was read in every measurement.
    pub(super) zero_read: bool,
    /// Smallest and largest load, N.
    pub(super) loads: (f64, f64),
}

/// Why statistics failed on a spring.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[error("the verdict on spring `{spring}` cannot be computed")]
#[diagnostic(
    code(coilassay::accept::statistics),
    help("a figure in the rig file or the export is far out of any usable size")
)]
struct NoVerdict {
    spring: String,
    #[source]
    cause: StatsError,
}

/// Judges one spring.
///
/// # Errors
/// Where a quantile cannot be had.
pub(super) fn judge(files: &Files, terms: &Acceptance, spring: Spring) -> miette::Result<Judged> {
    let id = spring.id.clone();
    let failed = |cause| NoVerdict {
        spring: id.clone(),
        cause,
    };
    let measurements: Vec<&Measurement> = spring
        .readings
        .iter()
        .map(|reading| &reading.measurement)
        .collect();
    let characteristics = average(&measurements).map_err(failed)?;
    let times = u32::try_from(spring.readings.len()).unwrap_or(u32::MAX);
    let mut judged = Vec::new();
    let mut results = Vec::new();
    let mut advice = Vec::new();
    for characteristic in &characteristics {
        let requirement = files
            .drawing
            .requirements
            .iter()
            .find(|one| one.quantity == characteristic.quantity);
        let inspected = !files
            .lot
            .not_inspected
            .iter()
            .any(|one| one.quantity == characteristic.quantity);
        let verdict = match requirement {
            Some(requirement) if inspected => Some((
                requirement,
                verdict::judge(
                    &characteristic.measured,
                    &requirement.limits,
                    terms.rule,
                    terms.guard,
                )
                .map_err(failed)?,
            )),
            _ => None,
        };
        if let Some((requirement, found)) = &verdict
            && found.verdict == Verdict::Undecided
        {
            advice.push(
                advise(
                    characteristic.quantity,
                    &characteristic.measured,
                    &requirement.limits,
                    times,
                )
                .map_err(failed)?,
            );
        }
        let not_inspected = requirement.is_some() && !inspected;
        results.push(result(
            characteristic,
            requirement,
            verdict.as_ref().map(|(_, found)| found),
            not_inspected,
        ));
        judged.extend(verdict);
    }
    let findings: Vec<FindingResult> = files
        .lot
        .findings
        .iter()
        .filter(|one| group::printed(&one.spring.value) == id)
        .map(|one| FindingResult {
            text: one.text.clone(),
            class: one.class,
        })
        .collect();
    let found: Vec<Class> = findings.iter().map(|one| one.class).collect();
    let overall = overall(
        judged
            .iter()
            .map(|(requirement, judged)| (requirement.class, judged)),
        &found,
    );
    let last = spring.readings.last();
    let result = SpringResult {
        id: id.clone(),
        verdict: overall.verdict,
        failing_class: overall.failing,
        simple_verdict: overall.simple,
        in_sample: true,
        characteristics: results,
        fit: last
            .and_then(|reading| reading.measurement.fit.as_ref())
            .map(|fit| fit_facts(fit, last.and_then(|reading| reading.measurement.origin))),
        loading_strokes: last.map_or(0, |reading| {
            u32::try_from(reading.strokes).unwrap_or(u32::MAX)
        }),
        measurements: spring.measurements,
        findings,
        advice: if overall.verdict == Verdict::Undecided {
            advice
        } else {
            Vec::new()
        },
    };
    let plain_rate = last.and_then(|reading| reading.plain_rate);
    let zero_read = spring.readings.iter().all(|reading| reading.zero_read);
    let loads = spring
        .readings
        .iter()
        .map(|reading| reading.loads)
        .reduce(|a, b| (a.0.min(b.0), a.1.max(b.1)))
        .unwrap_or((0.0, 0.0));
    let reduced = spring
        .readings
        .into_iter()
        .last()
        .and_then(|reading| reading.reduced)
        .map(|reduced| Reduced { id, ..reduced });
    Ok(Judged {
        overall,
        result,
        reduced,
        plain_rate,
        zero_read,
        loads,
    })
}

/// Says of every spring whether it is in the sample: the first `size` of `order`.
pub(super) fn mark_sample(judged: &mut [Judged], order: &[(String, Overall)], size: u64) {
    let size = usize::try_from(size).unwrap_or(usize::MAX);
    let inside: HashSet<&str> = order.iter().take(size).map(|(id, _)| id.as_str()).collect();
    for spring in judged {
        spring.result.in_sample = inside.contains(spring.result.id.as_str());
    }
}

fn result(
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

fn budget(estimate: &Estimate) -> Vec<BudgetFigure> {
    let line = |line: &crate::characteristic::Line| {
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

fn fit_facts(fit: &RateFit, origin: Option<f64>) -> FitFacts {
    let length = |u: f64| {
        origin
            .map_or(u, |origin| origin - u)
            .try_into()
            .unwrap_or(crate::units::Millimetres::ZERO)
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
        standard_error: rate(Some(fit.line.slope_error))
            .unwrap_or(crate::units::NewtonsPerMillimetre::ZERO),
        residual_sd_n: fit
            .line
            .residual_sd
            .try_into()
            .unwrap_or(crate::units::Newtons::ZERO),
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

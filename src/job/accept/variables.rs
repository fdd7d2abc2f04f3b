//! The characteristics under a plan by variables.

use crate::drawing::{Acceptance, Requirement, Rule};
use crate::lot::{
    ByVariables, Compared, Comparison, Decision, LotReason, by_variables, variables_terms,
};
use crate::process::Observation;
use crate::quantity::Class;
use crate::record::{VariablesFacts, Verdict};
use crate::sampling::{PlanError, State, VariablesPlan};
use crate::units::Finite;

use super::super::facts::figure;
use super::figures::value_of;
use super::process::observation;
use super::springs::Judged;
use super::{Files, left_out};

/// One characteristic decided.
pub(super) struct One {
    pub(super) facts: VariablesFacts,
    pub(super) reason: Option<LotReason>,
    /// What simple acceptance would have said.
    pub(super) simple: Decision,
}

/// Every inspected requirement under the plan by variables, `sample` in its order; nothing for other plans. A critical
/// requirement without an AQL of its own is counted, not estimated; so is every critical one, besides.
///
/// # Errors
/// [`PlanError`] where the plan or its estimate cannot be had.
pub(super) fn all(
    files: &Files,
    terms: &Acceptance,
    state: State,
    sample: &[&Judged],
) -> Result<Vec<One>, PlanError> {
    let size = files.lot.size.value;
    let mut found = Vec::new();
    // what was left out of the inspection is decided all the same where a spring is proven to fail it
    let fails = |one: &Requirement| {
        let of = sample
            .iter()
            .filter_map(|spring| value_of(&spring.result, one.quantity));
        of.map(|of| of.verdict)
            .any(|verdict| verdict == Some(Verdict::Fails))
    };
    let inspected = |one: &&Requirement| !left_out(files, one) || fails(one);
    for requirement in files.drawing.requirements.iter().filter(inspected) {
        if requirement.class == Class::Critical {
            continue;
        }
        if let Some(plan) = variables_terms(&terms.plan, state, size, requirement.class)? {
            found.push(one(requirement, &plan, terms, sample)?);
        }
    }
    Ok(found)
}

fn one(
    requirement: &Requirement,
    plan: &VariablesPlan,
    terms: &Acceptance,
    sample: &[&Judged],
) -> Result<One, PlanError> {
    let observations: Vec<Option<Observation>> = sample
        .iter()
        .map(|spring| observation(&spring.result, requirement.quantity))
        .collect();
    let decide = |rule| by_variables(plan, &observations, &requirement.limits, rule);
    let judged = decide(terms.rule)?;
    Ok(One {
        reason: reason(requirement, plan, &judged),
        facts: facts(requirement, plan, terms, &judged),
        simple: decide(Rule::Simple)?.decision,
    })
}

/// What is compared: as measured, the worse way, the better way, and the constant.
fn comparison(of: &Compared) -> (Comparison, [Option<Finite>; 4]) {
    match *of {
        Compared::Distance {
            found,
            least,
            most,
            wanted,
        } => (
            Comparison::Distance,
            [found, least, most, wanted].map(figure),
        ),
        Compared::Share {
            found,
            least,
            most,
            wanted,
        } => (Comparison::Share, [found, most, least, wanted].map(figure)),
    }
}

fn reason(
    requirement: &Requirement,
    plan: &VariablesPlan,
    judged: &ByVariables,
) -> Option<LotReason> {
    let quantity = requirement.quantity;
    let (name, at_length_mm) = (quantity.name().to_owned(), quantity.at_length());
    let Some(figures) = judged.figures.as_ref().filter(|_| !judged.withheld) else {
        return Some(LotReason::TooFewValues {
            name,
            at_length_mm,
            measured: judged.measured,
            wanted: finite(judged.wanted),
            plan: plan.sample_size,
        });
    };
    let (compared, [found, worse, better, wanted]) = comparison(&figures.compared);
    Some(LotReason::ByVariables {
        name,
        at_length_mm,
        decision: judged.decision,
        compared,
        found: found?,
        worse: worse?,
        better: better?,
        wanted: wanted?,
    })
}

/// A number of springs; `None` where none is enough.
fn finite(wanted: u64) -> Option<u64> {
    (wanted < u64::MAX).then_some(wanted)
}

fn facts(
    requirement: &Requirement,
    plan: &VariablesPlan,
    terms: &Acceptance,
    judged: &ByVariables,
) -> VariablesFacts {
    let quantity = requirement.quantity;
    let figures = judged.figures.as_ref();
    let compared = figures.map(|one| comparison(&one.compared));
    let [found, worse, better, wanted] = compared.map_or([None; 4], |(_, figures)| figures);
    VariablesFacts {
        name: quantity.name().to_owned(),
        at_length_mm: quantity.at_length(),
        unit: quantity.unit(),
        class: requirement.class,
        aql: crate::lot::aql_of_class(&terms.plan, requirement.class).and_then(figure),
        code_letter: plan.letters.map(|(printed, _)| printed.to_string()),
        used_letter: plan.letters.map(|(_, used)| used.to_string()),
        sample_size: plan.sample_size,
        raised_sample_size: finite(judged.wanted),
        measured: judged.measured,
        mean: figures.and_then(|one| figure(one.mean)),
        standard_deviation: figures.and_then(|one| figure(one.spread)),
        common_uncertainty: figures.and_then(|one| figure(one.common)),
        compared: compared.map(|(kind, _)| kind),
        found,
        worse,
        better,
        wanted,
        decision: judged.decision,
    }
}

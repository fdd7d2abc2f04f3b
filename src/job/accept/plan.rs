//! The plan and how its classes stand, as the result tells it.

use crate::drawing::PlanTerms;
use crate::lot::{Basis, Standing};
use crate::quantity::Class;
use crate::record::{ClassPlan, PlanFacts, StateFacts, VariablesFacts, ZeroAcceptFacts};
use crate::sampling::{PlanError, SinglePlan, probability_of_acceptance};

use super::super::facts::figure;

/// The plan of a lot; what would settle it is added by the caller.
///
/// # Errors
/// [`PlanError`] where a probability of acceptance cannot be had.
pub(super) fn facts(
    terms: &PlanTerms,
    standings: &[Standing],
    state: Option<StateFacts>,
    variables: Vec<VariablesFacts>,
) -> Result<PlanFacts, PlanError> {
    let classes = standings.iter().map(class).collect::<Result<Vec<_>, _>>()?;
    let main = classes
        .iter()
        .find(|one| one.class == Class::Major)
        .or(classes.first());
    let letter = || variables.first().and_then(|one| one.code_letter.clone());
    let counted = classes.iter().map(|one| one.sample_size);
    let measured = variables
        .iter()
        .map(|one| one.sample_size.max(one.measured));
    Ok(PlanFacts {
        by: by(terms).to_owned(),
        source: source(terms),
        level: level(terms).map(str::to_owned),
        code_letter: main.and_then(|one| one.code_letter.clone()).or_else(letter),
        sample_size: counted.chain(measured).max().unwrap_or(0),
        accept: main.map(|one| one.accept),
        reject: main.map(|one| one.reject),
        classes,
        state,
        accepted_tighter: None,
        zero_accept: zero(terms, standings),
        variables,
        settling: Vec::new(),
    })
}

const fn by(terms: &PlanTerms) -> &'static str {
    match terms {
        PlanTerms::EverySpring => "every-spring",
        PlanTerms::Attributes { .. } => "attributes",
        PlanTerms::Variables { .. } | PlanTerms::Designed { .. } => "variables",
        PlanTerms::ZeroAccept { .. } => "zero-accept",
    }
}

fn level(terms: &PlanTerms) -> Option<&'static str> {
    match terms {
        PlanTerms::Attributes { level, .. } => Some(level.word()),
        PlanTerms::Variables { level, .. } => Some(level.word()),
        _ => None,
    }
}

fn source(terms: &PlanTerms) -> String {
    let percent = |share: f64| crate::wording::number(Some(100.0 * share), 4);
    match terms {
        PlanTerms::EverySpring => "every spring".to_owned(),
        PlanTerms::Attributes { .. } => "ISO 2859-1".to_owned(),
        PlanTerms::Variables { .. } => "MIL-STD-414 Table B".to_owned(),
        PlanTerms::Designed {
            p1,
            alpha,
            p2,
            beta,
        } => format!(
            "designed for p1 = {} %, α = {} %, p2 = {} %, β = {} %",
            percent(*p1),
            percent(*alpha),
            percent(*p2),
            percent(*beta)
        ),
        PlanTerms::ZeroAccept {
            limiting_quality,
            consumer_risk,
        } => format!(
            "zero-accept for a limiting quality of {} % at a consumer’s risk of {} %",
            percent(*limiting_quality),
            percent(*consumer_risk)
        ),
    }
}

fn zero(terms: &PlanTerms, standings: &[Standing]) -> Option<ZeroAcceptFacts> {
    let PlanTerms::ZeroAccept {
        limiting_quality,
        consumer_risk,
    } = terms
    else {
        return None;
    };
    let plan = standings.iter().find_map(|one| match &one.terms.basis {
        Basis::ZeroAccept(plan) => Some(plan),
        Basis::Table(..) | Basis::All => None,
    })?;
    Some(ZeroAcceptFacts {
        limiting_quality_percent: figure(100.0 * limiting_quality)?,
        consumer_risk: figure(*consumer_risk)?,
        nonconforming: plan.nonconforming,
        accepted: figure(plan.accepted)?,
    })
}

fn class(standing: &Standing) -> Result<ClassPlan, PlanError> {
    let terms = &standing.terms;
    let table = match &terms.basis {
        Basis::Table(aql, plan) => Some((aql, plan)),
        Basis::ZeroAccept(_) | Basis::All => None,
    };
    let letter = |of: fn(&SinglePlan) -> String| table.map(|(_, plan)| of(plan));
    let sampled = table.filter(|(_, plan)| {
        u64::from(plan.accept) == terms.accept && u64::from(plan.sample_size) == terms.sample_size
    });
    let accepted_at_aql = match sampled {
        Some((aql, plan)) => figure(probability_of_acceptance(plan, aql.get() / 100.0)?),
        None => None,
    };
    Ok(ClassPlan {
        class: terms.class,
        aql: table.and_then(|(aql, _)| figure(aql.get())),
        code_letter: letter(|plan| plan.printed_letter.to_string()),
        used_letter: letter(|plan| plan.letter.to_string()),
        sample_size: terms.sample_size,
        accept: terms.accept,
        reject: terms.reject,
        failing: standing.failing,
        undecided: standing.undecided,
        accepted_at_aql,
        missing: standing.missing,
        to_accept: standing.to_accept(),
        to_reject: standing.to_reject(),
        if_undecided_conform: standing.read(false),
        if_undecided_fail: standing.read(true),
    })
}

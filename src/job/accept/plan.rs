//! The plan and how its classes stand, as the result tells it.

use crate::drawing::PlanTerms;
use crate::lot::{Outcome, SinglePlan, Standing, probability_of_acceptance};
use crate::quantity::Class;
use crate::record::{ClassPlan, PlanFacts};

use super::super::facts::figure;

/// The plan of a lot.
///
/// # Errors
/// Where a probability of acceptance cannot be had.
pub(super) fn facts(terms: &PlanTerms, outcome: &Outcome) -> miette::Result<PlanFacts> {
    let classes = outcome
        .standings
        .iter()
        .map(class)
        .collect::<miette::Result<Vec<_>>>()?;
    let main = classes
        .iter()
        .find(|one| one.class == Class::Major)
        .or(classes.first());
    let (by, level) = match terms {
        PlanTerms::EverySpring => ("every-spring", None),
        PlanTerms::Attributes { level, .. } => ("attributes", Some(level.word().to_owned())),
    };
    Ok(PlanFacts {
        by: by.to_owned(),
        level,
        code_letter: main.and_then(|one| one.code_letter.clone()),
        sample_size: classes.iter().map(|one| one.sample_size).max().unwrap_or(0),
        accept: main.map_or(0, |one| one.accept),
        reject: main.map_or(1, |one| one.reject),
        classes,
    })
}

fn class(standing: &Standing) -> miette::Result<ClassPlan> {
    let terms = &standing.terms;
    let letter = |of: fn(&SinglePlan) -> String| terms.plan.as_ref().map(|(_, plan)| of(plan));
    let sampled = terms.plan.as_ref().filter(|(_, plan)| {
        u64::from(plan.accept) == terms.accept && u64::from(plan.sample_size) == terms.sample_size
    });
    let accepted_at_aql = match sampled {
        Some((aql, plan)) => {
            let found = probability_of_acceptance(plan, aql.get() / 100.0);
            figure(found.map_err(|fault| {
                miette::miette!("the plan's operating characteristic cannot be computed: {fault}")
            })?)
        }
        None => None,
    };
    Ok(ClassPlan {
        class: terms.class,
        aql: terms.plan.as_ref().and_then(|(aql, _)| figure(aql.get())),
        code_letter: letter(|plan| plan.printed_letter.to_string()),
        used_letter: letter(|plan| plan.letter.to_string()),
        sample_size: terms.sample_size,
        accept: terms.accept,
        reject: terms.reject,
        failing: standing.failing,
        undecided: standing.undecided,
        accepted_at_aql,
    })
}

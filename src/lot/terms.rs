//! The plan of each class, from the terms of the drawing and the size of the lot.

use crate::drawing::{Aqls, Level, Level414, PlanTerms, State};
use crate::quantity::Class;
use crate::sampling::{
    Aql, PlanError, Points, SinglePlan, VariablesPlan, ZeroAccept, designed, single, tighter,
    variables_plan, zero_accept,
};

/// Where the numbers of a class come from.
#[derive(Clone, Debug, PartialEq)]
pub enum Basis {
    /// The table of ISO 2859-1.
    Table(Aql, SinglePlan),
    /// A limiting quality and a consumer's risk.
    ZeroAccept(ZeroAccept),
    /// Every spring, or a critical class without an AQL of its own on the sample of the others.
    All,
}

/// What the plan asks of one class.
#[derive(Clone, Debug, PartialEq)]
pub struct ClassTerms {
    /// Class.
    pub class: Class,
    /// Where its numbers come from.
    pub basis: Basis,
    /// Springs to measure: the plan's sample size, or the whole lot where that is smaller.
    pub sample_size: u64,
    /// Ac.
    pub accept: u64,
    /// Re.
    pub reject: u64,
}

/// The terms of the classes in `present`, gravest first, under `state`. `critical` accepts on zero whatever its AQL says.
/// Under a plan by variables only `critical` is counted; the rest is decided characteristic by characteristic.
///
/// # Errors
/// [`PlanError`] where the table has no plan.
pub fn class_terms(
    terms: &PlanTerms,
    state: State,
    lot_size: u64,
    present: &[Class],
) -> Result<Vec<ClassTerms>, PlanError> {
    match terms {
        PlanTerms::EverySpring => Ok(present
            .iter()
            .map(|class| zero(*class, Basis::All, lot_size))
            .collect()),
        PlanTerms::ZeroAccept {
            limiting_quality,
            consumer_risk,
        } => {
            let plan = zero_accept(lot_size, *limiting_quality, *consumer_risk)?;
            let basis = Basis::ZeroAccept(plan);
            Ok(present
                .iter()
                .map(|class| zero(*class, basis.clone(), plan.sample_size))
                .collect())
        }
        PlanTerms::Attributes { level, aql, .. } => by_table(*level, aql, state, lot_size, present),
        PlanTerms::Variables { .. } | PlanTerms::Designed { .. } => {
            let mut widest = None;
            for class in present {
                let plan = variables_terms(terms, state, lot_size, *class)?;
                widest = widest.max(plan.map(|plan| plan.sample_size));
            }
            let critical = present.iter().filter(|class| **class == Class::Critical);
            Ok(critical
                .map(|class| zero(*class, Basis::All, widest.unwrap_or(lot_size)))
                .collect())
        }
    }
}

const fn zero(class: Class, basis: Basis, sample_size: u64) -> ClassTerms {
    ClassTerms {
        class,
        basis,
        sample_size,
        accept: 0,
        reject: 1,
    }
}

/// The AQL that `terms` state for a class, in percent; `None` where they state none.
pub fn aql_of_class(terms: &PlanTerms, class: Class) -> Option<f64> {
    match terms {
        PlanTerms::Attributes { aql, .. } | PlanTerms::Variables { aql, .. } => aql_of(aql, class),
        _ => None,
    }
}

fn aql_of(aqls: &Aqls, class: Class) -> Option<f64> {
    match aqls {
        Aqls::All(aql) => Some(*aql),
        Aqls::ByClass(given) => given
            .iter()
            .find(|(known, _)| *known == class)
            .map(|(_, aql)| *aql),
    }
}

fn by_table(
    level: Level,
    aqls: &Aqls,
    state: State,
    lot_size: u64,
    present: &[Class],
) -> Result<Vec<ClassTerms>, PlanError> {
    let mut built = Vec::new();
    for class in present {
        let aql = aql_of(aqls, *class).map(Aql::try_from).transpose()?;
        let Some(aql) = aql else {
            if *class != Class::Critical {
                return Err(PlanError::NoAql { class: *class });
            }
            built.push(zero(*class, Basis::All, lot_size)); // sample size settled below
            continue;
        };
        let plan = single(lot_size, level, aql, state)?;
        let (accept, reject) = if *class == Class::Critical {
            (0, 1)
        } else {
            (u64::from(plan.accept), u64::from(plan.reject))
        };
        built.push(ClassTerms {
            class: *class,
            basis: Basis::Table(aql, plan),
            sample_size: u64::from(plan.sample_size).min(lot_size),
            accept,
            reject,
        });
    }
    // A critical class without an AQL of its own is looked at on every spring the other classes take.
    let widest = built
        .iter()
        .filter(|one| one.basis != Basis::All)
        .map(|one| one.sample_size)
        .max();
    for one in built.iter_mut().filter(|one| one.basis == Basis::All) {
        one.sample_size = widest.unwrap_or(lot_size);
    }
    Ok(built)
}

/// The terms with every AQL one step tighter; `None` where the plan has no AQL or none is tighter.
pub fn one_step_tighter(terms: &PlanTerms) -> Option<PlanTerms> {
    let PlanTerms::Attributes {
        level,
        aql,
        state,
        reduced_agreed,
    } = terms
    else {
        return None;
    };
    let step = |aql: f64| tighter(Aql::try_from(aql).ok()?).map(Aql::get);
    let aql = match aql {
        Aqls::All(aql) => Aqls::All(step(*aql)?),
        Aqls::ByClass(given) => {
            let all: Option<Vec<(Class, f64)>> = given
                .iter()
                .map(|(class, aql)| {
                    // critical accepts on zero whatever its AQL is
                    let kept = (*class == Class::Critical).then_some(*aql);
                    Some((*class, kept.or_else(|| step(*aql))?))
                })
                .collect();
            Aqls::ByClass(all?)
        }
    };
    Some(PlanTerms::Attributes {
        level: *level,
        aql,
        state: *state,
        reduced_agreed: *reduced_agreed,
    })
}

/// The plan by variables for characteristics of `class`; `None` where the terms are no plan by variables, or for a
/// critical class without an AQL of its own.
///
/// # Errors
/// [`PlanError`] where the table has no plan, or the lot is smaller than the sample.
pub fn variables_terms(
    terms: &PlanTerms,
    state: State,
    lot_size: u64,
    class: Class,
) -> Result<Option<VariablesPlan>, PlanError> {
    match terms {
        PlanTerms::Variables { level, aql, .. } => table_plan(*level, aql, state, lot_size, class),
        PlanTerms::Designed {
            p1,
            alpha,
            p2,
            beta,
        } => {
            let (p1, alpha, p2, beta) = (*p1, *alpha, *p2, *beta);
            let plan = designed(Points {
                p1,
                alpha,
                p2,
                beta,
            })?
            .plan;
            if plan.sample_size > lot_size {
                let wanted = plan.sample_size;
                return Err(PlanError::SampleExceedsLot {
                    wanted,
                    lot: lot_size,
                });
            }
            Ok(Some(plan))
        }
        _ => Ok(None),
    }
}

fn table_plan(
    level: Level414,
    aqls: &Aqls,
    state: State,
    lot_size: u64,
    class: Class,
) -> Result<Option<VariablesPlan>, PlanError> {
    match aql_of(aqls, class) {
        Some(aql) => variables_plan(lot_size, level, aql, state).map(Some),
        None if class == Class::Critical => Ok(None),
        None => Err(PlanError::NoAql { class }),
    }
}

//! The plan of each class, from the terms of the drawing and the size of the lot.

use crate::drawing::{Aqls, PlanTerms};
use crate::quantity::Class;

use super::plan::{Aql, PlanError, SinglePlan, normal_single};

/// What the plan asks of one class.
#[derive(Clone, Debug, PartialEq)]
pub struct ClassTerms {
    /// Class.
    pub class: Class,
    /// The plan of the table; `None` where every spring is measured or the class is zero-accept without an AQL.
    pub plan: Option<(Aql, SinglePlan)>,
    /// Springs to measure: the plan's sample size, or the whole lot where that is smaller.
    pub sample_size: u64,
    /// Ac.
    pub accept: u64,
    /// Re.
    pub reject: u64,
}

/// The terms of the classes in `present`, gravest first. `critical` accepts on zero whatever its AQL says.
///
/// # Errors
/// [`PlanError`] where the table has no plan.
pub fn class_terms(
    terms: &PlanTerms,
    lot_size: u64,
    present: &[Class],
) -> Result<Vec<ClassTerms>, PlanError> {
    let all = |class| ClassTerms {
        class,
        plan: None,
        sample_size: lot_size,
        accept: 0,
        reject: 1,
    };
    let (level, aqls) = match terms {
        PlanTerms::EverySpring => return Ok(present.iter().map(|class| all(*class)).collect()),
        PlanTerms::Attributes { level, aql } => (*level, aql),
    };
    let mut built = Vec::new();
    for class in present {
        let aql = match (aqls, class) {
            (Aqls::All(aql), _) => Some(*aql),
            (Aqls::ByClass(given), class) => given
                .iter()
                .find(|(known, _)| known == class)
                .map(|(_, aql)| *aql),
        };
        let Some(aql) = aql.map(Aql::try_from).transpose()? else {
            if *class != Class::Critical {
                return Err(PlanError::NoAql { class: *class });
            }
            built.push(all(*class)); // sample size settled below
            continue;
        };
        let plan = normal_single(lot_size, level, aql)?;
        let (accept, reject) = if *class == Class::Critical {
            (0, 1)
        } else {
            (u64::from(plan.accept), u64::from(plan.reject))
        };
        built.push(ClassTerms {
            class: *class,
            plan: Some((aql, plan)),
            sample_size: u64::from(plan.sample_size).min(lot_size),
            accept,
            reject,
        });
    }
    // A critical class without an AQL of its own is looked at on every spring the other classes take.
    let widest = built
        .iter()
        .filter(|one| one.plan.is_some())
        .map(|one| one.sample_size)
        .max();
    for one in built.iter_mut().filter(|one| one.plan.is_none()) {
        one.sample_size = widest.unwrap_or(lot_size);
    }
    Ok(built)
}

//! The decision on the lot: the state of inspection, the plan of each class or characteristic, what would settle it.

use std::collections::{HashMap, HashSet};

use crate::drawing::{Acceptance, Drawing, PlanTerms, State};
use crate::lot::{Decision, LotReason, Outcome, class_terms, decide, gravest, one_step_tighter};
use crate::quantity::Class;
use crate::record::{
    CharacteristicResult, PlanFacts, SettlingFacts, SimpleAcceptance, StateFacts, Verdict,
};
use crate::sampling::{PastLot, PlanError, Reason, next};
use crate::stats::{Dof, student_quantile};
use crate::text::InputFile;

use super::super::facts::figure;
use super::error::AcceptError;
use super::group::{Ordered, sample_order};
use super::springs::Judged;
use super::{Files, classes, plan, variables};

/// The lots before this one, for the switching rules.
#[derive(Clone, Debug)]
pub struct Past {
    /// Where they stand, as the report says it: a file's name, or the archive.
    pub from: String,
    /// The lots in the order of their decisions.
    pub lots: Vec<PastLot>,
    /// The file, where it is one.
    pub input: Option<InputFile>,
}

/// A decided lot.
pub(super) struct Decided {
    pub(super) decision: Decision,
    pub(super) reasons: Vec<LotReason>,
    pub(super) simple: SimpleAcceptance,
    pub(super) plan: PlanFacts,
    /// The springs that may form the sample, in its order.
    pub(super) sampled: Vec<String>,
}

/// Decides the lot.
///
/// # Errors
/// Where the plan does not exist, the sample is ill named, or inspection is discontinued.
pub(super) fn decide_lot(
    files: &Files,
    terms: &Acceptance,
    judged: &[Judged],
    past: Option<&Past>,
) -> miette::Result<Decided> {
    let (sampled, others) = sample_order(&files.lot, judged)?;
    let (state, told) = inspection(&terms.plan, past)?;
    let size = files.lot.size.value;
    let classes = classes(files, judged);
    let plans = class_terms(&terms.plan, state, size, &classes)?;
    let mut outcome = decide(&plans, &sampled, &others, terms.undecided);
    let by_id: HashMap<&str, &Judged> = judged
        .iter()
        .map(|one| (one.result.id.as_str(), one))
        .collect();
    let sample: Vec<&Judged> = sampled
        .iter()
        .filter_map(|(id, _)| by_id.get(id.as_str()).copied())
        .collect();
    let estimated = variables::all(files, terms, state, &sample)?;
    let by_variables = matches!(
        terms.plan,
        PlanTerms::Variables { .. } | PlanTerms::Designed { .. }
    );
    let if_simple: Vec<Decision> = estimated.iter().map(|one| one.simple).collect();
    let mut facts = Vec::new();
    let mut reasons = Vec::new();
    for one in estimated {
        facts.push(one.facts);
        reasons.extend(one.reason);
    }
    let mut plan = plan::facts(&terms.plan, &outcome.standings, told, facts)?;
    if by_variables {
        merge(
            &mut outcome,
            plan.classes.is_empty(),
            &plan,
            &if_simple,
            reasons,
        );
        beside(&mut outcome, judged, &sampled, plan.sample_size);
    }
    plan.accepted_tighter = tighter(terms, state, size, &classes, &sampled, &others)?;
    if outcome.decision == Decision::Undecided {
        plan.settling = settling(&files.drawing, &sample, plan.sample_size);
    }
    Ok(Decided {
        decision: outcome.decision,
        reasons: outcome.reasons,
        simple: SimpleAcceptance {
            decision: outcome.simple,
            failing: outcome.simple_failing,
        },
        plan,
        sampled: sampled.into_iter().map(|(id, _)| id).collect(),
    })
}

/// The state of inspection: by the switching rules where past lots are known, else as the drawing states it.
fn inspection(
    terms: &PlanTerms,
    past: Option<&Past>,
) -> Result<(State, Option<StateFacts>), AcceptError> {
    let (stated, reduced_agreed) = match (terms, past) {
        (
            PlanTerms::Attributes {
                state,
                reduced_agreed,
                ..
            },
            _,
        ) => (*state, *reduced_agreed),
        (_, Some(past)) => {
            return Err(AcceptError::HistoryUnused {
                history: past.from.clone(),
            });
        }
        (PlanTerms::Variables { state, .. }, None) => (*state, false),
        _ => return Ok((State::Normal, None)),
    };
    let Some(past) = past else {
        let told = StateFacts {
            state: stated.word().to_owned(),
            history: None,
            lots: 0,
            reason: None,
        };
        return Ok((stated, Some(told)));
    };
    let found = next(&past.lots, stated, reduced_agreed);
    if let Reason::Discontinued { lot } = &found.reason {
        return Err(AcceptError::Discontinued {
            history: past.from.clone(),
            lot: lot.clone(),
        });
    }
    let told = StateFacts {
        state: found.state.word().to_owned(),
        history: Some(past.from.clone()),
        lots: past.lots.len() as u64,
        reason: Some(found.reason),
    };
    Ok((found.state, Some(told)))
}

/// Adds what the characteristics say to what the counted classes say.
fn merge(
    outcome: &mut Outcome,
    nothing_counted: bool,
    plan: &PlanFacts,
    simple: &[Decision],
    reasons: Vec<LotReason>,
) {
    let mut all: Vec<Decision> = plan.variables.iter().map(|one| one.decision).collect();
    let mut all_simple = simple.to_vec();
    if !nothing_counted {
        all.push(outcome.decision);
        all_simple.push(outcome.simple);
    }
    outcome.decision = gravest(&all);
    outcome.simple = gravest(&all_simple);
    outcome.reasons.extend(reasons);
    // what decides stands first: a terminal shows only a few
    outcome.reasons.sort_by_key(weight);
}

/// Rejection first, then what is undecided, then acceptance.
const fn weight(reason: &LotReason) -> u8 {
    match reason {
        LotReason::ProvenFailures { .. }
        | LotReason::ByVariables {
            decision: Decision::Rejected,
            ..
        } => 0,
        LotReason::WithinAcceptance { .. }
        | LotReason::ByVariables {
            decision: Decision::Accepted,
            ..
        } => 2,
        _ => 1,
    }
}

/// What a plan by variables does not decide: springs proven failing are named; what was seen has no agreed number.
fn beside(outcome: &mut Outcome, judged: &[Judged], sampled: &Ordered, size: u64) {
    let size = usize::try_from(size).unwrap_or(usize::MAX);
    outcome.simple_failing = sampled
        .iter()
        .take(size)
        .filter(|(_, spring)| spring.simple == Verdict::Fails)
        .count() as u64;
    let measured = |one: &Judged| {
        let fails = |of: &CharacteristicResult| of.verdict == Some(Verdict::Fails);
        one.result.characteristics.iter().any(fails)
    };
    let springs: Vec<String> = judged
        .iter()
        .filter(|one| measured(one))
        .map(|one| one.result.id.clone())
        .collect();
    if !springs.is_empty() {
        outcome.reasons.push(LotReason::ProvenBeside { springs });
    }
    let inside: HashSet<&str> = sampled
        .iter()
        .take(size)
        .map(|(id, _)| id.as_str())
        .collect();
    let mut seen: Vec<LotReason> = judged
        .iter()
        .filter(|one| measured(one) && !inside.contains(one.result.id.as_str()))
        .filter_map(|one| {
            Some(LotReason::FailureBeyondSample {
                spring: one.result.id.clone(),
                class: one.overall.failing?,
            })
        })
        .collect();
    for one in judged {
        let findings = one.result.findings.iter();
        seen.extend(
            findings
                .filter(|finding| finding.class != Class::Critical)
                .map(|finding| LotReason::FindingWithoutNumber {
                    spring: one.result.id.clone(),
                    class: finding.class,
                }),
        );
    }
    if !seen.is_empty() {
        outcome.decision = gravest(&[outcome.decision, Decision::Undecided]);
        outcome.reasons.extend(seen);
    }
}

/// Whether the lot would also have been accepted with every AQL one step tighter; `None` where the plan has none.
fn tighter(
    terms: &Acceptance,
    state: State,
    size: u64,
    classes: &[Class],
    sampled: &Ordered,
    others: &Ordered,
) -> Result<Option<bool>, PlanError> {
    let Some(plan) = one_step_tighter(&terms.plan) else {
        return Ok(None);
    };
    let plans = class_terms(&plan, state, size, classes)?;
    let outcome = decide(&plans, sampled, others, terms.undecided);
    Ok(Some(outcome.decision == Decision::Accepted))
}

/// What would settle each undecided characteristic of the sample: the nearest springs first, for fewest of them are
/// needed.
fn settling(drawing: &Drawing, sample: &[&Judged], size: u64) -> Vec<SettlingFacts> {
    let size = usize::try_from(size).unwrap_or(usize::MAX);
    let mut found: Vec<SettlingFacts> = Vec::new();
    for spring in sample.iter().take(size) {
        let open = |of: &&CharacteristicResult| of.verdict == Some(Verdict::Undecided);
        for of in spring.result.characteristics.iter().filter(open) {
            found.extend(settled_by(drawing, &spring.result.id, of));
        }
    }
    found.sort_by(|a, b| share(b).total_cmp(&share(a)));
    found
}

/// How much of today's uncertainty may stay; the larger, the easier.
fn share(of: &SettlingFacts) -> f64 {
    let both = of.wanted_uncertainty.zip(of.expanded_uncertainty);
    both.map_or(0.0, |(wanted, now)| wanted.get() / now.get())
}

fn settled_by(drawing: &Drawing, spring: &str, of: &CharacteristicResult) -> Option<SettlingFacts> {
    let requirement = drawing.requirements.iter().find(|one| {
        one.quantity.name() == of.name && one.quantity.at_length() == of.at_length_mm
    })?;
    let limits = requirement.limits;
    let distance = of.value.and_then(|value| {
        let limits = [limits.lower, limits.upper].into_iter().flatten();
        limits
            .map(|limit| (value.get() - limit).abs())
            .reduce(f64::min)
    });
    let proof = student_quantile(0.95, Dof::Infinite).ok()?;
    let own_share = of
        .own_uncertainty
        .zip(of.standard_uncertainty)
        .and_then(|(own, all)| figure((own.get() / all.get()).powi(2)));
    Some(SettlingFacts {
        spring: spring.to_owned(),
        name: of.name.clone(),
        at_length_mm: of.at_length_mm,
        class: requirement.class,
        unit: of.unit,
        expanded_uncertainty: of.expanded_uncertainty,
        wanted_uncertainty: distance
            .filter(|distance| *distance > 0.0)
            .and_then(|distance| figure(2.0 * distance / proof)),
        own_share,
    })
}

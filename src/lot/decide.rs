//! The decision on a lot.

use crate::drawing::Policy;
use crate::verdict::{Overall, Verdict};

use super::outcome::{Outcome, Standing};
use super::reason::{Decision, LotReason};
use super::terms::ClassTerms;

/// Decides a lot from the springs that may form the sample, in its order, and the `others` that may not; springs beyond
/// a class' sample size do not count for it.
///
/// d ≥ Re: rejected, proven. d + u ≤ Ac: accepted. Otherwise as `policy` says. Missing springs count as if they could
/// all fail. A proven failure beyond the sample leaves an otherwise accepted lot undecided.
pub fn decide(
    terms: &[ClassTerms],
    springs: &[(String, Overall)],
    others: &[(String, Overall)],
    policy: Policy,
) -> Outcome {
    let mut reasons = Vec::new();
    let mut decisions = Vec::new();
    let mut standings = Vec::new();
    let mut simple = Vec::new();
    for one in terms {
        let standing = stand(one, springs);
        let (decision, reason) = of_class(&standing, policy);
        decisions.push(decision);
        reasons.push(reason);
        simple.push(simply(one, springs, standing.missing));
        standings.push(standing);
    }
    let beyond = beyond_sample(terms, springs, others);
    if !beyond.is_empty() {
        decisions.push(Decision::Undecided);
        reasons.extend(beyond);
    }
    let widest = terms.iter().map(|one| one.sample_size).max().unwrap_or(0);
    let simple_failing = sample(springs, widest)
        .filter(|spring| spring.simple == Verdict::Fails)
        .count() as u64;
    Outcome {
        decision: gravest(&decisions),
        reasons,
        standings,
        simple: gravest(&simple),
        simple_failing,
    }
}

/// The gravest of several decisions; undecided where there is none.
pub fn gravest(decisions: &[Decision]) -> Decision {
    if decisions.contains(&Decision::Rejected) {
        Decision::Rejected
    } else if decisions.contains(&Decision::Undecided) || decisions.is_empty() {
        Decision::Undecided
    } else {
        Decision::Accepted
    }
}

fn sample(springs: &[(String, Overall)], size: u64) -> impl Iterator<Item = &Overall> {
    springs
        .iter()
        .take(usize::try_from(size).unwrap_or(usize::MAX))
        .map(|(_, overall)| overall)
}

fn stand(terms: &ClassTerms, springs: &[(String, Overall)]) -> Standing {
    let class = terms.class;
    let count = |of: &dyn Fn(&Overall) -> bool| {
        sample(springs, terms.sample_size)
            .filter(|spring| of(spring))
            .count() as u64
    };
    let open = |spring: &Overall| spring.failing.is_none_or(|proven| proven < class);
    Standing {
        terms: terms.clone(),
        failing: count(&|spring| spring.failing == Some(class)),
        undecided: count(&|spring| spring.undecided.contains(&class) && open(spring)),
        unmeasured: count(&|spring| spring.unmeasured.contains(&class) && open(spring)),
        missing: terms.sample_size - count(&|_| true),
    }
}

fn of_class(standing: &Standing, policy: Policy) -> (Decision, LotReason) {
    settled(standing).unwrap_or_else(|| by_agreement(standing, policy))
}

/// What holds whatever is agreed on undecided springs: proven failures, acceptance in the worst case, springs missing.
fn settled(standing: &Standing) -> Option<(Decision, LotReason)> {
    let (failing, undecided, missing) = (standing.failing, standing.undecided, standing.missing);
    let ClassTerms {
        class,
        accept,
        reject,
        sample_size: wanted,
        ..
    } = standing.terms;
    if failing >= reject {
        let reason = LotReason::ProvenFailures {
            class,
            failing,
            reject,
        };
        return Some((Decision::Rejected, reason));
    }
    if failing + undecided + missing <= accept {
        let reason = LotReason::WithinAcceptance {
            class,
            failing,
            undecided,
            accept,
        };
        return Some((Decision::Accepted, reason));
    }
    let measured = wanted - missing;
    let reason = LotReason::Missing {
        class,
        measured,
        wanted,
        to_accept: standing.to_accept(),
        to_reject: standing.to_reject(),
    };
    (missing > 0).then_some((Decision::Undecided, reason))
}

/// What is agreed on undecided springs; agreement covers no spring that was not measured.
fn by_agreement(standing: &Standing, policy: Policy) -> (Decision, LotReason) {
    let (failing, undecided, unmeasured) =
        (standing.failing, standing.undecided, standing.unmeasured);
    let ClassTerms {
        class,
        accept,
        reject,
        ..
    } = standing.terms;
    match policy {
        Policy::Fail => {
            let reason = LotReason::UndecidedFail {
                class,
                failing,
                undecided,
                reject,
            };
            (Decision::Rejected, reason)
        }
        _ if failing + unmeasured > accept => {
            let reason = LotReason::Unmeasured {
                class,
                failing,
                unmeasured,
                accept,
            };
            (Decision::Undecided, reason)
        }
        Policy::Report => {
            let reason = LotReason::UndecidedMatter {
                class,
                failing,
                undecided,
                accept,
            };
            (Decision::Undecided, reason)
        }
        Policy::Pass => (
            Decision::Accepted,
            LotReason::UndecidedPass { class, undecided },
        ),
    }
}

fn simply(terms: &ClassTerms, springs: &[(String, Overall)], missing: u64) -> Decision {
    let of = |verdict| {
        sample(springs, terms.sample_size)
            .filter(|spring| {
                spring.simple == verdict
                    && (verdict != Verdict::Fails || spring.simple_failing == Some(terms.class))
            })
            .count() as u64
    };
    let failing = of(Verdict::Fails);
    if failing >= terms.reject {
        Decision::Rejected
    } else if failing + of(Verdict::Undecided) + missing > terms.accept {
        Decision::Undecided
    } else {
        Decision::Accepted
    }
}

fn beyond_sample(
    terms: &[ClassTerms],
    springs: &[(String, Overall)],
    others: &[(String, Overall)],
) -> Vec<LotReason> {
    let mut named = Vec::new();
    for one in terms {
        let size = usize::try_from(one.sample_size).unwrap_or(usize::MAX);
        let failing = springs
            .iter()
            .skip(size)
            .chain(others)
            .filter(|(_, spring)| spring.failing == Some(one.class));
        named.extend(failing.map(|(id, _)| LotReason::FailureBeyondSample {
            spring: id.clone(),
            class: one.class,
        }));
    }
    named
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use super::*;
    use crate::lot::Basis;
    use crate::quantity::Class;

    fn spring(failing: Option<Class>, undecided: &[Class]) -> (String, Overall) {
        let verdict = if failing.is_some() {
            Verdict::Fails
        } else if undecided.is_empty() {
            Verdict::Conforms
        } else {
            Verdict::Undecided
        };
        let undecided: BTreeSet<Class> = undecided.iter().copied().collect();
        (
            String::new(),
            Overall {
                verdict,
                failing,
                undecided,
                unmeasured: BTreeSet::new(),
                simple: verdict,
                simple_failing: failing,
            },
        )
    }

    fn terms(class: Class, sample_size: u64, accept: u64) -> ClassTerms {
        ClassTerms {
            class,
            basis: Basis::All,
            sample_size,
            accept,
            reject: accept + 1,
        }
    }

    fn lot(good: usize, failing: usize, undecided: usize) -> Vec<(String, Overall)> {
        let mut springs = vec![spring(None, &[]); good];
        springs.extend(vec![spring(Some(Class::Major), &[]); failing]);
        springs.extend(vec![spring(None, &[Class::Major]); undecided]);
        springs
    }

    #[test]
    fn the_rule_of_proven_and_undecided_springs() {
        let plan = [terms(Class::Major, 10, 2)];
        let rows = [
            (7, 3, 0, Policy::Pass, Decision::Rejected),
            (8, 1, 1, Policy::Fail, Decision::Accepted),
            (7, 2, 1, Policy::Report, Decision::Undecided),
            (7, 2, 1, Policy::Pass, Decision::Accepted),
            (7, 2, 1, Policy::Fail, Decision::Rejected),
            (6, 0, 0, Policy::Pass, Decision::Undecided), // four missing
            (8, 0, 0, Policy::Report, Decision::Accepted), // even both missing ones failing
            (2, 3, 0, Policy::Report, Decision::Rejected), // settled although five are missing
        ];
        for (good, failing, undecided, policy, wanted) in rows {
            let got = decide(&plan, &lot(good, failing, undecided), &[], policy).decision;
            assert_eq!(
                got, wanted,
                "{good} good, {failing} failing, {undecided} undecided, {policy:?}"
            );
        }
    }

    #[test]
    fn what_was_never_measured_passes_by_no_agreement() {
        let plan = [terms(Class::Major, 10, 2)];
        let mut springs = lot(7, 0, 3);
        for (_, spring) in springs.iter_mut().skip(7) {
            spring.unmeasured = spring.undecided.clone();
        }
        assert_eq!(
            decide(&plan, &springs, &[], Policy::Pass).decision,
            Decision::Undecided
        );
        springs.truncate(9);
        springs.push(spring(None, &[Class::Major]));
        assert_eq!(
            decide(&plan, &springs, &[], Policy::Pass).decision,
            Decision::Accepted
        );
    }

    #[test]
    fn a_spring_counts_once_in_its_gravest_class() {
        let plan = [
            terms(Class::Critical, 5, 0),
            terms(Class::Major, 5, 1),
            terms(Class::Minor, 5, 1),
        ];
        let mut springs = lot(3, 1, 0);
        springs.push(spring(Some(Class::Minor), &[Class::Major]));
        let outcome = decide(&plan, &springs, &[], Policy::Report);
        let counts: Vec<(u64, u64)> = outcome
            .standings
            .iter()
            .map(|one| (one.failing, one.undecided))
            .collect();
        assert_eq!(counts, [(0, 0), (1, 1), (1, 0)]);
        assert_eq!(outcome.decision, Decision::Undecided);
        springs.pop();
        springs.push(spring(Some(Class::Critical), &[]));
        assert_eq!(
            decide(&plan, &springs, &[], Policy::Pass).decision,
            Decision::Rejected
        );
    }

    #[test]
    fn a_failure_beyond_the_sample_is_named_and_withholds_acceptance() {
        let plan = [terms(Class::Major, 5, 0)];
        let outcome = decide(&plan, &lot(5, 1, 0), &[], Policy::Pass);
        assert_eq!(outcome.decision, Decision::Undecided);
        assert!(matches!(
            outcome.reasons.last(),
            Some(LotReason::FailureBeyondSample { .. })
        ));
    }
}

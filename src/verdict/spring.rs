//! A spring from its characteristics.

use std::collections::BTreeSet;

use crate::quantity::Class;

use super::judge::Judged;
use super::reason::Verdict;

/// What holds for a whole spring.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Overall {
    /// The verdict.
    pub verdict: Verdict,
    /// Class of the gravest proven failure.
    pub failing: Option<Class>,
    /// Classes of the requirements left undecided.
    pub undecided: BTreeSet<Class>,
    /// Those of them that have no value, or none whose uncertainty is known: no agreed term can count them as conforming.
    pub unmeasured: BTreeSet<Class>,
    /// What simple acceptance would have said.
    pub simple: Verdict,
    /// Class of the gravest failure under simple acceptance.
    pub simple_failing: Option<Class>,
}

/// A spring fails if any requirement fails or a finding counts against it; it conforms only if every requirement
/// conforms; else it is undecided. `not_inspected` requirements are not among `judged`.
pub fn overall<'a>(
    judged: impl Iterator<Item = (Class, &'a Judged)>,
    findings: &[Class],
) -> Overall {
    let found = findings.iter().copied().max();
    let (mut failing, mut undecided) = (found, BTreeSet::new());
    let mut unmeasured = BTreeSet::new();
    let (mut simple_failing, mut simple_undecided) = (found, false);
    for (class, judged) in judged {
        match judged.verdict {
            Verdict::Fails => failing = failing.max(Some(class)),
            Verdict::Undecided => {
                undecided.insert(class);
                if judged.guard.is_none() {
                    unmeasured.insert(class);
                }
            }
            Verdict::Conforms => {}
        }
        match judged.simple {
            Verdict::Fails => simple_failing = simple_failing.max(Some(class)),
            Verdict::Undecided => simple_undecided = true,
            Verdict::Conforms => {}
        }
    }
    Overall {
        verdict: verdict(failing, !undecided.is_empty()),
        failing,
        undecided,
        unmeasured,
        simple: verdict(simple_failing, simple_undecided),
        simple_failing,
    }
}

const fn verdict(failing: Option<Class>, undecided: bool) -> Verdict {
    match (failing, undecided) {
        (Some(_), _) => Verdict::Fails,
        (None, true) => Verdict::Undecided,
        (None, false) => Verdict::Conforms,
    }
}

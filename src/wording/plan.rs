//! Words for the plan: its state, a decision by variables, what may yet come of undecided springs.

use super::{count, decided, number, percent, sentence};
use crate::record::{ClassPlan, Comparison, Decision, LotReason, StateFacts, StateReason};
use crate::units::{Finite, Millimetres, System};

/// A state of inspection and why it holds.
pub(crate) fn state(facts: &StateFacts) -> String {
    let word = &facts.state;
    let Some(reason) = &facts.reason else {
        return format!("{word}, as the drawing states it");
    };
    let from = facts.history.as_deref().unwrap_or("the past lots");
    let lots = count(facts.lots, "past lot");
    let why = match reason {
        StateReason::Start => "the state inspection began with".to_owned(),
        StateReason::Stays { score } => format!("switching score {score} of 30"),
        StateReason::TwoOfFive {
            lots: [first, second],
        } => {
            format!("lots {first} and {second}, two of five or fewer in a row, were not accepted")
        }
        StateReason::StaysTightened { accepted, rejected } => format!(
            "{accepted} of five accepted in a row since it was tightened, {rejected} not accepted"
        ),
        StateReason::FiveAccepted { lot } => {
            format!("lot {lot} was the fifth accepted in a row under tightened inspection")
        }
        StateReason::Score { lot } => {
            format!(
                "the switching score reached 30 with lot {lot}, and reduced inspection is agreed"
            )
        }
        StateReason::ReducedEnded { lot } => {
            format!("lot {lot} was not accepted under reduced inspection")
        }
        StateReason::Resumed { date } => {
            format!("inspection resumed on {date} after the supplier had acted")
        }
        StateReason::Discontinued { lot } => {
            format!(
                "lot {lot} was the fifth not accepted while tightened: inspection is discontinued"
            )
        }
    };
    format!("{word}: {why} ({lots} in {from}; ISO 2859-1 clause 9)")
}

/// A compared figure: standard deviations, or a share as a percentage.
pub(crate) fn compared(kind: Option<Comparison>, value: Option<Finite>) -> String {
    match kind {
        Some(Comparison::Share) => value.map_or_else(
            || percent(value),
            |share| format!("{}\u{a0}%", number(Some(100.0 * share.get()), 3)),
        ),
        _ => number(value, 4),
    }
}

/// Grounds of a decision by variables and what stands beside it.
pub(super) fn why(reason: &LotReason) -> String {
    match reason {
        LotReason::ByVariables {
            name,
            at_length_mm,
            decision,
            compared: kind,
            found,
            worse,
            better,
            wanted,
        } => by_variables(
            &named(name, *at_length_mm),
            *decision,
            *kind,
            [*found, *worse, *better, *wanted],
        ),
        LotReason::TooFewValues {
            name,
            at_length_mm,
            measured,
            wanted,
            plan,
        } => {
            let name = named(name, *at_length_mm);
            let measured = count(*measured, "spring");
            match wanted {
                Some(wanted) if wanted == plan => {
                    format!(
                        "{name}: {measured} with a value and its uncertainty where the plan by variables asks for {plan}."
                    )
                }
                Some(wanted) => format!(
                    "{name}: the values speak for rejection, but the bench’s own scatter is in them: a rejection by variables needs {wanted} \
                     springs on this bench (the plan asks for {plan}), and {measured} are there."
                ),
                None => format!(
                    "{name}: the values speak for rejection, but the bench’s own scatter explains all that was seen of {measured}; no number \
                     of springs is enough, repeats or a better bench are."
                ),
            }
        }
        LotReason::ProvenBeside { springs } => format!(
            "Proven failing besides, which the plan by variables does not count: {}.",
            super::springs(springs)
        ),
        LotReason::FindingWithoutNumber { spring, class } => format!(
            "Spring {spring} has a {} finding, and the terms agree a plan by variables, which says nothing of findings: settle it with the \
             supplier.",
            class.word()
        ),
        _ => String::new(), // never: the caller hands in these four
    }
}

fn named(name: &str, at: Option<Millimetres>) -> String {
    sentence(&super::characteristic(name, at, System::MmN))
}

fn by_variables(name: &str, decision: Decision, kind: Comparison, of: [Finite; 4]) -> String {
    let [found, worse, better, wanted] = of.map(|value| compared(Some(kind), Some(value)));
    let what = match kind {
        Comparison::Distance => format!(
            "the mean lies {found} standard deviations inside the limit, the plan wants k = {wanted}"
        ),
        Comparison::Share => {
            format!("{found} estimated outside both limits, the plan allows M = {wanted}")
        }
    };
    let shifts = format!("with the bench’s common error leaning either way {worse} to {better}");
    let end = match decision {
        Decision::Undecided => "the two do not agree, so the bench cannot decide it".to_owned(),
        decided_so => format!("{} by variables", decided(decided_so)),
    };
    format!("{name}: {what}; {shifts}: {end}.")
}

/// Of a class that is settled although springs of its sample are missing: that they change nothing.
pub(crate) fn settled_early(of: &ClassPlan) -> Option<String> {
    let settled = of.failing >= of.reject || of.to_accept == Some(0);
    (of.missing > 0 && settled).then(|| {
        format!(
            "{} requirements: {} of the sample not measured; the decision on this class can no longer change.",
            sentence(of.class.word()),
            count(of.missing, "spring")
        )
    })
}

/// What the undecided springs of a class can make of it; `None` where it is settled.
pub(crate) fn readings(of: &ClassPlan) -> Option<String> {
    if of.undecided == 0 || of.if_undecided_conform == of.if_undecided_fail && of.missing == 0 {
        return None;
    }
    let accept = of.to_accept.map_or_else(
        || "acceptance is out of reach".to_owned(),
        |more| format!("accepted once {more} of these prove conforming"),
    );
    let reject = of.to_reject.map_or_else(
        || "rejection is out of reach".to_owned(),
        |more| format!("rejected once {more} prove failing"),
    );
    Some(format!(
        "{} requirements: {} undecided and {} not measured yet. All undecided ones conforming: {}; all failing: {}. {}; {reject}.",
        sentence(of.class.word()),
        of.undecided,
        of.missing,
        decided(of.if_undecided_conform),
        decided(of.if_undecided_fail),
        sentence(&accept),
    ))
}

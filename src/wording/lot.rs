//! Words for the decision on the lot.

use super::{count, sentence};
use crate::quantity::Class;
use crate::record::{AcceptRecord, Decision, DrawingFacts, LotReason, Undecided};
use crate::units::System;

/// The word of a decision, as it stands large on page one.
pub(crate) const fn decision_word(decision: Decision) -> &'static str {
    match decision {
        Decision::Accepted => "ACCEPTED",
        Decision::Rejected => "REJECTED",
        Decision::Undecided => "UNDECIDED",
    }
}

/// The same word inside a sentence.
pub(crate) const fn decided(decision: Decision) -> &'static str {
    match decision {
        Decision::Accepted => "accepted",
        Decision::Rejected => "rejected",
        Decision::Undecided => "undecided",
    }
}

fn in_class(class: Class) -> String {
    format!("{} requirements", sentence(class.word()))
}

fn proven(failing: u64, undecided: u64) -> String {
    format!(
        "{} proven failing and {undecided} undecided",
        count(failing, "spring")
    )
}

/// What may still come of a sample that is measured in part.
fn yet(to_accept: Option<u64>, to_reject: Option<u64>) -> String {
    let accept = to_accept.map_or_else(
        || "The sample can no longer accept".to_owned(),
        |more| format!("It accepts once {more} more prove conforming"),
    );
    let reject = to_reject.map_or_else(
        || "it can no longer reject".to_owned(),
        |more| format!("rejects once {more} more prove failing"),
    );
    match to_accept {
        Some(_) => format!("{accept}, and {reject}."),
        None => format!("{accept}; it {}.", reject.trim_start_matches("it ")),
    }
}

/// One ground of the decision.
pub(crate) fn why(reason: &LotReason, show_in: System) -> String {
    match reason {
        LotReason::ProvenFailures {
            class,
            failing,
            reject,
        } => format!(
            "{}: {} proven failing, and the plan rejects from {reject}. The rejection is proven by measurement.",
            in_class(*class),
            count(*failing, "spring")
        ),
        LotReason::WithinAcceptance {
            class,
            failing,
            undecided,
            accept,
        } => format!(
            "{}: {}; even with every undecided spring failing, no more than the {accept} the plan allows.",
            in_class(*class),
            proven(*failing, *undecided)
        ),
        LotReason::UndecidedMatter {
            class,
            failing,
            undecided,
            accept,
        } => format!(
            "{}: {}; the plan allows {accept}, so the undecided springs could turn the decision.",
            in_class(*class),
            proven(*failing, *undecided)
        ),
        LotReason::Unmeasured {
            class,
            failing,
            unmeasured,
            accept,
        } => format!(
            "{}: {} proven failing and {} without a value; the plan allows {accept}. What was not measured is never counted as \
             conforming.",
            in_class(*class),
            count(*failing, "spring"),
            unmeasured
        ),
        LotReason::UndecidedPass { class, undecided } => format!(
            "{}: {} undecided, counted as conforming by the agreed terms; the burden of proof lies with the receiver.",
            in_class(*class),
            count(*undecided, "spring")
        ),
        LotReason::UndecidedFail {
            class,
            failing,
            undecided,
            reject,
        } => format!(
            "{}: {}, the undecided counted as failing by the agreed terms, and the plan rejects from {reject}. This rejection follows \
             the agreed terms and proves nothing against the supplier.",
            in_class(*class),
            proven(*failing, *undecided)
        ),
        LotReason::Missing {
            class,
            measured,
            wanted,
            to_accept,
            to_reject,
        } => format!(
            "{}: {} measured where the plan asks for {wanted}; {} missing. {}",
            in_class(*class),
            count(*measured, "spring"),
            wanted.saturating_sub(*measured),
            yet(*to_accept, *to_reject)
        ),
        LotReason::ByVariables { .. }
        | LotReason::TooFewValues { .. }
        | LotReason::ProvenBeside { .. }
        | LotReason::FindingWithoutNumber { .. } => super::plan::why(reason, show_in),
        LotReason::FailureBeyondSample { spring, class } => format!(
            "Spring {spring}, measured beyond the sample, is proven to fail a {} requirement: the sample alone would accept, but this \
             lot is not accepted while a known failure stands beside it. Take it into the sample, or settle it with the supplier.",
            class.word()
        ),
    }
}

/// What simple acceptance would have said, and whose risk it is.
pub(crate) fn simple_line(record: &AcceptRecord) -> String {
    let simple = &record.simple;
    let said = format!(
        "Simple acceptance (values against the limits as drawn, uncertainty set aside) would have said: {}, with {} failing.",
        decided(simple.decision),
        count(simple.failing, "spring")
    );
    let risk = match (simple.decision, record.decision) {
        (Decision::Accepted, Decision::Rejected | Decision::Undecided) => {
            "Accepting on that ground would put the risk of a nonconforming lot on the receiver."
        }
        (Decision::Rejected, Decision::Accepted | Decision::Undecided) => {
            "Rejecting on that ground would put the risk of a conforming lot sent back on the supplier."
        }
        (Decision::Undecided, _) => "It cannot decide either: values are missing, or springs.",
        _ if record.drawing.rule == "simple" => {
            "It is the rule the drawing asks for: near a limit both sides share the risk of a wrong verdict."
        }
        (Decision::Rejected, Decision::Rejected) => {
            "The decision is the same; here the failures are proven beyond the uncertainty, or agreed."
        }
        (Decision::Accepted, Decision::Accepted) => {
            "The decision is the same; near a limit it would share the risk of a wrong verdict between both sides."
        }
    };
    format!("{said} {risk}")
}

/// The decision rule and how undecided springs count, in words.
pub(crate) fn terms(drawing: &DrawingFacts) -> Vec<String> {
    let rule = if drawing.rule == "simple" {
        "Simple acceptance: a value inside the limits as drawn conforms, a value outside fails."
            .to_owned()
    } else {
        let guard = if drawing.guard == "U" {
            "the expanded uncertainty U"
        } else {
            "t(0.95)·u, which gives a conformance probability of at least 95 %"
        };
        format!(
            "Guarded: a value conforms when it lies inside both limits by the guard band, fails when it lies outside one by the guard \
             band, and is undecided between. The guard band is {guard}."
        )
    };
    let undecided = match drawing.undecided_springs {
        Undecided::Report => {
            "Undecided springs leave the lot undecided where they could turn the decision."
        }
        Undecided::Pass => "Undecided springs count as conforming by the agreed terms.",
        Undecided::Fail => "Undecided springs count as failing by the agreed terms.",
    };
    vec![rule, undecided.to_owned()]
}

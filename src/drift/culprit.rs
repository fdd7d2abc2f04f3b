//! Whether a shift of lots is the springs' or the rig's: what a reference spring did meanwhile.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::stats::mean;

/// Checks that must stand after a shift.
pub const AFTER: usize = 5;
/// … and before it.
pub const BEFORE: usize = 3;
/// Half the shift must be this many standard uncertainties of what the reference did: at the edge one answer in ten would be wrong.
const TELLS: f64 = 1.282;

/// The error of one check on a reference spring.
#[derive(Clone, Debug, PartialEq)]
pub struct ReferencePoint {
    /// Its day, on the same scale as the lots'.
    pub day: f64,
    /// The rig.
    pub rig: String,
    /// The reference spring.
    pub reference: String,
    /// Measured less certified.
    pub error: f64,
    /// What the error is to be multiplied by to stand for the lots' springs: 1, or their level over the reference's where an
    /// error of the scale grows with what is measured.
    pub factor: f64,
}

/// The lots on one side of a shift.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Side<'a> {
    /// Day of its first lot.
    pub from: f64,
    /// Day of its last lot.
    pub to: f64,
    /// Their rig; `None` where they were measured on several.
    pub rig: Option<&'a str>,
}

/// Whose a shift is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "whose", content = "why", rename_all = "snake_case")]
pub enum Culprit {
    /// The reference spring moved with the lots.
    Rig,
    /// It did not.
    Springs,
    /// Springs or rig: cannot be told.
    CannotBeTold(Unclear),
}

/// Why it cannot be told.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Unclear {
    /// There is no check of the rig in the span.
    NoChecks,
    /// There are too few on one side.
    TooFew,
    /// The lots of one side were measured on several rigs.
    SeveralRigs,
    /// The checks scatter too much to show half the shift.
    TooUncertain,
}

/// What the reference did.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ChecksCompared {
    /// Checks before.
    pub before: usize,
    /// Checks after.
    pub after: usize,
    /// How far the reference moved, as a shift of the lots' springs would look.
    pub moved: f64,
    /// Standard uncertainty of it, from the scatter of the checks.
    pub uncertainty: f64,
}

/// Whose the jump from `before` to `after` is, given the checks; what the reference did, where it can be compared.
///
/// The rig's where the reference moved by more than half of the jump, the springs' where by less. Only checks on one reference
/// spring are compared: the largest number of them.
pub fn culprit(
    jump: f64,
    before: Side<'_>,
    after: Side<'_>,
    checks: &[ReferencePoint],
) -> (Culprit, Option<ChecksCompared>) {
    let unclear = |why| (Culprit::CannotBeTold(why), None);
    let (Some(old), Some(new)) = (before.rig, after.rig) else {
        return unclear(Unclear::SeveralRigs);
    };
    // A check on a day that has lots of both sides belongs to neither.
    let earlier = |one: &ReferencePoint| {
        one.rig == old && one.day >= before.from && one.day <= before.to && one.day < after.from
    };
    let later = |one: &ReferencePoint| {
        one.rig == new && one.day >= after.from && one.day <= after.to && one.day > before.to
    };
    let span = |reference: &str, inside: &dyn Fn(&ReferencePoint) -> bool| -> Vec<f64> {
        let wanted = |one: &&ReferencePoint| one.reference == reference && inside(one);
        let moved = |one: &ReferencePoint| one.error * one.factor;
        checks.iter().filter(wanted).map(moved).collect()
    };
    let mut references: Vec<&str> = checks.iter().map(|one| one.reference.as_str()).collect();
    references.sort_unstable();
    references.dedup();
    let pairs = references
        .into_iter()
        .map(|reference| (span(reference, &earlier), span(reference, &later)));
    let Some((one, two)) = pairs.max_by_key(|(one, two)| one.len().min(two.len())) else {
        return unclear(Unclear::NoChecks);
    };
    if one.is_empty() && two.is_empty() {
        return unclear(Unclear::NoChecks);
    }
    if one.len() < BEFORE || two.len() < AFTER {
        return unclear(Unclear::TooFew);
    }
    let Some(compared) = compared(&one, &two) else {
        return unclear(Unclear::TooFew);
    };
    let half = jump.abs() / 2.0;
    let whose = if half < TELLS * compared.uncertainty {
        Culprit::CannotBeTold(Unclear::TooUncertain)
    } else if compared.moved * jump.signum() > half {
        Culprit::Rig
    } else {
        Culprit::Springs
    };
    (whose, Some(compared))
}

fn compared(before: &[f64], after: &[f64]) -> Option<ChecksCompared> {
    let (one, two) = (mean(before)?, mean(after)?);
    let squares = |values: &[f64], centre: f64| -> f64 {
        values.iter().map(|value| (value - centre).powi(2)).sum()
    };
    let (n, m) = (before.len() as f64, after.len() as f64);
    let variance = (squares(before, one) + squares(after, two)) / (n + m - 2.0);
    Some(ChecksCompared {
        before: before.len(),
        after: after.len(),
        moved: two - one,
        uncertainty: (variance * (1.0 / n + 1.0 / m)).sqrt(),
    })
}

//! What a check comes to, and what is to be said besides.

use crate::bench::{Finding, Serving, overall};
use crate::intake::{CheckFile, ReferenceSpring};
use crate::record::{BenchCaution, Caution, CheckReason, ComparisonFacts, FrameFacts};
use crate::rig::Rig;

use super::super::accept::rig_cautions::refused;
use super::RigOptions;
use super::compare::checked;
use super::error::RigJobError;
use super::plates;

fn covers(spring: &ReferenceSpring, options: &RigOptions) -> bool {
    spring
        .calibrated
        .is_none_or(|(on, until)| on <= options.date && options.date <= until)
}

pub(super) fn refuse(
    cautions: &[Caution],
    spring: Option<&ReferenceSpring>,
    options: &RigOptions,
) -> Result<(), RigJobError> {
    let expired = spring
        .filter(|spring| !covers(spring, options))
        .map(|spring| {
            format!(
                "the certificate of reference spring {} does not cover the day of the check",
                spring.name
            )
        });
    expired
        .or_else(|| refused(cautions))
        .map_or(Ok(()), |what| Err(RigJobError::Strict { what }))
}

pub(super) fn reasons(
    comparisons: &[ComparisonFacts],
    frame: Option<&FrameFacts>,
    spring: Option<&ReferenceSpring>,
    options: &RigOptions,
) -> Vec<CheckReason> {
    let mut found = Vec::new();
    for finding in [
        Finding::Disagrees,
        Finding::BeyondShare,
        Finding::CannotTell,
        Finding::Scattered,
        Finding::NotMeasured,
    ] {
        let places = (0..).zip(comparisons);
        let of = places.filter(|(_, one)| one.finding == finding);
        let comparisons: Vec<u32> = of.map(|(place, _)| place).collect();
        if !comparisons.is_empty() {
            found.push(CheckReason::Compared {
                finding,
                comparisons,
            });
        }
    }
    if frame.and_then(plates::differs).is_some() {
        found.push(CheckReason::FrameDiffers);
    }
    match spring {
        None => found.push(CheckReason::NoReference),
        Some(spring) if !covers(spring, options) => found.push(CheckReason::ReferenceNotValid),
        Some(_) if found.is_empty() => found.push(CheckReason::AllAgree {
            compared: u32::try_from(comparisons.len()).unwrap_or(u32::MAX),
        }),
        Some(_) => {}
    }
    found
}

pub(super) fn decision(comparisons: &[ComparisonFacts], reasons: &[CheckReason]) -> Serving {
    let of_reasons = reasons.iter().filter_map(|reason| match reason {
        CheckReason::FrameDiffers => Some(Serving::Fails),
        CheckReason::NoReference | CheckReason::ReferenceNotValid => Some(Serving::Undecided),
        CheckReason::AllAgree { .. } | CheckReason::Compared { .. } => None,
    });
    overall(
        comparisons
            .iter()
            .map(|one| one.finding.serving())
            .chain(of_reasons),
    )
}

pub(super) fn cautions(
    of_bench: Vec<Caution>,
    (file, rig): (&CheckFile, &Rig),
    comparisons: &[ComparisonFacts],
    frame: Option<&FrameFacts>,
    measurements: Option<u32>,
    options: &RigOptions,
) -> Vec<BenchCaution> {
    let mut found = Vec::new();
    if let Some(check) = &file.reference {
        let spring = &check.spring;
        let reference = spring.name.clone();
        match spring.calibrated {
            None => found.push(BenchCaution::ReferenceUndated { reference }),
            Some((_, until)) if !covers(spring, options) => {
                let until = until.to_string();
                found.push(BenchCaution::ReferenceExpired { reference, until });
            }
            Some(_) => {}
        }
        if spring.values.iter().any(|one| !checked(rig, one)) {
            found.push(BenchCaution::FreeLengthNotChecked);
        }
    }
    if file.on.is_none() {
        found.push(BenchCaution::DayNotStated);
    }
    let spread = |one: &ComparisonFacts| {
        let mut lines = one.budget.iter();
        lines.any(|line| line.source == "repeat to repeat" && line.counted)
    };
    if comparisons.iter().any(spread) {
        found.push(BenchCaution::MeasurementsDiffer);
    }
    if measurements == Some(1) {
        found.push(BenchCaution::MeasuredOnce);
    }
    if let Some(e_n) = frame.and_then(plates::differs) {
        found.push(BenchCaution::FrameDiffers { e_n });
    }
    if frame.is_some_and(|frame| frame.expanded_uncertainty_mm_per_n.is_none()) {
        found.push(BenchCaution::FrameUncertaintyUnknown);
    }
    let without = comparisons.iter().filter(|one| one.allowed_error.is_none());
    found.extend(without.map(|one| BenchCaution::NoTolerance {
        name: one.name.clone(),
        at_length_mm: one.at_length_mm,
    }));
    found.extend(
        of_bench
            .into_iter()
            .map(|caution| BenchCaution::Rig { caution }),
    );
    found
}

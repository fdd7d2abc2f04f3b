//! What page one must say of the rig, and what `--strict` refuses.

use jiff::civil::Date;

use crate::record::{Caution, LastCheck};
use crate::rig::{Accuracy, Compliance, Known, Means, Rig, Scale};

use super::super::facts::figure;
use super::Options;
use super::error::AcceptError;
use super::springs::Judged;

/// Compliance times rate beyond which the frame is doubted.
const SOFT: f64 = 0.05;

/// What the rig file itself makes necessary to say.
pub(in crate::job) fn of_rig(rig: &Rig, date: Date) -> Vec<Caution> {
    let mut found = Vec::new();
    if matches!(rig.frame, Compliance::NotCorrected { .. }) {
        found.push(Caution::ComplianceNotCorrected);
    }
    let mut negligible = |declared: bool, what: &str| {
        if declared {
            found.push(Caution::DeclaredNegligible {
                what: what.to_owned(),
            });
        }
    };
    negligible(
        rig.frame == Compliance::DeclaredNegligible,
        "frame compliance",
    );
    negligible(
        rig.force.accuracy == Accuracy::DeclaredNegligible,
        "error of the force scale",
    );
    negligible(
        rig.force.resolution == Known::DeclaredNegligible,
        "resolution of the force scale",
    );
    negligible(
        rig.travel.accuracy == Accuracy::DeclaredNegligible,
        "error of the travel scale",
    );
    negligible(
        rig.travel.resolution == Known::DeclaredNegligible,
        "resolution of the travel scale",
    );
    negligible(
        rig.means != Means::Deflection && rig.zero == Known::DeclaredNegligible,
        "zero of the length scale",
    );
    for (scale, name) in [(&rig.force, "force"), (&rig.travel, "travel")] {
        found.extend(calibration(scale, name, date));
    }
    found
}

/// The last passed check, where it was made early enough before the judgement and not after it.
pub(super) fn holding<'a>(rig: &Rig, options: &'a Options) -> Option<&'a LastCheck> {
    let last = options.memory.told()?.last_check.as_ref()?;
    let holds = match &rig.check_every {
        Some(every) => every
            .holds_until(last.date)
            .is_some_and(|until| options.date <= until),
        None => true,
    };
    (holds && last.date <= options.date).then_some(last)
}

/// A failed check that no passed one follows, or no passed check within the time the rig file asks for.
pub(super) fn of_check(rig: &Rig, options: &Options) -> Option<Caution> {
    let text = |last: &LastCheck| format!("{} ({})", last.date, last.id);
    let told = options.memory.told();
    if let Some(failed) = told.and_then(|told| told.failed_check.as_ref()) {
        return Some(Caution::CheckFailed { last: text(failed) });
    }
    let every = rig.check_every.as_ref()?;
    if holding(rig, options).is_some() {
        return None;
    }
    let last = told.and_then(|told| told.last_check.as_ref());
    Some(Caution::NoCheckOnRecord {
        every: every.written.clone(),
        last: last.map(text),
    })
}

fn calibration(scale: &Scale, name: &str, date: Date) -> Option<Caution> {
    match scale.calibrated {
        None => Some(Caution::CalibrationUnknown {
            scale: name.to_owned(),
        }),
        Some((on, until)) if date < on || date > until => Some(Caution::CalibrationExpired {
            scale: name.to_owned(),
            until: until.to_string(),
        }),
        Some(_) => None,
    }
}

/// Under `--strict` a warning on the rig ends the run.
///
/// # Errors
/// Naming the first such caution.
pub(super) fn refuse(cautions: &[Caution]) -> Result<(), AcceptError> {
    refused(cautions).map_or(Ok(()), |what| Err(AcceptError::Strict { what }))
}

/// The first caution that `--strict` refuses, in words.
pub(in crate::job) fn refused(cautions: &[Caution]) -> Option<String> {
    let refused = |caution: &Caution| match caution {
        Caution::CalibrationExpired { scale, until } => Some(format!(
            "the calibration of the {scale} scale does not cover the day of the judgement (valid until {until})"
        )),
        Caution::CalibrationUnknown { scale } => Some(format!(
            "the rig file states no calibration of the {scale} scale"
        )),
        Caution::CheckFailed { last } => Some(format!(
            "the last check of the rig on record failed: {last}"
        )),
        Caution::NoCheckOnRecord { every, last } => Some(match last {
            Some(last) => format!(
                "the rig file wants a check every {every}, and the last passed one on record is of {last}"
            ),
            None => {
                format!("the rig file wants a check every {every}, and no passed one is on record")
            }
        }),
        Caution::LoadOutsideRange { springs } => Some(format!(
            "loads outside the range of the force scale: springs {}",
            springs.join(", ")
        )),
        Caution::CannotProve { name, .. } => Some(format!(
            "this bench cannot prove the requirement on {name}: the guard bands meet"
        )),
        Caution::UncertaintyLarge { name, share, .. } if share.get() > REFUSED => Some(format!(
            "U of {name} is {:.0} % of the half tolerance, more than half of it",
            100.0 * share.get()
        )),
        _ => None,
    };
    cautions.iter().find_map(refused)
}

/// U over the half tolerance that `--strict` refuses.
const REFUSED: f64 = 1.0 / 2.0;

/// A frame said to be so soft that a slip of the decimal point is likelier.
pub(super) fn large_compliance(rig: &Rig, rate: f64) -> Option<Caution> {
    let Compliance::Measured { give, .. } = &rig.frame else {
        return None;
    };
    let share = give.steepest() * rate;
    if share > SOFT {
        Some(Caution::ComplianceLarge {
            share: figure(share)?,
        })
    } else {
        None
    }
}

/// A judged load beyond what the table of the frame's give knows.
pub(super) fn beyond_table(rig: &Rig, spring: &Judged) -> bool {
    let Compliance::Measured { give, .. } = &rig.frame else {
        return false;
    };
    let Some(most) = give.known_to() else {
        return false;
    };
    let loads = spring
        .result
        .characteristics
        .iter()
        .filter(|one| one.at_length_mm.is_some());
    loads
        .filter_map(|one| one.value)
        .any(|load| load.get() > most)
}

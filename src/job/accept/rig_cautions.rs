//! What page one must say of the rig, and what `--strict` refuses.

use jiff::civil::Date;

use crate::record::Caution;
use crate::rig::{Accuracy, Compliance, Known, Means, Rig, Scale};

use super::super::facts::figure;
use super::error::AcceptError;

/// Compliance times rate beyond which the frame is doubted.
const SOFT: f64 = 0.05;

pub(super) fn of_rig(rig: &Rig, date: Date) -> Vec<Caution> {
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
    found.extend(
        rig.check_every
            .iter()
            .map(|every| Caution::NoCheckOnRecord {
                every: every.written.clone(),
            }),
    );
    found
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
    let refused = |caution: &Caution| match caution {
        Caution::CalibrationExpired { scale, until } => Some(format!(
            "the calibration of the {scale} scale does not cover the day of the judgement (valid until {until})"
        )),
        Caution::CalibrationUnknown { scale } => Some(format!(
            "the rig file states no calibration of the {scale} scale"
        )),
        Caution::NoCheckOnRecord { every } => Some(format!(
            "the rig file wants a check every {every}, and none is on record"
        )),
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
    cautions
        .iter()
        .find_map(refused)
        .map_or(Ok(()), |what| Err(AcceptError::Strict { what }))
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

//! What the rig file says of its scales, as budget lines.

use crate::rig::{Accuracy, Compliance, Rig, Scale};

use super::budget::{Line, Part};

/// Thermal coefficient of the shear modulus of spring steel, per kelvin (common practice; EN 13906-1 gives
/// 0.25, spring makers' handbooks 0.36 per thousand and kelvin).
const SHEAR_PER_KELVIN: f64 = 0.0003;
/// Half-width of the temperature where the lot file states none, K.
const UNKNOWN_TEMPERATURE: f64 = 5.0;
/// The zero error that ISO 7500-1:2018 table 2 allows, as a share of the class' indication error (from memory).
const ZERO_OF_CLASS: f64 = 0.1;
/// The reversibility that ISO 7500-1:2018 table 2 allows, over the class' indication error (from memory).
const REVERSIBILITY_OF_CLASS: f64 = 1.5;

fn rectangular(half_width: f64) -> f64 {
    half_width / 3.0_f64.sqrt()
}

/// The lines of one scale; `sensitivity` is the value's change per relative error of the scale.
pub fn scale_lines(scale: &Scale, names: [&'static str; 3], sensitivity: f64) -> Vec<Line> {
    let [main, error_found, drift_since] = names;
    match &scale.accuracy {
        Accuracy::DeclaredNegligible => Vec::new(),
        Accuracy::Class { half_width, .. } => vec![Line::new(
            main,
            Part::Common,
            sensitivity * rectangular(*half_width),
        )],
        Accuracy::Certificate {
            standard,
            error,
            drift,
        } => {
            let mut lines = vec![Line::new(main, Part::Common, sensitivity * standard)];
            if *error > 0.0 {
                lines.push(Line::new(error_found, Part::Common, sensitivity * error));
            }
            if *drift > 0.0 {
                lines.push(Line::new(
                    drift_since,
                    Part::Common,
                    sensitivity * rectangular(*drift),
                ));
            }
            lines
        }
    }
}

/// Lines of the force scale; `sensitivity` in the value's unit per relative error.
pub(super) fn force_scale(rig: &Rig, sensitivity: f64) -> Vec<Line> {
    scale_lines(
        &rig.force,
        ["force scale", "force error found", "force drift"],
        sensitivity,
    )
}

/// Lines of the travel scale.
pub(super) fn travel_scale(rig: &Rig, sensitivity: f64) -> Vec<Line> {
    scale_lines(
        &rig.travel,
        ["travel scale", "travel error found", "travel drift"],
        sensitivity,
    )
}

/// The frame; `per_compliance` is the value's change per mm/N, `per_travel` its change per relative error of travel.
pub(super) fn frame(rig: &Rig, per_compliance: f64, per_travel: f64) -> Option<Line> {
    match rig.frame {
        Compliance::Measured { standard, .. } => Some(Line::new(
            "frame compliance",
            Part::Common,
            per_compliance * standard,
        )),
        // One-sided from 0 to the allowance and not corrected: its root mean square about 0.
        Compliance::NotCorrected { allowance } => Some(Line::new(
            "frame not corrected",
            Part::Common,
            per_travel * rectangular(allowance),
        )),
        Compliance::DeclaredNegligible => None,
    }
}

/// Temperature: 0.03 %/K of the load or rate `value` by the lot's distance from 20 °C, else ± 5 K rectangular.
pub(super) fn temperature(degrees: Option<f64>, value: f64) -> Line {
    let kelvin = degrees.map_or(rectangular(UNKNOWN_TEMPERATURE), |degrees| {
        (degrees - 20.0).abs()
    });
    Line::new(
        "temperature",
        Part::Common,
        -value * SHEAR_PER_KELVIN * kelvin,
    )
}

/// The load's zero where the export holds no empty readings, in N.
pub(super) fn unread_zero(rig: &Rig) -> f64 {
    match (&rig.force.accuracy, rig.force.range) {
        (Accuracy::Class { half_width, .. }, Some((_, most))) => {
            rectangular(ZERO_OF_CLASS * half_width * most)
        }
        _ => rectangular(rig.contact_load.get()),
    }
}

/// Relative standard uncertainty of a difference between rising and falling loads; 0 where no class is stated.
pub(super) fn reversibility(rig: &Rig) -> f64 {
    match &rig.force.accuracy {
        Accuracy::Class { half_width, .. } => rectangular(REVERSIBILITY_OF_CLASS * half_width),
        _ => 0.0,
    }
}

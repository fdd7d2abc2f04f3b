//! Words for what page one must say besides the decision.

use super::{characteristic, count, length, list, sentence, springs};
use crate::quantity::{Quantity, Unit};
use crate::record::{Caution, Oddity};
use crate::units::{Millimetres, System};
use crate::wording::{Place, number, percent, with_unit};

/// The cautions every report carries.
pub(crate) const STANDING: [&str; 3] = [
    "Compressed springs store energy and can be thrown: guard them while they are tested, handled and opened.",
    "The stresses in this report are theoretical; no stress was measured.",
    "Safety-related use is decided by the responsible engineer under the applicable codes, not by this page.",
];

/// One caution as a sentence.
pub(crate) fn caution(of: &Caution, show_in: System) -> String {
    match of {
        Caution::SetAsideInvalid { .. }
        | Caution::Repeated { .. }
        | Caution::NotInspected { .. }
        | Caution::UnitsConfirmed { .. }
        | Caution::BeyondSample { .. }
        | Caution::GeometryNotJudged { .. }
        | Caution::IdsAlike { .. } => about_the_sample(of),
        Caution::Drawing { finding } => super::drawing_finding(finding, show_in),
        Caution::LimitsWide { name, at_length_mm } => format!(
            "{}: the limits lie more than 30 % from nominal; was a tolerance in % meant?",
            sentence(&characteristic(name, *at_length_mm, show_in))
        ),
        Caution::RobustDiffers { .. }
        | Caution::LackOfFit { .. }
        | Caution::NoZeroReading { .. }
        | Caution::LoadOutsideRange { .. }
        | Caution::FrameBeyondTable { .. }
        | Caution::OddRatio { .. }
        | Caution::OddCurves { .. }
        | Caution::PointReadings { .. }
        | Caution::LengthsShifted { .. } => about_the_curves(of, show_in),
        Caution::ComplianceNotCorrected
        | Caution::DeclaredNegligible { .. }
        | Caution::CalibrationExpired { .. }
        | Caution::CalibrationUnknown { .. }
        | Caution::CheckFailed { .. }
        | Caution::NoCheckOnRecord { .. }
        | Caution::UncertaintyLarge { .. }
        | Caution::ComplianceLarge { .. }
        | Caution::CannotProve { .. } => about_the_bench(of, show_in),
    }
}

fn about_the_bench(of: &Caution, show_in: System) -> String {
    match of {
        Caution::ComplianceNotCorrected => {
            "The frame compliance of the rig is not known and not corrected; an allowance for it stands in the budget.".to_owned()
        }
        Caution::DeclaredNegligible { what } => format!("Declared negligible in the rig file, not measured: {what}."),
        Caution::CalibrationExpired { scale, until } => {
            format!("The calibration of the {scale} scale does not cover this measurement; it was valid until {until}.")
        }
        Caution::CalibrationUnknown { scale } => format!("The rig file gives no calibration dates for the {scale} scale."),
        Caution::ComplianceLarge { share } => format!(
            "The frame compliance in the rig file makes up {} of the spring's own; is it right?",
            percent(Some(*share))
        ),
        Caution::CheckFailed { last } => format!(
            "The last check of this rig on record failed: {last}. What it measures now is open to doubt."
        ),
        Caution::NoCheckOnRecord { every, last } => match last {
            Some(last) => format!(
                "The rig file asks for a check every {every}; the last passed check on record is of {last}."
            ),
            None => format!("The rig file asks for a check every {every}; no passed check is on record."),
        },
        Caution::UncertaintyLarge { name, at_length_mm, share } => format!(
            "{}: the expanded uncertainty is {} of the half tolerance; springs near a limit stay undecided.",
            sentence(&characteristic(name, *at_length_mm, show_in)),
            percent(Some(*share))
        ),
        Caution::CannotProve { name, at_length_mm } => format!(
            "{}: this bench cannot prove this requirement; the guard bands leave no room between the limits.",
            sentence(&characteristic(name, *at_length_mm, show_in))
        ),
        _ => String::new(),
    }
}

pub(crate) fn odd(what: Oddity) -> &'static str {
    match what {
        Oddity::Saturated => {
            "the load cell stands at its end while the platen goes on; those rows are in no figure, and nothing is judged from there on"
        }
        Oddity::TravelStuck => {
            "the travel stands still while the load changes; those rows are in no figure"
        }
        Oddity::StrayReadings => {
            "single readings far off their neighbours are in no figure; is a cable loose?"
        }
        Oddity::RowsDoubled => "rows that repeat the one before digit for digit count once",
        Oddity::RowsMissing => {
            "rows are missing where the travel leaps; nothing is judged across them"
        }
        Oddity::LoadSteps => {
            "the load steps, or the travel leaps back: the spring, the grip or the scale slipped; what is taken from there on is not judged, measure again"
        }
        Oddity::ZeroShifted => {
            "the empty platens show another load later on than before the first contact; loads of those strokes are not judged"
        }
        Oddity::LateStart => {
            "the recording starts on a loaded spring: contact and the zero of its loads are not known"
        }
        Oddity::LoadCoarse => {
            "the loads come in steps coarser than the rig file states; the budget takes the steps"
        }
        Oddity::TravelCoarse => {
            "the travel comes in steps coarser than the rig file states; the budget takes the steps"
        }
        Oddity::UnevenSampling => {
            "some stretches of the stroke are sampled much more densely than others; the budget holds the difference to the two-point rate"
        }
        Oddity::StrokesLeftOut => {
            "strokes much shorter than the others were left out; was the recording cut off?"
        }
        Oddity::OtherStrokeCount => {
            "another number of loading strokes than most springs have, so another stroke may be judged; was the recording cut off?"
        }
        Oddity::StrokesDiffer => "the rate differs from stroke to stroke by more than 1 %",
        Oddity::Scatter => {
            "the loads scatter about the fitted line by more than 0.5 % of Fn; are strokes mixed?"
        }
        Oddity::GaugeDiffers => {
            "the free length by gauge and the one the bench gives differ by more than both uncertainties; the gauge's is used"
        }
        Oddity::RepeatsDiffer => {
            "the repeats differ by more than their own uncertainty says; their spread is counted"
        }
    }
}

/// Loads at a few lengths, and which of them the rate is drawn from.
fn few_lengths(
    names: &[String],
    between: Option<(Millimetres, Millimetres)>,
    show_in: System,
) -> String {
    let rate = match between {
        Some((from, to)) => format!(
            "the rate is drawn from the loads at {} and {}",
            length(Some(from), show_in),
            length(Some(to), show_in)
        ),
        None => {
            "two of them within the window of the rate are missing, so there is no rate".to_owned()
        }
    };
    format!(
        "Loads at a few lengths, no curve: {rate}; straightness, hysteresis, scatter and a bend in between are not known: {}.",
        springs(names)
    )
}

fn about_the_curves(of: &Caution, show_in: System) -> String {
    let verb = |names: &[String], one: &str, more: &str| {
        if names.len() == 1 {
            one.to_owned()
        } else {
            more.to_owned()
        }
    };
    match of {
        Caution::OddRatio {
            springs: names,
            ratio,
            reading,
        } => format!(
            "The measured rate of {} is {} times what is expected{}.",
            springs(names),
            number(Some(*ratio), 3),
            reading.as_ref().map_or_else(String::new, |text| format!(
                "; {text} would give such a ratio"
            ))
        ),
        Caution::PointReadings {
            springs: names,
            from_mm,
            to_mm,
        } => few_lengths(names, from_mm.zip(*to_mm), show_in),
        Caution::LoadOutsideRange { springs: names } => {
            format!(
                "Loads outside the usable range of the force scale: {}.",
                springs(names)
            )
        }
        Caution::FrameBeyondTable { springs: names } => format!(
            "Loads beyond the table of the frame's give in the rig file, whose last stretch is drawn on: {}.",
            springs(names)
        ),
        Caution::RobustDiffers { springs: names } => format!(
            "{}: the robust rate differs from the fitted one; look at {} residuals.",
            sentence(&springs(names)),
            verb(names, "its", "their")
        ),
        Caution::LackOfFit { springs: names } => format!(
            "{}: the curve bends within the window; the rate is the mean over it.",
            sentence(&springs(names))
        ),
        Caution::OddCurves {
            springs: names,
            what,
        } => format!("{}: {}.", sentence(&springs(names)), odd(*what)),
        Caution::LengthsShifted { shift_mm } => format!(
            "The free lengths of nearly all springs lie off the drawn one by about {}; is the length zero of the rig right?",
            with_unit(
                Some(*shift_mm),
                Unit::Millimetre,
                Place::Significant(3),
                show_in
            )
        ),
        Caution::NoZeroReading { springs: names } => format!(
            "{}: no readings before contact; the load zero is a line of the budget.",
            sentence(&springs(names))
        ),
        _ => String::new(),
    }
}

fn about_the_sample(of: &Caution) -> String {
    match of {
        Caution::SetAsideInvalid {
            spring,
            export,
            why,
        } => {
            format!("Spring {spring}: the measurement {export} is set aside as invalid: {why}.")
        }
        Caution::Repeated { springs: names } => {
            format!("Measured more than once and averaged: {}.", springs(names))
        }
        Caution::NotInspected { what } => {
            format!("Not inspected, as the lot file says: {}.", list(what))
        }
        Caution::UnitsConfirmed { finding } => {
            format!("The units were confirmed by hand over this finding: {finding}.")
        }
        Caution::IdsAlike { springs: names } => format!(
            "{}: these ids differ only in case or leading zeros; are they springs of their own?",
            sentence(&springs(names))
        ),
        Caution::BeyondSample { springs } => format!(
            "{} measured beyond the sample; they do not count for the decision.",
            count(*springs, "spring")
        ),
        Caution::GeometryNotJudged { what } => {
            let name = Quantity::from_name(what, None).map_or(what.as_str(), |of| of.title());
            format!(
                "The drawing tolerances the {name}, but does not list it under the requirements: it is not judged."
            )
        }
        _ => String::new(),
    }
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use crate::record::DrawingFinding;
    use crate::units::{Finite, Millimetres};

    fn every() -> Vec<Caution> {
        let (name, text) = (|| "load".to_owned(), || "x".to_owned());
        let (some, at) = (
            || vec!["7".to_owned()],
            Millimetres::try_from(48.0).unwrap(),
        );
        let share = Finite::try_from(0.4).unwrap();
        vec![
            Caution::Drawing {
                finding: DrawingFinding::LengthBelowSmallest {
                    at_length_mm: at,
                    smallest_mm: at,
                },
            },
            Caution::OddRatio {
                springs: some(),
                ratio: share,
                reading: Some(text()),
            },
            Caution::ComplianceNotCorrected,
            Caution::DeclaredNegligible { what: text() },
            Caution::CalibrationExpired {
                scale: text(),
                until: text(),
            },
            Caution::CalibrationUnknown { scale: text() },
            Caution::CheckFailed { last: text() },
            Caution::NoCheckOnRecord {
                every: text(),
                last: None,
            },
            Caution::NoCheckOnRecord {
                every: text(),
                last: Some(text()),
            },
            Caution::FrameBeyondTable { springs: some() },
            Caution::LoadOutsideRange { springs: some() },
            Caution::UncertaintyLarge {
                name: name(),
                at_length_mm: Some(at),
                share,
            },
            Caution::CannotProve {
                name: name(),
                at_length_mm: Some(at),
            },
            Caution::RobustDiffers { springs: some() },
            Caution::LackOfFit { springs: some() },
            Caution::NoZeroReading { springs: some() },
            Caution::SetAsideInvalid {
                spring: text(),
                export: text(),
                why: text(),
            },
            Caution::Repeated { springs: some() },
            Caution::NotInspected { what: some() },
            Caution::UnitsConfirmed { finding: text() },
            Caution::BeyondSample { springs: 3 },
            Caution::GeometryNotJudged {
                what: "free_length".to_owned(),
            },
        ]
    }

    #[test]
    fn every_caution_is_a_sentence_of_its_own() {
        let said: Vec<String> = every().iter().map(|of| caution(of, System::MmN)).collect();
        for (number, sentence) in said.iter().enumerate() {
            assert!(
                sentence.ends_with('.') && sentence.len() > 20,
                "{sentence:?}"
            );
            assert!(
                !said.iter().skip(number + 1).any(|other| other == sentence),
                "{sentence:?}"
            );
        }
    }
}

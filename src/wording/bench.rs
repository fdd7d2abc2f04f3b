//! Words for checks and studies of a rig.

use super::{caution, characteristic, list, sentence};
use crate::record::{BenchCaution, CheckReason, CheckRecord, Finding, RepeatReason, Serving};
use crate::units::{Millimetres, System};
use crate::wording::{number, percent};

/// The word for whether a rig serves, large.
pub(crate) const fn serving_word(serving: Serving) -> &'static str {
    match serving {
        Serving::Serves => "SERVES",
        Serving::Fails => "FAILS",
        Serving::Undecided => "UNDECIDED",
    }
}

/// What a comparison came to, short.
pub(crate) const fn finding(of: Finding) -> &'static str {
    match of {
        Finding::Serves => "agrees",
        Finding::Disagrees => "DISAGREES",
        Finding::BeyondShare => "TOO FAR OFF",
        Finding::CannotTell => "cannot tell",
        Finding::Scattered => "scattered",
        Finding::NotMeasured => "not measured",
    }
}

/// Why a check came out as it did.
pub(crate) fn check_reason(of: &CheckReason, record: &CheckRecord, show_in: System) -> String {
    match of {
        CheckReason::AllAgree { compared } => format!(
            "All {compared} quantities of the reference spring agree with its certificate: |E_n| at most 1, and each error within its \
             share of the tightest tolerance that is judged on this rig."
        ),
        CheckReason::Compared {
            finding,
            comparisons,
        } => {
            let quantities = comparisons.iter().filter_map(|place| {
                let of = record.comparisons.get(usize::try_from(*place).ok()?)?;
                Some(characteristic(&of.name, of.at_length_mm, show_in))
            });
            let subject = sentence(&list(&quantities.collect::<Vec<_>>()));
            let what = match finding {
                Finding::Disagrees => {
                    "the error is larger than both expanded uncertainties together explain (|E_n| above 1)"
                }
                Finding::BeyondShare => {
                    "the error exceeds the share of the tightest tolerance that is allowed to it"
                }
                Finding::CannotTell => {
                    "the scatter of the measurement and the certificate's uncertainty are together larger than the allowed error, so \
                     that this check could not show it"
                }
                Finding::Scattered => {
                    "the mean agrees with the certificate, but a measurement by itself does not; are they all of this spring?"
                }
                Finding::NotMeasured => "no value whose uncertainty is known",
                Finding::Serves => "agrees",
            };
            format!("{subject}: {what}.")
        }
        CheckReason::FrameDiffers => {
            "The give of the frame, plate on plate, contradicts the rig file by more than both uncertainties.".to_owned()
        }
        CheckReason::NoReference => {
            "No reference spring was measured: what the frame gives says nothing of the scales.".to_owned()
        }
        CheckReason::ReferenceNotValid => {
            "The certificate of the reference spring does not cover the day of the check.".to_owned()
        }
    }
}

/// Why a study came out as it did.
pub(crate) fn repeat_reason(of: &RepeatReason, show_in: System) -> String {
    let named = |name: &str, at: Option<Millimetres>| sentence(&characteristic(name, at, show_in));
    match of {
        RepeatReason::WithinTolerance { largest } => format!(
            "Repeats and operators (6 s) take at most {} of a tolerance; up to 30 % serves.",
            percent(Some(*largest))
        ),
        RepeatReason::BeyondTolerance {
            name,
            at_length_mm,
            share,
        } => format!(
            "{}: repeats and operators (6 s) take {} of the tolerance, more than 30 %.",
            named(name, *at_length_mm),
            percent(Some(*share))
        ),
        RepeatReason::NotAnalysed { name, at_length_mm } => format!(
            "{}: required, but not every measurement gives a value.",
            named(name, *at_length_mm)
        ),
        RepeatReason::NoTolerance => {
            "There is no tolerance on both sides to hold the repeats against; name a drawing."
                .to_owned()
        }
    }
}

/// One caution as a sentence.
pub(crate) fn bench_caution(of: &BenchCaution, show_in: System) -> String {
    let named = |name: &str, at: Option<Millimetres>| sentence(&characteristic(name, at, show_in));
    match of {
        BenchCaution::Rig { caution: of } => caution(of, show_in),
        BenchCaution::NoTolerance { name, at_length_mm } => format!(
            "{}: nothing that is judged limits it on both sides, so that |E_n| alone decides.",
            named(name, *at_length_mm)
        ),
        BenchCaution::NegativeComponent {
            name,
            at_length_mm,
            component,
        } => format!(
            "{}: the variance of the {} came out below zero and is set to 0.",
            named(name, *at_length_mm),
            component_word(component)
        ),
        BenchCaution::NotAnalysed {
            name,
            at_length_mm,
            measurements,
        } => format!(
            "{}: not analysed, without a value in {}.",
            named(name, *at_length_mm),
            list(measurements)
        ),
        BenchCaution::LargeShare {
            name,
            at_length_mm,
            share,
        } => format!(
            "{}: repeats and operators (6 s) take {} of the tolerance, more than a tenth.",
            named(name, *at_length_mm),
            percent(Some(*share))
        ),
        BenchCaution::FewCategories {
            name,
            at_length_mm,
            categories,
        } => format!(
            "{}: {categories} distinct categories, fewer than 5: these springs differ little for this bench.",
            named(name, *at_length_mm)
        ),
        other => of_the_layout(other),
    }
}

fn of_the_layout(of: &BenchCaution) -> String {
    match of {
        BenchCaution::ReferenceExpired { reference, until } => format!(
            "The certificate of reference spring {reference} does not cover this day; it was valid until {until}."
        ),
        BenchCaution::ReferenceUndated { reference } => format!(
            "The check file states no dates for the certificate of reference spring {reference}."
        ),
        BenchCaution::FrameDiffers { e_n } => format!(
            "The give of the frame differs from the rig file's: E_n {}; --write takes over the new one.",
            number(Some(*e_n), 3)
        ),
        BenchCaution::FrameUncertaintyUnknown => {
            "The run of plate on plate has too few independent readings to tell how well it knows the give; nothing can be written."
                .to_owned()
        }
        BenchCaution::FreeLengthNotChecked => {
            "The export gives deflections: lengths hang on the certified free length, and free lengths are neither checked nor judged on \
             this rig."
                .to_owned()
        }
        BenchCaution::DayNotStated => {
            "The check file does not say when it was measured (on = … under [check]); the day of the judgement stands for it.".to_owned()
        }
        BenchCaution::MeasurementsDiffer => {
            "The measurements of the reference spring differ by more than their own uncertainty says; their spread is counted.".to_owned()
        }
        BenchCaution::MeasuredOnce => {
            "The reference spring was measured once; its scatter is what the rig file and the fit say, not seen.".to_owned()
        }
        BenchCaution::PresettingNotStated => {
            "The study file states no presetting strokes: set during the study counts as scatter of the bench.".to_owned()
        }
        BenchCaution::OneOperator => "One operator: what others would add is not seen.".to_owned(),
        BenchCaution::FewRepeats {
            degrees_of_freedom,
            relative,
        } => format!(
            "The repeats have {} degrees of freedom; the standard deviation is itself uncertain by {}.",
            number(Some(*degrees_of_freedom), 3),
            percent(Some(*relative))
        ),
        _ => String::new(),
    }
}

/// The word for a source of variation.
pub(crate) fn component_word(source: &str) -> &str {
    match source {
        "part" => "springs",
        "operator" => "operators",
        "interaction" => "springs × operators",
        "repeats" | "repeatability" => "repeats",
        "within" => "repeats and operators",
        other => other,
    }
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use crate::units::Finite;

    #[test]
    fn every_caution_is_a_sentence_of_its_own() {
        let (name, at_length_mm) = ("rate".to_owned(), None);
        let share = Finite::try_from(0.2).unwrap();
        let text = || "x".to_owned();
        let every = [
            BenchCaution::ReferenceExpired {
                reference: text(),
                until: text(),
            },
            BenchCaution::ReferenceUndated { reference: text() },
            BenchCaution::FrameDiffers { e_n: share },
            BenchCaution::FrameUncertaintyUnknown,
            BenchCaution::NoTolerance {
                name: name.clone(),
                at_length_mm,
            },
            BenchCaution::FreeLengthNotChecked,
            BenchCaution::MeasuredOnce,
            BenchCaution::MeasurementsDiffer,
            BenchCaution::DayNotStated,
            BenchCaution::PresettingNotStated,
            BenchCaution::OneOperator,
            BenchCaution::NegativeComponent {
                name: name.clone(),
                at_length_mm,
                component: "part".to_owned(),
            },
            BenchCaution::FewRepeats {
                degrees_of_freedom: share,
                relative: share,
            },
            BenchCaution::NotAnalysed {
                name: name.clone(),
                at_length_mm,
                measurements: vec![text()],
            },
            BenchCaution::LargeShare {
                name: name.clone(),
                at_length_mm,
                share,
            },
            BenchCaution::FewCategories {
                name,
                at_length_mm,
                categories: 3,
            },
        ];
        let said: Vec<String> = every
            .iter()
            .map(|of| bench_caution(of, System::MmN))
            .collect();
        for (number, sentence) in said.iter().enumerate() {
            assert!(
                sentence.ends_with('.') && sentence.len() > 20,
                "{sentence:?}"
            );
            assert!(!said.iter().skip(number + 1).any(|other| other == sentence));
        }
    }
}

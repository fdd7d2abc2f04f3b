//! Words for a spring's verdicts.

use super::{characteristic, length};
use crate::quantity::Unit;
use crate::record::{Advice, CharacteristicResult, DrawingFacts, Reason, SpringResult, Verdict};
use crate::units::{Finite, Newtons, System};
use crate::wording::{Place, with_unit};

/// The word of a verdict; a failure is written in capitals so that it stands out without colour.
pub(crate) const fn verdict_word(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Conforms => "conforms",
        Verdict::Fails => "FAILS",
        Verdict::Undecided => "undecided",
    }
}

/// A spring's verdict with the class of the failure.
pub(crate) fn disposition(spring: &SpringResult) -> String {
    match spring.failing_class {
        Some(class) => format!("{} ({})", verdict_word(spring.verdict), class.word()),
        None => verdict_word(spring.verdict).to_owned(),
    }
}

/// Why a characteristic has its verdict or no value; `None` where it needs no words.
pub(crate) fn verdict_reason(of: &CharacteristicResult, show_in: System) -> Option<String> {
    let limit = |value: Option<Finite>| with_unit(value, of.unit, Place::Stated, show_in);
    let text = match of.reason.as_ref()? {
        Reason::BelowLower => format!("below the lower limit {}", limit(of.lower)),
        Reason::AboveUpper => format!("above the upper limit {}", limit(of.upper)),
        Reason::LowerWithinUncertainty => format!(
            "the lower limit {} lies inside the guard band",
            limit(of.lower)
        ),
        Reason::UpperWithinUncertainty => format!(
            "the upper limit {} lies inside the guard band",
            limit(of.upper)
        ),
        other => return Some(absence(other, show_in)),
    };
    Some(text)
}

/// Why there is no value, or none whose uncertainty is known.
pub(crate) fn absence(of: &Reason, show_in: System) -> String {
    match of {
        Reason::BelowLower | Reason::AboveUpper => "outside a limit".to_owned(),
        Reason::LowerWithinUncertainty | Reason::UpperWithinUncertainty => "a limit lies inside the guard band".to_owned(),
        Reason::GuardBandsMeet => "the guard bands leave no room between the limits".to_owned(),
        Reason::NoAbsoluteLength => "no absolute length: the export gives deflections and the spring has no measured free length".to_owned(),
        Reason::WindowNotReached { reached_n, wanted_n } => window_missed(*reached_n, *wanted_n, show_in),
        Reason::LengthNotReached => "the curve does not reach the test length".to_owned(),
        Reason::ContactNotRecorded => "the stroke starts on a loaded spring, contact was not recorded".to_owned(),
        Reason::StrokeNotRecorded => "the stroke the drawing asks for is not in the export".to_owned(),
        Reason::NoFullCycle => "no full cycle of loading and unloading".to_owned(),
        Reason::OneLoadingStroke => "only one loading stroke".to_owned(),
        Reason::SolidNotReached { shortest_mm } => {
            format!("the rise to solid was not reached; the shortest length was {}", length(Some(*shortest_mm), show_in))
        }
        Reason::SolidBelowShortest { shortest_mm } => {
            format!("below the shortest length reached, {}, which is inside the limit", length(Some(*shortest_mm), show_in))
        }
        Reason::UncertaintyUnknown => {
            "too few independent points to give an uncertainty, and the rig file states no repeatability".to_owned()
        }
        Reason::NoKnee => {
            "the slopes before and after do not differ enough for a knee; is a member missing?".to_owned()
        }
        Reason::NotMeasured => "not measured".to_owned(),
        Reason::NotInspected => "not inspected, as the lot file says".to_owned(),
        Reason::LoadCellAtItsEnd => "the load cell was at its end before the curve came there".to_owned(),
        Reason::LoadSteps => "the load steps, or the travel leaps back, on its stroke or before it".to_owned(),
        Reason::StrokesDiffer => "two strokes of the same travel differ in rate as no spring does; are they of two springs?".to_owned(),
        Reason::PointReadings => "it needs a curve, and loads were read at a few lengths only".to_owned(),
        Reason::LengthNotRead => "no load was read at this length, and none is interpolated".to_owned(),
        Reason::WindowNotRead => "fewer than two loads were read within the window of the rate".to_owned(),
        Reason::ZeroShifted => "the empty platens show another load on its stroke than before the first contact".to_owned(),
        Reason::RowsMissing => "rows are missing where it is taken from".to_owned(),
    }
}

fn window_missed(reached: Option<Newtons>, wanted: Option<Newtons>, show_in: System) -> String {
    let load = |value| with_unit(value, Unit::Newton, Place::Significant(4), show_in);
    let how = match (reached, wanted) {
        (Some(_), Some(_)) => format!(
            ": its loads reach {}, and three readings beyond {} are needed; compress further",
            load(reached),
            load(wanted)
        ),
        _ => String::new(),
    };
    format!("the curve does not span the window of the rate{how}")
}

/// What would settle what is undecided.
pub(crate) fn advice(advice: &Advice, show_in: System) -> String {
    match advice {
        Advice::Repeat {
            name,
            at_length_mm,
            times,
        } => format!(
            "{}: repeat {times} × on this bench",
            characteristic(name, *at_length_mm, show_in)
        ),
        Advice::BetterBench {
            name,
            at_length_mm,
            expanded_uncertainty,
            unit,
        } => {
            let name = characteristic(name, *at_length_mm, show_in);
            match expanded_uncertainty {
                Some(_) => format!(
                    "{name}: needs a bench with U ≤ {}",
                    with_unit(*expanded_uncertainty, *unit, Place::Significant(2), show_in)
                ),
                None => format!("{name}: the value lies on the limit; no bench can settle it"),
            }
        }
        Advice::Measure { name, at_length_mm } => {
            format!(
                "{}: measure it",
                characteristic(name, *at_length_mm, show_in)
            )
        }
    }
}

/// The rule a failure was proven by, short.
pub(crate) fn rule_used(
    of: &CharacteristicResult,
    drawing: &DrawingFacts,
    show_in: System,
) -> String {
    let shown = |value: Option<Finite>| {
        with_unit(
            value,
            of.unit,
            Place::Uncertainty(of.expanded_uncertainty),
            show_in,
        )
    };
    let band = if drawing.guard == "U" {
        "U"
    } else {
        "t(0.95)·u"
    };
    match (&of.reason, drawing.rule.as_str()) {
        (Some(Reason::BelowLower), "simple") => "simple: value < lower limit".to_owned(),
        (Some(Reason::AboveUpper), "simple") => "simple: value > upper limit".to_owned(),
        (Some(Reason::BelowLower), _) => format!(
            "guarded: value < lower limit − {band} = {}",
            shown(of.reject_lower)
        ),
        (Some(Reason::AboveUpper), _) => format!(
            "guarded: value > upper limit + {band} = {}",
            shown(of.reject_upper)
        ),
        _ => verdict_reason(of, show_in).unwrap_or_default(),
    }
}

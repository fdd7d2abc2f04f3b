//! Words for what a drawing gets wrong, or leaves open, with the reading that would fit.

use super::drawing_rate::about_rate;
use super::strength::about_strength;
use super::{Place, length, number, percent, with_unit};
use crate::quantity::Unit;
use crate::record::DrawingFinding;
use crate::units::{Millimetres, NewtonsPerMillimetre, System};

pub(super) fn rate(value: NewtonsPerMillimetre, show_in: System) -> String {
    with_unit(
        Some(value),
        Unit::NewtonPerMillimetre,
        Place::Significant(4),
        show_in,
    )
}

pub(super) fn millimetres(value: Millimetres, show_in: System) -> String {
    with_unit(
        Some(value),
        Unit::Millimetre,
        Place::Significant(4),
        show_in,
    )
}

/// One finding as sentences.
pub(crate) fn drawing_finding(of: &DrawingFinding, show_in: System) -> String {
    match of {
        DrawingFinding::RateNotFromGeometry { .. }
        | DrawingFinding::LoadsNotFromRate { .. }
        | DrawingFinding::LoadNotFromRate { .. } => about_rate(of, show_in),
        DrawingFinding::FreeLengthNotFromLoads { .. }
        | DrawingFinding::SizeNotAsDrawn { .. }
        | DrawingFinding::LengthBelowSmallest { .. }
        | DrawingFinding::ServiceBelowSmallest { .. }
        | DrawingFinding::WindowOutside { .. }
        | DrawingFinding::SolidLengthTooShort { .. } => about_lengths(of, show_in),
        DrawingFinding::CoilsNotFromEnds { .. }
        | DrawingFinding::IndexUnusual { .. }
        | DrawingFinding::Buckles { .. }
        | DrawingFinding::FrequencyNear { .. } => about_the_spring(of, show_in),
        DrawingFinding::StressAbove { .. } | DrawingFinding::FatigueBelowOne { .. } => {
            about_strength(of, show_in)
        }
        DrawingFinding::NestTouches { .. }
        | DrawingFinding::SameHand { .. }
        | DrawingFinding::HandNotStated { .. } => about_the_nest(of, show_in),
    }
}

fn about_lengths(of: &DrawingFinding, show_in: System) -> String {
    match of {
        DrawingFinding::FreeLengthNotFromLoads { drawn, implied } => format!(
            "The required loads point to a free length of {}; the drawn one is {}.",
            millimetres(*implied, show_in),
            length(Some(*drawn), show_in)
        ),
        DrawingFinding::SizeNotAsDrawn { name, drawn } => format!(
            "The drawn {} {} lies outside the limits required of it.",
            super::characteristic(name, None, show_in),
            length(Some(*drawn), show_in)
        ),
        DrawingFinding::LengthBelowSmallest {
            at_length_mm,
            smallest_mm,
        } => format!(
            "The test length {} lies below the smallest permitted length Ln = {}.",
            length(Some(*at_length_mm), show_in),
            millimetres(*smallest_mm, show_in)
        ),
        DrawingFinding::ServiceBelowSmallest {
            at_length_mm,
            smallest_mm,
        } => format!(
            "The upper service load is reached at {}, below the smallest length under dynamic load, {} (gaps of 1.5 Sa, coiled hot 2 Sa; EN 13906-1).",
            millimetres(*at_length_mm, show_in),
            millimetres(*smallest_mm, show_in)
        ),
        DrawingFinding::WindowOutside { from, to } => format!(
            "The rate window runs from {} to {} of the deflection to Ln; outside 20 to 80 % the ends are not seated or coils begin to touch. 30 to 70 % of full load would fit.",
            percent(Some(*from)),
            percent(Some(*to))
        ),
        DrawingFinding::SolidLengthTooShort { maximum, least } => format!(
            "A solid length of at most {} cannot be met: the coils of the thinnest wire alone are {} high.",
            length(Some(*maximum), show_in),
            millimetres(*least, show_in)
        ),
        _ => String::new(),
    }
}

fn about_the_spring(of: &DrawingFinding, show_in: System) -> String {
    match of {
        DrawingFinding::CoilsNotFromEnds {
            member,
            drawn,
            usual,
        } => format!(
            "{member}: {} of the total coils are dead as drawn; such ends usually have {}.",
            number(Some(*drawn), 3),
            number(Some(*usual), 3)
        ),
        DrawingFinding::IndexUnusual { member, index } => format!(
            "{member}: the index w = {} is outside 4 to 20, for which the standards’ formulas and tolerances are made.",
            number(Some(*index), 3)
        ),
        DrawingFinding::Buckles {
            member,
            deflection_mm,
            wanted_mm,
            seating,
            stated,
        } => {
            let seated = if *stated {
                format!("seated as stated ({seating})")
            } else {
                "if it stands between flat parallel plates without a guide (no seating is stated)"
                    .to_owned()
            };
            format!(
                "{member}: {seated} it buckles from a deflection of {} on; {} is asked of it.",
                millimetres(*deflection_mm, show_in),
                millimetres(*wanted_mm, show_in)
            )
        }
        DrawingFinding::FrequencyNear {
            member,
            natural_hz,
            driven_hz,
        } => format!(
            "{member}: the natural frequency {} Hz is less than 15 times the {} Hz it is driven at.",
            number(Some(*natural_hz), 4),
            number(Some(*driven_hz), 4)
        ),
        _ => String::new(),
    }
}

fn about_the_nest(of: &DrawingFinding, show_in: System) -> String {
    match of {
        DrawingFinding::NestTouches {
            outer,
            inner,
            clearance_mm,
            least_mm,
        } => format!(
            "{inner} inside {outer}: the radial clearance is {} with the inner spring grown as at solid, and {} with all tolerances used up.",
            with_unit(
                Some(*clearance_mm),
                Unit::Millimetre,
                Place::Significant(2),
                show_in
            ),
            with_unit(
                Some(*least_mm),
                Unit::Millimetre,
                Place::Significant(2),
                show_in
            )
        ),
        DrawingFinding::SameHand { outer, inner } => {
            format!(
                "{outer} and {inner} are wound the same way and can lock into one another; neighbours are wound opposite."
            )
        }
        DrawingFinding::HandNotStated { outer, inner } => {
            format!(
                "The drawing does not say which way {outer} and {inner} are wound; neighbours of a nest are wound opposite."
            )
        }
        _ => String::new(),
    }
}

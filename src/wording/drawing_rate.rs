//! Words for a rate that does not follow: what would fit, by how much, and what else would give it.

use super::drawing::{millimetres, rate};
use super::{Place, length, number, with_uncertainty, with_unit};
use crate::quantity::Unit;
use crate::record::{Basis, DrawingFinding, Fitting, Needed, ReadAs};
use crate::units::{Finite, NewtonsPerMillimetre, System};

pub(super) fn about_rate(of: &DrawingFinding, show_in: System) -> String {
    match of {
        DrawingFinding::RateNotFromGeometry {
            basis,
            stage,
            stated,
            theory,
            expanded_uncertainty,
            readings,
            needed,
        } => {
            let finite = |value: NewtonsPerMillimetre| Finite::try_from(value.get()).ok();
            let unit = Unit::NewtonPerMillimetre;
            let what = match (basis, stage) {
                (Basis::Stated, 1) => "The stated rate".to_owned(),
                (Basis::Stated, stage) => format!("The stated rate of stage {stage}"),
                (Basis::TwoLoads, _) => "The rate that the required loads give,".to_owned(),
                (Basis::LoadAndFreeLength, _) => {
                    "The rate that the required load and the free length give,".to_owned()
                }
            };
            format!(
                "{what} {} does not follow from the geometry, which gives {} {} (k = 2). {}",
                with_unit(Some(*stated), unit, Place::Stated, show_in),
                with_uncertainty(
                    finite(*theory),
                    finite(*expanded_uncertainty),
                    unit,
                    show_in
                ),
                super::unit_symbol(unit, show_in),
                explained(readings, needed.as_ref(), show_in)
            )
        }
        DrawingFinding::LoadsNotFromRate {
            first_mm,
            second_mm,
            implied,
            lower,
            upper,
        } => format!(
            "The loads at {} and {} give a rate of {}, outside the limits of the rate ({}); a spring that carries both exactly would fail it.",
            length(Some(*first_mm), show_in),
            length(Some(*second_mm), show_in),
            rate(*implied, show_in),
            limits(*lower, *upper, Unit::NewtonPerMillimetre, show_in)
        ),
        DrawingFinding::LoadNotFromRate {
            at_length_mm,
            expected,
            lower,
            upper,
            fitting_free_length_mm,
        } => format!(
            "A spring of the drawn rate and free length carries {} at {}, outside the limits of that load ({}). A free length of {} would fit.",
            with_unit(
                Some(*expected),
                Unit::Newton,
                Place::Significant(4),
                show_in
            ),
            length(Some(*at_length_mm), show_in),
            limits(*lower, *upper, Unit::Newton, show_in),
            millimetres(*fitting_free_length_mm, show_in)
        ),
        _ => String::new(),
    }
}

fn limits(
    lower: Option<impl Into<f64>>,
    upper: Option<impl Into<f64>>,
    unit: Unit,
    show_in: System,
) -> String {
    let shown = |value: f64| with_unit(Some(value), unit, Place::Stated, show_in);
    match (lower.map(Into::into), upper.map(Into::into)) {
        (Some(lower), Some(upper)) => format!("{} to {}", shown(lower), shown(upper)),
        (Some(lower), None) => format!("at least {}", shown(lower)),
        (None, Some(upper)) => format!("at most {}", shown(upper)),
        (None, None) => "none".to_owned(),
    }
}

/// The readings that would fit and by how much, or what else would give the rate.
fn explained(readings: &[Fitting], needed: Option<&Needed>, show_in: System) -> String {
    let fits: Vec<String> = readings.iter().map(|one| fit(one, show_in)).collect();
    let text = if fits.is_empty() {
        "No other reading of the drawing that was tried fits.".to_owned()
    } else {
        format!("It would follow if {}.", fits.join(", or if "))
    };
    let Some(needed) = needed else {
        return text;
    };
    format!(
        "{text} Alone, {} active coils, or D = {}, or d = {}, or G = {} would give it.",
        number(Some(needed.active_coils), 3),
        with_unit(
            Some(needed.coil_mm),
            Unit::Millimetre,
            Place::Significant(4),
            show_in
        ),
        with_unit(
            Some(needed.wire_mm),
            Unit::Millimetre,
            Place::Significant(3),
            show_in
        ),
        with_unit(
            Some(needed.shear_modulus_mpa),
            Unit::Megapascal,
            Place::Significant(3),
            show_in
        )
    )
}

fn fit(of: &Fitting, show_in: System) -> String {
    let what = match &of.reading {
        ReadAs::OutsideIsMean => "the drawn outside diameter were the mean one".to_owned(),
        ReadAs::InsideIsMean => "the drawn inside diameter were the mean one".to_owned(),
        ReadAs::MeanIsOutside => "the drawn mean diameter were the outside one".to_owned(),
        ReadAs::MeanIsInside => "the drawn mean diameter were the inside one".to_owned(),
        ReadAs::TotalForActive => "all coils were active (total taken for active coils)".to_owned(),
        ReadAs::ActiveAreTotal => "the drawn active coils were the total ones".to_owned(),
        ReadAs::Material {
            name,
            shear_modulus_mpa,
        } => format!(
            "the material were {name} (G {})",
            with_unit(
                Some(*shear_modulus_mpa),
                Unit::Megapascal,
                Place::Stated,
                show_in
            )
        ),
        ReadAs::Unit { unit } => format!("the figure were meant in {unit}"),
    };
    let off = 100.0 * of.off.get();
    format!(
        "{what} ({}, {} off)",
        match &of.reading {
            ReadAs::Unit { .. } => "theory in that unit".to_owned(),
            _ => rate(of.rate_n_per_mm, show_in),
        },
        with_unit(
            Some(off.abs()),
            Unit::Percent,
            Place::Significant(2),
            show_in
        )
    )
}

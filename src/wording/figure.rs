//! The one way a quantity becomes text: conversion for display, rounding, the sign, the dash for what is absent.
//! Nothing else in the report formats a figure.

use crate::quantity::Unit;
use crate::units::{Finite, System};

/// What stands where a figure does not exist.
pub const ABSENT: &str = "–";

/// Places after the point beyond which nothing is printed.
const MOST_PLACES: i32 = 12;

/// Degrees of freedom beyond which they are not counted out: the coverage factor is then within 0.1 % of the normal one.
const MANY_DEGREES: f64 = 1000.0;

/// How far a figure is written out.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Place {
    /// To the second significant digit of this expanded uncertainty, in the same unit; six significant digits where it is absent or zero.
    Uncertainty(Option<Finite>),
    /// As a document states it: up to six significant digits, trailing zeros cut.
    Stated,
    /// To this many significant digits.
    Significant(i32),
}

/// `value` (in `unit`) as text in the units of `show_in`, rounded by `place`, without its unit; [`ABSENT`] for `None`.
pub fn figure(value: Option<impl Into<f64>>, unit: Unit, place: Place, show_in: System) -> String {
    let Some(value) = value else {
        return ABSENT.to_owned();
    };
    let scale = per_unit(unit, show_in);
    let value = value.into() / scale;
    match place {
        Place::Uncertainty(uncertainty) => {
            let shown = uncertainty.map(|figure| figure.get().abs() / scale);
            match shown.filter(|figure| *figure > 0.0) {
                Some(figure) => rounded(value, last_place(figure, 2)),
                None => trimmed(value, 6),
            }
        }
        Place::Stated => trimmed(value, 6),
        Place::Significant(_) if value.abs() <= 0.0 => "0".to_owned(),
        Place::Significant(digits) => rounded(value, last_place(value, digits)),
    }
}

/// `figure` with its unit after a space that does not break; no unit stands beside a dash.
pub fn with_unit(
    value: Option<impl Into<f64>>,
    unit: Unit,
    place: Place,
    show_in: System,
) -> String {
    let absent = value.is_none();
    let text = figure(value, unit, place, show_in);
    if absent {
        text
    } else {
        format!("{text}\u{a0}{}", unit_symbol(unit, show_in))
    }
}

/// `value ± U`, both rounded to the second significant digit of U; the value alone where there is no U.
pub fn with_uncertainty(
    value: Option<Finite>,
    expanded: Option<Finite>,
    unit: Unit,
    show_in: System,
) -> String {
    let place = Place::Uncertainty(expanded);
    let text = figure(value, unit, place, show_in);
    match (value, expanded) {
        (Some(_), Some(_)) => format!("{text} ± {}", figure(expanded, unit, place, show_in)),
        _ => text,
    }
}

/// A share 0 … 1 as a percentage.
pub fn percent(share: Option<impl Into<f64>>) -> String {
    share.map_or_else(
        || ABSENT.to_owned(),
        |share| format!("{}\u{a0}%", rounded(share.into() * 100.0, -1)),
    )
}

/// A probability 0 … 1 as a percentage, never rounded to certainty.
pub fn probability(of: Option<impl Into<f64>>) -> String {
    let Some(of) = of.map(Into::<f64>::into) else {
        return ABSENT.to_owned();
    };
    if of > 0.999 {
        ">\u{a0}99.9\u{a0}%".to_owned()
    } else if of < 0.001 {
        "<\u{a0}0.1\u{a0}%".to_owned()
    } else {
        percent(Some(of))
    }
}

/// Degrees of freedom; `None` is infinite, and more than a thousand makes no difference that could be read.
pub fn freedom(of: Option<Finite>) -> String {
    match of {
        None => "∞".to_owned(),
        Some(of) if of.get() > MANY_DEGREES => format!(">\u{a0}{MANY_DEGREES:.0}"),
        Some(of) => number(Some(of), 3),
    }
}

/// A pure number to `digits` significant digits, trailing zeros cut.
pub fn number(value: Option<impl Into<f64>>, digits: i32) -> String {
    value.map_or_else(|| ABSENT.to_owned(), |value| trimmed(value.into(), digits))
}

/// The symbol of `unit` in the units of `show_in`.
pub const fn unit_symbol(unit: Unit, show_in: System) -> &'static str {
    match (show_in, unit) {
        (System::InLbf, Unit::Newton) => "lbf",
        (System::InLbf, Unit::Millimetre) => "in",
        (System::InLbf, Unit::NewtonPerMillimetre) => "lbf/in",
        (System::InLbf, Unit::Megapascal) => "psi",
        _ => unit.symbol(),
    }
}

/// How much of `unit` one unit of `show_in` is.
pub const fn per_unit(unit: Unit, show_in: System) -> f64 {
    match unit {
        Unit::Newton => show_in.force(),
        Unit::Millimetre => show_in.length(),
        Unit::NewtonPerMillimetre => show_in.rate(),
        Unit::Megapascal => show_in.stress(),
        Unit::Percent => 1.0,
    }
}

/// The power of ten of the last of `digits` significant digits of `value`, asked after rounding (9.96 to two digits is 10).
fn last_place(value: f64, digits: i32) -> i32 {
    let places = usize::try_from(digits - 1).unwrap_or(0);
    let written = format!("{:.*e}", places, value.abs());
    let exponent = written
        .rsplit_once('e')
        .and_then(|(_, power)| power.parse::<i32>().ok());
    exponent.unwrap_or(0) - digits + 1
}

/// `value` rounded to a power of ten.
fn rounded(value: f64, last: i32) -> String {
    let text = if last <= 0 {
        let places = usize::try_from((-last).min(MOST_PLACES)).unwrap_or(0);
        format!("{value:.places$}")
    } else {
        let step = 10_f64.powi(last);
        format!("{:.0}", (value / step).round() * step)
    };
    signed(&text)
}

/// `value` to `digits` significant digits, trailing zeros cut.
fn trimmed(value: f64, digits: i32) -> String {
    let text = rounded(value, last_place(value, digits));
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// A minus sign for a hyphen, and none before a zero.
fn signed(text: &str) -> String {
    match text.strip_prefix('-') {
        Some(rest) if rest.chars().any(|c| c.is_ascii_digit() && c != '0') => format!("−{rest}"),
        Some(rest) => rest.to_owned(),
        None => text.to_owned(),
    }
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, clippy::unnecessary_wraps, reason = "tests")]
    use super::*;

    fn of(value: f64) -> Option<Finite> {
        Some(Finite::try_from(value).unwrap())
    }

    #[test]
    fn rounds_to_two_digits_of_the_uncertainty() {
        // by hand; GUM 7.2.6: at most two significant digits of U, the value to the same place
        for (value, expanded, want) in [
            (151.284, 1.1532, "151.3 ± 1.2"),
            (10.8, 0.0996, "10.80 ± 0.10"),
            (10.8, 0.099_49, "10.800 ± 0.099"),
            (1234.5, 123.4, "1230 ± 120"),
            (-0.0001, 0.02, "0.000 ± 0.020"),
            (-1.5, 0.02, "−1.500 ± 0.020"),
            (12_345.0, 9960.0, "12000 ± 10000"),
        ] {
            let got = with_uncertainty(of(value), of(expanded), Unit::Newton, System::MmN);
            assert_eq!(got, want);
        }
    }

    #[test]
    fn what_is_absent_is_a_dash() {
        let none: Option<Finite> = None;
        assert_eq!(
            with_unit(none, Unit::Newton, Place::Stated, System::MmN),
            "–"
        );
        assert_eq!(
            with_uncertainty(none, of(1.0), Unit::Newton, System::MmN),
            "–"
        );
        assert_eq!(
            with_uncertainty(of(3.25), None, Unit::Newton, System::MmN),
            "3.25"
        );
        assert_eq!(percent(none), "–");
    }

    /// NIST SP 811 (2008), appendix B.8: 1 lbf = 4.448 222 N, 1 lbf/in = 175.126 8 N/m, 1 psi = 6894.757 Pa.
    #[test]
    fn shows_inches_and_pounds_force() {
        let show = |value, unit| with_unit(of(value), unit, Place::Significant(5), System::InLbf);
        assert_eq!(show(44.482_22, Unit::Newton), "10.000\u{a0}lbf");
        assert_eq!(show(25.4, Unit::Millimetre), "1.0000\u{a0}in");
        assert_eq!(
            show(1.751_268, Unit::NewtonPerMillimetre),
            "10.000\u{a0}lbf/in"
        );
        assert_eq!(show(6.894_757, Unit::Megapascal), "1000.0\u{a0}psi");
    }

    #[test]
    fn a_limit_stands_as_written() {
        let stated = |value| figure(of(value), Unit::Newton, Place::Stated, System::MmN);
        assert_eq!(stated(10.8 * 0.95), "10.26");
        assert_eq!(stated(142.0), "142");
        assert_eq!(stated(200_000.0), "200000");
        assert_eq!(stated(0.0), "0");
    }

    #[test]
    fn a_probability_is_never_rounded_to_certainty() {
        assert_eq!(probability(Some(0.999_99)), ">\u{a0}99.9\u{a0}%");
        assert_eq!(probability(Some(0.0)), "<\u{a0}0.1\u{a0}%");
        assert_eq!(probability(Some(0.5)), "50.0\u{a0}%");
        assert_eq!(percent(Some(1.0)), "100.0\u{a0}%");
    }

    #[test]
    fn degrees_of_freedom() {
        assert_eq!(freedom(None), "∞");
        assert_eq!(freedom(of(43_200_000.0)), ">\u{a0}1000");
        assert_eq!(freedom(of(86.44)), "86.4");
    }
}

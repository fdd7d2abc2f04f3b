//! The facts at the head of the page of `expect`.

use super::facts::{Fact, Facts, fact};
use crate::quantity::Unit;
use crate::record::{Expected, WindowOf};
use crate::units::{Finite, System};
use crate::wording::{self, Place, figure, number, unit_symbol, with_unit};

/// Rate, lengths, window, what was asked, service.
pub(super) fn facts(of: &Expected, show_in: System) -> Facts {
    let set = &of.theory;
    let length = |value| {
        with_unit(
            Some(value),
            Unit::Millimetre,
            Place::Significant(4),
            show_in,
        )
    };
    let load = |value| with_unit(Some(value), Unit::Newton, Place::Significant(4), show_in);
    let mut rows = vec![
        fact("Rate", rate(of, show_in)),
        fact("Free length L0", length(set.free_length_mm)),
        fact("Solid length Lc", length(set.solid_length_mm)),
        fact("Smallest length Ln", length(set.smallest_length_mm)),
        fact("Load there Fn", load(set.full_load_n)),
        fact("Rate window", window(of, show_in)),
        fact(
            "Stroke, method",
            format!("{}, {}", of.window.stroke, of.window.method),
        ),
    ];
    rows.extend(asked(of, show_in));
    rows.extend(service(of, show_in));
    Facts {
        title: "Expected".to_owned(),
        rows,
    }
}

fn rate(of: &Expected, show_in: System) -> String {
    let unit = Unit::NewtonPerMillimetre;
    let finite = |value: f64| Finite::try_from(value).ok();
    let set = &of.theory;
    let expanded = finite(2.0 * set.rate_standard_uncertainty.get());
    format!(
        "{} {} (k = 2)",
        wording::with_uncertainty(finite(set.rate_n_per_mm.get()), expanded, unit, show_in),
        unit_symbol(unit, show_in)
    )
}

fn window(of: &Expected, show_in: System) -> String {
    let window = &of.window;
    let (unit, what) = match window.of {
        WindowOf::Load => (Unit::Newton, "load"),
        WindowOf::Length => (Unit::Millimetre, "length"),
        WindowOf::Deflection | WindowOf::Travel => (Unit::Millimetre, "deflection"),
    };
    let bound = |value| with_unit(Some(value), unit, Place::Significant(4), show_in);
    format!(
        "{} ({what} {} to {})",
        window.stated,
        bound(window.from),
        bound(window.to)
    )
}

/// What holds at the load or length asked for; nothing where none was.
fn asked(of: &Expected, show_in: System) -> Vec<Fact> {
    let Some(deflection) = of.deflection_mm else {
        return Vec::new();
    };
    let length = |value| {
        with_unit(
            Some(value),
            Unit::Millimetre,
            Place::Significant(5),
            show_in,
        )
    };
    let mpa = |value| {
        figure(
            Some(value),
            Unit::Megapascal,
            Place::Significant(4),
            show_in,
        )
    };
    let mut rows = vec![fact("Asked: deflection", length(deflection))];
    for member in &of.members {
        let Some(stress) = member.stress_mpa else {
            continue;
        };
        rows.push(fact(
            &format!("Asked: {}", member.name),
            format!(
                "F {} ({} of the set); stress {} {}, static {}, dynamic {}, Wahl {}",
                with_unit(member.load_n, Unit::Newton, Place::Significant(5), show_in),
                wording::percent(member.load_share),
                mpa(stress.uncorrected),
                unit_symbol(Unit::Megapascal, show_in),
                mpa(stress.r#static),
                mpa(stress.dynamic),
                mpa(stress.wahl)
            ),
        ));
    }
    rows
}

fn service(of: &Expected, show_in: System) -> Vec<Fact> {
    let service = &of.service;
    let mut rows = Vec::new();
    if let Some((from, to)) = service.load_n {
        let load = |value| with_unit(Some(value), Unit::Newton, Place::Stated, show_in);
        let length = |value| {
            with_unit(
                Some(value),
                Unit::Millimetre,
                Place::Significant(4),
                show_in,
            )
        };
        let at = service.length_mm.map_or_else(String::new, |(long, short)| {
            format!(", lengths {} to {}", length(long), length(short))
        });
        rows.push(fact(
            "Service loads",
            format!("{} to {}{at}", load(from), load(to)),
        ));
    }
    if let Some(temperature) = service.temperature_c {
        let rate = |value| {
            with_unit(
                value,
                Unit::NewtonPerMillimetre,
                Place::Significant(4),
                show_in,
            )
        };
        let other = service
            .rate_at_temperature_other
            .map_or_else(String::new, |other| {
                format!(" ({} by the other source’s coefficient)", rate(Some(other)))
            });
        rows.push(fact(
            "Service temperature",
            format!(
                "{}\u{a0}°C: rate {}{other}",
                number(Some(temperature), 4),
                rate(service.rate_at_temperature)
            ),
        ));
    }
    if let Some(frequency) = service.frequency_hz {
        rows.push(fact(
            "Driven at",
            format!("{}\u{a0}Hz", number(Some(frequency), 4)),
        ));
    }
    rows
}

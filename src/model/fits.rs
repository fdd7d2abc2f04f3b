//! The fits of the rate, one row per spring.

use super::table::{Column, Row, Section, Table};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, FitFacts, SpringResult};
use crate::units::System;
use crate::wording::{ABSENT, Place, figure, number, unit_symbol};

/// The fits of the rate.
pub(crate) fn section(record: &AcceptRecord, show_in: System) -> Section {
    let rate = unit_symbol(Unit::NewtonPerMillimetre, show_in);
    let columns = vec![
        Column::words("Spring"),
        Column::words("Export, lines"),
        Column::figures("Window", unit_symbol(Unit::Millimetre, show_in)),
        Column::figures("Points (eff.)", ""),
        Column::figures("Lag 1", ""),
        Column::figures("SE", rate),
        Column::figures("Residual SD", unit_symbol(Unit::Newton, show_in)),
        Column::figures("Straightness", "%"),
        Column::figures("F (p)", ""),
        Column::figures("Bend", "%"),
        Column::figures("Two-point", rate),
        Column::figures("Robust", rate),
    ];
    let rows = record.springs.iter().filter_map(|spring| {
        let of = spring.fit.as_ref()?;
        Some(fit(spring, of, show_in))
    });
    Section {
        title: "Fits of the rate".to_owned(),
        text: vec![
            "Load regressed on travel within the window. SE: standard error of the slope as least squares gives it; lag 1: autocorrelation \
             of the residuals; straightness: largest residual over Fn; F (p): lack of fit; bend: change of the local rate across the window."
                .to_owned(),
        ],
        tables: vec![Table::new("Fits", columns, rows.collect())],
    }
}

fn fit(spring: &SpringResult, of: &FitFacts, show_in: System) -> Row {
    let rate = |value| {
        figure(
            value,
            Unit::NewtonPerMillimetre,
            Place::Significant(5),
            show_in,
        )
    };
    let travel = |value| {
        figure(
            Some(value),
            Unit::Millimetre,
            Place::Significant(4),
            show_in,
        )
    };
    let effective = of
        .effective_points
        .map_or_else(|| ABSENT.to_owned(), |value| number(Some(value), 3));
    let lack = of.lack_of_fit.as_ref();
    Row::from([
        spring.id.clone().into(),
        format!("{}, {}–{}", of.export, of.first_line, of.last_line).into(),
        format!("{} … {}", travel(of.from_mm), travel(of.to_mm)).into(),
        format!("{} ({effective})", of.points).into(),
        number(of.lag1, 2).into(),
        figure(
            Some(of.standard_error),
            Unit::NewtonPerMillimetre,
            Place::Significant(2),
            show_in,
        )
        .into(),
        figure(
            Some(of.residual_sd_n),
            Unit::Newton,
            Place::Significant(2),
            show_in,
        )
        .into(),
        number(of.straightness_percent, 2).into(),
        lack.map_or_else(
            || ABSENT.to_owned(),
            |lack| format!("{} ({})", number(Some(lack.f), 3), number(Some(lack.p), 2)),
        )
        .into(),
        number(lack.map(|lack| lack.bend_percent), 2).into(),
        rate(of.two_point_rate).into(),
        rate(of.robust_rate).into(),
    ])
    .about(spring.verdict)
}

//! Uncertainty budgets, each in full for the spring with the largest U.

use super::table::{Column, Row, Section, Table};
use crate::record::{AcceptRecord, BudgetFigure, CharacteristicResult, Part, SpringResult};
use crate::record::{find, occurring};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{Place, figure, freedom, number, percent, unit_symbol, with_uncertainty};

/// The section.
pub(crate) fn section(record: &AcceptRecord, show_in: System) -> Section {
    let tables = occurring(record).into_iter().filter_map(|(key, _)| {
        let largest = record
            .springs
            .iter()
            .filter_map(|spring| find(spring, &key).map(|of| (spring, of)))
            .filter(|(_, of)| of.expanded_uncertainty.is_some() && !of.budget.is_empty())
            .reduce(|best, next| {
                if size(next.1) > size(best.1) {
                    next
                } else {
                    best
                }
            });
        largest.map(|(spring, of)| table(spring, of, show_in))
    });
    Section {
        title: "Uncertainty budget".to_owned(),
        text: vec![
            "For each characteristic the budget of the spring with the largest U stands here in full; result.json holds the budget of every \
             spring. A line that another one already holds is shown and not counted."
                .to_owned(),
        ],
        tables: tables.collect(),
    }
}

fn size(of: &CharacteristicResult) -> f64 {
    of.expanded_uncertainty.map_or(0.0, Finite::get)
}

fn table(spring: &SpringResult, of: &CharacteristicResult, show_in: System) -> Table {
    let columns = vec![
        Column::words("Source"),
        Column::words("Part"),
        Column::figures("Contribution", unit_symbol(of.unit, show_in)),
        Column::figures("ν", ""),
        Column::figures("Share of u²", ""),
    ];
    let total = of.standard_uncertainty.map_or(0.0, |u| u.get() * u.get());
    let rows = of.budget.iter().map(|line| row(line, of, total, show_in));
    let name = wording::sentence(&wording::characteristic(&of.name, of.at_length_mm, show_in));
    let mut table = Table::new(
        format!("{name}, spring {}", spring.id),
        columns,
        rows.collect(),
    );
    table.note = format!(
        "Value {} {}; u = {}, k = {}.",
        with_uncertainty(of.value, of.expanded_uncertainty, of.unit, show_in),
        unit_symbol(of.unit, show_in),
        figure(
            of.standard_uncertainty,
            of.unit,
            Place::Significant(2),
            show_in
        ),
        number(of.coverage_factor, 3)
    );
    table
}

fn row(line: &BudgetFigure, of: &CharacteristicResult, total: f64, show_in: System) -> Row {
    let part = match line.part {
        Part::Own => "own",
        Part::Common => "common",
    };
    let square = line.contribution.get() * line.contribution.get();
    let share = match (line.counted, total > 0.0) {
        (false, _) => "not counted".to_owned(),
        (true, true) => percent(Some(square / total)),
        (true, false) => percent(None::<f64>),
    };
    Row::from([
        wording::sentence(&line.source).into(),
        part.into(),
        figure(
            Some(line.contribution),
            of.unit,
            Place::Significant(2),
            show_in,
        )
        .into(),
        freedom(line.degrees_of_freedom).into(),
        share.into(),
    ])
}

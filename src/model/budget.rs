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
    let name = wording::sentence(&wording::characteristic(&of.name, of.at_length_mm, show_in));
    let shown = |value: Finite| figure(Some(value), of.unit, Place::Significant(2), show_in);
    let mut table = lines(
        format!("{name}, spring {}", spring.id),
        &of.budget,
        unit_symbol(of.unit, show_in),
        of.standard_uncertainty,
        &shown,
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

/// The lines of one budget, their sum the standard uncertainty `sum`; `shown` writes a contribution in the unit `unit`.
pub(super) fn lines(
    caption: String,
    budget: &[BudgetFigure],
    unit: &str,
    sum: Option<Finite>,
    shown: &dyn Fn(Finite) -> String,
) -> Table {
    let columns = vec![
        Column::words("Source"),
        Column::words("Part"),
        Column::figures("Contribution", unit),
        Column::figures("ν", ""),
        Column::figures("Share of u²", ""),
    ];
    let square = |line: &BudgetFigure| line.contribution.get() * line.contribution.get();
    let total = sum.map_or(0.0, |u| u.get() * u.get());
    let row = |line: &BudgetFigure| {
        let part = match line.part {
            Part::Own => "own",
            Part::Common => "common",
        };
        let share = match (line.counted, total > 0.0) {
            (false, _) => "not counted".to_owned(),
            (true, true) => percent(Some(square(line) / total)),
            (true, false) => percent(None::<f64>),
        };
        Row::from([
            wording::sentence(&line.source).into(),
            part.into(),
            shown(line.contribution).into(),
            freedom(line.degrees_of_freedom).into(),
            share.into(),
        ])
    };
    Table::new(caption, columns, budget.iter().map(row).collect())
}

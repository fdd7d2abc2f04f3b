//! Every spring: its disposition, and what is behind its figures.

use super::table::{Cell, Column, Row, Section, Table, mark};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, CharacteristicResult, SpringResult, Verdict};
use crate::record::{Key, find, occurring};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, freedom, probability, unit_symbol, with_uncertainty};

/// Characteristics side by side in the table of the springs.
const ABREAST: usize = 5;

/// The table per spring with its disposition.
pub(crate) fn verdicts(record: &AcceptRecord, show_in: System) -> Section {
    let keys = occurring(record);
    let parts = keys.len().div_ceil(ABREAST).max(1);
    let tables = (0..parts).map(|part| {
        let from = (part * ABREAST).min(keys.len());
        let to = (from + ABREAST).min(keys.len());
        let some = keys.get(from..to).unwrap_or(&[]);
        let mut columns = vec![Column::words("Spring"), Column::words("Disposition")];
        columns.extend(some.iter().map(|((name, at), unit)| {
            Column::figures(
                wording::symbol(name, *at, show_in),
                unit_symbol(*unit, show_in),
            )
        }));
        if part == 0 {
            columns.push(Column::words("Remarks"));
        }
        let rows = record.springs.iter().map(|spring| Row {
            mark: mark(spring.verdict),
            cells: cells(spring, some, part == 0, show_in),
        });
        let caption = if part == 0 {
            "Springs"
        } else {
            "Springs, further characteristics"
        };
        Table::new(caption, columns, rows.collect())
    });
    Section {
        title: "Springs and their disposition".to_owned(),
        text: vec![
            "Value ± expanded uncertainty U at 95.45 %. A verdict stands under a value only where the value does not conform; a value \
             without a limit informs."
                .to_owned(),
        ],
        tables: tables.collect(),
    }
}

fn cells(spring: &SpringResult, keys: &[(Key, Unit)], remark: bool, show_in: System) -> Vec<Cell> {
    let mut cells = vec![
        Cell::from(spring.id.clone()),
        Cell::marked(wording::disposition(spring), spring.verdict),
    ];
    cells.extend(
        keys.iter()
            .map(|(key, _)| find(spring, key).map_or_else(Cell::default, |of| value(of, show_in))),
    );
    if remark {
        cells.push(remarks(spring, show_in).into());
    }
    cells
}

fn value(of: &CharacteristicResult, show_in: System) -> Cell {
    let text = with_uncertainty(of.value, of.expanded_uncertainty, of.unit, show_in);
    match of.verdict {
        Some(Verdict::Conforms) | None => text.into(),
        Some(verdict) => Cell {
            text,
            below: wording::verdict_word(verdict).to_owned(),
            mark: mark(verdict),
        },
    }
}

/// Why a spring does not conform, what was seen on it, what would settle it.
pub(crate) fn remarks(spring: &SpringResult, show_in: System) -> String {
    let mut said: Vec<String> = Vec::new();
    for of in &spring.characteristics {
        let settled = matches!(of.verdict, None | Some(Verdict::Conforms));
        if let (false, Some(reason)) = (settled, wording::verdict_reason(of, show_in)) {
            let name = wording::symbol(&of.name, of.at_length_mm, show_in);
            said.push(format!("{name}: {reason}"));
        }
    }
    said.extend(
        spring
            .findings
            .iter()
            .map(|seen| format!("seen ({}): {}", seen.class.word(), seen.text)),
    );
    said.extend(
        spring
            .advice
            .iter()
            .map(|advice| format!("to settle {}", wording::advice(advice, show_in))),
    );
    if spring.measurements.len() > 1 {
        said.push(format!("measured {} times", spring.measurements.len()));
    }
    for repeat in &spring.measurements {
        if let Some(invalid) = &repeat.invalid {
            said.push(format!("{} set aside as invalid: {invalid}", repeat.export));
        } else if let Some(reason) = &repeat.reason {
            said.push(format!("repeated ({reason}): {}", repeat.export));
        }
    }
    if !spring.in_sample {
        said.push("beyond the sample, does not count".to_owned());
    }
    if spring.simple_verdict != spring.verdict {
        said.push(format!(
            "simple acceptance: {}",
            wording::verdict_word(spring.simple_verdict)
        ));
    }
    said.join("; ")
}

/// What is behind the figures: one table per characteristic.
pub(crate) fn details(record: &AcceptRecord, show_in: System) -> Section {
    let tables = occurring(record).into_iter().map(|(key, unit)| {
        let unit_text = unit_symbol(unit, show_in);
        let columns = vec![
            Column::words("Spring"),
            Column::figures("u", unit_text),
            Column::figures("own", unit_text),
            Column::figures("common", unit_text),
            Column::figures("k (ν)", ""),
            Column::figures("Conforms within", unit_text),
            Column::figures("Fails beyond", unit_text),
            Column::figures("P inside limits", ""),
        ];
        let rows = record.springs.iter().filter_map(|spring| {
            let of = find(spring, &key)?;
            of.value.map(|_| detail(spring, of, show_in))
        });
        let name = wording::characteristic(&key.0, key.1, show_in);
        Table::new(wording::sentence(&name), columns, rows.collect())
    });
    Section {
        title: "Behind the figures".to_owned(),
        text: vec![
            "u: combined standard uncertainty; own: the part independent from spring to spring; common: the part all springs of this rig \
             set-up share; k: coverage factor at 95.45 % with ν effective degrees of freedom, U = k·u. P: probability that the true \
             value lies inside the limits, with a flat prior."
                .to_owned(),
        ],
        tables: tables.filter(|table| !table.rows.is_empty()).collect(),
    }
}

fn detail(spring: &SpringResult, of: &CharacteristicResult, show_in: System) -> Row {
    let shown = |value: Option<Finite>| {
        figure(
            value,
            of.unit,
            Place::Uncertainty(of.expanded_uncertainty),
            show_in,
        )
    };
    let small = |value: Option<Finite>| figure(value, of.unit, Place::Significant(2), show_in);
    let bounds = |low: Option<Finite>, high: Option<Finite>| match (low, high) {
        (None, None) => ABSENT.to_owned(),
        (Some(_), None) => format!("≥ {}", shown(low)),
        (None, Some(_)) => format!("≤ {}", shown(high)),
        (Some(_), Some(_)) => format!("{} … {}", shown(low), shown(high)),
    };
    let beyond = match (of.reject_lower, of.reject_upper) {
        (None, None) => ABSENT.to_owned(),
        (low @ Some(_), None) => format!("< {}", shown(low)),
        (None, high @ Some(_)) => format!("> {}", shown(high)),
        (low, high) => format!("< {}, > {}", shown(low), shown(high)),
    };
    let coverage = of.coverage_factor.map_or_else(
        || ABSENT.to_owned(),
        |k| format!("{:.2} ({})", k.get(), freedom(of.degrees_of_freedom)),
    );
    Row::from([
        spring.id.clone().into(),
        small(of.standard_uncertainty).into(),
        small(of.own_uncertainty).into(),
        small(of.common_uncertainty).into(),
        coverage.into(),
        bounds(of.accept_lower, of.accept_upper).into(),
        beyond.into(),
        probability(of.conformance_probability).into(),
    ])
    .about(spring.verdict)
}

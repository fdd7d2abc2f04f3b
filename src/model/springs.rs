//! Every spring: its disposition, and what is behind its figures.

use super::table::{Cell, Column, Row, Section, Table, mark};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, CharacteristicResult, SpringResult, Verdict};
use crate::record::{Key, find, occurring};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, freedom, probability, unit_symbol, with_uncertainty};

/// Odd stretches of an export named in a spring's remarks; the result lists all.
const ODD: usize = 3;
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
        let columns = columns(some, part == 0, show_in);
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

fn columns(keys: &[(Key, Unit)], first: bool, show_in: System) -> Vec<Column> {
    let mut columns = vec![Column::words("Spring")];
    if first {
        columns.push(Column::words("Disposition"));
    }
    columns.extend(keys.iter().map(|((name, at), unit)| {
        Column::figures(
            wording::symbol(name, *at, show_in),
            unit_symbol(*unit, show_in),
        )
    }));
    if first {
        columns.push(Column::words("Remarks"));
    }
    columns
}

fn cells(spring: &SpringResult, keys: &[(Key, Unit)], first: bool, show_in: System) -> Vec<Cell> {
    let mut cells = vec![Cell::from(spring.id.clone())];
    if first {
        cells.push(Cell::marked(wording::disposition(spring), spring.verdict));
    }
    cells.extend(
        keys.iter()
            .map(|(key, _)| find(spring, key).map_or_else(Cell::default, |of| value(of, show_in))),
    );
    if first {
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
    said.extend(spring.odd.iter().take(ODD).map(wording::odd_lines));
    if spring.odd.len() > ODD {
        said.push(format!("{} more odd stretches", spring.odd.len() - ODD));
    }
    said.extend(measured(spring));
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

/// The measurements of a spring measured more than once, or not validly.
fn measured(spring: &SpringResult) -> Option<String> {
    let all = &spring.measurements;
    if all.len() < 2 && all.iter().all(|one| one.invalid.is_none()) {
        return None;
    }
    let exports: Vec<String> = all
        .iter()
        .map(|one| match (&one.invalid, &one.reason) {
            (Some(why), _) => format!("{} (set aside as invalid: {why})", one.export),
            (None, Some(reason)) => format!("{} (repeated: {reason})", one.export),
            (None, None) => one.export.clone(),
        })
        .collect();
    let times = u64::try_from(all.len()).unwrap_or(u64::MAX);
    Some(format!(
        "{}: {}",
        wording::count(times, "measurement"),
        exports.join(", ")
    ))
}

/// What is behind the figures: one table per characteristic.
pub(crate) fn details(record: &AcceptRecord, show_in: System) -> Section {
    let tables = occurring(record).into_iter().map(|(key, unit)| {
        let found = || {
            record
                .springs
                .iter()
                .filter_map(|spring| find(spring, &key))
        };
        let judged = found().any(|of| of.verdict.is_some());
        let columns = detail_columns(unit_symbol(unit, show_in), judged);
        let rows = record.springs.iter().filter_map(|spring| {
            let of = find(spring, &key)?;
            of.value.map(|_| detail(spring, of, judged, show_in))
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

fn detail_columns(unit: &str, judged: bool) -> Vec<Column> {
    let mut columns = vec![
        Column::words("Spring"),
        Column::figures("u", unit),
        Column::figures("own", unit),
        Column::figures("common", unit),
        Column::figures("k (ν)", ""),
    ];
    if judged {
        columns.extend([
            Column::figures("Conforms within", unit),
            Column::figures("Fails beyond", unit),
            Column::figures("P inside limits", ""),
        ]);
    }
    columns
}

/// One spring's row; the last three cells only where the characteristic is judged.
fn detail(spring: &SpringResult, of: &CharacteristicResult, judged: bool, show_in: System) -> Row {
    let small = |value: Option<Finite>| figure(value, of.unit, Place::Significant(2), show_in);
    let coverage = of.coverage_factor.map_or_else(
        || ABSENT.to_owned(),
        |k| format!("{:.2} ({})", k.get(), freedom(of.degrees_of_freedom)),
    );
    let mut cells: Vec<Cell> = vec![
        spring.id.clone().into(),
        small(of.standard_uncertainty).into(),
        small(of.own_uncertainty).into(),
        small(of.common_uncertainty).into(),
        coverage.into(),
    ];
    if judged {
        cells.extend(proof(of, show_in).map(Cell::from));
        cells.push(probability(of.conformance_probability).into());
    }
    Row {
        mark: mark(spring.verdict),
        cells,
    }
}

/// Inside what conformance is proven, and beyond what failure.
fn proof(of: &CharacteristicResult, show_in: System) -> [String; 2] {
    let shown = |value: Option<Finite>| {
        figure(
            value,
            of.unit,
            Place::Uncertainty(of.expanded_uncertainty),
            show_in,
        )
    };
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
    [bounds(of.accept_lower, of.accept_upper), beyond]
}

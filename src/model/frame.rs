//! The give of the frame in the report of `rig verify`.

use super::table::{Column, Row, Section, Table};
use crate::quantity::Unit;
use crate::record::{CheckRecord, FrameFacts};
use crate::units::{Finite, System};
use crate::wording::{Place, figure, number, unit_symbol, with_unit};

/// A compliance in mm/N, to two digits of its uncertainty and one more.
fn compliance(value: Finite) -> String {
    number(Some(value), 3)
}

pub(super) fn frame_table(of: &FrameFacts, show_in: System) -> Table {
    let columns = vec![Column::words("What"), Column::words("Found")];
    let length = |value| {
        with_unit(
            Some(value),
            Unit::Millimetre,
            Place::Significant(3),
            show_in,
        )
    };
    let load = |value| with_unit(Some(value), Unit::Newton, Place::Significant(4), show_in);
    let expanded = of
        .expanded_uncertainty_mm_per_n
        .map_or_else(|| "unknown".to_owned(), |value| number(Some(value), 2));
    let form = match &of.table {
        Some(_) => "a table: the give bends by more than a step of the travel scale",
        None => "a straight line",
    };
    let departure = length(of.departure_mm);
    let stated = of.stated_give_mm.map_or_else(
        || "not stated in the rig file".to_owned(),
        |stated| {
            format!(
                "{} by the rig file; E_n {}",
                length(stated),
                number(of.e_n, 3)
            )
        },
    );
    let rows = [
        (
            "Compliance",
            format!(
                "{}\u{a0}mm/N, U = {expanded}\u{a0}mm/N",
                compliance(of.compliance_mm_per_n)
            ),
        ),
        (
            "Readings",
            format!(
                "{} in {}, {} to {}",
                of.readings,
                if of.passes == 1 {
                    "1 loading pass".to_owned()
                } else {
                    format!("{} loading passes", of.passes)
                },
                load(of.from_n),
                load(of.to_n)
            ),
        ),
        ("Form", format!("{form}; largest distance {departure}")),
        (
            "Give over these loads",
            format!("{} measured, {stated}", length(of.measured_give_mm)),
        ),
    ];
    let rows = rows.map(|(name, value)| Row::from([name.into(), value.into()]));
    Table::new("Frame, plate on plate", columns, rows.to_vec())
}

pub(super) fn give_table(record: &CheckRecord, show_in: System) -> Option<Section> {
    let rows = record.frame.as_ref()?.table.as_ref()?.iter().map(|point| {
        Row::from([
            figure(
                Some(point.load_n),
                Unit::Newton,
                Place::Significant(4),
                show_in,
            )
            .into(),
            figure(
                Some(point.give_mm),
                Unit::Millimetre,
                Place::Significant(3),
                show_in,
            )
            .into(),
        ])
    });
    let columns = vec![
        Column::figures("Load", unit_symbol(Unit::Newton, show_in)),
        Column::figures("Give", unit_symbol(Unit::Millimetre, show_in)),
    ];
    Some(Section {
        title: "Give of the frame".to_owned(),
        text: vec!["Between two rows the give is interpolated; below twice the contact load the first stretch is drawn back to no load.".to_owned()],
        tables: vec![Table::new("Table for the rig file", columns, rows.collect())],
    })
}

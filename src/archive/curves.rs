//! The curves of a run as a table: one row for each point. Through the points of the window, `regr_slope(load_n,
//! compression_mm)` of one spring and measurement is the fitted rate.

use polars::prelude::{DataFrame, PolarsResult};

use super::frame::{Columns, LAYOUT_COLUMN};
use super::place::LAYOUT;
use super::springs::Run;
use crate::curve::{Kept, KeptPoint};
use crate::drawing::Way;
use crate::record::AcceptRecord;

/// One point, with the curve it belongs to and the number of that measurement of the spring, from 1.
struct Row<'k> {
    curve: &'k Kept,
    measurement: i64,
    number: i64,
    point: KeptPoint,
}

/// The curves as the table of the run.
pub(super) fn frame(
    record: &AcceptRecord,
    kept: &[Vec<Kept>],
    run: &Run,
) -> PolarsResult<DataFrame> {
    let rows: Vec<Row<'_>> = kept.iter().flat_map(|spring| rows_of(spring)).collect();
    let count = rows.len();
    Columns::default()
        .same(LAYOUT_COLUMN, LAYOUT, count)
        .same("run", run.id.clone(), count)
        .same("drawing", record.drawing.number.clone(), count)
        .same("lot", record.lot.number.clone(), count)
        .same("supplier", record.lot.supplier.clone(), count)
        .each("spring", &rows, |row| row.curve.id.clone())
        .each("measurement", &rows, |row| row.measurement)
        .each("export", &rows, |row| row.curve.export.clone())
        .each("stroke", &rows, |row| stroke(row.point.stroke).to_owned())
        .each("point", &rows, |row| row.number)
        .each("in_window", &rows, |row| row.point.in_window)
        .each("compression_mm", &rows, |row| row.point.u)
        .each("length_mm", &rows, |row| {
            row.curve.origin.map(|origin| origin - row.point.u)
        })
        .each("load_n", &rows, |row| row.point.load)
        .frame()
}

fn rows_of(spring: &[Kept]) -> impl Iterator<Item = Row<'_>> {
    (1..).zip(spring).flat_map(|(measurement, curve)| {
        (1..).zip(&curve.points).map(move |(number, point)| Row {
            curve,
            measurement,
            number,
            point: *point,
        })
    })
}

const fn stroke(way: Way) -> &'static str {
    match way {
        Way::Loading => "loading",
        Way::Unloading => "unloading",
    }
}

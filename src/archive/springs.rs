//! The springs of a run as a table: one row for each spring and characteristic.

use polars::prelude::{DataFrame, PolarsResult};

use serde::Serialize;

use super::frame::{Columns, LAYOUT_COLUMN, word};
use super::place::LAYOUT;
use crate::record::{AcceptRecord, CharacteristicResult, SpringResult};
use crate::units::Finite;

/// One judgement of one lot.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize)]
pub struct Run {
    /// 1 for a lot judged the first time, then one more each time; readers take the highest.
    pub number: i64,
    /// When, UTC, `YYYY-MM-DDThh:mm:ss.ssssssZ`.
    pub judged_at: String,
    /// Its name, that of its files.
    pub id: String,
    /// The run it takes the place of.
    pub supersedes: Option<String>,
}

impl std::fmt::Display for Run {
    fn fmt(&self, out: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(out, "run {}", self.id)?;
        match &self.supersedes {
            Some(older) => write!(out, ", takes the place of {older}"),
            None => Ok(()),
        }
    }
}

/// One row: a spring, and one of its characteristics where it has any.
struct Row<'r> {
    spring: &'r SpringResult,
    of: Option<&'r CharacteristicResult>,
}

impl Row<'_> {
    fn figure(&self, of: fn(&CharacteristicResult) -> Option<Finite>) -> Option<f64> {
        self.of.and_then(of).map(Finite::get)
    }

    fn text(&self, of: impl Fn(&CharacteristicResult) -> Option<String>) -> Option<String> {
        self.of.and_then(of)
    }
}

/// The springs of `record` as the table of the run. Figures are in the unit of their row; times and dates are text.
pub(super) fn frame(record: &AcceptRecord, run: &Run) -> PolarsResult<DataFrame> {
    let rows: Vec<Row<'_>> = record.springs.iter().flat_map(rows_of).collect();
    let columns = characteristics(springs(lot(record, run, rows.len()), &rows), &rows);
    columns.frame()
}

fn rows_of(spring: &SpringResult) -> Vec<Row<'_>> {
    if spring.characteristics.is_empty() {
        return vec![Row { spring, of: None }];
    }
    let row = |of| Row {
        spring,
        of: Some(of),
    };
    spring.characteristics.iter().map(row).collect()
}

/// What every row of the run shares.
fn lot(record: &AcceptRecord, run: &Run, rows: usize) -> Columns {
    let AcceptRecord { lot, drawing, .. } = record;
    let tags = serde_json::to_string(&lot.tags).unwrap_or_default(); // texts by text: nothing in them can fail
    Columns::default()
        .same(LAYOUT_COLUMN, LAYOUT, rows)
        .same("tool_version", record.provenance.version.clone(), rows)
        .same("run", run.id.clone(), rows)
        .same("run_number", run.number, rows)
        .same("judged_at", run.judged_at.clone(), rows)
        .same("supersedes", run.supersedes.clone(), rows)
        .same("date", record.provenance.date.clone(), rows)
        .same("drawing", drawing.number.clone(), rows)
        .same("revision", drawing.revision.clone(), rows)
        .same("lot", lot.number.clone(), rows)
        .same("lot_size", i64::try_from(lot.size).ok(), rows)
        .same("supplier", lot.supplier.clone(), rows)
        .same("received", lot.received.clone(), rows)
        .same("rig", record.rig.name.clone(), rows)
        .same("tags", tags, rows)
        .same("decision", word(&record.decision), rows)
        .same(
            "plan_accept",
            record
                .plan
                .accept
                .and_then(|accept| i64::try_from(accept).ok()),
            rows,
        )
        .same("accepted_tighter", record.plan.accepted_tighter, rows)
}

fn springs(columns: Columns, rows: &[Row<'_>]) -> Columns {
    columns
        .each("spring", rows, |row| row.spring.id.clone())
        .each("spring_verdict", rows, |row| word(&row.spring.verdict))
        .each("in_sample", rows, |row| row.spring.in_sample)
}

fn characteristics(columns: Columns, rows: &[Row<'_>]) -> Columns {
    let figure = |row: &Row<'_>, of: fn(&CharacteristicResult) -> Option<Finite>| row.figure(of);
    let dof = "degrees_of_freedom";
    columns
        .each("characteristic", rows, |row| {
            row.text(|of| Some(of.name.clone()))
        })
        .each("at_length_mm", rows, |row| {
            row.of.and_then(|of| of.at_length_mm).map(f64::from)
        })
        .each("unit", rows, |row| row.text(|of| word(&of.unit)))
        .each("value", rows, |row| figure(row, |of| of.value))
        .each("standard_uncertainty", rows, |row| {
            figure(row, |of| of.standard_uncertainty)
        })
        .each("own_uncertainty", rows, |row| {
            figure(row, |of| of.own_uncertainty)
        })
        .each("common_uncertainty", rows, |row| {
            figure(row, |of| of.common_uncertainty)
        })
        .each("expanded_uncertainty", rows, |row| {
            figure(row, |of| of.expanded_uncertainty)
        })
        .each("coverage_factor", rows, |row| {
            figure(row, |of| of.coverage_factor)
        })
        .each(dof, rows, |row| figure(row, |of| of.degrees_of_freedom))
        .each("nominal", rows, |row| figure(row, |of| of.nominal))
        .each("lower", rows, |row| figure(row, |of| of.lower))
        .each("upper", rows, |row| figure(row, |of| of.upper))
        .each("class", rows, |row| row.text(|of| word(&of.class)))
        .each("verdict", rows, |row| row.text(|of| word(&of.verdict)))
        .each("conformance_probability", rows, |row| {
            figure(row, |of| of.conformance_probability)
        })
}

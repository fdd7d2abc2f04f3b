//! Checks of rigs on a reference spring: a table for each, one row for each quantity that was compared.

use std::path::Path;

use jiff::civil::Date;
use polars::prelude::{DataFrame, PolarsError, PolarsResult};
use rayon::prelude::*;

use super::error::{ArchiveError, shown};
use super::frame::{self, Columns, LAYOUT_COLUMN, bools, f64s, texts, unword, word};
use super::place::{Archive, LAYOUT};
use super::results::Referenced;
use super::springs::Run;
use super::sums::Sums;
use super::walk;
use crate::bench::Serving;
use crate::record::{CheckRecord, ComparisonFacts, EarlierCheck, LastCheck};
use crate::units::{Finite, Millimetres};

/// The columns that a reading takes up.
const COLUMNS: [&str; 15] = [
    LAYOUT_COLUMN,
    "run",
    "judged_at",
    "date",
    "rig",
    "reference",
    "decision",
    "passed",
    "characteristic",
    "at_length_mm",
    "unit",
    "reference_value",
    "error",
    "expanded_uncertainty",
    "e_n",
];

/// One check as it was kept.
#[derive(Clone, Debug)]
pub struct KeptCheck {
    /// When it was kept, UTC, and under which name: they order checks of one day.
    order: (Date, String, String),
    rig: String,
    reference: Option<String>,
    decision: Serving,
    passed: bool,
    quantities: Vec<Referenced>,
}

impl KeptCheck {
    fn known_by(&self) -> LastCheck {
        let reference = self.reference.clone();
        LastCheck {
            date: self.order.0,
            id: reference.unwrap_or_else(|| "no reference spring".to_owned()),
        }
    }

    /// Its quantities, as a later check looks back at them.
    pub fn into_earlier(self) -> Vec<EarlierCheck> {
        self.quantities.into_iter().map(|(one, _)| one).collect()
    }

    /// The same, each beside its certified value.
    pub fn into_referenced(self) -> Vec<Referenced> {
        self.quantities
    }
}

impl Archive {
    /// Every check of every rig, oldest first.
    ///
    /// # Errors
    /// [`ArchiveError`] where one cannot be read: a check that is passed over may be the one that failed.
    pub fn checks(&self) -> Result<Vec<KeptCheck>, ArchiveError> {
        let records = walk::checks(&self.root().join("records"), "json")?;
        if let Some(fault) = self.gone(&records.runs, "checks").pop() {
            return Err(fault);
        }
        let files = walk::checks(&self.root().join("checks"), "parquet")?;
        let read: Result<Vec<KeptCheck>, _> =
            files.runs.par_iter().map(|path| self.check(path)).collect();
        let mut checks = read?;
        checks.sort_by(|a, b| a.order.cmp(&b.order));
        Ok(checks)
    }

    /// The last passed check of `rig` up to `day` that no failed one follows, and the last check where it failed.
    ///
    /// # Errors
    /// As [`Archive::checks`].
    pub fn last_check(
        &self,
        rig: &str,
        day: Date,
    ) -> Result<(Option<LastCheck>, Option<LastCheck>), ArchiveError> {
        let (mut passed, mut failed) = (None, None);
        for check in self.checks()? {
            if check.rig != rig || check.order.0 > day {
                continue;
            }
            if check.passed {
                (passed, failed) = (Some(check.known_by()), None);
            } else if check.decision == Serving::Fails {
                (passed, failed) = (None, Some(check.known_by()));
            }
        }
        Ok((passed, failed))
    }

    /// Which run the file of a check holds.
    ///
    /// # Errors
    /// [`ArchiveError`] where it cannot be read.
    pub(super) fn run_of_check(&self, path: &Path) -> Result<Run, ArchiveError> {
        let (_, judged_at, id) = self.check(path)?.order;
        Ok(Run {
            number: 1,
            judged_at,
            id,
            supersedes: None,
        })
    }

    fn check(&self, path: &Path) -> Result<KeptCheck, ArchiveError> {
        let bytes = Sums::of(self.root(), path)?.read(path)?;
        let frame = frame::read(&bytes, path, Some(&COLUMNS))?;
        kept(&frame).map_err(|fault| ArchiveError::Unreadable {
            file: shown(path),
            why: fault.to_string(),
        })
    }
}

/// A quantity of a check; none where only the frame was measured.
struct Row<'r>(Option<&'r ComparisonFacts>);

/// The check as its table: a row for each quantity, one without any where only the frame was measured.
pub(super) fn frame(record: &CheckRecord, run: &Run) -> PolarsResult<DataFrame> {
    let mut rows: Vec<Row<'_>> = record.comparisons.iter().map(|of| Row(Some(of))).collect();
    if rows.is_empty() {
        rows.push(Row(None));
    }
    let count = rows.len();
    let figure = |of: fn(&ComparisonFacts) -> Option<Finite>| {
        move |row: &Row<'_>| row.0.and_then(of).map(Finite::get)
    };
    Columns::default()
        .same(LAYOUT_COLUMN, LAYOUT, count)
        .same("tool_version", record.provenance.version.clone(), count)
        .same("run", run.id.clone(), count)
        .same("judged_at", run.judged_at.clone(), count)
        .same("date", record.judged_at.to_string(), count)
        .same("rig", record.rig.clone(), count)
        .same("reference", record.reference.clone(), count)
        .same("decision", word(&record.decision), count)
        .same("passed", record.passed, count)
        .each("characteristic", &rows, |row| {
            row.0.map(|of| of.name.clone())
        })
        .each("at_length_mm", &rows, |row| {
            row.0.and_then(|of| of.at_length_mm).map(f64::from)
        })
        .each("unit", &rows, |row| row.0.and_then(|of| word(&of.unit)))
        .each("reference_value", &rows, figure(|of| Some(of.reference)))
        .each(
            "reference_expanded_uncertainty",
            &rows,
            figure(|of| Some(of.reference_expanded_uncertainty)),
        )
        .each("value", &rows, figure(|of| of.value))
        .each(
            "expanded_uncertainty",
            &rows,
            figure(|of| of.expanded_uncertainty),
        )
        .each("error", &rows, figure(|of| of.error))
        .each("e_n", &rows, figure(|of| of.e_n))
        .each("allowed_error", &rows, figure(|of| of.allowed_error))
        .each("finding", &rows, |row| {
            row.0.and_then(|of| word(&of.finding))
        })
        .frame()
}

fn kept(frame: &DataFrame) -> Result<KeptCheck, PolarsError> {
    let text = |name: &str, row: usize| -> Result<Option<String>, PolarsError> {
        Ok(texts(frame, name)?.get(row).map(str::to_owned))
    };
    let wrong = |name: &str| {
        PolarsError::InvalidOperation(format!("its column `{name}` holds no such thing").into())
    };
    let must = |name: &str| text(name, 0)?.ok_or_else(|| wrong(name));
    let date: Date = must("date")?.parse().map_err(|_| wrong("date"))?;
    let passed = bools(frame, "passed")?
        .get(0)
        .ok_or_else(|| wrong("passed"))?;
    let (rig, reference) = (must("rig")?, text("reference", 0)?);
    let mut quantities = Vec::new();
    for row in 0..frame.height() {
        let figure = |name: &str| -> Result<Option<Finite>, PolarsError> {
            Ok(f64s(frame, name)?
                .get(row)
                .and_then(|one| Finite::try_from(one).ok()))
        };
        let (name, unit) = (text("characteristic", row)?, text("unit", row)?);
        let (error, expanded, e_n) = (
            figure("error")?,
            figure("expanded_uncertainty")?,
            figure("e_n")?,
        );
        let (Some(reference), Some(name), Some(unit)) = (&reference, name, unit) else {
            continue;
        };
        let (Some(error), Some(expanded_uncertainty), Some(e_n)) = (error, expanded, e_n) else {
            continue; // not measured
        };
        let at = f64s(frame, "at_length_mm")?
            .get(row)
            .map(Millimetres::try_from);
        let certified = figure("reference_value")?.ok_or_else(|| wrong("reference_value"))?;
        let quantity = EarlierCheck {
            date,
            rig: rig.clone(),
            reference: reference.clone(),
            name,
            at_length_mm: at.transpose().map_err(|_| wrong("at_length_mm"))?,
            unit: unword(&unit).ok_or_else(|| wrong("unit"))?,
            error,
            expanded_uncertainty,
            e_n,
            passed,
        };
        quantities.push((quantity, certified));
    }
    Ok(KeptCheck {
        order: (date, must("judged_at")?, must("run")?),
        decision: unword(&must("decision")?).ok_or_else(|| wrong("decision"))?,
        rig,
        reference,
        passed,
        quantities,
    })
}

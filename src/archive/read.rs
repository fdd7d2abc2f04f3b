//! Runs read back from their springs files: what was judged, when, and the values.

use std::collections::BTreeMap;
use std::path::Path;

use jiff::civil::Date;
use polars::prelude::{DataFrame, PolarsError};
use rayon::prelude::*;
use serde::Serialize;

use super::error::{ArchiveError, Unreadable, shown};
use super::frame::{self, LAYOUT_COLUMN, f64s, i64s, texts, unword};
use super::place::Archive;
use super::springs::Run;
use super::sums::Sums;
use super::walk;
use crate::quantity::Unit;
use crate::record::{AcceptRecord, Decision};

/// The columns that a reading takes up; the others are for other engines.
const COLUMNS: [&str; 25] = [
    LAYOUT_COLUMN,
    "run",
    "run_number",
    "judged_at",
    "supersedes",
    "date",
    "drawing",
    "lot",
    "supplier",
    "received",
    "rig",
    "tags",
    "decision",
    "plan_accept",
    "accepted_tighter",
    "spring",
    "characteristic",
    "at_length_mm",
    "unit",
    "value",
    "own_uncertainty",
    "common_uncertainty",
    "nominal",
    "lower",
    "upper",
];

/// One measured value of one spring; figures in the unit of the series.
#[derive(Clone, Debug, PartialEq)]
pub struct SpringValue {
    /// Its place in [`LotRun::springs`].
    pub spring: usize,
    /// The value.
    pub value: f64,
    /// Standard uncertainty of its own; `None` where it is not known.
    pub own: Option<f64>,
    /// Standard uncertainty common to the rig.
    pub common: Option<f64>,
}

/// One characteristic over the springs of a run that have a value.
#[derive(Clone, Debug, PartialEq)]
pub struct Series {
    /// The quantity's name.
    pub characteristic: String,
    /// Length of a load, mm.
    pub at_length_mm: Option<f64>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Nominal value of the drawing.
    pub nominal: Option<f64>,
    /// Lower limit of the drawing.
    pub lower: Option<f64>,
    /// Upper limit of the drawing.
    pub upper: Option<f64>,
    /// The values, in the order of the springs.
    pub values: Vec<SpringValue>,
}

/// A lot as any list of lots tells it.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct LotHead {
    /// Drawing number.
    pub drawing: String,
    /// Lot number.
    pub lot: String,
    /// Supplier.
    pub supplier: Option<String>,
    /// Date of the judgement, as the result states it.
    pub date: Date,
    /// Date received.
    pub received: Option<Date>,
    /// Rig.
    pub rig: String,
    /// Tags.
    pub tags: BTreeMap<String, String>,
    /// The decision.
    pub decision: Decision,
}

impl LotHead {
    /// The date that a lot is looked up and charted by: received, else judged.
    pub fn when(&self) -> Date {
        self.received.unwrap_or(self.date)
    }

    /// What makes two runs runs of one lot.
    pub fn identity(&self) -> (&str, &str, Option<&str>) {
        (&self.drawing, &self.lot, self.supplier.as_deref())
    }
}

/// One run of one lot.
#[derive(Clone, Debug, PartialEq)]
pub struct LotRun {
    /// Which run.
    pub run: Run,
    /// The lot.
    pub head: LotHead,
    /// Ac of its plan.
    pub plan_accept: Option<i64>,
    /// Whether the lot would also have been accepted with the AQL one step tighter.
    pub accepted_tighter: Option<bool>,
    /// Ids of the springs, in the order of the result.
    pub springs: Vec<String>,
    /// The characteristics, in the order of the result.
    pub series: Vec<Series>,
}

/// What a reading found; the runs in the order of drawing, lot, supplier and run.
#[derive(Debug, Default)]
pub struct Found {
    /// The runs.
    pub runs: Vec<LotRun>,
    /// Files of runs that cannot be read.
    pub broken: Vec<ArchiveError>,
    /// Files that are no part of an archive.
    pub foreign: Vec<Unreadable>,
}

impl Found {
    /// Everything that was passed over.
    pub fn passed_over(self) -> (Vec<LotRun>, Vec<Unreadable>) {
        let broken = self.broken.into_iter().map(Unreadable::from);
        (self.runs, broken.chain(self.foreign).collect())
    }
}

impl Archive {
    /// Reads every run, or every run of one drawing. A file that cannot be read is named, and the rest is read.
    ///
    /// # Errors
    /// [`ArchiveError::Read`] where a folder cannot be listed.
    pub fn runs(&self, drawing: Option<&str>) -> Result<Found, ArchiveError> {
        let records = walk::runs(&self.root().join("records"), "json", drawing)?;
        let files = walk::runs(&self.root().join("springs"), "parquet", drawing)?;
        let read: Vec<_> = files
            .runs
            .par_iter()
            .map(|path| run(self.root(), path))
            .collect();
        let mut found = Found {
            runs: Vec::with_capacity(read.len()),
            broken: self.gone(&records.runs, "springs"),
            foreign: files.foreign,
        };
        for one in read {
            match one {
                Ok(run) => found.runs.push(run),
                Err(fault) => found.broken.push(fault),
            }
        }
        found.runs.sort_by(|a, b| {
            let order = a.head.identity().cmp(&b.head.identity());
            order.then_with(|| a.run.cmp(&b.run))
        });
        Ok(found)
    }
}

/// The latest run of each drawing, lot and supplier; `runs` stand in their order.
pub fn latest(runs: Vec<LotRun>) -> Vec<LotRun> {
    let mut kept: Vec<LotRun> = Vec::with_capacity(runs.len());
    for run in runs {
        match kept.last_mut() {
            Some(last) if last.head.identity() == run.head.identity() => *last = run,
            _ => kept.push(run),
        }
    }
    kept
}

/// The latest run of the lot that `record` judges, in the lot's `folder`.
///
/// # Errors
/// [`ArchiveError`] where a file there cannot be read: then nobody can say which run is the latest.
pub(super) fn latest_of(
    archive: &Archive,
    folder: &Path,
    record: &AcceptRecord,
) -> Result<Option<Run>, ArchiveError> {
    let files = walk::runs_in(&archive.root().join("springs").join(folder), "parquet")?;
    let (drawing, lot) = (&record.drawing.number, &record.lot.number);
    let wanted = (
        drawing.as_str(),
        lot.as_str(),
        record.lot.supplier.as_deref(),
    );
    let mut latest: Option<Run> = None;
    for path in &files.runs {
        let found = run(archive.root(), path)?;
        if found.head.identity() == wanted {
            latest = latest.max(Some(found.run));
        }
    }
    Ok(latest)
}

/// Which run a springs file holds.
///
/// # Errors
/// [`ArchiveError`] where it cannot be read.
pub(super) fn run_of(archive: &Path, path: &Path) -> Result<Run, ArchiveError> {
    run(archive, path).map(|run| run.run)
}

fn run(archive: &Path, path: &Path) -> Result<LotRun, ArchiveError> {
    let bytes = Sums::of(archive, path)?.read(path)?;
    let frame = frame::read(&bytes, path, Some(&COLUMNS))?;
    let unreadable = |why: String| ArchiveError::Unreadable {
        file: shown(path),
        why,
    };
    let run = lot_run(&frame).map_err(|fault| unreadable(fault.to_string()))?;
    let named = path.file_stem().is_some_and(|name| *name == *run.run.id);
    if named {
        Ok(run)
    } else {
        Err(unreadable(format!("it holds the run `{}`", run.run.id)))
    }
}

fn lot_run(frame: &DataFrame) -> Result<LotRun, PolarsError> {
    let text = |name: &str| -> Result<Option<String>, PolarsError> {
        Ok(texts(frame, name)?.get(0).map(str::to_owned))
    };
    let must = |name: &str| {
        let missing = || PolarsError::NoData(format!("its column `{name}` is empty").into());
        text(name)?.ok_or_else(missing)
    };
    let date = |name: &str, text: &str| text.parse::<Date>().map_err(|_| wrong(name));
    let (springs, series) = series(frame)?;
    let received = text("received")?.map(|text| date("received", &text));
    let decision = texts(frame, "decision")?.get(0);
    Ok(LotRun {
        run: Run {
            number: i64s(frame, "run_number")?
                .get(0)
                .ok_or_else(|| wrong("run_number"))?,
            judged_at: must("judged_at")?,
            id: must("run")?,
            supersedes: text("supersedes")?,
        },
        head: LotHead {
            drawing: must("drawing")?,
            lot: must("lot")?,
            supplier: text("supplier")?,
            date: date("date", &must("date")?)?,
            received: received.transpose()?,
            rig: must("rig")?,
            tags: serde_json::from_str(&must("tags")?).map_err(|_| wrong("tags"))?,
            decision: decision.and_then(unword).ok_or_else(|| wrong("decision"))?,
        },
        plan_accept: i64s(frame, "plan_accept")?.get(0),
        accepted_tighter: frame::bools(frame, "accepted_tighter")?.get(0),
        springs,
        series,
    })
}

/// The springs, and their values by characteristic.
fn series(frame: &DataFrame) -> Result<(Vec<String>, Vec<Series>), PolarsError> {
    let (springs, names, units) = (
        texts(frame, "spring")?,
        texts(frame, "characteristic")?,
        texts(frame, "unit")?,
    );
    let figure = |name| f64s(frame, name);
    let (at, values) = (figure("at_length_mm")?, figure("value")?);
    let (own, common) = (figure("own_uncertainty")?, figure("common_uncertainty")?);
    let (nominal, lower, upper) = (figure("nominal")?, figure("lower")?, figure("upper")?);
    let (mut ids, mut found): (Vec<String>, Vec<Series>) = (Vec::new(), Vec::new());
    for row in 0..frame.height() {
        let spring = springs.get(row).unwrap_or("");
        if ids.last().is_none_or(|last| last != spring) {
            ids.push(spring.to_owned());
        }
        let (Some(name), Some(unit)) = (names.get(row), units.get(row)) else {
            continue; // a spring of which nothing was measured
        };
        let at = at.get(row);
        let known = found.iter().position(|one| one.is(name, at));
        let place = known.unwrap_or(found.len());
        if known.is_none() {
            found.push(Series {
                characteristic: name.to_owned(),
                at_length_mm: at,
                unit: unword(unit).ok_or_else(|| wrong("unit"))?,
                nominal: nominal.get(row),
                lower: lower.get(row),
                upper: upper.get(row),
                values: Vec::new(),
            });
        }
        if let (Some(series), Some(value)) = (found.get_mut(place), values.get(row)) {
            series.values.push(SpringValue {
                spring: ids.len() - 1,
                value,
                own: own.get(row),
                common: common.get(row),
            });
        }
    }
    Ok((ids, found))
}

fn wrong(column: &str) -> PolarsError {
    PolarsError::InvalidOperation(format!("its column `{column}` holds no such thing").into())
}

impl Series {
    fn is(&self, name: &str, at: Option<f64>) -> bool {
        self.characteristic == name && self.at_length_mm.map(f64::to_bits) == at.map(f64::to_bits)
    }
}

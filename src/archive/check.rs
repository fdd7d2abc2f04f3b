//! A run's tables held against what its inputs give now.

use std::path::{Path, PathBuf};

use polars::prelude::{AnyValue, Column, DataFrame, PolarsResult};

use super::error::{ArchiveError, Unreadable};
use super::place::Archive;
use super::read::run_of;
use super::springs::Run;
use super::sums::Sums;
use super::{checks, curves, frame, springs, walk};
use crate::curve::Kept;
use crate::record::{AcceptRecord, CheckRecord, Closeness, Difference};

/// A run as it lies in the archive.
#[derive(Clone, Debug)]
pub struct StoredRun {
    /// Which run.
    pub run: Run,
    /// Where its record lies.
    pub record: PathBuf,
    archive: PathBuf,
    /// The file that makes it a run, below its tree.
    below: PathBuf,
    tree: &'static str,
}

/// Runs as they lie in the archive.
#[derive(Debug, Default)]
pub struct StoredRuns {
    /// The runs: lots, then checks of rigs, each in the order of the folders.
    pub runs: Vec<StoredRun>,
    /// Files that were passed over.
    pub unreadable: Vec<Unreadable>,
}

impl Archive {
    /// Every run.
    ///
    /// # Errors
    /// [`ArchiveError::Read`] where a folder cannot be listed.
    pub fn stored_runs(&self) -> Result<StoredRuns, ArchiveError> {
        let (lots, rigs) = (self.root().join("springs"), self.root().join("checks"));
        let records = self.root().join("records");
        let mut gone = self.gone(&walk::runs(&records, "json", None)?.runs, "springs");
        gone.extend(self.gone(&walk::checks(&records, "json")?.runs, "checks"));
        let mut stored = StoredRuns {
            runs: Vec::new(),
            unreadable: gone.into_iter().map(Unreadable::from).collect(),
        };
        for (tree, root, files) in [
            ("springs", &lots, walk::runs(&lots, "parquet", None)?),
            ("checks", &rigs, walk::checks(&rigs, "parquet")?),
        ] {
            stored.unreadable.extend(files.foreign);
            for path in files.runs {
                let read = match tree {
                    "springs" => run_of(self.root(), &path),
                    _ => self.run_of_check(&path),
                };
                match read {
                    Ok(run) => stored.runs.push(StoredRun {
                        run,
                        record: self.record_of(path.strip_prefix(root).unwrap_or(&path)),
                        archive: self.root().to_owned(),
                        below: path.strip_prefix(root).unwrap_or(&path).to_owned(),
                        tree,
                    }),
                    Err(fault) => stored.unreadable.push(fault.into()),
                }
            }
        }
        Ok(stored)
    }

    fn record_of(&self, below: &Path) -> PathBuf {
        self.root()
            .join("records")
            .join(below)
            .with_extension("json")
    }
}

impl StoredRun {
    /// The files of this run that are not, byte for byte, what was written.
    ///
    /// # Errors
    /// [`ArchiveError`] where its checksums cannot be read.
    pub fn altered(&self) -> Result<Vec<Difference>, ArchiveError> {
        Ok(self.sums()?.altered())
    }

    fn sums(&self) -> Result<Sums, ArchiveError> {
        Sums::of(&self.archive, &self.table(self.tree))
    }

    fn table(&self, tree: &str) -> PathBuf {
        self.archive.join(tree).join(&self.below)
    }

    /// Where the tables of this run differ from those that `record` and `kept` give.
    ///
    /// # Errors
    /// [`ArchiveError`] where a table cannot be read.
    pub fn lot_differences(
        &self,
        record: &AcceptRecord,
        kept: &[Vec<Kept>],
        closeness: Closeness,
    ) -> Result<Vec<Difference>, ArchiveError> {
        let mut found = self.against("springs", springs::frame(record, &self.run), closeness)?;
        found.extend(self.against("curves", curves::frame(record, kept, &self.run), closeness)?);
        Ok(found)
    }

    /// Where the table of this check differs from the one that `record` gives.
    ///
    /// # Errors
    /// [`ArchiveError`] where the table cannot be read.
    pub fn check_differences(
        &self,
        record: &CheckRecord,
        closeness: Closeness,
    ) -> Result<Vec<Difference>, ArchiveError> {
        self.against("checks", checks::frame(record, &self.run), closeness)
    }

    fn against(
        &self,
        tree: &str,
        now: PolarsResult<DataFrame>,
        closeness: Closeness,
    ) -> Result<Vec<Difference>, ArchiveError> {
        let table = |cause| ArchiveError::Frame { cause };
        let path = self.table(tree);
        let stored = frame::read(&self.sums()?.read(&path)?, &path, None)?;
        let mut found = Vec::new();
        compare(tree, &stored, &now.map_err(table)?, closeness, &mut found).map_err(table)?;
        Ok(found)
    }
}

fn compare(
    tree: &str,
    stored: &DataFrame,
    now: &DataFrame,
    closeness: Closeness,
    found: &mut Vec<Difference>,
) -> PolarsResult<()> {
    let differ = |place: String, stored: String, recomputed: String| Difference {
        place: format!("{tree} table / {place}"),
        stored,
        recomputed,
    };
    if stored.height() != now.height() {
        let rows = |frame: &DataFrame| format!("{} rows", frame.height());
        found.push(differ("rows".to_owned(), rows(stored), rows(now)));
        return Ok(());
    }
    for column in stored.columns() {
        let name = column.name().as_str();
        if name == "tool_version" && closeness == Closeness::AcrossVersions {
            continue;
        }
        let Ok(other) = now.column(name) else {
            found.push(differ(
                name.to_owned(),
                "a column".to_owned(),
                "nothing".to_owned(),
            ));
            continue;
        };
        let rows = rows_that_differ(column, other, closeness)?;
        if let Some(first) = rows.first() {
            let cell = |column: &Column| column.get(*first).map(|cell| cell.to_string());
            let place = format!("{name}, {}", numbered(&rows));
            found.push(differ(place, cell(column)?, cell(other)?));
        }
    }
    Ok(())
}

fn rows_that_differ(
    stored: &Column,
    now: &Column,
    closeness: Closeness,
) -> PolarsResult<Vec<usize>> {
    let mut rows = Vec::new();
    for row in 0..stored.len() {
        let same = match (stored.get(row)?, now.get(row)?) {
            (AnyValue::Float64(a), AnyValue::Float64(b)) => closeness.holds(a, b),
            (a, b) => a == b,
        };
        if !same {
            rows.push(row);
        }
    }
    Ok(rows)
}

/// Rows as people count them, neighbours drawn together: `rows 3, 17, 40–60`.
fn numbered(rows: &[usize]) -> String {
    let mut runs: Vec<(usize, usize)> = Vec::new();
    for row in rows.iter().map(|row| row + 1) {
        match runs.last_mut() {
            Some((_, last)) if *last + 1 == row => *last = row,
            _ => runs.push((row, row)),
        }
    }
    let text = |(first, last): &(usize, usize)| {
        if first == last {
            first.to_string()
        } else {
            format!("{first}–{last}")
        }
    };
    let runs: Vec<String> = runs.iter().map(text).collect();
    format!("rows {}", runs.join(", "))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neighbours_are_drawn_together() {
        assert_eq!(numbered(&[2, 16, 39, 40, 41]), "rows 3, 17, 40–42");
    }

    #[test]
    fn every_cell_that_differs_is_named_by_its_row() {
        let frame = |values: Vec<Option<f64>>| {
            DataFrame::new_infer_height(vec![Column::new("value".into(), values)]).ok()
        };
        let (Some(stored), Some(now)) = (
            frame(vec![Some(1.0), None, Some(3.0), Some(4.0)]),
            frame(vec![Some(1.0), Some(0.0), Some(3.0 + 1e-12), Some(4.0)]),
        ) else {
            unreachable!("both are tables");
        };
        let mut exact = Vec::new();
        let mut across = Vec::new();
        compare("springs", &stored, &now, Closeness::Exact, &mut exact).ok();
        compare(
            "springs",
            &stored,
            &now,
            Closeness::AcrossVersions,
            &mut across,
        )
        .ok();
        assert_eq!(exact.len(), 1);
        assert_eq!(
            exact.first().map(|one| one.place.as_str()),
            Some("springs table / value, rows 2–3")
        );
        assert_eq!(
            across.first().map(|one| one.place.as_str()),
            Some("springs table / value, rows 2")
        );
    }
}

//! `recheck`: recomputes a sealed result from its inputs and names every figure that differs.

mod again;
mod sealed;

use std::path::Path;

use serde::Serialize;

use crate::archive::{Archive, StoredRun, StoredRuns};
use crate::record::{Difference, FORMAT};

use super::read::Keep;
use sealed::Sealed;

/// An input that is not what the result was made from.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct ChangedInput {
    /// What the file is for.
    pub role: String,
    /// The path as written.
    pub path: String,
    /// SHA-256 as stored.
    pub stored_sha256: String,
    /// SHA-256 today; `null` where the file cannot be read.
    pub sha256: Option<String>,
}

/// What came out.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
#[serde(tag = "outcome", rename_all = "snake_case")]
pub enum Outcome {
    /// Every figure is as it was.
    Same {
        /// Figures, words and nulls held against each other.
        compared: u64,
    },
    /// Some are not.
    Different {
        /// Which.
        differences: Vec<Difference>,
    },
    /// Nothing was recomputed, because inputs are missing or changed.
    InputsChanged {
        /// Which.
        inputs: Vec<ChangedInput>,
    },
}

/// One result rechecked.
#[derive(Clone, Debug, Serialize)]
pub struct Rechecked {
    /// The result's file.
    pub result: String,
    /// The version that wrote it.
    pub version: String,
    /// The version that recomputed it.
    pub recomputed_by: String,
    /// What came out.
    #[serde(flatten)]
    pub outcome: Outcome,
}

/// Why a result cannot be rechecked.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum RecheckError {
    #[error("`{file}` is no result of coilassay: {why}")]
    #[diagnostic(
        code(coilassay::recheck::no_result),
        help("name a result.json, a folder that holds one, or an archive")
    )]
    NoResult { file: String, why: String },
    #[error("`{file}` is of format {found}, this version reads up to format {FORMAT}")]
    #[diagnostic(
        code(coilassay::recheck::newer),
        help("use the version of coilassay that wrote it, or a later one")
    )]
    Newer { file: String, found: u64 },
    #[error("`{file}` was made with {what}, which this version does not know")]
    #[diagnostic(
        code(coilassay::recheck::unknown),
        help("use the version of coilassay that wrote it, or a later one")
    )]
    Unknown { file: String, what: String },
    #[error("`{file}` does not state {what}")]
    #[diagnostic(
        code(coilassay::recheck::unstated),
        help("run the command anew; this version writes it into the result")
    )]
    Unstated { file: String, what: &'static str },
}

/// The runs of the archive at `dir`.
///
/// # Errors
/// A report where there is no archive.
pub fn stored_runs(dir: &Path) -> miette::Result<StoredRuns> {
    Ok(Archive::open(dir)?.stored_runs()?)
}

/// Recomputes the result in `file`. Paths on the command line that made it are meant from the folder `from`. The files it lists
/// are held against their hashes where they lie beside it.
///
/// # Errors
/// A report where the file is no result, or its inputs cannot be judged any more.
pub fn recheck(file: &Path, from: &Path) -> miette::Result<Rechecked> {
    let sealed = Sealed::read(file)?;
    let beside_it = sealed.altered_files(file);
    sealed.recheck(from, Keep::default(), |_| Ok(beside_it))
}

/// Rechecks a run of an archive: its files against their checksums, and, recomputed, its record and its tables.
///
/// # Errors
/// As [`recheck`], and where a table cannot be read.
pub fn recheck_run(run: &StoredRun, from: &Path) -> miette::Result<Rechecked> {
    let altered = run.altered()?;
    let sealed = Sealed::read(&run.record)?;
    if !altered.is_empty() {
        return Ok(sealed.rechecked(Outcome::Different {
            differences: altered,
        }));
    }
    let keep = Keep {
        for_charts: false,
        for_archive: true,
    };
    sealed.recheck(from, keep, |now| now.tables_differ(run, sealed.closeness()))
}

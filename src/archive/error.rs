//! What can be wrong with an archive.
#![expect(missing_docs, reason = "the messages say it")]

use std::path::{Path, PathBuf};

use crate::text::{Alphabet, printable};

/// Why an archive cannot be used.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub enum ArchiveError {
    #[error("`{dir}` is no archive: it holds `{foreign}` and no `archive.json`")]
    #[diagnostic(
        code(coilassay::archive::no_archive),
        help("name an archive, or for a new one a folder that is empty or not there yet")
    )]
    NoArchive { dir: String, foreign: String },
    #[error("there is no archive `{dir}`")]
    #[diagnostic(
        code(coilassay::archive::missing),
        help("check the path; `accept --archive {dir}` begins one")
    )]
    Missing { dir: String },
    #[error("`{file}` is of layout {found}, this version reads up to layout {known}")]
    #[diagnostic(
        code(coilassay::archive::newer),
        help("use the version of coilassay that wrote it, or a later one")
    )]
    Newer {
        file: String,
        found: i64,
        known: i64,
    },
    #[error("`{file}` cannot be read as part of an archive: {why}")]
    #[diagnostic(
        code(coilassay::archive::unreadable),
        help(
            "restore it from a copy, or move it out of the archive: until then nothing can say which run is the latest"
        )
    )]
    Unreadable { file: String, why: String },
    #[error("cannot read `{path}`")]
    #[diagnostic(code(coilassay::archive::read), help("check the path and its rights"))]
    Read {
        path: String,
        #[source]
        cause: std::io::Error,
    },
    #[error("cannot write `{path}`")]
    #[diagnostic(
        code(coilassay::archive::write),
        help(
            "check that the disk has room and the folder may be written; the archive is as it was"
        )
    )]
    Write {
        path: String,
        #[source]
        cause: std::io::Error,
    },
    #[error("cannot move a finished file into `{path}`: it lies on another disk than `staging`")]
    #[diagnostic(
        code(coilassay::archive::across_disks),
        help(
            "keep the whole archive on one disk, without links or mounts inside it; the archive is as it was"
        )
    )]
    AcrossDisks {
        path: String,
        #[source]
        cause: std::io::Error,
    },
    #[error(transparent)]
    #[diagnostic(transparent)]
    Text(#[from] crate::text::TextError),
    #[error("the run cannot be written as a table")]
    #[diagnostic(
        code(coilassay::archive::table),
        help("this is a defect; the archive is as it was")
    )]
    Frame {
        #[source]
        cause: polars::prelude::PolarsError,
    },
}

/// A file of an archive that was passed over, and why; the rest was read.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, thiserror::Error)]
#[error("`{file}`: {why}")]
pub struct Unreadable {
    /// The file, its path made printable.
    pub file: String,
    /// What is wrong with it.
    pub why: String,
}

impl From<ArchiveError> for Unreadable {
    fn from(fault: ArchiveError) -> Self {
        match fault {
            ArchiveError::Unreadable { file, why } => Self { file, why },
            ArchiveError::Newer { file, found, known } => Self {
                file,
                why: format!("is of layout {found}, this version reads up to layout {known}"),
            },
            ArchiveError::Read { path, cause } => Self {
                file: path,
                why: format!("cannot be read: {cause}"),
            },
            other => Self {
                file: String::new(),
                why: other.to_string(),
            },
        }
    }
}

/// A path as messages show it.
pub(super) fn shown(path: &Path) -> String {
    printable(&path.to_string_lossy(), &Alphabet::Any)
}

pub(super) fn reading(path: &Path) -> impl FnOnce(std::io::Error) -> ArchiveError + use<> {
    let path = shown(path);
    move |cause| ArchiveError::Read { path, cause }
}

pub(super) fn writing(path: &Path) -> impl Fn(std::io::Error) -> ArchiveError + use<> {
    let path: PathBuf = path.to_owned();
    move |cause| {
        let path = shown(&path);
        if cause.kind() == std::io::ErrorKind::CrossesDevices {
            ArchiveError::AcrossDisks { path, cause }
        } else {
            ArchiveError::Write { path, cause }
        }
    }
}

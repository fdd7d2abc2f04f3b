//! `draft`: a starter file on stdout, or as a file that is not there yet.

use std::fs::OpenOptions;
use std::io::Write;
use std::path::{Path, PathBuf};

use miette::IntoDiagnostic;

use crate::job::{self, Starter, starter};

use super::args::Draft;

/// Why a draft was not written.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[error("cannot write the draft to `{}`", path.display())]
#[diagnostic(
    code(coilassay::draft::write),
    help("name a file that is not there yet; a draft never replaces one")
)]
struct NotWritten {
    path: PathBuf,
    #[source]
    cause: std::io::Error,
}

pub(super) fn run(draft: &Draft, out: &mut impl Write) -> miette::Result<u8> {
    match draft {
        Draft::Rig { export } => put(&job::draft_rig(export)?, None, out)?,
        Draft::Drawing { file } => put(starter(Starter::Drawing), file.as_deref(), out)?,
        Draft::Lot { file } => put(starter(Starter::Lot), file.as_deref(), out)?,
    }
    Ok(0)
}

/// A draft on stdout, or as a new file.
fn put(text: &str, file: Option<&Path>, out: &mut impl Write) -> miette::Result<()> {
    let Some(path) = file else {
        return out.write_all(text.as_bytes()).into_diagnostic();
    };
    let new = OpenOptions::new().write(true).create_new(true).open(path);
    let written = new.and_then(|mut new| new.write_all(text.as_bytes()));
    written.map_err(|cause| {
        NotWritten {
            path: path.to_owned(),
            cause,
        }
        .into()
    })
}

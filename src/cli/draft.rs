//! `draft`: calls and prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::job;

use super::args::Draft;

pub(super) fn run(draft: &Draft, out: &mut impl Write) -> miette::Result<u8> {
    let Draft::Rig { export } = draft;
    write!(out, "{}", job::draft_rig(export)?).into_diagnostic()?;
    Ok(0)
}

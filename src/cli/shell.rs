//! Completions and manual pages, from clap.

use std::io::Write;
use std::path::Path;

use clap::CommandFactory;
use miette::{IntoDiagnostic, WrapErr};

use super::args::Arguments;

pub(super) fn completions(shell: clap_complete::Shell, out: &mut impl Write) -> u8 {
    clap_complete::generate(shell, &mut Arguments::command(), "coilassay", out);
    0
}

pub(super) fn manual(dir: &Path) -> miette::Result<u8> {
    let written = std::fs::create_dir_all(dir)
        .and_then(|()| clap_mangen::generate_to(Arguments::command(), dir));
    written
        .into_diagnostic()
        .wrap_err_with(|| format!("cannot write the manual into `{}`", dir.display()))?;
    Ok(0)
}

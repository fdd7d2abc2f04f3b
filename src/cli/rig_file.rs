//! A rig file changed on disk: only if it still is what was read, whole or not at all.

use std::fmt::Write as _;
use std::io::Write;
use std::path::{Path, PathBuf};

use sha2::{Digest, Sha256};

use crate::job::Proposal;
use crate::rig::Changed;
use crate::text::{Alphabet, hex, printable};

/// Why a rig file is not written.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub(super) enum RigFileError {
    #[error("`{}` is no longer what was read", path.display())]
    #[diagnostic(
        code(coilassay::rig_file::changed),
        help("somebody changed it meanwhile; run the command again")
    )]
    Changed { path: PathBuf },
    #[error("cannot write `{}`", path.display())]
    #[diagnostic(
        code(coilassay::rig_file::write),
        help("check that the folder may be written; the file is as it was")
    )]
    Write {
        path: PathBuf,
        #[source]
        cause: std::io::Error,
    },
}

/// The lines that change, as text.
pub(super) fn shown(proposal: &Proposal, written: bool) -> String {
    let edited = &proposal.edited;
    let name = &edited.source.name;
    if edited.lines.is_empty() {
        return format!("{name} holds these figures already\n");
    }
    let head = if written {
        format!("changed in {name}:\n")
    } else {
        format!("--write would change {name}:\n")
    };
    edited.lines.iter().fold(head, |mut text, line| {
        let (sign, line) = match line {
            Changed::Removed(line) => ('-', line),
            Changed::Added(line) => ('+', line),
        };
        let line = printable(&line.replace('\t', " "), &Alphabet::Any);
        let _ = writeln!(text, "  {sign} {line}"); // writing into a string cannot fail
        text
    })
}

/// Writes the rig file and gives the lines that changed, as text.
///
/// # Errors
/// [`RigFileError`]; then the file is as it was.
pub(super) fn write(proposal: &Proposal) -> Result<String, RigFileError> {
    let edited = &proposal.edited;
    let named = &edited.source.path;
    let failed = |cause| RigFileError::Write {
        path: named.clone(),
        cause,
    };
    let path = named.canonicalize().map_err(failed)?; // a link keeps pointing at the file
    let old = std::fs::read(&path).map_err(failed)?;
    if hex(&Sha256::digest(&old)) != edited.was {
        return Err(RigFileError::Changed {
            path: named.clone(),
        });
    }
    if !edited.lines.is_empty() {
        let mark: &[u8] = if old.starts_with(b"\xEF\xBB\xBF") {
            b"\xEF\xBB\xBF"
        } else {
            b""
        };
        replace(&path, &[mark, edited.source.text.as_bytes()]).map_err(failed)?;
    }
    Ok(shown(proposal, true))
}

fn replace(path: &Path, pieces: &[&[u8]]) -> std::io::Result<()> {
    let folder = path.parent().unwrap_or(Path::new("."));
    let mut made = tempfile::NamedTempFile::new_in(folder)?;
    for piece in pieces {
        made.write_all(piece)?;
    }
    made.as_file().sync_all()?;
    made.as_file()
        .set_permissions(std::fs::metadata(path)?.permissions())?;
    made.persist(path).map_err(|failed| failed.error)?;
    Ok(())
}

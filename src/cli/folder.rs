//! The output folder: made beside its place, flushed, and moved in whole; an older result is replaced, nothing else.

use std::collections::BTreeSet;
use std::fs::{self, File};
use std::io::{self, BufWriter, Write};
use std::path::{Path, PathBuf};

use serde::{Deserialize, Serialize};

use crate::record::{OutputFile, TOOL};
use crate::report::OutFile;

/// The file that makes a folder a result.
const RESULT: &str = "result.json";
/// Bytes handed to the system at once.
const BUFFER: usize = 1 << 20;

/// Why an output folder cannot be written.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub(super) enum FolderError {
    #[error("`{}` holds `{}`, which is not part of a result", dir.display(), foreign.display())]
    #[diagnostic(
        code(coilassay::out::foreign),
        help(
            "name another folder, or move that file away; only a folder that is empty or holds an older result is replaced"
        )
    )]
    Foreign { dir: PathBuf, foreign: PathBuf },
    #[error("`{}` is no folder", dir.display())]
    #[diagnostic(code(coilassay::out::no_folder), help("name a folder with --out"))]
    NoFolder { dir: PathBuf },
    #[error("cannot write `{}`", path.display())]
    #[diagnostic(
        code(coilassay::out::write),
        help(
            "check that the disk has room and the folder may be written; nothing was left half done"
        )
    )]
    Write {
        path: PathBuf,
        #[source]
        cause: io::Error,
    },
}

/// What is read of an older result: enough to know it as ours.
#[derive(Deserialize)]
struct Older {
    provenance: OlderProvenance,
    files: Vec<OutputFile>,
}

#[derive(Deserialize)]
struct OlderProvenance {
    tool: String,
}

/// A folder that may be written: not there yet, empty, or holding an older result and nothing else.
pub(super) struct Target {
    dir: PathBuf,
    known: BTreeSet<PathBuf>,
}

impl Target {
    /// Refuses a folder that could not be replaced, before any work is done.
    ///
    /// # Errors
    /// [`FolderError`] naming the first file that does not belong to a result.
    pub(super) fn of(dir: &Path) -> Result<Self, FolderError> {
        let known = older(&dir.join(RESULT)).unwrap_or_default();
        let target = Self {
            dir: dir.to_owned(),
            known,
        };
        target.check()?;
        Ok(target)
    }

    fn check(&self) -> Result<(), FolderError> {
        let dir = self.dir.clone();
        if !dir.exists() {
            return Ok(());
        }
        if !dir.is_dir() {
            return Err(FolderError::NoFolder { dir });
        }
        let held = files_below(&dir, &dir).map_err(failed(&dir))?;
        match held.into_iter().find(|file| !self.known.contains(file)) {
            Some(foreign) => Err(FolderError::Foreign { dir, foreign }),
            None => Ok(()),
        }
    }

    /// Writes `files` as the folder, and `result.json` after them.
    ///
    /// # Errors
    /// [`FolderError`]; then the folder is as it was.
    pub(super) fn write(
        &self,
        files: &[OutFile],
        result: &impl Serialize,
    ) -> Result<(), FolderError> {
        let dir = if self.dir.exists() {
            self.dir.canonicalize()
        } else {
            std::path::absolute(&self.dir)
        };
        let dir = dir.map_err(failed(&self.dir))?;
        let parent = dir.parent().unwrap_or(&dir);
        fs::create_dir_all(parent).map_err(failed(parent))?;
        let staging = tempfile::Builder::new()
            .prefix(".coilassay-")
            .tempdir_in(parent)
            .map_err(failed(parent))?;
        let made = staging.path().join("out");
        fs::create_dir(&made).map_err(failed(&made))?;
        for file in files {
            let text = |out: &mut dyn Write| out.write_all(&file.bytes);
            write_one(&made.join(&file.path), text).map_err(failed(&dir.join(&file.path)))?;
        }
        write_one(&made.join(RESULT), |out| json(result, out))
            .map_err(failed(&dir.join(RESULT)))?;
        flush(&made).map_err(failed(&dir))?;
        self.check()?; // once more: something may have been put there meanwhile
        Self::move_in(&made, &staging.path().join("older"), &dir)?;
        flush(parent).map_err(failed(parent))
    }

    fn move_in(made: &Path, aside: &Path, dir: &Path) -> Result<(), FolderError> {
        let had = dir.exists();
        if had {
            fs::rename(dir, aside).map_err(failed(dir))?;
        }
        if let Err(cause) = fs::rename(made, dir) {
            if had {
                fs::rename(aside, dir).map_err(failed(dir))?;
            }
            return Err(failed(dir)(cause));
        }
        Ok(())
    }
}

/// A result as one line of JSON.
///
/// # Errors
/// Where `out` cannot be written.
pub(super) fn json(result: &impl Serialize, mut out: &mut dyn Write) -> io::Result<()> {
    serde_json::to_writer(&mut out, result)?;
    out.write_all(b"\n")
}

fn failed(path: &Path) -> impl FnOnce(io::Error) -> FolderError + use<> {
    let path = path.to_owned();
    move |cause| FolderError::Write { path, cause }
}

/// The files an older result lists, itself included.
fn older(result: &Path) -> Option<BTreeSet<PathBuf>> {
    let older: Older = serde_json::from_slice(&fs::read(result).ok()?).ok()?;
    let ours = older.provenance.tool == TOOL;
    let listed = older
        .files
        .into_iter()
        .map(|file| PathBuf::from(file.path))
        .chain([PathBuf::from(RESULT)]);
    ours.then(|| listed.collect())
}

fn files_below(root: &Path, dir: &Path) -> io::Result<Vec<PathBuf>> {
    let mut found = Vec::new();
    for entry in fs::read_dir(dir)? {
        let entry = entry?;
        let inner = if entry.file_type()?.is_dir() {
            files_below(root, &entry.path())?
        } else {
            Vec::new()
        };
        if inner.is_empty() {
            found.push(
                entry
                    .path()
                    .strip_prefix(root)
                    .unwrap_or(&entry.path())
                    .to_owned(),
            );
        }
        found.extend(inner);
    }
    found.sort();
    Ok(found)
}

fn write_one(path: &Path, text: impl FnOnce(&mut dyn Write) -> io::Result<()>) -> io::Result<()> {
    if let Some(folder) = path.parent() {
        fs::create_dir_all(folder)?;
    }
    let mut written = BufWriter::with_capacity(BUFFER, File::create(path)?);
    text(&mut written)?;
    written
        .into_inner()
        .map_err(io::IntoInnerError::into_error)?
        .sync_all()
}

/// Makes the names in a folder as lasting as the files.
fn flush(folder: &Path) -> io::Result<()> {
    File::open(folder)?.sync_all()
}

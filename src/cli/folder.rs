//! The output folder: made beside its place, flushed, and moved in whole; an older result is replaced, nothing else.

use std::collections::BTreeSet;
use std::fs::{self, File};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

use serde::Deserialize;

use crate::record::{OutputFile, TOOL};
use crate::report::OutFile;

/// The file that makes a folder a result.
pub(super) const RESULT: &str = "result.json";

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

/// Refuses a folder that could not be replaced, before any work is done.
///
/// # Errors
/// [`FolderError`] naming the first file that does not belong to a result.
pub(super) fn check(dir: &Path) -> Result<(), FolderError> {
    if !dir.exists() {
        return Ok(());
    }
    if !dir.is_dir() {
        return Err(FolderError::NoFolder {
            dir: dir.to_owned(),
        });
    }
    let held = files_below(dir, dir).map_err(|cause| FolderError::Write {
        path: dir.to_owned(),
        cause,
    })?;
    let known: BTreeSet<PathBuf> = older(&dir.join(RESULT)).unwrap_or_default();
    match held.into_iter().find(|file| !known.contains(file)) {
        Some(foreign) => Err(FolderError::Foreign {
            dir: dir.to_owned(),
            foreign,
        }),
        None => Ok(()),
    }
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

/// Writes `files` as the folder `dir`, `result.json` being the last of them.
///
/// # Errors
/// [`FolderError`]; then the folder is as it was.
pub(super) fn write(dir: &Path, files: &[OutFile]) -> Result<(), FolderError> {
    let failed = |path: &Path| {
        let path = path.to_owned();
        move |cause| FolderError::Write { path, cause }
    };
    let dir = if dir.exists() {
        dir.canonicalize().map_err(failed(dir))?
    } else {
        std::path::absolute(dir).map_err(failed(dir))?
    };
    let parent = dir.parent().unwrap_or(&dir);
    fs::create_dir_all(parent).map_err(failed(parent))?;
    let staging = tempfile::Builder::new()
        .prefix(".coilassay-")
        .tempdir_in(parent)
        .map_err(failed(parent))?;
    let made = staging.path().join("out");
    fs::create_dir(&made).map_err(failed(&made))?;
    for file in files {
        write_one(&made, file).map_err(failed(&dir.join(&file.path)))?;
    }
    flush(&made).map_err(failed(&dir))?;
    check(&dir)?; // once more: something may have been put there meanwhile
    let aside = staging.path().join("older");
    let had = dir.exists();
    if had {
        fs::rename(&dir, &aside).map_err(failed(&dir))?;
    }
    if let Err(cause) = fs::rename(&made, &dir) {
        if had {
            fs::rename(&aside, &dir).map_err(failed(&dir))?;
        }
        return Err(FolderError::Write { path: dir, cause });
    }
    flush(parent).map_err(failed(parent))
}

fn write_one(root: &Path, file: &OutFile) -> io::Result<()> {
    let path = root.join(&file.path);
    if let Some(folder) = path.parent() {
        fs::create_dir_all(folder)?;
    }
    let mut written = File::create(&path)?;
    written.write_all(&file.bytes)?;
    written.sync_all()
}

/// Makes the names in a folder as lasting as the files.
fn flush(folder: &Path) -> io::Result<()> {
    File::open(folder)?.sync_all()
}

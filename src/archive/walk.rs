//! The files of one tree of an archive.

use std::fs;
use std::path::{Path, PathBuf};

use super::error::{ArchiveError, Unreadable, reading, shown};

/// The files of a tree that are named as they should be, sorted by path, and what is not.
#[derive(Debug, Default)]
pub(super) struct Files {
    pub(super) runs: Vec<PathBuf>,
    pub(super) foreign: Vec<Unreadable>,
}

/// The runs below `tree`, whose files end in `end`; below `drawing_key=…/lot_key=…` and nowhere else.
///
/// # Errors
/// [`ArchiveError::Read`] where a folder cannot be listed. A tree that is not there is empty.
pub(super) fn runs(tree: &Path, end: &str) -> Result<Files, ArchiveError> {
    let mut files = Files::default();
    if !tree.exists() {
        return Ok(files);
    }
    for drawing in sorted(tree)? {
        if !is_folder(&drawing, "drawing_key=") {
            files.foreign.push(foreign(&drawing));
            continue;
        }
        for lot in sorted(&drawing)? {
            if is_folder(&lot, "lot_key=") {
                files.add(&lot, end)?;
            } else {
                files.foreign.push(foreign(&lot));
            }
        }
    }
    Ok(files)
}

impl Files {
    fn add(&mut self, lot: &Path, end: &str) -> Result<(), ArchiveError> {
        for path in sorted(lot)? {
            let ours = path.extension().is_some_and(|found| found == end) && path.is_file();
            if ours {
                self.runs.push(path);
            } else {
                self.foreign.push(foreign(&path));
            }
        }
        Ok(())
    }
}

/// The runs of one lot's folder; one that is not there holds none.
///
/// # Errors
/// [`ArchiveError::Read`] where it cannot be listed.
pub(super) fn runs_of_lot(folder: &Path, end: &str) -> Result<Files, ArchiveError> {
    let mut files = Files::default();
    if folder.exists() {
        files.add(folder, end)?;
    }
    Ok(files)
}

fn sorted(folder: &Path) -> Result<Vec<PathBuf>, ArchiveError> {
    let mut found = Vec::new();
    for entry in fs::read_dir(folder).map_err(reading(folder))? {
        found.push(entry.map_err(reading(folder))?.path());
    }
    found.sort();
    Ok(found)
}

fn is_folder(path: &Path, begins: &str) -> bool {
    let named = path
        .file_name()
        .is_some_and(|name| name.to_string_lossy().starts_with(begins));
    named && path.is_dir()
}

fn foreign(path: &Path) -> Unreadable {
    Unreadable {
        file: shown(path),
        why: "it is no part of an archive and was passed over".to_owned(),
    }
}

//! The files of one tree of an archive.

use std::fs;
use std::io::ErrorKind;
use std::path::{Path, PathBuf};

use rayon::prelude::*;

use super::error::{ArchiveError, Unreadable, reading, shown};
use super::key::key;

/// The files of a tree that are named as they should be, sorted by path, and what is not.
#[derive(Debug, Default)]
pub(super) struct Files {
    pub(super) runs: Vec<PathBuf>,
    pub(super) foreign: Vec<Unreadable>,
}

/// The runs below `tree`, whose files end in `end`; below `drawing_key=…/lot_key=…` and nowhere else. With `drawing`, only
/// those in its folder.
///
/// # Errors
/// [`ArchiveError::Read`] where a folder cannot be listed. A tree that is not there is empty.
pub(super) fn runs(tree: &Path, end: &str, drawing: Option<&str>) -> Result<Files, ArchiveError> {
    let mut files = Files::default();
    let drawings = match drawing {
        Some(number) => vec![tree.join(format!("drawing_key={}", key(number)))],
        None => files.folders(tree, "drawing_key=")?,
    };
    for drawing in drawings {
        let lots = files.folders(&drawing, "lot_key=")?;
        let read: Result<Vec<Files>, _> = lots.par_iter().map(|lot| runs_in(lot, end)).collect();
        for lot in read? {
            files.runs.extend(lot.runs);
            files.foreign.extend(lot.foreign);
        }
    }
    Ok(files)
}

/// The checks below `tree`, whose files end in `end`; below `rig_key=…` and nowhere else.
///
/// # Errors
/// [`ArchiveError::Read`] where a folder cannot be listed. A tree that is not there is empty.
pub(super) fn checks(tree: &Path, end: &str) -> Result<Files, ArchiveError> {
    let mut files = Files::default();
    for rig in files.folders(tree, "rig_key=")? {
        let found = runs_in(&rig, end)?;
        files.runs.extend(found.runs);
        files.foreign.extend(found.foreign);
    }
    Ok(files)
}

impl Files {
    /// The folders in `folder` whose names begin so; everything else there is foreign.
    fn folders(&mut self, folder: &Path, begins: &str) -> Result<Vec<PathBuf>, ArchiveError> {
        let mut folders = Vec::new();
        for (path, is_folder) in sorted(folder)? {
            let named = path
                .file_name()
                .is_some_and(|name| name.to_string_lossy().starts_with(begins));
            if named && is_folder {
                folders.push(path);
            } else {
                self.foreign.push(foreign(&path));
            }
        }
        Ok(folders)
    }
}

/// The runs of the folder of one lot or rig; one that is not there holds none.
///
/// # Errors
/// [`ArchiveError::Read`] where it cannot be listed.
pub(super) fn runs_in(folder: &Path, end: &str) -> Result<Files, ArchiveError> {
    let mut files = Files::default();
    for (path, is_folder) in sorted(folder)? {
        if !is_folder && path.extension().is_some_and(|found| found == end) {
            files.runs.push(path);
        } else {
            files.foreign.push(foreign(&path));
        }
    }
    Ok(files)
}

/// What a folder holds, by name, and whether it is a folder itself; nothing where it is not there.
fn sorted(folder: &Path) -> Result<Vec<(PathBuf, bool)>, ArchiveError> {
    let entries = match fs::read_dir(folder) {
        Ok(entries) => entries,
        Err(cause) if cause.kind() == ErrorKind::NotFound => return Ok(Vec::new()),
        Err(cause) => return Err(reading(folder)(cause)),
    };
    let mut found = Vec::new();
    for entry in entries {
        let entry = entry.map_err(reading(folder))?;
        let kind = entry.file_type().map_err(reading(folder))?;
        let path = entry.path();
        let is_folder = kind.is_dir() || (kind.is_symlink() && path.is_dir());
        found.push((path, is_folder));
    }
    found.sort();
    Ok(found)
}

fn foreign(path: &Path) -> Unreadable {
    Unreadable {
        file: shown(path),
        why: "it is no part of an archive and was passed over".to_owned(),
    }
}

//! The checksums of a run's files, in the form of `sha256sum`, with paths from the archive's folder.
//! A springs file is held against them whenever it is read: polars takes a flipped byte for another figure, or panics on it.

use std::io::ErrorKind;
use std::path::{Path, PathBuf};

use sha2::{Digest, Sha256};

use super::error::{ArchiveError, reading, shown};
use crate::record::Difference;
use crate::text::{hex, sha256_of};

/// How the file of a run's checksums ends; it lies beside the record.
pub(super) const END: &str = "sha256";

/// The checksums of one run.
pub(super) struct Sums {
    archive: PathBuf,
    /// Checksum and path below the archive's folder.
    files: Vec<(String, String)>,
}

/// The line for the file that lies at `path` now and will be `below` the archive's folder.
pub(super) fn line(path: &Path, below: &Path) -> Result<String, ArchiveError> {
    let sum = sha256_of(path, &shown(path))?;
    Ok(format!("{sum}  {}\n", slashed(below)))
}

/// A path with slashes on every system.
fn slashed(path: &Path) -> String {
    let parts: Vec<_> = path.iter().map(|part| part.to_string_lossy()).collect();
    parts.join("/")
}

impl Sums {
    /// The checksums of the run one of whose files lies at `file`, in a tree below the folder `archive`.
    ///
    /// # Errors
    /// [`ArchiveError`] where there are none, or no such lines.
    pub(super) fn of(archive: &Path, file: &Path) -> Result<Self, ArchiveError> {
        let below = file.strip_prefix(archive).unwrap_or(file);
        let below: PathBuf = below.iter().skip(1).collect(); // without the name of its tree
        let path = archive.join("records").join(below).with_extension(END);
        let text = std::fs::read_to_string(&path).map_err(|cause| match cause.kind() {
            ErrorKind::NotFound => ArchiveError::Unreadable {
                file: shown(file),
                why: "there are no checksums of it among the records".to_owned(),
            },
            _ => reading(&path)(cause),
        })?;
        let line = |line: &str| {
            let (sum, file) = line.split_once("  ")?;
            Some((sum.to_owned(), file.to_owned()))
        };
        let files: Option<Vec<_>> = text.lines().map(line).collect();
        let files = files.ok_or_else(|| ArchiveError::Unreadable {
            file: shown(&path),
            why: "it holds no checksums".to_owned(),
        })?;
        Ok(Self {
            archive: archive.to_owned(),
            files,
        })
    }

    /// The bytes of `path`, where they are those that were written.
    ///
    /// # Errors
    /// [`ArchiveError`] where they are not, or the file is not listed.
    pub(super) fn read(&self, path: &Path) -> Result<Vec<u8>, ArchiveError> {
        let bytes = std::fs::read(path).map_err(reading(path))?;
        let below = slashed(path.strip_prefix(&self.archive).unwrap_or(path));
        let listed = self.files.iter().find(|(_, file)| *file == below);
        let why = match listed {
            Some((sum, _)) if *sum == hex(&Sha256::digest(&bytes)) => return Ok(bytes),
            Some((sum, _)) => format!("its SHA-256 is not the {sum} it was written with"),
            None => "its run's checksums do not list it".to_owned(),
        };
        Err(ArchiveError::Unreadable {
            file: shown(path),
            why,
        })
    }

    /// The listed files that are not, byte for byte, what was written.
    pub(super) fn altered(&self) -> Vec<Difference> {
        let altered = |(sum, file): &(String, String)| {
            let now = sha256_of(&self.archive.join(file), file);
            let now = now.unwrap_or_else(|_| "cannot be read".to_owned());
            (now != *sum).then(|| Difference {
                place: format!("file {file} / SHA-256"),
                stored: sum.clone(),
                recomputed: now,
            })
        };
        self.files.iter().filter_map(altered).collect()
    }
}

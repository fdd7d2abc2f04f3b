//! An archive's folder: opened, begun, and cleared of what unfinished runs left.

use std::fs;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::time::{Duration, SystemTime};

use serde::{Deserialize, Serialize};

use super::error::{ArchiveError, reading, shown, writing};
use crate::record::TOOL;

/// The layout this version writes, and the newest it reads.
pub const LAYOUT: i64 = 1;
/// The file that makes a folder an archive.
const MARK: &str = "archive.json";
/// Where runs are written before they are moved in.
const STAGING: &str = "staging";
/// An unfinished run of this age is nobody's any more.
const STALE: Duration = Duration::from_hours(24);

#[derive(Serialize, Deserialize)]
struct Mark {
    tool: String,
    layout: i64,
}

/// A folder known to be an archive.
#[derive(Clone, Debug)]
pub struct Archive {
    root: PathBuf,
}

impl Archive {
    /// Opens the archive at `root`.
    ///
    /// # Errors
    /// [`ArchiveError`] where there is none, or one of a newer layout.
    pub fn open(root: &Path) -> Result<Self, ArchiveError> {
        let mark = root.join(MARK);
        let text = match fs::read(&mark) {
            Ok(text) => text,
            Err(_) if !root.exists() => {
                return Err(ArchiveError::Missing { dir: shown(root) });
            }
            Err(cause) if cause.kind() == std::io::ErrorKind::NotFound => {
                return Err(match foreign(root)? {
                    Some(foreign) => ArchiveError::NoArchive {
                        dir: shown(root),
                        foreign,
                    },
                    None => ArchiveError::Missing { dir: shown(root) },
                });
            }
            Err(cause) => return Err(reading(&mark)(cause)),
        };
        match serde_json::from_slice::<Mark>(&text) {
            Ok(known) if known.tool != TOOL => Err(unreadable(&mark, "another tool wrote it")),
            Ok(known) if known.layout > LAYOUT => Err(ArchiveError::Newer {
                file: shown(&mark),
                found: known.layout,
                known: LAYOUT,
            }),
            Ok(_) => Ok(Self {
                root: root.to_owned(),
            }),
            Err(fault) => Err(unreadable(&mark, &fault.to_string())),
        }
    }

    /// Opens the archive at `root` for writing; begins it where the folder is empty or not there. Staging folders older than
    /// a day are removed.
    ///
    /// # Errors
    /// [`ArchiveError`] where the folder holds something else, is of a newer layout, or cannot be written.
    pub fn open_or_begin(root: &Path) -> Result<Self, ArchiveError> {
        let archive = match Self::open(root) {
            Err(ArchiveError::Missing { .. }) => Self::begin(root)?,
            opened => opened?,
        };
        archive.clear_stale()?;
        Ok(archive)
    }

    /// Two processes may begin one archive: both move the same words to the same place.
    fn begin(root: &Path) -> Result<Self, ArchiveError> {
        let archive = Self {
            root: root.to_owned(),
        };
        let staging = archive.staging();
        fs::create_dir_all(&staging).map_err(writing(&staging))?;
        let mark = root.join(MARK);
        let made = staging.join(format!("{MARK}-{}", std::process::id()));
        let words = Mark {
            tool: TOOL.to_owned(),
            layout: LAYOUT,
        };
        super::write::whole(&made, |out| {
            serde_json::to_writer(&mut *out, &words)?;
            out.write_all(b"\n")
        })
        .and_then(|()| fs::rename(&made, &mark))
        .map_err(writing(&mark))?;
        super::write::flush(root).map_err(writing(root))?;
        Ok(archive)
    }

    fn clear_stale(&self) -> Result<(), ArchiveError> {
        let staging = self.staging();
        let entries = match fs::read_dir(&staging) {
            Ok(entries) => entries,
            Err(cause) if cause.kind() == std::io::ErrorKind::NotFound => return Ok(()),
            Err(cause) => return Err(reading(&staging)(cause)),
        };
        let now = SystemTime::now();
        for entry in entries.filter_map(Result::ok) {
            let age = entry
                .metadata()
                .and_then(|about| about.modified())
                .ok()
                .and_then(|changed| now.duration_since(changed).ok());
            if age.is_some_and(|age| age > STALE) {
                let path = entry.path();
                self.take_out(Path::new(&entry.file_name()));
                // Another process may remove it at the same time; what cannot be removed harms nobody.
                let _ = fs::remove_dir_all(&path).or_else(|_| fs::remove_file(&path));
            }
        }
        Ok(())
    }

    /// The archive's folder.
    pub fn root(&self) -> &Path {
        &self.root
    }

    pub(super) fn staging(&self) -> PathBuf {
        self.root.join(STAGING)
    }
}

/// The first thing in a folder that a begun archive does not hold; `None` where nothing stands against beginning one.
fn foreign(root: &Path) -> Result<Option<String>, ArchiveError> {
    let mut names = Vec::new();
    for entry in fs::read_dir(root).map_err(reading(root))? {
        names.push(entry.map_err(reading(root))?.file_name());
    }
    names.sort();
    let first = names.into_iter().find(|name| name != STAGING);
    Ok(first.map(|name| shown(Path::new(&name))))
}

fn unreadable(path: &Path, why: &str) -> ArchiveError {
    ArchiveError::Unreadable {
        file: shown(path),
        why: why.to_owned(),
    }
}

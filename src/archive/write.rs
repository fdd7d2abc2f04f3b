//! A run written whole or not at all: staged, flushed, moved in; record with its checksums, then curves, then springs.

use std::fs::{self, File};
use std::io::{self, BufWriter, Write};
use std::path::{Path, PathBuf};

use polars::prelude::DataFrame;
use serde::Serialize;
use sha2::{Digest, Sha256};

use super::error::{ArchiveError, writing};
use super::place::Archive;
use super::springs::Run;
use super::{checks, curves, frame, key, read, springs, sums};
use crate::curve::Kept;
use crate::record::{AcceptRecord, CheckRecord, Provenance};
use crate::text::hex;

impl Archive {
    /// Keeps a judged lot as a new run; `kept` are its curves, `judged_at` the time of judging, UTC.
    ///
    /// # Errors
    /// [`ArchiveError`]; then the archive is as it was.
    pub fn keep(
        &self,
        record: &AcceptRecord,
        kept: &[Vec<Kept>],
        judged_at: jiff::Timestamp,
    ) -> Result<Run, ArchiveError> {
        let folder = lot_folder(&record.drawing.number, &record.lot.number);
        let latest = read::latest_of(self, &folder, record)?;
        let run = Run {
            id: id(&record.provenance, judged_at),
            number: latest.as_ref().map_or(0, |run| run.number) + 1,
            judged_at: stamp(judged_at),
            supersedes: latest.map(|run| run.id),
        };
        let table = |cause| ArchiveError::Frame { cause };
        let mut curves = curves::frame(record, kept, &run).map_err(table)?;
        let mut springs = springs::frame(record, &run).map_err(table)?;
        self.move_in(&folder, &run.id, |staged| {
            staged.json("records", record)?;
            staged.parquet("curves", &mut curves)?;
            staged.parquet("springs", &mut springs)?;
            staged.sums()
        })?;
        Ok(run)
    }

    /// Keeps a check of a rig.
    ///
    /// # Errors
    /// [`ArchiveError`]; then the archive is as it was.
    pub fn keep_check(
        &self,
        record: &CheckRecord,
        judged_at: jiff::Timestamp,
    ) -> Result<Run, ArchiveError> {
        let run = Run {
            id: id(&record.provenance, judged_at),
            number: 1,
            judged_at: stamp(judged_at),
            supersedes: None,
        };
        let folder = PathBuf::from(format!("rig_key={}", key::key(&record.rig)));
        let mut table =
            checks::frame(record, &run).map_err(|cause| ArchiveError::Frame { cause })?;
        self.move_in(&folder, &run.id, |staged| {
            staged.json("records", record)?;
            staged.parquet("checks", &mut table)?;
            staged.sums()
        })?;
        Ok(run)
    }

    /// Writes the files of a run into its staging folder by `write`, then moves them in, in the order they were written.
    fn move_in(
        &self,
        folder: &Path,
        run: &str,
        write: impl FnOnce(&mut Staged) -> Result<(), ArchiveError>,
    ) -> Result<(), ArchiveError> {
        let staging = self.staging().join(run);
        fs::create_dir_all(self.staging()).map_err(writing(&self.staging()))?;
        fs::create_dir(&staging).map_err(writing(&staging))?; // fails where another process has this run
        let mut staged = Staged {
            archive: self.root().to_owned(),
            folder: folder.to_owned(),
            staging,
            run: run.to_owned(),
            files: Vec::new(),
        };
        let moved = write(&mut staged).and_then(|()| staged.move_all());
        let _ = fs::remove_dir_all(&staged.staging); // empty now, or a run that failed; stale folders go after a day
        moved
    }
}

/// A run's files on their way.
struct Staged {
    archive: PathBuf,
    folder: PathBuf,
    staging: PathBuf,
    run: String,
    /// Where each file is, and where it goes.
    files: Vec<(PathBuf, PathBuf)>,
}

impl Staged {
    fn json(&mut self, tree: &str, value: &impl Serialize) -> Result<(), ArchiveError> {
        self.file(tree, "json", |out| {
            serde_json::to_writer(&mut *out, value)?;
            out.write_all(b"\n")
        })
    }

    fn parquet(&mut self, tree: &str, frame: &mut DataFrame) -> Result<(), ArchiveError> {
        self.file(tree, "parquet", |out| frame::write(frame, out))
    }

    fn file(
        &mut self,
        tree: &str,
        end: &str,
        fill: impl FnOnce(&mut BufWriter<File>) -> io::Result<()>,
    ) -> Result<(), ArchiveError> {
        let staged = self.staging.join(format!("{tree}.{end}"));
        let name = format!("{}.{end}", self.run);
        let target = self.archive.join(tree).join(&self.folder).join(name);
        whole(&staged, fill).map_err(writing(&target))?;
        self.files.push((staged, target));
        Ok(())
    }

    /// The SHA-256 of every file so far, as `sha256sum -c` reads it in the archive's folder; it is moved in after the record.
    fn sums(&mut self) -> Result<(), ArchiveError> {
        let line = |(staged, target): &(PathBuf, PathBuf)| {
            let below = target.strip_prefix(&self.archive).unwrap_or(target);
            sums::line(staged, below)
        };
        let lines: Result<String, ArchiveError> = self.files.iter().map(line).collect();
        let lines = lines?;
        self.file("records", sums::END, |out| out.write_all(lines.as_bytes()))?;
        if let Some(sums) = self.files.pop() {
            self.files.insert(1, sums);
        }
        Ok(())
    }

    /// Moves every file in; where one cannot be moved, those before it are taken out again.
    fn move_all(&self) -> Result<(), ArchiveError> {
        let mut done: Vec<&Path> = Vec::new();
        for (staged, target) in &self.files {
            if let Err(cause) = self.move_one(staged, target) {
                // The last one first: without its springs file a run is none.
                for path in std::iter::once(target.as_path()).chain(done.into_iter().rev()) {
                    let _ = fs::remove_file(path);
                }
                return Err(writing(target)(cause));
            }
            done.push(target);
        }
        Ok(())
    }

    fn move_one(&self, staged: &Path, target: &Path) -> io::Result<()> {
        if let Some(folder) = target.parent() {
            fs::create_dir_all(folder)?;
            fs::rename(staged, target)?;
            // The names of every folder on the way are made as lasting as the file.
            let inside = folder.ancestors().take_while(|one| *one != self.archive);
            inside.chain([self.archive.as_path()]).try_for_each(flush)?;
        }
        Ok(())
    }
}

/// Where the runs of a lot lie, below each tree.
pub(super) fn lot_folder(drawing: &str, lot: &str) -> PathBuf {
    let folder = |name: &str, value: &str| format!("{name}={}", key::key(value));
    Path::new(&folder("drawing_key", drawing)).join(folder("lot_key", lot))
}

/// A time as text that sorts.
fn stamp(at: jiff::Timestamp) -> String {
    at.strftime("%Y-%m-%dT%H:%M:%S.%6fZ").to_string()
}

/// A name that sorts by time and that no other run has: when, and a digest of what and by whom.
fn id(provenance: &Provenance, judged_at: jiff::Timestamp) -> String {
    let mut hasher = Sha256::new();
    hasher.update(std::process::id().to_be_bytes());
    hasher.update(judged_at.as_nanosecond().to_be_bytes());
    for input in &provenance.inputs {
        hasher.update(input.sha256.as_bytes());
    }
    let digest = hex(&hasher.finalize());
    format!(
        "{}-{}",
        judged_at.strftime("%Y%m%dT%H%M%S.%6fZ"),
        digest.get(..8).unwrap_or(&digest)
    )
}

/// Writes a file and makes it lasting.
pub(super) fn whole(
    path: &Path,
    fill: impl FnOnce(&mut BufWriter<File>) -> io::Result<()>,
) -> io::Result<()> {
    let mut out = BufWriter::new(File::create(path)?);
    fill(&mut out)?;
    out.into_inner()
        .map_err(io::IntoInnerError::into_error)?
        .sync_all()
}

/// Makes the names in a folder as lasting as the files.
pub(super) fn flush(folder: &Path) -> io::Result<()> {
    File::open(folder)?.sync_all()
}

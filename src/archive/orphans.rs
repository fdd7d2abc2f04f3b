//! Records whose table is gone: a run that was there and is no more, unless it is one that was never finished.

use std::fs;
use std::path::{Path, PathBuf};

use super::error::{ArchiveError, shown};
use super::place::Archive;

impl Archive {
    /// The runs among `records` (paths below the tree of records) whose file in `tree` is gone.
    ///
    /// A run that was killed on its way leaves its staging folder; without it, somebody took the file away, and a lot
    /// that was rejected must not vanish from a history in silence.
    pub(super) fn gone(&self, records: &[PathBuf], tree: &str) -> Vec<ArchiveError> {
        let root = self.root().join("records");
        let table = |record: &PathBuf| {
            let below = record.strip_prefix(&root).unwrap_or(record);
            self.root().join(tree).join(below).with_extension("parquet")
        };
        let unfinished = |table: &Path| {
            let run = table.file_stem().unwrap_or_default();
            // First the staging folder, then the file: another process moves the file in before it clears its folder.
            self.staging().join(run).exists() || table.exists()
        };
        let tables = records.iter().map(table);
        tables
            .filter(|table| !table.exists() && !unfinished(table))
            .map(|table| ArchiveError::Unreadable {
                file: shown(&table),
                why: "its record is there and this file is not".to_owned(),
            })
            .collect()
    }

    /// Takes out what the run of a stale staging folder had moved in before it was killed.
    pub(super) fn take_out(&self, run: &Path) {
        let root = glob::Pattern::escape(&self.root().to_string_lossy());
        let name = glob::Pattern::escape(&run.to_string_lossy());
        let whole = ["springs", "checks"].iter().any(|tree| {
            let pattern = format!("{root}/{tree}/**/{name}.parquet");
            glob::glob(&pattern).is_ok_and(|mut found| found.next().is_some())
        });
        if whole {
            return; // it was finished, and only its staging folder was left
        }
        for tree in ["records", "curves"] {
            let pattern = format!("{root}/{tree}/**/{name}.*");
            for path in glob::glob(&pattern).into_iter().flatten().flatten() {
                let _ = fs::remove_file(path); // without its table it is no part of a run
            }
        }
    }
}

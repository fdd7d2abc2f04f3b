//! How much of the files to be read is read, for whoever shows it. The one thing here that outlives a call.

use std::path::Path;
use std::sync::atomic::{AtomicU64, Ordering};

static ANNOUNCED: AtomicU64 = AtomicU64::new(0);
static READ: AtomicU64 = AtomicU64::new(0);

/// Says that these files are going to be read by blocks.
pub fn announce<'p>(paths: impl Iterator<Item = &'p Path>) {
    let size = |path: &Path| std::fs::metadata(path).map_or(0, |data| data.len());
    ANNOUNCED.fetch_add(paths.map(size).sum(), Ordering::Relaxed);
}

/// Bytes announced, and bytes read so far.
pub fn progress() -> (u64, u64) {
    (
        ANNOUNCED.load(Ordering::Relaxed),
        READ.load(Ordering::Relaxed),
    )
}

pub(super) fn note(bytes: usize) {
    READ.fetch_add(bytes as u64, Ordering::Relaxed);
}

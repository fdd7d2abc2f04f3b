//! What was judged, kept for years in files that any engine reads: one run is a record, its curves and its springs.
//! Here: the layout, writing a run whole or not at all, reading runs and lots back, per-lot figures as a table.
//! Elsewhere: what a record says (`record`), who asks for it (`job`), how it is printed (`cli`).
//!
//! Layout 1, in the archive's folder:
//!
//! ```text
//! archive.json                                             {"tool":"coilassay","layout":1}
//! springs/drawing_key=…/lot_key=…/<run>.parquet            one row per spring and characteristic
//! curves/drawing_key=…/lot_key=…/<run>.parquet             one row per point
//! records/drawing_key=…/lot_key=…/<run>.json               the result, as `result.json` holds it
//! records/drawing_key=…/lot_key=…/<run>.sha256             checksums of the run's files, as `sha256sum -c` reads them
//! checks/rig_key=…/<run>.parquet                           one row per quantity of a check on a reference spring
//! records/rig_key=…/<run>.json, .sha256                    the check as its `result.json` holds it; checksums
//! staging/<run>/                                           a run being written
//! ```
//!
//! A run exists when its springs file does. The same drawing, lot and supplier judged again is a new run; readers take the
//! run of the highest `run_number`.

mod check;
mod checks;
mod curves;
mod error;
mod figures;
mod frame;
mod key;
mod orphans;
mod past;
mod place;
mod read;
mod results;
mod springs;
mod sums;
mod table;
mod walk;
mod write;

pub use check::{StoredRun, StoredRuns};
pub use checks::KeptCheck;
pub use error::{ArchiveError, Unreadable};
pub use figures::{Figure, LotFigures};
pub use key::key;
pub use place::{Archive, LAYOUT};
pub use read::{Found, LotHead, LotRun, Series, SpringValue, latest};
pub use results::{Referenced, Results, read_results};
pub use springs::Run;
pub use table::{TableError, read_table, write_table};

//! The rig: the tester, what is known of it, and the exports it writes.
//! Here: the rig file, an export's dialect, its columns and cells, its row ledger (polars reads the tables).
//! Elsewhere: reading bytes from disk (`text`), which exports a lot names (`intake`), corrected points (`curve`).

mod dialect;
mod export;
mod open;
mod read_dialect;
mod sketch;

pub use dialect::{
    Decimal, Delimiter, Dialect, Encoding, LoadColumn, Pushing, SpringFrom, TravelColumn,
};
pub use export::{
    Aside, BLOCK_BYTES, ExportError, Ledger, RawCurve, Read, SmallTable, Spot, WhyAside, read,
    read_small,
};
pub use open::{Accuracy, Compliance, KEYS, Known, Means, Rig, Scale, open, standard_of};
pub use sketch::{Columns, Look, look, sketch};

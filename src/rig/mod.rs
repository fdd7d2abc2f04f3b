//! The rig: the tester, what is known of its scales, frame and repeatability, and how it writes its exports.
//! Elsewhere: the exports themselves (`export`), corrected points (`curve`).

mod dialect;
mod open;
mod read_dialect;
mod read_rarer;
mod scale;

pub use dialect::{
    Decimal, Delimiter, Dialect, Each, Encoding, LoadColumn, Pushing, Rarer, SpringFrom, TableEnd,
    Tables, TravelColumn,
};
pub use open::{Compliance, KEYS, Means, Rig, open, parse};
pub use scale::{Accuracy, Known, Scale, standard_of};

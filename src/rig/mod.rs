//! The rig: the tester, what is known of its scales, frame and repeatability, and how it writes its exports.
//! Elsewhere: the exports themselves (`export`), corrected points (`curve`).

mod dialect;
mod edit;
mod every;
mod frame;
mod open;
mod read_dialect;
mod read_points;
mod read_rarer;
mod scale;

pub use dialect::{
    Decimal, Delimiter, Dialect, Each, Encoding, LengthColumn, LoadColumn, PointTable, Pushing,
    Rarer, SpringFrom, TableEnd, Tables, TravelColumn,
};
pub use edit::{Change, Changed, Edited, RigEditError, edit};
pub use every::Every;
pub use frame::{Compliance, Give};
pub use open::{KEYS, Means, Rig, from_source, open};
pub use scale::{Accuracy, Known, Scale, read_calibrated, standard_of};

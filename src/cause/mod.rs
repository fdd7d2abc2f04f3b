//! What could have changed a returned spring: causes as physical models, and how much the findings support each.
//! Pure computing in mm, N, turns and natural logarithms of ratios; no files, no words.
//! Elsewhere: the findings themselves (`characteristic`, `intake`), theory of the drawn spring (`formula`).

mod bars;
mod error;
mod findings;
mod integrate;
mod matrix;
mod measure;
mod models;
mod next;
mod sights;
mod weigh;

pub use bars::{Bar, bars};
pub use error::CauseError;
pub use findings::{Compared, Findings, Shared};
pub use measure::{Change, Form, Measure};
pub use models::{Cause, Group, Severity, SeverityUnit, Suspect, change, suspects};
pub use next::{Check, NextCheck, next_checks};
pub use sights::{SEEN_IF_NOT_THERE, SEEN_IF_THERE, Sight};
pub use weigh::{NO_PREFERENCE, Support, Weighing, weigh};

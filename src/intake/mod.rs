//! The lot file as opened: which exports it names, who measured what, and what was found without the bench.
//! Elsewhere: what an export says (`rig`), what follows from it (`curve` and below).

mod exports;
mod findings;
mod open;
mod parts;

pub use exports::{Export, natural_order, resolve};
pub use findings::{Caliper, FindingsError, read_findings};
pub use open::{KEYS, Lot, open};
pub use parts::{Conditions, Finding, NotInspected, Repeat};

//! The files of a job as opened, the lot's first: which exports it names, who measured what, and what was found without the bench.
//! Elsewhere: what an export says (`rig`), what follows from it (`curve` and below).

mod check;
mod exports;
mod findings;
mod open;
mod parts;
mod reference;
mod study;

pub use check::{CHECK_KEYS, CheckFile, Judged, ReferenceCheck, Tolerance, open_check};
pub use exports::{Export, natural_order, resolve};
pub use findings::{Caliper, FindingsError, read_findings};
pub use open::{KEYS, Lot, open};
pub use parts::{Conditions, Finding, NotInspected, Repeat};
pub use reference::{CertifiedValue, ReferenceSpring};
pub use study::{Assigned, Belongs, Names, STUDY_KEYS, StudyFile, open_study};

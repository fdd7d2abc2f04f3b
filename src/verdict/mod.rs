//! A value against its limits under a decision rule.
//! Source: ISO 14253-1:2017 (95 % conformance probability from memory), JCGM 106:2012.
//! Elsewhere: the value and its uncertainty (`characteristic`), what verdicts do to a lot (`lot`).

mod judge;
mod reason;
mod spring;

pub use judge::{Judged, judge};
pub use reason::{Reason, Verdict};
pub use spring::{Overall, overall};

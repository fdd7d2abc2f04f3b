//! A value against its limits under a decision rule.
//! Source: ISO 14253-1:2017 (95 % conformance probability from memory), JCGM 106:2012.
//! Elsewhere: the value and its uncertainty (`characteristic`), what verdicts do to a lot (`lot`).

mod judge;
mod spring;

pub use judge::{Judged, Reason, Verdict, judge};
pub use spring::{Overall, overall};

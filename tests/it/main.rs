//! The one test binary.
#![expect(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::panic,
    clippy::indexing_slicing,
    reason = "tests"
)]

mod export;
mod fit_published;
mod plan_published;
mod published;
mod report;
mod rooms;
mod springs_published;
mod stats_published;
mod type_a_coverage;

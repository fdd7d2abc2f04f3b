//! coilassay judges coil springs from what a bench tester measured.
//!
//! Data flows down the list of rooms; a room imports only from those above it (`tests/it/rooms.rs` holds it to that).

pub mod units;

pub mod stats;

pub mod text;

pub mod quantity;

pub mod formula;

pub mod material;

pub mod standard;

pub mod spring;

pub mod drawing;

pub mod rig;

pub mod export;

pub mod oddity;

pub mod intake;

pub mod curve;

pub mod draft;
pub mod review;

pub mod fit;

pub mod characteristic;

pub mod doubt;

pub mod verdict;

pub mod bench;
pub mod sampling;

pub mod process;

pub mod drift;

pub mod lot;

pub mod cause;

pub mod record;

pub mod archive;

pub mod wording;

pub mod sheet;

pub mod charts;

pub mod model;

pub mod report;

pub mod job;

pub mod cli;

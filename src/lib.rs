//! coilassay judges coil springs from what a bench tester measured.
//!
//! Data flows down the list of rooms; a room imports only from those above it.

pub mod quantity;
pub mod record;
pub mod text;
pub mod units;

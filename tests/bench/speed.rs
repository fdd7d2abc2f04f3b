//! coilassay
fn main() {}

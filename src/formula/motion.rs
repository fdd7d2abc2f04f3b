//! What moves: the natural frequency, the mass, the diameter under load.

use std::f64::consts::PI;

/// Lowest natural frequency, Hz, both ends held: `d/(2π·n·D²)·√(G/(2ρ))`; one end free, half of it (from memory).
///
/// `wire` d and `coil` D in mm, `shear` G in MPa, `density` ρ in kg/dm³.
/// Source: EN 13906-1:2013, 9.12 (numeric constant 3560 from memory, derived 3558.8); Shigley's eq. 10-25.
pub fn natural_frequency(wire: f64, coil: f64, active: f64, shear: f64, density: f64) -> f64 {
    let speed = (shear * 1e6 / (2.0 * density * 1e3)).sqrt() * 1e3; // mm/s
    wire / (2.0 * PI * active * coil * coil) * speed
}

/// Mass of the wire of `coils` coils, in g: `ρ·π²/4·d²·D·n`, the helix angle left out.
/// Source: Shigley's, example 10-4 (from memory).
pub fn mass(wire: f64, coil: f64, coils: f64, density: f64) -> f64 {
    density * 1e-3 * PI * PI / 4.0 * wire * wire * coil * coils
}

/// Outside diameter De at solid, mm, of a spring whose ends cannot turn, from its pitch at no load:
/// `√(D² + (p² − d²)/π²) + d`. Source: Wahl, Mechanical Springs (from memory).
pub fn growth_held(wire: f64, coil: f64, pitch: f64) -> f64 {
    (coil * coil + (pitch * pitch - wire * wire) / (PI * PI)).sqrt() + wire
}

/// Increase of the outside diameter at solid, mm, of a spring whose ends turn freely:
/// `0.1·(p² − 0.8·p·d − 0.2·d²)/D`. Source: EN 13906-1:2013, 9.11 (formula from memory).
pub fn growth_turning(wire: f64, coil: f64, pitch: f64) -> f64 {
    0.1 * (pitch * pitch - 0.8 * pitch * wire - 0.2 * wire * wire) / coil
}

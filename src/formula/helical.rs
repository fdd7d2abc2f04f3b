//! Rate, stress and energy.

use crate::units::{Megapascals, Newtons, NewtonsPerMillimetre};

/// Rate of a close-coiled round-wire helical spring, `G·d⁴ / (8·D³·n)`, in N/mm.
///
/// `wire` d and `coil` D in mm, `active` coils n, `shear` G in MPa (= N/mm²); all above zero.
/// Source: EN 13906-1:2013, 9.4; torsion of a round bar, curvature and pitch left out.
///
/// # Errors
/// `None` where the quotient is not a finite number.
pub fn rate(wire: f64, coil: f64, active: f64, shear: f64) -> Option<NewtonsPerMillimetre> {
    NewtonsPerMillimetre::try_from(shear * wire.powi(4) / (8.0 * coil.powi(3) * active)).ok()
}

/// Energy stored at load F (N) and deflection s (mm) of a straight spring, `F·s/2`, in N·mm (= mJ).
/// Source: EN 13906-1:2013, 9.1.
pub fn energy(load: f64, deflection: f64) -> f64 {
    load * deflection / 2.0
}

/// Shear stresses in the wire at one load, in MPa.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stress {
    /// `8·F·D/(π·d³)`.
    pub uncorrected: Megapascals,
    /// Times `1 + 1/(2w)`, direct shear.
    pub with_static: Megapascals,
    /// Times `(w + 0.5)/(w − 0.75)`, EN 13906-1 (the same number as Bergsträsser's).
    pub with_dynamic: Megapascals,
    /// Times `(4w − 1)/(4w − 4) + 0.615/w`, Wahl.
    pub with_wahl: Megapascals,
}

/// Stresses at load `load` (N) in wire d of coil D (mm).
///
/// Source: EN 13906-1:2013, 9.5 and 7; Shigley's Mechanical Engineering Design, eq. 10-3 and 10-4.
///
/// # Errors
/// `None` where a stress is not finite.
pub fn stress(load: Newtons, wire: f64, coil: f64) -> Option<Stress> {
    let w = coil / wire;
    let plain = 8.0 * load.get() * coil / (std::f64::consts::PI * wire.powi(3));
    let times = |factor: f64| Megapascals::try_from(plain * factor).ok();
    Some(Stress {
        uncorrected: times(1.0)?,
        with_static: times(1.0 + 0.5 / w)?,
        with_dynamic: times((w + 0.5) / (w - 0.75))?,
        with_wahl: times((4.0 * w - 1.0) / (4.0 * w - 4.0) + 0.615 / w)?,
    })
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use approx::assert_relative_eq;
    use proptest::prelude::*;

    proptest! {
        /// (w + 0.5)/(w − 0.75) times 4 over 4 is Bergsträsser's (4w + 2)/(4w − 3).
        #[test]
        fn the_factor_of_en_13906_is_bergstrasser_s(w in 2.0_f64..30.0, load in 1.0_f64..1e4) {
            let found = stress(load.try_into().unwrap(), 2.0, 2.0 * w).unwrap();
            let factor = found.with_dynamic.get() / found.uncorrected.get();
            assert_relative_eq!(factor, (4.0 * w + 2.0) / (4.0 * w - 3.0), epsilon = 0.0, max_relative = 1e-13);
        }

        /// F·s/2 = R·s²/2 = 4·F²·D³·n/(G·d⁴), EN 13906-1:2013, 9.1.
        #[test]
        fn energy_three_ways(d in 0.5_f64..8.0, w in 4.0_f64..16.0, n in 2.0_f64..20.0, load in 1.0_f64..900.0) {
            let (coil, shear) = (d * w, 81_500.0);
            let rate = rate(d, coil, n, shear).unwrap().get();
            let s = load / rate;
            assert_relative_eq!(energy(load, s), rate * s * s / 2.0, epsilon = 0.0, max_relative = 1e-13);
            let wire = 4.0 * load * load * coil.powi(3) * n / (shear * d.powi(4));
            assert_relative_eq!(energy(load, s), wire, epsilon = 0.0, max_relative = 1e-13);
        }

        /// Direct shear on top of torsion: 8FD/(πd³) + 4F/(πd²).
        #[test]
        fn the_static_factor_is_direct_shear(d in 0.5_f64..8.0, w in 3.0_f64..20.0, load in 1.0_f64..900.0) {
            let found = stress(load.try_into().unwrap(), d, d * w).unwrap();
            let pi = std::f64::consts::PI;
            let sum = 8.0 * load * w / (pi * d * d) + 4.0 * load / (pi * d * d);
            assert_relative_eq!(found.with_static.get(), sum, epsilon = 0.0, max_relative = 1e-13);
        }
    }
}

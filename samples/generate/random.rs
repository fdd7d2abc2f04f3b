//! A small seeded random number generator (SplitMix64) with the two distributions needed here.

/// One stream of random numbers; the same seed gives the same stream.
pub(crate) struct Random {
    state: u64,
    spare: Option<f64>,
}

impl Random {
    /// A stream of its own for every pair of seed and purpose.
    pub(crate) fn new(seed: u64, purpose: u64) -> Self {
        let mut random = Self {
            state: seed ^ purpose.wrapping_mul(0xD1B5_4A32_D192_ED03),
            spare: None,
        };
        random.bits();
        random
    }

    /// SplitMix64 (Steele, Lea and Flood 2014, public domain); constants from memory.
    fn bits(&mut self) -> u64 {
        self.state = self.state.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.state;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }

    /// Uniform over 0 (included) to 1 (left out).
    pub(crate) fn unit(&mut self) -> f64 {
        (self.bits() >> 11) as f64 / 9_007_199_254_740_992.0 // 2^53
    }

    /// Uniform between two values.
    pub(crate) fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.unit()
    }

    /// Rectangular about zero with the given half-width.
    pub(crate) fn rectangular(&mut self, half_width: f64) -> f64 {
        self.between(-half_width, half_width)
    }

    /// Normal about zero, by Box and Muller.
    pub(crate) fn normal(&mut self, deviation: f64) -> f64 {
        if let Some(spare) = self.spare.take() {
            return spare * deviation;
        }
        let radius = (-2.0 * (1.0 - self.unit()).ln()).sqrt();
        let angle = std::f64::consts::TAU * self.unit();
        self.spare = Some(radius * angle.sin());
        radius * angle.cos() * deviation
    }

    /// Normal about zero, redrawn until within `bound`: real spread without wild springs.
    pub(crate) fn bounded(&mut self, deviation: f64, bound: f64) -> f64 {
        loop {
            let value = self.normal(deviation);
            if value.abs() <= bound {
                return value;
            }
        }
    }
}

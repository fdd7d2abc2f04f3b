//! A spring as it truly is: load against length, without any instrument.

/// Wire, mean coil diameter (mm), active coils and shear modulus (MPa).
pub(crate) struct Wound {
    pub(crate) wire: f64,
    pub(crate) coil: f64,
    pub(crate) active: f64,
    pub(crate) shear: f64,
}

impl Wound {
    /// Rate in N/mm, `G·d⁴ / (8·D³·n)`.
    pub(crate) fn rate(&self) -> f64 {
        self.shear * self.wire.powi(4) / (8.0 * self.coil.powi(3) * self.active)
    }
}

/// One spring, or one member of a nested set.
///
/// Above the toe its load is exactly `rate · (line − length)`; the toe of the closed ends starts
/// with `toe_start · rate` and stiffens evenly to `rate` over `toe` mm, so the spring touches
/// `toe · (1 − toe_start) / 2` before the line would say so.
#[derive(Clone)]
pub(crate) struct Member {
    /// N/mm above the toe.
    pub(crate) rate: f64,
    /// Length in mm at which the straight part, drawn out, carries nothing.
    pub(crate) line: f64,
    /// Travel in mm over which the ends seat.
    pub(crate) toe: f64,
    /// Share of the rate right after contact.
    pub(crate) toe_start: f64,
    /// Length in mm at which the coils are on each other.
    pub(crate) solid: f64,
}

/// How stiff coils on each other are, in rates, and over how many mm they meet.
const SOLID_RATES: f64 = 60.0;
const SOLID_WIDTH: f64 = 0.03;

impl Member {
    /// Length at first contact in mm.
    pub(crate) fn free(&self) -> f64 {
        self.line + self.toe * (1.0 - self.toe_start) / 2.0
    }

    /// Load in N at a length in mm, while loading.
    pub(crate) fn load(&self, length: f64) -> f64 {
        let travel = self.free() - length;
        let elastic = if travel <= 0.0 {
            0.0
        } else if travel < self.toe {
            let stiffening = (1.0 - self.toe_start) * travel / (2.0 * self.toe);
            self.rate * travel * (self.toe_start + stiffening)
        } else {
            self.rate * (self.line - length)
        };
        let into = (self.solid - length) / SOLID_WIDTH;
        if into < -40.0 {
            return elastic;
        }
        elastic + SOLID_RATES * self.rate * SOLID_WIDTH * into.exp().ln_1p()
    }
}

/// What lies between the platens: one spring or a nested set.
#[derive(Clone)]
pub(crate) struct Specimen {
    pub(crate) members: Vec<Member>,
    /// Share of the load missing while unloading.
    pub(crate) hysteresis: f64,
    /// mm of free length lost between the first and the last recorded cycle.
    pub(crate) set: f64,
}

impl Specimen {
    /// One spring by itself.
    pub(crate) fn single(member: Member) -> Self {
        Self {
            members: vec![member],
            hysteresis: 0.03,
            set: 0.0,
        }
    }

    /// Free length in mm in the last cycle.
    pub(crate) fn free(&self) -> f64 {
        self.members
            .iter()
            .map(Member::free)
            .fold(f64::NEG_INFINITY, f64::max)
    }

    /// The longest toe, in mm.
    pub(crate) fn toe(&self) -> f64 {
        self.members
            .iter()
            .map(|m| m.free() - m.line + m.toe)
            .fold(0.0, f64::max)
    }

    /// True rate above the toe, N/mm.
    pub(crate) fn rate(&self) -> f64 {
        self.members.iter().map(|m| m.rate).sum()
    }

    /// True load in N at a length in mm in the last loading stroke.
    pub(crate) fn load(&self, length: f64) -> f64 {
        self.members.iter().map(|m| m.load(length)).sum()
    }

    /// Load in N while unloading from `bottom` mm: falls off over the first 1.5 mm, then lags.
    pub(crate) fn unload(&self, length: f64, bottom: f64) -> f64 {
        let lag = 1.0 - (-(length - bottom) / 1.5).exp();
        self.load(length) * (1.0 - self.hysteresis * lag)
    }
}

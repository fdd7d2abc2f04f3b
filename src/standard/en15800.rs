//! EN 15800 (formerly DIN 2095), cold-coiled compression springs of round wire.

use super::Found;
use super::en15800_table::{coil, from_memory};
use crate::formula::Ends;

/// Grade.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[expect(missing_docs, reason = "the names are the standard's")]
pub enum Grade {
    One,
    Two,
    Three,
}

impl Grade {
    pub(super) const fn number(self) -> usize {
        match self {
            Self::One => 1,
            Self::Two => 2,
            Self::Three => 3,
        }
    }

    /// Of three values, the one for this grade.
    pub(super) const fn of(self, [one, two, three]: [f64; 3]) -> f64 {
        match self {
            Self::One => one,
            Self::Two => two,
            Self::Three => three,
        }
    }
}

/// A spring as drawn, nominal sizes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Drawn {
    /// Wire diameter d, mm.
    pub wire: f64,
    /// Mean coil diameter D, mm.
    pub coil: f64,
    /// Active coils n.
    pub active: f64,
    /// Free length L0, mm.
    pub free: f64,
    /// Rate R, N/mm.
    pub rate: f64,
    /// Its ends.
    pub ends: Ends,
    /// Whether it is coiled cold.
    pub cold: bool,
}

impl Drawn {
    /// w = D/d.
    pub fn index(&self) -> f64 {
        self.coil / self.wire
    }
}

/// What a tolerance is asked for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Toleranced {
    /// A load.
    Load {
        /// Its nominal size, N.
        nominal: f64,
        /// The length it is asked at, mm.
        length: f64,
    },
    /// The rate, of this nominal value, N/mm.
    Rate(f64),
    /// Free length.
    FreeLength,
    /// Any of the coil diameters.
    CoilDiameter,
    /// Squareness e1: the largest permitted value.
    Squareness,
    /// Parallelism e2: the largest permitted value.
    Parallelism,
    /// Something else, by its name.
    Other(&'static str),
}

/// Why a standard gives no tolerance.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum OutOfRange {
    #[error("{standard} does not cover this spring: {what} {value}, it covers {from} to {to}")]
    Range {
        standard: &'static str,
        what: &'static str,
        value: String,
        from: f64,
        to: f64,
    },
    #[error("{standard} covers springs coiled cold only")]
    NotCold { standard: &'static str },
    #[error("{standard} gives no tolerance for {what}{why}")]
    Nothing {
        standard: &'static str,
        what: &'static str,
        why: &'static str,
    },
    #[error(
        "{standard} prints no load tolerance for a deflection of {deflection} in of a spring whose free length has ±{length} in"
    )]
    NotPrinted {
        standard: &'static str,
        deflection: String,
        length: String,
    },
}

impl OutOfRange {
    /// A figure outside the range of a standard.
    pub(super) fn of(
        standard: &'static str,
        what: &'static str,
        value: f64,
        (from, to): (f64, f64),
    ) -> Self {
        Self::Range {
            standard,
            what,
            value: shown(value),
            from,
            to,
        }
    }
}

const NAME: &str = "EN 15800";

/// `value` to at most four places, for a message.
pub(super) fn shown(value: f64) -> String {
    let text = format!("{value:.4}");
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

/// The ranges of validity: wire 0.07 to 16 mm, D 0.63 to 200 mm, L0 up to 630 mm, n from 2, w 4 to 20.
fn covered(spring: &Drawn) -> Result<(), OutOfRange> {
    if !spring.cold {
        return Err(OutOfRange::NotCold { standard: NAME });
    }
    let ranges = [
        ("wire diameter d (mm)", spring.wire, 0.07, 16.0),
        ("mean coil diameter D (mm)", spring.coil, 0.63, 200.0),
        ("free length L0 (mm)", spring.free, 0.0, 630.0),
        ("active coils n", spring.active, 2.0, f64::INFINITY),
        ("index w", spring.index(), 4.0, 20.0),
    ];
    for (what, value, from, to) in ranges {
        // A size converted from inches may miss a bound by rounding.
        if value < from * (1.0 - 1e-9) || value > to * (1.0 + 1e-9) {
            return Err(OutOfRange::of(NAME, what, value, (from, to)));
        }
    }
    Ok(())
}

/// `a_F = 65.92·d^3.3/D^1.6·[−0.84(w/10)³ + 3.781(w/10)² − 4.244(w/10) + 2.274]`, N.
fn force_factor(spring: &Drawn) -> f64 {
    let w = spring.index() / 10.0;
    let shape = -0.84 * w.powi(3) + 3.781 * w * w - 4.244 * w + 2.274;
    65.92 * spring.wire.powf(3.3) / spring.coil.powf(1.6) * shape
}

/// `k_F = −1/(3n²) + 8/(5n) + 0.803`.
fn coil_factor(active: f64) -> f64 {
    -1.0 / (3.0 * active * active) + 8.0 / (5.0 * active) + 0.803
}

/// Q by grade.
const QUALITY: [f64; 3] = [0.63, 1.00, 1.60];
/// e1 as a share of L0, e2 as a share of De (from memory).
const SQUARENESS: [f64; 3] = [0.03, 0.05, 0.08];
const PARALLELISM: [f64; 3] = [0.015, 0.03, 0.06];

/// The half-width (or largest value) that EN 15800 gives.
///
/// Loads `±[a_F·k_F + 1.5·F/100]·Q`, free length `±a_F·k_F·Q/R`. That Q multiplies the whole bracket is from memory; at
/// grade 2 (Q = 1) it makes no difference.
///
/// # Errors
/// [`OutOfRange`] outside the standard's ranges, or for what it does not tolerance.
pub fn en15800(grade: Grade, spring: &Drawn, what: Toleranced) -> Result<Found, OutOfRange> {
    covered(spring)?;
    let nothing = |what, why| OutOfRange::Nothing {
        standard: NAME,
        what,
        why,
    };
    let q = grade.of(QUALITY);
    let geometry = force_factor(spring) * coil_factor(spring.active);
    let memory = " (from memory)";
    let (half_width, note) = match what {
        Toleranced::Load { nominal: load, .. } => (
            (geometry + 1.5 * load.abs() / 100.0) * q,
            if grade == Grade::Two {
                ""
            } else {
                " (Q on the whole bracket, from memory)"
            },
        ),
        Toleranced::FreeLength => (geometry * q / spring.rate, ""),
        Toleranced::CoilDiameter => {
            let found = coil(spring.coil, spring.index(), grade.number());
            let cell = found.ok_or_else(|| nothing("the coil diameter", ""))?;
            let doubt = from_memory(spring.coil, spring.index(), grade.number());
            (cell, if doubt { memory } else { "" })
        }
        Toleranced::Squareness | Toleranced::Parallelism if !spring.ends.ground() => {
            return Err(nothing(
                "squareness and parallelism",
                " of ends that are not ground",
            ));
        }
        Toleranced::Squareness => (grade.of(SQUARENESS) * spring.free, memory),
        Toleranced::Parallelism => (grade.of(PARALLELISM) * (spring.coil + spring.wire), memory),
        Toleranced::Rate(_) => {
            let why = "; two loads imply it: state two loads, or a tolerance of the rate";
            return Err(nothing("the rate", why));
        }
        Toleranced::Other(name) => return Err(nothing(name, "")),
    };
    Ok(Found {
        half_width,
        source: format!("{NAME} grade {}{note}", grade.number()),
    })
}

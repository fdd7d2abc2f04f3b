//! Tolerances that standards give to cold-coiled compression springs, by grade, within the ranges they cover.
//! Pure: sizes in mm, loads in N in, half-widths out. Elsewhere: which requirement names which standard (`drawing`).

mod en15800;
mod en15800_table;
mod handbook;
mod handbook_tables;
mod jis2704;

pub use en15800::{Drawn, Grade, OutOfRange, Toleranced, en15800};

/// A standard with its grade, as a drawing names it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Standard {
    /// EN 15800.
    En15800(Grade),
    /// JIS B 2704-2.
    Jis2704(Grade),
    /// Machinery's Handbook, tables 8, 10 and 11.
    Handbook,
}

impl Standard {
    /// The words a drawing may write; `EN 15800` alone is grade 2, as the standard says.
    pub const WORDS: [(&'static str, Self); 8] = [
        ("EN 15800 grade 1", Self::En15800(Grade::One)),
        ("EN 15800 grade 2", Self::En15800(Grade::Two)),
        ("EN 15800 grade 3", Self::En15800(Grade::Three)),
        ("EN 15800", Self::En15800(Grade::Two)),
        ("JIS B 2704-2 grade 1", Self::Jis2704(Grade::One)),
        ("JIS B 2704-2 grade 2", Self::Jis2704(Grade::Two)),
        ("JIS B 2704-2 grade 3", Self::Jis2704(Grade::Three)),
        (handbook::NAME, Self::Handbook),
    ];

    /// The half-width of `what` for a spring as drawn.
    ///
    /// # Errors
    /// [`OutOfRange`] where the standard does not cover the spring, or gives nothing for it.
    pub fn half_width(self, spring: &Drawn, what: Toleranced) -> Result<Found, OutOfRange> {
        match self {
            Self::En15800(grade) => en15800(grade, spring, what),
            Self::Jis2704(grade) => jis2704::jis2704(grade, spring, what),
            Self::Handbook => handbook::handbook(spring, what),
        }
    }
}

/// A half-width and where it comes from.
#[derive(Clone, Debug, PartialEq)]
pub struct Found {
    /// Half-width, N or mm; the largest permitted value for squareness and parallelism.
    pub half_width: f64,
    /// Standard, grade, and what of it was read from memory.
    pub source: String,
}

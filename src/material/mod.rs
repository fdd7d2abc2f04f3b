//! Spring materials: shear modulus, modulus of elasticity, density and smallest tensile strength by wire diameter, each
//! with its source and how sure it is; the user's own table beside them.
//! Here: figures of wire. Elsewhere: what a drawing makes of them (`drawing`), stresses held against them (`review`).

mod families;
mod find;
mod own;
mod strength;

pub use families::{FAMILIES, Family, Kind};
pub use find::{
    Material, PerKelvin, SHEAR_SPREAD, Strength, family, find, known, others_like, stated,
};
pub use own::{OWN_KEYS, OwnTable, open_own};
pub use strength::{Law, StrengthRow, strength_of};

/// How a tabled figure is known.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mark {
    /// Read in the source.
    Read,
    /// The source remembered, not looked up.
    Memory,
    /// What the trade does; there is no source.
    Practice,
}

impl Mark {
    /// What stands behind the source.
    pub const fn words(self) -> &'static str {
        match self {
            Self::Read => "",
            Self::Memory => " (from memory)",
            Self::Practice => " (common practice, no source)",
        }
    }
}

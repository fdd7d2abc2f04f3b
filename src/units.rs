//! Physical quantities, one type per unit. Imports nothing from this crate.
//! Here: constructors that refuse nonsense, arithmetic between units, conversions, serde.
//! Elsewhere: rounding and labels (`report::figure`), limits (`drawing::limits`).

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

/// Beyond this no bench reads anything; below it sums and differences of two figures stay finite.
const LARGEST: f64 = 1e100;

/// One inch in mm; exact by definition (international yard and pound agreement, 1959).
const MM_PER_INCH: f64 = 25.4;
/// Standard gravity in m/s²; exact by definition (3rd CGPM, 1901).
const STANDARD_GRAVITY: f64 = 9.806_65;
/// One avoirdupois pound in kg; exact by definition (international yard and pound agreement, 1959).
const KG_PER_POUND: f64 = 0.453_592_37;
/// One pound-force in N: pound times standard gravity.
const N_PER_LBF: f64 = KG_PER_POUND * STANDARD_GRAVITY;

/// A figure that is not a finite number of usable size.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error("{value} {unit} is not a finite number of usable size")]
pub struct NotFinite {
    value: f64,
    unit: &'static str,
}

fn finite(value: f64, unit: &'static str) -> Result<f64, NotFinite> {
    if value.is_finite() && value.abs() <= LARGEST {
        Ok(value)
    } else {
        Err(NotFinite { value, unit })
    }
}

macro_rules! unit {
    ($(#[$doc:meta])* $name:ident, $symbol:literal) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, PartialEq, PartialOrd, Serialize, Deserialize, JsonSchema)]
        #[serde(try_from = "f64", into = "f64")] // `transparent` would let TOML's `nan` in
        pub struct $name(f64);

        impl $name {
            /// Zero of this unit.
            pub const ZERO: Self = Self(0.0);
            /// The unit's symbol as printed and exported.
            pub const SYMBOL: &'static str = $symbol;

            /// The bare number, in this type's unit.
            pub const fn get(self) -> f64 {
                self.0
            }

            /// The size without its sign.
            #[must_use]
            pub const fn abs(self) -> Self {
                Self(self.0.abs())
            }
        }

        impl TryFrom<f64> for $name {
            type Error = NotFinite;
            fn try_from(value: f64) -> Result<Self, NotFinite> {
                finite(value, $symbol).map(Self)
            }
        }

        impl From<$name> for f64 {
            fn from(quantity: $name) -> f64 {
                quantity.0
            }
        }

        impl std::ops::Add for $name {
            type Output = Self;
            fn add(self, other: Self) -> Self {
                Self(self.0 + other.0)
            }
        }

        impl std::ops::Sub for $name {
            type Output = Self;
            fn sub(self, other: Self) -> Self {
                Self(self.0 - other.0)
            }
        }
    };
}

unit!(
    /// Force in newtons; always finite.
    Newtons,
    "N"
);
unit!(
    /// Length, travel or deflection in millimetres; always finite.
    Millimetres,
    "mm"
);
unit!(
    /// Spring rate in newtons per millimetre; always finite.
    NewtonsPerMillimetre,
    "N/mm"
);
unit!(
    /// Stress or modulus in megapascals (= N/mm²); always finite.
    Megapascals,
    "MPa"
);
unit!(
    /// A bare figure whose unit stands beside it (as in `result.json`); always finite.
    Finite,
    ""
);

impl Newtons {
    /// Secant rate over a deflection; `None` where the quotient is not finite.
    pub fn per(self, over: Millimetres) -> Option<NewtonsPerMillimetre> {
        NewtonsPerMillimetre::try_from(self.0 / over.0).ok()
    }
}

impl NewtonsPerMillimetre {
    /// Load at a deflection; `None` where the product is not finite.
    pub fn times(self, over: Millimetres) -> Option<Newtons> {
        Newtons::try_from(self.0 * over.0).ok()
    }
}

/// A unit of force that an export or a file may use.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ForceUnit {
    /// Newton.
    Newton,
    /// Kilonewton.
    Kilonewton,
    /// Kilogram-force (kilopond).
    KilogramForce,
    /// Pound-force.
    PoundForce,
}

impl ForceUnit {
    /// Reads a unit as written in an export's header or a rig file; `None` where it is no unit of force.
    pub fn parse(text: &str) -> Option<Self> {
        match text.trim() {
            "N" | "n" | "Newton" | "newton" | "newtons" => Some(Self::Newton),
            "kN" | "KN" | "kn" => Some(Self::Kilonewton),
            "kgf" | "kp" | "kgF" => Some(Self::KilogramForce),
            "lbf" | "lbF" | "lbs" | "lb" => Some(Self::PoundForce),
            _ => None,
        }
    }

    /// Newtons in one of this unit; exact definitions.
    pub const fn newtons(self) -> f64 {
        match self {
            Self::Newton => 1.0,
            Self::Kilonewton => 1000.0,
            Self::KilogramForce => STANDARD_GRAVITY,
            Self::PoundForce => N_PER_LBF,
        }
    }

    /// The symbol printed for this unit.
    pub const fn symbol(self) -> &'static str {
        match self {
            Self::Newton => "N",
            Self::Kilonewton => "kN",
            Self::KilogramForce => "kgf",
            Self::PoundForce => "lbf",
        }
    }
}

/// A unit of length that an export or a file may use.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LengthUnit {
    /// Millimetre.
    Millimetre,
    /// Inch.
    Inch,
}

impl LengthUnit {
    /// Reads a unit as written in an export's header or a rig file; `None` where it is no unit of length.
    pub fn parse(text: &str) -> Option<Self> {
        match text.trim() {
            "mm" | "MM" | "millimetre" | "millimeter" => Some(Self::Millimetre),
            "in" | "inch" | "inches" | "IN" => Some(Self::Inch),
            _ => None,
        }
    }

    /// Millimetres in one of this unit; exact definitions.
    pub const fn millimetres(self) -> f64 {
        match self {
            Self::Millimetre => 1.0,
            Self::Inch => MM_PER_INCH,
        }
    }

    /// The symbol printed for this unit.
    pub const fn symbol(self) -> &'static str {
        match self {
            Self::Millimetre => "mm",
            Self::Inch => "in",
        }
    }
}

/// The pair of units a file states for all its figures, or a reader wants to see.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub enum System {
    /// Millimetres, newtons, N/mm, MPa.
    #[default]
    #[serde(rename = "mm-N")]
    MmN,
    /// Inches, pounds-force, lbf/in, psi.
    #[serde(rename = "in-lbf")]
    InLbf,
}

impl System {
    /// Millimetres in one of this system's units of length.
    pub const fn length(self) -> f64 {
        match self {
            Self::MmN => 1.0,
            Self::InLbf => MM_PER_INCH,
        }
    }

    /// Newtons in one of this system's units of force.
    pub const fn force(self) -> f64 {
        match self {
            Self::MmN => 1.0,
            Self::InLbf => N_PER_LBF,
        }
    }

    /// N/mm in one of this system's units of rate.
    pub const fn rate(self) -> f64 {
        self.force() / self.length()
    }

    /// MPa in one of this system's units of stress.
    pub const fn stress(self) -> f64 {
        self.force() / (self.length() * self.length())
    }
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn refuses_what_is_no_number() {
        for bad in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY, 1e101] {
            assert!(Newtons::try_from(bad).is_err());
        }
        assert!(serde_json::from_str::<Newtons>("null").is_err());
    }

    /// NIST SP 811 (2008), appendix B.8: lbf to N 4.448 222, lbf/in to N/m 175.126 8, psi to Pa 6894.757, kgf to N 9.806 65.
    #[test]
    fn conversions_of_sp_811() {
        assert_relative_eq!(
            ForceUnit::PoundForce.newtons(),
            4.448_222,
            epsilon = 0.0,
            max_relative = 1e-7
        );
        assert_relative_eq!(
            System::InLbf.rate() * 1000.0,
            175.126_8,
            epsilon = 0.0,
            max_relative = 3e-7
        );
        assert_relative_eq!(
            System::InLbf.stress() * 1e6,
            6894.757,
            epsilon = 0.0,
            max_relative = 1e-7
        );
        assert_relative_eq!(
            ForceUnit::KilogramForce.newtons(),
            9.806_65,
            epsilon = 0.0,
            max_relative = 1e-15
        );
    }

    #[test]
    fn a_rate_times_its_deflection_is_the_load() {
        let load = Newtons::try_from(10.0).unwrap();
        let rate = load.per(Millimetres::try_from(4.0).unwrap()).unwrap();
        assert_relative_eq!(rate.get(), 2.5, epsilon = 0.0, max_relative = 1e-15);
        assert_eq!(load.per(Millimetres::ZERO), None);
    }
}

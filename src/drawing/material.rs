//! Shear moduli, one row per material family.

/// Relative half-width of G where the drawing does not state one: lots of one material differ by about
/// this much, and tables by up to 5 % for the same wire (common practice, no source).
pub(super) const SHEAR_SPREAD: f64 = 0.02;

/// A material family: its standard and the shear modulus tabled for it at 20 °C.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Family {
    /// How a drawing names it, up to the grade.
    pub name: &'static str,
    /// G in MPa.
    pub shear: f64,
    /// Where G comes from.
    pub source: &'static str,
}

/// One row per family.
#[rustfmt::skip] // keeps the table a table
pub const FAMILIES: [Family; 8] = [
    Family { name: "EN 10270-1", shear: 81_500.0, source: "EN 13906-1:2013, table of material values" },
    Family { name: "EN 10270-2", shear: 79_500.0, source: "EN 13906-1:2013, table of material values (from memory)" },
    Family { name: "EN 10270-3 1.4310", shear: 70_000.0, source: "EN 13906-1:2013, as drawn; tempered wire is given as 73 000 MPa" },
    Family { name: "EN 10089", shear: 78_500.0, source: "EN 13906-1:2013, table of material values" },
    Family { name: "EN 12166 CuSn6", shear: 42_000.0, source: "EN 13906-1:2013, table of material values (from memory)" },
    Family { name: "ASTM A228", shear: 81_000.0, source: "Machinery's Handbook, 31st ed., table 20 (11.75 Mpsi, wire 0.064 to 0.125 in)" },
    Family { name: "ASTM A229", shear: 77_200.0, source: "Machinery's Handbook, 31st ed., table 20 (11.2 Mpsi)" },
    Family { name: "ASTM A401", shear: 77_200.0, source: "Machinery's Handbook, 31st ed., table 20 (11.2 Mpsi)" },
];

/// The shear modulus a drawing works with.
#[derive(Clone, Debug, PartialEq)]
pub struct Shear {
    /// G in MPa.
    pub modulus: f64,
    /// Relative half-width of G, rectangular.
    pub spread: f64,
    /// The material as written, or `stated G`.
    pub material: String,
    /// Where G comes from.
    pub source: String,
}

/// The family a material as written belongs to: the family's name, alone or followed by a grade.
pub fn family(written: &str) -> Option<&'static Family> {
    FAMILIES.iter().find(|family| {
        written
            .trim()
            .strip_prefix(family.name)
            .is_some_and(|rest| rest.is_empty() || rest.starts_with([' ', '-', '/']))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_grade_belongs_to_its_family_and_a_longer_number_does_not() {
        assert_eq!(
            family("EN 10270-1 SH").map(|family| family.shear),
            Some(81_500.0)
        );
        assert_eq!(family("EN 10270-12"), None);
        assert_eq!(family("wire"), None);
    }
}

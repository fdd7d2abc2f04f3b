//! Smallest tensile strength Rm by wire diameter.

use super::Mark;

/// How Rm follows from the wire diameter d (mm), in MPa.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Law {
    /// Rows (largest d, Rm): the first row whose d is not below the wire's. Between two printed sizes that is the value
    /// of the thicker one, which is the smaller.
    Steps(&'static [(f64, f64)]),
    /// `Rm = at_one − per_decade·lg d`.
    Log {
        /// Rm at 1 mm.
        at_one: f64,
        /// Fall for each factor of ten in d.
        per_decade: f64,
    },
    /// `Rm = A/d^m`.
    Power {
        /// A in MPa·mm^m.
        a: f64,
        /// m.
        m: f64,
    },
}

/// One stretch of wire diameters of one or more grades.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StrengthRow {
    /// Family.
    pub family: &'static str,
    /// Grades; empty where the family has none.
    pub grades: &'static [&'static str],
    /// Smallest wire diameter, mm (included).
    pub from: f64,
    /// Largest wire diameter, mm (included).
    pub to: f64,
    /// The law.
    pub law: Law,
    /// Source.
    pub source: &'static str,
    /// How it is known.
    pub mark: Mark,
}

impl StrengthRow {
    /// Rm in MPa of wire d (mm); `None` outside the row's diameters.
    pub fn at(&self, wire: f64) -> Option<f64> {
        // A size converted from inches may miss its own bound by rounding.
        if wire < self.from * (1.0 - 1e-9) || wire > self.to * (1.0 + 1e-9) {
            return None;
        }
        match self.law {
            Law::Steps(rows) => rows
                .iter()
                .find(|(up_to, _)| wire <= up_to * (1.0 + 1e-9))
                .map(|(_, strength)| *strength),
            Law::Log { at_one, per_decade } => Some(at_one - per_decade * wire.log10()),
            Law::Power { a, m } => Some(a / wire.powf(m)),
        }
    }
}

/// The first row that holds for a family, a grade (empty: none written) and a wire diameter, with its Rm in MPa.
pub fn strength_of(family: &str, grade: &str, wire: f64) -> Option<(&'static StrengthRow, f64)> {
    ROWS.iter()
        .filter(|row| row.family == family)
        .filter(|row| row.grades.is_empty() || row.grades.contains(&grade))
        .find_map(|row| row.at(wire).map(|found| (row, found)))
}

/// The grades of a family for which some strength is tabled.
pub(super) fn grades(family: &str) -> Vec<&'static str> {
    let mut known: Vec<&str> = Vec::new();
    for row in ROWS.iter().filter(|row| row.family == family) {
        for grade in row.grades {
            if !known.contains(grade) {
                known.push(grade);
            }
        }
    }
    known
}

/// Grades SM and DM. At 15.0 mm the source prints 1160, which breaks the order of its column and is taken for a
/// misprint: the law 1980 − 740·lg d, which gives every other row within 4.6 MPa, gives 1110 there.
#[rustfmt::skip] // keeps the table a table
const SM: [(f64, f64); 54] = [
    (0.3, 2370.0), (0.4, 2270.0), (0.5, 2200.0), (0.6, 2140.0), (0.7, 2090.0), (0.8, 2050.0), (0.9, 2010.0), (1.0, 1980.0),
    (1.1, 1950.0), (1.2, 1920.0), (1.3, 1900.0), (1.4, 1870.0), (1.5, 1850.0), (1.6, 1830.0), (1.7, 1810.0), (1.8, 1790.0),
    (1.9, 1770.0), (2.0, 1760.0), (2.1, 1740.0), (2.4, 1700.0), (2.5, 1690.0), (2.6, 1670.0), (2.8, 1650.0), (3.0, 1630.0),
    (3.2, 1610.0), (3.4, 1590.0), (3.5, 1580.0), (3.6, 1570.0), (3.8, 1550.0), (4.0, 1530.0), (4.5, 1500.0), (5.0, 1460.0),
    (5.5, 1430.0), (6.0, 1400.0), (6.5, 1380.0), (7.0, 1350.0), (7.5, 1330.0), (8.0, 1310.0), (8.5, 1290.0), (9.0, 1270.0),
    (9.5, 1260.0), (10.0, 1240.0), (10.5, 1220.0), (11.0, 1210.0), (12.0, 1180.0), (12.5, 1170.0), (13.0, 1160.0), (14.0, 1130.0),
    (15.0, 1110.0), (16.0, 1090.0), (17.0, 1070.0), (18.0, 1050.0), (19.0, 1030.0), (20.0, 1020.0),
];
#[rustfmt::skip] // keeps the table a table
const DH: [(f64, f64); 9] = [
    (0.20, 2800.0), (0.22, 2770.0), (0.25, 2720.0), (0.28, 2680.0), (0.30, 2660.0), (0.32, 2640.0), (0.35, 2600.0), (0.40, 2560.0),
    (0.45, 2510.0),
];
#[rustfmt::skip] // keeps the table a table
const SH: [(f64, f64); 5] = [(0.30, 2660.0), (0.32, 2640.0), (0.35, 2600.0), (0.40, 2560.0), (0.45, 2510.0)];
#[rustfmt::skip] // keeps the table a table
const NS_4310: [(f64, f64); 19] = [
    (0.20, 2200.0), (0.30, 2150.0), (0.40, 2100.0), (0.50, 2050.0), (0.65, 2000.0), (0.80, 1950.0), (1.00, 1900.0), (1.25, 1850.0),
    (1.50, 1800.0), (1.75, 1750.0), (2.00, 1700.0), (2.50, 1650.0), (3.00, 1600.0), (3.50, 1550.0), (4.25, 1500.0), (5.00, 1450.0),
    (6.00, 1400.0), (7.00, 1350.0), (8.50, 1300.0),
];
#[rustfmt::skip] // keeps the table a table
const OF_4401: [(f64, f64); 15] = [
    (0.20, 1725.0), (0.30, 1700.0), (0.40, 1675.0), (0.50, 1650.0), (0.65, 1625.0), (0.80, 1600.0), (1.00, 1575.0), (1.75, 1450.0),
    (2.00, 1400.0), (2.50, 1350.0), (3.00, 1300.0), (3.50, 1250.0), (4.25, 1225.0), (5.00, 1200.0), (6.00, 1150.0),
];

const EN1: &str = "EN 10270-1, table of tensile strength";
const EN2: &str = "EN 10270-2, table of tensile strength";
const EN3: &str = "EN 10270-3, table of tensile strength, as drawn";
const SHIGLEY: &str = "Shigley's Mechanical Engineering Design, table 10-4";

use Mark::{Memory, Read};

const fn steps(
    (family, grades): (&'static str, &'static [&'static str]),
    (from, to): (f64, f64),
    rows: &'static [(f64, f64)],
    source: &'static str,
) -> StrengthRow {
    StrengthRow {
        family,
        grades,
        from,
        to,
        law: Law::Steps(rows),
        source,
        mark: Read,
    }
}

const fn log(
    grades: &'static [&'static str],
    (from, to): (f64, f64),
    at_one: f64,
    per_decade: f64,
) -> StrengthRow {
    let law = Law::Log { at_one, per_decade };
    StrengthRow {
        family: "EN 10270-1",
        grades,
        from,
        to,
        law,
        source: "EN 10270-1, as a law of lg d",
        mark: Memory,
    }
}

const fn power(
    family: &'static str,
    (from, to): (f64, f64),
    (a, m): (f64, f64),
    mark: Mark,
) -> StrengthRow {
    let law = Law::Power { a, m };
    StrengthRow {
        family,
        grades: &[],
        from,
        to,
        law,
        source: SHIGLEY,
        mark,
    }
}

/// Every row; where two hold, the first counts. The wires' ranges of the logarithmic and of Shigley's laws are from memory
/// (music wire ends at 0.256 in, 6.5024 mm).
#[rustfmt::skip] // keeps the table a table
const ROWS: [StrengthRow; 26] = [
    steps(("EN 10270-1", &["SM", "DM"]), (0.3, 20.0), &SM, EN1),
    steps(("EN 10270-1", &["DH"]), (0.2, 0.45), &DH, EN1),
    steps(("EN 10270-1", &["SH"]), (0.3, 0.45), &SH, EN1),
    log(&["SH", "DH"], (0.45, 20.0), 2220.0, 820.0),
    log(&["SL"], (1.0, 10.0), 1720.0, 660.0),
    steps(("EN 10270-2", &["FDC"]), (0.5, 0.7), &[(0.7, 1900.0)], EN2),
    steps(("EN 10270-2", &["FDSiCr"]), (0.5, 0.7), &[(0.7, 2100.0)], EN2),
    steps(("EN 10270-2", &["FDSiCrV"]), (0.5, 0.7), &[(0.7, 2280.0)], EN2),
    steps(("EN 10270-2", &["TDSiCr", "VDSiCr"]), (0.5, 0.7), &[(0.7, 2080.0)], EN2),
    steps(("EN 10270-2", &["TDSiCrV", "VDSiCrV"]), (0.5, 0.7), &[(0.7, 2230.0)], EN2),
    steps(("EN 10270-3 1.4310", &["", "NS"]), (0.0, 8.5), &NS_4310, EN3),
    steps(("EN 10270-3 1.4310 tempered", &["", "NS"]), (0.0, 8.5), &NS_4310, EN3),
    steps(("EN 10270-3 1.4401", &[]), (0.0, 6.0), &OF_4401, EN3),
    steps(("EN 10270-3 1.4401 tempered", &[]), (0.0, 6.0), &OF_4401, EN3),
    power("ASTM A228", (0.1, 6.5024), (2211.0, 0.145), Read),
    power("ASTM A229", (0.5, 12.7), (1855.0, 0.187), Memory),
    power("ASTM A227", (0.7, 12.7), (1783.0, 0.190), Memory),
    power("ASTM A231", (0.8, 11.1), (2005.0, 0.168), Memory),
    power("ASTM A232", (0.8, 11.1), (2005.0, 0.168), Memory),
    power("ASTM A401", (1.6, 9.5), (1974.0, 0.108), Memory),
    power("ASTM A313 302", (0.3, 2.5), (1867.0, 0.146), Memory),
    power("ASTM A313 302", (2.5, 5.0), (2065.0, 0.263), Memory),
    power("ASTM A313 302", (5.0, 10.0), (2911.0, 0.478), Memory),
    power("ASTM B159", (0.1, 0.6), (1000.0, 0.0), Memory),
    power("ASTM B159", (0.6, 2.0), (913.0, 0.028), Memory),
    power("ASTM B159", (2.0, 7.5), (932.0, 0.064), Memory),
];

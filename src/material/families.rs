//! Moduli and densities, one row per material family.

use super::Mark;

/// What a material is, for the textbook's shares of tensile strength.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Patented, cold drawn carbon steel.
    ColdDrawn,
    /// Hardened and tempered carbon and low-alloy steel, coiled cold.
    Tempered,
    /// Hot-rolled steel, coiled hot, hardened and tempered.
    HotRolled,
    /// Austenitic stainless steel.
    Austenitic,
    /// Precipitation-hardening stainless steel.
    Precipitation,
    /// Copper alloys.
    NonFerrous,
}

/// G and E of wire up to a diameter.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Band {
    /// Largest wire diameter, mm.
    pub up_to: f64,
    /// G in MPa.
    pub shear: f64,
    /// E in MPa; `None` where no source here gives it.
    pub young: Option<f64>,
}

/// A material family: its standard and what is tabled for it at 20 °C.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Family {
    /// How a drawing names it, up to the grade.
    pub name: &'static str,
    /// What it is.
    pub kind: Kind,
    /// G and E by wire diameter.
    pub bands: &'static [Band],
    /// Where G comes from.
    pub source: &'static str,
    /// How G is known.
    pub mark: Mark,
    /// Density in kg/dm³.
    pub density: f64,
    /// How the density is known.
    pub density_mark: Mark,
    /// Families that other sources table for the same wire.
    pub alike: &'static [&'static str],
}

/// Any wire diameter.
const ANY: f64 = f64::INFINITY;

const fn all(shear: f64, young: f64) -> [Band; 1] {
    [Band {
        up_to: ANY,
        shear,
        young: Some(young),
    }]
}

const fn shear_only(shear: f64) -> [Band; 1] {
    [Band {
        up_to: ANY,
        shear,
        young: None,
    }]
}

const fn band(up_to: f64, shear: f64, young: f64) -> Band {
    Band {
        up_to,
        shear,
        young: Some(young),
    }
}

const EN: &str = "EN 13906-1:2013, table of material values";
const MH: &str = "Machinery's Handbook, 31st ed., table 20";
const JIS: &str = "JIS B 2704-1";

const EN_CARBON: [Band; 1] = all(81_500.0, 206_000.0);
const EN_TEMPERED: [Band; 1] = all(79_500.0, 206_000.0);
const DRAWN_4310: [Band; 1] = all(70_000.0, 185_000.0);
const TEMPERED_4310: [Band; 1] = all(73_000.0, 185_000.0);
const DRAWN_4401: [Band; 1] = all(68_000.0, 175_000.0);
const TEMPERED_4401: [Band; 1] = all(71_000.0, 180_000.0);
const DRAWN_4568: [Band; 1] = all(73_000.0, 190_000.0);
const TEMPERED_4568: [Band; 1] = all(78_000.0, 200_000.0);
const HOT_ROLLED: [Band; 1] = all(78_500.0, 206_000.0);
const CU_SN6: [Band; 1] = all(42_000.0, 115_000.0);
const CU_ZN36: [Band; 1] = all(39_000.0, 110_000.0);
const CU_BE2: [Band; 1] = all(47_000.0, 120_000.0);
const CU_CO2_BE: [Band; 1] = all(48_000.0, 130_000.0);
// The handbook prints Mpsi by inches (0.032, 0.063, 0.125 in) and GPa beside; 0.8128, 1.6002 and 3.175 mm.
const MUSIC: [Band; 4] = [
    band(0.8128, 82_700.0, 203_400.0),
    band(1.6002, 81_700.0, 200_000.0),
    band(3.175, 81_000.0, 196_500.0),
    band(ANY, 80_000.0, 193_000.0),
];
const HARD_DRAWN: [Band; 4] = [
    band(0.8128, 80_700.0, 198_600.0),
    band(1.6002, 80_000.0, 197_900.0),
    band(3.175, 79_300.0, 197_200.0),
    band(ANY, 78_600.0, 196_500.0),
];
const OIL_TEMPERED: [Band; 1] = all(77_200.0, 196_500.0);
const TEMPERED_295: [Band; 1] = all(77_200.0, 203_400.0);
const STAINLESS: [Band; 1] = all(69_000.0, 193_100.0);
const PH_17_7: [Band; 1] = all(72_400.0, 203_400.0);
const P_BRONZE: [Band; 1] = all(41_400.0, 103_400.0);
const BE_CU: [Band; 1] = all(48_300.0, 117_200.0);
const BE_CU_PRETEMPERED: [Band; 1] = all(50_000.0, 131_000.0);
const BRASS: [Band; 1] = all(34_500.0, 103_400.0);
const JIS_STEEL: [Band; 1] = shear_only(78_500.0);
const JIS_304: [Band; 1] = shear_only(68_500.0);
const JIS_631: [Band; 1] = shear_only(73_500.0);

use Kind::{Austenitic, ColdDrawn, HotRolled, NonFerrous, Precipitation, Tempered};
use Mark::{Memory, Practice, Read};

/// One row per family. A longer name that fits wins over a shorter one.
#[rustfmt::skip] // keeps the table a table
pub const FAMILIES: [Family; 36] = [
    row("EN 10270-1", ColdDrawn, &EN_CARBON, EN, Read, (7.85, Read), &["ASTM A228", "ASTM A227", "JIS G 3521", "JIS G 3522"]),
    row("EN 10270-2", Tempered, &EN_TEMPERED, EN, Memory, (7.85, Memory), &["ASTM A229", "ASTM A401", "JIS G 3560"]),
    row("EN 10270-3 1.4310", Austenitic, &DRAWN_4310, "EN 13906-1:2013, as drawn; tempered wire is given as 73 000 MPa", Read, (7.9, Read),
        &["EN 10270-3 1.4310 tempered", "ASTM A313 302", "JIS G 4314 SUS304"]),
    row("EN 10270-3 1.4310 tempered", Austenitic, &TEMPERED_4310, "EN 13906-1:2013, tempered; wire as drawn is given as 70 000 MPa", Read, (7.9, Read),
        &["EN 10270-3 1.4310", "ASTM A313 302", "JIS G 4314 SUS304"]),
    row("EN 10270-3 1.4401", Austenitic, &DRAWN_4401, "EN 13906-1:2013, as drawn; tempered wire is given as 71 000 MPa", Memory, (7.95, Memory),
        &["EN 10270-3 1.4401 tempered", "ASTM A313 316", "JIS G 4314 SUS316"]),
    row("EN 10270-3 1.4401 tempered", Austenitic, &TEMPERED_4401, "EN 13906-1:2013, tempered; wire as drawn is given as 68 000 MPa", Read, (7.95, Memory),
        &["EN 10270-3 1.4401", "ASTM A313 316", "JIS G 4314 SUS316"]),
    row("EN 10270-3 1.4568", Precipitation, &DRAWN_4568, "EN 13906-1:2013, as drawn; tempered wire is given as 78 000 MPa", Memory, (7.8, Memory),
        &["EN 10270-3 1.4568 tempered", "ASTM A313 631", "JIS G 4314 SUS631J1"]),
    row("EN 10270-3 1.4568 tempered", Precipitation, &TEMPERED_4568, "EN 13906-1:2013, tempered; wire as drawn is given as 73 000 MPa", Memory, (7.8, Memory),
        &["EN 10270-3 1.4568", "ASTM A313 631", "JIS G 4314 SUS631J1"]),
    row("EN 10089", HotRolled, &HOT_ROLLED, EN, Read, (7.85, Memory), &["JIS G 4801"]),
    row("EN 12166 CuSn6", NonFerrous, &CU_SN6, EN, Memory, (8.8, Memory), &["ASTM B159"]),
    row("EN 12166 CuZn36", NonFerrous, &CU_ZN36, EN, Memory, (8.4, Memory), &[]),
    row("EN 12166 CuBe2", NonFerrous, &CU_BE2, EN, Memory, (8.3, Memory), &["ASTM B197", "ASTM B197 pretempered"]),
    row("EN 12166 CuCo2Be", NonFerrous, &CU_CO2_BE, EN, Memory, (8.8, Memory), &[]),
    row("ASTM A227", ColdDrawn, &HARD_DRAWN, MH, Read, (7.85, Practice), &["EN 10270-1", "JIS G 3521"]),
    row("ASTM A228", ColdDrawn, &MUSIC, MH, Read, (7.85, Practice), &["EN 10270-1", "JIS G 3522"]),
    row("ASTM A229", Tempered, &OIL_TEMPERED, MH, Read, (7.85, Practice), &["EN 10270-2", "JIS G 3560"]),
    row("ASTM A230", Tempered, &TEMPERED_295, MH, Read, (7.85, Practice), &["EN 10270-2", "JIS G 3560"]),
    // Shigley's table 10-5 gives E 29.5 Mpsi for A231/A232, the handbook 28.5.
    row("ASTM A231", Tempered, &OIL_TEMPERED, MH, Read, (7.85, Practice), &["EN 10270-2", "JIS G 3560"]),
    row("ASTM A232", Tempered, &OIL_TEMPERED, MH, Read, (7.85, Practice), &["EN 10270-2", "JIS G 3560"]),
    row("ASTM A401", Tempered, &TEMPERED_295, MH, Read, (7.85, Practice), &["EN 10270-2", "JIS G 3560"]),
    row("ASTM A877", Tempered, &TEMPERED_295, "Machinery's Handbook, 31st ed., table 20, as A401", Practice, (7.85, Practice), &["EN 10270-2", "JIS G 3560"]),
    row("ASTM A313 302", Austenitic, &STAINLESS, MH, Read, (7.9, Practice), &["EN 10270-3 1.4310", "EN 10270-3 1.4310 tempered", "JIS G 4314 SUS304"]),
    row("ASTM A313 304", Austenitic, &STAINLESS, MH, Read, (7.9, Practice), &["EN 10270-3 1.4310", "EN 10270-3 1.4310 tempered", "JIS G 4314 SUS304"]),
    row("ASTM A313 316", Austenitic, &STAINLESS, MH, Read, (7.95, Practice), &["EN 10270-3 1.4401", "EN 10270-3 1.4401 tempered", "JIS G 4314 SUS316"]),
    row("ASTM A313 631", Precipitation, &PH_17_7, "Machinery's Handbook, 31st ed., table 20, 17-7 PH", Read, (7.8, Practice),
        &["EN 10270-3 1.4568", "EN 10270-3 1.4568 tempered", "JIS G 4314 SUS631J1"]),
    row("ASTM B134", NonFerrous, &BRASS, "Machinery's Handbook, 31st ed., table 20, spring brass 70-30", Read, (8.4, Practice), &[]),
    row("ASTM B159", NonFerrous, &P_BRONZE, "Machinery's Handbook, 31st ed., table 20, phosphor bronze 5 % Sn", Read, (8.8, Practice), &["EN 12166 CuSn6"]),
    row("ASTM B197", NonFerrous, &BE_CU, "Machinery's Handbook, 31st ed., table 20, cold drawn", Read, (8.3, Practice), &["EN 12166 CuBe2", "ASTM B197 pretempered"]),
    row("ASTM B197 pretempered", NonFerrous, &BE_CU_PRETEMPERED, "Machinery's Handbook, 31st ed., table 20, pretempered", Read, (8.3, Practice),
        &["EN 12166 CuBe2", "ASTM B197"]),
    row("JIS G 3521", ColdDrawn, &JIS_STEEL, JIS, Read, (7.85, Practice), &["EN 10270-1", "ASTM A227"]),
    row("JIS G 3522", ColdDrawn, &JIS_STEEL, JIS, Read, (7.85, Practice), &["EN 10270-1", "ASTM A228"]),
    row("JIS G 3560", Tempered, &JIS_STEEL, JIS, Read, (7.85, Practice), &["EN 10270-2", "ASTM A229", "ASTM A401"]),
    row("JIS G 4801", HotRolled, &JIS_STEEL, JIS, Read, (7.85, Practice), &["EN 10089"]),
    row("JIS G 4314 SUS304", Austenitic, &JIS_304, JIS, Read, (7.9, Practice), &["EN 10270-3 1.4310", "EN 10270-3 1.4310 tempered", "ASTM A313 302"]),
    row("JIS G 4314 SUS316", Austenitic, &JIS_304, JIS, Read, (7.95, Practice), &["EN 10270-3 1.4401", "EN 10270-3 1.4401 tempered", "ASTM A313 316"]),
    row("JIS G 4314 SUS631J1", Precipitation, &JIS_631, JIS, Read, (7.8, Practice), &["EN 10270-3 1.4568", "EN 10270-3 1.4568 tempered", "ASTM A313 631"]),
];

const fn row(
    name: &'static str,
    kind: Kind,
    bands: &'static [Band],
    source: &'static str,
    mark: Mark,
    density: (f64, Mark),
    alike: &'static [&'static str],
) -> Family {
    Family {
        name,
        kind,
        bands,
        source,
        mark,
        density: density.0,
        density_mark: density.1,
        alike,
    }
}

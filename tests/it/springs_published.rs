//! Rate, stress and solid length against published examples. The formulas hold in any consistent units, so inch examples
//! are computed in inches and pounds-force.

use coilassay::formula::{Ends, Forming, rate, solid_length, stress};
use coilassay::units::Newtons;

use crate::published::Misses;

const SH_10_1: &str = "Shigley's Mechanical Engineering Design, example 10-1 (from memory)";
const SH_P10_3: &str = "Shigley's, problem 10-3, solutions 10th ed.";
const MOTT: &str = "Mott, Machine Elements in Mechanical Design, section 19-6, p. 751";
const BH_10_17: &str = "Bhandari, Design of Machine Elements, example 10.17";
const BH_10_19: &str = "Bhandari, Design of Machine Elements, example 10.19";
const EN_15800: &str = "EN 15800 worked table W1-W3 (G = 81 500 MPa)";

#[rustfmt::skip] // keeps the table a table; `within` follows the digits the source prints
#[test]
fn rates() {
    let rows = [
        // source, d, D, n, G, printed rate, within (relative)
        (SH_10_1, 0.037, 0.400, 10.5, 11.85e6, 4.13, 1.3e-3),
        (SH_P10_3, 2.5, 28.5, 13.0, 81_000.0, 1.314, 4e-4),
        (MOTT, 0.0625, 0.60, 12.36, 11.2e6, 8.0, 6e-3),
        (BH_10_19, 6.0, 36.0, 10.0, 81_370.0, 28.253_472, 1e-7),
        (BH_10_19, 5.0, 30.0, 8.0, 81_370.0, 29.430_700, 1e-6),
        (EN_15800, 2.0, 16.0, 8.5, 81_500.0, 4.681_76, 1e-6),
        (EN_15800, 5.0, 40.0, 6.5, 81_500.0, 15.305_74, 4e-7),
        (EN_15800, 1.0, 12.0, 12.5, 81_500.0, 0.471_64, 1.1e-5),
        ("by hand, 70000*1^4/(8*8^3*4)", 1.0, 8.0, 4.0, 7e4, 4.272_460_937_5, 1e-14),
    ];
    let mut misses = Misses::default();
    for (source, d, coil, n, shear, printed, within) in rows {
        misses.relative(source, rate(d, coil, n, shear).unwrap().get(), printed, within);
    }
    misses.none();
}

/// EN 15800 and Bhandari's springs by the index: static, EN (= Bergsträsser) and Wahl factors, Shigley's table as printed.
#[test]
fn stress_factors() {
    // source: recomputed table of Ks, Wahl and Bergsträsser in Shigley's ch. 10, eq. 10-3 to 10-5; five printed decimals.
    let rows = [
        (4.0, 1.125_00, 1.403_75, 1.384_62),
        (5.0, 1.100_00, 1.310_50, 1.294_12),
        (6.0, 1.083_33, 1.252_50, 1.238_10),
        (8.0, 1.062_50, 1.184_02, 1.172_41),
        (10.0, 1.050_00, 1.144_83, 1.135_14),
        (12.0, 1.041_67, 1.119_43, 1.111_11),
        (16.0, 1.031_25, 1.088_44, 1.081_97),
        (20.0, 1.025_00, 1.070_22, 1.064_94),
    ];
    let mut misses = Misses::default();
    for (index, of_static, of_wahl, of_en) in rows {
        let found = stress(Newtons::try_from(100.0).unwrap(), 2.0, 2.0 * index).unwrap();
        let over = |corrected: f64| corrected / found.uncorrected.get();
        let source = format!("Shigley's ch. 10, w = {index}");
        misses.relative(&source, over(found.with_static.get()), of_static, 5e-6);
        misses.relative(&source, over(found.with_wahl.get()), of_wahl, 5e-6);
        misses.relative(&source, over(found.with_dynamic.get()), of_en, 5e-6);
    }
    misses.none();
}

#[test]
fn stresses() {
    let mut misses = Misses::default();
    let at =
        |load: f64, d: f64, coil: f64| stress(Newtons::try_from(load).unwrap(), d, coil).unwrap();
    // Mott prints 86 450 and 106 750 psi with the Wahl factor rounded to 1.15; recomputed 86 364 and 106 622.
    misses.relative(
        MOTT,
        at(12.0, 0.0625, 0.60).with_wahl.get(),
        86_450.0,
        1.1e-3,
    );
    misses.relative(
        MOTT,
        at(14.82, 0.0625, 0.60).with_wahl.get(),
        106_750.0,
        1.3e-3,
    );
    // Bhandari 10.19: 706.021471 N on 6 x 36, 293.978529 N on 5 x 30, with Wahl's factor at index 6.
    misses.relative(
        BH_10_19,
        at(706.021_471, 6.0, 36.0).with_wahl.get(),
        375.305_136,
        1e-8,
    );
    misses.relative(
        BH_10_19,
        at(293.978_529, 5.0, 30.0).with_wahl.get(),
        225.032_219,
        1e-8,
    );
    // Machinery's Handbook, 31st ed., p. 317: 36 lb in wire 0.0915, outside 13/16, 0.863 of 100 ksi uncorrected → 36/0.863 lb.
    misses.relative(
        "Machinery's Handbook, 31st ed., p. 317",
        at(36.0 / 0.863, 0.0915, 0.8125 - 0.0915).uncorrected.get(),
        1e5,
        5e-4,
    );
    misses.none();
}

#[test]
fn nested_springs_share_by_stiffness() {
    let mut misses = Misses::default();
    // Bhandari 10.17, rounded sizes: 10 x 60 n 6 and 7 x 42 n 10; recomputed 78.482 + 32.962 = 111.444 N/mm (G 81 370).
    let outer = rate(10.0, 60.0, 6.0, 81_370.0).unwrap().get();
    let inner = rate(7.0, 42.0, 10.0, 81_370.0).unwrap().get();
    misses.relative(BH_10_17, outer, 78.482, 1e-5);
    misses.relative(BH_10_17, inner, 32.962, 2e-5);
    misses.relative(BH_10_17, outer + inner, 111.444, 1e-5);
    misses.none();
}

#[test]
fn solid_lengths() {
    let mut misses = Misses::default();
    let rows = [
        (
            "Shigley's example 10-1, squared ends counted as (Nt + 1)d (from memory)",
            Ends::Open,
            12.5,
            0.037,
            0.500,
            1.1e-3,
        ),
        (
            "Shigley's, problem 10-3, plain ground",
            Ends::OpenGround,
            14.0,
            2.5,
            35.0,
            1e-12,
        ),
        (MOTT, Ends::ClosedGround, 14.36, 0.0625, 0.898, 6e-4),
        (
            "Machinery's Handbook, 31st ed., p. 319: 11 coils of 0.0915 print 1.0",
            Ends::ClosedGround,
            11.0,
            0.0915,
            1.0,
            0.0066,
        ),
        (
            "EN 13906-1:2013, closed, not ground: (nt + 1.5)d",
            Ends::Closed,
            10.0,
            2.0,
            23.0,
            1e-12,
        ),
    ];
    for (source, ends, total, wire, printed, within) in rows {
        misses.relative(
            source,
            solid_length(ends, Forming::Cold, total, wire),
            printed,
            within,
        );
    }
    misses.none();
}

//! Worked examples of textbooks through the whole of `expect`, in millimetres and in inches.

use coilassay::formula::{Ends, pitch};
use coilassay::record::{DrawingFinding, Expected, Permissible};

use crate::drawn::{INCH, LBF, PSI, Spring, at_load, both};
use crate::published::Misses;

const LBF_PER_INCH: f64 = LBF / INCH;
const KPSI: f64 = 1000.0 * PSI;

fn limit(of: &Expected, rule: Permissible) -> f64 {
    let line = of.strength.iter().find(|line| line.rule == rule).unwrap();
    line.limit_mpa.get()
}

/// Shigley's Mechanical Engineering Design, example 10-1 (from memory): music wire 0.037 in, OD 7/16 in, squared, 12.5 coils.
/// The book rounds Ssy to 146 kpsi and D 0.4005 to 0.400 in (0.4 % of k). Its solid length (Nt + 1)·d is the textbook's; EN 13906-1 has (nt + 1.5)·d.
#[test]
fn shigley_10_1() {
    let spring = Spring {
        name: "spring",
        wire: 0.037 * INCH,
        coil: ("outside_diameter", 0.4375 * INCH),
        active: 10.5,
        total: 12.5,
        ends: "closed",
        free: 2.10 * INCH, // the book's 2.06 leaves too little above EN's solid length
        material: Ok("ASTM A228"),
    };
    let of = both("single", &[spring], at_load(6.46 * LBF));
    let mut misses = Misses::default();
    misses.relative(
        "k 4.13 lbf/in",
        of.rate_n_per_mm.get() / LBF_PER_INCH,
        4.13,
        5e-3,
    );
    misses.relative(
        "D 0.400 in",
        of.theory.members[0].coil_mm.get() / INCH,
        0.400,
        1.3e-3,
    );
    misses.relative("C 10.8", of.members[0].index.get(), 10.8, 5e-3);
    let ssy = limit(&of, Permissible::TextbookDynamicFactor);
    misses.relative("Ssy 146 kpsi, 0.45 Sut", ssy / KPSI, 146.0, 3.5e-3);
    let stress = of.members[0].stress_mpa.unwrap();
    misses.relative(
        "stress at 6.46 lbf is Ssy",
        stress.dynamic.get() / KPSI,
        146.0,
        3.5e-3,
    );
    misses.relative(
        "K_B 1.124",
        stress.dynamic.get() / stress.uncorrected.get(),
        1.124,
        4.5e-4,
    );
    misses.relative(
        "y 1.56 in",
        of.deflection_mm.unwrap().get() / INCH,
        1.56,
        8e-3,
    );
    misses.relative(
        "p 0.186 in",
        pitch(Ends::Closed, 2.06, 0.037, 10.5),
        0.186,
        3e-3,
    );
    misses.none();
}

/// Shigley's, example 10-2 (from memory): music wire, 20 lbf at 2 in, so 10 lbf/in, for eight wires; D and Na as printed.
#[test]
fn shigley_10_2() {
    let mut misses = Misses::default();
    for (d, index, coil, active, free) in [
        (0.063, 6.205, 0.391, 39.1, 4.887),
        (0.067, 7.153, 0.479, 26.9, 4.236),
        (0.071, 8.143, 0.578, 19.3, 3.813),
        (0.075, 9.178, 0.688, 14.2, 3.519),
        (0.080, 10.53, 0.843, 10.1, 3.264),
        (0.085, 11.96, 1.017, 7.3, 3.090),
        (0.090, 13.46, 1.211, 5.4, 2.968),
        (0.095, 15.02, 1.427, 4.1, 2.881),
    ] {
        let spring = Spring::mean(d * INCH, coil * INCH, active, free * INCH, Ok("ASTM A228"));
        let of = both("single", &[spring], at_load(20.0 * LBF));
        // D to three and Na to two or three digits: 3·0.0005/D and 0.05/Na.
        let within = 3.0 * 0.0005 / coil + 0.05 / active + 1e-3;
        misses.relative(
            &format!("d {d}: 10 lbf/in"),
            of.rate_n_per_mm.get() / LBF_PER_INCH,
            10.0,
            within,
        );
        misses.relative(
            &format!("d {d}: C"),
            of.members[0].index.get(),
            index,
            0.0006 / coil + 5e-4,
        );
        // L0 = Ls + 1.15·2 in, Ls = (Na + 2)·d
        let solid = of.members[0].solid_length_mm.get() / INCH;
        misses.absolute(&format!("d {d}: L0"), solid + 2.3, free, 0.05 * d + 6e-4);
    }
    misses.none();
}

/// Shigley's, problem 10-3, solutions 10th ed.: music wire 2.5 mm, OD 31, plain ground, 14 coils. The book prints L0 162.8
/// with a rounded rate (recomputed 162.72) and a critical length of 149.9 mm for α 0.5, so that it "needs support".
#[test]
fn shigley_problem_10_3() {
    let spring = Spring {
        name: "spring",
        wire: 2.5,
        coil: ("outside_diameter", 31.0),
        active: 13.0,
        total: 14.0,
        ends: "open ground",
        free: 162.8,
        material: Ok("ASTM A228"),
    };
    let of = both("single", &[spring], at_load(167.9));
    let mut misses = Misses::default();
    misses.relative("k 1.314 N/mm", of.rate_n_per_mm.get(), 1.314, 4e-4);
    misses.relative("C 11.4", of.members[0].index.get(), 11.4, 5e-4);
    misses.relative("Ls 35 mm", of.members[0].solid_length_mm.get(), 35.0, 1e-12);
    let ssy = limit(&of, Permissible::TextbookDynamicFactor);
    misses.relative("Ssy 871.2 MPa", ssy, 871.2, 1e-4);
    misses.relative(
        "Fs 167.9 N is at Ssy",
        of.members[0].stress_mpa.unwrap().dynamic.get(),
        871.2,
        4e-4,
    );
    misses.relative(
        "L0 less Ls is Fs/k",
        of.deflection_mm.unwrap().get(),
        162.8 - 35.0,
        1e-3,
    );
    misses.none();
    assert!(
        of.findings
            .iter()
            .any(|one| matches!(one, DrawingFinding::Buckles { stated: false, .. }))
    );
}

/// Mott, Machine Elements in Mechanical Design, section 19-6, p. 751, G 11.2 Mpsi. The book's stresses have Wahl's factor
/// rounded to 1.15.
#[test]
fn mott_19_6() {
    let spring = Spring::mean(
        0.0625 * INCH,
        0.60 * INCH,
        12.36,
        2.75 * INCH,
        Err(11.2e6 * PSI),
    );
    let of = both("single", std::slice::from_ref(&spring), at_load(12.0 * LBF));
    let mut misses = Misses::default();
    misses.relative(
        "k 8.0 lb/in",
        of.rate_n_per_mm.get() / LBF_PER_INCH,
        8.0,
        6e-3,
    );
    misses.relative("C 9.60", of.members[0].index.get(), 9.60, 1e-12);
    misses.relative(
        "Ls 0.898 in",
        of.members[0].solid_length_mm.get() / INCH,
        0.898,
        6e-4,
    );
    misses.relative(
        "86 450 psi at 12 lb",
        of.members[0].stress_mpa.unwrap().wahl.get() / PSI,
        86_450.0,
        1.1e-3,
    );
    let solid = of.theory.members[0].stress.last().unwrap();
    misses.relative("Fs 14.8 lb", solid.load_n.get() / LBF, 14.8, 3.4e-3);
    misses.relative(
        "106 750 psi at solid",
        solid.wahl_mpa.get() / PSI,
        106_750.0,
        1.3e-3,
    );
    misses.none();
}

/// Machinery's Handbook, 31st ed., p. 317–319: 36 lb at 1.25 in, OD 13/16 in, wire 0.0915 in, 9.1 active coils.
#[test]
fn handbook_317() {
    let spring = Spring {
        coil: ("outside_diameter", 0.8125 * INCH),
        ..Spring::mean(0.0915 * INCH, 0.0, 9.1, 2.5 * INCH, Err(11.2e6 * PSI))
    };
    let of = both("single", &[spring], at_load(36.0 * LBF));
    let mut misses = Misses::default();
    misses.relative(
        "1.25 in at 36 lb",
        of.deflection_mm.unwrap().get() / INCH,
        1.25,
        5.5e-3,
    );
    misses.relative(
        "36/0.863 lb is 100 ksi",
        of.members[0].stress_mpa.unwrap().uncorrected.get() / PSI,
        86_300.0,
        6e-4,
    );
    misses.none();
}

/// Bhandari, Design of Machine Elements, example 10.1: wire 7, D 42, 8 active coils, G 81 370, 1250 N; free length
/// 109.337611 = 70 + 9·1 + 30.337611 mm.
#[test]
fn bhandari_10_1() {
    let spring = Spring::mean(7.0, 42.0, 8.0, 109.337_611, Err(81_370.0));
    let of = both("single", &[spring], at_load(1250.0));
    let mut misses = Misses::default();
    misses.relative(
        "deflection 30.337611",
        of.deflection_mm.unwrap().get(),
        30.337_611,
        2e-8,
    );
    misses.relative("solid 70", of.members[0].solid_length_mm.get(), 70.0, 1e-12);
    // The book's pitch is L0/(Nt − 1); ours, Shigley's table 10-1, is (L0 − 2d)/Na.
    misses.relative(
        "pitch",
        pitch(Ends::ClosedGround, 109.337_611, 7.0, 8.0),
        (109.337_611 - 14.0) / 8.0,
        1e-12,
    );
    misses.none();
}

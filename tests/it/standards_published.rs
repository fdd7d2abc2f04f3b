//! Tolerances by standard: the worked table of EN 15800, its table of diameters, its ranges, and what a drawing makes of them.

use coilassay::formula::Ends;
use coilassay::job::Ask;
use coilassay::record::Expected;
use coilassay::standard::{Drawn, Standard, Toleranced};

use crate::drawn::{INCH, LBF, Spring, expected, text};
use crate::published::Misses;

const G: f64 = 81_500.0;

/// Name; d, D, n, F; loads and free lengths by grade.
type Worked = (&'static str, [f64; 4], [f64; 3], [f64; 3]);

/// EN 15800, worked table (G = 81 500 MPa): d, D, n, F; A_F in N and A_L0 in mm for grades 1, 2, 3. Grade 2 is certain; that Q
/// multiplies the whole bracket in 1 and 3 is from memory.
#[rustfmt::skip] // keeps the table a table
const WORKED: [Worked; 3] = [
    ("W1", [2.0, 16.0, 8.5, 100.0], [5.0956, 8.0883, 12.9413], [0.8866, 1.4072, 2.2516]),
    ("W2", [5.0, 40.0, 6.5, 900.0], [29.3031, 46.5129, 74.4206], [1.3588, 2.1569, 3.4510]),
    ("W3", [1.0, 12.0, 12.5, 20.0], [1.0390, 1.6492, 2.6387], [1.8022, 2.8606, 4.5769]),
];

pub(crate) fn spring(d: f64, coil: f64, active: f64, free: f64) -> Drawn {
    Drawn {
        wire: d,
        coil,
        active,
        free,
        rate: G * d.powi(4) / (8.0 * coil.powi(3) * active),
        ends: Ends::ClosedGround,
        cold: true,
    }
}

/// A load for a standard that does not look at its length.
pub(crate) const fn load(newtons: f64) -> Toleranced {
    Toleranced::Load {
        nominal: newtons,
        length: 50.0,
    }
}

fn grade(number: usize) -> Standard {
    Standard::WORDS[number - 1].1
}

fn required<'a>(of: &'a Expected, name: &str) -> &'a coilassay::record::ExpectedRequirement {
    of.requirements.iter().find(|one| one.name == name).unwrap()
}

#[test]
fn worked_table_of_en_15800() {
    let mut misses = Misses::default();
    for (name, [d, coil, active, newtons], loads, lengths) in WORKED {
        for number in 1..=3 {
            let drawn = spring(d, coil, active, 100.0);
            let of = |what| grade(number).half_width(&drawn, what).unwrap().half_width;
            let source = format!("{name} grade {number}");
            misses.absolute(&source, of(load(newtons)), loads[number - 1], 5.1e-5);
            misses.absolute(
                &source,
                of(Toleranced::FreeLength),
                lengths[number - 1],
                5.1e-5,
            );
        }
    }
    misses.none();
}

/// The same through a drawing, in millimetres and in inches, by the limit's own key and by the drawing's general one.
#[test]
fn worked_table_through_a_drawing() {
    let mut misses = Misses::default();
    for (name, [d, coil, active, load], loads, lengths) in WORKED {
        let free = 60.0 + 4.0 * coil;
        let rate = spring(d, coil, active, free).rate;
        let drawn = Spring::mean(d, coil, active, free, Err(G));
        for number in 1..=3 {
            for (inches, general) in [(false, false), (true, false), (false, true)] {
                let (length, force) = if inches { (INCH, LBF) } else { (1.0, 1.0) };
                let standard = format!("EN 15800 grade {number}");
                let own = if general {
                    String::new()
                } else {
                    format!(", standard = \"{standard}\"")
                };
                let more = format!(
                    "[requirements]\nfree_length = {{ nominal = {}{own} }}\n[[requirements.load]]\nat_length = {}\nnominal = {}{}\n",
                    free / length,
                    (free - load / rate) / length,
                    load / force,
                    own.replace(", ", "\n")
                );
                let mut file = text("single", std::slice::from_ref(&drawn), inches, &more);
                if general {
                    file = file.replace(
                        "number = \"X\"",
                        &format!("number = \"X\"\ntolerances_by = \"{standard}\""),
                    );
                }
                let of = expected(&file, Ask::Drawing).unwrap_or_else(|fault| panic!("{fault:?}"));
                let half = |name: &str| {
                    let one = required(&of, name);
                    (one.upper.unwrap().get() - one.lower.unwrap().get()) / 2.0
                };
                let source = format!("{name} grade {number}, inches {inches}, general {general}");
                misses.absolute(&source, half("load"), loads[number - 1], 5.1e-5);
                misses.absolute(&source, half("free_length"), lengths[number - 1], 5.1e-5);
                let words = required(&of, "load").standard.clone().unwrap();
                assert_eq!(words.contains("from memory"), number != 2, "{words}");
                assert!(of.agrees, "{source}: {:?}", of.findings);
            }
        }
    }
    misses.none();
}

/// EN 15800, coil diameters: D over … to, the upper bound included; index 4 to 8, 8 to 14, 14 to 20.
#[test]
fn coil_diameters_of_en_15800() {
    let mut misses = Misses::default();
    for (coil, index, number, wanted) in [
        (1.0, 8.0, 2, 0.07),
        (1.01, 8.0, 2, 0.08),
        (4.0, 8.1, 1, 0.10),
        (6.3, 14.0, 3, 0.50),
        (6.3, 14.1, 3, 0.60),
        (16.0, 8.0, 2, 0.30),
        (16.0, 8.01, 2, 0.35),
        (25.0, 6.0, 1, 0.20),
        (31.5, 12.0, 2, 0.50),
        (40.0, 15.0, 3, 1.50),
        (50.0, 8.0, 2, 0.60),
        (63.0, 9.0, 2, 1.00),
        (80.0, 8.0, 1, 0.50),
        (125.0, 15.0, 2, 2.20),
        (200.0, 16.0, 2, 3.30),
        (200.0, 16.0, 3, 6.60), // from memory
    ] {
        let drawn = spring(coil / index, coil, 8.5, 100.0);
        let found = grade(number)
            .half_width(&drawn, Toleranced::CoilDiameter)
            .unwrap();
        misses.absolute(
            &format!("D {coil}, w {index}, grade {number}"),
            found.half_width,
            wanted,
            1e-12,
        );
    }
    let memory = |coil: f64, number| {
        let drawn = spring(coil / 16.0, coil, 8.5, 100.0);
        grade(number)
            .half_width(&drawn, Toleranced::CoilDiameter)
            .unwrap()
            .source
    };
    assert!(memory(200.0, 3).contains("from memory") && !memory(200.0, 2).contains("from memory"));
    misses.none();
}

/// e1 = 0.03, 0.05, 0.08 of L0 and e2 = 0.015, 0.03, 0.06 of De (from memory), ground ends only.
#[test]
fn squareness_and_parallelism_of_en_15800() {
    let drawn = spring(4.0, 32.0, 7.5, 90.0);
    for (number, e1, e2) in [(1, 2.7, 0.54), (2, 4.5, 1.08), (3, 7.2, 2.16)] {
        let of = |what| grade(number).half_width(&drawn, what).unwrap();
        let (square, parallel) = (of(Toleranced::Squareness), of(Toleranced::Parallelism));
        assert!((square.half_width - e1).abs() < 1e-12 && (parallel.half_width - e2).abs() < 1e-12);
        assert!(square.source.contains("from memory"));
    }
    let open = Drawn {
        ends: Ends::Closed,
        ..drawn
    };
    assert!(grade(2).half_width(&open, Toleranced::Squareness).is_err());
}

/// 0.07 ≤ d ≤ 16, 0.63 ≤ D ≤ 200, L0 ≤ 630, n ≥ 2, 4 ≤ w ≤ 20: outside it is a fault that names the quantity.
#[test]
fn ranges_are_enforced() {
    for (drawn, said) in [
        (spring(0.069, 0.7, 8.5, 10.0), "wire diameter"),
        (spring(16.1, 160.0, 8.5, 500.0), "wire diameter"),
        (spring(0.1, 0.62, 8.5, 5.0), "mean coil diameter"),
        (spring(12.0, 201.0, 8.5, 500.0), "mean coil diameter"),
        (spring(4.0, 32.0, 8.5, 631.0), "free length"),
        (spring(4.0, 32.0, 1.9, 90.0), "active coils"),
        (
            spring(4.0, 15.9, 8.5, 90.0),
            "index w 3.975, it covers 4 to 20",
        ),
        (spring(4.0, 80.1, 8.5, 90.0), "index w"),
    ] {
        let fault = grade(2).half_width(&drawn, load(10.0)).unwrap_err();
        assert!(fault.to_string().contains(said), "{said}: {fault}");
    }
    let hot = Drawn {
        cold: false,
        ..spring(12.0, 80.0, 6.0, 250.0)
    };
    let fault = grade(2)
        .half_width(&hot, Toleranced::FreeLength)
        .unwrap_err();
    assert!(fault.to_string().contains("coiled cold only"), "{fault}");
    for drawn in [
        spring(0.07, 0.63, 2.0, 10.0),
        spring(16.0, 200.0, 8.5, 630.0),
        spring(4.0, 16.0, 8.5, 90.0),
        spring(4.0, 80.0, 8.5, 90.0),
    ] {
        assert!(grade(2).half_width(&drawn, load(10.0)).is_ok(), "{drawn:?}");
    }
}

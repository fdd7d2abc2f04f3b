//! Tolerances by JIS B 2704-2 against its printed shares and least values.

use coilassay::job::Ask;
use coilassay::standard::{Drawn, Standard, Toleranced};

use crate::drawn::expected;
use crate::published::Misses;
use crate::standards_drawn::sample;
use crate::standards_published::{load, spring};

/// d, D, n, L0.
type Sizes = [f64; 4];
const FEW: Sizes = [4.0, 32.0, 7.5, 90.0]; // w 8
const MANY: Sizes = [1.0, 12.0, 12.0, 30.0]; // w 12
const SLENDER: Sizes = [1.0, 20.0, 5.0, 60.0]; // w 20

/// What, of which spring, grade, half-width as printed: JIS B 2704-2 (2018).
type Row = (&'static str, Sizes, usize, Toleranced, f64);
#[rustfmt::skip] // keeps the table a table
const ROWS: [Row; 16] = [
    ("load, few coils, grade 1", FEW, 1, load(200.0), 10.0),
    ("load, few coils, grade 2", FEW, 2, load(200.0), 20.0),
    ("rate, few coils, grade 3", FEW, 3, Toleranced::Rate(10.0), 1.5),
    ("load, many coils, grade 1", MANY, 1, load(100.0), 4.0),
    ("rate, many coils, grade 2", MANY, 2, Toleranced::Rate(10.0), 0.8),
    ("load, many coils, grade 3", MANY, 3, load(100.0), 12.0),
    ("L0 to w 8, grade 1", FEW, 1, Toleranced::FreeLength, 0.9),
    ("L0 to w 8, grade 2", FEW, 2, Toleranced::FreeLength, 1.8),
    ("L0 to w 15, grade 1, least", MANY, 1, Toleranced::FreeLength, 0.6),
    ("L0 to w 15, grade 2", MANY, 2, Toleranced::FreeLength, 0.9),
    ("L0 to w 22, grade 3", SLENDER, 3, Toleranced::FreeLength, 3.6),
    ("coil to w 8, grade 1", FEW, 1, Toleranced::CoilDiameter, 0.32),
    ("coil to w 8, grade 3", FEW, 3, Toleranced::CoilDiameter, 0.8),
    ("coil to w 15, grade 1, least", MANY, 1, Toleranced::CoilDiameter, 0.2),
    ("coil to w 15, grade 3, least", MANY, 3, Toleranced::CoilDiameter, 0.5),
    ("lean, grade 2", FEW, 2, Toleranced::Squareness, 4.5),
];

fn drawn([d, coil, active, free]: Sizes) -> Drawn {
    spring(d, coil, active, free)
}

fn jis(grade: usize) -> Standard {
    Standard::WORDS[3 + grade].1
}

#[test]
fn shares_and_least_values() {
    let mut misses = Misses::default();
    for (source, sizes, grade, what, wanted) in ROWS {
        let found = jis(grade).half_width(&drawn(sizes), what).unwrap();
        misses.absolute(source, found.half_width, wanted, 1e-9);
    }
    misses.none();
}

#[test]
fn ranges_and_what_it_does_not_give() {
    for (drawn, what, said) in [
        (
            spring(4.0, 32.0, 2.5, 90.0),
            load(1.0),
            "active coils n 2.5",
        ),
        (drawn(SLENDER), Toleranced::CoilDiameter, "covers 3 to 15"),
        (
            spring(4.0, 11.0, 5.0, 90.0),
            Toleranced::FreeLength,
            "covers 3 to 22",
        ),
        (
            drawn(FEW),
            Toleranced::Parallelism,
            "no tolerance for parallelism",
        ),
    ] {
        let fault = jis(2).half_width(&drawn, what).unwrap_err().to_string();
        assert!(fault.contains(said), "{said}: {fault}");
    }
    let with_rate = sample(&[(
        "nominal = 212.0\ntolerance = \"8 %\"",
        "nominal = 212.0\nstandard = \"JIS B 2704-2 grade 2\"",
    )]);
    let fault = format!("{:?}", expected(&with_rate, Ask::Drawing).unwrap_err());
    assert!(fault.contains("where a rate is specified"), "{fault}");
}

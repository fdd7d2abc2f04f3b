//! Tolerances by Machinery's Handbook, 31st ed., tables 8, 10 and 11 (squared and ground), at every printed point.

use coilassay::formula::Ends;
use coilassay::standard::{Drawn, Standard, Toleranced};

use crate::drawn::INCH;
use crate::published::Misses;
use crate::standards_published::spring;

/// Table 8: ± inch for each inch of free length, by active coils to the inch and index.
const TABLE_8: &str = "\
- 4 6 8 10 12 14 16
0.5 .010 .011 .012 .013 .015 .016 .016
1 .011 .013 .015 .016 .017 .018 .019
2 .013 .015 .017 .019 .020 .022 .023
4 .016 .018 .021 .023 .024 .026 .027
8 .019 .022 .024 .026 .028 .030 .032
12 .021 .024 .027 .030 .032 .034 .036
16 .022 .026 .029 .032 .034 .036 .038
20 .023 .027 .031 .034 .036 .038 .040";
/// Table 10: squareness, ± degrees, by L0/D and index.
const TABLE_10: &str = "\
- 4 6 8 10 12 14 16
0.5 3.0 3.0 3.5 3.5 3.5 3.5 4.0
1.0 2.5 3.0 3.0 3.0 3.0 3.5 3.5
1.5 2.5 2.5 2.5 3.0 3.0 3.0 3.0
2.0 2.5 2.5 2.5 2.5 3.0 3.0 3.0
3.0 2.0 2.5 2.5 2.5 2.5 2.5 3.0
4.0 2.0 2.0 2.5 2.5 2.5 2.5 2.5
6.0 2.0 2.0 2.0 2.5 2.5 2.5 2.5
8.0 2.0 2.0 2.0 2.0 2.5 2.5 2.5
10.0 2.0 2.0 2.0 2.0 2.0 2.5 2.5
12.0 2.0 2.0 2.0 2.0 2.0 2.0 2.5";
/// Table 11: load, ± %, by length tolerance (± inch) and deflection (inch); `-` is not printed.
const TABLE_11: &str = "\
- .05 .10 .15 .20 .25 .30 .40 .50 .75 1.00 1.50 2.00 3.00 4.00 6.00
.005 12 7 6 5 - - - - - - - - - - -
.010 - 12 8.5 7 6.5 5.5 5 - - - - - - - -
.020 - 22 15.5 12 10 8.5 7 6 5 - - - - - -
.030 - - 22 17 14 12 9.5 8 6 5 - - - - -
.040 - - - 22 18 15.5 12 10 7.5 6 5 - - - -
.050 - - - - 22 19 14.5 12 9 7 5.5 - - - -
.060 - - - - 25 22 17 14 10 8 6 5 - - -
.070 - - - - - 25 19.5 16 11 9 6.5 5.5 - - -
.080 - - - - - - 22 18 12.5 10 7.5 6 5 - -
.090 - - - - - - 25 20 14 11 8 6 5 - -
.100 - - - - - - - 22 15.5 12 8.5 7 5.5 - -
.200 - - - - - - - - - 22 15.5 12 8.5 7 5.5
.300 - - - - - - - - - - 22 17 12 9.5 7
.400 - - - - - - - - - - - 21 15 12 8.5
.500 - - - - - - - - - - - 25 18.5 14.5 10.5";

/// Row, column, cell.
fn cells(table: &str) -> Vec<(f64, f64, Option<f64>)> {
    let number = |word: &str| word.parse::<f64>().ok();
    let mut lines = table.lines();
    let columns: Vec<f64> = lines
        .next()
        .unwrap()
        .split(' ')
        .skip(1)
        .filter_map(number)
        .collect();
    let mut found = Vec::new();
    for line in lines {
        let mut words = line.split(' ');
        let row = number(words.next().unwrap()).unwrap();
        found.extend(
            columns
                .iter()
                .zip(words)
                .map(|(column, cell)| (row, *column, number(cell))),
        );
    }
    found
}

fn handbook() -> Standard {
    let word = Standard::WORDS
        .iter()
        .find(|(word, _)| *word == "Machinery's Handbook");
    word.unwrap().1
}

/// Wire 0.1 in; index, active coils to the inch, free length in inches.
fn inches(index: f64, coils: f64, free: f64) -> Drawn {
    spring(0.1 * INCH, 0.1 * index * INCH, coils * free, free * INCH)
}

fn half(drawn: &Drawn, what: Toleranced) -> Result<f64, String> {
    let found = handbook().half_width(drawn, what);
    found
        .map(|found| found.half_width)
        .map_err(|fault| fault.to_string())
}

/// 100 N, so many inches from the free length.
fn load(drawn: &Drawn, deflection: f64) -> Toleranced {
    Toleranced::Load {
        nominal: 100.0,
        length: drawn.free - deflection * INCH,
    }
}

#[test]
fn every_printed_cell() {
    let mut misses = Misses::default();
    let (eight, ten, eleven) = (cells(TABLE_8), cells(TABLE_10), cells(TABLE_11));
    assert_eq!((eight.len(), ten.len(), eleven.len()), (56, 70, 225));
    for (coils, index, cell) in eight {
        let found = half(&inches(index, coils, 3.0), Toleranced::FreeLength).unwrap();
        misses.absolute(
            &format!("table 8, {coils}, {index}"),
            found,
            3.0 * INCH * cell.unwrap(),
            1e-9,
        );
    }
    for (slender, index, cell) in ten {
        let drawn = inches(index, 1.0, slender * 0.1 * index);
        let found = half(&drawn, Toleranced::Squareness).unwrap();
        let wanted = drawn.free * cell.unwrap().to_radians().tan();
        misses.absolute(
            &format!("table 10, {slender}, {index}"),
            found,
            wanted,
            1e-9,
        );
    }
    for (length, deflection, cell) in eleven {
        // Index 4 and half a coil to the inch: 0.010 in for each inch.
        let drawn = inches(4.0, 0.5, length / 0.010);
        let found = half(&drawn, load(&drawn, deflection));
        match (found, cell) {
            (Ok(found), Some(cell)) => misses.absolute(
                &format!("table 11, {length}, {deflection}"),
                found,
                cell,
                1e-9,
            ),
            (Err(fault), None) => assert!(fault.contains("prints no load tolerance"), "{fault}"),
            other => panic!("{length}, {deflection}: {other:?}"),
        }
    }
    misses.none();
}

#[test]
fn between_the_printed_cells_and_beyond_them() {
    let mut misses = Misses::default();
    // By hand. Table 8: (.015 + .017 + .018 + .021)/4; below 0.5 in as 0.5 in; not ground, 1.7 times.
    let found = half(&inches(7.0, 3.0, 2.0), Toleranced::FreeLength).unwrap();
    misses.absolute("table 8, 3, 7", found, 2.0 * INCH * 0.017_75, 1e-9);
    let short = half(&inches(4.0, 2.0, 0.4), Toleranced::FreeLength).unwrap();
    misses.absolute("below 0.5 in", short, 0.5 * INCH * 0.013, 1e-9);
    let closed = Drawn {
        ends: Ends::Closed,
        ..inches(4.0, 2.0, 2.0)
    };
    let found = half(&closed, Toleranced::FreeLength).unwrap();
    misses.absolute("not ground", found, 1.7 * 2.0 * INCH * 0.013, 1e-9);
    // Table 11, ±0.030 in: 8 % at 0.50 in, 6 % at 0.75 in; 1/0.6 lies halfway between 1/0.5 and 1/0.75.
    let drawn = inches(4.0, 0.5, 3.0);
    misses.absolute(
        "table 11",
        half(&drawn, load(&drawn, 0.6)).unwrap(),
        7.0,
        1e-9,
    );
    misses.none();
    let of = handbook().half_width(&drawn, load(&drawn, 0.6)).unwrap();
    assert_eq!(
        of.source,
        "Machinery's Handbook, 31st ed., tables 8 and 11 (interpolated)"
    );
    let of = handbook()
        .half_width(&drawn, Toleranced::FreeLength)
        .unwrap();
    assert_eq!(of.source, "Machinery's Handbook, 31st ed., table 8");
    let hot = Drawn {
        cold: false,
        ..drawn
    };
    let open = Drawn {
        ends: Ends::OpenGround,
        ..drawn
    };
    for (drawn, what, said) in [
        (
            inches(3.9, 2.0, 2.0),
            Toleranced::FreeLength,
            "index w 3.9, it covers 4 to 16",
        ),
        (
            inches(16.1, 2.0, 2.0),
            Toleranced::FreeLength,
            "index w 16.1",
        ),
        (
            inches(8.0, 0.4, 2.0),
            Toleranced::FreeLength,
            "inch of free length 0.4, it covers 0.5 to 20",
        ),
        (inches(8.0, 20.1, 2.0), Toleranced::FreeLength, "20.1"),
        (
            inches(8.0, 2.0, 0.3),
            Toleranced::Squareness,
            "L0/D 0.375, it covers 0.5 to 12",
        ),
        (inches(8.0, 2.0, 9.7), Toleranced::Squareness, "L0/D 12.125"),
        (
            closed,
            load(&closed, 0.5),
            "the load of ends that are not closed and ground",
        ),
        (
            closed,
            Toleranced::Squareness,
            "squareness of ends that are not closed and ground",
        ),
        (
            open,
            Toleranced::FreeLength,
            "the free length of ends that are not closed",
        ),
        (hot, Toleranced::FreeLength, "coiled cold only"),
        (
            drawn,
            load(&drawn, 1.2),
            "a deflection of 1.2 in of a spring whose free length has ±0.03 in",
        ),
        (drawn, load(&drawn, 0.0), "prints no load tolerance"),
        (drawn, load(&drawn, -1.0), "prints no load tolerance"),
        (
            drawn,
            Toleranced::Rate(1.0),
            "no tolerance for the rate in tables 8, 10 and 11",
        ),
        (
            drawn,
            Toleranced::CoilDiameter,
            "the coil diameter in tables",
        ),
        (drawn, Toleranced::Parallelism, "parallelism"),
    ] {
        let fault = half(&drawn, what).unwrap_err();
        assert!(fault.contains(said), "{said}: {fault}");
    }
}

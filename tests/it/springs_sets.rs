//! Sets and stacks, fatigue and frequency: worked examples through the whole of `expect`.

use coilassay::formula::mass;
use coilassay::record::StressPlace;

use crate::drawn::{INCH, LBF, PSI, Spring, at_length, at_load, both, expected, text};
use crate::published::Misses;

const KPSI: f64 = 1000.0 * PSI;

fn two_stages() -> [Spring; 2] {
    [
        Spring {
            name: "outer",
            ..Spring::mean(6.0, 36.0, 10.0, 150.0, Err(81_370.0))
        },
        Spring {
            name: "inner",
            ..Spring::mean(5.0, 30.0, 8.0, 135.0, Err(81_370.0))
        },
    ]
}

/// Bhandari, example 10.19: the inner spring 15 mm shorter, 1000 N. Rates 28.253472 and then 57.684172 N/mm, the knee at
/// 15 mm and 423.802083 N (recomputed); 10.17: the rounded sizes of another pair, 111.444 N/mm (recomputed).
#[test]
fn bhandari_10_19_two_stages() {
    let of = both("nested", &two_stages(), at_load(1000.0));
    let mut misses = Misses::default();
    let [first, second] = of.stages.as_slice() else {
        panic!("{:?}", of.stages)
    };
    misses.relative("stage 1", first.rate_n_per_mm.get(), 28.253_472, 2e-8);
    misses.relative("stage 2", second.rate_n_per_mm.get(), 57.684_172, 2e-8);
    misses.relative("knee", second.from_length_mm.get(), 135.0, 1e-12);
    misses.relative(
        "load at the knee",
        second.from_load_n.get(),
        423.802_083,
        2e-9,
    );
    let (outer, inner) = (&of.members[0], &of.members[1]);
    misses.relative("P1", outer.load_n.unwrap().get(), 706.021_471, 2e-9);
    misses.relative("P2", inner.load_n.unwrap().get(), 293.978_529, 2e-9);
    misses.relative("δ1", of.deflection_mm.unwrap().get(), 24.988_839, 3e-8);
    misses.relative(
        "τ1",
        outer.stress_mpa.unwrap().wahl.get(),
        375.305_136,
        2e-9,
    );
    misses.relative(
        "τ2",
        inner.stress_mpa.unwrap().wahl.get(),
        225.032_219,
        3e-9,
    );
    misses.relative(
        "share",
        outer.load_share.unwrap().get(),
        0.706_021_471,
        2e-9,
    );
    let before = both("nested", &two_stages(), at_length(140.0));
    misses.relative(
        "10 mm: outer alone",
        before.members[0].load_n.unwrap().get(),
        282.534_72,
        2e-8,
    );
    misses.absolute(
        "10 mm: inner not touched",
        before.members[1].load_n.unwrap().get(),
        0.0,
        1e-12,
    );
    let equal = [
        Spring::mean(10.0, 60.0, 6.0, 200.0, Err(81_370.0)),
        Spring::mean(7.0, 42.0, 10.0, 200.0, Err(81_370.0)),
    ];
    let of = both("nested", &equal, at_load(1000.0));
    misses.relative("10.17", of.rate_n_per_mm.get(), 111.444, 1e-5);
    assert_eq!(of.stages.len(), 1);
    misses.none();
}

/// Loads and lengths of a set of three and of a stack turn into one another; 1/R = Σ1/R_i for the stack.
#[test]
fn load_and_length_turn_into_one_another() {
    let three = [
        Spring {
            name: "a",
            ..Spring::mean(6.0, 60.0, 6.0, 150.0, Err(81_500.0))
        },
        Spring {
            name: "b",
            ..Spring::mean(5.0, 42.0, 7.0, 130.0, Err(81_500.0))
        },
        Spring {
            name: "c",
            ..Spring::mean(4.0, 28.0, 9.0, 118.0, Err(81_500.0))
        },
    ];
    for arrangement in ["nested", "stacked"] {
        let mut last = 0.0;
        for load in [10.0, 150.0, 240.0, 300.0] {
            let by_load = both(arrangement, &three, at_load(load));
            let free = by_load.theory.free_length_mm.get();
            let length = free - by_load.deflection_mm.unwrap().get();
            let by_length = both(arrangement, &three, at_length(length));
            let loads = by_length
                .members
                .iter()
                .map(|one| one.load_n.unwrap().get());
            let whole = if arrangement == "nested" {
                loads.sum()
            } else {
                loads.fold(0.0, f64::max)
            };
            assert!(
                (whole - load).abs() < 1e-9 * load,
                "{arrangement} {load}: {whole}"
            );
            assert!(length < free - last);
            last = free - length;
        }
    }
    let stack = both("stacked", &three, at_load(50.0));
    let softness: f64 = stack
        .members
        .iter()
        .map(|one| 1.0 / one.rate_n_per_mm.get())
        .sum();
    assert!((1.0 / softness / stack.rate_n_per_mm.get() - 1.0).abs() < 1e-12);
    assert!((stack.theory.free_length_mm.get() - 398.0).abs() < 1e-9);
}

/// Shigley's, example 10-4 (from memory): music wire 0.092 in, OD 9/16 in, 21 active coils, 5 to 35 lbf. Amplitude 29.7 kpsi,
/// Goodman's margin with Zimmerli's data 1.23, 281 Hz, and 0.0586 lbf of active wire (0.284 lbf/in³).
#[test]
fn shigley_10_4_fatigue_and_frequency() {
    let spring = Spring {
        coil: ("outside_diameter", 0.5625 * INCH),
        ..Spring::mean(0.092 * INCH, 0.0, 21.0, 4.0 * INCH, Ok("ASTM A228"))
    };
    let inch = expected(
        &text(
            "single",
            std::slice::from_ref(&spring),
            true,
            "[service]\nload = { from = 5.0, to = 35.0 }\n",
        ),
        at_load(35.0 * LBF),
    );
    let metric = format!(
        "[service]\nload = {{ from = {}, to = {} }}\n",
        5.0 * LBF,
        35.0 * LBF
    );
    let metric = expected(
        &text("single", &[spring], false, &metric),
        at_load(35.0 * LBF),
    );
    let mut misses = Misses::default();
    for of in [inch.unwrap(), metric.unwrap()] {
        let margin = of.fatigue[0].margin.unwrap();
        misses.relative(
            "amplitude 29.7 kpsi",
            margin.amplitude_mpa.get() / KPSI,
            29.7,
            2e-3,
        );
        misses.relative(
            "Sse 49.2 kpsi",
            margin.endurance_mpa.get() / KPSI,
            49.2,
            3e-3,
        );
        misses.relative("margin 1.23", margin.margin.get(), 1.23, 5e-3);
        misses.relative(
            "281 Hz",
            of.outlooks[0].natural_frequency_hz.unwrap().get(),
            281.0,
            5e-3,
        );
        let places = of
            .strength
            .iter()
            .filter(|line| matches!(line.place, StressPlace::Service { .. }));
        assert_eq!(places.count(), 1);
    }
    let density = 0.284 * 453.592_37 / (INCH * INCH * INCH) * 1000.0;
    let wire = mass(0.092 * INCH, 0.4705 * INCH, 21.0, density) / 453.592_37;
    misses.relative("0.0586 lbf", wire, 0.0586, 9e-4);
    misses.none();
}

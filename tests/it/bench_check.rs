//! E_n against figures by hand, what a comparison comes to, and the frame's give from simulated runs.

use coilassay::bench::{Certified, Finding, Plates, Serving, compare, frame, overall};
use coilassay::characteristic::{Estimate, Line, Measured, Part};
use coilassay::quantity::Quantity;
use coilassay::rig::{self, Give, Rig};

use crate::published::Misses;
use crate::random::Random;
use crate::rigs::FORCE_TRAVEL_FRAME;

const EXPORT: &str = r#"[rig]
name = "B"
[export]
header_line = 1
delimiter = ","
decimal = "."
load = { column = "F", unit = "N" }
travel = { column = "L", unit = "mm", means = "MEANS" }
spring = { from = "file name" }
"#;

fn rig_of(means: &str) -> Rig {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("rig.toml");
    std::fs::write(&path, EXPORT.replace("MEANS", means) + FORCE_TRAVEL_FRAME).unwrap();
    rig::open(&path, "rig.toml").unwrap()
}

fn measured(value: f64, own: f64, common: f64) -> Measured {
    let lines = vec![
        Line::new("own", Part::Own, own),
        Line::new("common", Part::Common, common),
    ];
    Measured::Value(Estimate::new(value, lines).unwrap())
}

fn certified(value: f64, standard: f64) -> Certified {
    Certified {
        quantity: Quantity::Rate,
        value,
        standard,
    }
}

/// ISO 13528: E_n = (x − x_ref)/√(U² + U_ref²), U at k = 2. By hand: x 10.05, u 0.03 ⊕ 0.04 = 0.05, U 0.10; x_ref 10.00,
/// u 0.12, U_ref 0.24; E_n = 0.05/√(0.01 + 0.0576) = 0.05/0.26 = 0.192307…; this check shows 2·√(0.03² + 0.12²) = 0.247386….
#[test]
fn e_n_by_hand() {
    let found = compare(
        &certified(10.0, 0.12),
        &measured(10.05, 0.03, 0.04),
        Some(0.3),
    );
    let mut misses = Misses::default();
    misses.absolute("U", found.expanded.unwrap(), 0.10, 1e-12);
    misses.absolute("U_ref", found.reference_expanded, 0.24, 1e-12);
    misses.absolute("E_n", found.e_n.unwrap(), 0.05 / 0.26, 1e-12);
    misses.absolute("shows", found.shows.unwrap(), 0.247_386_337, 1e-9);
    misses.none();
    assert_eq!(found.finding, Finding::Serves);
}

#[test]
fn every_outcome_of_a_comparison() {
    let reference = certified(10.0, 0.01);
    let cases = [
        (measured(10.05, 0.01, 0.05), Some(0.1), Finding::Serves),
        (measured(10.05, 0.01, 0.05), None, Finding::Serves),
        (measured(10.2, 0.01, 0.2), Some(0.1), Finding::BeyondShare), // E_n 0.5, yet too far
        (measured(9.8, 0.01, 0.2), Some(0.1), Finding::BeyondShare),
        (measured(10.2, 0.01, 0.05), Some(0.1), Finding::Disagrees), // E_n 1.9
        (measured(9.8, 0.01, 0.05), Some(1.0), Finding::Disagrees),
        (measured(10.0, 0.06, 0.01), Some(0.1), Finding::CannotTell), // shows 0.122 at best
        (
            Measured::Value(Estimate::without_uncertainty(10.0, Vec::new())),
            Some(0.1),
            Finding::NotMeasured,
        ),
    ];
    for (measured, allowed, wanted) in cases {
        assert_eq!(
            compare(&reference, &measured, allowed).finding,
            wanted,
            "{measured:?}"
        );
    }
    // A reference that is too coarse proves nothing, however well the values agree.
    let coarse = compare(
        &certified(10.0, 0.2),
        &measured(10.0, 0.001, 0.001),
        Some(0.1),
    );
    assert_eq!(coarse.finding, Finding::CannotTell);
    // A mean that agrees hides two measurements that do not.
    let reference = certified(10.0, 0.01);
    let each = [9.8, 10.2].map(|value| compare(&reference, &measured(value, 0.01, 0.05), None));
    let mean = compare(&reference, &measured(10.0, 0.01, 0.05), Some(0.1));
    assert_eq!(mean.beside(&each).finding, Finding::Scattered);
    assert_eq!(mean.beside(&[mean]).finding, Finding::Serves);
    assert_eq!(
        overall([Serving::Serves, Serving::Undecided, Serving::Fails]),
        Serving::Fails
    );
    assert_eq!(
        overall([Serving::Serves, Serving::Undecided]),
        Serving::Undecided
    );
    assert_eq!(overall([Serving::Serves]), Serving::Serves);
    assert_eq!(overall([]), Serving::Undecided);
}

/// A run of plate on plate: two passes up to 900 N, with air before, noise and the steps of the scales.
fn run(random: &mut Random, give: impl Fn(f64) -> f64, means: &str) -> (Vec<f64>, Vec<f64>) {
    let (mut load, mut travel) = (Vec::new(), Vec::new());
    let mut read = |force: f64, apart: f64, random: &mut Random| {
        let closer = give(force) - apart; // what the scale takes for compression
        let shown = match means {
            "deflection" => 3.0 + closer,
            "length" => 0.02 - closer,
            _ => 50.0 - closer,
        };
        load.push(((force + 0.05 + random.normal(0.04)) * 100.0).round() / 100.0);
        travel.push(((shown + random.normal(0.0004)) * 1000.0).round() / 1000.0);
    };
    for pass in 0..2 {
        for step in 0..10 {
            read(0.0, 1.0 - f64::from(step) * 0.1, random);
        }
        for step in 0..=90 {
            read(f64::from(step) * 10.0, 0.0, random);
        }
        if pass == 0 {
            for step in (0..30).rev() {
                read(f64::from(step) * 30.0, 0.0, random);
            }
        }
    }
    (load, travel)
}

/// 400 simulated runs of a straight frame: within 2 standard uncertainties of the truth in 95.45 % of them if the scales'
/// errors were drawn too; here the scales are true, so that at least as many must be. And hardly ever a table.
#[test]
fn a_straight_frame_is_found() {
    for means in ["deflection", "length"] {
        let rig = rig_of(means);
        let (mut inside, mut tables) = (0, 0);
        for seed in 0..200 {
            let mut random = Random::new(seed, 77);
            let (load, travel) = run(&mut random, |force| 0.00012 * force, means);
            let plates = Plates {
                load: &load,
                travel: &travel,
            };
            let found = frame(plates, &rig).unwrap();
            assert_eq!(found.passes, 2);
            let sum = found.compliance.uncertainty.unwrap();
            inside += i32::from((found.compliance.value - 0.00012).abs() <= sum.expanded);
            tables += i32::from(matches!(found.give, Give::Table(_)));
            // Class 0.5 over 890 N: 1.5 µm/√3/890 N = 9.7e-7 mm/N leads.
            assert!(
                sum.standard > 9e-7 && sum.standard < 2e-6,
                "{}",
                sum.standard
            );
        }
        assert!(
            inside >= 191 && tables <= 4,
            "{means}: {inside} inside, {tables} tables"
        );
    }
}

/// A frame that is soft at first needs a table, and the table gives the truth to the step of the travel scale.
#[test]
fn a_bent_frame_becomes_a_table() {
    let truth = |force: f64| 0.00008 * force + 0.03 * (1.0 - (-force / 120.0).exp());
    let rig = rig_of("length");
    for seed in 0..50 {
        let mut random = Random::new(seed, 78);
        let (load, travel) = run(&mut random, truth, "length");
        let found = frame(
            Plates {
                load: &load,
                travel: &travel,
            },
            &rig,
        )
        .unwrap();
        assert!(matches!(found.give, Give::Table(_)), "seed {seed}");
        assert!(found.departure > 0.003);
        for force in [100.0, 300.0, 500.0, 700.0, 900.0] {
            let off = (found.give.at(force) - found.give.at(100.0)) - (truth(force) - truth(100.0));
            assert!(
                off.abs() < 0.002,
                "seed {seed}: off by {off} mm at {force} N"
            );
        }
    }
}

#[test]
fn what_is_no_run_of_plates_is_refused() {
    let rig = rig_of("length");
    let said = |load: &[f64], travel: &[f64]| {
        frame(Plates { load, travel }, &rig)
            .unwrap_err()
            .to_string()
    };
    let ramp: Vec<f64> = (0..100).map(f64::from).collect();
    let scaled = |by: f64| ramp.iter().map(|x| x * by).collect::<Vec<f64>>();
    assert!(said(&scaled(9.0), &scaled(-0.1)).contains("a spring and no frame"));
    assert!(said(&scaled(9.0), &scaled(0.001)).contains("falls back"));
    assert!(said(&scaled(0.01), &scaled(-0.001)).contains("never rises"));
    assert!(said(&ramp[..8], &scaled(-0.001)[..8]).contains("readings under load"));
    assert!(said(&[], &[]).contains("never rises"));
}

/// A platen position may count either way.
#[test]
fn a_platen_position_counts_either_way() {
    let mut rig = rig_of("length");
    rig.means = rig::Means::PlatenPosition { at_zero_gap: 50.0 };
    let mut random = Random::new(5, 79);
    let (load, travel) = run(&mut random, |force| 0.0002 * force, "platen position");
    let turned: Vec<f64> = travel.iter().map(|x| 100.0 - x).collect();
    for travel in [&travel, &turned] {
        let found = frame(
            Plates {
                load: &load,
                travel,
            },
            &rig,
        )
        .unwrap();
        assert!((found.compliance.value - 0.0002).abs() < 3e-6);
    }
}

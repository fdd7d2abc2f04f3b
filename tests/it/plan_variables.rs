//! Plans by variables and designed plans: against published values, each other, and simulation.

use coilassay::sampling::{
    AQLS_414, Bench, Counted, Level414, Measured, PlanError, Points, State, attributes_chances,
    designed, most_share, variables_chances, variables_plan,
};

use crate::published::{Misses, rows};
use crate::random::Random;

const NO_BENCH: Bench = Bench {
    own: 0.0,
    common: 0.0,
};

/// A lot size and level that give each letter of MIL-STD-414, from its Table A-2 (from memory).
fn lot_for(letter: &str) -> (u64, Level414) {
    #[rustfmt::skip]
    const LOTS: [(&str, u64, Level414); 16] = [
        ("B", 20, Level414::I), ("C", 8, Level414::V), ("D", 40, Level414::IV), ("E", 65, Level414::IV), ("F", 100, Level414::IV),
        ("G", 180, Level414::IV), ("H", 300, Level414::IV), ("I", 500, Level414::IV), ("J", 800, Level414::IV), ("K", 500, Level414::V),
        ("L", 3200, Level414::IV), ("M", 8000, Level414::IV), ("N", 22_000, Level414::IV), ("O", 110_000, Level414::IV),
        ("P", 500_000, Level414::IV), ("Q", 600_000, Level414::IV),
    ];
    let found = LOTS.into_iter().find(|(known, ..)| *known == letter);
    found.map(|(_, lot, level)| (lot, level)).unwrap()
}

/// Every cell that holds a plan: n and k as printed, M held against k by the estimator, and Pa at the AQL.
#[test]
fn every_plan_of_mil_std_414() {
    let mut misses = Misses::default();
    let table = rows("mil_std_414.csv");
    for row in &table {
        let number = |place: usize| row[place].parse::<f64>().unwrap();
        let (lot, level) = lot_for(&row[0]);
        let name = format!("{} at {}", row[0], row[2]);
        let plan = match variables_plan(lot, level, number(2), State::Normal) {
            Ok(plan) => plan,
            Err(fault) => panic!("{name}: {fault}"),
        };
        let letter = row[0].chars().next().unwrap();
        assert_eq!(plan.letters, Some((letter, letter)), "{name}");
        misses.absolute(&name, plan.sample_size as f64, number(1), 0.0);
        misses.absolute(&name, plan.k, number(3), 1e-12);
        misses.absolute(&name, 100.0 * plan.most, number(4), 1e-12);
        // the M that the rounded k gives: own, scipy, four digits
        let from_k = 100.0 * most_share(plan.sample_size, plan.k).unwrap();
        misses.absolute(&name, from_k, number(5), 5.1e-5);
        let measured = Measured::on(&plan, NO_BENCH);
        let chances = variables_chances(measured, NO_BENCH, number(2) / 100.0).unwrap();
        misses.absolute(&name, chances.accepted, number(6), 5.1e-5);
    }
    misses.none();
    assert_eq!(table.len(), 195);
}

#[test]
fn arrows_and_states_of_mil_std_414() {
    // Example B-1 (from memory): lot of 40, level IV, AQL 1.0: letter D, n 5, k 1.53
    let plan = variables_plan(40, Level414::IV, 1.0, State::Normal).unwrap();
    assert_eq!((plan.letters, plan.sample_size), (Some(('D', 'D')), 5));
    // an arrow takes the first plan below and its n: D at 0.25 is E, n 7
    let led = variables_plan(40, Level414::IV, 0.25, State::Normal).unwrap();
    assert_eq!((led.letters, led.sample_size), (Some(('D', 'E')), 7));
    for pair in AQLS_414.windows(2) {
        let tightened = variables_plan(3000, Level414::IV, pair[1], State::Tightened).unwrap();
        let normal = variables_plan(3000, Level414::IV, pair[0], State::Normal).unwrap();
        assert_eq!(tightened, normal);
    }
    let refused = [
        variables_plan(2, Level414::IV, 1.0, State::Normal),
        variables_plan(40, Level414::IV, 0.9, State::Normal),
        variables_plan(40, Level414::IV, 1.0, State::Reduced),
        variables_plan(3000, Level414::IV, 0.04, State::Tightened),
        variables_plan(8, Level414::IV, 0.04, State::Normal), // the arrow leads to 15 springs
    ];
    assert!(refused.iter().all(Result::is_err), "{refused:?}");
    assert!(matches!(
        refused[4],
        Err(PlanError::SampleExceedsLot { wanted: 15, lot: 8 })
    ));
}

#[test]
fn plans_designed_from_two_points() {
    #[rustfmt::skip]
    const ROWS: [(f64, f64, u64, f64, f64, f64); 3] = [ // p1 (α 5 %), p2 (β 10 %), n, k from β, k from α, Pa(p2): own, scipy
        (0.01, 0.05, 55, 1.948_071, 1.952_193, 0.097_155), (0.01, 0.08, 28, 1.817_255, 1.825_178, 0.096_114),
        (0.02, 0.08, 51, 1.693_662, 1.697_869, 0.096_956),
    ];
    let mut misses = Misses::default();
    for (p1, p2, n, least, most, accepted) in ROWS {
        let points = Points {
            p1,
            alpha: 0.05,
            p2,
            beta: 0.10,
        };
        let found = designed(points).unwrap();
        let name = format!("{p1} to {p2}");
        assert_eq!(found.plan.sample_size, n, "{name}");
        misses.absolute(&name, found.least_k, least, 6e-7);
        misses.absolute(&name, found.plan.k, most, 6e-7);
        misses.absolute(&name, found.accepted_at_p2, accepted, 6e-7);
        let plan = Measured::on(&found.plan, NO_BENCH);
        let chances = variables_chances(plan, NO_BENCH, p1).unwrap();
        misses.absolute(&name, chances.accepted, 0.95, 1e-9);
    }
    misses.none();
    let bad = |p1, alpha, p2, beta| {
        designed(Points {
            p1,
            alpha,
            p2,
            beta,
        })
        .is_err()
    };
    assert!(bad(0.05, 0.05, 0.01, 0.1) && bad(0.0, 0.05, 0.01, 0.1) && bad(0.01, 0.6, 0.05, 0.5));
    assert!(
        bad(0.01, 0.05, 0.010_001, 0.1),
        "more springs than anyone measures"
    );
    assert!(bad(0.01, f64::NAN, 0.05, 0.1));
}

/// The chances with the bench in them, against lots drawn spring by spring and judged by the guarded rule.
#[test]
fn chances_with_the_bench_by_simulation() {
    let mut random = Random::new(11, 1);
    let plan = Counted {
        sample_size: 50,
        accept: 2,
        reject: 3,
    };
    for (own, common, p) in [(0.15, 0.2, 0.02), (0.0, 0.3, 0.05), (0.3, 0.0, 0.03)] {
        let bench = Bench { own, common };
        let wanted = attributes_chances(plan, bench, p).unwrap();
        let inside = coilassay::stats::normal_quantile(1.0 - p).unwrap();
        let guard = 1.644_853_6 * f64::hypot(own, common);
        let runs = 40_000;
        let (mut accepted, mut rejected) = (0, 0);
        for _ in 0..runs {
            let shift = common * random.normal(1.0);
            let (mut failing, mut open) = (0, 0);
            for _ in 0..plan.sample_size {
                let value = random.normal(1.0) + own * random.normal(1.0) + shift;
                if value > inside + guard {
                    failing += 1;
                } else if value > inside - guard {
                    open += 1;
                }
            }
            accepted += u32::from(failing + open <= plan.accept);
            rejected += u32::from(failing >= plan.reject);
        }
        let share = |count: u32| f64::from(count) / f64::from(runs);
        // 4 standard errors of a share from 40 000 runs
        for (got, want) in [
            (share(accepted), wanted.accepted),
            (share(rejected), wanted.rejected),
        ] {
            assert!(
                (got - want).abs() < 4.0 * 0.5 / 200.0,
                "own {own}, common {common}: {got}, {want}"
            );
        }
        assert!((wanted.accepted + wanted.rejected + wanted.undecided - 1.0).abs() < 1e-12);
    }
}

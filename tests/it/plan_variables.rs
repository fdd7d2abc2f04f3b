//! Plans by variables, designed plans, zero-accept, switching: against published values, each other, and simulation.

use coilassay::drawing::{Limits, Rule};
use coilassay::lot::{Decision, by_variables};
use coilassay::process::{CommonPart, Observation};
use coilassay::sampling::{
    AQLS_414, Bench, Counted, Level414, Measured, Outcome, PastLot, PlanError, Points, Reason,
    State, VariablesPlan, attributes_chances, designed, most_share, next, variables_chances,
    variables_plan, zero_accept,
};
use coilassay::stats::Dof;

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

#[test]
fn zero_accept_plans() {
    #[rustfmt::skip]
    const ROWS: [(u64, f64, f64, u64, u64, f64); 5] = [ // lot, LQ, risk, marked, n, chance: own, exact
        (50, 0.10, 0.10, 5, 18, 0.095_044_271_2), (100, 0.05, 0.10, 5, 37, 0.093_360_054_9), (500, 0.02, 0.10, 10, 102, 0.099_762_665_8),
        (1000, 0.01, 0.05, 10, 258, 0.049_795_803_3), (1200, 0.04, 0.10, 48, 56, 0.096_207_406_3),
    ];
    let mut misses = Misses::default();
    for (lot, quality, risk, marked, n, chance) in ROWS {
        let found = zero_accept(lot, quality, risk).unwrap();
        assert_eq!(
            (found.nonconforming, found.sample_size),
            (marked, n),
            "{lot}"
        );
        misses.absolute(&format!("{lot}"), found.accepted, chance, 5.1e-11);
    }
    misses.none();
    // ⌈100·0.07⌉ is 7 although the product is 7.000000000000001; less than one spring is one
    assert_eq!(zero_accept(100, 0.07, 0.1).unwrap().nonconforming, 7);
    assert_eq!(zero_accept(20, 0.001, 0.1).unwrap().nonconforming, 1);
    assert!(zero_accept(1, 0.1, 0.1).is_err());
    for absurd in [0.0, 1.0, -0.1, f64::NAN] {
        assert!(zero_accept(100, absurd, 0.1).is_err() && zero_accept(100, 0.1, absurd).is_err());
    }
}

fn lots(words: &str) -> Vec<PastLot> {
    words
        .split_whitespace()
        .enumerate()
        .map(|(number, word)| PastLot {
            date: jiff::civil::date(2026, 1, 1),
            lot: (number + 1).to_string(),
            outcome: match word {
                "a" | "t" | "0" => Outcome::Accepted,
                "r" => Outcome::Rejected,
                "!" => Outcome::Resumed,
                _ => Outcome::Undecided,
            },
            accept: if word == "0" { 0 } else { 2 },
            accepted_tighter: Some(word == "t"),
        })
        .collect()
}

/// ISO 2859-1:1999 clause 9. a accepted with Ac 2 but not one step tighter, t also tighter, 0 accepted with Ac 0,
/// r rejected, u undecided, ! resumed.
#[test]
fn switching() {
    let state = |words: &str, agreed: bool| next(&lots(words), State::Normal, agreed);
    #[rustfmt::skip]
    let rows: [(&str, bool, State); 21] = [
        ("", false, State::Normal),
        ("r a a a a", false, State::Normal),
        ("r a a a r", false, State::Tightened), // two of five
        ("r a a a a r", false, State::Normal), // the first is out of the five
        ("r r", false, State::Tightened),
        ("r u r", false, State::Tightened),
        ("r r a a a a", false, State::Tightened),
        ("r r a a a a a", false, State::Normal), // five in a row
        ("r r a a a u a a", false, State::Tightened), // an undecided lot breaks the row
        ("r r a a a a a r", false, State::Normal), // counting begins anew
        ("r r a a a a a r r", false, State::Tightened),
        ("t t t t t t t t t t", true, State::Reduced), // 10 × 3
        ("t t t t t t t t t t", false, State::Normal), // not agreed
        ("t t t t t t t t t", true, State::Normal),
        ("t t t t t a t t t t t t", true, State::Normal), // not one step tighter: 0
        ("0 0 0 0 0 0 0 0 0 0 0 0 0 0 0", true, State::Reduced), // 15 × 2
        ("0 0 0 0 0 0 0 0 0 0 0 0 0 0", true, State::Normal),
        ("t t t t t t t t t t a a a", true, State::Reduced),
        ("t t t t t t t t t t r", true, State::Normal),
        ("t t t t t t t t t t u", true, State::Normal),
        ("r r r r r r r a a a a a a", false, State::Tightened), // discontinued, and stays so
    ];
    for (words, agreed, wanted) in rows {
        assert_eq!(state(words, agreed).state, wanted, "{words}");
    }
    assert!(
        matches!(state("r r r a r r r r", false).reason, Reason::Discontinued { lot } if lot == "8")
    );
    assert!(
        matches!(state("r r r r r r r", false).reason, Reason::Discontinued { lot } if lot == "7")
    );
    assert!(matches!(
        state("r r r r r r r !", false).reason,
        Reason::Resumed { .. }
    ));
    assert_eq!(
        state("r r r r r r r ! a a a a a", false).state,
        State::Normal
    );
    assert!(
        matches!(state("a ! a", false).reason, Reason::Stays { score: 0 }),
        "nothing to resume"
    );
    let begun = next(&lots("a a a a a"), State::Tightened, false);
    assert!(matches!(begun.reason, Reason::FiveAccepted { lot } if lot == "5"));
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

#[expect(clippy::unnecessary_wraps, reason = "a spring may have no value")]
fn observation(value: f64, own: f64, common: f64) -> Option<Observation> {
    let common = CommonPart {
        source: "scale".to_owned(),
        contribution: common,
        dof: Dof::Infinite,
    };
    Some(Observation {
        value,
        own,
        common: vec![common],
    })
}

fn limits(lower: Option<f64>, upper: Option<f64>) -> Limits {
    Limits {
        nominal: None,
        lower,
        upper,
    }
}

/// The decision itself over simulated lots: as often as the non-central t says, and on a bench as often as its model.
#[test]
fn decisions_by_variables_by_simulation() {
    let mut random = Random::new(12, 1);
    let plan = variables_plan(300, Level414::IV, 1.0, State::Normal).unwrap();
    for (own, common, p) in [(0.0, 0.0, 0.03), (0.05, 0.2, 0.01), (0.3, 0.1, 0.03)] {
        let bench = Bench { own, common };
        let measured = Measured::on(&plan, bench);
        let want = variables_chances(measured, bench, p).unwrap();
        let upper = coilassay::stats::normal_quantile(1.0 - p).unwrap();
        let runs = 20_000;
        let (mut accepted, mut rejected) = (0, 0);
        for _ in 0..runs {
            let shift = common * random.normal(1.0);
            let sample: Vec<_> = (0..measured.sample_size + 3)
                .map(|_| {
                    observation(
                        random.normal(1.0) + own * random.normal(1.0) + shift,
                        own,
                        common,
                    )
                })
                .collect();
            match by_variables(&plan, &sample, &limits(None, Some(upper)), Rule::Guarded)
                .unwrap()
                .decision
            {
                Decision::Accepted => accepted += 1,
                Decision::Rejected => rejected += 1,
                Decision::Undecided => {}
            }
        }
        let share = |count: u32| f64::from(count) / f64::from(runs);
        // 4 standard errors; where n is raised by the sample's own estimate of σ, a lot may ask for more springs than are here
        let within = 4.0 * 0.5 / 141.0 + if own > 0.1 { 0.06 } else { 0.0 };
        for (got, want) in [
            (share(accepted), want.accepted),
            (share(rejected), want.rejected),
        ] {
            assert!(
                (got - want).abs() < within,
                "own {own}, common {common}: {got}, {want}"
            );
        }
    }
}

#[test]
fn two_limits_are_decided_by_the_estimator() {
    // MIL-STD-414 example B-1 (from memory): 2.80 % estimated outside 180 … 209, M 3.32 %
    let plan = variables_plan(40, Level414::IV, 1.0, State::Normal).unwrap();
    let sample = |common: f64| -> Vec<_> {
        [197.0, 188.0, 184.0, 205.0, 201.0]
            .into_iter()
            .map(|value| observation(value, 0.0, common))
            .collect()
    };
    let both = limits(Some(180.0), Some(209.0));
    let decided = |common, rule| by_variables(&plan, &sample(common), &both, rule).unwrap();
    assert_eq!(decided(0.0, Rule::Guarded).decision, Decision::Accepted);
    assert_eq!(decided(1.5, Rule::Guarded).decision, Decision::Undecided);
    assert_eq!(decided(1.5, Rule::Simple).decision, Decision::Accepted);
    // a common part so large that both ends lie outside, with acceptance between them, rejects nothing
    assert_eq!(decided(40.0, Rule::Guarded).decision, Decision::Undecided);
    let tight = VariablesPlan { most: 0.02, ..plan };
    let rejected = by_variables(&tight, &sample(0.0), &both, Rule::Guarded).unwrap();
    assert_eq!(rejected.decision, Decision::Rejected);
}

#[test]
fn scatter_of_the_bench_asks_for_more_springs() {
    let plan = variables_plan(40, Level414::IV, 1.0, State::Normal).unwrap();
    let values = [197.0, 188.0, 184.0, 205.0, 201.0];
    let with = |own: f64| -> Vec<_> {
        values
            .into_iter()
            .map(|value| observation(value, own, 0.0))
            .collect()
    };
    let decided =
        |own| by_variables(&plan, &with(own), &limits(None, Some(209.0)), Rule::Guarded).unwrap();
    // s 8.80: 0.1 s is 0.88; u 4 raises 5 to ⌈5·(1 + 16/(77.5 − 16))⌉ = 7, and 9 is more than all that was seen. The
    // acceptance stands with five; a rejection has to wait.
    for (own, wanted) in [(0.88, 5), (4.0, 7), (9.0, u64::MAX)] {
        let found = decided(own);
        assert_eq!((found.decision, found.wanted), (Decision::Accepted, wanted));
        let near = limits(None, Some(201.0));
        let found = by_variables(&plan, &with(own), &near, Rule::Guarded).unwrap();
        let held = if wanted > 5 {
            Decision::Undecided
        } else {
            Decision::Rejected
        };
        assert_eq!(
            (found.decision, found.withheld),
            (held, wanted > 5),
            "own {own}"
        );
        let simple = by_variables(&plan, &with(own), &near, Rule::Simple).unwrap();
        assert_eq!(simple.decision, Decision::Rejected);
    }
    let mut gap = with(0.1);
    gap[2] = None;
    let short = by_variables(&plan, &gap, &limits(None, Some(209.0)), Rule::Guarded).unwrap();
    assert_eq!((short.decision, short.measured), (Decision::Undecided, 4));
    let equal: Vec<_> = [200.0; 5]
        .into_iter()
        .map(|value| observation(value, 0.0, 0.0))
        .collect();
    let same = |upper| {
        by_variables(&plan, &equal, &limits(None, Some(upper)), Rule::Guarded)
            .unwrap()
            .decision
    };
    assert_eq!(
        (same(209.0), same(199.0)),
        (Decision::Accepted, Decision::Rejected)
    );
}

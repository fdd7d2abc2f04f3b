//! Decisions by variables: by simulation, by the published example, and where the bench's scatter is large.

use coilassay::drawing::{Limits, Rule};
use coilassay::lot::{Decision, by_variables};
use coilassay::process::{CommonPart, Observation};
use coilassay::sampling::{
    Bench, Level414, Measured, State, VariablesPlan, variables_chances, variables_plan,
};
use coilassay::stats::Dof;

use crate::random::Random;

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

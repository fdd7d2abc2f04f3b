//! The intervals of the process figures, by simulation: lots of known truth, rig errors drawn anew each time. What all
//! springs share must be in every interval whole; an interval that divides it by √n holds the truth half as often.

use coilassay::drawing::Limits;
use coilassay::process::{CommonPart, Figures, Interval, Observation, Shape, figures};
use coilassay::stats::{Dof, normal_cdf, normal_quantile};

use crate::random::Random;

/// Springs: normal, mean 0.4, standard deviation 1; limits ± 3, so the half tolerance is 3 and U of 1 is 33 % of it.
const MEAN: f64 = 0.4;
const HALF: f64 = 3.0;
const LOTS: u32 = 3000;

struct Case {
    name: &'static str,
    n: usize,
    own: f64,
    /// Common sources: standard uncertainty, rectangular or normal.
    common: [(f64, bool); 2],
}

/// Standard uncertainty 0.5 in all: U 1.0, 33 % of the half tolerance; split in several ways.
#[rustfmt::skip]
const CASES: [Case; 4] = [
    Case { name: "all common, normal", n: 20, own: 0.0, common: [(0.5, false), (0.0, false)] },
    Case { name: "mostly common, rectangular", n: 20, own: 0.2, common: [(0.42, true), (0.18, false)] },
    Case { name: "fifty springs", n: 50, own: 0.3, common: [(0.35, true), (0.19, true)] },
    Case { name: "five springs", n: 5, own: 0.3, common: [(0.35, false), (0.19, true)] },
];

fn lot(case: &Case, random: &mut Random) -> (Vec<Observation>, f64) {
    let springs: Vec<f64> = (0..case.n).map(|_| MEAN + random.normal(1.0)).collect();
    let errors = case.common.map(|(u, rectangular)| {
        if rectangular {
            random.rectangular(u * 3.0_f64.sqrt())
        } else {
            random.normal(u)
        }
    });
    let shift: f64 = errors.iter().sum();
    let of = springs
        .iter()
        .map(|true_value| Observation {
            value: true_value + shift + random.normal(case.own),
            own: case.own,
            common: case
                .common
                .iter()
                .enumerate()
                .map(|(number, (u, _))| CommonPart {
                    source: number.to_string(),
                    contribution: *u,
                    dof: Dof::Infinite,
                })
                .collect(),
        })
        .collect();
    (of, MEAN)
}

fn limits() -> Limits {
    Limits {
        nominal: Some(0.0),
        lower: Some(-HALF),
        upper: Some(HALF),
    }
}

fn holds(interval: Interval, truth: f64) -> bool {
    interval.lower <= truth && truth <= interval.upper
}

/// What is counted, and the truth it is held against.
fn held(found: &Figures, mean: f64) -> Vec<(&'static str, Option<bool>)> {
    let outside = normal_cdf(-(HALF - mean)).unwrap() + normal_cdf(-(HALF + mean)).unwrap();
    let capability = found.capability;
    let reach = normal_quantile(0.99).unwrap();
    // 99 % within: the content of the interval, the bench's own scatter not being the springs'
    let content = |of: Interval| {
        normal_cdf(of.upper - mean).unwrap() - normal_cdf(of.lower - mean).unwrap() >= 0.99
    };
    vec![
        ("mean", found.mean.1.map(|of| holds(of, mean))),
        ("deviation", found.springs.map(|of| holds(of.interval, 1.0))),
        (
            "outside by count",
            found.outside.map(|of| holds(of.share, outside)),
        ),
        (
            "Pp",
            capability
                .and_then(|of| of.pp)
                .map(|of| holds(of.interval, HALF / 3.0)),
        ),
        (
            "Ppk",
            capability.map(|of| holds(of.ppk.interval, (HALF - mean) / 3.0)),
        ),
        (
            "outside by model",
            capability.map(|of| holds(of.outside.interval, outside)),
        ),
        ("tolerance", found.tolerance.map(content)),
        (
            "99 % above",
            found.one_sided.map(|of| of.lower <= mean - reach),
        ),
        (
            "99 % below",
            found.one_sided.map(|of| of.upper >= mean + reach),
        ),
    ]
}

#[test]
fn intervals_hold_the_truth() {
    let mut short = Vec::new();
    for case in &CASES {
        let mut random = Random::new(case.n as u64, 61);
        let mut counts: Vec<(&str, u32, u32)> = Vec::new();
        for _ in 0..LOTS {
            let (of, mean) = lot(case, &mut random);
            let found = figures(&of, &limits()).unwrap().unwrap();
            for (place, (name, held)) in held(&found, mean).into_iter().enumerate() {
                if counts.len() <= place {
                    counts.push((name, 0, 0));
                }
                counts[place].1 += u32::from(held == Some(true));
                counts[place].2 += u32::from(held.is_some());
            }
        }
        for (name, held, all) in counts {
            let share = f64::from(held) / f64::from(all);
            println!("{}: {name} {:.1} % of {all}", case.name, 100.0 * share);
            // Ppk with two limits is Bissell's approximation, and few springs with a hidden deviation are left out
            let least = if name == "Ppk" || case.n < 10 {
                0.925
            } else {
                0.94
            };
            if share < least {
                short.push(format!("{}: {name} {share}", case.name));
            }
        }
    }
    assert!(short.is_empty(), "{short:#?}");
}

/// The common part of the mean does not fall with the number of springs; the sampled part does.
#[test]
fn what_is_common_stays_whole() {
    let width = |n: usize, own: f64, common: f64| {
        let of: Vec<Observation> = (0..n)
            .map(|place| Observation {
                value: if place % 2 == 0 { 1.0 } else { -1.0 },
                own,
                common: vec![CommonPart {
                    source: "scale".to_owned(),
                    contribution: common,
                    dof: Dof::Infinite,
                }],
            })
            .collect();
        let found = figures(&of, &limits()).unwrap().unwrap();
        let interval = found.mean.1.unwrap();
        (interval.upper - interval.lower) / 2.0
    };
    assert!(width(10_000, 0.0, 0.5) > 1.96 * 0.5 * 0.999);
    assert!(width(10_000, 0.0, 0.0) < 0.021);
    assert!(width(40, 0.0, 0.0) < 0.6 * width(10, 0.0, 0.0));
}

#[test]
fn a_bench_that_hides_the_springs_gives_no_capability() {
    let mut random = Random::new(3, 62);
    let of = |own: f64, random: &mut Random| -> Vec<Observation> {
        (0..30)
            .map(|_| Observation {
                value: random.normal(1.0),
                own,
                common: Vec::new(),
            })
            .collect()
    };
    let clear = figures(&of(0.1, &mut random), &limits()).unwrap().unwrap();
    assert!(clear.capability.is_some() && !clear.hidden);
    let hidden = figures(&of(0.9, &mut random), &limits()).unwrap().unwrap();
    assert!(hidden.capability.is_none() && hidden.hidden);
    let all = figures(&of(9.0, &mut random), &limits()).unwrap().unwrap();
    assert!(all.springs.unwrap().value <= 0.0 && all.capability.is_none());
}

#[test]
fn outliers_are_named_and_counted_in_every_figure() {
    let mut of: Vec<Observation> = (0..20)
        .map(|place| Observation {
            value: f64::from(place % 5) * 0.1,
            own: 0.0,
            common: Vec::new(),
        })
        .collect();
    let without = figures(&of, &limits()).unwrap().unwrap();
    assert!(without.outliers.is_empty());
    of.push(Observation {
        value: 50.0,
        own: 0.0,
        common: Vec::new(),
    });
    let with = figures(&of, &limits()).unwrap().unwrap();
    assert_eq!(with.outliers, [20]);
    assert_eq!((with.count, with.outside.unwrap().count), (21, 1));
    assert!(with.mean.0 > without.mean.0 + 2.0);
    assert!(matches!(with.shape, Shape::NotNormal { .. }));
    let one = figures(&of[..1], &limits()).unwrap().unwrap();
    assert_eq!(
        (one.mean.1, one.spread, one.shape),
        (None, None, Shape::TooFew)
    );
    assert!(figures(&[], &limits()).unwrap().is_none());
}

//! Charts, components and trends against published values.

use approx::assert_relative_eq;
use coilassay::drift::{
    Culprit, H, K, L, LAMBDA, LotPoint, MOVING_RANGE, ReferencePoint, Rule, Side, Unclear, c4,
    combined_run_length, components, crossing, culprit, fired, individuals, moving_ranges,
    spread_limits, steps, tabular_cusum, trend, true_run_length, weighted,
};
use coilassay::stats::{mean, standard_deviation};

use crate::random::Random;

/// Rows of a table under `tests/data`, comments and the header left out.
fn rows(file: &str) -> Vec<Vec<f64>> {
    let path = format!("{}/tests/data/{file}", env!("CARGO_MANIFEST_DIR"));
    let text = std::fs::read_to_string(path).unwrap();
    let numbers = |line: &str| line.split(',').map(|cell| cell.parse().ok()).collect();
    text.lines().filter_map(numbers).collect::<Vec<Vec<f64>>>()
}

/// c4, B3, B4, B5, B6, A3 by exact integration (own computation, `control_chart_constants.csv`), 8 decimals.
#[test]
fn chart_constants_to_a_millionth() {
    let rows = rows("control_chart_constants.csv");
    assert_eq!(rows.len(), 24);
    for (n, row) in (2_u64..).zip(&rows) {
        let c = c4(n).unwrap();
        let limits = spread_limits(n, 1.0).unwrap();
        let a3 = 3.0 / (c * row[0].sqrt());
        let got = [
            c,
            a3,
            limits.lower / c,
            limits.upper / c,
            limits.lower,
            limits.upper,
        ];
        for (got, want) in got
            .into_iter()
            .zip([row[3], row[5], row[8], row[9], row[10], row[11]])
        {
            assert!((got - want).abs() < 1e-6, "n {n}: {got}, {want}");
        }
    }
    // d2 of moving ranges of two, and E2 = 3/d2.
    assert!((MOVING_RANGE - rows[0][1]).abs() < 1e-8);
    assert!((3.0 / MOVING_RANGE - rows[0][14]).abs() < 1e-8);
    // The recursion and the series meet.
    assert!((c4(1000).unwrap() - c4(1001).unwrap()).abs() < 3e-7);
    assert_eq!(c4(1), None);
}

/// NIST/SEMATECH handbook 6.3.2.2, from memory; it takes d2 as 1.128, the exact one moves the 4th decimal.
#[test]
fn individuals_of_the_handbook() {
    let values = [49.6, 47.6, 49.9, 51.3, 47.8, 51.2, 52.6, 52.4, 53.6, 52.1];
    let limits = individuals(&values).unwrap();
    assert_relative_eq!(limits.centre, 50.81, epsilon = 1e-9);
    assert_relative_eq!(
        mean(&moving_ranges(&values)).unwrap(),
        1.877_778,
        epsilon = 5e-7
    );
    assert_relative_eq!(limits.upper, 55.8041, epsilon = 1e-2);
    assert_relative_eq!(limits.lower, 45.8159, epsilon = 1e-2);
}

/// NIST/SEMATECH handbook 6.3.2.3: exact sums (the page prints two decimals), first signal at group 14.
#[test]
fn cusum_of_the_handbook() {
    #[rustfmt::skip]
    let values = [
        324.925, 324.675, 324.725, 324.350, 325.350, 325.225, 324.125, 324.525, 325.225, 324.600,
        324.625, 325.150, 328.325, 327.250, 327.825, 328.500, 326.675, 327.775, 326.875, 328.350,
    ];
    #[rustfmt::skip]
    let high = [
        0.0, 0.0, 0.0, 0.0, 0.0325, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 3.0075, 4.94, 7.4475, 10.63,
        11.9875, 14.445, 16.0025, 19.035,
    ];
    let low = [
        0.0, 0.0075, 0.0, 0.3325, 0.0, 0.0, 0.5575, 0.715, 0.1725, 0.255, 0.3125, 0.0,
    ];
    let sums = tabular_cusum(&values, 325.0, 0.3175);
    for (sum, want) in sums.iter().zip(high) {
        assert!((sum.high - want).abs() < 1e-9, "{sum:?}, {want}");
    }
    for (sum, want) in sums.iter().zip(low) {
        assert!((sum.low - want).abs() < 1e-9, "{sum:?}, {want}");
    }
    let first = sums
        .iter()
        .position(|sum| sum.high > 4.1959 || sum.low > 4.1959);
    assert_eq!(first, Some(13));
}

fn lots(groups: &[Vec<f64>]) -> Vec<LotPoint> {
    let point = |group: &Vec<f64>| LotPoint {
        springs: group.len() as u64,
        mean: mean(group).unwrap(),
        deviation: standard_deviation(group),
        own: None,
    };
    groups.iter().map(point).collect()
}

/// NIST StRD, one-way ANOVA, certified; components by moments, derived.
#[test]
fn certified_analyses_of_variance() {
    let cases = [
        (
            "SiRstv.csv",
            5.114_626_16e-2,
            2.166_365_6e-1,
            1.180_462_374_402_55,
            0.010_831_828,
            0.000_390_947_48,
            1e-7,
        ),
        (
            "SmLs01.csv",
            1.68,
            1.80,
            21.0,
            0.01,
            0.009_523_809_523_809_52,
            1e-12,
        ),
        (
            "SmLs03.csv",
            160.08,
            180.0,
            2001.0,
            0.01,
            0.009_995_002_498_750_62,
            1e-12,
        ),
    ];
    for (file, between, within, f, variance, variance_between, to) in cases {
        // The rows of a group stand together.
        let groups: Vec<Vec<f64>> = rows(file)
            .chunk_by(|one, next| one[0].total_cmp(&next[0]).is_eq())
            .map(|group| group.iter().map(|row| row[1]).collect())
            .collect();
        let found = components(&lots(&groups)).unwrap();
        assert_relative_eq!(
            found.sum_between,
            between,
            max_relative = 1e-9,
            epsilon = 0.0
        );
        assert_relative_eq!(found.sum_within, within, max_relative = 1e-9, epsilon = 0.0);
        assert_relative_eq!(found.f.unwrap(), f, max_relative = 1e-9, epsilon = 0.0);
        assert_relative_eq!(found.within, variance, max_relative = to, epsilon = 0.0);
        assert_relative_eq!(
            found.between,
            variance_between,
            max_relative = to,
            epsilon = 0.0
        );
    }
}

/// GUM (JCGM 100) H.5, from memory: 10 days of 5 readings, in µV above 10 V.
#[test]
fn days_of_the_gum() {
    let means = [
        172.0, 116.0, 13.0, 144.0, 106.0, 31.0, 60.0, 125.0, 163.0, 41.0,
    ];
    let deviations = [60.0, 77.0, 111.0, 101.0, 67.0, 93.0, 80.0, 73.0, 88.0, 86.0];
    let days: Vec<LotPoint> = std::iter::zip(means, deviations)
        .map(|(mean, deviation)| LotPoint {
            springs: 5,
            mean,
            deviation: Some(deviation),
            own: None,
        })
        .collect();
    let found = components(&days).unwrap();
    assert_relative_eq!(found.mean, 97.0, epsilon = 0.5);
    assert_relative_eq!(found.mean_square_between().sqrt(), 128.0, epsilon = 0.5);
    assert_relative_eq!(found.within.sqrt(), 85.0, epsilon = 0.5);
    assert_relative_eq!(found.f.unwrap(), 2.2615, epsilon = 5e-5); // 2.25 in print, from rounded figures
    assert_relative_eq!(found.between.sqrt(), 43.0, epsilon = 0.5);
    // The three-way chart on it, own computation: MR̄ 73.0, limits 291.18 and −96.98.
    let limits = individuals(&means).unwrap();
    assert_relative_eq!(limits.upper, 291.18, epsilon = 0.02);
    assert_relative_eq!(limits.lower, -96.98, epsilon = 0.02);
}

/// Own computation with general-purpose libraries.
#[test]
fn trends_as_computed_elsewhere() {
    let values = [
        10.02, 10.05, 10.01, 10.04, 10.08, 10.07, 10.11, 10.10, 10.15, 10.13,
    ];
    let found = trend(&values).unwrap();
    assert_eq!(found.s, 33);
    assert_relative_eq!(found.variance, 125.0, epsilon = 1e-9);
    assert_relative_eq!(found.z, 2.862_167_011_200, epsilon = 5e-13);
    assert_relative_eq!(found.p, 0.004_207_551_29, epsilon = 5e-12);
    assert_relative_eq!(found.slope, 0.015, epsilon = 1e-9);
    assert_relative_eq!(found.slope_lower, 0.010, epsilon = 5e-4);
    assert_relative_eq!(found.slope_upper, 0.020, epsilon = 5e-4);
    let tied = trend(&[1.0, 2.0, 2.0, 3.0, 3.0, 3.0, 5.0, 4.0]).unwrap();
    assert_eq!(tied.s, 22);
    assert_relative_eq!(tied.variance, 182.0 / 3.0, epsilon = 1e-9);
    assert_relative_eq!(tied.z, 2.696_151_102_819, epsilon = 5e-13);
    assert!(trend(&[1.0; 8]).is_none());
    // By hand: level 10.1405 or so at the last; 10.20 is at most seven lots of 0.010 off.
    let crosses = crossing(&found, None, Some(10.20)).unwrap();
    assert!(crosses.earliest < crosses.steps && crosses.steps < crosses.latest.unwrap());
    assert!(crossing(&found, Some(10.0), None).is_none());
}

#[test]
fn each_rule_fires_on_its_pattern_and_on_no_shorter_one() {
    let turns: Vec<f64> = (0..14)
        .map(|n| if n % 2 == 0 { 0.5 } else { -0.5 })
        .collect();
    let cases: [(Rule, Vec<f64>); 8] = [
        (Rule::Beyond, vec![-3.01]),
        (Rule::NineOneSide, vec![0.1; 9]),
        (Rule::SixSteady, vec![-0.5, -0.2, 0.0, 0.1, 0.4, 0.7]),
        (Rule::FourteenAlternating, turns),
        (Rule::TwoOfThree, vec![2.1, 0.0, 2.2]),
        (Rule::FourOfFive, vec![-1.1, -1.2, 0.3, -1.3, -1.4]),
        (Rule::FifteenWithin, vec![0.2; 15]),
        (
            Rule::EightBeyondOne,
            vec![1.1, -1.1, 1.1, 1.1, -1.2, 1.5, -1.1, 1.1],
        ),
    ];
    for (rule, pattern) in cases {
        assert_eq!(rule.length(), pattern.len());
        assert_eq!(fired(rule, &pattern), [pattern.len() - 1], "{rule:?}");
        assert!(fired(rule, &pattern[1..]).is_empty(), "{rule:?}");
    }
    assert!(fired(Rule::Beyond, &[3.0]).is_empty());
    assert!(
        fired(
            Rule::NineOneSide,
            &[0.1, 0.1, 0.1, 0.1, 0.0, 0.1, 0.1, 0.1, 0.1]
        )
        .is_empty()
    );
}

/// The mean run length of `runs` runs of `alarm`, told whether a chart that begins anew cries at a value.
fn run_length(
    runs: u32,
    shift: f64,
    mut begin: impl FnMut() -> Box<dyn FnMut(f64) -> bool>,
) -> f64 {
    let mut random = Random::new(0x7AC4, 1);
    let mut total = 0_u64;
    for _ in 0..runs {
        let mut alarm = begin();
        loop {
            total += 1;
            if alarm(random.normal(1.0) + shift) {
                break;
            }
        }
    }
    total as f64 / f64::from(runs)
}

/// Run lengths with known mean and deviation: the charts' own functions, one value after the other, within 5 %.
#[test]
fn run_lengths_as_published() {
    let settled = (LAMBDA / (2.0 - LAMBDA)).sqrt();
    let individual =
        || Box::new(|z: f64| !fired(Rule::Beyond, &[z]).is_empty()) as Box<dyn FnMut(f64) -> bool>;
    let cusum = || {
        let mut values = Vec::new();
        let (mut high, mut low) = (0.0, 0.0);
        Box::new(move |z: f64| {
            // One step of the tabular CUSUM from where it stands: the sums enter as the value before.
            values.clear();
            values.extend([high + K, z]);
            high = tabular_cusum(&values, 0.0, K)[1].high;
            values.clear();
            values.extend([-low - K, z]);
            low = tabular_cusum(&values, 0.0, K)[1].low;
            high > H || low > H
        }) as Box<dyn FnMut(f64) -> bool>
    };
    let ewma = || {
        let mut centre = 0.0;
        Box::new(move |z: f64| {
            centre = weighted(&[z], centre, LAMBDA)[0];
            f64::abs(centre) > L * settled
        }) as Box<dyn FnMut(f64) -> bool>
    };
    let (few, many) = (6000, 6000);
    let found = [
        (run_length(few, 0.0, individual), 370.4),
        (run_length(many, 1.0, individual), 43.9),
        (run_length(few, 0.0, cusum), 465.3),
        (run_length(many, 1.0, cusum), 10.38),
        (run_length(few, 0.0, ewma), 371.0),
        (run_length(many, 1.0, ewma), 9.8),
    ];
    for (got, want) in found {
        assert!((got / want - 1.0).abs() < 0.05, "{found:?}");
    }
}

#[test]
fn charts_read_together_cry_more_often_and_few_lots_spread_the_run_length() {
    let alone = combined_run_length(&Rule::DEFAULT, false);
    let both = combined_run_length(&Rule::DEFAULT, true);
    let all = combined_run_length(&Rule::ALL, true);
    assert!(
        all < both && both < alone && alone < 371.0,
        "{all}, {both}, {alone}"
    );
    let (few, many) = (true_run_length(10).unwrap(), true_run_length(200).unwrap());
    assert!(few.short < many.short && many.long < few.long);
    assert!((many.middle / 370.4 - 1.0).abs() < 0.25, "{many:?}");
}

/// Steps of 2 standard deviations in the middle of 40 lots: found, and the interval holds the place in 95 % or so of the series.
#[test]
fn change_points_lie_in_their_interval() {
    let mut random = Random::new(0x57E9, 1);
    let (mut found, mut held, mut false_alarms) = (0, 0, 0);
    for _ in 0..2000 {
        let quiet: Vec<f64> = (0..40).map(|_| random.normal(1.0)).collect();
        false_alarms += i32::from(!steps(&quiet).is_empty());
        let moved: Vec<f64> = (0..40)
            .map(|n| random.normal(1.0) + if n < 24 { 0.0 } else { 2.0 })
            .collect();
        if let [one] = steps(&moved).as_slice() {
            found += 1;
            held += i32::from(one.from <= 24 && 24 <= one.to);
        }
    }
    assert!(
        false_alarms <= 20 + 14,
        "{false_alarms} of 2000 quiet series, at most 1 % wanted"
    );
    assert!(found > 1800, "{found}");
    assert!(
        f64::from(held) >= 0.93 * f64::from(found),
        "{held} of {found}"
    );
}

/// What the whole road, change point and culprit, says of one simulated series.
fn blamed(random: &mut Random, rig: f64, springs: f64, checks: usize) -> Option<Culprit> {
    let (lots, at) = (40, 20);
    let moved = |place: usize, by: f64| if place < at { 0.0 } else { by };
    let values: Vec<f64> = (0..lots)
        .map(|place| 10.0 + moved(place, rig + springs) + 0.4 * random.normal(1.0))
        .collect();
    let step = steps(&values)
        .into_iter()
        .min_by_key(|step| step.at.abs_diff(at))?;
    // As many checks after the shift as before it, u = 1.
    let points: Vec<ReferencePoint> = (0..2 * checks)
        .map(|n| {
            let day = (n as f64 + 0.5) * lots as f64 / (2 * checks) as f64;
            let error = if day < at as f64 { 0.0 } else { rig } + random.normal(1.0);
            ReferencePoint {
                day,
                rig: "A".into(),
                reference: "R".into(),
                error,
                factor: 1.0,
            }
        })
        .collect();
    let side = |from: usize, to: usize| Side {
        from: from as f64,
        to: to as f64 - 0.01,
        rig: Some("A"),
    };
    let (whose, _) = culprit(
        step.after - step.before,
        side(0, step.at),
        side(step.at, lots),
        &points,
    );
    Some(whose)
}

/// A shift of 3 u of one check with 5 checks after it: the rig's in at least 95 % where the rig moved, in at most 5 % where the
/// springs did.
#[test]
fn rig_or_springs() {
    let mut random = Random::new(0xB1A3, 1);
    let runs = 2000;
    let mut count = |rig: f64, springs: f64| {
        let blamed = |_| blamed(&mut random, rig, springs, 6) == Some(Culprit::Rig);
        f64::from((0..runs).map(blamed).map(i32::from).sum::<i32>()) / f64::from(runs)
    };
    let (shared, own) = (count(3.0, 0.0), count(0.0, 3.0));
    assert!(shared >= 0.95 && own <= 0.05, "{shared}, {own}");
    let none = blamed(&mut random, 3.0, 0.0, 0);
    assert_eq!(none, Some(Culprit::CannotBeTold(Unclear::NoChecks)));
}

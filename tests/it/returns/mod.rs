//! Proof of the weighing on simulated returns whose cause is known.

mod bench;
mod case;
mod springs;

use std::collections::BTreeMap;

use coilassay::cause::{Cause, Weighing, weigh};

use crate::random::Random;
use case::{Case, cause, deed, some_deed};
use springs::{Deed, GROUPS};

/// Returns of each cause; what is said of all weighs the causes by their priors.
const OF_EACH: u64 = 120;

/// What became of one return.
struct Outcome {
    deed: Deed,
    /// Place of the true cause, 0 the first; pairs with set are places of their own.
    place: usize,
    group_first_on_curve: bool,
    /// Support of every cause, and whether it is the true one.
    claims: Vec<(f64, bool)>,
    /// The largest support of a cause other than no change and none of these.
    accused: f64,
}

fn is_true(deed: Deed, found: &Weighing, place: usize) -> bool {
    let one = &found.supports[place];
    one.cause == cause(deed) && !one.with_set
}

fn judged(deed: Deed, random: &mut Random, wanted: impl Fn(f64) -> bool) -> Outcome {
    let case = Case::drawn(deed, random, wanted);
    let full = weigh(&case.form, &case.suspects, &case.full).unwrap();
    let curve = weigh(&case.form, &case.suspects, &case.curve).unwrap();
    let quiet = [Cause::NoChange, Cause::NoneOfThese];
    let accused = full
        .supports
        .iter()
        .filter(|one| !quiet.contains(&one.cause));
    Outcome {
        deed,
        place: (0..full.supports.len())
            .position(|place| is_true(deed, &full, place))
            .unwrap(),
        group_first_on_curve: curve.supports[0].cause.group() == cause(deed).group(),
        claims: full
            .supports
            .iter()
            .enumerate()
            .map(|(place, one)| (one.support, is_true(deed, &full, place)))
            .collect(),
        accused: accused.map(|one| one.support).fold(0.0, f64::max),
    }
}

/// `count` returns, each from a seed of its own, so that threads do not matter.
fn returns(count: u64, one: impl Fn(u64) -> Outcome + Sync) -> Vec<Outcome> {
    let threads = std::thread::available_parallelism().map_or(1, |n| n.get() as u64);
    let one = &one;
    std::thread::scope(|scope| {
        let parts: Vec<_> = (0..threads)
            .map(|thread| {
                scope.spawn(move || {
                    let own = (0..count).filter(|number| number % threads == thread);
                    own.map(one).collect::<Vec<_>>()
                })
            })
            .collect();
        let parts = parts.into_iter().map(|part| part.join().unwrap());
        parts.flatten().collect()
    })
}

fn share(all: &[&Outcome], of: impl Fn(&Outcome) -> bool) -> f64 {
    all.iter().filter(|one| of(one)).count() as f64 / all.len() as f64
}

/// What is counted.
type Ask = fn(&Outcome) -> bool;

fn first(one: &Outcome) -> bool {
    one.place == 0
}

fn among_three(one: &Outcome) -> bool {
    one.place < 3
}

fn print_row(name: &str, all: &[&Outcome]) {
    let percent = |of: Ask| format!("{:.1} %", 100.0 * share(all, of));
    println!(
        "| {name} | {} | {} | {} | {} |",
        all.len(),
        percent(first),
        percent(among_three),
        percent(|one| one.group_first_on_curve)
    );
}

/// Severities of 3 U and more: first 85 %, among the first three 97 %, the group by the curve alone 90 %.
#[test]
fn known_causes_are_found() {
    let deeds: Vec<Deed> = GROUPS.concat();
    let outcomes = returns(OF_EACH * deeds.len() as u64, |number| {
        let mut random = Random::new(4471, number);
        let (deed, _) = deeds.iter().cycle().zip(0..=number).last().unwrap();
        judged(*deed, &mut random, |strength| strength >= 3.0)
    });
    let mut by_deed: BTreeMap<Deed, Vec<&Outcome>> = BTreeMap::new();
    for one in &outcomes {
        by_deed.entry(one.deed).or_default().push(one);
    }
    println!("| cause | returns | first | among three | group first, curve alone |");
    println!("|---|---|---|---|---|");
    for (deed, all) in &by_deed {
        print_row(&format!("{:?}", cause(*deed)), all);
    }
    assert_eq!(by_deed.len(), 17);
    let weighted = |of: Ask| {
        let groups = GROUPS.iter().map(|group| {
            let shares = group.iter().map(|deed| share(&by_deed[deed], of));
            shares.sum::<f64>() / group.len() as f64
        });
        groups.sum::<f64>() / GROUPS.len() as f64
    };
    let bars: [(Ask, f64); 3] = [
        (first, 0.85),
        (among_three, 0.97),
        (|one| one.group_first_on_curve, 0.90),
    ];
    let found = bars.map(|(of, _)| weighted(of));
    println!(
        "| all, by their priors | {} | {:.1} % | {:.1} % | {:.1} % |",
        outcomes.len(),
        100.0 * found[0],
        100.0 * found[1],
        100.0 * found[2]
    );
    for (found, (_, least)) in found.iter().zip(bars) {
        assert!(*found >= least);
    }
}

/// Per bin of support: the mean support claimed, the share right; at least 100 claims each.
fn calibration(all: &[&Outcome]) -> Vec<(f64, f64)> {
    println!("\n| support | claims | mean support | right |\n|---|---|---|---|");
    let bins = [(0.0, 0.2), (0.2, 0.4), (0.4, 0.6), (0.6, 0.8), (0.8, 1.0)];
    let found = bins.map(|(low, high)| {
        let claims = all.iter().flat_map(|one| &one.claims);
        // What nobody would call a claim would fill the lowest bin with thousands of zeros.
        let least = f64::max(low, 0.01);
        let within = |support: f64| support >= least && (support < high || high >= 1.0);
        let here: Vec<_> = claims.filter(|(support, _)| within(*support)).collect();
        let n = here.len() as f64;
        let mean = here.iter().map(|(support, _)| support).sum::<f64>() / n;
        let right = here.iter().filter(|(_, right)| *right).count() as f64 / n;
        let (from, to) = (100.0 * low, 100.0 * high);
        println!(
            "| {from:.0}–{to:.0} % | {n} | {:.1} % | {:.1} % |",
            100.0 * mean,
            100.0 * right
        );
        assert!(n >= 100.0);
        (mean, right)
    });
    found.to_vec()
}

/// Causes, no change and severities down to nothing drawn as the priors have them: the share right of every bin of support
/// lies within 10 points of the mean claimed. (Without severities below 3 U middling claims are right too often.)
#[test]
fn support_is_calibrated_over_all_severities() {
    let outcomes = returns(6000, |number| {
        let mut random = Random::new(9413, number);
        let deed = deed(&mut random);
        judged(deed, &mut random, |_| true)
    });
    let all: Vec<&Outcome> = outcomes.iter().collect();
    for (mean, right) in calibration(&all) {
        assert!((mean - right).abs() <= 0.10);
    }
}

#[test]
fn unchanged_springs_are_seldom_accused() {
    let outcomes = returns(300, |number| {
        judged(Deed::Nothing, &mut Random::new(118, number), |_| true)
    });
    let all: Vec<&Outcome> = outcomes.iter().collect();
    let accused = share(&all, |one| one.accused > 0.5);
    println!(
        "unchanged, a cause above 50 % support: {:.1} %",
        100.0 * accused
    );
    assert!(accused <= 0.05);
}

/// How often the true cause comes first, by the size of its most sensitive finding in U; it must not fall with size.
#[test]
fn small_severities_as_a_detection_curve() {
    let steps = [
        (0.25, 0.5),
        (0.5, 1.0),
        (1.0, 1.5),
        (1.5, 2.0),
        (2.0, 3.0),
        (3.0, 5.0),
    ];
    println!("| change of the most sensitive finding | true cause first |\n|---|---|");
    let mut before = 0.0;
    for (from, to) in steps {
        let outcomes = returns(400, |number| {
            let mut random = Random::new(62, number);
            let sized = |deed| !matches!(deed, Deed::Member | Deed::Other | Deed::Heat);
            let deed = loop {
                let deed = some_deed(&mut random);
                if sized(deed) {
                    break deed;
                }
            };
            judged(deed, &mut random, |strength| {
                strength >= from && strength < to
            })
        });
        let all: Vec<&Outcome> = outcomes.iter().collect();
        let found = share(&all, first);
        println!("| {from}–{to} U | {:.1} % |", 100.0 * found);
        assert!(
            found >= before - 0.05,
            "{from} to {to} U: {found} after {before}"
        );
        before = found;
    }
    assert!(before >= 0.85);
}

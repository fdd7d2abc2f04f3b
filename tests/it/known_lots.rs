//! Lots whose truth is known: how often a spring that truly fails a requirement is judged to conform, and the other way.
//!
//! What the guard band promises: *at* a limit, a true value is judged to lie on the other side at most 5 times in 100.
//! Springs further off are judged wrongly less often, so over a population the share of wrong verdicts among springs
//! truly on one side is below 5 %. A lot shares its bench's errors, so lots, not springs, are the independent trials:
//! held against 5 % are the lots in which the spring nearest its limit on the wrong side is judged wrongly.

use std::collections::{BTreeMap, HashMap};
use std::fmt::Write;

use coilassay::job::{Options, accept};
use coilassay::verdict::Verdict;

use crate::known;

const LOTS: u64 = 2400;
const THREADS: usize = 4;
const SETTINGS: usize = 4;
/// Name in `truth.csv`, lower and upper limit as the generated drawing states them.
const LIMITS: [(&str, f64, f64); 4] = [
    ("rate_n_per_mm", 10.28, 10.92),
    ("load_at_70_n", 202.0, 222.0),
    ("load_at_52_n", 385.0, 421.0),
    ("free_length_mm", 89.3, 91.1),
];

/// One characteristic of one spring: the truth, and what was judged.
#[derive(Clone, Copy)]
struct Judged {
    lot: u64,
    setting: usize,
    of: usize,
    truth: f64,
    verdict: Option<Verdict>,
    u: f64,
}

impl Judged {
    /// Distance of the truth inside the nearer limit; below zero outside.
    fn inside(&self) -> f64 {
        let (_, low, high) = LIMITS[self.of];
        (self.truth - low).min(high - self.truth)
    }

    fn wrong(&self) -> bool {
        let said = if self.inside() < 0.0 {
            Verdict::Conforms
        } else {
            Verdict::Fails
        };
        self.verdict == Some(said)
    }
}

/// Truths by lot and spring: setting and the four values.
fn truths(csv: &str) -> HashMap<(u64, String), (usize, [f64; 4])> {
    let mut lines = csv.lines();
    let header: Vec<&str> = lines.next().unwrap().split(',').collect();
    let place = |name: &str| header.iter().position(|known| *known == name).unwrap();
    let columns = LIMITS.map(|(name, _, _)| place(name));
    let row = |line: &str| {
        let cells: Vec<&str> = line.split(',').collect();
        let key = (cells[0].parse().unwrap(), cells[2].to_owned());
        let values = columns.map(|at| cells[at].parse().unwrap());
        for ((name, low, high), value) in LIMITS.iter().zip(values) {
            let conforms: bool = cells[place(&format!("{name}_conforms"))].parse().unwrap();
            assert_eq!(
                conforms,
                (*low..=*high).contains(&value),
                "limits of {name}"
            );
        }
        (key, (cells[1].parse().unwrap(), values))
    };
    lines.map(row).collect()
}

fn judged() -> Vec<Judged> {
    let folder = tempfile::tempdir().unwrap();
    known::write(folder.path(), LOTS, 17).unwrap();
    let truths = truths(&std::fs::read_to_string(folder.path().join("truth.csv")).unwrap());
    let options = Options {
        date: jiff::civil::date(2026, 12, 1),
        units_confirmed: false,
        strict: false,
        keep: coilassay::job::Keep::default(),
        block_bytes: None,
        flags: Vec::new(),
        memory: coilassay::job::Memory::Nothing,
        past: None,
    };
    let (truths, options, folder) = (&truths, &options, &folder);
    let one_lot = move |lot: u64| {
        let path = folder.path().join(format!("lot-{lot:05}/lot.toml"));
        let record = accept(&path, "lot.toml", options).unwrap().record;
        assert_eq!(record.springs.len() as u64, known::SPRINGS);
        let mut all = Vec::new();
        for spring in &record.springs {
            let (setting, values) = truths[&(lot, spring.id.clone())];
            for (of, (name, _, _)) in LIMITS.iter().enumerate() {
                let found = spring.characteristics.iter().find(|one| {
                    let at = one.at_length_mm.map_or(0.0, f64::from);
                    name.starts_with(&one.name)
                        && (one.name != "load" || name.contains(&format!("_{at}_")))
                });
                let found = found.unwrap();
                all.push(Judged {
                    lot,
                    setting,
                    of,
                    truth: values[of],
                    verdict: found.verdict,
                    u: found.standard_uncertainty.map_or(f64::INFINITY, f64::from),
                });
            }
        }
        all
    };
    // `accept` itself works in parallel: lots of a worker that waits would pile up on its stack, so threads of their own.
    let share = |first: u64| {
        (first..=LOTS)
            .step_by(THREADS)
            .flat_map(one_lot)
            .collect::<Vec<_>>()
    };
    std::thread::scope(|scope| {
        let threads: Vec<_> = (1..=THREADS as u64)
            .map(|first| scope.spawn(move || share(first)))
            .collect();
        let done = threads.into_iter().map(|thread| thread.join().unwrap());
        done.flatten().collect()
    })
}

/// Lots, and lots judged wrongly, among the springs truly on one side, of each lot the one nearest the limit.
fn nearest(all: &[&Judged]) -> (u64, u64) {
    let mut lots: BTreeMap<u64, &Judged> = BTreeMap::new();
    for one in all {
        let known = lots.entry(one.lot).or_insert(one);
        if one.inside().abs() < known.inside().abs() {
            *known = one;
        }
    }
    let wrong = lots.values().filter(|one| one.wrong()).count() as u64;
    (lots.len() as u64, wrong)
}

/// The most wrong verdicts that `trials` at 5 % give but once in 10 000: mean and 3.72 standard deviations of the
/// binomial, half a count for continuity and one for its skew (by hand: z of 0.9999 is 3.719).
fn most(trials: u64) -> f64 {
    let mean = 0.05 * trials as f64;
    mean + 3.72 * (0.95 * mean).sqrt() + 1.5
}

#[test]
fn wrong_verdicts_stay_within_the_guard_band() {
    let all = judged();
    assert_eq!(
        all.len() as u64,
        LOTS * known::SPRINGS * LIMITS.len() as u64
    );
    let mut table = String::new();
    let mut misses = Vec::new();
    for setting in 0..SETTINGS {
        for (of, (name, _, _)) in LIMITS.iter().enumerate() {
            let these = || {
                all.iter()
                    .filter(move |one| (one.setting, one.of) == (setting, of))
            };
            write!(table, "{setting} {name:<15}").unwrap();
            for (side, said) in [("outside", "conforms"), ("inside", "fails")] {
                let true_side: Vec<&Judged> = these()
                    .filter(|one| (one.inside() < 0.0) == (side == "outside"))
                    .collect();
                let wrong = true_side.iter().filter(|one| one.wrong()).count();
                let near: Vec<&Judged> = true_side
                    .iter()
                    .copied()
                    .filter(|one| one.inside().abs() < 0.25 * one.u)
                    .collect();
                let near_wrong = near.iter().filter(|one| one.wrong()).count();
                let (lots, lots_wrong) = nearest(&true_side);
                write!(
                    table,
                    " | truly {side} {:>5}: {said} {wrong:>3} ({:.2} %), within u/4 of the limit {near_wrong:>2} of {:>3}, lots {lots_wrong:>2} of {lots:>3}",
                    true_side.len(),
                    100.0 * wrong as f64 / true_side.len().max(1) as f64,
                    near.len(),
                )
                .unwrap();
                if lots_wrong as f64 > most(lots) || lots < 20 {
                    misses.push(format!(
                        "setting {setting}, {name}, truly {side}: {lots_wrong} of {lots} lots judged `{said}`"
                    ));
                }
            }
            let decided = these()
                .filter(|one| matches!(one.verdict, Some(Verdict::Conforms | Verdict::Fails)))
                .count();
            writeln!(
                table,
                " | decided {:.0} %",
                100.0 * decided as f64 / these().count() as f64
            )
            .unwrap();
        }
    }
    // Right at a limit, all benches together: the promise itself.
    for (of, (name, _, _)) in LIMITS.iter().enumerate() {
        let near = all
            .iter()
            .filter(|one| one.of == of && one.inside().abs() < 0.25 * one.u);
        let (mut trials, mut wrong) = (0, 0);
        for one in near {
            trials += 1;
            wrong += u64::from(one.wrong());
        }
        writeln!(
            table,
            "at the limit (within u/4), {name}: {wrong} of {trials} wrong"
        )
        .unwrap();
        if wrong as f64 > most(trials) || trials < 40 {
            misses.push(format!("at the limit, {name}: {wrong} of {trials}"));
        }
    }
    println!("{table}");
    assert!(misses.is_empty(), "{misses:#?}");
}

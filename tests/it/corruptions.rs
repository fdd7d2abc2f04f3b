//! Good exports spoilt in many ways. A spoilt lot passes if every verdict is that of the clean one, or there is a named
//! fault, or a spring whose verdict differs is undecided with a reason. Anything else is a silent wrong verdict.
//! `cargo test … corruptions -- --nocapture` prints the table that DEVELOPERS.md keeps.

mod hidden;
mod lot_ways;
mod row_ways;
mod text_ways;

use std::collections::{BTreeMap, BTreeSet};
use std::fmt::Write;
use std::path::Path;

use coilassay::job::{Options, accept};
use coilassay::record::{Decision, Verdict};

use crate::bench::{Bench, Programme, run};
use crate::known_text::REQUIREMENTS;
use crate::random::Random;
use crate::rigs::{EVERY_SPRING, FORCE_TRAVEL_FRAME, drawing, spring};
use crate::text;

/// Relative rate and the drawn-out length of each spring: amid the limits, near them, beyond them.
const SPRINGS: [(f64, f64); 6] = [
    (0.002, 89.85),
    (0.014, 89.95),
    (-0.042, 89.80),
    (0.050, 89.90),
    (0.026, 89.85),
    (-0.010, 88.75),
];

/// An export: file name and text.
pub(crate) type File = (String, Vec<u8>);

/// A row: time in s, length in mm, load in N.
pub(crate) type Row = [f64; 3];

/// How a lot came out.
#[derive(Debug)]
enum Came {
    Fault(String),
    Judged(Decision, BTreeMap<String, (Verdict, BTreeSet<String>)>),
}

/// What became of a corruption, from best to worst.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Fate {
    Same,
    Fault(String),
    Undecided(BTreeSet<String>),
    Wrong(String),
}

const RIG: &str = r#"# Invented bench.
units = "mm-N"
[rig]
name = "Bench"
[export]
header_line = 1
delimiter = ","
decimal = "."
load = { column = "Load [N]", unit = "N", pushing = "positive" }
travel = { column = "Length [mm]", unit = "mm", means = "length" }
spring = { from = "file name" }
"#;

/// The line that names the column of time, for benches whose rig file does.
const TIME: &str = "time = { column = \"Time [s]\", unit = \"s\" }\n";

const LOT: &str = r#"drawing = "drawing.toml"
rig = "rig.toml"
exports = ["springs/*.csv"]
[lot]
number = "1"
size = 6
[conditions]
temperature = 20.0
presetting_strokes = 3
"#;

/// The clean exports.
fn clean() -> Vec<File> {
    let one = |(place, (rate, line)): (u64, (f64, f64))| {
        let mut random = Random::new(61, place);
        let mut specimen = spring(rate, line, &mut random);
        specimen.set = 0.04;
        let bench = Bench {
            empty: 0.06,
            noise: 0.05,
            ..Bench::perfect()
        };
        let programme = Programme {
            air: 2.0,
            bottom: 45.0,
            cycles: 3,
            loading: 80,
            unloading: 40,
            dwell: 0,
            slow_below: 0.0,
        };
        let mut out = b"Time [s],Length [mm],Load [N]\n".to_vec();
        run(&specimen, &bench, &programme, &mut random, |reading| {
            for (value, end) in [
                (reading.time, b','),
                (reading.travel, b','),
                (reading.force, b'\n'),
            ] {
                text::number(&mut out, value, 3, b'.');
                out.push(end);
            }
        });
        (format!("{}.csv", place + 1), out)
    };
    (0..).zip(SPRINGS).map(one).collect()
}

fn judge(files: &[File], timed: bool) -> Came {
    let folder = tempfile::tempdir().unwrap();
    let write = |name: &str, bytes: &[u8]| text::file(&folder.path().join(name), bytes).unwrap();
    write(
        "drawing.toml",
        drawing(REQUIREMENTS, EVERY_SPRING).as_bytes(),
    );
    let clock = if timed { TIME } else { "" };
    write(
        "rig.toml",
        format!("{RIG}{clock}{FORCE_TRAVEL_FRAME}").as_bytes(),
    );
    write("lot.toml", LOT.as_bytes());
    for (name, bytes) in files {
        write(&format!("springs/{name}"), bytes);
    }
    came(&folder.path().join("lot.toml"))
}

fn came(lot: &Path) -> Came {
    let options = Options {
        date: jiff::civil::date(2026, 12, 1),
        units_confirmed: false,
        strict: false,
        keep: coilassay::job::Keep::default(),
        memory: coilassay::job::Memory::Nothing,
        past: None,
        block_bytes: None,
        flags: Vec::new(),
    };
    let accepted = match accept(lot, "lot.toml", &options) {
        Ok(accepted) => accepted.record,
        Err(fault) => {
            let inner = fault.related().and_then(|mut all| all.next());
            let code = inner
                .and_then(miette::Diagnostic::code)
                .or_else(|| fault.code());
            return Came::Fault(code.map_or_else(|| fault.to_string(), |code| code.to_string()));
        }
    };
    let of = |spring: &coilassay::record::SpringResult| {
        let settled = spring.verdict;
        let reasons = spring
            .characteristics
            .iter()
            .filter(|one| one.verdict == Some(settled));
        let reasons = reasons.filter_map(|one| {
            let value = serde_json::to_value(one.reason.as_ref()?).unwrap();
            let code = value["code"].as_str().unwrap();
            Some(match settled {
                Verdict::Undecided => code.to_owned(),
                _ => format!("{}: {code}", one.name),
            })
        });
        (spring.id.clone(), (spring.verdict, reasons.collect()))
    };
    Came::Judged(accepted.decision, accepted.springs.iter().map(of).collect())
}

fn fate(clean: &Came, spoilt: Came) -> Fate {
    let (Came::Judged(decision, known), spoilt) = (clean, spoilt) else {
        return Fate::Wrong("the clean lot is not judged".to_owned());
    };
    let (now, found) = match spoilt {
        Came::Fault(code) => return Fate::Fault(code),
        Came::Judged(now, found) => (now, found),
    };
    let mut reasons = BTreeSet::new();
    for (id, (verdict, why)) in &found {
        let before = known.get(id).map(|one| one.0);
        if before == Some(*verdict) {
            continue;
        }
        if *verdict != Verdict::Undecided || why.is_empty() {
            return Fate::Wrong(format!("{id}: {before:?} became {verdict:?} {why:?}"));
        }
        reasons.extend(why.iter().cloned());
    }
    if known.keys().any(|id| !found.contains_key(id)) {
        if now == Decision::Accepted {
            return Fate::Wrong("springs missing and accepted".to_owned());
        }
        reasons.insert("springs_missing".to_owned());
    }
    let turned = *decision != now && now == Decision::Accepted;
    match (turned, reasons.is_empty()) {
        (true, _) => Fate::Wrong(format!("{decision:?} became {now:?}")),
        (false, true) => Fate::Same,
        (false, false) => Fate::Undecided(reasons),
    }
}

/// The header and the rows of an export.
pub(crate) fn rows(text: &str) -> (String, Vec<Row>) {
    let mut lines = text.lines();
    let header = lines.next().unwrap().to_owned();
    let row = |line: &str| {
        let mut cells = line.split(',').map(|cell| cell.parse().unwrap());
        [
            cells.next().unwrap(),
            cells.next().unwrap(),
            cells.next().unwrap(),
        ]
    };
    (header, lines.map(row).collect())
}

/// An export again.
pub(crate) fn joined(header: &str, rows: &[Row]) -> String {
    let mut text = format!("{header}\n");
    for [time, length, load] in rows {
        writeln!(text, "{time:.3},{length:.3},{load:.3}").unwrap();
    }
    text
}

/// One line of the printed table.
struct Told {
    name: String,
    fates: Vec<Fate>,
}

impl Told {
    fn print(&self) {
        let mut counts: BTreeMap<String, usize> = BTreeMap::new();
        for fate in &self.fates {
            let word = match fate {
                Fate::Same => "same verdicts".to_owned(),
                Fate::Fault(code) => code.replace("coilassay::", "fault "),
                Fate::Undecided(why) => {
                    format!(
                        "undecided: {}",
                        why.iter().cloned().collect::<Vec<_>>().join(", ")
                    )
                }
                Fate::Wrong(what) => format!("WRONG {what}"),
            };
            *counts.entry(word).or_default() += 1;
        }
        let all: Vec<String> = counts
            .iter()
            .map(|(word, count)| format!("{count} × {word}"))
            .collect();
        println!("| {} | {} |", self.name, all.join("; "));
    }
}

/// Every way, on each export by itself and on all of them.
fn told(timed: bool) -> Vec<Told> {
    let clean = clean();
    let known = judge(&clean, timed);
    let text = |bytes: &[u8]| String::from_utf8(bytes.to_vec()).unwrap();
    let mut all = Vec::new();
    let single = text_ways::WAYS.iter().chain(row_ways::WAYS.iter());
    for (name, spoil) in single {
        let spoilt = |file: &File, place: usize| {
            let mut random = Random::new(7, place as u64);
            (file.0.clone(), spoil(&text(&file.1), &mut random))
        };
        let mut fates = Vec::new();
        for place in 0..clean.len() {
            let mut files = clean.clone();
            files[place] = spoilt(&clean[place], place);
            fates.push(fate(&known, judge(&files, timed)));
        }
        let every: Vec<File> = (0..)
            .zip(&clean)
            .map(|(place, file)| spoilt(file, place))
            .collect();
        fates.push(fate(&known, judge(&every, timed)));
        all.push(Told {
            name: (*name).to_owned(),
            fates,
        });
    }
    for (name, spoil) in lot_ways::WAYS {
        let fates = (0..clean.len()).map(|place| {
            let mut files = clean.clone();
            spoil(&mut files, place);
            fate(&known, judge(&files, timed))
        });
        all.push(Told {
            name: (*name).to_owned(),
            fates: fates.collect(),
        });
    }
    all
}

#[test]
fn no_corruption_gives_a_silent_wrong_verdict() {
    let known = judge(&clean(), true);
    let Came::Judged(_, springs) = &known else {
        panic!("{known:?}")
    };
    let count = |verdict| springs.values().filter(|one| one.0 == verdict).count();
    assert_eq!(
        [Verdict::Conforms, Verdict::Fails, Verdict::Undecided].map(count),
        [2, 3, 1],
        "{known:?}"
    );
    let mut told = told(true);
    for (one, other) in told.iter_mut().zip(self::told(false)) {
        one.fates.extend(other.fates);
    }
    println!(
        "| corruption | 6 × one export, 1 × all; with and without a column of time |\n|---|---|"
    );
    told.iter().for_each(Told::print);
    let wrong: Vec<String> = told
        .iter()
        .filter(|one| one.fates.iter().any(|fate| matches!(fate, Fate::Wrong(_))))
        .map(|one| format!("{}: {:?}", one.name, one.fates.iter().max()))
        .collect();
    println!(
        "{} ways, {} lots, {} silent wrong verdicts",
        told.len(),
        told.iter().map(|one| one.fates.len()).sum::<usize>(),
        wrong.len()
    );
    assert!(told.len() >= 60);
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

/// What no file can show, and what guards against it; kept apart, with what becomes of it.
#[test]
fn what_no_file_can_show_is_listed_with_its_guard() {
    let clean = clean();
    let known = judge(&clean, true);
    println!("| no file shows it | the guard | what becomes of it |\n|---|---|---|");
    for (name, guard, spoil) in hidden::WAYS {
        let mut files = clean.clone();
        spoil(&mut files);
        let fate = fate(&known, judge(&files, true));
        assert!(guard.len() > 20);
        println!("| {name} | {guard} | {fate:?} |");
    }
}

//! The other side of the corruptions: 200 good exports of many forms, springs that truly pass and that truly fail, far
//! enough from the limits for the bench. Every decision is right, none is withheld. `-- --nocapture` prints the table.

use std::collections::BTreeMap;

use coilassay::job::{Options, accept};
use coilassay::record::{Decision, Verdict};

use crate::bench::{Bench, Programme, run};
use crate::dialects::Form;
use crate::known_text::REQUIREMENTS;
use crate::random::Random;
use crate::rigs::{EVERY_SPRING, drawing, spring};
use crate::text;

const EXPORTS: u64 = 200;

/// Relative rate and drawn-out length of springs that pass, and of those that fail.
const GOOD: [(f64, f64); 3] = [(0.003, 89.9), (-0.008, 89.7), (0.012, 89.8)];
const BAD: [(f64, f64); 4] = [(0.065, 89.9), (-0.06, 89.8), (0.002, 87.6), (0.001, 92.3)];

/// How the bench takes its spring through the test.
fn programme(random: &mut Random) -> Programme {
    let cycles = if random.unit() < 0.5 { 1 } else { 3 };
    let solid = random.unit() < 0.3;
    Programme {
        air: random.between(1.0, 4.0),
        bottom: if solid {
            37.4
        } else {
            random.between(44.0, 50.0)
        },
        cycles,
        loading: if random.unit() < 0.3 { 800 } else { 90 },
        unloading: if random.unit() < 0.5 { 30 } else { 60 },
        dwell: if random.unit() < 0.3 { 25 } else { 0 },
        slow_below: if solid { 37.9 } else { 0.0 },
    }
}

/// The rows that a spring gives on the bench that writes `form`, and its free length.
pub(crate) fn measured(
    form: &Form,
    (rate, line): (f64, f64),
    random: &mut Random,
) -> (Vec<[f64; 3]>, f64) {
    let specimen = spring(rate, line, random);
    let bench = Bench {
        travel: form.scale(),
        compliance: 0.000_12,
        empty: random.normal(0.2),
        noise: random.between(0.01, 0.15),
        force_unit: form.force_unit(),
        travel_unit: form.travel.1,
        ..Bench::perfect()
    };
    let mut rows = Vec::new();
    run(&specimen, &bench, &programme(random), random, |reading| {
        rows.push([reading.time, reading.travel, reading.force]);
    });
    (rows, specimen.free())
}

fn rig(form: &Form) -> String {
    let (load, travel) = form.steps();
    let zero = match form.means {
        "deflection" => "",
        _ => "zero = { uncertainty = 0.02, k = 2 }\n",
    };
    format!(
        "# Invented bench.\nunits = \"mm-N\"\n[rig]\nname = \"Bench\"\n{}[force]\nclass = \"0.5\"\nresolution = {load}\n\
         range = {{ from = 4.0, to = 1000.0 }}\n[travel]\nclass = \"0.5\"\nresolution = {travel}\n{zero}[frame]\n\
         compliance = {{ value = 0.00012, uncertainty = 0.00001, k = 2 }}\n[contact]\nload = 1.0\n",
        form.rig()
    )
}

/// The decision on export `number`, what is right, and what it is like.
fn decided(number: u64) -> (Result<(Decision, Verdict), String>, bool, Form) {
    let mut random = Random::new(200, number);
    let form = Form::drawn(&mut random);
    let good = number.is_multiple_of(2);
    let pick = usize::try_from(number / 2).unwrap();
    let (rate, line) = if good {
        GOOD[pick % GOOD.len()]
    } else {
        BAD[pick % BAD.len()]
    };
    let (rows, free) = measured(&form, (rate, line), &mut random);
    let folder = tempfile::tempdir().unwrap();
    let write = |name: &str, bytes: &[u8]| text::file(&folder.path().join(name), bytes).unwrap();
    write(
        "drawing.toml",
        drawing(REQUIREMENTS, EVERY_SPRING).as_bytes(),
    );
    write("rig.toml", rig(&form).as_bytes());
    write("S-1.csv", &form.export(&rows));
    let (findings, caliper) = match form.means {
        "deflection" => (
            "findings = \"caliper.csv\"\n",
            "[caliper]\nfree_length = { uncertainty = 0.04, k = 2 }\n",
        ),
        _ => ("", ""),
    };
    write(
        "caliper.csv",
        format!("spring,free_length\n,mm\nS-1,{free:.3}\n").as_bytes(),
    );
    let lot = format!(
        "drawing = \"drawing.toml\"\nrig = \"rig.toml\"\nexports = [\"S-1.csv\"]\n{findings}[lot]\nnumber = \"{number}\"\nsize = 1\n\
         [conditions]\ntemperature = 20.0\npresetting_strokes = 3\n{caliper}"
    );
    write("lot.toml", lot.as_bytes());
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
    let came = accept(&folder.path().join("lot.toml"), "lot.toml", &options);
    let came = came.map_err(|fault| format!("{fault:?}"));
    let came = came.map(|accepted| (accepted.record.decision, accepted.record.springs[0].verdict));
    (came, good, form)
}

#[test]
fn two_hundred_good_exports_are_judged_rightly() {
    let mut table: BTreeMap<(String, String), (u32, u32)> = BTreeMap::new();
    let mut misses = Vec::new();
    for number in 0..EXPORTS {
        let (came, good, form) = decided(number);
        let wanted = if good {
            (Decision::Accepted, Verdict::Conforms)
        } else {
            (Decision::Rejected, Verdict::Fails)
        };
        let right = came == Ok(wanted);
        if !right {
            misses.push(format!("{number}, good: {good}, {form:?}: {came:?}"));
        }
        let truth = if good { "passes" } else { "fails" };
        let traits = [
            ("truth", truth.to_owned()),
            (
                "encoding",
                format!(
                    "{}{}",
                    form.encoding,
                    if form.mark { " with mark" } else { "" }
                ),
            ),
            (
                "delimiter",
                form.delimiter.replace('\t', "tab").replace("  ", "blanks"),
            ),
            ("decimal mark", form.decimal.to_owned()),
            (
                "line end",
                form.line_end.replace('\r', "CR").replace('\n', "LF"),
            ),
            (
                "load in",
                format!(
                    "{}{}",
                    form.load.0,
                    if form.pulls { ", pushing negative" } else { "" }
                ),
            ),
            ("travel in", form.travel.0.to_owned()),
            ("travel means", form.means.to_owned()),
            ("units in", form.units.to_owned()),
        ];
        for (what, which) in traits {
            let entry = table.entry((what.to_owned(), which)).or_default();
            entry.0 += u32::from(right);
            entry.1 += 1;
        }
    }
    println!("| good exports | | right of all |\n|---|---|---|");
    for ((what, which), (right, all)) in &table {
        println!("| {what} | `{which}` | {right} of {all} |");
    }
    println!("{} of {EXPORTS} right", EXPORTS - misses.len() as u64);
    assert!(misses.is_empty(), "{}", misses.join("\n"));
}

//! `track` from the command line: exit codes, JSON, sources, the page.

use std::fmt::Write as _;
use std::fs;
use std::path::Path;

use assert_cmd::Command;
use serde_json::Value;

use crate::random::Random;

const HEAD: &str = "drawing,lot,supplier,date,received,rig,tags,decision,characteristic,at_length_mm,unit,nominal,lower,upper,springs,mean,standard_deviation,own_uncertainty,common_uncertainty\n";

/// A table of `lots` lots whose level moves by `jump` N/mm from lot `at` on.
fn table(folder: &Path, lots: usize, at: usize, jump: f64) -> String {
    let mut random = Random::new(0x7AB1E, 1);
    let mut text = HEAD.to_owned();
    for lot in 0..lots {
        let (month, day) = (1 + lot / 28, 1 + lot % 28);
        let moved = if lot < at { 0.0 } else { jump };
        let heat = if lot < at { "H-1" } else { "H-2" };
        let mean = 10.6 + moved + random.normal(0.02);
        let spread = 0.05 + random.normal(0.005);
        writeln!(
            text,
            "TG-204,{},Marsh,2026-{month:02}-{day:02},,Bench 1,\"{{\"\"wire_heat\"\":\"\"{heat}\"\"}}\",accepted,rate,,N/mm,10.6,10.07,11.13,8,{mean},{spread},0.02,0.03",
            9 + lot
        )
        .unwrap();
    }
    let path = folder.join("figures.csv");
    fs::write(&path, text).unwrap();
    path.to_string_lossy().into_owned()
}

fn track(arguments: &[&str]) -> (i32, String, String) {
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .arg("track")
        .args(arguments)
        .args(["--date", "2026-11-30"])
        .output()
        .unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    (
        output.status.code().unwrap(),
        text(output.stdout),
        text(output.stderr),
    )
}

fn json(arguments: &[&str]) -> (i32, Value) {
    let (code, out, err) = track(&[arguments, &["--json"]].concat());
    (
        code,
        serde_json::from_str(&out).unwrap_or_else(|_| panic!("{err}")),
    )
}

#[test]
fn quiet_lots_are_quiet_and_a_jump_is_found_with_what_changed() {
    let folder = tempfile::tempdir().unwrap();
    let quiet = table(folder.path(), 40, 40, 0.0);
    let (code, result) = json(&[&quiet]);
    assert_eq!((code, &result["decision"]), (0, &Value::from("quiet")));
    assert_eq!(result["steps"], Value::from(Vec::<Value>::new()));
    assert_eq!(result["baseline_lots"], 20);
    let moved = table(folder.path(), 40, 28, -0.1);
    let (code, result) = json(&[&moved]);
    assert_eq!((code, &result["decision"]), (1, &Value::from("fires")));
    let step = &result["steps"][0];
    assert_eq!(
        (&step["at"], &step["lot_after"]),
        (&Value::from(28), &Value::from("37"))
    );
    assert_eq!(step["culprit"]["whose"], "cannot_be_told");
    assert_eq!(step["culprit"]["why"], "no_checks");
    assert_eq!(step["changed_with"][0], "wire_heat: H-1, then H-2");
    let by = json(&[&moved, "--by", "wire_heat"]).1;
    assert_eq!(by["groups"][0]["value"], "H-1");
    assert_eq!(by["groups"][0]["lots"], 28);
    assert_eq!(by["groups"][1]["lots"], 12);
}

#[test]
fn too_few_lots_are_undecided_and_what_cannot_be_charted_is_a_fault() {
    let folder = tempfile::tempdir().unwrap();
    let few = table(folder.path(), 8, 8, 0.0);
    let (code, result) = json(&[&few]);
    assert_eq!(
        (code, &result["decision"]),
        (3, &Value::from("too_few_lots"))
    );
    assert_eq!(result["alarms"], Value::from(Vec::<Value>::new()));
    let enough = table(folder.path(), 30, 30, 0.0);
    assert_eq!(json(&[&enough, "--since", "2026-01-25"]).0, 3);
    assert_eq!(
        json(&[&enough, "--baseline", "2026-01-01..2026-01-05"]).0,
        3
    );
    for (arguments, says) in [
        (
            vec![enough.as_str(), "--characteristic", "solid_length"],
            "there is no `solid_length` in the lots; there is rate",
        ),
        (vec![enough.as_str(), "--drawing", "TG-1"], "no lot answers"),
        (
            vec![enough.as_str(), "--by", "oven"],
            "no lot has the tag `oven`",
        ),
        (
            vec![enough.as_str(), enough.as_str()],
            "is in the sources twice",
        ),
        (vec!["nowhere"], "no archive"),
    ] {
        let (code, out, err) = track(&arguments);
        assert_eq!(code, 2, "{arguments:?}: {out}");
        assert!(err.contains(says), "{err}");
    }
}

#[test]
fn lots_that_are_copies_of_each_other_give_no_limits() {
    let folder = tempfile::tempdir().unwrap();
    let path = table(folder.path(), 20, 20, 0.0);
    let text = fs::read_to_string(&path).unwrap();
    let same: String = text
        .lines()
        .enumerate()
        .map(|(row, line)| {
            let cells: Vec<&str> = line.rsplitn(5, ',').collect();
            if row == 0 {
                format!("{line}\n")
            } else {
                format!("{},10.5,0.05,0.02,0.03\n", cells[4])
            }
        })
        .collect();
    fs::write(&path, same).unwrap();
    let (code, _, err) = track(&[&path]);
    assert_eq!(code, 2);
    assert!(err.contains("do not differ at all"), "{err}");
}

/// Lot order takes numbers by their value: 9 before 10.
#[test]
fn lots_in_the_order_of_their_numbers() {
    let folder = tempfile::tempdir().unwrap();
    let path = table(folder.path(), 30, 30, 0.0);
    let result = json(&[&path, "--order", "lot"]).1;
    assert_eq!(result["lots"][0]["lot"], "9");
    assert_eq!(result["lots"][1]["lot"], "10");
}

/// The sample archive: the rate falls after a change of wire heat, and the reference spring says that it is the springs.
#[test]
fn the_sample_archive_names_the_springs_and_the_wire_heat() {
    let archive = concat!(env!("CARGO_MANIFEST_DIR"), "/samples/archive");
    let (code, result) = json(&[archive, "--by", "wire_heat"]);
    assert_eq!(code, 1);
    assert_eq!(result["lots"].as_array().unwrap().len(), 40);
    let step = &result["steps"][0];
    assert_eq!(step["culprit"]["whose"], "springs");
    assert_eq!(step["changed_with"][0], "wire_heat: H-051, then H-063");
    assert!(step["from"].as_u64().unwrap() <= 25 && step["to"].as_u64().unwrap() >= 25);
    assert_eq!(result["trend"]["moves"], true);
    assert!(result["trend"]["slope_per_lot"].as_f64().unwrap() < 0.0);
    // The loads fall with it.
    let (code, loads) = json(&[archive, "--characteristic", "load@70"]);
    assert_eq!((code, &loads["unit"]), (1, &Value::from("N")));
}

/// The page, its charts and the result, the same on a second run.
#[test]
fn the_page_and_its_charts() {
    let folder = tempfile::tempdir().unwrap();
    let moved = table(folder.path(), 40, 28, -0.1);
    let mut pages = Vec::new();
    for name in ["one", "two"] {
        let dir = folder.path().join(name);
        let (code, out, err) = track(&[&moved, "--out", dir.to_str().unwrap()]);
        assert_eq!(code, 1, "{err}");
        assert!(out.starts_with("A RULE FIRES"), "{out}");
        pages.push(fs::read(dir.join("report.html")).unwrap());
        for chart in ["means", "spreads", "ewma", "cusum"] {
            assert!(
                dir.join(format!("charts/track-{chart}.svg")).is_file(),
                "{chart}"
            );
        }
        assert!(
            fs::read(dir.join("report.pdf"))
                .unwrap()
                .starts_with(b"%PDF")
        );
        let result: Value =
            serde_json::from_slice(&fs::read(dir.join("result.json")).unwrap()).unwrap();
        assert_eq!(result["files"].as_array().unwrap().len(), 6);
    }
    assert_eq!(pages[0], pages[1]);
}

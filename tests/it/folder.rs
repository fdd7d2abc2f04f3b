//! The output folder: whole or not at all, older results replaced, foreign files untouched, the same bytes everywhere.

use std::collections::BTreeMap;
use std::fs;
use std::path::Path;
use std::process::{Command, Stdio};

use sha2::{Digest, Sha256};

use crate::bad_input::{Case, copy};

pub(crate) const QUICK: [&str; 3] = ["--no-report", "--out", "out"];

/// Every file below a folder.
pub(crate) fn held(dir: &Path) -> BTreeMap<String, Vec<u8>> {
    let mut found = BTreeMap::new();
    let mut folders = vec![dir.to_owned()];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(&folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else {
                let name = path
                    .strip_prefix(dir)
                    .unwrap()
                    .to_string_lossy()
                    .into_owned();
                found.insert(name, fs::read(&path).unwrap());
            }
        }
    }
    found
}

/// The date of a whole result: it lists every other file with its true SHA-256, and no file besides is there.
pub(crate) fn whole(dir: &Path) -> String {
    let held = held(dir);
    let result: serde_json::Value = serde_json::from_slice(&held["result.json"]).unwrap();
    let mut listed = vec!["result.json".to_owned()];
    for file in result["files"].as_array().unwrap() {
        let path = file["path"].as_str().unwrap();
        let digest = Sha256::digest(&held[path]);
        let hex: Vec<String> = digest.iter().map(|byte| format!("{byte:02x}")).collect();
        assert_eq!(file["sha256"], hex.concat(), "{path}");
        listed.push(path.to_owned());
    }
    listed.sort();
    assert_eq!(listed, held.keys().cloned().collect::<Vec<_>>());
    result["provenance"]["date"].as_str().unwrap().to_owned()
}

pub(crate) fn names(dir: &Path) -> Vec<String> {
    let name = |entry: fs::DirEntry| entry.file_name().to_string_lossy().into_owned();
    let mut names: Vec<String> = fs::read_dir(dir)
        .unwrap()
        .map(|entry| name(entry.unwrap()))
        .collect();
    names.sort();
    names
}

#[test]
fn exit_codes_of_the_samples() {
    for (sample, code) in [
        ("accepted", 0),
        ("rejected", 1),
        ("undecided", 3),
        ("nested", 0),
    ] {
        let case = Case::of(sample);
        let ran = case.run(&[]);
        assert_eq!(ran.code, Some(code), "{sample}: {}", ran.err);
        assert_eq!(
            names(case.dir.path()),
            ["lot"],
            "nothing is written without --out"
        );
    }
    let mut bad = assert_cmd::Command::cargo_bin("coilassay").unwrap();
    assert_eq!(
        bad.args(["accept", "--nonsense"])
            .output()
            .unwrap()
            .status
            .code(),
        Some(2)
    );
}

#[test]
fn a_result_lists_every_file_with_its_hash() {
    let case = Case::of("nested");
    let ran = case.run(&["--out", "new/out"]);
    assert_eq!(ran.code, Some(0), "{}", ran.err);
    whole(&case.path("../new/out"));
    let files = held(&case.path("../new/out"));
    for wanted in ["report.html", "report.pdf", "springs.csv", "result.json"] {
        assert!(files.contains_key(wanted), "{wanted}");
    }
    assert!(files.keys().any(|name| name.starts_with("charts/")));
    assert_eq!(
        names(&case.path("../new")),
        ["out"],
        "no staging folder left"
    );
}

#[test]
fn json_prints_exactly_the_result_and_nothing_else() {
    let case = Case::of("undecided");
    let ran = case.run(&[&["--json"], &QUICK[..]].concat());
    assert_eq!(ran.out, fs::read(case.path("../out/result.json")).unwrap());
    let other = case.run(&["--json", "--no-report", "--out", "other", "--quiet"]);
    assert_eq!((other.out, other.err), (ran.out, String::new()));
}

#[test]
fn an_older_result_is_replaced_and_at_a_fault_untouched() {
    let case = Case::of("undecided");
    let out = case.path("../out");
    assert_eq!(case.run(&["--out", "out"]).code, Some(3));
    assert_eq!(whole(&out), "2026-12-01");
    assert_eq!(
        case.run(&[&QUICK[..], &["--date", "2026-12-02"]].concat())
            .code,
        Some(3)
    );
    assert_eq!(whole(&out), "2026-12-02");
    assert_eq!(
        names(&out),
        ["result.json", "springs.csv"],
        "nothing of the older report stays"
    );
    let before = held(&out);
    case.set("float-springs.txt", "");
    assert_eq!(case.run(&QUICK).code, Some(2));
    assert_eq!(held(&out), before);
    assert_eq!(names(case.dir.path()), ["lot", "out"]);
}

#[test]
fn a_foreign_file_is_named_and_nothing_touched() {
    for (place, text) in [
        ("out/notes.txt", "mine"),
        ("out/charts/mine.svg", "mine"),
        ("out/.hidden", ""),
        ("out/result.json", "{}"),
    ] {
        for older in [false, true] {
            let case = Case::of("undecided");
            if older {
                assert_eq!(case.run(&QUICK).code, Some(3));
            }
            case.set(&format!("../{place}"), text);
            let before = held(&case.path("../out"));
            let ran = case.run(&QUICK);
            assert_eq!(ran.code, Some(2), "{place}");
            // a result.json that is not ours makes every file foreign, the first in order of names is named
            let named = place.strip_prefix("out/").unwrap();
            assert!(
                ran.err.contains(named) || named == "result.json",
                "{place}: {}",
                ran.err
            );
            assert!(ran.err.contains("help:"), "{}", ran.err);
            assert_eq!(held(&case.path("../out")), before, "{place}");
            assert_eq!(names(case.dir.path()), ["lot", "out"]);
        }
    }
}

/// An empty folder inside is not listed by any result either.
#[test]
fn a_foreign_folder_is_not_swept_away() {
    let case = Case::of("undecided");
    assert_eq!(case.run(&QUICK).code, Some(3));
    fs::create_dir(case.path("../out/photographs")).unwrap();
    assert_eq!(case.run(&QUICK).code, Some(2));
    assert!(case.path("../out/photographs").is_dir());
}

#[test]
fn places_that_cannot_be_written() {
    let case = Case::of("undecided");
    fs::create_dir(case.path("../empty")).unwrap();
    assert_eq!(
        case.run(&["--no-report", "--out", "empty"]).code,
        Some(3),
        "an empty folder is taken"
    );
    case.set("../file", "mine");
    for place in ["file", "file/out", "file/deep/out"] {
        let ran = case.run(&["--no-report", "--out", place]);
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{place}");
        assert!(
            ran.err.contains("file") && ran.err.contains("help:"),
            "{}",
            ran.err
        );
    }
    assert_eq!(fs::read(case.path("../file")).unwrap(), b"mine");
    assert_eq!(names(case.dir.path()), ["empty", "file", "lot"]);
    let over_input = case.run(&["--no-report", "--out", "lot"]);
    assert_eq!(
        over_input.code,
        Some(2),
        "a folder with the lot's own files"
    );
}

#[test]
fn a_closed_stdout_is_no_fault() {
    for (sample, code) in [("accepted", 0), ("rejected", 1), ("undecided", 3)] {
        for json in [false, true] {
            let case = Case::of(sample);
            let mut child = Command::new(env!("CARGO_BIN_EXE_coilassay"))
                .current_dir(case.dir.path())
                .args(["accept", "lot/lot.toml", "--date", "2026-12-01"])
                .args(json.then_some("--json"))
                .stdout(Stdio::piped())
                .stderr(Stdio::piped())
                .spawn()
                .unwrap();
            drop(child.stdout.take());
            let output = child.wait_with_output().unwrap();
            assert_eq!(output.status.code(), Some(code), "{sample}");
            assert!(output.stderr.is_empty());
        }
    }
}

/// The same inputs, flags and date: the same bytes in any working directory, time zone, on any number of threads.
#[test]
fn the_same_bytes_everywhere() {
    let first = Case::of("nested");
    let run = |case: &Case, folder: &str, lot: &str, zone: &str, threads: &str| {
        let output = Command::new(env!("CARGO_BIN_EXE_coilassay"))
            .current_dir(case.dir.path().join(folder))
            .args(["accept", lot, "--date", "2026-12-01", "--out", "out"])
            .envs([
                ("TZ", zone),
                ("RAYON_NUM_THREADS", threads),
                ("LC_ALL", "de_DE.UTF-8"),
            ])
            .output()
            .unwrap();
        assert_eq!(output.status.code(), Some(0));
        (
            held(&case.dir.path().join(folder).join("out")),
            output.stdout,
        )
    };
    let wanted = run(&first, "", "lot/lot.toml", "UTC", "8");
    let second = Case::of("nested");
    fs::create_dir(second.dir.path().join("deeper")).unwrap();
    copy(&second.path(""), &second.dir.path().join("deeper/lot"));
    let got = run(&second, "deeper", "lot/lot.toml", "Pacific/Kiritimati", "1");
    assert_eq!(wanted.1, got.1);
    let differing: Vec<&String> = wanted
        .0
        .keys()
        .filter(|name| wanted.0.get(*name) != got.0.get(*name))
        .collect();
    assert!(
        differing.is_empty() && wanted.0.len() == got.0.len(),
        "{differing:?}"
    );
    let text: Vec<u8> = wanted.0.into_values().flatten().collect();
    let machine = first.dir.path().to_string_lossy().into_owned();
    assert!(
        !String::from_utf8_lossy(&text).contains(&machine),
        "a path of this machine"
    );
}

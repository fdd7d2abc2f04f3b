//! What is kept and found again.

use std::collections::BTreeSet;

use coilassay::archive::{LAYOUT, key};
use serde_json::Value;

use super::{files, keep, read, root, text, tool};
use crate::bad_input::Case;

/// One lot after the other, each under another name.
fn kept(case: &Case, lots: &[(&str, &str, &str)]) {
    let original = case.text("lot.toml");
    for (number, supplier, heat) in lots {
        let quoted = |text: &str| serde_json::to_string(text).unwrap(); // a JSON text is a TOML text
        let changed = original
            .replace("number = \"0425\"", &format!("number = {}", quoted(number)))
            .replace(
                "supplier = \"Samphire & Sons Springs (invented supplier)\"",
                &format!("supplier = {}", quoted(supplier)),
            )
            .replace("H-063", heat);
        case.set("lot.toml", changed);
        let ran = keep(case);
        assert_eq!(ran.code, Some(3), "{}", ran.err);
    }
    case.set("lot.toml", original);
}

#[test]
fn names_that_a_disk_would_confuse_stay_apart() {
    let case = Case::of("undecided");
    let names = ["0044", "44", "a/b", "..", "A", "a", "a b", "弹簧"];
    let lots: Vec<(&str, &str, &str)> = names.iter().map(|name| (*name, "S", "H")).collect();
    kept(&case, &lots);
    let archive = root(&case);
    for tree in ["springs", "curves"] {
        assert_eq!(files(&archive, tree).len(), names.len(), "{tree}");
    }
    let folders: BTreeSet<_> = files(&archive, "springs")
        .iter()
        .map(|file| file.parent().unwrap().to_string_lossy().to_lowercase())
        .collect();
    assert_eq!(
        folders.len(),
        names.len(),
        "on a disk that does not tell A from a, too"
    );
    let found: Vec<Value> =
        serde_json::from_slice(&tool(&case, &["lots", "archive", "--json"]).out).unwrap();
    let numbers: BTreeSet<&str> = found
        .iter()
        .map(|lot| lot["lot"].as_str().unwrap())
        .collect();
    assert_eq!(numbers, names.into_iter().collect());
    let one = tool(&case, &["lots", "archive", "--lot", "44", "--json"]);
    assert_eq!(
        serde_json::from_slice::<Vec<Value>>(&one.out)
            .unwrap()
            .len(),
        1
    );
}

#[test]
fn lots_are_found_by_what_they_are() {
    let case = Case::of("undecided");
    kept(
        &case,
        &[
            ("1", "East", "H-1"),
            ("2", "East", "H-2"),
            ("3", "West", "H-2"),
        ],
    );
    let count = |words: &[&str]| {
        let ran = tool(&case, &[&["lots", "archive", "--json"], words].concat());
        assert_eq!(ran.code, Some(0), "{}", ran.err);
        serde_json::from_slice::<Vec<Value>>(&ran.out)
            .unwrap()
            .len()
    };
    assert_eq!(count(&[]), 3);
    assert_eq!(count(&["--drawing", "TG-118"]), 3);
    assert_eq!(count(&["--drawing", "TG-11"]), 0);
    assert_eq!(count(&["--supplier", "East"]), 2);
    assert_eq!(count(&["--tag", "wire_heat=H-2"]), 2);
    assert_eq!(count(&["--tag", "wire_heat=H-2", "--supplier", "East"]), 1);
    assert_eq!(count(&["--tag", "heat=H-2"]), 0);
    let received = "2026-11-23";
    assert!(case.text("lot.toml").contains(received));
    assert_eq!(count(&["--since", received]), 3);
    assert_eq!(count(&["--since", "2026-11-24"]), 0);
    assert_eq!(count(&["--until", received]), 3);
    assert_eq!(count(&["--until", "2026-11-22"]), 0);
}

/// Two suppliers may number their lots alike: that is no lot judged again.
#[test]
fn a_lot_judged_again_is_a_new_run_and_readers_take_the_latest() {
    let case = Case::of("undecided");
    kept(
        &case,
        &[
            ("1", "East", "H-1"),
            ("1", "West", "H-1"),
            ("1", "East", "H-9"),
        ],
    );
    let found = read(&root(&case));
    assert!(found.unreadable.is_empty());
    let runs: Vec<(&str, i64, bool)> = found
        .runs
        .iter()
        .map(|run| {
            (
                run.head.supplier.as_deref().unwrap(),
                run.run.number,
                run.run.supersedes.is_some(),
            )
        })
        .collect();
    assert_eq!(
        runs,
        [("East", 1, false), ("East", 2, true), ("West", 1, false)]
    );
    assert_eq!(
        found.runs[1].run.supersedes.as_ref(),
        Some(&found.runs[0].run.id)
    );
    let listed = |words: &[&str]| -> Vec<Value> {
        serde_json::from_slice(&tool(&case, &[&["lots", "archive", "--json"], words].concat()).out)
            .unwrap()
    };
    let latest = listed(&["--supplier", "East"]);
    assert_eq!(
        (latest.len(), latest[0]["tags"]["wire_heat"].as_str()),
        (1, Some("H-9"))
    );
    assert_eq!(listed(&["--superseded"]).len(), 3);
    // A query holds of the latest run only: an older one is no way round it.
    assert_eq!(
        listed(&["--supplier", "East", "--tag", "wire_heat=H-1"]).len(),
        0
    );
}

#[test]
fn the_springs_file_holds_every_figure_of_the_result() {
    let case = Case::of("rejected");
    let ran = case.run(&["--archive", "archive", "--json"]);
    let result: Value = serde_json::from_slice(&ran.out).unwrap();
    let found = read(&root(&case));
    let [run] = found.runs.as_slice() else {
        panic!("one run")
    };
    let springs = result["springs"].as_array().unwrap();
    assert_eq!(run.springs.len(), springs.len());
    let mut values = 0;
    for (place, spring) in springs.iter().enumerate() {
        assert_eq!(spring["id"], run.springs[place]);
        for of in spring["characteristics"].as_array().unwrap() {
            let same = |series: &&coilassay::archive::Series| {
                of["name"] == series.characteristic
                    && of["at_length_mm"].as_f64() == series.at_length_mm
            };
            let Some(series) = run.series.iter().find(same) else {
                panic!("{of}")
            };
            let stored = series.values.iter().find(|value| value.spring == place);
            assert_eq!(stored.map(|one| one.value), of["value"].as_f64());
            if let Some(stored) = stored {
                assert_eq!(stored.own, of["own_uncertainty"].as_f64());
                assert_eq!(stored.common, of["common_uncertainty"].as_f64());
                values += 1;
            }
        }
    }
    assert!(values > 100);
    let record = files(&root(&case), "records").remove(0);
    assert_eq!(
        std::fs::read(record).unwrap(),
        ran.out,
        "the record is the result"
    );
}

#[test]
fn per_lot_figures_go_out_and_come_back_in() {
    let case = Case::of("undecided");
    kept(
        &case,
        &[("1", "East, \"old\"", "H-1"), ("2", "West", "H-2")],
    );
    let table = text(&tool(&case, &["lots", "archive", "--figures"]));
    case.set("figures.csv", &table);
    let again = tool(&case, &["lots", "lot/figures.csv", "--figures"]);
    assert_eq!((again.code, text(&again)), (Some(0), table.clone()));
    let one = tool(
        &case,
        &["lots", "lot/figures.csv", "--tag", "wire_heat=H-2"],
    );
    assert!(
        text(&one).contains("lot 2, West: undecided") && !text(&one).contains("lot 1"),
        "{}",
        text(&one)
    );
    let head = table.lines().next().unwrap();
    let row = table.lines().nth(1).unwrap();
    let spoilt: [(&str, String, &str); 8] = [
        (
            "not a number",
            format!("{head}\n{}", with(row, 15, "2,9")),
            "CSV",
        ),
        (
            "nan",
            format!("{head}\n{}", with(row, 15, "nan")),
            "mean is not a finite number",
        ),
        (
            "negative spread",
            format!("{head}\n{}", with(row, 16, "-1")),
            "standard_deviation is not a finite number of 0 or more",
        ),
        (
            "no spread",
            format!("{head}\n{}", with(row, 16, "")),
            "standard_deviation must be there",
        ),
        (
            "no date",
            format!("{head}\n{}", with(row, 3, "05.12.2026")),
            "not a date like",
        ),
        (
            "twice",
            format!("{head}\n{row}\n{row}\n"),
            "stands in an earlier row already",
        ),
        (
            "unknown column",
            table.replace("supplier,", "vendor,"),
            "unknown field `vendor`",
        ),
        ("empty", format!("{head}\n"), "it holds no row"),
    ];
    for (name, text, wanted) in spoilt {
        case.set("spoilt.csv", text);
        let ran = tool(&case, &["lots", "lot/spoilt.csv"]);
        let flat = ran
            .err
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ")
            .replace("│ ", "");
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{name}");
        assert!(flat.contains(wanted), "{name}: {flat}");
    }
}

/// The row with its cell `number` (from 0) replaced.
fn with(row: &str, number: usize, cell: &str) -> String {
    let mut reader = csv::ReaderBuilder::new()
        .has_headers(false)
        .from_reader(row.as_bytes());
    let read = reader.records().next().unwrap().unwrap();
    let mut cells: Vec<&str> = read.iter().collect();
    cells[number] = cell;
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(cells).unwrap();
    String::from_utf8(writer.into_inner().unwrap()).unwrap()
}

#[test]
fn the_layout_is_the_documented_one() {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    let archive = root(&case);
    let mark: Value =
        serde_json::from_slice(&std::fs::read(archive.join("archive.json")).unwrap()).unwrap();
    assert_eq!(
        (mark["tool"].as_str(), mark["layout"].as_i64()),
        (Some("coilassay"), Some(LAYOUT))
    );
    let run = read(&archive).runs.remove(0);
    let folder = format!("drawing_key={}/lot_key={}", key("TG-118"), key("0425"));
    for (tree, end) in [
        ("springs", "parquet"),
        ("curves", "parquet"),
        ("records", "json"),
        ("records", "sha256"),
    ] {
        let file = archive
            .join(tree)
            .join(&folder)
            .join(format!("{}.{end}", run.run.id));
        assert!(file.is_file(), "{}", file.display());
    }
    assert_eq!(
        std::fs::read_dir(archive.join("staging")).unwrap().count(),
        0
    );
    assert_eq!(run.run.judged_at.len(), "2026-12-05T00:00:00.000000Z".len());
}

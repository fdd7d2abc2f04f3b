//! A sealed result recomputed from its inputs.

use std::fs;

use serde_json::{Value, json};

use super::{files, keep, root, sum_anew, text, tool};
use crate::bad_input::Case;

fn judged() -> Case {
    let case = Case::of("undecided");
    let ran = case.run(&["--no-report", "--out", "out", "--date", "2026-12-05"]);
    assert_eq!(ran.code, Some(3), "{}", ran.err);
    case
}

fn result(case: &Case) -> Value {
    serde_json::from_slice(&fs::read(case.path("../out/result.json")).unwrap()).unwrap()
}

fn set(case: &Case, value: &Value) {
    case.set("../out/result.json", serde_json::to_vec(value).unwrap());
}

#[test]
fn every_sample_comes_out_the_same_bit_for_bit() {
    for name in ["accepted", "rejected", "undecided", "nested"] {
        let case = Case::of(name);
        case.run(&["--out", "out", "--strict"]);
        let strict = case.path("../out/result.json").exists();
        if !strict {
            case.run(&["--out", "out"]);
        }
        for words in [["recheck", "out/result.json"], ["recheck", "out"]] {
            let ran = tool(&case, &words);
            assert_eq!(ran.code, Some(0), "{name}: {}{}", text(&ran), ran.err);
            assert!(
                text(&ran).starts_with("same: out/result.json (")
                    && text(&ran).contains("bit for bit")
            );
        }
    }
}

#[test]
fn every_figure_that_differs_is_named() {
    let case = judged();
    let mut value = result(&case);
    let rate = &mut value["springs"][2]["characteristics"][0];
    assert_eq!(rate["name"], "rate");
    let figure = rate["value"].as_f64().unwrap();
    let last_bit = f64::from_bits(figure.to_bits() + 1);
    rate["value"] = json!(last_bit);
    value["springs"][2]["verdict"] = json!("fails");
    value["decision"] = json!("accepted");
    let id = value["springs"][2]["id"].as_str().unwrap().to_owned();
    set(&case, &value);
    let ran = tool(&case, &["recheck", "out"]);
    assert_eq!(ran.code, Some(1), "{}", ran.err);
    let said = text(&ran);
    for line in [
        format!(
            "springs \"{id}\" / characteristics \"rate\" / value: stored {last_bit}, recomputed {figure}"
        ),
        format!("springs \"{id}\" / verdict: stored \"fails\", recomputed"),
        "decision: stored \"accepted\", recomputed \"undecided\"".to_owned(),
    ] {
        assert!(said.contains(&line), "{line}\n{said}");
    }
    assert_eq!(said.lines().count(), 4, "{said}");
    let parsed: Value =
        serde_json::from_slice(&tool(&case, &["recheck", "out", "--json"]).out).unwrap();
    assert_eq!(
        (
            parsed["outcome"].as_str(),
            parsed["differences"].as_array().map(Vec::len)
        ),
        (Some("different"), Some(3))
    );
}

/// No figure of a result may be changed unseen: each one in turn, by its last bit; each word, by another.
#[test]
fn no_entry_escapes() {
    let case = judged();
    let whole = result(&case);
    let mut places = Vec::new();
    leaves(&whole, &mut Vec::new(), &mut places);
    places.retain(|path| path.first() != Some(&"files".to_owned()));
    assert!(places.len() > 1000);
    for path in places.iter().step_by(places.len() / 40) {
        if path.join("/").starts_with("provenance/")
            || path.join("/") == "format"
            || path.join("/") == "kind"
        {
            continue; // the inputs, the flags and the date are what it is recomputed from
        }
        let mut value = whole.clone();
        let leaf = path.iter().fold(&mut value, |value, key| {
            if value.is_array() {
                &mut value[key.parse::<usize>().unwrap()]
            } else {
                &mut value[key.as_str()]
            }
        });
        *leaf = match &*leaf {
            Value::Number(number) if number.is_f64() => {
                json!(f64::from_bits(number.as_f64().unwrap().to_bits() ^ 1))
            }
            Value::Number(number) => json!(number.as_i64().unwrap() + 1),
            Value::String(word) => json!(format!("{word}x")),
            Value::Bool(yes) => json!(!*yes),
            _ => json!(1.5),
        };
        set(&case, &value);
        let ran = tool(&case, &["recheck", "out"]);
        assert_eq!(ran.code, Some(1), "{path:?}: {}{}", text(&ran), ran.err);
    }
}

pub(super) fn leaves(value: &Value, path: &mut Vec<String>, found: &mut Vec<Vec<String>>) {
    let mut below = |key: String, value: &Value| {
        path.push(key);
        leaves(value, path, found);
        path.pop();
    };
    match value {
        Value::Object(entries) => entries
            .iter()
            .for_each(|(key, value)| below(key.clone(), value)),
        Value::Array(entries) => entries
            .iter()
            .enumerate()
            .for_each(|(key, value)| below(key.to_string(), value)),
        _ => found.push(path.clone()),
    }
}

#[test]
fn another_version_is_held_to_nine_digits_and_both_are_named() {
    let case = judged();
    let whole = result(&case);
    let figure = whole["springs"][0]["characteristics"][0]["value"]
        .as_f64()
        .unwrap();
    for (shift, code) in [(5e-10, 0), (2e-9, 1)] {
        let mut value = whole.clone();
        value["provenance"]["version"] = json!("0.0.9");
        value["springs"][0]["characteristics"][0]["value"] = json!(figure * (1.0 + shift));
        set(&case, &value);
        let ran = tool(&case, &["recheck", "out"]);
        assert_eq!(ran.code, Some(code), "{shift}: {}", text(&ran));
        let versions = format!(
            "stored by version 0.0.9, recomputed by version {}",
            env!("CARGO_PKG_VERSION")
        );
        assert!(text(&ran).contains(&versions), "{}", text(&ran));
    }
    let mut value = whole;
    value["provenance"]["version"] = json!("0.0.9");
    value.as_object_mut().unwrap().remove("simple");
    set(&case, &value);
    assert_eq!(
        tool(&case, &["recheck", "out"]).code,
        Some(0),
        "an older result may lack what a newer one says besides"
    );
}

#[test]
fn a_changed_or_missing_input_is_named_by_its_hash() {
    let case = judged();
    let provenance = &result(&case)["provenance"]["inputs"];
    let inputs: Vec<(String, String, String)> = provenance
        .as_array()
        .unwrap()
        .iter()
        .map(|input| {
            (
                input["role"].as_str().unwrap().to_owned(),
                input["path"].as_str().unwrap().to_owned(),
                input["sha256"].as_str().unwrap().to_owned(),
            )
        })
        .collect();
    assert!(inputs.len() > 4);
    for (role, path, sha256) in &inputs {
        let file = if role == "lot" {
            "lot.toml"
        } else {
            path.as_str()
        };
        let bytes = fs::read(case.path(file)).unwrap();
        let mut changed = bytes.clone();
        changed.push(b'\n');
        case.set(file, &changed);
        let ran = tool(&case, &["recheck", "out"]);
        assert_eq!(ran.code, Some(2), "{path}");
        let said = format!("{role} {path}: SHA-256 was {sha256}, is ");
        assert!(text(&ran).contains(&said), "{}", text(&ran));
        fs::remove_file(case.path(file)).unwrap();
        let ran = tool(&case, &["recheck", "out"]);
        assert_eq!(ran.code, Some(2), "{path}");
        let said = format!("{role} {path}: cannot be read; its SHA-256 was {sha256}");
        assert!(text(&ran).contains(&said), "{}", text(&ran));
        case.set(file, &bytes);
    }
    assert_eq!(tool(&case, &["recheck", "out"]).code, Some(0));
}

/// The paths in a result are meant from where `accept` was called.
#[test]
fn a_result_taken_elsewhere_is_rechecked_from_its_folder() {
    let case = judged();
    fs::create_dir(case.path("../away")).unwrap();
    fs::rename(case.path("../out"), case.path("../away/out")).unwrap();
    let from = case.dir.path().to_string_lossy().into_owned();
    let run = |words: &[&str]| {
        let output = assert_cmd::Command::cargo_bin("coilassay")
            .unwrap()
            .current_dir(case.path("../away"))
            .args(words)
            .output()
            .unwrap();
        output.status.code()
    };
    assert_eq!(run(&["recheck", "out"]), Some(2));
    assert_eq!(run(&["recheck", "out", "--from", &from]), Some(0));
    assert_eq!(run(&["recheck", "out", "--from", ".."]), Some(0));
}

#[test]
fn a_file_beside_a_result_that_was_altered_is_a_difference() {
    let case = judged();
    let csv = fs::read_to_string(case.path("../out/springs.csv")).unwrap();
    case.set(
        "../out/springs.csv",
        csv.replacen("undecided", "conforms", 1),
    );
    let ran = tool(&case, &["recheck", "out"]);
    assert_eq!(ran.code, Some(1));
    assert!(
        text(&ran).contains("files \"springs.csv\" / sha256"),
        "{}",
        text(&ran)
    );
    fs::remove_file(case.path("../out/springs.csv")).unwrap();
    assert_eq!(
        tool(&case, &["recheck", "out"]).code,
        Some(0),
        "a result may be kept without its report"
    );
}

#[test]
fn an_archive_is_walked_and_its_tables_are_held_against_the_inputs() {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    case.sub("lot.toml", "number = \"0425\"", "number = \"0426\"");
    assert_eq!(keep(&case).code, Some(3));
    let ran = tool(&case, &["recheck", "archive"]);
    assert_eq!(
        ran.code,
        Some(2),
        "lot 0425 was judged from another lot file"
    );
    assert!(
        text(&ran).contains("1 same, 0 different, 1 could not be recomputed"),
        "{}",
        text(&ran)
    );
    case.sub("lot.toml", "number = \"0426\"", "number = \"0425\"");
    let [record, _, other, _] = files(&root(&case), "records").try_into().unwrap();
    let text_of = fs::read_to_string(&record).unwrap();
    fs::write(&record, text_of.replacen("undecided", "accepted", 1)).unwrap();
    let ran = tool(&case, &["recheck", "archive"]);
    assert_eq!(ran.code, Some(1), "{}", text(&ran));
    assert!(text(&ran).contains("/ SHA-256: stored "), "{}", text(&ran));
    // With checksums made to fit, the figures themselves are held against what the inputs give.
    forge(&case, &text_of);
    let ran = tool(&case, &["recheck", "archive"]);
    assert_eq!(ran.code, Some(1), "{}", text(&ran));
    assert!(
        text(&ran).contains("springs table / value, rows 1: stored "),
        "{}",
        text(&ran)
    );
    fs::remove_file(&other).unwrap();
    let ran = tool(&case, &["recheck", "archive"]);
    assert_eq!(ran.code, Some(1));
    assert!(
        text(&ran).contains("cannot be read") || ran.err.contains("cannot read"),
        "{}{}",
        text(&ran),
        ran.err
    );
}

/// The first run's record as it was, one value of its springs table changed, the checksums written anew.
fn forge(case: &Case, record: &str) {
    use polars::prelude::{Column, ParquetReader, ParquetWriter, SerReader};
    let archive = root(case);
    let path = files(&archive, "records").remove(0);
    fs::write(&path, record).unwrap();
    let springs = files(&archive, "springs").remove(0);
    let mut frame = ParquetReader::new(fs::File::open(&springs).unwrap())
        .finish()
        .unwrap();
    let mut values: Vec<Option<f64>> = frame
        .column("value")
        .unwrap()
        .f64()
        .unwrap()
        .iter()
        .collect();
    values[0] = values[0].map(|value| value * 1.001);
    frame
        .with_column(Column::new("value".into(), values))
        .unwrap();
    ParquetWriter::new(fs::File::create(&springs).unwrap())
        .finish(&mut frame)
        .unwrap();
    sum_anew(&archive, &path);
}

#[test]
fn what_is_no_result_is_refused() {
    let case = judged();
    let whole = result(&case);
    let mut spoilt: Vec<(&str, Vec<u8>, &str)> = vec![
        (
            "cut",
            serde_json::to_vec(&whole).unwrap()[..2000].to_vec(),
            "is no result of coilassay",
        ),
        ("empty", Vec::new(), "is empty"),
        ("a list", b"[1]".to_vec(), "it states no `format`"),
    ];
    let change = |key: &[&str], to: Value| {
        let mut value = whole.clone();
        let leaf = key.iter().fold(&mut value, |value, key| &mut value[*key]);
        *leaf = to;
        serde_json::to_vec(&value).unwrap()
    };
    spoilt.push(("newer", change(&["format"], json!(99)), "is of format 99"));
    spoilt.push((
        "tool",
        change(&["provenance", "tool"], json!("other")),
        "another tool signed it",
    ));
    spoilt.push((
        "flag",
        change(&["provenance", "flags"], json!(["--lenient"])),
        "the flag `--lenient`",
    ));
    spoilt.push((
        "date",
        change(&["provenance", "date"], json!("5 Dec")),
        "the date `5 Dec`",
    ));
    spoilt.push(("kind", change(&["kind"], json!("tea")), "kind \"tea\""));
    spoilt.push((
        "inputs",
        change(&["provenance", "inputs"], json!([])),
        "its provenance names no lot file",
    ));
    for (name, bytes, wanted) in spoilt {
        case.set("../out/result.json", bytes);
        let ran = tool(&case, &["recheck", "out"]);
        let flat = ran
            .err
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ")
            .replace("│ ", "");
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{name}: {flat}");
        assert!(flat.contains(wanted), "{name}: {flat}");
    }
    assert_eq!(tool(&case, &["recheck", "nowhere.json"]).code, Some(2));
}

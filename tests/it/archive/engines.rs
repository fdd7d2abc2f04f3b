//! The README's queries, run by the engines where they are installed, against our own figures to 1e-9.

use std::fmt::Write as _;
use std::path::Path;
use std::process::Command;

use serde_json::Value;

use super::{keep, root, skipped, tool};
use crate::bad_input::Case;

/// The fenced block of the README marked as this query, for the archive `dir`.
fn query(name: &str, dir: &Path) -> String {
    let readme =
        std::fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("README.md")).unwrap();
    let (_, rest) = readme
        .split_once(&format!("<!-- query: {name} -->\n```"))
        .unwrap();
    let (_, code) = rest.split_once('\n').unwrap();
    let code = code.split_once("```").unwrap().0;
    assert!(
        name == "rates" || name == "slopes" || name == "figures" || code.contains("DIR/"),
        "{name}"
    );
    code.replace("DIR", &dir.to_string_lossy())
}

/// What a Python script prints as JSON; `None`, said aloud, where `module` is not installed.
fn python(module: &str, script: &str, dir: &Path) -> Option<Value> {
    let there = Command::new("python3")
        .args(["-c", &format!("import {module}")])
        .output();
    if !there.is_ok_and(|output| output.status.success()) {
        skipped(&format!("no python3 with {module} here"));
        return None;
    }
    let output = Command::new("python3")
        .current_dir(dir)
        .args(["-c", script])
        .output()
        .unwrap();
    assert!(
        output.status.success(),
        "{}",
        String::from_utf8_lossy(&output.stderr)
    );
    Some(serde_json::from_slice(&output.stdout).unwrap())
}

/// Four lots of four drawings, one of them judged twice, one with a spring measured twice, one without a supplier.
fn kept() -> Case {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    assert_eq!(keep(&case).code, Some(3));
    for name in ["accepted", "rejected", "nested"] {
        let sample = Path::new(env!("CARGO_MANIFEST_DIR"))
            .join("samples")
            .join(name);
        crate::bad_input::copy(&sample, &case.path("..").join(name));
        if name == "nested" {
            let lot = std::fs::read_to_string(case.path("../nested/lot.toml")).unwrap();
            let without: String = lot
                .lines()
                .filter(|line| !line.starts_with("supplier"))
                .fold(String::new(), |mut text, line| {
                    writeln!(text, "{line}").unwrap();
                    text
                });
            assert!(without.len() < lot.len());
            case.set("../nested/lot.toml", without);
        }
        let ran = tool(
            &case,
            &[
                "accept",
                &format!("{name}/lot.toml"),
                "--archive",
                "archive",
            ],
        );
        assert!(matches!(ran.code, Some(0 | 1)), "{}", ran.err);
    }
    case
}

/// Figures by the name of their lot or spring.
type Figures = Vec<(String, f64)>;

/// Our own: mean rate of each lot, and the rate of each spring, by name.
fn ours(case: &Case) -> (Figures, Figures) {
    let runs = coilassay::archive::latest(super::read(&root(case)).runs);
    let (mut means, mut rates) = (Vec::new(), Vec::new());
    for run in &runs {
        let rate = run
            .series
            .iter()
            .find(|series| series.characteristic == "rate")
            .unwrap();
        for one in &rate.values {
            rates.push((
                format!(
                    "{} {} {}",
                    run.head.drawing, run.head.lot, run.springs[one.spring]
                ),
                one.value,
            ));
        }
        let sum: f64 = rate.values.iter().map(|one| one.value).sum();
        means.push((
            format!("{} {}", run.head.drawing, run.head.lot),
            sum / rate.values.len() as f64,
        ));
    }
    (means, rates)
}

/// Rows of name parts and a figure against ours; several rows of one name (measurements of one spring) are averaged.
fn same(found: &Value, ours: &[(String, f64)], what: &str) {
    let mut sums: std::collections::BTreeMap<String, (f64, u32)> =
        std::collections::BTreeMap::new();
    for row in found.as_array().unwrap() {
        let row = row.as_array().unwrap();
        let (figure, name) = row.split_last().unwrap();
        let name: Vec<&str> = name.iter().filter_map(Value::as_str).collect();
        let entry = sums.entry(name.join(" ")).or_default();
        entry.0 += figure.as_f64().unwrap();
        entry.1 += 1;
    }
    assert_eq!(sums.len(), ours.len(), "{what}");
    for (name, ours) in ours {
        let (sum, count) = sums[name];
        let theirs = sum / f64::from(count);
        assert!(
            (theirs - ours).abs() <= 1e-9 * ours.abs(),
            "{what} {name}: {theirs} against {ours}"
        );
    }
}

#[test]
fn duckdb_gives_our_means_and_slopes() {
    let case = kept();
    let archive = root(&case);
    let mut script = "import duckdb, json\n".to_owned();
    writeln!(script, "duckdb.sql({:?})", query("views", &archive)).unwrap();
    writeln!(
        script,
        "rates = duckdb.sql({:?}).project('drawing, lot, mean_rate').fetchall()",
        query("rates", &archive)
    )
    .unwrap();
    writeln!(
        script,
        "slopes = duckdb.sql({:?}).project('drawing, lot, spring, rate').fetchall()",
        query("slopes", &archive)
    )
    .unwrap();
    writeln!(script, "duckdb.sql({:?})", query("figures", &archive)).unwrap();
    writeln!(script, "print(json.dumps([rates, slopes]))").unwrap();
    let Some(found) = python("duckdb", &script, case.dir.path()) else {
        return;
    };
    let (means, rates) = ours(&case);
    assert_eq!((means.len(), rates.len() > 60), (4, true));
    same(&found[0], &means, "mean rate");
    same(&found[1], &rates, "slope");
    // What the engine computed comes back in as our own figures.
    let json = |source: &str| -> Vec<Value> {
        serde_json::from_slice(&tool(&case, &["lots", source, "--json"]).out).unwrap()
    };
    let (engine, archive) = (json("figures.parquet"), json("archive"));
    assert_eq!((engine.len(), archive.len()), (4, 4));
    for lot in &archive {
        let same =
            |other: &&Value| (&other["drawing"], &other["lot"]) == (&lot["drawing"], &lot["lot"]);
        let theirs = engine.iter().find(same).unwrap();
        assert_eq!(
            (&theirs["tags"], &theirs["received"], &theirs["supplier"]),
            (&lot["tags"], &lot["received"], &lot["supplier"])
        );
        for figure in lot["figures"].as_array().unwrap() {
            let same = |other: &&Value| {
                (&other["characteristic"], &other["at_length_mm"])
                    == (&figure["characteristic"], &figure["at_length_mm"])
            };
            let other = theirs["figures"]
                .as_array()
                .unwrap()
                .iter()
                .find(same)
                .unwrap();
            for key in [
                "springs",
                "mean",
                "standard_deviation",
                "own_uncertainty",
                "common_uncertainty",
                "lower",
                "upper",
            ] {
                match (figure[key].as_f64(), other[key].as_f64()) {
                    (Some(a), Some(b)) => {
                        assert!((a - b).abs() <= 1e-9 * a.abs(), "{key}: {a} against {b}");
                    }
                    (a, b) => assert_eq!(a, b, "{key}"),
                }
            }
        }
    }
}

#[test]
fn pandas_gives_our_means_and_slopes() {
    let case = kept();
    let mut script = query("pandas", &root(&case));
    script.push_str(
        "import json\n\
         flat = lambda of, keys: [[*(row[key] for key in keys), row['figure']] for row in of.rename('figure').reset_index().to_dict('records')]\n\
         print(json.dumps([flat(rates, ['drawing', 'lot']), flat(slopes, ['drawing', 'lot', 'spring'])]))\n",
    );
    let Some(found) = python("pandas, pyarrow", &script, case.dir.path()) else {
        return;
    };
    let (means, rates) = ours(&case);
    same(&found[0], &means, "mean rate");
    same(&found[1], &rates, "slope");
}

//! The report of `expect`: the same figures in `result.json`, HTML, PDF and on the terminal, in either units; the same bytes.

use std::path::Path;

use assert_cmd::Command;
use serde_json::Value;

use crate::drawn::{INCH, LBF, PSI};

fn run(words: &[&str]) -> (Option<i32>, String, String) {
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .args(words)
        .args(["--date", "2026-12-01"])
        .output()
        .unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    (
        output.status.code(),
        text(output.stdout),
        text(output.stderr),
    )
}

fn read(folder: &Path, name: &str) -> String {
    String::from_utf8(std::fs::read(folder.join(name)).unwrap()).unwrap()
}

#[test]
fn one_truth_in_every_print() {
    for (drawing, units) in [
        ("samples/accepted/tg-204.toml", "mm-N"),
        ("samples/accepted/tg-204.toml", "in-lbf"),
        ("samples/nested/tg-350.toml", "mm-N"),
    ] {
        let folder = tempfile::tempdir().unwrap();
        let out = folder.path().join("out");
        let words = [
            "expect",
            drawing,
            "--show-in",
            units,
            "--out",
            &out.to_string_lossy(),
        ];
        let (code, terminal, fault) = run(&words);
        assert_eq!(code, Some(0), "{fault}");
        let result: Value = serde_json::from_str(&read(&out, "result.json")).unwrap();
        let html = read(&out, "report.html");
        let (force, length, stress) = if units == "mm-N" {
            (1.0, 1.0, 1.0)
        } else {
            (LBF, INCH, PSI)
        };
        let four = |value: f64| {
            // Four significant digits, as the page writes such figures.
            let digits = (0_usize..4)
                .rev()
                .find(|digits| value.abs() * 10_f64.powi(i32::try_from(*digits).unwrap()) < 9999.5);
            format!("{value:.*}", digits.unwrap_or(0))
        };
        let mut wanted = vec![four(
            result["theory"]["full_load_n"].as_f64().unwrap() / force,
        )];
        for member in result["theory"]["members"].as_array().unwrap() {
            wanted.push(four(
                member["rate_n_per_mm"].as_f64().unwrap() / force * length,
            ));
            wanted.push(four(
                member["smallest_length_mm"].as_f64().unwrap() / length,
            ));
        }
        for line in result["strength"].as_array().unwrap() {
            let value = line["limit_mpa"].as_f64().unwrap() / stress;
            if value < 9999.0 {
                wanted.push(four(value));
            }
        }
        for figure in wanted {
            assert!(
                html.contains(&figure),
                "{drawing} {units}: {figure} is not in the HTML"
            );
            assert!(
                terminal.contains(&figure),
                "{drawing} {units}: {figure} is not on the terminal"
            );
        }
        let listed: Vec<&str> = result["files"]
            .as_array()
            .unwrap()
            .iter()
            .map(|one| one["path"].as_str().unwrap())
            .collect();
        assert_eq!(listed, ["report.html", "report.pdf", "charts/expected.svg"]);
        assert!(
            std::fs::read(out.join("report.pdf"))
                .unwrap()
                .starts_with(b"%PDF")
        );
        let svg = read(&out, "charts/expected.svg");
        for mark in ["theory", "window of the rate", "Lc", "Ln"] {
            assert!(svg.contains(mark), "{mark}");
        }
        let again = folder.path().join("again");
        run(&[
            "expect",
            drawing,
            "--show-in",
            units,
            "--out",
            &again.to_string_lossy(),
        ]);
        for name in ["result.json", "report.html", "charts/expected.svg"] {
            assert_eq!(read(&out, name), read(&again, name), "{name}");
        }
    }
}

/// A drawing that contradicts itself: status 1, the reason on the page; an older result is replaced, a foreign file is not.
#[test]
fn a_contradiction_is_on_the_page() {
    let folder = tempfile::tempdir().unwrap();
    let text = std::fs::read_to_string(
        Path::new(env!("CARGO_MANIFEST_DIR")).join("samples/accepted/tg-204.toml"),
    )
    .unwrap();
    let drawing = folder.path().join("drawing.toml");
    std::fs::write(
        &drawing,
        text.replace(
            "outside_diameter = { nominal = 36.0",
            "mean_diameter = { nominal = 36.0",
        ),
    )
    .unwrap();
    let out = folder.path().join("out");
    let words = [
        "expect",
        &drawing.to_string_lossy(),
        "--out",
        &out.to_string_lossy(),
    ];
    for _ in 0..2 {
        assert_eq!(run(&words).0, Some(1));
    }
    let html = read(&out, "report.html");
    assert!(html.contains("CONTRADICTS ITSELF"));
    assert!(html.contains("the drawn mean diameter were the outside one"));
    std::fs::write(out.join("mine.txt"), "x").unwrap();
    let (code, _, fault) = run(&words);
    assert_eq!(code, Some(2));
    assert!(fault.contains("mine.txt"), "{fault}");
}

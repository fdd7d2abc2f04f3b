//! Drafted rig files: each reads the export it was drafted from, and says what it is not sure of.

use std::path::{Path, PathBuf};

use assert_cmd::Command;
use coilassay::curve::correct;
use coilassay::export::{BLOCK_BYTES, RawCurve, read};
use coilassay::job::draft_rig;
use coilassay::rig::{Dialect, Means, Rig, open};

use crate::counter_suite::measured;
use crate::dialects::Form;
use crate::random::Random;

const DIALECTS: u64 = 120;

fn springs(path: &Path, dialect: &Dialect) -> Result<Vec<RawCurve>, String> {
    let mut all = Vec::new();
    let done = read(path, "x.csv", dialect, BLOCK_BYTES, &mut |some| {
        all.extend(some)
    });
    done.map(|_| all).map_err(|fault| fault.to_string())
}

/// The rig file drafted from an export, opened.
fn drafted(export: &Path) -> Result<(String, Rig), String> {
    let text = draft_rig(&export.to_string_lossy()).map_err(|fault| format!("{fault:?}"))?;
    let file = export.with_extension("toml");
    std::fs::write(&file, &text).unwrap();
    let rig = open(&file, "rig.toml").map_err(|fault| format!("{fault:?}\n{text}"))?;
    Ok((text, rig))
}

#[test]
fn a_draft_reads_the_export_it_was_drafted_from() {
    let folder = tempfile::tempdir().unwrap();
    let mut misses = Vec::new();
    for number in 0..DIALECTS {
        let mut random = Random::new(30, number);
        let form = Form::drawn(&mut random);
        let (rows, _) = measured(&form, (0.003, 89.9), &mut random);
        let export = folder.path().join(format!("{number}.csv"));
        std::fs::write(&export, form.export(&rows)).unwrap();
        if let Err(what) = tried(&form, &export, rows.len()) {
            misses.push(format!("{number}: {form:?}: {what}"));
        }
    }
    assert!(
        misses.is_empty(),
        "{} of {DIALECTS}:\n{}",
        misses.len(),
        misses.join("\n\n")
    );
}

/// What is wrong with the draft from one export.
fn tried(form: &Form, export: &Path, rows: usize) -> Result<(), String> {
    let (text, rig) = drafted(export)?;
    let all = springs(export, &rig.dialect).map_err(|fault| format!("{fault}\n{text}"))?;
    let [curve] = all.as_slice() else {
        return Err(format!("{} springs", all.len()));
    };
    let dialect = &rig.dialect;
    let meant = match form.means {
        // A platen position needs a figure that no export holds; it is drafted as what it looks like, with a doubt.
        "platen position" => {
            rig.means == Means::Deflection
                && text.contains("DOUBT: the travel does not begin near 0")
        }
        "length" => rig.means == Means::Length,
        _ => rig.means == Means::Deflection,
    };
    let header = form.labelled_names();
    let units = form.units == "nowhere"
        || dialect.load.unit.symbol() == form.load.0
            && dialect.travel.unit.symbol() == form.travel.0;
    let doubted =
        form.units != "nowhere" || text.matches("a wrong unit is a wrong verdict").count() == 2;
    let columns = dialect.load.column == header[2] && dialect.travel.column == header[1];
    let time = dialect.time.as_deref() == form.time.then_some(header[0].as_str());
    let checks = [
        ("every row", curve.load.len() == rows),
        ("columns", columns),
        ("time", time),
        ("meaning", meant),
        ("units", units),
        ("doubts about units", doubted),
        ("spring", form.column == (curve.identity == "S-1")),
        (
            "a curve",
            form.units == "nowhere" || correct(curve, &rig).is_ok(),
        ),
    ];
    let missed: Vec<&str> = checks
        .iter()
        .filter(|(_, right)| !right)
        .map(|(what, _)| *what)
        .collect();
    if missed.is_empty() {
        Ok(())
    } else {
        Err(format!("{missed:?}\n{text}"))
    }
}

#[test]
fn a_draft_reads_every_sample() {
    let samples = Path::new(env!("CARGO_MANIFEST_DIR")).join("samples");
    let folder = tempfile::tempdir().unwrap();
    let mut count = 0;
    for (sample, rig) in [
        ("accepted/springs", "accepted/bench-1.toml"),
        ("rejected", ""),
        ("undecided", ""),
        ("nested/sets", "nested/bench-3.toml"),
    ] {
        let rig = if rig.is_empty() {
            bench_of(&samples.join(sample))
        } else {
            samples.join(rig)
        };
        let known = open(&rig, "rig.toml").unwrap();
        for export in exports(&samples.join(sample)) {
            let copy = folder.path().join(export.file_name().unwrap());
            std::fs::copy(&export, &copy).unwrap();
            let (text, drafted) = drafted(&copy).unwrap();
            let wanted = springs(&copy, &known.dialect).unwrap();
            let found = springs(&copy, &drafted.dialect).unwrap();
            assert_eq!(found.len(), wanted.len(), "{text}");
            for (found, wanted) in found.iter().zip(&wanted) {
                assert_eq!(
                    (&found.load, &found.identity),
                    (&wanted.load, &wanted.identity),
                    "{text}"
                );
            }
            count += 1;
        }
    }
    assert!(count > 20, "{count}");
}

fn bench_of(folder: &Path) -> PathBuf {
    let mut files: Vec<PathBuf> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .collect();
    files.sort();
    files
        .into_iter()
        .find(|path| path.to_string_lossy().contains("bench"))
        .unwrap()
}

/// The exports below a folder.
fn exports(folder: &Path) -> Vec<PathBuf> {
    let mut found = Vec::new();
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        let name = path.file_name().unwrap().to_string_lossy().into_owned();
        let is_table = [".csv", ".txt", ".tsv", ".asc", ".dat"]
            .iter()
            .any(|end| name.ends_with(end));
        if path.is_dir() {
            found.extend(exports(&path));
        } else if is_table && !name.contains("caliper") && !name.contains("findings") {
            found.push(path);
        }
    }
    found.sort();
    found
}

#[test]
fn what_is_no_table_is_refused_by_name() {
    let folder = tempfile::tempdir().unwrap();
    for (text, wanted) in [
        ("just a letter\nwith two lines\n", "no table was recognised"),
        (
            "made by bench 1\n1;2\n3;4\n5;6\n7;8\n",
            "no line of column names",
        ),
        ("Load;Load\n1;2\n3;4\n5;6\n7;8\n", "looks like a travel"),
    ] {
        let export = folder.path().join("x.csv");
        std::fs::write(&export, text).unwrap();
        let ran = Command::cargo_bin("coilassay")
            .unwrap()
            .args(["draft", "rig"])
            .arg(&export)
            .output()
            .unwrap();
        let said = String::from_utf8_lossy(&ran.stderr).into_owned();
        assert!(
            ran.status.code() == Some(2) && said.contains(wanted) && ran.stdout.is_empty(),
            "{said}"
        );
    }
}

//! `rig repeat` on the invented sample, and what is no study.

use std::path::Path;

use assert_cmd::Command;
use coilassay::job::{Repeated, RigOptions, rig_repeat};
use coilassay::record::{BenchCaution, RepeatReason, Serving, StudyFacts};
use tempfile::TempDir;

use crate::lots::edit;
use crate::rig_verify::{copy, flat};

fn options() -> RigOptions {
    RigOptions {
        date: jiff::civil::date(2026, 12, 1),
        strict: false,
        flags: Vec::new(),
    }
}

fn study(folder: &TempDir) -> Result<Repeated, String> {
    rig_repeat(&folder.path().join("study.toml"), "study.toml", &options())
        .map_err(|fault| flat(&format!("{fault:?}")))
}

fn command(folder: &TempDir, more: &[&str]) -> (i32, String) {
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .args(["rig", "repeat", "--date", "2026-12-01"])
        .arg(folder.path().join("study.toml"))
        .args(more)
        .output()
        .unwrap();
    (
        output.status.code().unwrap(),
        String::from_utf8(output.stdout).unwrap(),
    )
}

fn of<'a>(studies: &'a [StudyFacts], name: &str) -> &'a StudyFacts {
    studies.iter().find(|one| one.name == name).unwrap()
}

fn sd(of: &StudyFacts, source: &str) -> f64 {
    let share = of
        .shares
        .iter()
        .find(|share| share.source == source)
        .unwrap();
    share.standard_deviation.get()
}

/// The generator's own figures: rates scatter by 0.06 % of 10.61 N/mm from trial to trial, lengths by 0.012 mm, which moves
/// the load by 0.13 N; 24 to 34 degrees of freedom leave the standard deviation uncertain by about 13 %.
#[test]
fn the_study_finds_what_the_generator_put_in() {
    let record = study(&copy("study")).unwrap().record;
    assert_eq!(record.decision, Serving::Serves);
    assert_eq!(
        (record.parts.len(), record.operators.len(), record.trials),
        (6, 2, 3)
    );
    assert_eq!(record.parts[0], "S1");
    let rate = of(&record.studies, "rate");
    let within = rate.within_spring.get();
    assert!(
        (0.6..1.6).contains(&(within / (0.0006 * 10.61))),
        "{within}"
    );
    let load = of(&record.studies, "load");
    assert!(
        (0.7..1.6).contains(&(load.within_spring.get() / 0.144)),
        "{}",
        load.within_spring.get()
    );
    assert_eq!(load.at_length_mm.unwrap().get().to_string(), "70");
    assert!(sd(rate, "part") > 5.0 * within);
    // 6 s over the width of ± 5 % of 10.6 N/mm.
    let within_share = rate
        .shares
        .iter()
        .find(|share| share.source == "within")
        .unwrap();
    let wanted = 6.0 * within / 1.06;
    assert!((within_share.of_tolerance.unwrap().get() - wanted).abs() < 1e-9);
    assert_eq!(rate.values.len(), 36);
    let sum: f64 = rate
        .variance
        .iter()
        .filter(|row| row.source != "total")
        .map(|row| row.sum_of_squares.get())
        .sum();
    let total = rate.variance.last().unwrap().sum_of_squares.get();
    assert!((sum - total).abs() < 1e-9 * total);
}

/// The rig file takes the standard deviations within a spring, of the loads the largest, and keeps its comments.
#[test]
fn the_rig_file_takes_the_repeatability() {
    let folder = copy("study");
    let rig = folder.path().join("bench-5.toml");
    let record = study(&folder).unwrap().record;
    let (status, stdout) = command(&folder, &["--write"]);
    assert_eq!(status, 0, "{stdout}");
    let text = std::fs::read_to_string(&rig).unwrap();
    assert!(
        text.contains("# a guess; a study is due") && text.contains("# Invented bench."),
        "{text}"
    );
    assert!(!text.contains("0.009 "), "{text}");
    let opened = coilassay::rig::open(&rig, "bench-5.toml").unwrap();
    for figure in &record.proposed {
        let stated = opened
            .repeatability
            .iter()
            .find(|(name, _)| *name == figure.of)
            .unwrap()
            .1;
        let wanted = figure.standard_deviation.get();
        assert!(
            (stated - wanted).abs() <= 0.005 * wanted,
            "{}: {stated} {wanted}",
            figure.of
        );
    }
    let loads = record.studies.iter().filter(|one| one.name == "load");
    let largest = loads.map(|one| one.within_spring.get()).fold(0.0, f64::max);
    let load = record.proposed.iter().find(|one| one.of == "load").unwrap();
    assert!((load.standard_deviation.get() - largest).abs() < 1e-12);
    assert!(
        command(&folder, &["--write"])
            .1
            .contains("holds these figures already")
    );
}

#[test]
fn a_tolerance_too_narrow_for_the_bench_is_said() {
    let folder = copy("study");
    edit(
        &folder.path().join("tg-204.toml"),
        &[(
            "rate = { nominal = 10.6, tolerance = \"5 %\"",
            "rate = { nominal = 10.6, tolerance = 0.06",
        )],
    );
    let record = study(&folder).unwrap().record;
    assert_eq!(record.decision, Serving::Fails);
    assert!(
        matches!(&record.reasons[..], [RepeatReason::BeyondTolerance { name, .. }] if name == "rate")
    );
    assert_eq!(command(&folder, &[]).0, 1);
    edit(
        &folder.path().join("tg-204.toml"),
        &[("tolerance = 0.06", "tolerance = 0.18")],
    );
    let record = study(&folder).unwrap().record;
    assert_eq!(record.decision, Serving::Serves);
    assert!(
        record
            .cautions
            .iter()
            .any(|one| matches!(one, BenchCaution::LargeShare { name, .. } if name == "rate"))
    );
}

/// Without a drawing there is nothing to hold the repeats against; a length that is not reached has no study.
#[test]
fn what_cannot_be_told_is_undecided() {
    let folder = copy("study");
    edit(
        &folder.path().join("study.toml"),
        &[(
            "drawing = \"tg-204.toml\"",
            "[[load]]\nat_length = 60.0\n[[load]]\nat_length = 20.0",
        )],
    );
    let record = study(&folder).unwrap().record;
    assert_eq!(
        (record.decision, &record.reasons[..]),
        (Serving::Undecided, &[RepeatReason::NoTolerance][..])
    );
    assert!(record.cautions.iter().any(|one| matches!(one, BenchCaution::NotAnalysed { measurements, .. } if measurements.len() == 36)));
    assert_eq!(command(&folder, &[]).0, 3);
    let folder = copy("study");
    edit(
        &folder.path().join("tg-204.toml"),
        &[(
            "at_length = 52.0\nnominal = 403.0",
            "at_length = 44.0\nnominal = 487.0",
        )],
    );
    let record = study(&folder).unwrap().record;
    assert_eq!(record.decision, Serving::Undecided);
    assert!(matches!(
        &record.reasons[..],
        [RepeatReason::NotAnalysed { .. }]
    ));
}

/// One operator is allowed and said; a table may say whose a measurement is.
#[test]
fn one_operator_and_a_table() {
    let folder = copy("study");
    let export = folder.path().join("study.csv");
    let text = std::fs::read_to_string(&export).unwrap();
    let ash: Vec<&str> = text
        .lines()
        .filter(|line| !line.contains("/Birch/"))
        .collect();
    std::fs::write(&export, ash.join("\n") + "\n").unwrap();
    let record = study(&folder).unwrap().record;
    assert_eq!(record.operators, ["Ash"]);
    assert!(record.cautions.contains(&BenchCaution::OneOperator));
    let by_names = of(&record.studies, "rate").within_spring;
    let mut table = "measurement,part,trial\n,,\n".to_owned();
    for part in 1..=6 {
        for trial in 1..=3 {
            use std::fmt::Write;
            writeln!(table, "S{part}/Ash/{trial},spring {part},{trial}").unwrap();
        }
    }
    std::fs::write(folder.path().join("whose.csv"), &table).unwrap();
    edit(
        &folder.path().join("study.toml"),
        &[(
            "names = \"{part}/{operator}/{trial}\"",
            "table = \"whose.csv\"",
        )],
    );
    let record = study(&folder).unwrap().record;
    assert_eq!(record.parts[0], "spring 1");
    assert!((of(&record.studies, "rate").within_spring.get() - by_names.get()).abs() < 1e-12);
    // Two springs left: two trials of two springs are few.
    std::fs::write(
        folder.path().join("whose.csv"),
        table.replace("S6/Ash/3,", "S7/Ash/3,"),
    )
    .unwrap();
    assert!(
        study(&folder)
            .unwrap_err()
            .contains("says nothing of measurement `S6/Ash/3`")
    );
    std::fs::write(
        folder.path().join("whose.csv"),
        table + "S9/Ash/1,spring 9,1\n",
    )
    .unwrap();
    assert!(
        study(&folder)
            .unwrap_err()
            .contains("names measurement `S9/Ash/1`")
    );
}

#[test]
fn what_is_no_study_is_refused() {
    let without = |folder: &TempDir, mark: &str| {
        let export = folder.path().join("study.csv");
        let text = std::fs::read_to_string(&export).unwrap();
        let kept: Vec<&str> = text
            .lines()
            .filter(|line| !line.starts_with(mark))
            .collect();
        std::fs::write(&export, kept.join("\n") + "\n").unwrap();
    };
    let folder = copy("study");
    without(&folder, "S3/Birch/2");
    let said = study(&folder).unwrap_err();
    assert!(
        said.contains("part `S3`, operator `Birch` has 2 trials"),
        "{said}"
    );
    let folder = copy("study");
    edit(
        &folder.path().join("study.toml"),
        &[("{part}/{operator}/{trial}", "{part}-{operator}-{trial}")],
    );
    assert!(
        study(&folder)
            .unwrap_err()
            .contains("is not named as `names` says")
    );
    edit(
        &folder.path().join("study.toml"),
        &[("{part}-{operator}-{trial}", "{part}-{operator}")],
    );
    assert!(study(&folder).unwrap_err().contains("it lacks {trial}"));
    let folder = copy("study");
    let export = folder.path().join("study.csv");
    let text = std::fs::read_to_string(&export).unwrap();
    let first: Vec<String> = text
        .lines()
        .filter(|line| line.starts_with("S1/Ash/1;"))
        .map(|line| line.replace("S1/Ash/1", "S1/Ash/4"))
        .collect();
    std::fs::write(&export, text + &first.join("\n") + "\n").unwrap();
    assert!(study(&folder).unwrap_err().contains("digit for digit"));
}

/// The pages: every quantity has its two charts and its tables, the same bytes twice.
#[test]
fn the_report_of_a_study() {
    let folder = copy("study");
    let (one, two) = (folder.path().join("one"), folder.path().join("two"));
    for out in [&one, &two] {
        assert_eq!(command(&folder, &["--out", out.to_str().unwrap()]).0, 0);
    }
    let read = |out: &Path, file: &str| std::fs::read(out.join(file)).unwrap();
    for file in [
        "report.html",
        "report.pdf",
        "result.json",
        "charts/repeats-rate.svg",
        "charts/shares-load-at-70-mm.svg",
    ] {
        assert_eq!(read(&one, file), read(&two, file), "{file}");
    }
    let html = String::from_utf8(read(&one, "report.html")).unwrap();
    for wanted in [
        "Crossed analysis of variance",
        "Average and range",
        "For the rig file",
        "can be thrown",
    ] {
        assert!(html.contains(wanted), "{wanted}");
    }
}

//! `rig verify` on the invented sample and on what can go wrong with a bench.

use std::path::{Path, PathBuf};

use assert_cmd::Command;
use coilassay::job::{RigOptions, Verified, rig_verify};
use coilassay::record::{CheckReason, CheckRecord, Finding, Serving};
use tempfile::TempDir;

use crate::lots::edit;

fn root(path: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}

/// A copy of a sample folder that a test may change.
pub(crate) fn copy(sample: &str) -> TempDir {
    fn all(from: &Path, to: &Path) {
        std::fs::create_dir_all(to).unwrap();
        for entry in std::fs::read_dir(from).unwrap() {
            let (path, target) = {
                let entry = entry.unwrap();
                (entry.path(), to.join(entry.file_name()))
            };
            if path.is_dir() {
                all(&path, &target);
            } else {
                std::fs::copy(&path, &target).unwrap();
            }
        }
    }
    let folder = tempfile::tempdir().unwrap();
    all(&root(&format!("samples/{sample}")), folder.path());
    folder
}

/// Changes length and load of every row of an export with the columns time, length, load.
fn bend(path: &Path, change: impl Fn(f64, f64) -> (f64, f64)) {
    use std::fmt::Write;
    let text = std::fs::read_to_string(path).unwrap();
    let mut out = format!("{}\n", text.lines().next().unwrap());
    for line in text.lines().skip(1) {
        let cells: Vec<f64> = line.split(',').map(|cell| cell.parse().unwrap()).collect();
        let (length, load) = change(cells[1], cells[2]);
        writeln!(out, "{:.2},{length:.4},{load:.3}", cells[0]).unwrap();
    }
    std::fs::write(path, out).unwrap();
}

fn bend_reference(folder: &TempDir, change: impl Fn(f64, f64) -> (f64, f64)) {
    for number in 1..=3 {
        bend(
            &folder.path().join(format!("reference/rs-3-{number}.csv")),
            &change,
        );
    }
}

fn options(strict: bool) -> RigOptions {
    RigOptions {
        date: jiff::civil::date(2026, 12, 1),
        strict,
        flags: Vec::new(),
    }
}

fn verify(folder: &TempDir) -> Verified {
    let check = folder.path().join("check.toml");
    rig_verify(&check, "check.toml", &options(false), Vec::new())
        .unwrap_or_else(|fault| panic!("{fault:?}"))
}

fn fault(folder: &TempDir, strict: bool) -> String {
    let check = folder.path().join("check.toml");
    match rig_verify(&check, "check.toml", &options(strict), Vec::new()) {
        Ok(verified) => panic!("{:?}", verified.record.reasons),
        Err(fault) => flat(&format!("{fault:?}")),
    }
}

/// A shown fault without its line breaks and frame.
pub(crate) fn flat(shown: &str) -> String {
    let words = shown.replace(['│', '╭', '╰', '─'], " ");
    words.split_whitespace().collect::<Vec<_>>().join(" ")
}

fn command(folder: &TempDir, more: &[&str]) -> (i32, String, String) {
    let dated = if more.contains(&"--date") {
        &[][..]
    } else {
        &["--date", "2026-12-01"]
    };
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .args(["rig", "verify"])
        .args(dated)
        .arg(folder.path().join("check.toml"))
        .args(more)
        .output()
        .unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    (
        output.status.code().unwrap(),
        text(output.stdout),
        text(output.stderr),
    )
}

fn findings(record: &CheckRecord) -> Vec<(&str, Finding)> {
    record
        .comparisons
        .iter()
        .map(|one| (one.name.as_str(), one.finding))
        .collect()
}

#[test]
fn a_good_bench_serves() {
    let record = verify(&copy("check")).record;
    assert_eq!(record.decision, Serving::Serves);
    assert!(record.passed && record.comparisons.len() == 4);
    for one in &record.comparisons {
        let (error, e_n) = (one.error.unwrap().get(), one.e_n.unwrap().get());
        let u = one.expanded_uncertainty.unwrap().get();
        let reference = one.reference_expanded_uncertainty.get();
        assert!((error - (one.value.unwrap().get() - one.reference.get())).abs() < 1e-12);
        assert!((e_n - error / (u * u + reference * reference).sqrt()).abs() < 1e-12);
        assert!(e_n.abs() < 0.5, "{one:?}");
    }
    // A fifth of 5 % of the certified rate, and of 8 % of the certified loads.
    let allowed: Vec<f64> = record
        .comparisons
        .iter()
        .filter_map(|one| one.allowed_error.map(coilassay::units::Finite::get))
        .collect();
    let wanted = [0.01 * 9.842, 0.016 * 140.84, 0.016 * 337.68];
    assert_eq!(allowed.len(), wanted.len());
    for (got, want) in allowed.iter().zip(wanted) {
        assert!((got - want).abs() < 1e-9 * want, "{got} {want}");
    }
    let frame = record.frame.unwrap();
    assert!((frame.compliance_mm_per_n.get() - 0.000_122).abs() < 4e-6 && frame.table.is_none());
}

/// Force and travel both 1 % off leave the rate right; the loads show it.
#[test]
fn two_scales_off_alike_are_found() {
    let folder = copy("check");
    bend_reference(&folder, |length, load| {
        (70.0 + (length - 70.0) * 1.01, load * 1.01)
    });
    let record = verify(&folder).record;
    assert_eq!(record.decision, Serving::Fails);
    assert!(!record.passed);
    let found = findings(&record);
    assert_eq!(found[0], ("rate", Finding::Serves));
    assert_eq!(found[1], ("load", Finding::Disagrees));
    let (status, stdout, _) = command(&folder, &[]);
    assert_eq!(status, 1);
    assert!(
        stdout.starts_with("FAILS: Bench 5 on reference spring RS-3"),
        "{stdout}"
    );
}

/// A length zero off by 0.15 mm; and an error that is inside both uncertainties, yet beyond its share of the tolerance.
#[test]
fn a_length_zero_and_a_coarse_bench_are_found() {
    let folder = copy("check");
    bend_reference(&folder, |length, load| (length + 0.15, load));
    let record = verify(&folder).record;
    assert!(findings(&record).contains(&("free_length", Finding::Disagrees)));
    let folder = copy("check");
    edit(
        &folder.path().join("bench-5.toml"),
        &[("[force]\nclass = \"0.5\"", "[force]\nclass = \"3\"")],
    );
    bend_reference(&folder, |length, load| (length, load * 1.022));
    let record = verify(&folder).record;
    assert_eq!(record.decision, Serving::Fails);
    assert_eq!(findings(&record)[0], ("rate", Finding::BeyondShare));
    assert!(record.comparisons[0].e_n.unwrap().get() < 1.0);
}

#[test]
fn what_cannot_be_told_is_undecided() {
    // A certificate coarser than the allowed error.
    let folder = copy("check");
    edit(
        &folder.path().join("check.toml"),
        &[(
            "value = 9.842, uncertainty = 0.012",
            "value = 9.842, uncertainty = 0.2",
        )],
    );
    let record = verify(&folder).record;
    assert_eq!(
        (record.decision, findings(&record)[0].1),
        (Serving::Undecided, Finding::CannotTell)
    );
    // A length the curve does not reach.
    let folder = copy("check");
    edit(
        &folder.path().join("check.toml"),
        &[(
            "at_length = 50.0\nvalue = 337.68",
            "at_length = 40.0\nvalue = 436.1",
        )],
    );
    let record = verify(&folder).record;
    assert_eq!(
        (record.decision, findings(&record)[2].1),
        (Serving::Undecided, Finding::NotMeasured)
    );
    assert_eq!(command(&folder, &[]).0, 3);
    // The certificate has run out: undecided, and refused where that is asked for.
    let folder = copy("check");
    edit(
        &folder.path().join("check.toml"),
        &[("until = 2027-02-10", "until = 2026-11-30")],
    );
    let record = verify(&folder).record;
    assert_eq!(record.decision, Serving::Undecided);
    assert!(record.reasons.contains(&CheckReason::ReferenceNotValid) && !record.passed);
    assert!(fault(&folder, true).contains("does not cover the day of the check"));
    assert_eq!(command(&folder, &["--strict"]).0, 2);
    // A rig past its calibration is said, and refused where that is asked for.
    let folder = copy("check");
    edit(
        &folder.path().join("bench-5.toml"),
        &[("until = 2027-03-02", "until = 2026-11-30")],
    );
    assert!(
        serde_json::to_string(&verify(&folder).record)
            .unwrap()
            .contains("calibration_expired")
    );
    assert!(fault(&folder, true).contains("calibration of the force scale"));
}

/// Only the plates: nothing is said of the scales.
#[test]
fn plates_alone_are_no_check() {
    let folder = copy("check");
    let text = "rig = \"bench-5.toml\"\nplates = \"plates.csv\"\n";
    std::fs::write(folder.path().join("check.toml"), text).unwrap();
    let verified = verify(&folder);
    assert_eq!(verified.record.decision, Serving::Undecided);
    assert_eq!(verified.record.reasons, [CheckReason::NoReference]);
    assert!(!verified.record.passed && verified.record.as_last().is_none());
    assert!(verified.proposal.is_some());
}

/// The rig file takes the frame's give, and keeps its comments, its other figures and its units.
#[test]
fn the_rig_file_is_changed_and_keeps_its_comments() {
    for (units, compliance) in [
        (
            "mm-N",
            "compliance = { value = 0.00030, uncertainty = 0.00001, k = 2 } # plates, spring",
        ),
        (
            "in-lbf",
            "compliance = { unknown = \"declared negligible\" } # plates, spring",
        ),
        ("mm-N", "allowance = \"2 %\" # plates, spring"),
    ] {
        let folder = copy("check");
        let rig = folder.path().join("bench-5.toml");
        let old = "compliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }";
        edit(&rig, &[(old, compliance)]);
        if units == "in-lbf" {
            edit(
                &rig,
                &[
                    ("units = \"mm-N\"", "units = \"in-lbf\""),
                    ("resolution = 0.01", "resolution = 0.00225"),
                    ("from = 4.0, to = 1000.0", "from = 0.9, to = 225.0"),
                    ("resolution = 0.001", "resolution = 0.00004"),
                    (
                        "zero = { uncertainty = 0.02",
                        "zero = { uncertainty = 0.0008",
                    ),
                    ("set_at_length = 70.0", "set_at_length = 2.75591"),
                    ("[contact]\nload = 1.0", "[contact]\nload = 0.225"),
                ],
            );
        }
        let before = std::fs::read_to_string(&rig).unwrap();
        let contradicted = compliance.contains("0.00030");
        let (status, stdout, _) = command(&folder, &[]);
        assert_eq!(status, i32::from(contradicted), "{stdout}");
        assert!(
            stdout.contains("--write would change bench-5.toml:"),
            "{stdout}"
        );
        assert_eq!(
            std::fs::read_to_string(&rig).unwrap(),
            before,
            "nothing is written unasked"
        );
        let (_, stdout, _) = command(&folder, &["--write"]);
        assert!(stdout.contains("changed in bench-5.toml:\n"), "{stdout}");
        let after = std::fs::read_to_string(&rig).unwrap();
        let kept = |text: &str| {
            text.lines()
                .filter(|line| !line.contains("compliance"))
                .count()
        };
        assert_eq!(kept(&before), kept(&after), "{after}");
        assert!(
            after.contains("# plates, spring") && after.contains("# Invented bench."),
            "{after}"
        );
        let opened = coilassay::rig::open(&rig, "bench-5.toml").unwrap();
        let coilassay::rig::Compliance::Measured { give, standard } = opened.frame else {
            panic!("{after}")
        };
        assert!(
            (give.at(1.0) - 0.000_122).abs() < 2e-6 && standard > 1e-6 && standard < 3e-6,
            "{after}"
        );
        let (status, stdout, _) = command(&folder, &["--write"]);
        assert_eq!(status, 0, "{stdout}");
        assert!(stdout.contains("holds these figures already"), "{stdout}");
    }
}

/// A frame that bends goes in as a table, which is then what corrects the curves.
#[test]
fn a_table_goes_into_the_rig_file() {
    let folder = copy("check");
    let soft = |load: f64| 0.03 * (1.0 - (-load.max(0.0) / 100.0).exp());
    bend(&folder.path().join("plates.csv"), |length, load| {
        (length - soft(load), load)
    });
    bend_reference(&folder, |length, load| (length - soft(load), load));
    let record = verify(&folder).record;
    assert!(record.frame.unwrap().table.is_some());
    let (status, stdout, _) = command(&folder, &["--write"]);
    assert_eq!(status, 1, "the rig file was contradicted: {stdout}");
    let record = verify(&folder).record;
    assert_eq!(record.decision, Serving::Serves, "{:?}", record.reasons);
    assert!(record.bench.compliance.starts_with("table of "));
    for one in &record.comparisons {
        assert!(one.e_n.unwrap().get().abs() < 0.6, "{one:?}");
    }
}

/// Deflections: lengths hang on the certified free length, which is then no quantity of the check.
#[test]
fn a_free_length_is_never_compared_with_itself() {
    let folder = copy("check");
    edit(
        &folder.path().join("bench-5.toml"),
        &[("means = \"length\"", "means = \"deflection\"")],
    );
    bend_reference(&folder, |length, load| (90.0 - length, load));
    edit(
        &folder.path().join("check.toml"),
        &[("plates = \"plates.csv\"", "")],
    );
    let record = verify(&folder).record;
    assert_eq!(record.comparisons.len(), 3, "{:?}", findings(&record));
    assert_eq!(record.decision, Serving::Serves, "{:?}", record.reasons);
    assert!(
        serde_json::to_string(&record)
            .unwrap()
            .contains("free_length_not_checked")
    );
}

#[test]
fn files_with_faults_are_refused() {
    let changes: [(&str, &str, &str); 7] = [
        (
            "[[reference.load]]\nat_length = 50.0\nvalue = 337.68\nuncertainty = 0.60\nk = 2\n",
            "",
            "1 certified loads",
        ),
        (
            "at_length = 50.0",
            "at_length = 70.0",
            "two certified loads at one length",
        ),
        (
            "at_length = 50.0",
            "at_length = 85.0",
            "at or beyond the certified free length",
        ),
        (
            "from = 75.0, to = 50.0",
            "from = 50.0, to = 75.0",
            "not the longer length",
        ),
        (
            "drawings = [\"tg-204.toml\"]",
            "",
            "`tolerances` is missing",
        ),
        ("name = \"RS-3\"", "nmae = \"RS-3\"", "did you mean `name`"),
        ("k = 2, from = 75.0", "from = 75.0", "`k` is missing"),
    ];
    for (from, to, wanted) in changes {
        let folder = copy("check");
        edit(&folder.path().join("check.toml"), &[(from, to)]);
        let said = fault(&folder, false);
        assert!(said.contains(wanted), "{wanted}: {said}");
    }
    let folder = copy("check");
    let reference = |number: u32| folder.path().join(format!("reference/rs-3-{number}.csv"));
    std::fs::copy(reference(1), reference(2)).unwrap();
    assert!(fault(&folder, false).contains("digit for digit"));
    let folder = copy("check");
    std::fs::copy(
        folder.path().join("reference/rs-3-1.csv"),
        folder.path().join("plates.csv"),
    )
    .unwrap();
    assert!(fault(&folder, false).contains("a spring and no frame"));
}

/// Earlier results make the trend: of this rig on this reference, in order, none twice.
#[test]
fn earlier_checks_make_the_trend() {
    let folder = copy("check");
    std::fs::create_dir(folder.path().join("earlier")).unwrap();
    for (number, date) in ["2026-11-10", "2026-11-03", "2026-11-17"]
        .iter()
        .enumerate()
    {
        let (status, stdout, _) = command(&folder, &["--json", "--date", date]);
        assert_eq!(status, 0);
        let path = folder.path().join(format!("earlier/{number}.json"));
        std::fs::write(path, stdout).unwrap();
    }
    let mut foreign: CheckRecord = serde_json::from_str(
        &std::fs::read_to_string(folder.path().join("earlier/0.json")).unwrap(),
    )
    .unwrap();
    assert_eq!(foreign.as_earlier().len(), 4);
    assert_eq!(foreign.as_last().unwrap().id, "RS-3");
    foreign.rig = "another".to_owned();
    std::fs::write(
        folder.path().join("earlier/9.json"),
        serde_json::to_string(&foreign).unwrap(),
    )
    .unwrap();
    std::fs::copy(
        folder.path().join("earlier/0.json"),
        folder.path().join("earlier/8.json"),
    )
    .unwrap();
    edit(
        &folder.path().join("check.toml"),
        &[(
            "plates = \"plates.csv\"",
            "plates = \"plates.csv\"\nearlier = [\"earlier/*.json\"]",
        )],
    );
    let record = verify(&folder).record;
    let dates: Vec<String> = record
        .earlier
        .iter()
        .map(|one| one.date.to_string())
        .collect();
    assert_eq!(dates.len(), 12, "{dates:?}");
    assert!(dates.is_sorted());
    let out = folder.path().join("out");
    let (status, ..) = command(&folder, &["--out", out.to_str().unwrap()]);
    assert_eq!(status, 0);
    for chart in [
        "trend-rate",
        "trend-load-at-70-mm",
        "trend-free_length",
        "e-n",
        "frame",
    ] {
        assert!(out.join(format!("charts/{chart}.svg")).exists(), "{chart}");
    }
    let html = std::fs::read_to_string(out.join("report.html")).unwrap();
    assert!(html.contains("Earlier checks") && html.contains("2026-11-03"));
    let written: CheckRecord =
        serde_json::from_str(&std::fs::read_to_string(out.join("result.json")).unwrap()).unwrap();
    assert_eq!(written.earlier, record.earlier);
    // The same inputs give the same bytes.
    let again = folder.path().join("again");
    command(&folder, &["--out", again.to_str().unwrap()]);
    for file in [
        "report.html",
        "report.pdf",
        "result.json",
        "charts/trend-rate.svg",
    ] {
        assert_eq!(
            std::fs::read(out.join(file)).unwrap(),
            std::fs::read(again.join(file)).unwrap(),
            "{file}"
        );
    }
}

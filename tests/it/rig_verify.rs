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
pub(crate) fn bend(path: &Path, change: impl Fn(f64, f64) -> (f64, f64)) {
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

pub(crate) fn bend_reference(folder: &TempDir, change: impl Fn(f64, f64) -> (f64, f64)) {
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

pub(crate) fn verify(folder: &TempDir) -> Verified {
    let check = folder.path().join("check.toml");
    rig_verify(&check, "check.toml", &options(false), Vec::new())
        .unwrap_or_else(|fault| panic!("{fault:?}"))
}

pub(crate) fn fault(folder: &TempDir, strict: bool) -> String {
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

pub(crate) fn command(folder: &TempDir, more: &[&str]) -> (i32, String, String) {
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

pub(crate) fn findings(record: &CheckRecord) -> Vec<(&str, Finding)> {
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
    // The rig file states 0.00012 mm/N with U = 0.00001, k = 2.
    let reach = frame.to_n.get() - frame.from_n.get();
    let u = frame.standard_uncertainty_mm_per_n.unwrap().get();
    let wanted = (frame.compliance_mm_per_n.get() - 0.000_12) * reach
        / (2.0 * reach * (u * u + 0.000_005_f64.powi(2)).sqrt());
    assert!((frame.e_n.unwrap().get() - wanted).abs() < 1e-9);
    assert!((frame.stated_give_mm.unwrap().get() - 0.000_12 * reach).abs() < 1e-12);
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
        &[("until = 2027-02-10", "until = 2026-11-29")],
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
        &[("until = 2027-03-02", "until = 2026-11-29")],
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

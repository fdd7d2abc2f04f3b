//! `rig verify`: which spring, which day, which units.

use coilassay::record::{Finding, Serving};

use crate::lots::edit;
use crate::rig_verify::{bend, copy, fault, findings, verify};

/// Another spring among the exports of the reference is found, though the mean agrees; and a check speaks of the day it was
/// measured, not of the day somebody judged it again.
#[test]
fn what_is_no_check_of_this_spring_on_this_day() {
    let folder = copy("check");
    let export = |number: u32| folder.path().join(format!("reference/rs-3-{number}.csv"));
    bend(&export(1), |length, load| (length, load * 1.02));
    bend(&export(2), |length, load| (length, load * 0.98));
    let record = verify(&folder).record;
    assert_ne!(record.decision, Serving::Serves);
    assert_eq!(
        findings(&record)[0].1,
        Finding::CannotTell,
        "the repeats scatter"
    );
    assert!(
        serde_json::to_string(&record)
            .unwrap()
            .contains("measurements_differ")
    );
    // Against wider tolerances the scatter would do, but single measurements still disagree.
    edit(
        &folder.path().join("check.toml"),
        &[(
            "drawings = [\"tg-204.toml\"] ",
            "tolerances = { rate = \"60 %\", load = \"60 %\", free_length = 3.0 } ",
        )],
    );
    let record = verify(&folder).record;
    assert_eq!(record.decision, Serving::Undecided);
    assert_eq!(findings(&record)[0].1, Finding::Scattered);
    let folder = copy("check");
    let record = verify(&folder).record;
    assert_eq!(
        (
            record.judged_at.to_string(),
            record.provenance.date.as_str()
        ),
        ("2026-11-30".to_owned(), "2026-12-01")
    );
    let check = folder.path().join("check.toml");
    edit(&check, &[("on = 2026-11-30", "on = 2026-12-02")]);
    let said = fault(&folder, false);
    assert!(
        said.contains("measured on 2026-12-02, but is judged on 2026-12-01"),
        "{said}"
    );
    edit(&check, &[("on = 2026-12-02", "")]);
    let record = verify(&folder).record;
    assert_eq!(record.judged_at.to_string(), "2026-12-01");
    assert!(
        serde_json::to_string(&record)
            .unwrap()
            .contains("day_not_stated")
    );
}

/// Of several drawings the tightest tolerance counts; a tolerance as stated counts as it stands; a certificate made after the
/// check proves nothing of it.
#[test]
fn the_tightest_tolerance_and_the_certificate_of_the_day() {
    let allowed = |folder: &tempfile::TempDir| -> Vec<f64> {
        let record = verify(folder).record;
        let all = record.comparisons.iter();
        all.filter_map(|one| Some(one.allowed_error?.get()))
            .collect()
    };
    let close = |got: &[f64], wanted: &[f64]| {
        assert_eq!(got.len(), wanted.len());
        for (got, wanted) in got.iter().zip(wanted) {
            assert!((got - wanted).abs() < 1e-9 * wanted, "{got} {wanted}");
        }
    };
    let folder = copy("check");
    let check = folder.path().join("check.toml");
    let drawing = std::fs::read_to_string(folder.path().join("tg-204.toml")).unwrap();
    let wider = drawing
        .replace("tolerance = \"5 %\"", "tolerance = \"9 %\"")
        .replacen("tolerance = \"8 %\"", "tolerance = \"6 %\"", 1)
        .replace(
            "[requirements]",
            "[requirements]\nfree_length = { nominal = 90.0, tolerance = 1.8 }",
        );
    std::fs::write(folder.path().join("other.toml"), wider).unwrap();
    edit(
        &check,
        &[("[\"tg-204.toml\"]", "[\"tg-204.toml\", \"other.toml\"]")],
    );
    // A fifth of 5 %, of 6 % and of 1.8 mm.
    close(
        &allowed(&folder),
        &[0.01 * 9.842, 0.012 * 140.84, 0.012 * 337.68, 0.36],
    );
    edit(
        &check,
        &[(
            "drawings = [\"tg-204.toml\", \"other.toml\"]",
            "share = \"50 %\"\ntolerances = { rate = 0.4, load = \"10 %\", free_length = 1.0 }",
        )],
    );
    close(&allowed(&folder), &[0.2, 0.05 * 140.84, 0.05 * 337.68, 0.5]);
    edit(&check, &[("on = 2026-02-10", "on = 2026-12-01")]);
    assert_eq!(verify(&folder).record.decision, Serving::Undecided);
}

/// The same check written in inches and pounds-force.
#[test]
fn units_of_the_check_file_do_not_matter() {
    let (inch, pound) = (25.4, 0.453_592_37 * 9.806_65);
    let folder = copy("check");
    let mm = verify(&folder).record;
    let certified = |value: f64, uncertainty: f64, unit: f64| {
        format!(
            "value = {}\nuncertainty = {}\nk = 2\n",
            value / unit,
            uncertainty / unit
        )
    };
    let load = |at: f64, value: f64, uncertainty: f64| {
        let certified = certified(value, uncertainty, pound);
        format!("[[reference.load]]\nat_length = {}\n{certified}", at / inch)
    };
    let text = [
        "units = \"in-lbf\"\nrig = \"bench-5.toml\"\nexports = [\"reference/*.csv\"]\n".to_owned(),
        "plates = \"plates.csv\"\ndrawings = [\"tg-204.toml\"]\n[check]\non = 2026-11-30\n"
            .to_owned(),
        "[reference]\nname = \"RS-3\"\ncalibrated = { on = 2026-02-10, until = 2027-02-10 }\n"
            .to_owned(),
        format!(
            "[reference.rate]\nfrom = {}\nto = {}\n",
            75.0 / inch,
            50.0 / inch
        ),
        certified(9.842, 0.012, pound / inch),
        format!("[reference.free_length]\n{}", certified(84.35, 0.03, inch)),
        load(70.0, 140.84, 0.30),
        load(50.0, 337.68, 0.60),
        "[conditions]\ntemperature = 20.3\npresetting_strokes = 3\n".to_owned(),
    ];
    std::fs::write(folder.path().join("check.toml"), text.concat()).unwrap();
    let inches = verify(&folder).record;
    assert_eq!(inches.decision, mm.decision);
    for (a, b) in inches.comparisons.iter().zip(&mm.comparisons) {
        let off = (a.e_n.unwrap().get() - b.e_n.unwrap().get()).abs();
        assert!(off < 1e-9, "{}: {off}", a.name);
    }
}

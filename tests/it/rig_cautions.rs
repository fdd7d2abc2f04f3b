//! What page one of a lot's report says of the rig, and what `--strict` refuses.

use coilassay::job::{Keep, Memory, Options, accept};
use coilassay::record::{AcceptRecord, Caution, LastCheck, Told};
use jiff::civil::{Date, date};
use tempfile::TempDir;

use crate::lots::edit;
use crate::rig_verify::{copy, flat};

fn judged(folder: &TempDir, strict: bool, last: Option<Date>) -> Result<AcceptRecord, String> {
    let options = Options {
        date: date(2026, 12, 1),
        units_confirmed: false,
        strict,
        keep: Keep::default(),
        block_bytes: None,
        flags: Vec::new(),
        memory: Memory::Told(Told {
            last_check: last.map(|date| LastCheck {
                date,
                id: "RS-3".to_owned(),
            }),
            ..Told::default()
        }),
        past: None,
    };
    accept(&folder.path().join("lot.toml"), "lot.toml", &options)
        .map(|accepted| accepted.record)
        .map_err(|fault| flat(&format!("{fault:?}")))
}

fn check_caution(record: &AcceptRecord) -> Option<&Caution> {
    let mut all = record.cautions.iter();
    all.find(|one| matches!(one, Caution::NoCheckOnRecord { .. }))
}

/// The rig file asks for a check every 7 d; the lot is judged on 2026-12-01.
#[test]
fn a_passed_check_holds_for_its_time() {
    let folder = copy("accepted");
    let last = |day| judged(&folder, false, Some(day)).unwrap();
    for day in [date(2026, 11, 24), date(2026, 12, 1)] {
        let record = last(day);
        assert_eq!(check_caution(&record), None, "{day}");
        assert_eq!(record.rig.checked, Some(format!("{day} (RS-3)")));
        assert!(judged(&folder, true, Some(day)).is_ok());
    }
    for (day, told) in [
        (Some(date(2026, 11, 23)), Some("2026-11-23 (RS-3)")),
        (Some(date(2026, 12, 2)), Some("2026-12-02 (RS-3)")), // made after the judgement: proves nothing of it
        (None, None),
    ] {
        let record = judged(&folder, false, day).unwrap();
        let wanted = Caution::NoCheckOnRecord {
            every: "7 d".to_owned(),
            last: told.map(str::to_owned),
        };
        assert_eq!(check_caution(&record), Some(&wanted));
        assert_eq!(record.rig.checked, None);
        let said = judged(&folder, true, day).unwrap_err();
        assert!(said.contains("wants a check every 7 d"), "{said}");
    }
    edit(
        &folder.path().join("bench-1.toml"),
        &[("check_every = \"7 d\"", "check_every = \"1 month\"")],
    );
    assert_eq!(check_caution(&last(date(2026, 11, 1))), None);
    assert!(check_caution(&last(date(2026, 10, 31))).is_some());
    edit(
        &folder.path().join("bench-1.toml"),
        &[("check_every = \"1 month\"", "check_every = \"often\"")],
    );
    let said = judged(&folder, false, None).unwrap_err();
    assert!(
        said.contains("not a number of days, weeks or months"),
        "{said}"
    );
}

/// A calibration that has run out, a load under the usable range, a large U: said on page one, refused under --strict.
#[test]
fn every_warning_on_the_rig_is_refused_where_asked() {
    let held = Some(date(2026, 12, 1));
    let cases: [(&str, &str, &str, &str); 6] = [
        // Class 0.5 allows a step of 0.25 % of the load: 0.6 N is that of 240 N, more than the springs carry at 70 mm.
        (
            "resolution = 0.01\nrange = { from = 4.0, to = 1000.0 }",
            "resolution = 0.6",
            "load_outside_range",
            "outside the range",
        ),
        (
            "until = 2027-03-02",
            "until = 2026-11-30",
            "calibration_expired",
            "does not cover the day",
        ),
        (
            "calibrated = { on = 2026-03-02, until = 2027-03-02 }",
            "",
            "calibration_unknown",
            "states no calibration",
        ),
        (
            "range = { from = 4.0, to = 1000.0 }",
            "range = { from = 300.0, to = 1000.0 }",
            "load_outside_range",
            "outside the range",
        ),
        (
            "range = { from = 4.0, to = 1000.0 }",
            "range = { from = 4.0, to = 350.0 }",
            "load_outside_range",
            "outside the range",
        ),
        (
            "class = \"0.5\"",
            "class = \"2\"",
            "uncertainty_large",
            "more than half of it",
        ),
    ];
    for (from, to, code, told) in cases {
        let folder = copy("accepted");
        edit(&folder.path().join("bench-1.toml"), &[(from, to)]);
        let record = judged(&folder, false, held).unwrap();
        let cautions = serde_json::to_string(&record.cautions).unwrap();
        assert!(cautions.contains(code), "{code}: {cautions}");
        let page = coilassay::model::Model::new(&record, coilassay::units::System::MmN);
        assert_eq!(
            page.cautions.len(),
            record.cautions.len(),
            "page one says every one of them"
        );
        let said = judged(&folder, true, held).unwrap_err();
        assert!(said.contains(told), "{told}: {said}");
    }
}

/// Loads beyond the table of the frame's give.
#[test]
fn loads_beyond_the_frame_table_are_named() {
    let folder = copy("accepted");
    let old = "compliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }";
    let table = |last: &str| {
        format!(
            "compliance = {{ table = [{{ load = 100.0, give = 0.012 }}, {{ load = {last} }}], uncertainty = 0.00001, k = 2 }}"
        )
    };
    edit(
        &folder.path().join("bench-1.toml"),
        &[(old, &table("600.0, give = 0.072"))],
    );
    let straight = judged(&folder, false, None).unwrap();
    let cautions = |record: &AcceptRecord| serde_json::to_string(&record.cautions).unwrap();
    assert!(!cautions(&straight).contains("frame_beyond_table"));
    // A table on a straight line corrects as the line does.
    let line = judged(&copy("accepted"), false, None).unwrap();
    for (a, b) in straight.springs.iter().zip(&line.springs) {
        for (a, b) in a.characteristics.iter().zip(&b.characteristics) {
            let (a, b) = (a.value.unwrap().get(), b.value.unwrap().get());
            assert!((a - b).abs() <= 1e-9 * b.abs(), "{a} {b}");
        }
    }
    edit(
        &folder.path().join("bench-1.toml"),
        &[(&table("600.0, give = 0.072"), &table("300.0, give = 0.036"))],
    );
    assert!(cautions(&judged(&folder, false, None).unwrap()).contains("frame_beyond_table"));
    for (bad, told) in [
        ("90.0, give = 0.036", "do not rise"),
        ("300.0, give = 0.011", "do not rise"),
        ("300.0", "`give` is missing"),
    ] {
        let folder = copy("accepted");
        edit(&folder.path().join("bench-1.toml"), &[(old, &table(bad))]);
        let said = judged(&folder, false, None).unwrap_err();
        assert!(said.contains(told), "{told}: {said}");
    }
}

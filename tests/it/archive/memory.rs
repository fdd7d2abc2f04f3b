//! What an archive tells: earlier checks of the rig, earlier lots of the supplier; and that a result stands without it later.

use std::fs;

use serde_json::Value;

use super::{root, text, tool};
use crate::bad_input::Case;

/// The sample on Bench 1 (a check every 7 d), and a check file whose reference spring is TG-01, certified `factor` times what
/// the bench measures.
fn bench() -> Case {
    let case = Case::of("accepted");
    check_file(&case, 1.0);
    case
}

fn check_file(case: &Case, factor: f64) {
    let (_, result) = case.judged(&[]);
    let spring = &result["springs"][0];
    assert_eq!(spring["id"], "TG-01");
    let value = |name: &str, at: Option<f64>| {
        let found = spring["characteristics"]
            .as_array()
            .unwrap()
            .iter()
            .find(|of| of["name"] == name && of["at_length_mm"].as_f64() == at);
        found.unwrap()["value"].as_f64().unwrap()
    };
    let (rate, long, short) = (
        value("rate", None),
        value("load", Some(70.0)),
        value("load", Some(52.0)),
    );
    let text = format!(
        r#"rig = "bench-1.toml"
exports = ["springs/TG-01.csv"]
tolerances = {{ rate = "5 %", load = "8 %", free_length = 1.8 }}
[check]
note = "Invented check"
[reference]
name = "TG-01"
free_length = {{ value = {}, uncertainty = 0.1, k = 2 }}
rate = {{ value = {}, uncertainty = 0.004, k = 2 }}
[[reference.load]]
at_length = 70.0
value = {}
uncertainty = 0.1
k = 2
[[reference.load]]
at_length = 52.0
value = {}
uncertainty = 0.2
k = 2
"#,
        value("free_length", None),
        rate * factor,
        long * factor,
        short * factor
    );
    case.set("check.toml", text);
}

fn check(case: &Case, date: &str, code: i32) -> Value {
    let ran = tool(
        case,
        &[
            "rig",
            "verify",
            "lot/check.toml",
            "--archive",
            "archive",
            "--date",
            date,
            "--json",
        ],
    );
    assert_eq!(ran.code, Some(code), "{}{}", text(&ran), ran.err);
    serde_json::from_slice(&ran.out).unwrap()
}

fn checks(case: &Case) -> Vec<std::path::PathBuf> {
    let pattern = root(case).join("checks/rig_key=*/*.parquet");
    let found = glob::glob(&pattern.to_string_lossy()).unwrap();
    found.map(Result::unwrap).collect()
}

fn cautions(case: &Case, date: &str) -> (String, Value) {
    let (_, result) = case.judged(&["--archive", "archive", "--date", date]);
    (result["cautions"].to_string(), result)
}

#[test]
fn accept_names_the_last_passed_check_and_warns_without_one() {
    let case = bench();
    let strict = |date: &str| case.run(&["--archive", "archive", "--strict", "--date", date]);
    assert!(
        cautions(&case, "2026-12-01")
            .0
            .contains("no_check_on_record")
    );
    assert_eq!(strict("2026-12-01").code, Some(2));
    check(&case, "2026-11-28", 0);
    let (said, result) = cautions(&case, "2026-12-01");
    assert!(!said.contains("check"), "{said}");
    assert!(
        result["rig"].to_string().contains("2026-11-28"),
        "{}",
        result["rig"]
    );
    assert_eq!(strict("2026-12-01").code, Some(0));
    // Eight days later, and the day before it was made.
    for date in ["2026-12-06", "2026-11-27"] {
        assert!(
            cautions(&case, date).0.contains("no_check_on_record"),
            "{date}"
        );
        assert_eq!(strict(date).code, Some(2));
    }
    assert!(
        cautions(&case, "2026-12-06")
            .0
            .contains("2026-11-28 (TG-01)")
    );
}

#[test]
fn a_failed_check_outweighs_the_passed_one_before_it() {
    let case = bench();
    check(&case, "2026-11-28", 0);
    check_file(&case, 1.03);
    let failed = check(&case, "2026-11-29", 1);
    assert_eq!(failed["passed"], false);
    let (said, _) = cautions(&case, "2026-12-01");
    assert!(
        said.contains("check_failed") && said.contains("2026-11-29 (TG-01)"),
        "{said}"
    );
    assert_eq!(
        case.run(&["--archive", "archive", "--strict", "--date", "2026-12-01"])
            .code,
        Some(2)
    );
    let page = case.run(&["--archive", "archive"]);
    assert!(
        text(&page).contains("The last check of this rig on record failed"),
        "{}",
        text(&page)
    );
    check_file(&case, 1.0);
    check(&case, "2026-11-30", 0);
    assert!(!cautions(&case, "2026-12-01").0.contains("check"));
    // A check of another bench says nothing of this one.
    case.sub("bench-1.toml", "Bench 1, goods-in", "Bench 9");
    assert!(
        cautions(&case, "2026-12-01")
            .0
            .contains("no_check_on_record")
    );
}

#[test]
fn a_check_looks_back_at_the_earlier_ones_and_can_be_recomputed() {
    let case = bench();
    let dates = ["2026-11-28", "2026-11-29", "2026-11-30"];
    for (number, date) in dates.iter().enumerate() {
        let earlier = check(&case, date, 0)["earlier"].as_array().unwrap().len();
        assert_eq!(earlier, 4 * number, "four quantities each");
    }
    // Judged again for an earlier day, it looks back at the days before that one.
    assert_eq!(
        check(&case, "2026-11-28", 0)["earlier"]
            .as_array()
            .unwrap()
            .len(),
        4
    );
    assert_eq!(checks(&case).len(), 4);
    let ran = tool(&case, &["recheck", "archive"]);
    assert_eq!(ran.code, Some(0), "{}{}", text(&ran), ran.err);
    assert!(
        text(&ran).contains("4 same, 0 different, 0 could not"),
        "{}",
        text(&ran)
    );
    case.sub("check.toml", "Invented check", "Invented check, changed");
    let ran = tool(&case, &["recheck", "archive"]);
    assert_eq!(ran.code, Some(2));
    assert!(
        text(&ran).contains("check lot/check.toml: SHA-256 was"),
        "{}",
        text(&ran)
    );
}

#[test]
fn a_check_that_cannot_be_read_is_never_passed_over() {
    let case = bench();
    check(&case, "2026-11-28", 0);
    let file = checks(&case).remove(0);
    let whole = fs::read(&file).unwrap();
    fs::write(&file, &whole[..whole.len() / 2]).unwrap();
    for ran in [
        case.run(&["--archive", "archive"]),
        tool(
            &case,
            &["rig", "verify", "lot/check.toml", "--archive", "archive"],
        ),
    ] {
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0));
        assert!(ran.err.contains("its SHA-256 is not"), "{}", ran.err);
    }
}

/// One lot after the other: good ones, and such whose loads are a tenth low.
fn lot(case: &Case, number: &str, date: &str, good: bool) -> Value {
    let file = case.text("lot.toml");
    let exports: Vec<(String, String)> = (1..=20)
        .map(|spring| format!("springs/TG-{spring:02}.csv"))
        .map(|name| (name.clone(), case.text(&name)))
        .collect();
    case.sub(
        "lot.toml",
        "number = \"0417\"",
        &format!("number = \"{number}\""),
    );
    if !good {
        case.loads(0.9);
    }
    let (code, result) = case.judged(&["--archive", "archive", "--date", date]);
    // Tightened inspection wants more springs than there are: then a good lot is undecided.
    let wanted = if good {
        [Some(0), Some(3)]
    } else {
        [Some(1); 2]
    };
    assert!(wanted.contains(&code), "{code:?}");
    case.set("lot.toml", file);
    for (name, text) in exports {
        case.set(&name, text);
    }
    result
}

#[test]
fn the_state_of_inspection_follows_from_the_archive() {
    let case = Case::of("accepted");
    let state = |result: &Value| {
        (
            result["plan"]["state"]["state"].clone(),
            result["plan"]["state"]["reason"]["code"].clone(),
        )
    };
    let first = lot(&case, "1", "2026-11-01", true);
    assert_eq!(state(&first), (Value::from("normal"), Value::Null));
    lot(&case, "2", "2026-11-02", false);
    let third = lot(&case, "3", "2026-11-03", false);
    assert_eq!(state(&third).0, "normal", "one of two was rejected");
    // Lot 2 sorted and brought back: accepted now, and yet its original inspection counts.
    let again = lot(&case, "2", "2026-11-04", true);
    assert_eq!(
        state(&again).0,
        "normal",
        "lots 1 and 3: its own earlier run is no past lot"
    );
    let fourth = lot(&case, "4", "2026-11-05", true);
    assert_eq!(
        state(&fourth),
        (Value::from("tightened"), Value::from("two_of_five"))
    );
    assert_eq!(
        fourth["plan"]["state"]["reason"]["lots"],
        serde_json::json!(["2", "3"])
    );
    let told = &fourth["provenance"]["archive"]["past_lots"];
    assert_eq!(told.as_array().unwrap().len(), 3);
    // An early date escapes no history, and a lot judged again has the state of its first inspection.
    let early = lot(&case, "5", "2026-10-01", true);
    assert_eq!(state(&early).0, "tightened");
    assert_eq!(state(&lot(&case, "1", "2026-11-20", true)).0, "normal");
    let later = lot(&case, "4", "2026-11-21", true);
    assert_eq!(state(&later).1, "two_of_five");
    // Another supplier's lots say nothing about this one's.
    case.sub("lot.toml", "Marshlight Coil", "Another coil maker");
    assert_eq!(state(&lot(&case, "9", "2026-11-06", true)).0, "normal");
}

#[test]
fn a_result_made_with_an_archive_stands_when_the_archive_has_gone_on() {
    let case = bench();
    check(&case, "2026-11-28", 0);
    lot(&case, "1", "2026-11-29", false);
    lot(&case, "2", "2026-11-29", false);
    let flags = [
        "--archive",
        "archive",
        "--out",
        "out",
        "--no-report",
        "--date",
        "2026-11-30",
    ];
    assert_ne!(case.run(&flags).code, Some(2));
    let before = fs::read(case.path("../out/result.json")).unwrap();
    check_file(&case, 1.03);
    check(&case, "2026-11-30", 1);
    check_file(&case, 1.0);
    for words in [["recheck", "out"], ["recheck", "out/result.json"]] {
        let ran = tool(&case, &words);
        assert_eq!(ran.code, Some(0), "{}{}", text(&ran), ran.err);
    }
    // Judged again it is another result: the failed check came on the same day.
    assert_ne!(case.run(&flags).code, Some(2));
    assert_ne!(fs::read(case.path("../out/result.json")).unwrap(), before);
    assert_eq!(tool(&case, &["recheck", "out"]).code, Some(0));
}

#[test]
fn a_history_file_goes_before_the_archive_and_is_an_input() {
    let case = Case::of("accepted");
    let header = "date,lot,decision,accept,accepted_tighter\n";
    let rows = "2026-10-01,A,rejected,1,no\n2026-10-02,B,rejected,1,no\n";
    case.set("../past.csv", format!("{header}{rows}"));
    lot(&case, "1", "2026-11-01", true);
    let flags = [
        "--archive",
        "archive",
        "--history",
        "past.csv",
        "--out",
        "out",
        "--no-report",
    ];
    let (_, result) = case.judged(&flags);
    assert_eq!(result["plan"]["state"]["state"], "tightened");
    assert_eq!(tool(&case, &["recheck", "out"]).code, Some(0));
    case.set("../past.csv", format!("{header}{rows}\n"));
    let ran = tool(&case, &["recheck", "out"]);
    assert_eq!(ran.code, Some(2));
    assert!(
        text(&ran).contains("history past.csv: SHA-256 was"),
        "{}",
        text(&ran)
    );
}

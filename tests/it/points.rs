//! Loads at a few lengths instead of curves, wide and long: a lot judged end to end, and what is refused.

use approx::assert_abs_diff_eq;
use serde_json::Value;

use crate::bad_input::{Case, squeezed};

const WIDE: &str = "spring = { column = \"Spring\" }\npoints = { wide = [{ column = \"F 70\", length = 70.0 }, { column = \"F 52\", length = 52.0 }], unit = \"N\" }";
const LONG: &str = "spring = { column = \"Spring\" }\npoints = \"long\"\nload = { column = \"F\", unit = \"N\" }\ntravel = { column = \"L\", unit = \"mm\", means = \"length\" }";
/// Invented loads at 70 mm and 52 mm. Limits of the drawing by hand: 212 N ± 8 % is 195.04 … 228.96 N.
const LOADS: [(&str, &str, &str); 3] = [
    ("A", "212.00", "403.00"),
    ("F", "240.00", "431.00"),
    ("U", "228.80", "419.80"),
];

fn wide_table() -> String {
    let rows = LOADS.map(|(id, long, short)| format!("{id},{long},{short}\n"));
    format!("Spring,F 70,F 52\n{}", rows.concat())
}

fn long_table() -> String {
    let rows = LOADS.map(|(id, long, short)| format!("{id},70.0,{long}\n{id},52.0,{short}\n"));
    format!("Spring,L,F\n{}", rows.concat())
}

/// The lot of the three springs, its export written as `export` says.
fn lot(export: &str, table: &str) -> Case {
    let case = Case::of("accepted");
    case.cut("bench-1.toml", "load = { column", "[force]");
    case.sub(
        "bench-1.toml",
        "decimal = \".\"\n",
        &format!("decimal = \".\"\n{export}\n\n"),
    );
    case.sub(
        "bench-1.toml",
        "compliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }",
        "compliance = { unknown = \"declared negligible\" }",
    );
    case.cut(
        "tg-204.toml",
        "free_length = { nominal = 90.0, tolerance = 1.8, class",
        "[[requirements.load]]",
    );
    case.sub(
        "tg-204.toml",
        "window = { from = \"30 %\", to = \"70 %\", of = \"full load\" }",
        "window = { from = 70.0, to = 52.0, of = \"length\" }",
    );
    case.sub("lot.toml", "springs/*.csv", "table.csv");
    case.sub("lot.toml", "findings = \"caliper.csv\"\n", "");
    case.sub("lot.toml", "size = 150", "size = 3");
    case.set("table.csv", table);
    case
}

fn of<'v>(spring: &'v Value, name: &str, at: Option<f64>) -> &'v Value {
    let all = spring["characteristics"].as_array().unwrap();
    all.iter()
        .find(|one| one["name"] == name && at.is_none_or(|at| one["at_length_mm"] == at))
        .unwrap()
}

#[test]
fn wide_and_long_give_the_same_verdicts() {
    let (code, wide) = lot(WIDE, &wide_table()).judged(&[]);
    let (other, long) = lot(LONG, &long_table()).judged(&[]);
    assert_eq!(code, other);
    let verdicts: Vec<&Value> = wide["springs"]
        .as_array()
        .unwrap()
        .iter()
        .map(|one| &one["verdict"])
        .collect();
    assert_eq!(verdicts, ["conforms", "fails", "undecided"]);
    for (one, other) in wide["springs"]
        .as_array()
        .unwrap()
        .iter()
        .zip(long["springs"].as_array().unwrap())
    {
        assert_eq!(one["characteristics"], other["characteristics"]);
    }
    assert_eq!(wide["provenance"]["ledgers"][0]["points"], 3);
    assert_eq!(long["provenance"]["ledgers"][0]["points"], 6);
}

/// By hand, spring A: (403 − 212) / 18 = 10.6111 N/mm. Load at 70 mm: repeatability 0.15 alone is own; common are force
/// 212 · 0.005/√3 = 0.6120, zero 0.1 · 0.005 · 1000/√3 = 0.2887, temperature 212 · 0.0003 · 0.5 = 0.0318, length zero
/// 0.01 · 10.6111 = 0.1061; travel counts from 70 mm, so 0. Root of the sum of squares 0.7019.
#[test]
fn values_by_hand_and_nothing_invented() {
    let (_, result) = lot(WIDE, &wide_table()).judged(&[]);
    let spring = &result["springs"][0];
    let rate = of(spring, "rate", None);
    assert_abs_diff_eq!(
        rate["value"].as_f64().unwrap(),
        191.0 / 18.0,
        epsilon = 1e-9
    );
    let load = of(spring, "load", Some(70.0));
    assert_abs_diff_eq!(load["value"].as_f64().unwrap(), 212.0, epsilon = 1e-9);
    assert_abs_diff_eq!(
        load["own_uncertainty"].as_f64().unwrap(),
        0.15,
        epsilon = 5e-5
    );
    assert_abs_diff_eq!(
        load["standard_uncertainty"].as_f64().unwrap(),
        0.7019,
        epsilon = 5e-5
    );
    assert!(spring["fit"].is_null());
    let cautions = result["cautions"].as_array().unwrap();
    let told = cautions
        .iter()
        .find(|one| one["code"] == "point_readings")
        .unwrap();
    assert_eq!(
        (&told["from_mm"], &told["to_mm"]),
        (&70.0.into(), &52.0.into())
    );
}

#[test]
fn a_length_that_was_not_read_has_no_value() {
    let case = lot(WIDE, &wide_table());
    case.sub("tg-204.toml", "at_length = 52.0", "at_length = 55.0");
    let (_, result) = case.judged(&[]);
    let load = of(&result["springs"][0], "load", Some(55.0));
    assert!(load["value"].is_null());
    assert_eq!(load["reason"]["code"], "length_not_read");
    let case = lot(WIDE, &wide_table());
    case.sub(
        "tg-204.toml",
        "from = 70.0, to = 52.0",
        "from = 69.0, to = 52.0",
    );
    let (_, result) = case.judged(&[]);
    assert_eq!(
        of(&result["springs"][0], "rate", None)["reason"]["code"],
        "window_not_read"
    );
}

#[test]
fn what_does_not_fit_is_refused() {
    let one = "spring = { column = \"Spring\" }\npoints = { wide = [{ column = \"F 70\", length = 70.0 }], unit = \"N\" }";
    let twice = format!("{}A,60.0,300.00\n", long_table());
    let rows = [
        (
            "one length",
            lot(one, &wide_table()),
            "a rate needs loads at two lengths",
        ),
        (
            "deflection",
            lot(&LONG.replace("\"length\"", "\"deflection\""), &long_table()),
            "are kept by length",
        ),
        ("twice", lot(LONG, &twice), "returns"),
        (
            "one reading",
            lot(LONG, &long_table().replace("A,52.0,403.00\n", "")),
            "has one reading",
        ),
        (
            "same length",
            lot(LONG, &long_table().replace("A,52.0", "A,70.0")),
            "two loads at 70.000 mm",
        ),
        (
            "falls",
            lot(
                WIDE,
                &wide_table().replace("A,212.00,403.00", "A,403.00,212.00"),
            ),
            "lower than at a longer length",
        ),
        (
            "N for lbf",
            lot(
                &WIDE.replace("F 70", "F 70 [lbf]"),
                &wide_table().replace("F 70", "F 70 [lbf]"),
            ),
            "states `lbf`, the rig file N",
        ),
        (
            "units",
            lot(
                &WIDE.replace("unit = \"N\"", "unit = \"lbf\""),
                &wide_table(),
            ),
            "loads in N were read as lbf",
        ),
    ];
    for (name, case, says) in rows {
        let ran = case.run(&[]);
        assert_eq!(ran.code, Some(2), "{name}: {}", ran.err);
        assert!(
            squeezed(&ran.err).contains(&squeezed(says)),
            "{name}: {}",
            ran.err
        );
    }
}

#[test]
fn a_report_without_a_curve() {
    let case = lot(WIDE, &wide_table());
    let ran = case.run(&["--out", "report"]);
    assert_ne!(ran.code, Some(2), "{}", ran.err);
    let page = std::fs::read_to_string(case.dir.path().join("report/report.html")).unwrap();
    assert!(
        page.contains("Loads at a few lengths, no curve"),
        "the caution is missing"
    );
    assert!(!page.contains("NaN"));
}

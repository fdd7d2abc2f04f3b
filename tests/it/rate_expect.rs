//! `rate` and `expect` through the binary: what they print, and when they refuse.

use assert_cmd::Command;
use serde_json::Value;

const RIG: &str = "samples/accepted/bench-1.toml";
const EXPORT: &str = "samples/accepted/springs/TG-05.csv";

struct Ran {
    code: Option<i32>,
    out: String,
    fault: String,
}

fn run(words: &[&str]) -> Ran {
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .args(words)
        .output()
        .unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    Ran {
        code: output.status.code(),
        out: text(output.stdout),
        fault: text(output.stderr),
    }
}

fn json(words: &[&str]) -> Value {
    let ran = run(words);
    serde_json::from_str(&ran.out).unwrap_or_else(|_| panic!("{}", ran.fault))
}

fn near(found: &Value, wanted: f64, within: f64) {
    let found = found.as_f64().unwrap();
    assert!((found - wanted).abs() <= within, "{found}, wanted {wanted}");
}

#[test]
fn with_a_rig_file_rate_and_load_are_those_of_the_lot() {
    let lot: Value = json(&[
        "accept",
        "samples/accepted/lot.toml",
        "--json",
        "--date",
        "2026-12-01",
    ]);
    let spring = lot["springs"]
        .as_array()
        .unwrap()
        .iter()
        .find(|one| one["id"] == "TG-05")
        .unwrap()
        .clone();
    let of = |name: &str| {
        spring["characteristics"]
            .as_array()
            .unwrap()
            .iter()
            .find(|one| one["name"] == name)
            .unwrap()
            .clone()
    };
    let rate = json(&["rate", EXPORT, "--rig", RIG, "--at-length", "70", "--json"]);
    // Another window (of travel, not of load): the same straight spring within a third of its expanded uncertainty.
    let expanded = of("rate")["expanded_uncertainty"].as_f64().unwrap();
    near(
        &rate[0]["rate_n_per_mm"],
        of("rate")["value"].as_f64().unwrap(),
        expanded / 3.0,
    );
    // The load at a length hangs on no window.
    near(
        &rate[0]["loads"][0]["load_n"],
        of("load")["value"].as_f64().unwrap(),
        1e-9,
    );
}

#[test]
fn with_columns_only_the_scatter_is_known_and_said() {
    let columns = ["--load", "Load [N]:N", "--travel", "Length [mm]:mm:length"];
    let ran = run(&[&["rate", EXPORT][..], &columns].concat());
    assert_eq!(ran.code, Some(0));
    assert!(
        ran.out.contains("nothing is known of the bench"),
        "{}",
        ran.out
    );
    let known = json(&["rate", EXPORT, "--rig", RIG, "--json"]);
    let unknown = json(&[&["rate", EXPORT, "--json"][..], &columns].concat());
    let expanded = |of: &Value| of[0]["expanded_uncertainty_n_per_mm"].as_f64().unwrap();
    assert!(expanded(&unknown) < expanded(&known));
    assert_eq!(unknown[0]["rig_known"], false);
}

#[test]
fn without_a_word_on_the_columns_it_says_what_it_sees_and_refuses() {
    let ran = run(&["rate", "samples/rejected/federn/1.csv"]);
    assert_eq!((ran.code, ran.out.as_str()), (Some(2), ""));
    for wanted in ["line 7", "Prüfkraft", "Federweg", "--load"] {
        assert!(ran.fault.contains(wanted), "{wanted}: {}", ran.fault);
    }
    let wrong_unit = run(&[
        "rate",
        EXPORT,
        "--load",
        "Load [N]:stone",
        "--travel",
        "Length [mm]:mm:length",
    ]);
    assert_eq!(wrong_unit.code, Some(2));
    assert!(wrong_unit.fault.contains("--load"), "{}", wrong_unit.fault);
    let other_unit = run(&[
        "rate",
        EXPORT,
        "--load",
        "Load [N]:lbf",
        "--travel",
        "Length [mm]:mm:length",
    ]);
    assert_eq!(other_unit.code, Some(2), "the header says N");
}

/// Bhandari, Design of Machine Elements, example 10.19, the outer and inner spring with equal free length: rates 28.253472
/// and 29.4307 N/mm, stresses by Wahl 375.305136 and 225.032219 MPa at their loads.
#[test]
fn theory_of_a_published_set() {
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("set.toml");
    let member = |name: &str, d: f64, coil: f64, n: f64| {
        format!(
            "[[spring]]\nname = \"{name}\"\nwire_diameter = {d}\nmean_diameter = {coil}\nactive_coils = {n}\ntotal_coils = {}\n\
             ends = \"closed ground\"\nfree_length = 150.0\nshear_modulus = 81370\nshear_modulus_source = \"Bhandari\"\n",
            n + 2.0
        )
    };
    let head = "[drawing]\nnumber = \"X\"\narrangement = \"nested\"\n";
    let text = format!(
        "{head}{}{}",
        member("outer", 6.0, 36.0, 10.0),
        member("inner", 5.0, 30.0, 8.0)
    );
    std::fs::write(&file, text).unwrap();
    let path = file.to_string_lossy().into_owned();
    let found = json(&["expect", &path, "--at-load", "1000", "--json"]);
    near(&found["rate_n_per_mm"], 28.253_472 + 29.430_700, 2e-6);
    near(&found["members"][0]["rate_n_per_mm"], 28.253_472, 1e-6);
    let deflection = found["deflection_mm"].as_f64().unwrap();
    near(
        &found["members"][0]["load_n"],
        28.253_472 * deflection,
        1e-4,
    );
    let ratio = found["members"][0]["stress_mpa"]["wahl"].as_f64().unwrap()
        / found["members"][0]["load_n"].as_f64().unwrap();
    near(&Value::from(ratio), 375.305_136 / 706.021_471, 1e-8);
    let beyond = run(&["expect", &path, "--at-load", "100000"]);
    assert_eq!(beyond.code, Some(2));
}

#[test]
fn a_drawing_whose_rate_does_not_follow_contradicts_itself() {
    let text = std::fs::read_to_string("samples/accepted/tg-204.toml").unwrap();
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("drawing.toml");
    std::fs::write(&file, text.replace("nominal = 10.6,", "nominal = 13.0,")).unwrap();
    let ran = run(&["expect", &file.to_string_lossy()]);
    assert_eq!(ran.code, Some(1), "{}", ran.out);
    assert!(ran.out.contains("does not follow"), "{}", ran.out);
    assert_eq!(
        run(&["expect", "samples/accepted/tg-204.toml"]).code,
        Some(0)
    );
}

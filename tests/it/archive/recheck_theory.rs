//! The results of `expect` and `plan` recomputed from what they state.

use std::fs;

use serde_json::{Value, json};

use super::recheck::leaves;
use super::{text, tool};
use crate::bad_input::Case;

fn result(case: &Case) -> Value {
    serde_json::from_slice(&fs::read(case.path("../out/result.json")).unwrap()).unwrap()
}

fn set(case: &Case, value: &Value) {
    case.set("../out/result.json", serde_json::to_vec(value).unwrap());
}

/// Writes a result of this call into `out`, which must recheck as the same, with and without the folder.
fn written(case: &Case, words: &[&str]) -> Value {
    let ran = tool(
        case,
        &[words, &["--out", "out", "--date", "2026-12-05"]].concat(),
    );
    assert_eq!(ran.code, Some(0), "{words:?}: {}", ran.err);
    for file in ["out", "out/result.json"] {
        let ran = tool(case, &["recheck", file]);
        assert_eq!(ran.code, Some(0), "{words:?}: {}{}", text(&ran), ran.err);
        assert!(text(&ran).contains("bit for bit"), "{}", text(&ran));
    }
    result(case)
}

/// Some forty of its figures, each changed by its last bit, each in turn: every one is named.
fn no_figure_escapes(case: &Case, whole: &Value) {
    let mut places = Vec::new();
    leaves(whole, &mut Vec::new(), &mut places);
    let key = |path: &[String]| format!("/{}", path.join("/"));
    places.retain(|path| {
        let beside = ["files", "provenance", "format"].contains(&path[0].as_str());
        !beside && whole.pointer(&key(path)).unwrap().is_number()
    });
    assert!(places.len() >= 20, "{}", places.len());
    for path in places.iter().step_by(places.len().div_ceil(40)) {
        let mut value = whole.clone();
        let leaf = value.pointer_mut(&key(path)).unwrap();
        *leaf = leaf.as_u64().map_or_else(
            || json!(f64::from_bits(leaf.as_f64().unwrap().to_bits() ^ 1)),
            |whole| json!(whole + 1),
        );
        set(case, &value);
        let ran = tool(case, &["recheck", "out"]);
        assert_eq!(ran.code, Some(1), "{path:?}: {}{}", text(&ran), ran.err);
    }
    set(case, whole);
}

/// With these flags instead, it is refused in these words.
fn refused(case: &Case, whole: &Value, flags: &[&str], says: &str) {
    let mut value = whole.clone();
    value["provenance"]["flags"] = json!(flags);
    set(case, &value);
    let ran = tool(case, &["recheck", "out"]);
    let flat = ran.err.replace("│ ", "");
    let flat = flat.split_whitespace().collect::<Vec<_>>().join(" ");
    assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{flags:?}: {flat}");
    assert!(flat.contains(says), "{flags:?}: {flat}");
}

#[test]
fn what_expect_found_is_recomputed() {
    let case = Case::of("accepted");
    let drawing = ["expect", "lot/tg-204.toml"];
    no_figure_escapes(&case, &written(&case, &drawing));
    let at_length = written(&case, &[&drawing[..], &["--at-length", "70.3"]].concat());
    assert_eq!(
        at_length["provenance"]["flags"],
        json!(["--at-length 70.3"])
    );
    let whole = written(&case, &[&drawing[..], &["--at-load", "212.1"]].concat());
    no_figure_escapes(&case, &whole);
    refused(
        &case,
        &whole,
        &[],
        "does not state the load or length it was asked at",
    );
    refused(&case, &whole, &["--at-load x"], "the flag `--at-load x`");
    refused(&case, &whole, &["--strict"], "the flag `--strict`");
    set(&case, &whole);
    case.sub("tg-204.toml", "total_coils = 9.5", "total_coils = 9.6");
    let ran = tool(&case, &["recheck", "out"]);
    assert_eq!(ran.code, Some(2));
    let said = "drawing lot/tg-204.toml: SHA-256 was ";
    assert!(text(&ran).contains(said), "{}", text(&ran));
}

/// The table of materials lies beside the drawing, and the call was made from elsewhere.
#[test]
fn a_table_of_materials_is_one_of_its_inputs() {
    let case = Case::of("nested");
    case.set(
        "ours.toml",
        "units = \"mm-N\"\n[[material]]\nname = \"ours\"\nshear_modulus = 81500.0\nsource = \"invented\"\n",
    );
    let single = "arrangement = \"nested\"";
    case.sub(
        "tg-350.toml",
        single,
        &format!("{single}\nmaterials = \"ours.toml\""),
    );
    case.sub("tg-350.toml", "EN 10270-1 SH", "ours");
    let found = written(&case, &["expect", "lot/tg-350.toml"]);
    assert_eq!(found["provenance"]["inputs"].as_array().unwrap().len(), 2);
    case.sub("ours.toml", "invented", "invented anew");
    let ran = tool(&case, &["recheck", "out"]);
    assert_eq!(ran.code, Some(2));
    assert!(
        text(&ran).contains("ours.toml: SHA-256 was "),
        "{}",
        text(&ran)
    );
}

#[test]
fn the_plans_asked_for_are_recomputed() {
    let case = Case::of("plans");
    let words = "plan --lot-size 1200 --aql 1.0 --aql 0.65 --level I --level S-4 --mil-std-414 1.0 --level-414 V \
        --designed 1%:5%:5%:10% --zero-accept 4%:10% --bench 25%:33%:80%";
    let words: Vec<&str> = words.split_whitespace().collect();
    let whole = written(&case, &words);
    assert_eq!(whole["plans"].as_array().unwrap().len(), 7);
    no_figure_escapes(&case, &whole);
    refused(
        &case,
        &whole,
        &[],
        "does not state the flags that asked for its plans",
    );
    refused(&case, &whole, &["--aql 1"], "no `--lot-size`");
    refused(
        &case,
        &whole,
        &["--lot-size 1200", "--aql one"],
        "the flag `--aql one`",
    );
    refused(
        &case,
        &whole,
        &["--lot-size 1200", "--strict"],
        "the flag `--strict`",
    );
    let tightened = [
        "plan",
        "--lot-size",
        "1200",
        "--aql",
        "1",
        "--state",
        "tightened",
    ];
    written(&case, &tightened);
    let history = "plan --lot-size 1200 --aql 1 --history lot/history.csv --reduced-agreed";
    written(&case, &history.split(' ').collect::<Vec<_>>());
    case.set(
        "history.csv",
        case.text("history.csv") + "2026-11-09,0417,accepted,1,\n",
    );
    let ran = tool(&case, &["recheck", "out"]);
    assert_eq!(ran.code, Some(2));
    assert!(
        text(&ran).contains("history lot/history.csv: SHA-256 was "),
        "{}",
        text(&ran)
    );
}

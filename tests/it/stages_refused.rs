//! What a drawing of a set by stages may not say, and what a curve of one cannot tell.

use std::fs;

use serde_json::Value;

use crate::stages::{DRAWING, GOOD, Lot, of};

#[test]
fn what_stages_do_not_allow_is_refused_at_its_place() {
    let stage_2 = "[[requirements.rate]]\nstage = 2\nbetween = [112.0, 70.0]\nnominal = 16.0\ntolerance = \"5 %\"\n";
    let stage_1 = "[[requirements.rate]]\nstage = 1\nbetween = [136.0, 124.0]\nnominal = 10.19\ntolerance = \"5 %\"\n";
    for (from, to, said) in [
        (
            "between = [112.0, 70.0]",
            "between = [125.0, 70.0]",
            "lie inside it",
        ),
        (
            "between = [112.0, 70.0]",
            "between = [70.0, 112.0]",
            "not the longer one",
        ),
        (
            "between = [112.0, 70.0]",
            "between = [112.0]",
            "does not hold two lengths",
        ),
        ("between = [112.0, 70.0]\n", "", "`between` is missing"),
        ("stage = 2", "stage = 3", "have 2 stages"),
        ("stage = 2", "stage = 1", "has a rate already"),
        ("stage = 2", "stage = 0", "not 1 to 4"),
        (
            "[requirements.knee]\n",
            "[requirements.knee]\nnumber = 2\n",
            "have 2 stages",
        ),
        (
            "tolerance = 1.5",
            "tolerance = 1.5\nminimum = 100.0",
            "two ways at once",
        ),
        ("free_length = 120.0", "free_length = 50.0", "never touched"),
        (
            "[acceptance]",
            "[rate_test]\nwindow = { from = 130.0, to = 90.0, of = \"length\" }\n[acceptance]",
            "the knee at 120.000 mm inside",
        ),
    ] {
        assert!(DRAWING.contains(from), "{from}");
        let (code, _, fault) = Lot::new(&DRAWING.replacen(from, to, 1), &[GOOD]).judge();
        assert_eq!(code, Some(2), "{said}: {fault}");
        let flat = fault
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ")
            .replace("│ ", "");
        assert!(
            flat.contains(said) && fault.contains("line "),
            "{said}: {fault}"
        );
    }
    for (drawing, said) in [
        (
            DRAWING.replace(stage_2, "").replace(stage_1, ""),
            "no rate says between which lengths",
        ),
        (
            DRAWING.replace(stage_2, "").replace(
                stage_1,
                "[requirements.rate]\nnominal = 16.0\ntolerance = \"5 %\"\n",
            ),
            "members engage one after the other",
        ),
        (
            DRAWING.replace("free_length = 120.0", "free_length = 140.0"),
            "have 1 stage",
        ),
    ] {
        let (code, _, fault) = Lot::new(&drawing, &[GOOD]).judge();
        assert_eq!(code, Some(2), "{said}");
        let flat = fault
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ")
            .replace("│ ", "");
        assert!(flat.contains(said), "{said}: {fault}");
    }
}

/// A curve that ends before the knee gives no knee, and never another place instead.
#[test]
fn a_curve_that_ends_before_the_knee_gives_none() {
    let lot = Lot::new(DRAWING, &[GOOD]);
    let file = lot.folder.path().join("sets/1.csv");
    let text = fs::read_to_string(&file).unwrap();
    let kept: Vec<&str> = text
        .lines()
        .take_while(|line| {
            line.split(',')
                .next()
                .unwrap()
                .parse::<f64>()
                .map_or(true, |length| length > 122.0)
        })
        .collect();
    fs::write(&file, kept.join("\n") + "\n").unwrap();
    let (code, record) = lot.record();
    assert_eq!(code, Some(3));
    let knee = of(&record["springs"][0], "knee");
    assert!(
        knee["value"].is_null() && knee["verdict"] == "undecided",
        "{knee}"
    );
    assert_eq!(
        of(&record["springs"][0], "rate_stage_1")["verdict"],
        "conforms"
    );
}

/// A load that stage rates and free lengths do not give contradicts, as with one stage.
#[test]
fn a_load_off_the_stages_contradicts() {
    let lot = Lot::new(
        &DRAWING.replace("nominal = 684.0", "nominal = 760.0"),
        &[GOOD],
    );
    let (_, record) = lot.record();
    let cautions = record["cautions"].as_array().unwrap();
    let found: Vec<&Value> = cautions
        .iter()
        .filter(|one| one["code"] == "drawing")
        .collect();
    assert_eq!(found.len(), 1, "{cautions:?}");
    assert_eq!(found[0]["finding"]["code"], "load_not_from_rate");
    // 10.19·20 + 16.0·30 = 683.8 N; (760 − 683.8)/16 = 4.76 mm more free length (by hand).
    let fits = found[0]["finding"]["fitting_free_length_mm"]
        .as_f64()
        .unwrap();
    assert!((fits - 144.762).abs() < 1e-3, "{fits}");
}

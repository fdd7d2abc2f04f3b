//! Units mixed up in a whole lot: named and not judged; judged and said where someone stands for it. And `--strict`.
//! Factors by definition: 1 in = 25.4 mm, 1 kgf = 9.806 65 N, 1 lbf = 4.448 221 615 260 5 N.

use std::fmt::Write;

use crate::bad_input::{Case, Spoilt, all_refused, squeezed};

const KGF: f64 = 9.806_65;
const LBF: f64 = 4.448_221_615_260_5;
const INCH: f64 = 25.4;

fn scaled(case: &Case, length: f64, load: f64) {
    case.rows(|rows| {
        rows.into_iter()
            .map(|row| (row.0, row.1 * length, row.2 * load))
            .collect()
    });
}

const MIX_UPS: &[Spoilt] = &[
    (
        "kgf read as N",
        |c| scaled(c, 1.0, 1.0 / KGF),
        &[
            "20 of 20 springs",
            "loads in kgf were read as N",
            "--units-confirmed",
        ],
    ),
    (
        "lbf read as N",
        |c| scaled(c, 1.0, 1.0 / LBF),
        &["20 of 20 springs", "loads in lbf were read as N"],
    ),
    (
        "in read as mm",
        |c| scaled(c, 1.0 / INCH, 1.0),
        &["20 of 20 springs", "travel in inches was read as mm"],
    ),
    (
        "lbf and in read as N and mm",
        |c| scaled(c, 1.0 / INCH, 1.0 / LBF),
        &["20 of 20 springs", "loads in lbf and travel in inches"],
    ),
    (
        "N read as lbf",
        |c| scaled(c, 1.0, LBF),
        &["loads in N were read as lbf"],
    ),
    (
        "N read as kgf",
        |c| scaled(c, 1.0, KGF),
        &["loads in N were read as kgf"],
    ),
    (
        "kN read as N",
        |c| {
            scaled(c, 1.0, 0.001);
            c.sub("bench-1.toml", "load = 1.0", "load = 0.01");
        },
        &["loads in kN were read as N"],
    ),
];

#[test]
fn mixed_up_units_are_named_and_not_judged() {
    all_refused("accepted", MIX_UPS);
}

#[test]
fn who_stands_for_the_units_gets_a_judgement_that_says_so() {
    for (name, spoil, wanted) in MIX_UPS.iter().take(3) {
        let case = Case::of("accepted");
        spoil(&case);
        let (code, result) = case.judged(&["--units-confirmed"]);
        assert!(matches!(code, Some(1 | 3)), "{name}: {code:?}");
        let cautions = result["cautions"].to_string();
        assert!(cautions.contains("units_confirmed"), "{name}: {cautions}");
        let looks = wanted
            .iter()
            .find(|words| words.contains("read as"))
            .unwrap();
        assert!(cautions.contains(looks), "{name}: {cautions}");
        assert!(
            result["provenance"]["flags"]
                .to_string()
                .contains("--units-confirmed")
        );
    }
}

/// A diameter convention, a wrong wire: named in a caution, and the springs are judged.
#[test]
fn any_other_ratio_is_judged_and_named() {
    let case = Case::of("accepted");
    scaled(&case, 1.0, 0.8);
    let (code, result) = case.judged(&[]);
    assert_eq!(code, Some(1));
    assert!(result["cautions"].to_string().contains("odd_ratio"));
}

#[test]
fn one_spring_in_another_unit_is_judged_beside_its_neighbours() {
    let case = Case::of("accepted");
    let text = case.text("springs/TG-03.csv");
    let mut spoilt = String::new();
    for (place, line) in text.lines().enumerate() {
        match line.rsplit_once(',') {
            Some((head, load)) if place > 0 => {
                let load: f64 = load.parse().unwrap();
                writeln!(spoilt, "{head},{:.4}", load * LBF).unwrap();
            }
            _ => writeln!(spoilt, "{line}").unwrap(),
        }
    }
    case.set("springs/TG-03.csv", spoilt);
    let (_, result) = case.judged(&[]);
    let springs = result["springs"].as_array().unwrap();
    let of = |id: &str| springs.iter().find(|one| one["id"] == id).unwrap()["verdict"].clone();
    assert_eq!(
        (of("TG-03"), of("TG-04")),
        ("fails".into(), "conforms".into())
    );
}

#[test]
fn a_calibration_past_its_date_is_a_caution_and_strictly_a_refusal() {
    let case = Case::of("rejected");
    let inside = case.judged(&["--date", "2027-05-11"]);
    assert!(!inside.1["cautions"].to_string().contains("calibration"));
    let (code, result) = case.judged(&["--date", "2027-05-12"]);
    assert_eq!(code, Some(1));
    assert_eq!(
        result["cautions"]
            .to_string()
            .matches("calibration_expired")
            .count(),
        2
    );
    let before = case.judged(&["--date", "2026-05-10"]);
    assert!(
        before.1["cautions"]
            .to_string()
            .contains("calibration_expired")
    );
    let strict = case.run(&["--strict", "--date", "2027-05-12"]);
    assert_eq!(
        (strict.code, strict.out.len()),
        (Some(2), 0),
        "{}",
        strict.err
    );
    assert!(
        squeezed(&strict.err).contains("calibrationoftheforcescale"),
        "{}",
        strict.err
    );
    assert_eq!(
        case.run(&["--strict", "--date", "2027-05-11"]).code,
        Some(1)
    );
}

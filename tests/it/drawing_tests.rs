//! What `expect` finds in drawings that do not agree with themselves, and that `accept` repeats it on page one.

use coilassay::job::Ask;
use coilassay::record::Expected;
use serde_json::Value;

use crate::bad_input::Case;
use crate::drawn::expected;

pub(crate) fn sample() -> String {
    std::fs::read_to_string("samples/accepted/tg-204.toml").unwrap()
}

fn nested() -> String {
    std::fs::read_to_string("samples/nested/tg-350.toml").unwrap()
}

fn of(text: &str) -> Expected {
    expected(text, Ask::Drawing).unwrap_or_else(|fault| panic!("{fault:?}"))
}

pub(crate) fn changed(mut text: String, changes: &[(&str, &str)]) -> String {
    for (from, to) in changes {
        assert!(text.contains(from), "`{from}` is not there");
        text = text.replace(from, to);
    }
    text
}

fn codes(of: &Expected) -> Vec<String> {
    let found = serde_json::to_value(&of.findings).unwrap();
    let codes = found.as_array().unwrap().iter();
    codes
        .map(|one| one["code"].as_str().unwrap().to_owned())
        .collect()
}

type Slip = (
    &'static str,
    &'static [(&'static str, &'static str)],
    &'static str,
    bool,
);

/// Name, change of the sample, code of what is found, whether it contradicts.
#[rustfmt::skip] // keeps the table a table
const SLIPS: [Slip; 17] = [
    ("another rate", &[("nominal = 10.6,", "nominal = 13.0,")], "rate_not_from_geometry", true),
    ("outside taken for mean", &[("outside_diameter = { nominal = 36.0", "mean_diameter = { nominal = 36.0")], "rate_not_from_geometry", true),
    ("mean taken for outside", &[("{ nominal = 36.0, tolerance = 0.4 }", "{ nominal = 32.0, tolerance = 0.4 }")], "rate_not_from_geometry", true),
    ("total taken for active", &[("active_coils = { nominal = 7.5", "active_coils = { nominal = 9.5")], "rate_not_from_geometry", true),
    ("another material", &[("EN 10270-1 SH", "EN 10270-3 1.4310 NS")], "rate_not_from_geometry", true),
    ("rate in lbf/in", &[("nominal = 10.6,", "nominal = 60.5,")], "rate_not_from_geometry", true),
    ("two loads, another rate", &[("nominal = 403.0", "nominal = 440.0")], "loads_not_from_rate", true),
    ("a load off the line", &[("nominal = 212.0", "nominal = 240.0")], "load_not_from_rate", true),
    ("free length off its limits", &[("free_length = { nominal = 90.0, tolerance = 1.8 }", "free_length = { nominal = 95.0, tolerance = 1.8 }")], "size_not_as_drawn", true),
    ("tested too short", &[("at_length = 52.0", "at_length = 43.0")], "length_below_smallest", true),
    ("window too wide", &[("from = \"30 %\", to = \"70 %\"", "from = \"10 %\", to = \"70 %\"")], "window_outside", true),
    ("solid length too short", &[("maximum = 38.4", "maximum = 30.0")], "solid_length_too_short", true),
    ("dead coils", &[("total_coils = 9.5", "total_coils = 8.5")], "coils_not_from_ends", false),
    ("driven near its own frequency", &[("[acceptance]", "[service]\nfrequency = 20.0\n[acceptance]")], "frequency_near", false),
    ("buckles as it is seated", &[("[acceptance]", "[service]\nseating = \"one end free\"\n[acceptance]")], "buckles", true),
    ("service load too far", &[("[acceptance]", "[service]\nload = { from = 50.0, to = 480.0 }\n[acceptance]")], "service_below_smallest", true),
    ("fatigue", &[("[acceptance]", "[service]\nload = { from = 10.0, to = 440.0 }\n[acceptance]")], "fatigue_below_one", false),
];

#[test]
fn slips_are_found_and_named() {
    assert!(
        codes(&of(&sample())).is_empty(),
        "{:?}",
        codes(&of(&sample()))
    );
    let mut missed = Vec::new();
    for (name, changes, code, contradicts) in SLIPS {
        let found = of(&changed(sample(), changes));
        let codes = codes(&found);
        if !codes.iter().any(|one| one == code) || found.agrees == contradicts {
            missed.push(format!("{name}: {codes:?}, agrees {}", found.agrees));
        }
    }
    assert!(missed.is_empty(), "{missed:#?}");
}

/// The first reading named is the slip that was made, and says by how much it fits.
#[test]
fn the_reading_that_would_fit_is_named() {
    for (name, reading) in [
        ("outside taken for mean", "mean_is_outside"),
        ("mean taken for outside", "outside_is_mean"),
        ("total taken for active", "active_are_total"),
        ("another material", "material"),
        ("rate in lbf/in", "unit"),
    ] {
        let slip = SLIPS.iter().find(|slip| slip.0 == name).unwrap();
        let found = serde_json::to_value(of(&changed(sample(), slip.1)).findings).unwrap();
        let first = &found[0]["readings"][0];
        assert_eq!(first["reading"]["as"], reading, "{name}: {found}");
        assert!(
            first["off"].as_f64().unwrap().abs() < 0.01,
            "{name}: {first}"
        );
    }
    // A rate worked out with all coils: 10.61·7.5/9.5 (by hand).
    let by_total = of(&changed(
        sample(),
        &[("nominal = 10.6,", "nominal = 8.377,")],
    ));
    let found = serde_json::to_value(by_total.findings).unwrap();
    assert_eq!(found[0]["readings"][0]["reading"]["as"], "total_for_active");
    // 13/10.611 = 1.2251: 7.5/1.2251 coils, 32/1.2251^(1/3) mm, 4·1.2251^(1/4) mm (by hand).
    let another = of(&changed(sample(), SLIPS[0].1));
    let needed = &serde_json::to_value(another.findings).unwrap()[0]["needed"];
    for (key, wanted) in [
        ("active_coils", 6.122),
        ("coil_mm", 29.907),
        ("wire_mm", 4.208),
    ] {
        assert!(
            (needed[key].as_f64().unwrap() - wanted).abs() < 1e-3,
            "{key}: {needed}"
        );
    }
}

/// Without a stated rate the loads must follow from the geometry, and from the free length.
#[test]
fn loads_without_a_rate() {
    let no_rate = |changes: &[(&str, &str)]| {
        let text = changed(
            sample(),
            &[(
                "rate = { nominal = 10.6, tolerance = \"5 %\", class = \"major\" }\n",
                "",
            )],
        );
        codes(&of(&changed(text, changes)))
    };
    assert!(no_rate(&[]).is_empty());
    assert_eq!(
        no_rate(&[("nominal = 403.0", "nominal = 440.0")]),
        ["rate_not_from_geometry"]
    );
    let shifted: &[(&str, &str)] = &[
        ("nominal = 212.0", "nominal = 120.0"),
        ("nominal = 403.0", "nominal = 311.0"),
        ("tolerance = \"8 %\"", "tolerance = \"2 %\""),
    ];
    assert_eq!(no_rate(shifted), ["free_length_not_from_loads"]);
}

#[test]
fn a_nest_that_touches_or_is_wound_alike() {
    let with_hands = |outer: &str, inner: &str| {
        let text = nested();
        let (head, tail) = text.split_once("name = \"inner\"").unwrap();
        let head = head.replace(
            "name = \"outer\"",
            &format!("name = \"outer\"\nhand = \"{outer}\""),
        );
        format!("{head}name = \"inner\"\nhand = \"{inner}\"{tail}")
    };
    assert_eq!(codes(&of(&nested())), ["hand_not_stated"]);
    assert!(of(&nested()).agrees);
    assert!(codes(&of(&with_hands("right", "left"))).is_empty());
    assert_eq!(codes(&of(&with_hands("left", "left"))), ["same_hand"]);
    // Outer Di 40; an inner De of 39.8 leaves 0.1 mm radially, less than it grows.
    let tight = changed(
        with_hands("right", "left"),
        &[("nominal = 37.0", "nominal = 39.8")],
    );
    let found = of(&tight);
    assert!(codes(&found).contains(&"nest_touches".to_owned()) && !found.agrees);
}

/// An index outside 4 to 20; stresses above the wire's at solid are a remark, at a test length a contradiction.
#[test]
fn index_and_stress() {
    let wide = changed(
        sample(),
        &[
            ("nominal = 36.0", "nominal = 100.0"),
            (
                "rate = { nominal = 10.6, tolerance = \"5 %\", class = \"major\" }\n",
                "",
            ),
        ],
    );
    assert!(codes(&of(&wide)).contains(&"index_unusual".to_owned()));
    let long = changed(
        sample(),
        &[
            ("nominal = 90.0", "nominal = 130.0"),
            ("rate = { nominal = 10.6", "rate = { nominal = 10.61"),
        ],
    );
    let found = of(&long);
    let above: Vec<Value> = serde_json::to_value(&found.findings)
        .unwrap()
        .as_array()
        .unwrap()
        .iter()
        .filter(|one| one["code"] == "stress_above")
        .cloned()
        .collect();
    assert_eq!(above.len(), 2, "{above:?}");
    assert!(above.iter().all(|one| one["rule"] == "en_uncorrected"));
}

/// G at 100 °C: 2.0 % less by EN 13906-1, 2.88 % by the SMI handbook (0.25 and 0.36·10⁻³ per K).
#[test]
fn the_rate_at_service_temperature() {
    let found = of(&changed(
        sample(),
        &[(
            "[acceptance]",
            "[service]\ntemperature = 100.0\n[acceptance]",
        )],
    ));
    let cold = found.rate_n_per_mm.get();
    let share = |warm: f64| warm / cold - 1.0;
    assert!((share(found.service.rate_at_temperature.unwrap().get()) + 0.02).abs() < 1e-12);
    assert!((share(found.service.rate_at_temperature_other.unwrap().get()) + 0.0288).abs() < 1e-12);
}

#[test]
fn accept_repeats_contradictions_and_not_remarks() {
    let case = Case::of("accepted");
    case.sub(
        "tg-204.toml",
        "from = \"30 %\", to = \"70 %\"",
        "from = \"10 %\", to = \"70 %\"",
    );
    case.sub("tg-204.toml", "total_coils = 9.5", "total_coils = 8.9");
    let (_, record) = case.judged(&[]);
    let cautions = record["cautions"].as_array().unwrap();
    let of: Vec<&str> = cautions
        .iter()
        .filter(|one| one["code"] == "drawing")
        .map(|one| one["finding"]["code"].as_str().unwrap())
        .collect();
    assert_eq!(of, ["window_outside"]);
}

//! Sets whose members engage one after the other, through the whole of `accept`: rate by stage, knee, refusals. The curves
//! are the sample generator's, which shares no code with the crate.

use std::fmt::Write;
use std::fs;
use std::path::Path;

use assert_cmd::Command;
use serde_json::Value;
use tempfile::TempDir;

use crate::bench::{Bench, Programme, run};
use crate::random::Random;
use crate::spring::{Member, Specimen, Wound};

pub(crate) const DRAWING: &str = r#"[drawing]
number = "TG-360"
arrangement = "nested"

[[spring]]
name = "outer"
hand = "right"
wire_diameter = 6.0
mean_diameter = 60.0
active_coils = 6.0
total_coils = 8.0
ends = "closed ground"
free_length = 140.0
material = "EN 10270-1 SH"

[[spring]]
name = "inner"
hand = "left"
wire_diameter = 4.0
mean_diameter = 40.0
active_coils = 7.0
total_coils = 9.0
ends = "closed ground"
free_length = 120.0
material = "EN 10270-1 SH"

[requirements.knee]
at_length = 120.0
tolerance = 1.5

[[requirements.rate]]
stage = 1
between = [136.0, 124.0]
nominal = 10.19
tolerance = "5 %"

[[requirements.rate]]
stage = 2
between = [112.0, 70.0]
nominal = 16.0
tolerance = "5 %"

[[requirements.load]]
at_length = 90.0
nominal = 684.0
tolerance = "6 %"

[acceptance]
plan = { by = "every-spring" }
"#;

/// What is made of a set: how much shorter the inner spring is, and whether it is there at all.
#[derive(Clone, Copy)]
pub(crate) struct Made {
    shorter: f64,
    inner: bool,
}

pub(crate) const GOOD: Made = Made {
    shorter: 0.0,
    inner: true,
};

fn set(made: Made, random: &mut Random) -> Specimen {
    let outer = Wound {
        wire: 6.0,
        coil: 60.0,
        active: 6.0,
        shear: 81_500.0,
    };
    let inner = Wound {
        wire: 4.0,
        coil: 40.0,
        active: 7.0,
        shear: 81_500.0,
    };
    let member = |wound: &Wound, line: f64, solid: f64, random: &mut Random| Member {
        rate: wound.rate() * (1.0 + random.bounded(0.005, 0.012)),
        line,
        toe: random.between(1.2, 1.6),
        toe_start: random.between(0.55, 0.65),
        solid,
    };
    let mut members = vec![member(&outer, 139.8, 48.0, random)];
    if made.inner {
        members.push(member(
            &inner,
            119.8 - made.shorter + random.bounded(0.15, 0.3),
            36.0,
            random,
        ));
    }
    Specimen {
        members,
        hysteresis: 0.03,
        set: 0.0,
    }
}

pub(crate) struct Lot {
    pub(crate) folder: TempDir,
    truth: Vec<Specimen>,
}

impl Lot {
    /// A lot of sets; `drawing` as it stands.
    pub(crate) fn new(drawing: &str, made: &[Made]) -> Self {
        let folder = tempfile::tempdir().unwrap();
        let place = folder.path();
        fs::create_dir(place.join("sets")).unwrap();
        let rig = fs::read_to_string(
            Path::new(env!("CARGO_MANIFEST_DIR")).join("samples/accepted/bench-1.toml"),
        )
        .unwrap();
        let rig: Vec<&str> = rig
            .lines()
            .filter(|line| !line.starts_with("time"))
            .collect();
        fs::write(
            place.join("bench-1.toml"),
            rig.join(
                "
",
            )
            .replace("to = 1000.0", "to = 2000.0"),
        )
        .unwrap();
        fs::write(place.join("drawing.toml"), drawing).unwrap();
        let lot = format!(
            "drawing = \"drawing.toml\"\nrig = \"bench-1.toml\"\nexports = [\"sets/*.csv\"]\n[lot]\nnumber = \"1\"\nsize = {}\n[conditions]\ntemperature = 20.0\n",
            made.len()
        );
        fs::write(place.join("lot.toml"), lot).unwrap();
        let mut truth = Vec::new();
        for (id, made) in made.iter().enumerate() {
            let mut random = Random::new(360, id as u64);
            let specimen = set(*made, &mut random);
            let bench = Bench {
                noise: 0.15,
                length_zero: 0.004,
                force_scale: 0.001,
                compliance: 0.000_12,
                ..Bench::perfect()
            };
            let programme = Programme {
                air: 2.0,
                bottom: 60.0,
                cycles: 1,
                loading: 400,
                unloading: 40,
                dwell: 0,
                slow_below: 0.0,
            };
            let mut text = "Length [mm],Load [N]\n".to_owned();
            run(&specimen, &bench, &programme, &mut random, |reading| {
                writeln!(text, "{:.3},{:.2}", reading.travel, reading.force).unwrap();
            });
            fs::write(place.join(format!("sets/{}.csv", id + 1)), text).unwrap();
            truth.push(specimen);
        }
        Self { folder, truth }
    }

    pub(crate) fn judge(&self) -> (Option<i32>, String, String) {
        let output = Command::cargo_bin("coilassay")
            .unwrap()
            .args(["accept", "--json", "--date", "2026-12-01"])
            .arg(self.folder.path().join("lot.toml"))
            .output()
            .unwrap();
        let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
        (
            output.status.code(),
            text(output.stdout),
            text(output.stderr),
        )
    }

    pub(crate) fn record(&self) -> (Option<i32>, Value) {
        let (code, out, fault) = self.judge();
        (
            code,
            serde_json::from_str(&out).unwrap_or_else(|_| panic!("{fault}")),
        )
    }
}

pub(crate) fn of<'a>(spring: &'a Value, name: &str) -> &'a Value {
    let all = spring["characteristics"].as_array().unwrap();
    all.iter()
        .find(|one| one["name"] == name)
        .unwrap_or_else(|| panic!("{name}: {spring}"))
}

#[test]
fn stages_and_knee_are_measured_and_conform() {
    let lot = Lot::new(DRAWING, &[GOOD; 8]);
    let (code, record) = lot.record();
    assert_eq!(code, Some(0), "{}", record["reasons"]);
    assert!(
        record["cautions"]
            .as_array()
            .unwrap()
            .iter()
            .all(|one| one["code"] != "drawing"),
        "{}",
        record["cautions"]
    );
    for (spring, truth) in record["springs"].as_array().unwrap().iter().zip(&lot.truth) {
        let rates: Vec<f64> = truth.members.iter().map(|member| member.rate).collect();
        for (name, wanted) in [
            ("rate_stage_1", rates[0]),
            ("rate_stage_2", rates[0] + rates[1]),
            ("knee", truth.members[1].line),
        ] {
            let found = of(spring, name);
            let off = found["value"].as_f64().unwrap() - wanted;
            let expanded = found["expanded_uncertainty"].as_f64().unwrap();
            assert!(
                off.abs() < 1.3 * expanded,
                "{name}: off by {off}, U {expanded}"
            );
            assert!(expanded < 0.02 * wanted, "{name}: U {expanded}");
            assert_eq!(found["verdict"], "conforms", "{name}: {found}");
        }
        assert!(
            spring["characteristics"]
                .as_array()
                .unwrap()
                .iter()
                .all(|one| one["name"] != "rate")
        );
    }
}

#[test]
fn a_missing_and_a_short_inner_spring_are_found() {
    let short = Made {
        shorter: 3.0,
        ..GOOD
    };
    let missing = Made {
        inner: false,
        ..GOOD
    };
    let (code, record) = Lot::new(DRAWING, &[GOOD, short, missing]).record();
    assert_eq!(code, Some(1));
    let springs = record["springs"].as_array().unwrap();
    assert_eq!(springs[0]["verdict"], "conforms");
    assert_eq!(of(&springs[1], "knee")["verdict"], "fails");
    assert_eq!(of(&springs[1], "rate_stage_2")["verdict"], "conforms");
    let (knee, second) = (of(&springs[2], "knee"), of(&springs[2], "rate_stage_2"));
    assert_eq!(knee["reason"]["code"], "no_knee");
    assert!(knee["value"].is_null());
    assert_eq!(second["verdict"], "fails");
    assert_eq!(of(&springs[2], "rate_stage_1")["verdict"], "conforms");
}

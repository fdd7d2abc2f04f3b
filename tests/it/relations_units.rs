//! Relations that hold whatever the truth is, through the whole of `accept`: the same lot in inch and lbf, and loads
//! times c.

use std::fmt::Write;
use std::fs;
use std::path::Path;

use coilassay::record::AcceptRecord;
use proptest::prelude::*;

use crate::known;
use crate::lots::{Lot, edit, rewrite, same};
use crate::published::Misses;

/// By definition: 25.4 mm to the inch, 0.45359237 kg · 9.80665 m/s² to the pound-force (NIST SP 811, B.8, exact).
const INCH: f64 = 25.4;
const POUND: f64 = 0.453_592_37 * 9.806_65;

fn number(text: &str, per: f64) -> String {
    format!("{:e}", text.parse::<f64>().unwrap() / per)
}

/// Divides the figure after every `section/key = ` of a file by what one unit of inch and lbf holds.
fn convert(path: &Path, keys: &[(&str, f64)]) {
    let text = fs::read_to_string(path).unwrap();
    let mut out = String::new();
    let mut section = String::new();
    for line in text.lines() {
        if line.starts_with('[') {
            line.clone_into(&mut section);
        }
        let mut line = line.replace("\"mm-N\"", "\"in-lbf\"");
        for (key, per) in keys {
            let (within, key) = key.split_once('/').unwrap();
            let key = format!("{key} = ");
            let Some(at) = line.find(&key).filter(|_| section.starts_with(within)) else {
                continue;
            };
            let from = at + key.len();
            let long = line[from..]
                .find(|c: char| !(c.is_ascii_digit() || "-.e".contains(c)))
                .unwrap_or(line.len() - from);
            let new = number(&line[from..from + long], *per);
            line.replace_range(from..from + long, &new);
        }
        out.push_str(&line);
        out.push('\n');
    }
    fs::write(path, out).unwrap();
}

/// The drawing in inch and lbf.
fn drawing_in_inches(path: &Path) {
    let rate = POUND / INCH;
    // The tolerances of coils stay as they are, those of lengths do not.
    let text = fs::read_to_string(path).unwrap();
    let line = |line: &str| {
        let lengths = [
            "wire_diameter",
            "outside_diameter",
            "free_length = { nominal",
        ];
        let is_length = lengths.iter().any(|key| line.starts_with(key));
        match line.split_once("tolerance = ") {
            Some((before, rest)) if is_length => {
                let figure = number(rest.trim_end_matches(" }"), INCH);
                format!("{before}tolerance = {figure} }}\n")
            }
            _ => format!("{line}\n"),
        }
    };
    fs::write(path, text.lines().map(line).collect::<String>()).unwrap();
    #[rustfmt::skip] // one section a line
    convert(path, &[
        ("[requirements]/rate = { nominal", rate), ("[requirements]/tolerance", rate), ("[requirements]/minimum", INCH), ("[requirements]/maximum", INCH),
        ("[[requirements.load]]/at_length", INCH), ("[[requirements.load]]/nominal", POUND), ("[[requirements.load]]/tolerance", POUND),
        ("[[spring]]/wire_diameter = { nominal", INCH), ("[[spring]]/outside_diameter = { nominal", INCH), ("[[spring]]/free_length = { nominal", INCH),
    ]);
}

/// The rig file in inch and lbf, its columns too; N to the load column's old unit.
fn rig_in_inches(path: &Path) -> f64 {
    #[rustfmt::skip] // one section a line
    convert(path, &[
        ("[export]/at_zero_gap", INCH), ("[force]/resolution", POUND), ("[force]/from", POUND), ("[force]/to", POUND),
        ("[travel]/resolution", INCH), ("[travel]/uncertainty", INCH), ("[travel]/set_at_length", INCH), ("[travel]/zeroed_at_load", POUND),
        ("[frame]/value", INCH / POUND), ("[frame]/uncertainty", INCH / POUND), ("[contact]/load", POUND),
    ]);
    let kilograms = fs::read_to_string(path).unwrap().contains("\"kgf\"");
    let (unit, newtons) = if kilograms {
        ("unit = \"kgf\"", 9.806_65)
    } else {
        ("unit = \"N\"", 1.0)
    };
    edit(
        path,
        &[(unit, "unit = \"lbf\""), ("unit = \"mm\"", "unit = \"in\"")],
    );
    newtons
}

/// Drawing, rig, lot, caliper and exports in inch and lbf.
fn in_inches(lot: &Lot) {
    drawing_in_inches(&lot.drawing());
    let newtons = rig_in_inches(&lot.rig());
    let lot_file = lot.place().join("lot.toml");
    let text = fs::read_to_string(&lot_file).unwrap();
    fs::write(&lot_file, format!("units = \"in-lbf\"\n{text}")).unwrap();
    convert(&lot_file, &[("[caliper]/uncertainty", INCH)]);
    let caliper = lot.place().join("caliper.csv");
    if caliper.exists() {
        let text = fs::read_to_string(&caliper).unwrap();
        let mut out = "spring,free_length\n,in\n".to_owned();
        for line in text.lines().skip(2) {
            let (id, length) = line.split_once(',').unwrap();
            writeln!(out, "{id},{}", number(length, INCH)).unwrap();
        }
        fs::write(&caliper, out).unwrap();
    }
    for spring in 1..=known::SPRINGS {
        rewrite(&lot.export(spring), |travel, load| {
            (travel / INCH, load * newtons / POUND)
        });
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 24, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn inch_and_pound_force_say_the_same(seed in any::<u32>(), number in 1_u64..=4) {
        let lot = Lot::new(u64::from(seed), number);
        let metric = lot.judge();
        in_inches(&lot);
        same("in inch and lbf", &metric, &lot.judge(), 1e-9);
    }

    #[test]
    fn loads_times_c_give_c_times_the_rate(seed in any::<u32>(), number in 1_u64..=4, c in 0.97..1.03_f64) {
        let lot = Lot::new(u64::from(seed), number);
        let value = |record: &AcceptRecord, spring: usize| {
            let all = &record.springs[spring].characteristics;
            all.iter().find(|one| one.name == "rate").unwrap().value.map(f64::from)
        };
        // The window goes with the loads, so that the same points are in it.
        edit(&lot.drawing(), &[("[rate_test]", "[rate_test]\nfull_load = 480.0")]);
        let before = lot.judge();
        for spring in 1..=known::SPRINGS {
            rewrite(&lot.export(spring), |travel, load| (travel, c * load));
        }
        edit(&lot.drawing(), &[("full_load = 480.0", &format!("full_load = {}", 480.0 * c))]);
        edit(&lot.rig(), &[("[contact]\nload = 1.0", &format!("[contact]\nload = {c}"))]);
        let compliance = fs::read_to_string(lot.rig()).unwrap();
        let compliance = compliance.split("value = ").nth(1).unwrap().split(',').next().unwrap();
        let stiffer = compliance.parse::<f64>().unwrap() / c;
        edit(&lot.rig(), &[
            (&format!("value = {compliance},"), &format!("value = {stiffer:e},")),
        ]);
        let text = fs::read_to_string(lot.rig()).unwrap();
        if text.contains("zeroed_at_load = 10.0") {
            edit(&lot.rig(), &[("zeroed_at_load = 10.0", &format!("zeroed_at_load = {}", 10.0 * c))]);
        }
        let after = lot.judge();
        let mut misses = Misses::default();
        for spring in 0..before.springs.len() {
            let (Some(got), Some(want)) = (value(&after, spring), value(&before, spring)) else {
                panic!("no rate");
            };
            misses.relative(&format!("spring {spring}"), got, c * want, 1e-9);
        }
        misses.none();
    }
}

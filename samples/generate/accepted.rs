//! Sample `accepted`: a good lot on a good bench, one file a spring, three cycles into solid.

use crate::Outcome;
use crate::bench::{Bench, Programme, run};
use crate::random::Random;
use crate::rigs::{FORCE_TRAVEL_FRAME, drawing, good_spring};
use crate::spring::Specimen;
use crate::text;
use std::io::Write;
use std::path::Path;

/// Lot of 150 at level II and AQL 2.5: letter F, 20 springs, accept on 1.
const SPRINGS: u64 = 20;

/// Writes the sample.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    text::file(&folder.join("lot.toml"), LOT)?;
    text::file(
        &folder.join("tg-204.toml"),
        drawing(REQUIREMENTS, ACCEPTANCE),
    )?;
    text::file(
        &folder.join("bench-1.toml"),
        format!("{RIG}\n{FORCE_TRAVEL_FRAME}\n{REPEATABILITY}"),
    )?;
    let mut findings = Vec::new();
    writeln!(
        findings,
        "spring,free_length,outside_diameter,inside_diameter,wire_diameter"
    )?;
    writeln!(findings, ",mm,mm,mm,mm")?;
    for id in 1..=SPRINGS {
        let mut random = Random::new(204, id);
        let mut specimen = good_spring(&mut random);
        specimen.set = random.between(0.03, 0.06);
        specimen.hysteresis = random.between(0.026, 0.034);
        if id <= 4 {
            let free = specimen.free() + specimen.set + random.normal(0.02);
            let outside = 36.02 + random.normal(0.04);
            writeln!(findings, "TG-{id:02},{free:.2},{outside:.2},,4.00")?;
        }
        let bytes = export(&specimen, &mut random)?;
        text::file(&folder.join(format!("springs/TG-{id:02}.csv")), bytes)?;
    }
    text::file(&folder.join("caliper.csv"), findings)?;
    Ok(())
}

/// One export: header with the units in it, then time, length and load.
fn export(specimen: &Specimen, random: &mut Random) -> std::io::Result<Vec<u8>> {
    let bench = Bench {
        force_scale: 0.0006,
        travel_scale: -0.0005,
        length_zero: 0.006,
        set_at_length: 70.0,
        compliance: 0.000_122,
        empty: 0.05 + random.normal(0.02),
        noise: 0.04,
        ..Bench::perfect()
    };
    let solid = specimen.members.iter().map(|m| m.solid).fold(0.0, f64::max);
    let programme = Programme {
        air: random.between(2.0, 2.6),
        bottom: solid - 0.10,
        cycles: 3,
        loading: 70,
        unloading: 32,
        dwell: 0,
        slow_below: solid + 0.25,
    };
    let mut out = Vec::new();
    writeln!(out, "Time [s],Length [mm],Load [N]")?;
    run(specimen, &bench, &programme, random, |reading| {
        text::number(&mut out, reading.time, 2, b'.');
        out.push(b',');
        text::number(&mut out, reading.travel, 3, b'.');
        out.push(b',');
        text::number(&mut out, reading.force, 2, b'.');
        out.push(b'\n');
    });
    Ok(out)
}

/// What the drawing requires, and its rate test.
pub(crate) const REQUIREMENTS: &str = r#"[requirements]
rate = { nominal = 10.6, tolerance = "5 %", class = "major" }
free_length = { nominal = 90.0, tolerance = 1.8, class = "minor" }
solid_length = { maximum = 38.4, class = "minor" }
hysteresis = { maximum = 8.0, class = "minor" }
set = { maximum = 0.3, class = "minor" }

[[requirements.load]]
at_length = 70.0
nominal = 212.0
tolerance = "8 %"
class = "major"

[[requirements.load]]
at_length = 52.0
nominal = 403.0
tolerance = "8 %"
class = "major"

[rate_test]
window = { from = "30 %", to = "70 %", of = "full load" }
stroke = "last loading"
method = "fit"
"#;

const ACCEPTANCE: &str = r#"[acceptance]
rule = "guarded"
guard = "t95"
undecided_springs = "report"
plan = { by = "attributes", level = "II", aql = 2.5 }
"#;

const RIG: &str = r#"# Invented bench. Reads the distance between its platens.
units = "mm-N"

[rig]
name = "Bench 1, goods-in"
check_every = "7 d"

[export]
header_line = 1
delimiter = ","
decimal = "."
load = { column = "Load [N]", unit = "N", pushing = "positive" }
travel = { column = "Length [mm]", unit = "mm", means = "length" }
time = { column = "Time [s]", unit = "s" }
spring = { from = "file name" }
"#;

pub(crate) const REPEATABILITY: &str = r#"[[repeatability]]
of = "rate"
standard_deviation = 0.006

[[repeatability]]
of = "load"
standard_deviation = 0.15

[[repeatability]]
of = "free_length"
standard_deviation = 0.03
"#;

/// The lot file.
pub(crate) const LOT: &str = r#"drawing = "tg-204.toml"
rig = "bench-1.toml"
exports = ["springs/*.csv"]
findings = "caliper.csv"

[lot]
number = "0417"
size = 150
supplier = "Marshlight Coil (invented supplier)"
received = 2026-11-16
inspector = "goods-in, first shift (invented)"
sample_drawn = "at random from 3 boxes of 50"
supplier_values = "rate 10.6 N/mm, mean of 5 springs"
note = "Invented sample: a good lot on a good bench"
tags = { wire_heat = "H-051" }

[conditions]
temperature = 20.5
presetting_strokes = 3
presetting_recorded = 0

[caliper]
free_length = { uncertainty = 0.04, k = 2 }
outside_diameter = { uncertainty = 0.03, k = 2 }
wire_diameter = { uncertainty = 0.01, k = 2 }
"#;

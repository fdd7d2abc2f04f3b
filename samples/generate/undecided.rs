//! Sample `undecided`: springs on a limit, measured on a coarse bench in inches and pounds.

use crate::Outcome;
use crate::bench::{Bench, Programme, run};
use crate::random::Random;
use crate::spring::{Member, Specimen, Wound};
use crate::text;
use std::path::Path;

/// Lot of 80 at level II and AQL 4.0: letter E, 13 springs, accept on 1.
const SPRINGS: u64 = 13;

/// Springs that carry, at 30 mm, about the upper limit of 90.615 N: id and true load in N.
const ON_THE_LIMIT: [(u64, f64); 4] = [(3, 90.3), (6, 90.9), (7, 90.65), (11, 90.5)];

/// The spring that was measured twice.
const REPEATED: u64 = 7;

/// One pound-force in N, exact by definition (0.45359237 · 9.80665).
const POUND: f64 = 4.448_221_615_260_5;

/// One inch in mm, exact.
const INCH: f64 = 25.4;

/// Writes the sample.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    text::file(&folder.join("lot.toml"), LOT)?;
    text::file(&folder.join("tg-118.toml"), DRAWING)?;
    text::file(&folder.join("bench-2.toml"), RIG)?;
    let mut all = HEAD.as_bytes().to_vec();
    for id in 1..=SPRINGS {
        let mut random = Random::new(118, id);
        let specimen = spring(id, &mut random);
        export(id, &specimen, &mut random, &mut all);
        if id == REPEATED {
            let mut again = HEAD.as_bytes().to_vec();
            export(id, &specimen, &mut random, &mut again);
            text::file(&folder.join("again/float-springs-7.txt"), again)?;
        }
    }
    text::file(&folder.join("float-springs.txt"), all)?;
    Ok(())
}

fn spring(id: u64, random: &mut Random) -> Specimen {
    let wound = Wound {
        wire: 1.6,
        coil: 12.8,
        active: 9.5,
        shear: 70_000.0,
    };
    let line = 60.0 + random.bounded(0.04, 0.08);
    let on_limit = ON_THE_LIMIT.iter().find(|(which, _)| *which == id);
    let rate = match on_limit {
        Some((_, load)) => load / (line - 30.0),
        None => wound.rate() * (1.0 + random.bounded(0.003, 0.006)),
    };
    Specimen::single(Member {
        rate,
        line,
        toe: random.between(1.3, 1.7),
        toe_start: random.between(0.55, 0.65),
        solid: 18.4,
    })
}

/// Appends one spring's rows.
fn export(id: u64, specimen: &Specimen, random: &mut Random, out: &mut Vec<u8>) {
    let bench = Bench {
        force_scale: 0.001,
        travel_scale: 0.0008,
        length_zero: -0.01,
        set_at_length: 1.5 * INCH,
        compliance: 0.000_07 * INCH / POUND,
        empty: 0.08 + random.normal(0.02),
        noise: 0.06,
        force_unit: POUND,
        travel_unit: INCH,
        ..Bench::perfect()
    };
    let programme = Programme {
        air: random.between(1.5, 2.5),
        bottom: 24.0,
        cycles: 1,
        loading: 110,
        unloading: 50,
        dwell: 2,
        slow_below: 0.0,
    };
    run(specimen, &bench, &programme, random, |reading| {
        text::number(out, id as f64, 0, b'.');
        out.push(b'\t');
        text::number(out, reading.travel, 4, b'.');
        out.push(b'\t');
        text::number(out, reading.force, 3, b'.');
        out.push(b'\n');
    });
}

const HEAD: &str = "Float valve springs, goods-in (invented)\nOperator\tday shift\n\
    Specimen\tHeight\tForce\n\tin\tlbf\n";

const DRAWING: &str = r#"# Invented drawing.
units = "mm-N"

[drawing]
number = "TG-118"
revision = "B"
title = "Float valve spring"
arrangement = "single"

[[spring]]
name = "float"
wire_diameter = { nominal = 1.60, tolerance = 0.02 }
mean_diameter = { nominal = 12.8, tolerance = 0.2 }
active_coils = { nominal = 9.5, tolerance = 0.25 }
total_coils = 11.5
ends = "closed ground"
free_length = { nominal = 60.0, tolerance = 1.2 }
shear_modulus = 70000
shear_modulus_source = "EN 10270-3 1.4310, as drawn"

[requirements]
rate = { nominal = 2.88, tolerance = "10 %", class = "minor" }

[[requirements.load]]
at_length = 45.0
nominal = 43.2
tolerance = "9 %"
class = "major"

[[requirements.load]]
at_length = 30.0
nominal = 86.3
tolerance = "5 %"
class = "major"

[rate_test]
window = { from = "30 %", to = "70 %", of = "full load" }
full_load = 100.0
stroke = "last loading"
method = "fit"

[acceptance]
rule = "guarded"
guard = "t95"
undecided_springs = "report"
plan = { by = "attributes", level = "II", aql = 4.0 }
"#;

const RIG: &str = r#"# Invented bench. In inches and pounds; the drawing it serves is in mm and N.
units = "in-lbf"

[rig]
name = "Bench 2, old hall"

[export]
header_line = 3
units_line = 4
delimiter = "\t"
decimal = "."
load = { column = "Force", unit = "lbf", pushing = "positive" }
travel = { column = "Height", unit = "in", means = "length" }
spring = { column = "Specimen" }

[force]
class = "2"
resolution = 0.001
range = { from = 0.5, to = 50.0 }
calibrated = { on = 2026-01-12, until = 2027-01-12 }

[travel]
class = "1"
resolution = 0.0001
zero = { uncertainty = 0.004, k = 2 }
set_at_length = 1.5
zeroed_at_load = 0.0
calibrated = { on = 2026-01-12, until = 2027-01-12 }

[frame]
compliance = { value = 0.00007, uncertainty = 0.000014, k = 2 }

[contact]
load = 0.1

[[repeatability]]
of = "load"
standard_deviation = 0.02
"#;

const LOT: &str = r#"drawing = "tg-118.toml"
rig = "bench-2.toml"
exports = ["float-springs.txt"]

[lot]
number = "0425"
size = 80
supplier = "Samphire & Sons Springs (invented supplier)"
received = 2026-11-23
inspector = "goods-in, first shift (invented)"
sample_drawn = "at random from one crate"
note = "Invented sample: four springs lie on the upper limit at 30 mm, within what the bench can tell"
tags = { wire_heat = "H-063" }

[conditions]
temperature = 19.0
presetting_strokes = 2
presetting_recorded = 0

[[repeat]]
spring = "7"
export = "again/float-springs-7.txt"
reason = "undecided at 30 mm"
"#;

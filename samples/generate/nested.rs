//! Sample `nested`: sets of two springs in one another, platen position, loads in kgf.

use crate::Outcome;
use crate::bench::{Bench, Programme, Travel, run};
use crate::random::Random;
use crate::spring::{Member, Specimen, Wound};
use crate::text;
use std::path::Path;

/// Sets in the lot; every one is inspected.
const SETS: u64 = 8;

/// One kilogram-force in N, exact by definition.
const KILOGRAM: f64 = 9.806_65;

/// Writes the sample.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    text::file(&folder.join("lot.toml"), LOT)?;
    text::file(&folder.join("tg-350.toml"), DRAWING)?;
    text::file(&folder.join("bench-3.toml"), RIG)?;
    for id in 1..=SETS {
        let mut random = Random::new(350, id);
        let specimen = set(&mut random);
        let bytes = export(&specimen, &mut random);
        text::file(&folder.join(format!("sets/set-{id}.csv")), bytes)?;
    }
    Ok(())
}

fn set(random: &mut Random) -> Specimen {
    let outer = Wound {
        wire: 5.0,
        coil: 45.0,
        active: 6.5,
        shear: 81_500.0,
    };
    let inner = Wound {
        wire: 4.0,
        coil: 33.0,
        active: 8.5,
        shear: 81_500.0,
    };
    let member = |wound: &Wound, solid: f64, random: &mut Random| Member {
        rate: wound.rate() * (1.0 + random.bounded(0.005, 0.012)),
        line: 99.8 + random.bounded(0.15, 0.3),
        toe: random.between(1.8, 2.2),
        toe_start: random.between(0.55, 0.65),
        solid,
    };
    Specimen {
        members: vec![member(&outer, 42.5, random), member(&inner, 42.0, random)],
        hysteresis: random.between(0.035, 0.045),
        set: 0.02,
    }
}

/// One export: a quoted header with commas in it; pushing reads negative.
fn export(specimen: &Specimen, random: &mut Random) -> Vec<u8> {
    let bench = Bench {
        travel: Travel::Position { at_zero_gap: 312.5 },
        force_scale: 0.0008,
        travel_scale: 0.0004,
        length_zero: 0.005,
        zeroed_at_load: 20.0,
        compliance: 0.000_081,
        empty: 0.3 + random.normal(0.05),
        noise: 0.12,
        force_unit: -KILOGRAM,
        ..Bench::perfect()
    };
    let programme = Programme {
        air: random.between(1.5, 2.5),
        bottom: 52.0,
        cycles: 2,
        loading: 90,
        unloading: 40,
        dwell: 0,
        slow_below: 0.0,
    };
    let mut out = b"\"Position, mm\",\"Load, kgf\"\n".to_vec();
    run(specimen, &bench, &programme, random, |reading| {
        text::number(&mut out, reading.travel, 3, b'.');
        out.push(b',');
        text::number(&mut out, reading.force, 3, b'.');
        out.push(b'\n');
    });
    out
}

const DRAWING: &str = r#"# Invented drawing.
units = "mm-N"

[drawing]
number = "TG-350"
revision = "A"
title = "Gate cushion, spring set"
arrangement = "nested"

[[spring]]
name = "outer"
wire_diameter = { nominal = 5.00, tolerance = 0.04 }
outside_diameter = { nominal = 50.0, tolerance = 0.5 }
active_coils = { nominal = 6.5, tolerance = 0.25 }
total_coils = 8.5
ends = "closed ground"
free_length = { nominal = 100.0, tolerance = 1.5 }
material = "EN 10270-1 SH"

[[spring]]
name = "inner"
wire_diameter = { nominal = 4.00, tolerance = 0.03 }
outside_diameter = { nominal = 37.0, tolerance = 0.4 }
active_coils = { nominal = 8.5, tolerance = 0.25 }
total_coils = 10.5
ends = "closed ground"
free_length = { nominal = 100.0, tolerance = 1.5 }
material = "EN 10270-1 SH"

[requirements]
rate = { nominal = 19.3, tolerance = "6 %" }
hysteresis = { maximum = 9.0 }

[[requirements.load]]
at_length = 80.0
nominal = 386.0
tolerance = 35.0

[[requirements.load]]
at_length = 60.0
nominal = 772.0
tolerance = "7 %"

[rate_test]
# Well below the lengths at which the second of the two springs touches and both seat.
window = { from = 82.0, to = 62.0, of = "length" }
stroke = "last loading"
method = "fit"

[acceptance]
rule = "guarded"
guard = "t95"
undecided_springs = "report"
plan = { by = "every-spring" }
"#;

const RIG: &str = r#"# Invented bench. Shows where its platen stands; pushing reads negative, in kgf.
units = "mm-N"

[rig]
name = "Bench 3, heavy"

[export]
header_line = 1
delimiter = ","
decimal = "."
quoted = true
load = { column = "Load, kgf", unit = "kgf", pushing = "negative" }
travel = { column = "Position, mm", unit = "mm", means = "platen position", at_zero_gap = 312.5 }
spring = { from = "file name" }

[force]
class = "0.5"
resolution = 0.01
range = { from = 20.0, to = 5000.0 }
calibrated = { on = 2026-07-06, until = 2027-07-06 }

[travel]
class = "0.5"
resolution = 0.001
zero = { uncertainty = 0.02, k = 2 }
zeroed_at_load = 20.0
calibrated = { on = 2026-07-06, until = 2027-07-06 }

[frame]
compliance = { value = 0.00008, uncertainty = 0.000008, k = 2 }

[contact]
load = 2.0
"#;

const LOT: &str = r#"drawing = "tg-350.toml"
rig = "bench-3.toml"
exports = ["sets/*.csv"]

[lot]
number = "0429"
size = 8
supplier = "Two Estuaries Spring Co-operative (invented supplier)"
received = 2026-11-26
inspector = "goods-in, first shift (invented)"
sample_drawn = "all eight"
note = "Invented sample: eight nested sets, every one measured"

[conditions]
temperature = 20.0
presetting_strokes = 3
presetting_recorded = 0
"#;

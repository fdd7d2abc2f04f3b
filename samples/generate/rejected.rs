//! Sample `rejected`: thin wire in part of the lot; a German bench that exports deflection.

use crate::Outcome;
use crate::bench::{Bench, Programme, Travel, run};
use crate::random::Random;
use crate::spring::{Member, Specimen, Wound};
use crate::text;
use std::io::Write;
use std::path::Path;

/// Lot of 240 at level II: letter G, 32 springs; AQL 1.5 accepts on 1, AQL 2.5 on 2.
const SPRINGS: u64 = 32;

/// Springs wound from wire of 2.40 instead of 2.50 mm.
const THIN: [u64; 6] = [4, 9, 15, 16, 23, 30];

/// Inside diameter in mm: the mandrel, the same for either wire.
const INSIDE: f64 = 20.0;

/// Writes the sample.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    text::file(&folder.join("lot.toml"), LOT)?;
    text::file(&folder.join("tg-231.toml"), DRAWING)?;
    text::file(&folder.join("bench-4.toml"), RIG)?;
    let mut findings = b"spring,free_length,wire_diameter\n,mm,mm\n".to_vec();
    for id in 1..=SPRINGS {
        let mut random = Random::new(231, id);
        let wire = if THIN.contains(&id) { 2.40 } else { 2.50 };
        let specimen = spring(wire, &mut random);
        let free = specimen.free() + random.normal(0.025);
        let wire = wire + random.bounded(0.004, 0.008);
        writeln!(findings, "{id},{free:.2},{wire:.3}")?;
        let bytes = export(id, &specimen, &mut random);
        text::file(&folder.join(format!("federn/{id}.csv")), bytes)?;
    }
    text::file(&folder.join("caliper.csv"), findings)?;
    Ok(())
}

fn spring(wire: f64, random: &mut Random) -> Specimen {
    let wound = Wound {
        wire,
        coil: INSIDE + wire,
        active: 8.5,
        shear: 81_500.0,
    };
    Specimen {
        // Lost in the presetting stroke that the export still holds.
        set: random.between(0.12, 0.18),
        hysteresis: random.between(0.03, 0.04),
        ..Specimen::single(Member {
            rate: wound.rate() * (1.0 + random.bounded(0.006, 0.012)),
            line: 84.75 + random.bounded(0.12, 0.25),
            toe: random.between(2.0, 2.4),
            toe_start: random.between(0.55, 0.65),
            solid: 10.5 * wire,
        })
    }
}

/// One export: five lines about the test, an empty one, header, units row, values with commas.
fn export(id: u64, specimen: &Specimen, random: &mut Random) -> Vec<u8> {
    let bench = Bench {
        travel: Travel::Deflection,
        force_scale: -0.001,
        travel_scale: 0.001,
        compliance: 0.000_29,
        empty: -0.12 + random.normal(0.03),
        noise: 0.03,
        ..Bench::perfect()
    };
    let programme = Programme {
        air: random.between(1.5, 3.0),
        bottom: 33.0,
        cycles: 2,
        loading: 84,
        unloading: 40,
        dwell: 3,
        slow_below: 0.0,
    };
    let mut out = text::latin(&format!(
        "Prüfprotokoll Druckfeder (erfunden)\r\nPrüfstand;Nr. 4, Wareneingang\r\n\
         Prüfling;{id}\r\nTemperatur;22,0 °C\r\nGeschwindigkeit;2 mm/s ± 0,1\r\n\r\n\
         Messpunkt;Federweg;Prüfkraft\r\n;mm;N\r\n"
    ));
    let mut point = 0.0;
    run(specimen, &bench, &programme, random, |reading| {
        point += 1.0;
        text::number(&mut out, point, 0, b',');
        out.push(b';');
        text::number(&mut out, reading.travel, 3, b',');
        out.push(b';');
        text::number(&mut out, reading.force, 2, b',');
        out.extend_from_slice(b"\r\n");
    });
    out
}

const DRAWING: &str = r#"# Invented drawing.
units = "mm-N"

[drawing]
number = "TG-231"
revision = "A"
title = "Latch spring, culvert grating"
arrangement = "single"

[[spring]]
name = "latch"
wire_diameter = { nominal = 2.50, tolerance = 0.03 }
inside_diameter = { nominal = 20.0, tolerance = 0.3 }
active_coils = { nominal = 8.5, tolerance = 0.25 }
total_coils = 10.5
ends = "closed ground"
free_length = { nominal = 85.0, tolerance = 1.5 }
material = "EN 10270-1 SH"

[requirements]
rate = { nominal = 4.11, tolerance = "6 %", class = "major" }
free_length = { nominal = 85.0, tolerance = 1.5, class = "minor" }
wire_diameter = { nominal = 2.50, plus = 0.03, minus = 0.03, class = "major" }

[[requirements.load]]
at_length = 65.0
nominal = 82.2
tolerance = "7 %"
class = "major"

[[requirements.load]]
at_length = 45.0
minimum = 152.9
maximum = 175.9
class = "major"

[rate_test]
window = { from = "30 %", to = "70 %", of = "deflection to Ln" }
stroke = "last loading"
method = "fit"

[acceptance]
rule = "guarded"
guard = "t95"
undecided_springs = "report"
plan = { by = "attributes", level = "II", aql = { major = 1.5, minor = 2.5 } }
"#;

const RIG: &str = r#"# Invented bench. Its travel counts from where the platen started, so it knows no length.
units = "mm-N"

[rig]
name = "Bench 4, goods-in annex"

[export]
header_line = 7
units_line = 8
delimiter = ";"
decimal = ","
encoding = "windows-1252"
load = { column = "Prüfkraft", unit = "N", pushing = "positive" }
travel = { column = "Federweg", unit = "mm", means = "deflection" }
spring = { from = "file name" }

[force]
class = "1"
resolution = 0.01
range = { from = 2.0, to = 500.0 }
calibrated = { on = 2026-05-11, until = 2027-05-11 }

[travel]
class = "1"
resolution = 0.001
calibrated = { on = 2026-05-11, until = 2027-05-11 }

[frame]
compliance = { value = 0.0003, uncertainty = 0.00003, k = 2 }

[contact]
load = 0.8
"#;

const LOT: &str = r#"drawing = "tg-231.toml"
rig = "bench-4.toml"
exports = ["federn/*.csv"]
findings = "caliper.csv"

[lot]
number = "0422"
size = 240
supplier = "Kelpwire Works (invented supplier)"
received = 2026-11-19
inspector = "goods-in, second shift (invented)"
sample_drawn = "at random from 6 trays of 40"
note = "Invented sample: six springs wound from wire one size thin"
tags = { wire_heat = "H-077" }

[conditions]
temperature = 22.0
presetting_strokes = 1
presetting_recorded = 1

[caliper]
free_length = { uncertainty = 0.05, k = 2 }
wire_diameter = { uncertainty = 0.01, k = 2 }

[[finding]]
spring = "12"
class = "minor"
text = "burr at one ground end"
"#;

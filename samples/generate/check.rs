//! Sample `check`: a bench checked on a certified reference spring, and its frame plate on plate.

use crate::Outcome;
use crate::bench::{Bench, Programme, run};
use crate::random::Random;
use crate::rigs::{EVERY_SPRING, FORCE_TRAVEL_FRAME, RATE_AND_LOADS, drawing};
use crate::spring::{Member, Specimen};
use crate::text;
use std::io::Write;
use std::path::Path;

/// Rate and length of the straight part of the reference spring as they truly are.
const RATE: f64 = 9.842;
const LINE: f64 = 84.31;

/// Writes the sample.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    text::file(&folder.join("check.toml"), CHECK)?;
    text::file(
        &folder.join("tg-204.toml"),
        drawing(RATE_AND_LOADS, EVERY_SPRING),
    )?;
    text::file(
        &folder.join("bench-5.toml"),
        format!("{RIG}\n{FORCE_TRAVEL_FRAME}"),
    )?;
    let mut random = Random::new(500, 1);
    for number in 1..=3 {
        let bytes = reference(&mut random)?;
        text::file(&folder.join(format!("reference/rs-3-{number}.csv")), bytes)?;
    }
    text::file(&folder.join("plates.csv"), plates(&mut random)?)?;
    Ok(())
}

fn bench(random: &mut Random) -> Bench {
    Bench {
        force_scale: 0.0008,
        travel_scale: -0.0006,
        length_zero: 0.006,
        set_at_length: 70.0,
        compliance: 0.000_122,
        empty: 0.05 + random.normal(0.02),
        noise: 0.04,
        ..Bench::perfect()
    }
}

/// One run of the reference spring, ground and seated well: its toe is short.
fn reference(random: &mut Random) -> std::io::Result<Vec<u8>> {
    let specimen = Specimen::single(Member {
        rate: RATE,
        line: LINE,
        toe: 0.30,
        toe_start: 0.7,
        solid: 30.0,
    });
    let programme = Programme {
        air: 2.2,
        bottom: 42.0,
        cycles: 2,
        loading: 120,
        unloading: 40,
        dwell: 0,
        slow_below: 0.0,
    };
    let mut out = Vec::new();
    writeln!(out, "Time [s],Length [mm],Load [N]")?;
    let bench = bench(random);
    run(&specimen, &bench, &programme, random, |reading| {
        row(&mut out, reading.time, reading.travel, reading.force);
    });
    Ok(out)
}

/// The platens on each other, twice up to 600 N: air, then steps of 5 N.
fn plates(random: &mut Random) -> std::io::Result<Vec<u8>> {
    let bench = bench(random);
    let mut out = Vec::new();
    writeln!(out, "Time [s],Length [mm],Load [N]")?;
    let mut time = 0.0;
    let mut read = |distance: f64, force: f64, random: &mut Random| {
        time += 0.1;
        let noise = random.normal(0.0004);
        let (travel, load) = bench.read(distance + noise, force, 0.0, random);
        row(&mut out, time, travel, load);
    };
    for _ in 0..2 {
        for step in (1..=10).rev() {
            read(0.1 * f64::from(step), 0.0, random);
        }
        for step in 0..=120 {
            read(0.0, 5.0 * f64::from(step), random);
        }
        for step in (1..=30).rev() {
            read(0.0, 20.0 * f64::from(step - 1), random);
        }
    }
    Ok(out)
}

fn row(out: &mut Vec<u8>, time: f64, travel: f64, force: f64) {
    text::number(out, time, 2, b'.');
    out.push(b',');
    text::number(out, travel, 3, b'.');
    out.push(b',');
    text::number(out, force, 2, b'.');
    out.push(b'\n');
}

const CHECK: &str = r#"# Invented check on an invented reference spring.
rig = "bench-5.toml"
exports = ["reference/*.csv"]          # the reference spring, measured now
plates = "plates.csv"                  # the platens on each other
drawings = ["tg-204.toml"]             # what is judged on this rig

[check]
on = 2026-11-30                        # the day it was measured
inspector = "second shift (invented)"
note = "Invented sample: a good bench"

[reference]
name = "RS-3"
certificate = "CC-0219 (invented)"
calibrated = { on = 2026-02-10, until = 2027-02-10 }
rate = { value = 9.842, uncertainty = 0.012, k = 2, from = 75.0, to = 50.0 }
free_length = { value = 84.35, uncertainty = 0.03, k = 2 }

[[reference.load]]
at_length = 70.0
value = 140.84
uncertainty = 0.30
k = 2

[[reference.load]]
at_length = 50.0
value = 337.68
uncertainty = 0.60
k = 2

[conditions]
temperature = 20.3
presetting_strokes = 3
"#;

const RIG: &str = r#"# Invented bench. Reads the distance between its platens.
units = "mm-N"

[rig]
name = "Bench 5"
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

//! Forty lots of one drawing and the checks of their bench, to be judged into an archive: the rate falls after a change of
//! wire heat, and the bench stays where it is.

use std::io::Write;
use std::path::Path;

use crate::Outcome;
use crate::accepted::REPEATABILITY;
use crate::bench::{Bench, Programme, run};
use crate::random::Random;
use crate::rigs::{FORCE_TRAVEL_FRAME, drawing, spring};
use crate::spring::{Member, Specimen};
use crate::text;

/// Lots, and the first of the new heat.
const LOTS: u64 = 40;
const NEW_HEAT: u64 = 26;
/// Springs of a lot: level S-3, lots of 80, letter C.
const SPRINGS: u64 = 5;
/// Checks of the bench.
const CHECKS: u64 = 40;
/// Days of the year before the first lot, 2026-03-09.
const FIRST: u64 = 68;

/// Writes a folder for each lot and each check, named by its day.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    let rig = format!("{RIG}\n{FORCE_TRAVEL_FRAME}\n{REPEATABILITY}");
    text::file(
        &folder.join("tg-204.toml"),
        drawing(REQUIREMENTS, ACCEPTANCE),
    )?;
    text::file(&folder.join("bench-6.toml"), rig)?;
    for lot in 1..=LOTS {
        let mut random = Random::new(0x10_7A, lot);
        let day = day(FIRST + 6 * (lot - 1));
        let place = folder.join(format!("lot-{day}"));
        let heat = if lot < NEW_HEAT { "H-051" } else { "H-063" };
        text::file(&place.join("lot.toml"), lot_file(lot, &day, heat))?;
        let fall = if lot < NEW_HEAT {
            0.0
        } else {
            0.008 + 0.0012 * (lot - NEW_HEAT) as f64
        };
        let level = random.normal(0.0015) - fall;
        for id in 1..=SPRINGS {
            let off = level + random.bounded(0.004, 0.010);
            let specimen = spring(off, 89.85 + random.bounded(0.12, 0.30), &mut random);
            let bytes = export(&specimen, &mut random)?;
            text::file(&place.join(format!("springs/{id}.csv")), bytes)?;
        }
    }
    for check in 1..=CHECKS {
        let mut random = Random::new(0x10_76, check);
        let day = day(FIRST + 6 * (check - 1));
        let place = folder.join(format!("check-{day}"));
        text::file(&place.join("check.toml"), CHECK.replace("DAY", &day))?;
        let reference = Specimen::single(Member {
            rate: 9.842,
            // Its line and toe give a free length of 84.355 mm, as certified within U.
            line: 84.31,
            toe: 0.30,
            toe_start: 0.7,
            solid: 30.0,
        });
        text::file(&place.join("rs-3.csv"), export(&reference, &mut random)?)?;
    }
    Ok(())
}

/// The date of a day of 2026, counted from 1.
fn day(of_year: u64) -> String {
    let mut rest = of_year;
    let months = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
    for (month, days) in (1..).zip(months) {
        if rest <= days {
            return format!("2026-{month:02}-{rest:02}");
        }
        rest -= days;
    }
    format!("2027-01-{rest:02}")
}

fn export(specimen: &Specimen, random: &mut Random) -> std::io::Result<Vec<u8>> {
    let bench = Bench {
        force_scale: 0.0006 + random.normal(0.0003),
        travel_scale: -0.0005,
        length_zero: 0.006,
        set_at_length: 70.0,
        compliance: 0.000_122,
        empty: 0.05,
        noise: 0.04,
        ..Bench::perfect()
    };
    let programme = Programme {
        air: 2.2,
        bottom: 46.0,
        cycles: 1,
        loading: 90,
        unloading: 12,
        dwell: 0,
        slow_below: 0.0,
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

fn lot_file(lot: u64, day: &str, heat: &str) -> String {
    format!(
        r#"drawing = "../tg-204.toml"
rig = "../bench-6.toml"
exports = ["springs/*.csv"]

[lot]
number = "{}"
size = 80
supplier = "Marshlight Coil (invented supplier)"
received = {day}
inspector = "goods-in (invented)"
sample_drawn = "at random from 2 boxes"
note = "Invented sample"
tags = {{ wire_heat = "{heat}" }}

[conditions]
temperature = 20.5
presetting_strokes = 3
"#,
        500 + lot
    )
}

const REQUIREMENTS: &str = r#"[requirements]
rate = { nominal = 10.6, tolerance = "5 %", class = "major" }

[[requirements.load]]
at_length = 70.0
nominal = 212.0
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
plan = { by = "attributes", level = "S-3", aql = 2.5 }
"#;

const RIG: &str = r#"# Invented bench. Reads the distance between its platens.
units = "mm-N"

[rig]
name = "Bench 6"
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

const CHECK: &str = r#"# Invented check on an invented reference spring.
rig = "../bench-6.toml"
exports = ["rs-3.csv"]
drawings = ["../tg-204.toml"]

[check]
on = DAY
inspector = "first shift (invented)"
note = "Invented sample"

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

//! Files for speed tests: one big file of many springs, or a lot of many files.

use crate::Outcome;
use crate::bench::{Bench, Programme, Reading, run};
use crate::random::Random;
use crate::rigs::{EVERY_SPRING, FORCE_TRAVEL_FRAME, RATE_AND_LOADS, drawing, good_spring};
use crate::text;
use std::fs::{self, File};
use std::io::{BufWriter, Write};
use std::path::Path;

/// Fewest rows an export can have: air, toe and a stroke each way.
const FEWEST_ROWS: u64 = 100;

/// Writes `file` with a specimen column, and a lot, a drawing and a rig file beside it.
///
/// # Errors
/// Too few rows, or what the file system says.
pub(crate) fn one_file(file: &Path, springs: u64, rows: u64) -> Outcome {
    let name = file
        .file_name()
        .and_then(|n| n.to_str())
        .ok_or("FILE has no readable name")?;
    let folder = file.parent().unwrap_or(Path::new(""));
    terms(folder, "{ column = \"Specimen\" }", name, springs)?;
    let mut out = BufWriter::with_capacity(1 << 20, File::create(file)?);
    out.write_all(b"Specimen,Time,Length,Load\n")?;
    let mut block = Vec::new();
    for id in 1..=springs {
        block.clear();
        let label = format!("S-{id:05},");
        spring(id, rows, |reading| {
            block.extend_from_slice(label.as_bytes());
            row(&mut block, reading);
        })?;
        out.write_all(&block)?;
    }
    out.flush()?;
    Ok(())
}

/// Writes a lot with one export a spring.
///
/// # Errors
/// Too few rows, or what the file system says.
pub(crate) fn many_files(folder: &Path, springs: u64, rows: u64) -> Outcome {
    terms(folder, "{ from = \"file name\" }", "springs/*.csv", springs)?;
    for id in 1..=springs {
        let mut out = b"Time,Length,Load\n".to_vec();
        spring(id, rows, |reading| row(&mut out, reading))?;
        text::file(&folder.join(format!("springs/S-{id:05}.csv")), out)?;
    }
    Ok(())
}

fn row(out: &mut Vec<u8>, reading: &Reading) {
    text::number(out, reading.time, 2, b'.');
    out.push(b',');
    text::number(out, reading.travel, 3, b'.');
    out.push(b',');
    text::number(out, reading.force, 2, b'.');
    out.push(b'\n');
}

/// One good spring through one cycle of exactly `rows` readings.
fn spring(id: u64, rows: u64, take: impl FnMut(&Reading)) -> Outcome {
    let rows = usize::try_from(rows)?;
    if rows < usize::try_from(FEWEST_ROWS)? {
        return Err(format!("--rows must be at least {FEWEST_ROWS}").into());
    }
    let mut random = Random::new(1000, id);
    let specimen = good_spring(&mut random);
    let bench = Bench {
        force_scale: 0.0006,
        travel_scale: -0.0005,
        length_zero: 0.006,
        set_at_length: 70.0,
        compliance: 0.000_122,
        empty: 0.05,
        noise: 0.04,
        ..Bench::perfect()
    };
    // 26 readings lie in the air and in the toe, going down and up; see `bench::strokes`.
    let main = rows - 26;
    let programme = Programme {
        air: random.between(2.0, 2.6),
        bottom: 45.0,
        cycles: 1,
        loading: main * 2 / 3,
        unloading: main - main * 2 / 3,
        dwell: 0,
        slow_below: 0.0,
    };
    run(&specimen, &bench, &programme, &mut random, take);
    Ok(())
}

/// The lot, drawing and rig files.
fn terms(folder: &Path, from: &str, exports: &str, size: u64) -> Outcome {
    fs::create_dir_all(if folder.as_os_str().is_empty() {
        Path::new(".")
    } else {
        folder
    })?;
    text::file(
        &folder.join("drawing.toml"),
        drawing(RATE_AND_LOADS, EVERY_SPRING),
    )?;
    text::file(
        &folder.join("rig.toml"),
        format!("{RIG}spring = {from}\n\n{FORCE_TRAVEL_FRAME}"),
    )?;
    let lot = format!(
        r#"drawing = "drawing.toml"
rig = "rig.toml"
exports = ["{exports}"]

[lot]
number = "0500"
size = {size}
supplier = "Marshlight Coil (invented supplier)"
received = 2026-11-30
note = "Invented sample: for speed tests, every spring is good"

[conditions]
temperature = 20.0
presetting_strokes = 3
"#
    );
    text::file(&folder.join("lot.toml"), lot)?;
    Ok(())
}

const RIG: &str = r#"# Invented bench.
units = "mm-N"

[rig]
name = "Bench 1, goods-in"

[export]
header_line = 1
delimiter = ","
decimal = "."
load = { column = "Load", unit = "N", pushing = "positive" }
travel = { column = "Length", unit = "mm", means = "length" }
time = { column = "Time", unit = "s" }
"#;

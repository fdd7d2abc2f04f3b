//! Finding lots in an archive of 5000 lots of 32 springs, against DuckDB over the same files.

use std::path::Path;
use std::process::{Command, Stdio};

use coilassay::archive::Archive;
use coilassay::job::{self, Keep, Options};
use jiff::ToSpan;

const LOTS: u32 = 5000;
const DRAWINGS: u32 = 20;

pub(crate) fn found_again(work: &Path) {
    let archive = work.join("archive");
    fill(&archive, DRAWINGS);
    let ours = || {
        let mut command = Command::new(env!("CARGO_BIN_EXE_coilassay"));
        command
            .arg("lots")
            .arg(&archive)
            .args(["--supplier", "nobody"]);
        command
    };
    let script = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/bench/same_search.py");
    let theirs = || {
        let mut command = Command::new("python3");
        command.arg(&script).arg(&archive);
        command
    };
    let there = Command::new("python3")
        .args(["-c", "import duckdb"])
        .stderr(Stdio::null())
        .status();
    if there.is_ok_and(|status| status.success()) {
        crate::compare(
            "5000 lots x 32 springs, all read for those of one supplier, against DuckDB",
            &ours,
            &theirs,
        );
    } else {
        crate::alone(
            "5000 lots: no python3 with duckdb here, so no baseline",
            &ours,
        );
    }
}

/// 5000 lots of 32 springs of one drawing, from the archive to the finished report.
pub(crate) fn tracked(work: &Path) {
    let archive = work.join("one-drawing");
    fill(&archive, 1);
    let ours = || {
        let mut command = Command::new(env!("CARGO_BIN_EXE_coilassay"));
        command
            .arg("track")
            .arg(&archive)
            .arg("--out")
            .arg(work.join("tracked"));
        command
    };
    crate::alone(
        "5000 lots x 32 springs tracked, to HTML, PDF and JSON",
        &ours,
    );
}

/// One judged sample of 32 springs, kept as 5000 lots of 20 drawings. Its curves are left out: no search reads them.
///
/// Each lot's values are moved by a share of its own, or nothing could be charted.
fn fill(dir: &Path, drawings: u32) {
    let lot = Path::new(env!("CARGO_MANIFEST_DIR")).join("samples/rejected/lot.toml");
    let options = Options {
        date: jiff::civil::date(2026, 11, 30),
        units_confirmed: false,
        strict: false,
        keep: Keep::default(),
        memory: coilassay::job::Memory::Nothing,
        past: None,
        block_bytes: None,
        flags: Vec::new(),
    };
    let mut record = job::accept(&lot, "lot.toml", &options).unwrap().record;
    let springs = record.springs.clone();
    let archive = Archive::open_or_begin(dir).unwrap();
    let mut judged_at: jiff::Timestamp = "2020-01-01T00:00:00Z".parse().unwrap();
    let begun = std::time::Instant::now();
    for number in 0..LOTS {
        record.lot.number = format!("{number:04}");
        record.drawing.number = format!("BN-{}", number % drawings);
        let moved = f64::from(number.wrapping_mul(2_654_435_761) >> 16) / 65_536.0; // 0 to 1, well mixed
        record.springs.clone_from(&springs);
        for of in record
            .springs
            .iter_mut()
            .flat_map(|one| &mut one.characteristics)
        {
            let value = of.value.map(|value| value.get() * (1.0 + 0.01 * moved));
            of.value = value.and_then(|value| value.try_into().ok());
        }
        judged_at += 10.hours();
        archive.keep(&record, &[], judged_at).unwrap();
    }
    let each = begun.elapsed().as_secs_f64() / f64::from(LOTS);
    println!(
        "a run without curves is written and flushed in {:.1} ms (mean of {LOTS})",
        1000.0 * each
    );
}

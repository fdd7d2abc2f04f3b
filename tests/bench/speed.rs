//! Whole-process speed, as ratios against a baseline measured in the same run, pair by pair.
//!
//! `cargo bench --locked` prints medians; nothing here asserts a time. Cases: 50 exports to the full report, against a
//! script for pandas, scipy and matplotlib that does the same fits, plots and table; one file of 10 000 springs to
//! `result.json` and `springs.csv`, against polars alone reading the same file; lots found in an archive, against DuckDB.
//! `cargo bench --locked -- archive` runs that case only; the others are `fifty`, `large`, `small` and `tenfold`.
#![expect(
    clippy::print_stdout,
    clippy::unwrap_used,
    clippy::expect_used,
    reason = "a bench prints, and stops at the first surprise"
)]

mod archive;

use std::path::Path;
use std::process::{Command, Stdio};
use std::time::Instant;

use polars::prelude::{CsvReadOptions, SerReader};

const PAIRS: usize = 7;

fn main() {
    let words: Vec<String> = std::env::args().collect();
    if let [_, task, file] = words.as_slice()
        && task == "polars"
    {
        return polars_alone(Path::new(file));
    }
    let work = tempfile::tempdir().unwrap();
    let cases: [(&str, fn(&Path)); 5] = [
        ("fifty", fifty_exports),
        ("large", one_large_file),
        ("small", thousand_small),
        ("tenfold", ten_times_larger),
        ("archive", archive::found_again),
    ];
    // Cargo adds `--bench`; any other word is the name of a case.
    let named: Vec<&String> = words
        .iter()
        .skip(1)
        .filter(|word| !word.starts_with("--"))
        .collect();
    for (name, case) in cases {
        if named.is_empty() || named.iter().any(|one| *one == name) {
            case(work.path());
        }
    }
}

/// The baseline: the whole file read by polars with its own inference.
fn polars_alone(file: &Path) {
    let frame = CsvReadOptions::default()
        .try_into_reader_with_file_path(Some(file.to_owned()))
        .unwrap()
        .finish()
        .unwrap();
    println!("{} rows", frame.height());
}

fn samples(words: &[&str]) {
    let cargo = std::env::var_os("CARGO").expect("run by cargo bench");
    let made = Command::new(cargo)
        .args([
            "run",
            "--release",
            "--locked",
            "--quiet",
            "--example",
            "samples",
            "--",
        ])
        .args(words)
        .status();
    assert!(made.unwrap().success());
}

/// The command that judges `lot` into a folder that is not there yet.
fn accept(lot: &Path, out: &Path, more: &[&str]) -> Command {
    if out.exists() {
        std::fs::remove_dir_all(out).unwrap();
    }
    let mut command = Command::new(env!("CARGO_BIN_EXE_coilassay"));
    command
        .arg("accept")
        .arg(lot)
        .arg("--out")
        .arg(out)
        .args(more)
        .arg("--quiet");
    command
}

fn fifty_exports(work: &Path) {
    let lot = work.join("many");
    samples(&[
        "many",
        &lot.to_string_lossy(),
        "--springs",
        "50",
        "--rows",
        "2000",
    ]);
    let ours = || accept(&lot.join("lot.toml"), &work.join("report"), &[]);
    let script = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/bench/same_job.py");
    let theirs = || {
        let mut command = Command::new("python3");
        command.arg(&script).arg(&lot).arg(work.join("script"));
        command
    };
    let there = Command::new("python3")
        .args(["-c", "import pandas, scipy, matplotlib"])
        .stderr(Stdio::null())
        .status();
    if there.is_ok_and(|status| status.success()) {
        compare(
            "50 exports x 2000 rows, HTML + PDF + JSON, against pandas + scipy + matplotlib",
            &ours,
            &theirs,
        );
    } else {
        alone(
            "50 exports: no python3 with pandas, scipy and matplotlib here, so no baseline",
            &ours,
        );
    }
}

fn one_large_file(work: &Path) {
    let file = work.join("large").join("big.csv");
    std::fs::create_dir_all(work.join("large")).unwrap();
    samples(&[
        "large",
        &file.to_string_lossy(),
        "--springs",
        "10000",
        "--rows",
        "1000",
    ]);
    let ours = || {
        accept(
            &work.join("large/lot.toml"),
            &work.join("result"),
            &["--no-report"],
        )
    };
    let polars = || {
        let mut command = Command::new(std::env::current_exe().unwrap());
        command.arg("polars").arg(&file);
        command
    };
    compare(
        "10 000 springs x 1000 rows in one file, result.json + springs.csv, against polars alone",
        &ours,
        &polars,
    );
}

fn alone(name: &str, ours: &dyn Fn() -> Command) {
    let seconds: Vec<f64> = (0..PAIRS).map(|_| seconds(&mut ours()).0).collect();
    println!("{name}");
    println!("  ours {:.3} s (median of {PAIRS})", median(seconds));
}

/// 1000 exports of 100 rows: what reading and judging each costs beyond the bytes, on top of a lot of one.
fn thousand_small(work: &Path) {
    let lot = work.join("thousand");
    let place = lot.to_string_lossy();
    samples(&["many", &place, "--springs", "1000", "--rows", "100"]);
    let judged = || {
        accept(
            &lot.join("lot.toml"),
            &work.join("result"),
            &["--no-report"],
        )
    };
    let mut direct = Vec::new();
    for _ in 0..PAIRS {
        direct.push(reading_alone(&lot));
    }
    let whole: Vec<f64> = (0..PAIRS).map(|_| seconds(&mut judged()).0).collect();
    println!("1000 exports x 100 rows");
    println!(
        "  reading alone {:.3} ms each beyond reading the bytes, the whole run {:.3} s (medians of {PAIRS})",
        median(direct),
        median(whole)
    );
}

/// Milliseconds per export that the reader takes beyond reading the bytes of the files.
fn reading_alone(lot: &Path) -> f64 {
    let rig = std::fs::read_dir(lot)
        .unwrap()
        .map(|entry| entry.unwrap().path());
    let rig = rig
        .into_iter()
        .find(|path| path.ends_with("rig.toml"))
        .unwrap();
    let rig = coilassay::rig::open(&rig, "rig").unwrap();
    let exports: Vec<_> = std::fs::read_dir(lot.join("springs"))
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .collect();
    let start = Instant::now();
    let bytes: usize = exports
        .iter()
        .map(|path| std::fs::read(path).unwrap().len())
        .sum();
    let plain = start.elapsed().as_secs_f64();
    let start = Instant::now();
    let mut rows = 0;
    for path in &exports {
        let mut each = |some: Vec<coilassay::export::RawCurve>| {
            rows += some.iter().map(|one| one.load.len()).sum::<usize>();
        };
        coilassay::export::read(
            path,
            "x.csv",
            &rig.dialect,
            coilassay::export::BLOCK_BYTES,
            &mut each,
        )
        .unwrap();
    }
    assert!(bytes > 0 && rows > 0);
    1e3 * (start.elapsed().as_secs_f64() - plain) / exports.len() as f64
}

/// The same 10 000 springs with ten times the rows: 2.8 GB by the same road.
fn ten_times_larger(work: &Path) {
    let folder = work.join("huge");
    std::fs::create_dir_all(&folder).unwrap();
    let file = folder.join("big.csv");
    samples(&[
        "large",
        &file.to_string_lossy(),
        "--springs",
        "10000",
        "--rows",
        "10000",
    ]);
    let run = |lot: &str| {
        seconds(&mut accept(
            &work.join(lot),
            &work.join("result"),
            &["--no-report"],
        ))
    };
    run("large/lot.toml");
    let small: Vec<f64> = (0..3).map(|_| run("large/lot.toml").0).collect();
    let (huge, memory): (Vec<f64>, Vec<u64>) = (0..3).map(|_| run("huge/lot.toml")).unzip();
    let size = std::fs::metadata(&file).unwrap().len();
    println!(
        "10 000 springs x 10 000 rows in one file, {} MB",
        size / 1_000_000
    );
    println!(
        "  {:.2} s, {:.2} times the file of 1000 rows each; peak memory {} MB (medians of 3)",
        median(huge.clone()),
        median(huge) / median(small),
        memory.iter().max().unwrap() / 1024
    );
    std::fs::remove_file(&file).unwrap();
}

fn compare(name: &str, ours: &dyn Fn() -> Command, baseline: &dyn Fn() -> Command) {
    seconds(&mut ours());
    seconds(&mut baseline());
    let (mut a, mut b, mut ratios, mut memory) = (Vec::new(), Vec::new(), Vec::new(), 0);
    for _ in 0..PAIRS {
        let (mine, kilobytes) = seconds(&mut ours());
        let (theirs, _) = seconds(&mut baseline());
        ratios.push(mine / theirs);
        a.push(mine);
        b.push(theirs);
        memory = memory.max(kilobytes);
    }
    println!("{name}");
    println!(
        "  ours {:.3} s, baseline {:.3} s, ours/baseline {:.3}; peak memory of ours {} MB (medians of {PAIRS} pairs)",
        median(a),
        median(b),
        median(ratios),
        memory / 1024
    );
}

/// Wall seconds of one run, and its peak memory in KB where `/usr/bin/time` is there (else 0).
fn seconds(command: &mut Command) -> (f64, u64) {
    let time = Path::new("/usr/bin/time");
    let mut run = if time.exists() {
        let mut timed = Command::new(time);
        timed
            .args(["-f", "%M"])
            .arg(command.get_program())
            .args(command.get_args());
        timed
    } else {
        std::mem::replace(command, Command::new("true"))
    };
    let start = Instant::now();
    let output = run
        .stdout(Stdio::null())
        .stderr(Stdio::piped())
        .output()
        .unwrap();
    let seconds = start.elapsed().as_secs_f64();
    let said = String::from_utf8_lossy(&output.stderr);
    (
        seconds,
        said.lines()
            .last()
            .and_then(|line| line.trim().parse().ok())
            .unwrap_or(0),
    )
}

fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    values.get(values.len() / 2).copied().unwrap_or(f64::NAN)
}

//! The archive: what is kept, that it is whole, that other engines read it, and that results can be recomputed from it.

mod engines;
mod interrupted;
mod lots;
mod memory;
mod recheck;
mod recheck_theory;
mod spoilt;

use std::fs;
use std::io::Write;
use std::path::{Path, PathBuf};

use coilassay::archive::{Archive, LotRun, Unreadable};
use sha2::{Digest, Sha256};

use crate::bad_input::{Case, Ran};

/// A run of `accept` on the case's lot into `archive` beside it, on a date that orders nothing.
pub(crate) fn keep(case: &Case) -> Ran {
    case.run(&["--archive", "archive", "--date", "2026-12-05"])
}

pub(crate) fn root(case: &Case) -> PathBuf {
    case.path("../archive")
}

/// The files of one tree below the archive's folder, sorted.
pub(crate) fn files(archive: &Path, tree: &str) -> Vec<PathBuf> {
    let pattern = archive.join(tree).join("*/*/*");
    let mut found: Vec<PathBuf> = glob::glob(&pattern.to_string_lossy())
        .unwrap()
        .map(Result::unwrap)
        .collect();
    found.sort();
    found
}

/// A command of the tool in the case's folder.
pub(crate) fn tool(case: &Case, words: &[&str]) -> Ran {
    let output = assert_cmd::Command::cargo_bin("coilassay")
        .unwrap()
        .current_dir(case.dir.path())
        .args(words)
        .output()
        .unwrap();
    Ran {
        code: output.status.code(),
        out: output.stdout,
        err: String::from_utf8(output.stderr).unwrap(),
    }
}

/// What an archive holds.
pub(crate) struct Read {
    pub(crate) runs: Vec<LotRun>,
    pub(crate) unreadable: Vec<Unreadable>,
}

pub(crate) fn read(archive: &Path) -> Read {
    let found = Archive::open(archive).unwrap().runs(None).unwrap();
    let (runs, unreadable) = found.passed_over();
    Read { runs, unreadable }
}

/// Writes the checksums of the run whose record is `record` anew, as the files are now.
pub(crate) fn sum_anew(archive: &Path, record: &Path) {
    let sums = record.with_extension("sha256");
    let line = |line: &str| {
        let file = line.split_once("  ").unwrap().1;
        let digest = Sha256::digest(fs::read(archive.join(file)).unwrap());
        let hex: Vec<String> = digest.iter().map(|byte| format!("{byte:02x}")).collect();
        format!("{}  {file}\n", hex.concat())
    };
    let lines: String = fs::read_to_string(&sums)
        .unwrap()
        .lines()
        .map(line)
        .collect();
    fs::write(sums, lines).unwrap();
}

/// Says aloud that a test did nothing, and why.
pub(crate) fn skipped(why: &str) {
    std::io::stderr()
        .write_all(format!("skipped: {why}\n").as_bytes())
        .unwrap();
}

pub(crate) fn text(ran: &Ran) -> String {
    String::from_utf8(ran.out.clone()).unwrap()
}

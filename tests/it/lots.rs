//! Small generated lots whose files a test rewrites before it has them judged, and the comparison of two records.

use std::fmt::Write;
use std::fs;
use std::path::{Path, PathBuf};

use coilassay::job::{Options, accept};
use coilassay::record::{AcceptRecord, CharacteristicResult};
use tempfile::TempDir;

use crate::known;
use crate::published::Misses;

/// A lot in a folder of its own; its files may be rewritten.
pub(crate) struct Lot {
    folder: TempDir,
    number: u64,
}

impl Lot {
    /// Lot `number`, 1 to 4, one for each bench, of the generator's stream `seed`.
    pub(crate) fn new(seed: u64, number: u64) -> Self {
        let folder = tempfile::tempdir().unwrap();
        known::write(folder.path(), number, seed).unwrap();
        Self { folder, number }
    }

    pub(crate) fn place(&self) -> PathBuf {
        self.folder.path().join(format!("lot-{:05}", self.number))
    }

    pub(crate) fn rig(&self) -> PathBuf {
        let setting = (self.number - 1) % 4;
        self.folder.path().join(format!("rig-{setting}.toml"))
    }

    pub(crate) fn drawing(&self) -> PathBuf {
        self.folder.path().join("drawing.toml")
    }

    pub(crate) fn export(&self, spring: u64) -> PathBuf {
        self.place().join(format!("springs/{spring}.csv"))
    }

    pub(crate) fn judge(&self) -> AcceptRecord {
        self.judge_in_blocks(None)
    }

    pub(crate) fn judge_in_blocks(&self, block_bytes: Option<usize>) -> AcceptRecord {
        let options = Options {
            date: jiff::civil::date(2026, 12, 1),
            units_confirmed: false,
            strict: false,
            keep: coilassay::job::Keep::default(),
            block_bytes,
            flags: Vec::new(),
            memory: coilassay::job::Memory::Nothing,
            past: None,
        };
        accept(&self.place().join("lot.toml"), "lot.toml", &options)
            .unwrap()
            .record
    }
}

/// Replaces in a file; what is to be replaced must be there.
pub(crate) fn edit(path: &Path, changes: &[(&str, &str)]) {
    let mut text = fs::read_to_string(path).unwrap();
    for (from, to) in changes {
        assert!(text.contains(from), "{from} is not in {}", path.display());
        text = text.replace(from, to);
    }
    fs::write(path, text).unwrap();
}

/// The cells of an export, changed; written so that no digit is lost.
pub(crate) fn rewrite(path: &Path, change: impl Fn(f64, f64) -> (f64, f64)) {
    let text = fs::read_to_string(path).unwrap();
    let mut lines = text.lines();
    let mut out = format!("{}\n", lines.next().unwrap());
    for line in lines {
        let (travel, load) = line.split_once(',').unwrap();
        let (travel, load) = change(travel.parse().unwrap(), load.parse().unwrap());
        writeln!(out, "{travel:e},{load:e}").unwrap();
    }
    fs::write(path, out).unwrap();
}

/// The figures of a characteristic, with their names.
pub(crate) fn figures(of: &CharacteristicResult) -> Vec<(&'static str, Option<f64>)> {
    let figures = [
        ("value", of.value),
        ("u", of.standard_uncertainty),
        ("own u", of.own_uncertainty),
        ("common u", of.common_uncertainty),
        ("U", of.expanded_uncertainty),
        ("k", of.coverage_factor),
        ("ν", of.degrees_of_freedom),
        ("lower", of.lower),
        ("upper", of.upper),
        ("accept lower", of.accept_lower),
        ("accept upper", of.accept_upper),
        ("reject lower", of.reject_lower),
        ("reject upper", of.reject_upper),
        ("P", of.conformance_probability),
    ];
    figures
        .into_iter()
        .map(|(name, figure)| (name, figure.map(f64::from)))
        .collect()
}

/// Fails where verdicts differ, or figures by more than the share `within`.
pub(crate) fn same(name: &str, a: &AcceptRecord, b: &AcceptRecord, within: f64) {
    let mut misses = Misses::default();
    assert_eq!(a.decision, b.decision, "{name}");
    assert_eq!(a.springs.len(), b.springs.len(), "{name}");
    for (a, b) in a.springs.iter().zip(&b.springs) {
        assert_eq!(a.verdict, b.verdict, "{name}, spring {}", a.id);
        for (x, y) in a.characteristics.iter().zip(&b.characteristics) {
            assert_eq!(x.name, y.name, "{name}, spring {}", a.id);
            assert_eq!(x.verdict, y.verdict, "{name}, spring {}, {}", a.id, x.name);
            for ((figure, got), (_, want)) in figures(y).into_iter().zip(figures(x)) {
                let what = format!("{name}, spring {}, {} {figure}", a.id, x.name);
                match (got, want) {
                    (Some(got), Some(want)) => misses.relative(&what, got, want, within),
                    _ => assert_eq!(got.is_none(), want.is_none(), "{what}"),
                }
            }
        }
    }
    misses.none();
}

//! What the tests against published values share: fixtures as columns, and a list of every miss.

use std::fs;
use std::path::Path;

/// The data lines of a fixture under `tests/data`, cells split at commas; `#` lines and the header left out.
pub(crate) fn rows(name: &str) -> Vec<Vec<String>> {
    let path = Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("tests/data")
        .join(name);
    let text = fs::read_to_string(&path).unwrap();
    let lines = text.lines().filter(|line| !line.starts_with('#')).skip(1);
    lines
        .map(|line| line.split(',').map(str::to_owned).collect())
        .collect()
}

/// One column of numbers of a fixture.
pub(crate) fn column(name: &str, index: usize) -> Vec<f64> {
    let rows = rows(name);
    rows.iter().map(|row| row[index].parse().unwrap()).collect()
}

/// Collects what missed its published value.
#[derive(Default)]
pub(crate) struct Misses(Vec<String>);

impl Misses {
    /// Within a share of the wanted value; NaN is a miss.
    pub(crate) fn relative(&mut self, source: &str, got: f64, want: f64, within: f64) {
        self.absolute(source, got, want, within * want.abs());
    }

    /// Within half a unit of the last printed digit, say; NaN is a miss.
    pub(crate) fn absolute(&mut self, source: &str, got: f64, want: f64, within: f64) {
        let off = (got - want).abs();
        if off.is_nan() || off > within {
            self.0
                .push(format!("{source}: got {got}, want {want}, off by {off:e}"));
        }
    }

    /// Fails with every miss.
    pub(crate) fn none(self) {
        assert!(self.0.is_empty(), "{:#?}", self.0);
    }
}

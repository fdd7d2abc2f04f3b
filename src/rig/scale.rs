//! What a rig file knows of a scale: accuracy, resolution, range, calibration.

use jiff::civil::Date;

use crate::text::Table;

/// What is known of a scale's error.
#[derive(Clone, Debug, PartialEq)]
pub enum Accuracy {
    /// A class of ISO 7500-1 or ISO 9513: the relative error is within ± `half_width`.
    Class {
        /// The class as written.
        class: String,
        /// Relative half-width.
        half_width: f64,
    },
    /// A calibration certificate.
    Certificate {
        /// Relative standard uncertainty, U/k.
        standard: f64,
        /// Found relative error, not corrected.
        error: f64,
        /// Relative half-width of the drift since.
        drift: f64,
    },
    /// Declared negligible by whoever wrote the rig file; the report repeats it.
    DeclaredNegligible,
}

/// A figure that is stated, or declared negligible.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Known {
    /// Stated.
    Stated(f64),
    /// Declared negligible; the report repeats it.
    DeclaredNegligible,
}

impl Known {
    /// The figure; 0 where it was declared negligible.
    pub const fn get(self) -> f64 {
        match self {
            Self::Stated(figure) => figure,
            Self::DeclaredNegligible => 0.0,
        }
    }
}

/// A scale: its accuracy, resolution and calibration.
#[derive(Clone, Debug, PartialEq)]
pub struct Scale {
    /// Accuracy.
    pub accuracy: Accuracy,
    /// Resolution in N or mm.
    pub resolution: Known,
    /// Usable range in N or mm.
    pub range: Option<(f64, f64)>,
    /// Calibrated on, and until.
    pub calibrated: Option<(Date, Date)>,
}

impl Scale {
    /// The smallest load a force scale is good for, N: the start of its stated range, and at least the load at which one
    /// step is as large a share as the class allows, half of its indication error (ISO 7500-1:2018 table 2, from memory:
    /// 0.25 % at class 0.5, 0.5 % at class 1). `None` where neither is known.
    pub fn usable_from(&self) -> Option<f64> {
        let by_class = match (&self.accuracy, self.resolution) {
            (Accuracy::Class { half_width, .. }, Known::Stated(step)) => {
                Some(step / (half_width / 2.0))
            }
            _ => None,
        };
        let stated = self.range.map(|(from, _)| from);
        match (stated, by_class) {
            (Some(stated), Some(by_class)) => Some(f64::max(stated, by_class)),
            (one, other) => one.or(other),
        }
    }
}

/// Relative half-width of the indication error by class, ISO 7500-1:2018 table 2 (from memory).
pub(super) const FORCE_CLASSES: [(&str, f64); 4] =
    [("0.5", 0.005), ("1", 0.01), ("2", 0.02), ("3", 0.03)];

/// Relative half-width of the displacement error by class, ISO 9513 (0.5 published, 1 and 2 from memory).
pub(super) const TRAVEL_CLASSES: [(&str, f64); 3] = [("0.5", 0.005), ("1", 0.01), ("2", 0.02)];

pub(super) fn read_scale(table: Table<'_>, classes: &[(&str, f64)], unit: f64) -> Option<Scale> {
    let accuracy = read_accuracy(table, classes);
    let resolution = read_known(
        table,
        "resolution",
        unit,
        "write resolution = 0.01, or { unknown = \"declared negligible\" }",
    );
    let range = if table.has("range") {
        read_range(table.table("range"), unit)
    } else {
        None
    };
    let calibrated = read_calibrated(table.table("calibrated"));
    Some(Scale {
        accuracy: accuracy?,
        resolution: resolution?,
        range,
        calibrated,
    })
}

/// The dates of a calibration; `None` where none are stated, or where a fault was noted.
pub fn read_calibrated(dates: Table<'_>) -> Option<(Date, Date)> {
    match (dates.date("on"), dates.date("until")) {
        (Some(on), Some(until)) if on.value < until.value => Some((on.value, until.value)),
        (None, None) if !dates.is_present() => None,
        _ => {
            dates.fault(
                &dates.span(),
                "the calibration does not run from an earlier to a later date",
                "write calibrated = { on = 2026-03-02, until = 2027-03-02 }",
            );
            None
        }
    }
}

fn read_range(range: Table<'_>, unit: f64) -> Option<(f64, f64)> {
    match (range.not_negative("from"), range.positive("to")) {
        (Some(from), Some(to)) if from.value < to.value => {
            Some((from.value * unit, to.value * unit))
        }
        _ => {
            let what = "the range does not run from a smaller to a larger figure";
            range.fault(
                &range.span(),
                what,
                "write range = { from = 4.0, to = 200.0 }",
            );
            None
        }
    }
}

fn read_accuracy(table: Table<'_>, classes: &[(&str, f64)]) -> Option<Accuracy> {
    let help = "write exactly one of class = \"1\", certificate = { relative = \"0.4 %\", k = 2 }, unknown = \"declared negligible\"";
    let given = ["class", "certificate", "unknown"]
        .iter()
        .filter(|key| table.has(key))
        .count();
    if given != 1 {
        table.fault(
            &table.span(),
            "the scale's accuracy is stated in no way or in two ways",
            help,
        );
        return None;
    }
    if table.has("unknown") {
        return declared_negligible(table).then_some(Accuracy::DeclaredNegligible);
    }
    if table.has("class") {
        let half_width = table.word("class", classes)?;
        return Some(Accuracy::Class {
            class: table.text("class")?,
            half_width,
        });
    }
    let certificate = table.table("certificate");
    for key in ["relative", "k"] {
        if !certificate.has(key) {
            certificate.missing(key, help);
        }
    }
    let share = |key| certificate.share(key).map_or(0.0, |share| share.value);
    let relative = certificate.share("relative")?;
    if relative.value <= 0.0 {
        let what = "a certificate without any uncertainty is none";
        certificate.fault(
            &relative.span,
            what,
            "write its relative expanded uncertainty, or unknown = \"declared negligible\"",
        );
        return None;
    }
    Some(Accuracy::Certificate {
        standard: relative.value / certificate.positive("k")?.value,
        error: share("error"),
        drift: share("drift"),
    })
}

pub(super) fn declared_negligible(table: Table<'_>) -> bool {
    if !table.has("unknown") {
        table.missing(
            "unknown",
            "write the figure itself, or { unknown = \"declared negligible\" }",
        );
    }
    table
        .word("unknown", &[("declared negligible", ())])
        .is_some()
}

/// A figure under `key`, in the file's unit, or `{ unknown = "declared negligible" }`.
fn read_known(table: Table<'_>, key: &str, unit: f64, help: &str) -> Option<Known> {
    if !table.has(key) {
        table.missing(key, help);
        return None;
    }
    if table.is_table(key) {
        return declared_negligible(table.table(key)).then_some(Known::DeclaredNegligible);
    }
    table
        .positive(key)
        .map(|number| Known::Stated(number.value * unit))
}

/// `uncertainty` over `k` of a table.
pub fn standard_of(table: Table<'_>, help: &str) -> Option<f64> {
    for key in ["uncertainty", "k"] {
        if !table.has(key) {
            table.missing(key, help);
        }
    }
    Some(table.positive("uncertainty")?.value / table.positive("k")?.value)
}

//! What the rig file knows of the frame: how far it gives under a load.

use crate::text::Table;
use crate::units::System;

use super::scale::{declared_negligible, standard_of};

/// How far the frame gives.
#[derive(Clone, Debug, PartialEq)]
pub enum Give {
    /// In proportion to the load, mm/N.
    Line(f64),
    /// By a table of load (N) and give (mm), both rising, from no give at no load. Beyond its last load the last
    /// stretch goes on.
    Table(Vec<(f64, f64)>),
}

impl Give {
    /// Give in mm at a load in N; a load that pulls gives as the first stretch would.
    pub fn at(&self, load: f64) -> f64 {
        match self {
            Self::Line(per_newton) => per_newton * load,
            Self::Table(points) => {
                let stretches = points.windows(2).filter_map(|pair| match pair {
                    [a, b] => Some((*a, *b)),
                    _ => None,
                });
                let mut found = None;
                for (a, b) in stretches {
                    if found.is_none() || load > a.0 {
                        found = Some((a, b));
                    }
                }
                found.map_or(0.0, |(a, b)| a.1 + (load - a.0) / (b.0 - a.0) * (b.1 - a.1))
            }
        }
    }

    /// The steepest give, mm/N.
    pub fn steepest(&self) -> f64 {
        match self {
            Self::Line(per_newton) => *per_newton,
            Self::Table(points) => points
                .windows(2)
                .map(|pair| match pair {
                    [a, b] => (b.1 - a.1) / (b.0 - a.0),
                    _ => 0.0,
                })
                .fold(0.0, f64::max),
        }
    }

    /// The largest load a table knows of, N.
    pub fn known_to(&self) -> Option<f64> {
        match self {
            Self::Line(_) => None,
            Self::Table(points) => points.last().map(|(load, _)| *load),
        }
    }
}

/// Compliance of the frame.
#[derive(Clone, Debug, PartialEq)]
pub enum Compliance {
    /// Measured.
    Measured {
        /// How far it gives.
        give: Give,
        /// Standard uncertainty, mm/N: that of the give grows with the load.
        standard: f64,
    },
    /// Not known, so not corrected; up to this share of the travel may be the frame's.
    NotCorrected {
        /// Share of travel, 0 … 1.
        allowance: f64,
    },
    /// Declared negligible.
    DeclaredNegligible,
}

const HELP: &str = "write compliance = { value = 0.00021, uncertainty = 0.00002, k = 2 }, or a table in place of the value";

pub(super) fn read_frame(table: Table<'_>, units: System) -> Option<Compliance> {
    if !table.has("compliance") {
        // Nothing known of the frame: 0 to 1 % of the travel unless the file states another allowance.
        let allowance = if table.has("allowance") {
            table.share("allowance")?.value
        } else {
            0.01
        };
        return Some(Compliance::NotCorrected { allowance });
    }
    let compliance = table.table("compliance");
    if compliance.has("unknown") {
        return declared_negligible(compliance).then_some(Compliance::DeclaredNegligible);
    }
    let unit = units.length() / units.force();
    let give = read_give(compliance, units);
    let standard = standard_of(compliance, HELP)? * unit;
    Some(Compliance::Measured {
        give: give?,
        standard,
    })
}

fn read_give(compliance: Table<'_>, units: System) -> Option<Give> {
    match (compliance.has("value"), compliance.has("table")) {
        (true, false) => {
            let value = compliance.not_negative("value")?.value;
            Some(Give::Line(value * units.length() / units.force()))
        }
        (false, true) => read_table(compliance, units),
        (true, true) => {
            let what = "the compliance is stated by a value and by a table";
            compliance.fault(&compliance.place("table"), what, "keep one of them");
            None
        }
        (false, false) => {
            compliance.missing("value", HELP);
            None
        }
    }
}

fn read_table(compliance: Table<'_>, units: System) -> Option<Give> {
    let help = "write table = [{ load = 50.0, give = 0.008 }, { load = 100.0, give = 0.014 }], both rising";
    let mut points = vec![(0.0, 0.0)];
    for row in compliance.tables("table") {
        for key in ["load", "give"] {
            if !row.has(key) {
                row.missing(key, help);
            }
        }
        let load = row.positive("load");
        let give = row.positive("give");
        let (load, give) = (load?.value * units.force(), give?.value * units.length());
        let last = points.last().copied().unwrap_or((0.0, 0.0));
        if load <= last.0 || give <= last.1 {
            let what = "load and give do not rise from row to row";
            row.fault(&row.span(), what, help);
            return None;
        }
        points.push((load, give));
    }
    if points.len() < 3 {
        let what = "a table of the frame's give needs two rows or more";
        compliance.fault(&compliance.place("table"), what, help);
        return None;
    }
    Some(Give::Table(points))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: stretches (0, 0) (10, 2) (20, 3); beyond either end the nearest stretch goes on.
    #[test]
    fn a_table_is_read_between_its_rows() {
        let give = Give::Table(vec![(0.0, 0.0), (10.0, 2.0), (20.0, 3.0)]);
        for (load, wanted) in [
            (0.0, 0.0),
            (5.0, 1.0),
            (10.0, 2.0),
            (15.0, 2.5),
            (20.0, 3.0),
            (30.0, 4.0),
            (-5.0, -1.0),
        ] {
            assert!((give.at(load) - wanted).abs() < 1e-12, "{load}");
        }
        assert!((give.steepest() - 0.2).abs() < 1e-12);
        assert_eq!(give.known_to(), Some(20.0));
        assert!((Give::Line(0.5).at(4.0) - 2.0).abs() < 1e-12);
    }
}

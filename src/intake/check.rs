//! The check file as opened: which exports hold the reference spring, what its certificate says, what is judged on the rig.

use std::path::{Path, PathBuf};

use jiff::civil::Date;

use crate::drawing::read_units;
use crate::text::{Keys, Source, Table, beside, read_toml};
use crate::units::System;

use super::exports::{Export, resolve};
use super::open::{named_file, read_exports};
use super::parts::{Conditions, read_conditions};
use super::reference::{ReferenceSpring, read_reference};

const CERTIFIED: &[&str] = &["value", "uncertainty", "k"];

/// The keys a check file may hold.
#[rustfmt::skip] // keeps the list a list
pub const CHECK_KEYS: Keys = &[
    ("", &["units", "rig", "exports", "plates", "drawings", "tolerances", "share", "earlier", "check", "reference", "conditions"]),
    ("check", &["on", "inspector", "note"]),
    ("tolerances", &["rate", "load", "free_length"]),
    ("reference", &["name", "certificate", "calibrated", "rate", "load", "free_length"]),
    ("reference.calibrated", &["on", "until"]),
    ("reference.rate", &["value", "uncertainty", "k", "from", "to"]),
    ("reference.load", &["at_length", "value", "uncertainty", "k"]),
    ("reference.free_length", CERTIFIED),
    ("conditions", &["temperature", "presetting_strokes", "presetting_recorded"]),
];

/// The share of the tightest half tolerance that an error may take where the file states none.
const SHARE: f64 = 0.2;

/// A tolerance to be judged, ± about nominal.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Tolerance {
    /// A share of the value, 0 … 1.
    Relative(f64),
    /// In the quantity's unit.
    Absolute(f64),
}

/// What the tolerances to be judged are taken from.
#[derive(Clone, Debug)]
pub enum Judged {
    /// Drawings: path as written, and where each lies.
    Drawings(Vec<(String, PathBuf)>),
    /// As stated: rate, load, free length.
    Stated([Tolerance; 3]),
}

/// The reference spring and what its check needs.
#[derive(Clone, Debug)]
pub struct ReferenceCheck {
    /// The spring.
    pub spring: ReferenceSpring,
    /// Its exports.
    pub exports: Vec<Export>,
    /// What is judged on this rig.
    pub judged: Judged,
}

/// A check file, opened and free of faults.
#[derive(Clone, Debug)]
pub struct CheckFile {
    /// The file.
    pub source: Source,
    /// The rig file.
    pub rig: (String, PathBuf),
    /// The reference spring, where it was measured.
    pub reference: Option<ReferenceCheck>,
    /// The run of plate on plate.
    pub plates: Option<Export>,
    /// Share of the tightest half tolerance that an error may take, 0 … 1.
    pub share: f64,
    /// Results of earlier checks.
    pub earlier: Vec<Export>,
    /// The day it was measured, where the file says so.
    pub on: Option<Date>,
    /// Who checked.
    pub inspector: Option<String>,
    /// A note to print.
    pub note: Option<String>,
    /// Conditions.
    pub conditions: Conditions,
}

/// Opens the check file at `path`, written as `as_written`.
///
/// # Errors
/// A report of every fault in the file.
pub fn open_check(path: &Path, as_written: &str) -> miette::Result<CheckFile> {
    let source = Source::open(path, as_written)?;
    Ok(read_toml(&source, CHECK_KEYS, |root| read(root, &source))?)
}

fn read(root: Table<'_>, source: &Source) -> Option<CheckFile> {
    let units = read_units(root)?;
    let rig = named_file(root, "rig", source);
    let plates = root.raw_text("plates").map(|written| Export {
        path: beside(&source.path, &written.value),
        written: written.value,
    });
    if !root.has("reference") && !root.has("plates") {
        root.missing(
            "reference",
            "describe the reference spring under [reference], or name the plates' run: plates = \"plates.csv\"",
        );
    }
    let reference = if root.has("reference") {
        Some(read_check(root, source, units)?)
    } else {
        None
    };
    let share = if root.has("share") {
        let share = root.share("share")?;
        if !(share.value > 0.0 && share.value <= 1.0) {
            let what = "the share is not between 0 and 100 %";
            root.fault(&share.span, what, "write share = \"20 %\"");
        }
        share.value
    } else {
        SHARE
    };
    let check = root.table("check");
    let on = check.date("on").map(|on| on.value);
    Some(CheckFile {
        source: source.clone(),
        rig: rig?,
        reference,
        plates,
        share,
        earlier: read_earlier(root, source),
        on,
        inspector: check.text("inspector"),
        note: check.text("note"),
        conditions: read_conditions(root.table("conditions"))?,
    })
}

fn read_earlier(root: Table<'_>, source: &Source) -> Vec<Export> {
    let mut found = Vec::new();
    for pattern in root.raw_texts("earlier") {
        match resolve(&source.path, &pattern.value) {
            Ok(files) => found.extend(files),
            Err(why) => root.fault(
                &pattern.span,
                why,
                "name the result.json of earlier checks, relative to this file",
            ),
        }
    }
    found
}

fn read_check(root: Table<'_>, source: &Source, units: System) -> Option<ReferenceCheck> {
    let spring = read_reference(root.table("reference"), units);
    let exports = read_exports(root, source);
    let judged = read_judged(root, source, units);
    Some(ReferenceCheck {
        spring: spring?,
        exports: exports?,
        judged: judged?,
    })
}

fn read_judged(root: Table<'_>, source: &Source, units: System) -> Option<Judged> {
    let help =
        "write drawings = [\"gv-118.toml\"], or [tolerances] with rate, load and free_length";
    match (root.has("drawings"), root.has("tolerances")) {
        (true, false) => {
            let drawings = root.raw_texts("drawings").into_iter();
            let named: Vec<(String, PathBuf)> = drawings
                .map(|one| (one.value.clone(), beside(&source.path, &one.value)))
                .collect();
            if named.is_empty() {
                root.fault(&root.place("drawings"), "no drawing is named", help);
                return None;
            }
            Some(Judged::Drawings(named))
        }
        (false, true) => {
            let table = root.table("tolerances");
            let rate = read_tolerance(table, "rate", units.rate());
            let load = read_tolerance(table, "load", units.force());
            let free = read_tolerance(table, "free_length", units.length());
            Some(Judged::Stated([rate?, load?, free?]))
        }
        (true, true) => {
            let what = "the tolerances are taken from drawings and stated besides";
            root.fault(&root.place("tolerances"), what, "keep one of them");
            None
        }
        (false, false) => {
            root.missing("tolerances", help);
            None
        }
    }
}

fn read_tolerance(table: Table<'_>, key: &str, unit: f64) -> Option<Tolerance> {
    if !table.has(key) {
        table.missing(
            key,
            "write the tightest tolerance to be judged, ±: \"5 %\" or a number",
        );
        return None;
    }
    if table.is_text(key) {
        let share = table.share(key)?;
        if share.value <= 0.0 {
            table.fault(
                &share.span,
                format!("`{key}` is no tolerance"),
                "write a share above 0 %",
            );
            return None;
        }
        return Some(Tolerance::Relative(share.value));
    }
    table
        .positive(key)
        .map(|number| Tolerance::Absolute(number.value * unit))
}

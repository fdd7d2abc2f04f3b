//! The check file as opened: which exports hold the reference spring, what its certificate says, what is judged on the rig.

use std::path::{Path, PathBuf};

use jiff::civil::Date;

use crate::drawing::read_units;
use crate::quantity::Quantity;
use crate::rig::{read_calibrated, standard_of};
use crate::text::{Keys, Source, Table, beside, read_toml};
use crate::units::{Millimetres, System};

use super::exports::{Export, resolve};
use super::open::{named_file, read_exports};
use super::parts::{Conditions, read_conditions};

const CERTIFIED: &[&str] = &["value", "uncertainty", "k"];

/// The keys a check file may hold.
#[rustfmt::skip] // keeps the list a list
pub const CHECK_KEYS: Keys = &[
    ("", &["units", "rig", "exports", "plates", "drawings", "tolerances", "share", "earlier", "check", "reference", "conditions"]),
    ("check", &["inspector", "note"]),
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

/// A certified value: the value and its standard uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CertifiedValue {
    /// Which quantity.
    pub quantity: Quantity,
    /// The value, in its unit.
    pub value: f64,
    /// U/k.
    pub standard: f64,
}

/// A certified reference spring.
#[derive(Clone, Debug)]
pub struct ReferenceSpring {
    /// Its name.
    pub name: String,
    /// Certificate.
    pub certificate: Option<String>,
    /// Calibrated on, and until.
    pub calibrated: Option<(Date, Date)>,
    /// Lengths between which the rate is certified, mm, the longer first.
    pub between: Option<(f64, f64)>,
    /// Rate, loads from the longest length down, free length.
    pub values: Vec<CertifiedValue>,
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
    Some(CheckFile {
        source: source.clone(),
        rig: rig?,
        reference,
        plates,
        share,
        earlier: read_earlier(root, source),
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

fn read_reference(table: Table<'_>, units: System) -> Option<ReferenceSpring> {
    let name = table.required_text("name", "write the reference spring's name: name = \"RS-3\"");
    let rate = certified(table, "rate", Quantity::Rate, units.rate());
    let free = certified(table, "free_length", Quantity::FreeLength, units.length());
    let loads = read_loads(table, units);
    let between = read_between(table.table("rate"), units);
    let calibrated = read_calibrated(table.table("calibrated"));
    let (rate, free, loads) = (rate?, free?, loads?);
    for load in &loads {
        let at = load.quantity.at_length().map_or(0.0, Millimetres::get);
        if at >= free.value {
            let what = "a certified load lies at or beyond the certified free length";
            table.fault(
                &table.place("load"),
                what,
                "check lengths and units of the certificate",
            );
            return None;
        }
    }
    let mut values = vec![rate];
    values.extend(loads);
    values.push(free);
    Some(ReferenceSpring {
        name: name?,
        certificate: table.text("certificate"),
        calibrated,
        between,
        values,
    })
}

/// The lengths the rate is certified between; `None` where they are not stated, or where a fault was noted.
fn read_between(rate: Table<'_>, units: System) -> Option<(f64, f64)> {
    if !rate.has("from") && !rate.has("to") {
        return None;
    }
    let help = "write from and to, the longer length first: from = 80.0, to = 60.0";
    for key in ["from", "to"] {
        if !rate.has(key) {
            rate.missing(key, help);
        }
    }
    let (from, to) = (rate.positive("from")?.value, rate.positive("to")?.value);
    if from <= to {
        rate.fault(&rate.place("from"), "`from` is not the longer length", help);
        return None;
    }
    Some((from * units.length(), to * units.length()))
}

fn read_loads(table: Table<'_>, units: System) -> Option<Vec<CertifiedValue>> {
    let help = "write two or more [[reference.load]] with at_length, value, uncertainty and k";
    let mut loads = Vec::new();
    for load in table.tables("load") {
        if !load.has("at_length") {
            load.missing("at_length", help);
        }
        let at = load.positive("at_length")?.value * units.length();
        let quantity = Quantity::LoadAt(at.try_into().ok()?);
        loads.push(value_of(load, quantity, units.force())?);
    }
    let at = |one: &CertifiedValue| one.quantity.at_length().map_or(0.0, Millimetres::get);
    loads.sort_by(|a, b| at(b).total_cmp(&at(a)));
    let apart = loads
        .windows(2)
        .all(|pair| matches!(pair, [a, b] if at(a) - at(b) > 1e-9));
    if loads.len() < 2 || !apart {
        let what = format!("{} certified loads at lengths of their own", loads.len());
        let what = if apart {
            what
        } else {
            "two certified loads at one length".to_owned()
        };
        table.fault(
            &table.place("load"),
            format!("{what}, where two or more are wanted"),
            help,
        );
        return None;
    }
    Some(loads)
}

fn certified(table: Table<'_>, key: &str, quantity: Quantity, unit: f64) -> Option<CertifiedValue> {
    if !table.has(key) {
        table.missing(
            key,
            format!(
                "write {key} = {{ value = …, uncertainty = …, k = 2 }} as the certificate has it"
            ),
        );
        return None;
    }
    value_of(table.table(key), quantity, unit)
}

fn value_of(table: Table<'_>, quantity: Quantity, unit: f64) -> Option<CertifiedValue> {
    let help = "write value, uncertainty and k as the certificate has them";
    if !table.has("value") {
        table.missing("value", help);
    }
    let value = table.positive("value");
    let standard = standard_of(table, help);
    Some(CertifiedValue {
        quantity,
        value: value?.value * unit,
        standard: standard? * unit,
    })
}

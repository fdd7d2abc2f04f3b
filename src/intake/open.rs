//! Opens a lot file.

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

use jiff::civil::Date;

use crate::drawing::read_units;
use crate::text::{At, InputFile, Keys, Source, Table, read_toml};

use super::exports::{Export, natural_order, resolve};
use super::parts::{
    Conditions, Finding, NotInspected, Repeat, read_caliper, read_conditions, read_finding,
    read_not_inspected, read_repeat,
};

const INSTRUMENT: &[&str] = &["uncertainty", "k"];

/// The keys a lot file may hold.
#[rustfmt::skip] // keeps the list a list
pub const KEYS: Keys = &[
    ("", &["units", "drawing", "rig", "exports", "findings", "sample", "not_inspected", "lot", "conditions", "caliper", "repeat", "finding"]),
    ("not_inspected", &["requirement", "at_length", "reason"]),
    ("lot", &["number", "size", "supplier", "received", "inspector", "sample_drawn", "note", "concession", "supplier_values", "tags"]),
    ("lot.tags", &["*"]),
    ("conditions", &["temperature", "presetting_strokes", "presetting_recorded"]),
    ("caliper", &["free_length", "outside_diameter", "inside_diameter", "wire_diameter", "squareness", "parallelism"]),
    ("caliper.free_length", INSTRUMENT),
    ("caliper.outside_diameter", INSTRUMENT),
    ("caliper.inside_diameter", INSTRUMENT),
    ("caliper.wire_diameter", INSTRUMENT),
    ("caliper.squareness", INSTRUMENT),
    ("caliper.parallelism", INSTRUMENT),
    ("repeat", &["spring", "export", "reason", "invalid"]),
    ("finding", &["spring", "class", "text"]),
];

/// A lot file, opened and free of faults.
#[derive(Clone, Debug)]
pub struct Lot {
    /// The file.
    pub source: Source,
    /// The drawing: path as written, and where it lies.
    pub drawing: (String, PathBuf),
    /// The rig file.
    pub rig: (String, PathBuf),
    /// The exports, in natural order of their names.
    pub exports: Vec<Export>,
    /// The caliper findings file.
    pub findings_file: Option<(String, PathBuf)>,
    /// Which springs form the sample, in order, where the file says so.
    pub sample: Vec<At<String>>,
    /// What was not inspected.
    pub not_inspected: Vec<NotInspected>,
    /// Lot number.
    pub number: String,
    /// Springs in the lot.
    pub size: At<u64>,
    /// Supplier.
    pub supplier: Option<String>,
    /// Date received.
    pub received: Option<Date>,
    /// Inspector.
    pub inspector: Option<String>,
    /// How the sample was drawn.
    pub sample_drawn: Option<String>,
    /// A note to print.
    pub note: Option<String>,
    /// Concession.
    pub concession: Option<String>,
    /// The supplier's own values.
    pub supplier_values: Option<String>,
    /// Free tags.
    pub tags: BTreeMap<String, String>,
    /// Conditions.
    pub conditions: Conditions,
    /// Standard uncertainty of the caliper by quantity, mm.
    pub caliper: Vec<(&'static str, f64)>,
    /// Repeats.
    pub repeats: Vec<Repeat>,
    /// Findings.
    pub findings: Vec<Finding>,
}

impl Lot {
    /// The lot file as a line of provenance.
    pub fn input(&self) -> InputFile {
        self.source.input("lot")
    }
}

/// Opens the lot file at `path`, written as `as_written`.
///
/// # Errors
/// A report of every fault in the file.
pub fn open(path: &Path, as_written: &str) -> miette::Result<Lot> {
    let source = Source::open(path, as_written)?;
    Ok(read_toml(&source, KEYS, |root| read(root, &source))?)
}

fn read(root: Table<'_>, source: &Source) -> Option<Lot> {
    let units = read_units(root)?;
    let drawing = named_file(root, "drawing", source);
    let rig = named_file(root, "rig", source);
    let exports = read_exports(root, source);
    let head = root.table("lot");
    let (number, size) = read_number_and_size(head);
    let repeats = read_all(root, "repeat", |table| read_repeat(table, source));
    let exports = exports.map(|all| without_repeats(all, repeats.as_deref().unwrap_or(&[])));
    let findings = read_all(root, "finding", read_finding);
    let not_inspected = read_all(root, "not_inspected", |table| {
        read_not_inspected(table, units)
    });
    let caliper = read_caliper(root.table("caliper"), units);
    let conditions = read_conditions(root.table("conditions"));
    let received = if head.has("received") {
        Some(head.date("received")?.value)
    } else {
        None
    };
    Some(Lot {
        source: source.clone(),
        drawing: drawing?,
        rig: rig?,
        exports: exports?,
        findings_file: if root.has("findings") {
            Some(named_file(root, "findings", source)?)
        } else {
            None
        },
        sample: root.raw_texts("sample"),
        not_inspected: not_inspected?,
        number: number?,
        size: size?,
        supplier: head.text("supplier"),
        received,
        inspector: head.text("inspector"),
        sample_drawn: head.text("sample_drawn"),
        note: head.text("note"),
        concession: head.text("concession"),
        supplier_values: head.text("supplier_values"),
        tags: head.table("tags").all_texts().into_iter().collect(),
        conditions: conditions?,
        caliper: caliper?,
        repeats: repeats?,
        findings: findings?,
    })
}

fn read_number_and_size(head: Table<'_>) -> (Option<String>, Option<At<u64>>) {
    let number = head.required_text(
        "number",
        "write the lot number under [lot], in quotes: number = \"0044\"",
    );
    if number
        .as_ref()
        .is_some_and(|number| number.trim().is_empty())
    {
        head.fault(
            &head.place("number"),
            "the lot number is empty",
            "write the number as it stands on the lot",
        );
    }
    let help = "write how many springs the lot holds: size = 1200";
    if !head.has("size") {
        head.missing("size", help);
    }
    let size = head.whole("size");
    if let Some(size) = size.as_ref().filter(|size| size.value < 1) {
        head.fault(&size.span, "a lot of no springs cannot be judged", help);
    }
    (number, size)
}

/// The exports that are no repeat's: a repeat may lie in the folder of the others.
fn without_repeats(mut exports: Vec<Export>, repeats: &[Repeat]) -> Vec<Export> {
    exports.retain(|export| {
        !repeats
            .iter()
            .any(|repeat| repeat.export.path == export.path)
    });
    exports
}

fn read_all<T>(
    root: Table<'_>,
    key: &str,
    read: impl Fn(Table<'_>) -> Option<T>,
) -> Option<Vec<T>> {
    let all: Vec<Option<T>> = root.tables(key).into_iter().map(read).collect();
    all.into_iter().collect()
}

pub(super) fn named_file(root: Table<'_>, key: &str, source: &Source) -> Option<(String, PathBuf)> {
    if !root.has(key) {
        root.missing(
            key,
            format!("write {key} = \"…\": a path relative to this file"),
        );
    }
    let written = root.raw_text(key)?.value;
    let path = crate::text::beside(&source.path, &written);
    Some((written, path))
}

pub(super) fn read_exports(root: Table<'_>, source: &Source) -> Option<Vec<Export>> {
    let patterns = root.raw_texts("exports");
    if patterns.is_empty() {
        root.missing("exports", "write exports = [\"springs/*.csv\"]");
        return None;
    }
    let mut exports: Vec<Export> = Vec::new();
    for pattern in &patterns {
        match resolve(&source.path, &pattern.value) {
            Ok(found) => exports.extend(
                found
                    .into_iter()
                    .filter(|one| !exports.iter().any(|known| known.path == one.path))
                    .collect::<Vec<_>>(),
            ),
            Err(why) => root.fault(
                &pattern.span,
                why,
                "paths are relative to this file; * stands for any part of a name",
            ),
        }
    }
    exports.sort_by(|a, b| natural_order(&a.written, &b.written));
    Some(exports)
}

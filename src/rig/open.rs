//! Opens a rig file: how the tester writes, and what is known of its scales, frame and repeatability.

use std::path::Path;

use crate::drawing::read_units;
use crate::quantity::Quantity;
use crate::text::{InputFile, Keys, Source, Table, read_toml};
use crate::units::{Newtons, System};

use super::dialect::Dialect;
use super::every::{Every, read_every};
use super::frame::{Compliance, read_frame};
use super::read_dialect::read_export;
use super::read_points::refuse_give;
use super::scale::{
    FORCE_CLASSES, Known, Scale, TRAVEL_CLASSES, declared_negligible, read_scale, standard_of,
};

const FORCE: &[&str] = &[
    "class",
    "certificate",
    "unknown",
    "resolution",
    "range",
    "calibrated",
];
const TRAVEL: &[&str] = &[
    "class",
    "certificate",
    "unknown",
    "resolution",
    "calibrated",
    "zero",
    "set_at_length",
    "zeroed_at_load",
];
const STATED: &[&str] = &["value", "uncertainty", "k", "unknown"];

/// The keys a rig file may hold.
#[rustfmt::skip] // keeps the list a list
pub const KEYS: Keys = &[
    ("", &["units", "rig", "export", "force", "travel", "frame", "contact", "repeatability"]),
    ("rig", &["name", "check_every"]),
    ("export", &["header_line", "units_line", "delimiter", "decimal", "encoding", "quoted", "last_line_open", "trailing_delimiter", "thousands", "footer", "line_end", "tables", "sheet", "points", "load", "travel", "time", "spring"]),
    ("export.load", &["column", "unit", "unit_after", "pushing"]),
    ("export.travel", &["column", "unit", "means", "at_zero_gap", "pushing", "unit_after"]),
    ("export.time", &["column", "unit"]),
    ("export.tables", &["each", "end", "end_line"]),
    ("export.points", &["wide", "unit", "pushing"]),
    ("export.points.wide", &["column", "length"]),
    ("export.spring", &["from", "column", "after"]),
    ("force", FORCE),
    ("force.certificate", &["relative", "k", "error", "drift"]),
    ("force.resolution", STATED),
    ("force.range", &["from", "to"]),
    ("force.calibrated", &["on", "until"]),
    ("travel", TRAVEL),
    ("travel.certificate", &["relative", "k", "error", "drift"]),
    ("travel.resolution", STATED),
    ("travel.zero", STATED),
    ("travel.calibrated", &["on", "until"]),
    ("frame", &["compliance", "allowance"]),
    ("frame.compliance", &["value", "table", "uncertainty", "k", "unknown"]),
    ("frame.compliance.table", &["load", "give"]),
    ("contact", &["load"]),
    ("repeatability", &["of", "standard_deviation"]),
];

/// What the export's travel means.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Means {
    /// Deflection of the spring, growing as it is compressed.
    Deflection,
    /// Length of the spring.
    Length,
    /// Position of the platen; the length is its distance from the reading with the platens touching, mm.
    PlatenPosition {
        /// Reading with the platens touching, mm.
        at_zero_gap: f64,
    },
}

/// A rig file, opened and free of faults.
#[derive(Clone, Debug)]
pub struct Rig {
    /// The file.
    pub input: InputFile,
    /// Name.
    pub name: String,
    /// How often a check on a reference spring is wanted.
    pub check_every: Option<Every>,
    /// How the export is written.
    pub dialect: Dialect,
    /// What travel means.
    pub means: Means,
    /// Force scale.
    pub force: Scale,
    /// Travel scale.
    pub travel: Scale,
    /// Standard uncertainty of the length scale's zero, mm (for lengths and platen positions).
    pub zero: Known,
    /// Length at which the length scale was set, mm.
    pub set_at_length: f64,
    /// Load at which it was set, N.
    pub zeroed_at_load: f64,
    /// Frame.
    pub frame: Compliance,
    /// Contact load F_c.
    pub contact_load: Newtons,
    /// Within-spring standard deviations, in the unit of the quantity.
    pub repeatability: Vec<(&'static str, f64)>,
}

/// Opens the rig file at `path`, written as `as_written`.
///
/// # Errors
/// A report of every fault in the file.
pub fn open(path: &Path, as_written: &str) -> miette::Result<Rig> {
    from_source(&Source::open(path, as_written)?)
}

/// Opens a rig file already read.
///
/// # Errors
/// A report of every fault in the file.
pub fn from_source(source: &Source) -> miette::Result<Rig> {
    let input = source.input("rig");
    Ok(read_toml(source, KEYS, |root| read(root, &input))?)
}

fn read(root: Table<'_>, input: &InputFile) -> Option<Rig> {
    let units = read_units(root)?;
    let head = root.table("rig");
    let name = head.required_text("name", "write the rig's name under [rig]");
    let check_every = read_every(head);
    let export = read_export(root.table("export"), units.length());
    let force = read_scale(root.table("force"), &FORCE_CLASSES, units.force());
    let travel = read_scale(root.table("travel"), &TRAVEL_CLASSES, units.length());
    let frame = read_frame(root.table("frame"), units);
    let contact = root.table("contact");
    let contact_load = contact
        .positive("load")
        .map(|load| load.value * units.force());
    if contact_load.is_none() && !contact.has("load") {
        contact.missing(
            "load",
            "write [contact] load = 1.0: the load at which the spring counts as touched",
        );
    }
    let repeatability = read_repeatability(root, units);
    let (dialect, means) = export?;
    let frame = frame?;
    if dialect.rarer.points.is_some() {
        refuse_give(root, &frame)?;
    }
    let zero = read_zero(root.table("travel"), means, units.length());
    let number = |key| {
        root.table("travel")
            .number(key)
            .map_or(0.0, |number| number.value)
    };
    Some(Rig {
        input: input.clone(),
        name: name?,
        check_every,
        dialect,
        means,
        force: force?,
        travel: travel?,
        zero: zero?,
        set_at_length: number("set_at_length") * units.length(),
        zeroed_at_load: number("zeroed_at_load") * units.force(),
        frame,
        contact_load: Newtons::try_from(contact_load?).ok()?,
        repeatability: repeatability?,
    })
}

fn read_zero(table: Table<'_>, means: Means, unit: f64) -> Option<Known> {
    let help =
        "write zero = { uncertainty = 0.02, k = 2 }, or { unknown = \"declared negligible\" }";
    if means == Means::Deflection {
        return Some(Known::DeclaredNegligible);
    }
    if !table.has("zero") {
        table.missing("zero", help);
        return None;
    }
    let zero = table.table("zero");
    if zero.has("unknown") {
        return declared_negligible(zero).then_some(Known::DeclaredNegligible);
    }
    standard_of(zero, help).map(|standard| Known::Stated(standard * unit))
}

fn read_repeatability(root: Table<'_>, units: System) -> Option<Vec<(&'static str, f64)>> {
    let mut stated: Vec<(&'static str, f64)> = Vec::new();
    let of = [
        (Quantity::Rate.name(), units.rate()),
        ("load", units.force()),
        (Quantity::FreeLength.name(), units.length()),
        (Quantity::SolidLength.name(), units.length()),
        (Quantity::Hysteresis.name(), 1.0),
        (Quantity::Set.name(), units.length()),
        (Quantity::Straightness.name(), 1.0),
        (Quantity::Knee(1).name(), units.length()),
    ];
    let words = of.map(|(name, scale)| (name, (name, scale)));
    for table in root.tables("repeatability") {
        for key in ["of", "standard_deviation"] {
            if !table.has(key) {
                table.missing(key, "write of = \"rate\", standard_deviation = 0.02");
            }
        }
        let (name, scale) = table.word("of", &words)?;
        if stated.iter().any(|(known, _)| *known == name) {
            table.fault(
                &table.place("of"),
                format!("the repeatability of {name} is stated twice"),
                "state it once",
            );
            return None;
        }
        stated.push((name, table.positive("standard_deviation")?.value * scale));
    }
    Some(stated)
}

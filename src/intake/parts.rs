//! The parts of a lot file: conditions, repeats, findings, what was not inspected, the caliper.

use crate::drawing::CLASSES;
use crate::quantity::{Class, Quantity};
use crate::rig::standard_of;
use crate::text::{At, Source, Table};
use crate::units::System;

use super::exports::Export;

/// Conditions of the test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conditions {
    /// °C.
    pub temperature: Option<f64>,
    /// Strokes made before the recording.
    pub presetting_strokes: Option<u64>,
    /// Loading strokes at the start of each export that are presetting.
    pub presetting_recorded: u64,
}

/// A repeated measurement.
#[derive(Clone, Debug)]
pub struct Repeat {
    /// The spring, as written.
    pub spring: At<String>,
    /// Its export.
    pub export: Export,
    /// Why it was taken.
    pub reason: String,
    /// Why the earlier measurements of this spring do not count, where they do not.
    pub invalid: Option<String>,
}

/// Something seen.
#[derive(Clone, Debug)]
pub struct Finding {
    /// The spring, as written.
    pub spring: At<String>,
    /// Class.
    pub class: Class,
    /// What was seen.
    pub text: String,
}

/// A requirement that was not inspected.
#[derive(Clone, Debug)]
pub struct NotInspected {
    /// Which.
    pub quantity: Quantity,
    /// Where the file says so.
    pub span: std::ops::Range<usize>,
    /// Why.
    pub reason: String,
}

fn required(table: Table<'_>, keys: &[&str], help: &str) {
    for key in keys {
        if !table.has(key) {
            table.missing(key, help);
        }
    }
}

pub(super) fn read_repeat(table: Table<'_>, source: &Source) -> Option<Repeat> {
    required(
        table,
        &["spring", "export", "reason"],
        "a repeat states spring, export and reason, each in quotes",
    );
    let written = table.raw_text("export");
    let spring = table.raw_text("spring");
    let reason = table.text("reason");
    let written = written?.value;
    Some(Repeat {
        spring: spring?,
        export: Export {
            path: crate::text::beside(&source.path, &written),
            written,
        },
        reason: reason?,
        invalid: table.text("invalid"),
    })
}

pub(super) fn read_finding(table: Table<'_>) -> Option<Finding> {
    required(
        table,
        &["spring", "class", "text"],
        "a finding states spring, class and text",
    );
    let (spring, class, text) = (
        table.raw_text("spring"),
        table.word("class", &CLASSES),
        table.text("text"),
    );
    Some(Finding {
        spring: spring?,
        class: class?,
        text: text?,
    })
}

pub(super) fn read_not_inspected(table: Table<'_>, units: System) -> Option<NotInspected> {
    required(
        table,
        &["requirement", "reason"],
        "say which requirement was not inspected, and why",
    );
    let at = table
        .positive("at_length")
        .and_then(|at| (at.value * units.length()).try_into().ok());
    let name = table.raw_text("requirement")?;
    let quantity = Quantity::from_name(&name.value, at);
    if quantity.is_none() {
        table.fault(
            &name.span,
            format!("\"{}\" names no requirement", name.value),
            "write it as in the drawing: rate, free_length …; a load needs at_length too",
        );
    }
    let reason = table
        .text("reason")
        .filter(|reason| !reason.trim().is_empty());
    if reason.is_none() && table.has("reason") {
        table.fault(
            &table.place("reason"),
            "the reason is empty",
            "say why it was not inspected",
        );
    }
    Some(NotInspected {
        quantity: quantity?,
        span: name.span,
        reason: reason?,
    })
}

pub(super) fn read_caliper(table: Table<'_>, units: System) -> Option<Vec<(&'static str, f64)>> {
    let mut stated = Vec::new();
    for quantity in [
        Quantity::FreeLength,
        Quantity::OutsideDiameter,
        Quantity::InsideDiameter,
        Quantity::WireDiameter,
        Quantity::Squareness,
        Quantity::Parallelism,
    ] {
        if table.has(quantity.name()) {
            let help = "write outside_diameter = { uncertainty = 0.02, k = 2 }";
            stated.push((
                quantity.name(),
                standard_of(table.table(quantity.name()), help)? * units.length(),
            ));
        }
    }
    Some(stated)
}

pub(super) fn read_conditions(table: Table<'_>) -> Option<Conditions> {
    let temperature = table.number("temperature");
    if let Some(degrees) = &temperature
        && !(-100.0..=400.0).contains(&degrees.value)
    {
        table.fault(
            &degrees.span,
            format!("{} °C is no test temperature", degrees.value),
            "write the temperature in °C",
        );
        return None;
    }
    Some(Conditions {
        temperature: temperature.map(|degrees| degrees.value),
        presetting_strokes: table
            .whole("presetting_strokes")
            .map(|strokes| strokes.value),
        presetting_recorded: table
            .whole("presetting_recorded")
            .map_or(0, |strokes| strokes.value),
    })
}

//! Opens a drawing file: every fault of meaning at once, each with its place.

use std::path::Path;

use crate::text::{InputFile, Keys, Source, Table, read_toml};
use crate::units::System;

use super::limits::Requirement;
use super::member::{Member, read_members};
use super::read_terms::{read_acceptance, read_rate_test};
use super::requirements::{check_classes, check_lengths, read_requirements};
use super::terms::{Acceptance, RateTest};
use super::theory::{Theory, theory};

const LIMIT: &[&str] = &[
    "nominal",
    "tolerance",
    "plus",
    "minus",
    "minimum",
    "maximum",
    "standard",
    "class",
];
const SIZED: &[&str] = &["nominal", "tolerance"];

/// The keys a drawing may hold.
#[rustfmt::skip] // keeps the list a list
pub const KEYS: Keys = &[
    ("", &["units", "drawing", "spring", "requirements", "rate_test", "acceptance"]),
    ("drawing", &["number", "revision", "title", "arrangement"]),
    ("spring", &["name", "wire_diameter", "outside_diameter", "mean_diameter", "inside_diameter", "active_coils",
        "total_coils", "ends", "free_length", "material", "shear_modulus", "shear_modulus_source"]),
    ("spring.wire_diameter", SIZED),
    ("spring.outside_diameter", SIZED),
    ("spring.mean_diameter", SIZED),
    ("spring.inside_diameter", SIZED),
    ("spring.active_coils", SIZED),
    ("spring.free_length", SIZED),
    ("spring.shear_modulus", SIZED),
    ("requirements", &["rate", "load", "free_length", "solid_length", "hysteresis", "set", "straightness",
        "outside_diameter", "inside_diameter", "wire_diameter"]),
    ("requirements.rate", LIMIT),
    ("requirements.load", &["at_length", "nominal", "tolerance", "plus", "minus", "minimum", "maximum", "standard", "class"]),
    ("requirements.free_length", LIMIT),
    ("requirements.solid_length", LIMIT),
    ("requirements.hysteresis", LIMIT),
    ("requirements.set", LIMIT),
    ("requirements.straightness", LIMIT),
    ("requirements.outside_diameter", LIMIT),
    ("requirements.inside_diameter", LIMIT),
    ("requirements.wire_diameter", LIMIT),
    ("rate_test", &["window", "full_load", "stroke", "method"]),
    ("rate_test.window", &["from", "to", "of"]),
    ("acceptance", &["rule", "guard", "undecided_springs", "plan"]),
    ("acceptance.plan", &["by", "level", "aql", "state", "reduced", "table", "designed", "limiting_quality", "consumer_risk"]),
    ("acceptance.plan.designed", &["p1", "alpha", "p2", "beta"]),
    ("acceptance.plan.aql", &["critical", "major", "minor"]),
];

/// One spring or a set of springs that share the load.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Arrangement {
    /// One spring.
    Single,
    /// Springs one inside the other, of equal free length.
    Nested,
}

/// A drawing, opened and free of faults.
#[derive(Clone, Debug)]
pub struct Drawing {
    /// The file.
    pub input: InputFile,
    /// Units the file is written in.
    pub units: System,
    /// Number.
    pub number: String,
    /// Revision.
    pub revision: Option<String>,
    /// Title.
    pub title: Option<String>,
    /// Arrangement.
    pub arrangement: Arrangement,
    /// The springs.
    pub members: Vec<Member>,
    /// What is required, rate first, loads from the longest length down.
    pub requirements: Vec<Requirement>,
    /// The rate test.
    pub rate_test: RateTest,
    /// The acceptance terms; `None` where the drawing states none (theory needs none).
    pub acceptance: Option<Acceptance>,
    /// What the drawn spring should do.
    pub theory: Theory,
}

/// Opens the drawing at `path`, written as `as_written`.
///
/// # Errors
/// A report of every fault in the file, or why theory has no answer.
pub fn open(path: &Path, as_written: &str) -> miette::Result<Drawing> {
    let source = Source::open(path, as_written)?;
    let input = source.input("drawing");
    let drawing = read_toml(&source, KEYS, |root| read(root, &input))?;
    Ok(drawing)
}

fn read(root: Table<'_>, input: &InputFile) -> Option<Drawing> {
    let units = read_units(root)?;
    let head = root.table("drawing");
    let number = head.required_text("number", "write the drawing's number under [drawing]");
    let arrangement = read_arrangement(head);
    let members = read_members(root, arrangement, units);
    let requirements = read_requirements(root.table("requirements"), units, arrangement);
    let rate_test = read_rate_test(root.table("rate_test"), units.length(), units.force());
    let terms = root.table("acceptance");
    let acceptance = if terms.is_present() {
        Some(read_acceptance(terms)?)
    } else {
        None
    };
    let (members, requirements, rate_test) = (members?, requirements?, rate_test?);
    let free = members.first()?.free.nominal;
    let theory = match theory(&members, free) {
        Ok(theory) => theory,
        Err(fault) => {
            let help = miette::Diagnostic::help(&fault)
                .map(|help| help.to_string())
                .unwrap_or_default();
            root.tables("spring")
                .first()?
                .fault(&root.place("spring"), fault.to_string(), help);
            return None;
        }
    };
    check_lengths(
        root,
        &requirements,
        &rate_test,
        units.length(),
        free,
        theory.solid.get(),
    );
    check_classes(root, &requirements, acceptance.as_ref());
    Some(Drawing {
        input: input.clone(),
        units,
        number: number?,
        revision: head.text("revision"),
        title: head.text("title"),
        arrangement: arrangement?,
        members,
        requirements,
        rate_test,
        acceptance,
        theory,
    })
}

/// Reads the `units` key that every file may state.
pub fn read_units(root: Table<'_>) -> Option<System> {
    if root.has("units") {
        root.word("units", &[("mm-N", System::MmN), ("in-lbf", System::InLbf)])
    } else {
        Some(System::MmN)
    }
}

fn read_arrangement(head: Table<'_>) -> Option<Arrangement> {
    if !head.has("arrangement") {
        return Some(Arrangement::Single);
    }
    let words = [
        ("single", Some(Arrangement::Single)),
        ("nested", Some(Arrangement::Nested)),
        ("stacked", None),
    ];
    let found = head.word("arrangement", &words)?;
    if found.is_none() {
        head.fault(
            &head.place("arrangement"),
            "stacked springs are not yet judged by this version",
            "write \"single\" or \"nested\"",
        );
    }
    found
}

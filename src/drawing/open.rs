//! Opens a drawing file: every fault of meaning at once, each with its place.

use std::path::Path;

use crate::material::{self, OwnTable};
use crate::spring::{Arrangement, Member, Theory, theory};
use crate::standard::Standard;
use crate::text::{InputFile, Keys, Source, Table, beside, read_toml};
use crate::units::System;

use super::by_standard::{Ruling, Springs};
use super::limits::Requirement;
use super::read_member::{Given, read_members};
use super::read_terms::{read_acceptance, read_rate_test};
use super::requirements::{check_classes, check_lengths, read_requirements};
use super::service::{Service, read_service};
use super::stages::check_stages;
use super::terms::{Acceptance, RateTest};

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
const RULED: &[&str] = &["nominal", "tolerance", "standard"];

/// The keys a drawing may hold.
#[rustfmt::skip] // keeps the list a list
pub const KEYS: Keys = &[
    ("", &["units", "drawing", "spring", "requirements", "rate_test", "acceptance", "service"]),
    ("drawing", &["number", "revision", "title", "arrangement", "materials", "tolerances_by"]),
    ("spring", &["name", "wire_diameter", "outside_diameter", "mean_diameter", "inside_diameter", "active_coils",
        "total_coils", "ends", "free_length", "material", "shear_modulus", "shear_modulus_source", "hand", "coiled"]),
    ("spring.wire_diameter", SIZED),
    ("spring.outside_diameter", RULED),
    ("spring.mean_diameter", RULED),
    ("spring.inside_diameter", RULED),
    ("spring.active_coils", SIZED),
    ("spring.free_length", RULED),
    ("spring.shear_modulus", SIZED),
    ("requirements", &["rate", "knee", "load", "free_length", "solid_length", "hysteresis", "set", "straightness",
        "outside_diameter", "inside_diameter", "wire_diameter", "squareness", "parallelism"]),
    ("requirements.rate", &["stage", "between", "nominal", "tolerance", "plus", "minus", "minimum", "maximum", "standard", "class"]),
    ("requirements.knee", &["number", "at_length", "tolerance", "plus", "minus", "minimum", "maximum", "class"]),
    ("requirements.load", &["at_length", "nominal", "tolerance", "plus", "minus", "minimum", "maximum", "standard", "class"]),
    ("requirements.free_length", LIMIT),
    ("requirements.solid_length", LIMIT),
    ("requirements.hysteresis", LIMIT),
    ("requirements.set", LIMIT),
    ("requirements.straightness", LIMIT),
    ("requirements.outside_diameter", LIMIT),
    ("requirements.inside_diameter", LIMIT),
    ("requirements.wire_diameter", LIMIT),
    ("requirements.squareness", LIMIT),
    ("requirements.parallelism", LIMIT),
    ("rate_test", &["window", "full_load", "stroke", "method"]),
    ("rate_test.window", &["from", "to", "of"]),
    ("service", &["load", "temperature", "frequency", "seating", "peened", "set_removed"]),
    ("service.load", &["from", "to"]),
    ("acceptance", &["rule", "guard", "undecided_springs", "plan"]),
    ("acceptance.plan", &["by", "level", "aql", "state", "reduced", "table", "designed", "limiting_quality", "consumer_risk"]),
    ("acceptance.plan.designed", &["p1", "alpha", "p2", "beta"]),
    ("acceptance.plan.aql", &["critical", "major", "minor"]),
];

/// A drawing, opened and free of faults.
#[derive(Clone, Debug)]
pub struct Drawing {
    /// The file.
    pub input: InputFile,
    /// The user's own table of materials, where the drawing names one.
    pub materials: Option<InputFile>,
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
    /// What the drawing says of service.
    pub service: Service,
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
    // A fault in the table of materials is shown in that file, and before what the drawing makes of it.
    let mut own_fault = None;
    let drawing = read_toml(&source, KEYS, |root| {
        let own = match read_own(root, &source) {
            Ok(own) => own,
            Err(fault) => {
                own_fault = Some(fault);
                return None;
            }
        };
        read(root, &input, own)
    });
    match own_fault {
        Some(fault) => Err(fault),
        None => Ok(drawing?),
    }
}

/// The user's own table of materials, where the drawing names one.
fn read_own(root: Table<'_>, source: &Source) -> miette::Result<Option<OwnTable>> {
    let Some(written) = root.table("drawing").raw_text("materials") else {
        return Ok(None);
    };
    material::open_own(&beside(&source.path, &written.value), &written.value).map(Some)
}

fn read(root: Table<'_>, input: &InputFile, own: Option<OwnTable>) -> Option<Drawing> {
    let units = read_units(root)?;
    let head = root.table("drawing");
    let number = head.required_text("number", "write the drawing's number under [drawing]");
    let arrangement = read_arrangement(head);
    let general = if head.has("tolerances_by") {
        Some(head.word("tolerances_by", &Standard::WORDS)?)
    } else {
        None
    };
    let given = Given {
        units,
        own: own.as_ref(),
        general,
    };
    let members = read_members(root, arrangement, given);
    let ruling = Ruling {
        general,
        springs: Springs::of(members.as_deref()),
        rate_required: root.table("requirements").has("rate"),
    };
    let requirements = read_requirements(root.table("requirements"), units, arrangement, &ruling);
    let rate_test = read_rate_test(root.table("rate_test"), units.length(), units.force());
    let service = read_service(root.table("service"), units);
    let terms = root.table("acceptance");
    let acceptance = if terms.is_present() {
        Some(read_acceptance(terms)?)
    } else {
        None
    };
    let (members, requirements, rate_test) = (members?, requirements?, rate_test?);
    let theory = read_theory(root, &members, arrangement?)?;
    check_lengths(
        root,
        &requirements,
        &rate_test,
        units.length(),
        theory.free.get(),
        theory.solid.get(),
    );
    check_classes(root, &requirements, acceptance.as_ref());
    let judged = acceptance.is_some();
    check_stages(root, &requirements, &rate_test, &theory, judged);
    Some(Drawing {
        input: input.clone(),
        materials: own.map(|table| table.input),
        units,
        number: number?,
        revision: head.text("revision"),
        title: head.text("title"),
        arrangement: arrangement?,
        members,
        requirements,
        rate_test,
        acceptance,
        service: service?,
        theory,
    })
}

fn read_theory(root: Table<'_>, members: &[Member], arrangement: Arrangement) -> Option<Theory> {
    let fault = match theory(members, arrangement) {
        Ok(theory) => return Some(theory),
        Err(fault) => fault,
    };
    let help = miette::Diagnostic::help(&fault)
        .map(|help| help.to_string())
        .unwrap_or_default();
    root.tables("spring")
        .first()?
        .fault(&root.place("spring"), fault.to_string(), help);
    None
}

/// Reads the `units` key that every file may state.
pub fn read_units(root: Table<'_>) -> Option<System> {
    root.system()
}

fn read_arrangement(head: Table<'_>) -> Option<Arrangement> {
    if !head.has("arrangement") {
        return Some(Arrangement::Single);
    }
    let words = [
        ("single", Arrangement::Single),
        ("nested", Arrangement::Nested),
        ("stacked", Arrangement::Stacked),
    ];
    head.word("arrangement", &words)
}

//! Opens a drawing file: every fault of meaning at once, each with its place.

use std::path::Path;

use crate::text::{InputFile, Keys, Source, Table, read_toml};
use crate::units::System;

use super::limits::Requirement;
use super::material::{FAMILIES, SHEAR_SPREAD, Shear, family};
use super::requirements::{check_classes, check_lengths, read_requirements};
use super::terms::{Acceptance, RateTest, read_acceptance, read_rate_test};
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
    ("acceptance.plan", &["by", "level", "aql", "state"]),
    ("acceptance.plan.aql", &["critical", "major", "minor"]),
];

/// A drawn size with its symmetric tolerance (0 where none is stated), in mm or coils.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sized {
    /// Nominal value.
    pub nominal: f64,
    /// Half-width of the tolerance.
    pub tolerance: f64,
}

/// Which coil diameter the drawing gives, in mm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Coil {
    /// De.
    Outside(Sized),
    /// D.
    Mean(Sized),
    /// Di.
    Inside(Sized),
}

impl Coil {
    /// The diameter as drawn.
    pub const fn sized(self) -> Sized {
        match self {
            Self::Outside(sized) | Self::Mean(sized) | Self::Inside(sized) => sized,
        }
    }
}

/// How the ends are made.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ends {
    /// Plain.
    Open,
    /// Plain, ground.
    OpenGround,
    /// Closed, not ground.
    Closed,
    /// Closed and ground.
    ClosedGround,
}

/// One spring or a set of springs that share the load.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Arrangement {
    /// One spring.
    Single,
    /// Springs one inside the other, of equal free length.
    Nested,
}

/// One spring of the drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Member {
    /// Its name.
    pub name: String,
    /// Wire diameter d.
    pub wire: Sized,
    /// Coil diameter as drawn.
    pub coil: Coil,
    /// Active coils n.
    pub active: Sized,
    /// Total coils nt.
    pub total: f64,
    /// Ends.
    pub ends: Ends,
    /// Free length L0.
    pub free: Sized,
    /// Shear modulus.
    pub shear: Shear,
}

impl Member {
    /// Mean coil diameter D in mm.
    pub const fn mean_coil(&self) -> f64 {
        match self.coil {
            Coil::Outside(outside) => outside.nominal - self.wire.nominal,
            Coil::Mean(mean) => mean.nominal,
            Coil::Inside(inside) => inside.nominal + self.wire.nominal,
        }
    }
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

fn read_members(
    root: Table<'_>,
    arrangement: Option<Arrangement>,
    units: System,
) -> Option<Vec<Member>> {
    let tables = root.tables("spring");
    let wanted = match arrangement? {
        Arrangement::Single => tables.len() == 1,
        Arrangement::Nested => tables.len() >= 2,
    };
    if !wanted {
        let what = format!(
            "{} [[spring]] tables do not fit this arrangement",
            tables.len()
        );
        root.fault(
            &root.place("spring"),
            what,
            "a single spring has one [[spring]] table, a nested set one for each member",
        );
        return None;
    }
    let read: Vec<Option<Member>> = tables
        .iter()
        .enumerate()
        .map(|(place, table)| read_member(*table, place, units))
        .collect();
    let members: Vec<Member> = read.into_iter().collect::<Option<_>>()?;
    let free = members.first()?.free.nominal;
    for (member, table) in members.iter().zip(&tables) {
        if (member.free.nominal - free).abs() > 1e-9 {
            table.fault(
                &table.place("free_length"),
                "later-engaging nested sets are not yet judged by this version",
                "all members must have the same nominal free length",
            );
        }
    }
    Some(members)
}

fn read_member(table: Table<'_>, place: usize, units: System) -> Option<Member> {
    let length = units.length();
    let wire = read_sized(table, "wire_diameter", length, 0.0);
    let coil = read_coil(table, length);
    let active = read_sized(table, "active_coils", 1.0, 0.25); // ±0.25 coil unless given: JIS B 2704-2
    let total = table.positive("total_coils");
    if total.is_none() && !table.has("total_coils") {
        table.missing(
            "total_coils",
            "write the number of all coils, dead end coils included",
        );
    }
    if !table.has("ends") {
        table.missing("ends", "write open, open ground, closed or closed ground");
    }
    let ends = table.word(
        "ends",
        &[
            ("open", Ends::Open),
            ("open ground", Ends::OpenGround),
            ("closed", Ends::Closed),
            ("closed ground", Ends::ClosedGround),
        ],
    );
    let free = read_sized(table, "free_length", length, 0.0);
    let shear = read_shear(table, units);
    let member = Member {
        name: table
            .text("name")
            .unwrap_or_else(|| format!("spring {}", place + 1)),
        wire: wire?,
        coil: coil?,
        active: active?,
        total: total?.value,
        ends: ends?,
        free: free?,
        shear: shear?,
    };
    if member.mean_coil() <= member.wire.nominal {
        let what = format!(
            "the mean coil diameter {:.3} mm is not larger than the wire",
            member.mean_coil()
        );
        table.fault(
            &table.span(),
            what,
            "check which diameter is meant: outside, mean or inside",
        );
        return None;
    }
    if member.total < member.active.nominal {
        table.fault(
            &table.place("total_coils"),
            "there are fewer total coils than active ones",
            "total_coils counts the end coils too",
        );
        return None;
    }
    Some(member)
}

fn read_sized(table: Table<'_>, key: &str, scale: f64, tolerance: f64) -> Option<Sized> {
    if !table.has(key) {
        table.missing(
            key,
            format!("write {key} = 3.20 or {key} = {{ nominal = 3.20, tolerance = 0.03 }}"),
        );
        return None;
    }
    if !table.is_table(key) {
        return table.positive(key).map(|number| Sized {
            nominal: number.value * scale,
            tolerance,
        });
    }
    let inner = table.table(key);
    if !inner.has("nominal") {
        inner.missing("nominal", "write nominal = …");
    }
    let nominal = inner.positive("nominal")?.value * scale;
    let tolerance = if inner.is_text("tolerance") {
        inner
            .share("tolerance")
            .map(|share| share.value * nominal)?
    } else {
        inner
            .not_negative("tolerance")
            .map_or(tolerance, |number| number.value * scale)
    };
    if tolerance >= nominal {
        inner.fault(
            &inner.place("tolerance"),
            "the tolerance is not smaller than the value",
            "check the tolerance",
        );
        return None;
    }
    Some(Sized { nominal, tolerance })
}

fn read_coil(table: Table<'_>, length: f64) -> Option<Coil> {
    type Make = fn(Sized) -> Coil;
    let ways: [(&str, Make); 3] = [
        ("outside_diameter", Coil::Outside),
        ("mean_diameter", Coil::Mean),
        ("inside_diameter", Coil::Inside),
    ];
    let mut given = ways.iter().filter(|(key, _)| table.has(key));
    match (given.next(), given.next()) {
        (Some((key, make)), None) => read_sized(table, key, length, 0.0).map(make),
        _ => {
            let help = "write exactly one of outside_diameter, mean_diameter, inside_diameter; it is never guessed";
            table.fault(
                &table.span(),
                "the coil diameter is stated in no way or in two ways",
                help,
            );
            None
        }
    }
}

fn read_shear(table: Table<'_>, units: System) -> Option<Shear> {
    if table.has("shear_modulus") {
        if table.has("material") {
            table.fault(
                &table.place("shear_modulus"),
                "both material and shear_modulus are stated",
                "write one of them",
            );
            return None;
        }
        let source = table.required_text(
            "shear_modulus_source",
            "say where the shear modulus comes from: a certificate, a standard, a test",
        );
        let stated = read_sized(table, "shear_modulus", units.stress(), f64::NAN)?;
        let spread = if stated.tolerance.is_nan() {
            SHEAR_SPREAD
        } else {
            stated.tolerance / stated.nominal
        };
        return Some(Shear {
            modulus: stated.nominal,
            spread,
            material: "stated G".to_owned(),
            source: source?,
        });
    }
    let written = table.required_text(
        "material",
        "write material = \"EN 10270-1 SH\", or shear_modulus = … with its source",
    )?;
    let Some(found) = family(&written) else {
        let known: Vec<&str> = FAMILIES.iter().map(|family| family.name).collect();
        let help = format!(
            "known: {}; or write shear_modulus = … with its source",
            known.join(", ")
        );
        table.fault(
            &table.place("material"),
            format!("the material \"{written}\" is not in the table"),
            help,
        );
        return None;
    };
    Some(Shear {
        modulus: found.shear,
        spread: SHEAR_SPREAD,
        material: written,
        source: found.source.to_owned(),
    })
}

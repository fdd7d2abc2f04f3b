//! The user's own table of materials, a TOML file that the drawing names under `[drawing] materials`.

use std::path::Path;

use crate::text::{InputFile, Keys, Source, Table, read_toml};
use crate::units::System;

use super::families::{FAMILIES, Kind};
use super::find::{Material, PerKelvin, SHEAR_SPREAD, Strength};

/// The keys such a file may hold.
#[rustfmt::skip] // keeps the list a list
pub const OWN_KEYS: Keys = &[
    ("", &["units", "material"]),
    ("material", &["name", "kind", "shear_modulus", "youngs_modulus", "density", "temperature_coefficient", "source", "minimum_strength"]),
    ("material.shear_modulus", &["nominal", "tolerance"]),
    ("material.minimum_strength", &["up_to_diameter", "strength"]),
];

const KINDS: [(&str, Kind); 6] = [
    ("cold drawn", Kind::ColdDrawn),
    ("hardened and tempered", Kind::Tempered),
    ("hot rolled", Kind::HotRolled),
    ("austenitic", Kind::Austenitic),
    ("precipitation hardening", Kind::Precipitation),
    ("non-ferrous", Kind::NonFerrous),
];

/// One material of the user's own.
#[derive(Clone, Debug)]
pub struct Own {
    /// Its name, whole.
    pub name: String,
    shear: f64,
    spread: f64,
    source: String,
    young: Option<f64>,
    density: Option<f64>,
    per_kelvin: Option<PerKelvin>,
    kind: Option<Kind>,
    /// (largest wire diameter, Rm), growing diameters.
    strength: Vec<(f64, f64)>,
}

/// The user's own table.
#[derive(Clone, Debug)]
pub struct OwnTable {
    /// The file.
    pub input: InputFile,
    /// Its materials.
    pub materials: Vec<Own>,
}

impl OwnTable {
    /// The material of exactly this name, at wire d (mm).
    pub(super) fn find(&self, written: &str, wire: f64) -> Option<Material> {
        let own = self
            .materials
            .iter()
            .find(|one| one.name == written.trim())?;
        let step = own
            .strength
            .iter()
            .find(|(up_to, _)| wire <= up_to * (1.0 + 1e-9));
        let strength = match step {
            Some((_, minimum)) => Strength::Known {
                minimum: *minimum,
                source: own.source.clone(),
            },
            None => Strength::Unknown(format!(
                "`{}` gives no strength for {} at this wire diameter",
                self.input.path, own.name
            )),
        };
        Some(Material {
            name: own.name.clone(),
            shear: own.shear,
            spread: own.spread,
            source: own.source.clone(),
            others: None,
            young: own.young,
            density: own.density,
            per_kelvin: own.per_kelvin,
            kind: own.kind,
            strength,
        })
    }
}

/// Opens the table at `path`, written as `as_written`.
///
/// # Errors
/// A report of every fault in the file.
pub fn open_own(path: &Path, as_written: &str) -> miette::Result<OwnTable> {
    let source = Source::open(path, as_written)?;
    let materials = read_toml(&source, OWN_KEYS, |root| {
        let units = root.system();
        let tables = root.tables("material");
        if tables.is_empty() {
            root.missing("material", "write one [[material]] for each material");
        }
        let units = units?;
        let read: Vec<Option<Own>> = tables.iter().map(|table| one(*table, units)).collect();
        let materials: Vec<Own> = read.into_iter().collect::<Option<_>>()?;
        twice(&tables, &materials);
        Some(materials)
    })?;
    Ok(OwnTable {
        input: source.input("materials"),
        materials,
    })
}

/// Two meanings for one name are refused.
fn twice(tables: &[Table<'_>], materials: &[Own]) {
    for (place, (own, table)) in materials.iter().zip(tables).enumerate() {
        let before = materials
            .iter()
            .take(place)
            .any(|other| other.name == own.name);
        let built_in = FAMILIES.iter().any(|family| family.name == own.name);
        if before || built_in {
            let where_else = if before {
                "above"
            } else {
                "in the built-in table"
            };
            table.fault(
                &table.place("name"),
                format!("the material \"{}\" stands {where_else} already", own.name),
                "give it a name of its own, so that a drawing can mean only one",
            );
        }
    }
}

fn one(table: Table<'_>, units: System) -> Option<Own> {
    let name = table.required_text(
        "name",
        "write the name drawings use: name = \"Works wire 7\"",
    );
    let source = table.required_text(
        "source",
        "say where the figures come from: a certificate, a standard, a test",
    );
    let shear = shear(table, units.stress());
    let kind = if table.has("kind") {
        Some(table.word("kind", &KINDS)?)
    } else {
        None
    };
    let stress = |key: &str| {
        table
            .positive(key)
            .map(|number| number.value * units.stress())
    };
    let per_kelvin = table.not_negative("temperature_coefficient");
    let strength = strength(table, units);
    let (shear, spread) = shear?;
    Some(Own {
        name: name?,
        shear,
        spread,
        source: source?,
        young: stress("youngs_modulus"),
        density: table.positive("density").map(|number| number.value),
        per_kelvin: per_kelvin.map(|at| PerKelvin {
            value: at.value,
            other: at.value,
        }),
        kind,
        strength: strength?,
    })
}

/// G and its relative half-width.
fn shear(table: Table<'_>, scale: f64) -> Option<(f64, f64)> {
    if !table.has("shear_modulus") {
        table.missing(
            "shear_modulus",
            "write shear_modulus = 80000, or { nominal = 80000, tolerance = 800 }",
        );
        return None;
    }
    if !table.is_table("shear_modulus") {
        let stated = table.positive("shear_modulus")?.value * scale;
        return Some((stated, SHEAR_SPREAD));
    }
    let inner = table.table("shear_modulus");
    if !inner.has("nominal") {
        inner.missing("nominal", "write nominal = …");
    }
    let nominal = inner.positive("nominal")?.value * scale;
    if !inner.has("tolerance") {
        return Some((nominal, SHEAR_SPREAD));
    }
    let spread = if inner.is_text("tolerance") {
        inner.share("tolerance")?.value
    } else {
        inner.not_negative("tolerance")?.value * scale / nominal
    };
    if spread >= 1.0 {
        inner.fault(
            &inner.place("tolerance"),
            "the tolerance is not smaller than the value",
            "check the tolerance",
        );
        return None;
    }
    Some((nominal, spread))
}

fn strength(table: Table<'_>, units: System) -> Option<Vec<(f64, f64)>> {
    let mut steps: Vec<(f64, f64)> = Vec::new();
    for row in table.tables("minimum_strength") {
        for key in ["up_to_diameter", "strength"] {
            if !row.has(key) {
                row.missing(
                    key,
                    "write { up_to_diameter = 4.0, strength = 1500 } for each step",
                );
            }
        }
        let up_to = row.positive("up_to_diameter")?.value * units.length();
        let strength = row.positive("strength")?.value * units.stress();
        if steps.last().is_some_and(|(before, _)| up_to <= *before) {
            row.fault(
                &row.place("up_to_diameter"),
                "the wire diameters do not grow from step to step",
                "write the steps from thin to thick wire",
            );
            return None;
        }
        steps.push((up_to, strength));
    }
    Some(steps)
}

//! Reads `[[spring]]`: geometry and material.

use crate::formula::{Ends, Forming};
use crate::material::{self, Kind, Material, OwnTable};
use crate::spring::{Arrangement, Coil, Hand, Member, Sized};
use crate::standard::Standard;
use crate::text::Table;
use crate::units::System;

use super::by_standard::sizes;

const ENDS: [(&str, Ends); 4] = [
    ("open", Ends::Open),
    ("open ground", Ends::OpenGround),
    ("closed", Ends::Closed),
    ("closed ground", Ends::ClosedGround),
];

/// What the rest of the drawing says of its springs.
#[derive(Clone, Copy)]
pub(super) struct Given<'a> {
    /// Units of the file.
    pub units: System,
    /// The user's own table of materials.
    pub own: Option<&'a OwnTable>,
    /// The standard for what has no tolerance of its own.
    pub general: Option<Standard>,
}

/// Reads `[[spring]]`.
pub(super) fn read_members(
    root: Table<'_>,
    arrangement: Option<Arrangement>,
    given: Given<'_>,
) -> Option<Vec<Member>> {
    let tables = root.tables("spring");
    let wanted = match arrangement? {
        Arrangement::Single => tables.len() == 1,
        Arrangement::Nested | Arrangement::Stacked => tables.len() >= 2,
    };
    if !wanted {
        let what = format!(
            "{} [[spring]] tables do not fit this arrangement",
            tables.len()
        );
        root.fault(
            &root.place("spring"),
            what,
            "a single spring has one [[spring]] table, a nested set or a stack one for each member",
        );
        return None;
    }
    let read: Vec<Option<Member>> = tables
        .iter()
        .enumerate()
        .map(|(place, table)| read_member(*table, place, given))
        .collect();
    read.into_iter().collect()
}

fn read_member(table: Table<'_>, place: usize, given: Given<'_>) -> Option<Member> {
    let Given {
        units,
        own,
        general,
    } = given;
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
    let ends = table.word("ends", &ENDS);
    let free = read_sized(table, "free_length", length, 0.0);
    let material = read_material(table, units, wire.map(|wire| wire.nominal), own);
    let hand = read_hand(table);
    let forming = read_forming(table, material.as_ref());
    let mut member = Member {
        name: table
            .text("name")
            .unwrap_or_else(|| format!("spring {}", place + 1)),
        wire: wire?,
        coil: coil?,
        active: active?,
        total: total?.value,
        ends: ends?,
        forming: forming?,
        hand,
        free: free?,
        material: material?,
    };
    if !sound(table, &member) {
        return None;
    }
    sizes(table, &mut member, general)?;
    Some(member)
}

/// Notes what cannot be a spring.
fn sound(table: Table<'_>, member: &Member) -> bool {
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
        return false;
    }
    if member.total < member.active.nominal {
        table.fault(
            &table.place("total_coils"),
            "there are fewer total coils than active ones",
            "total_coils counts the end coils too",
        );
        return false;
    }
    true
}

/// `None` where nothing is said; a wrong word is noted.
fn read_hand(table: Table<'_>) -> Option<Hand> {
    table.word("hand", &[("right", Hand::Right), ("left", Hand::Left)])
}

/// Cold unless stated, or unless the material is hot-rolled bar.
fn read_forming(table: Table<'_>, material: Option<&Material>) -> Option<Forming> {
    if table.has("coiled") {
        return table.word("coiled", &[("cold", Forming::Cold), ("hot", Forming::Hot)]);
    }
    let hot = material.is_some_and(|material| material.kind == Some(Kind::HotRolled));
    Some(if hot { Forming::Hot } else { Forming::Cold })
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
    if let (Some((key, make)), None) = (given.next(), given.next()) {
        return read_sized(table, key, length, 0.0).map(make);
    }
    let help = "write exactly one of outside_diameter, mean_diameter, inside_diameter; it is never guessed";
    table.fault(
        &table.span(),
        "the coil diameter is stated in no way or in two ways",
        help,
    );
    None
}

/// The material as written, at this wire diameter, or a stated shear modulus.
fn read_material(
    table: Table<'_>,
    units: System,
    wire: Option<f64>,
    own: Option<&OwnTable>,
) -> Option<Material> {
    if table.has("shear_modulus") {
        return read_stated(table, units);
    }
    let written = table.required_text(
        "material",
        "write material = \"EN 10270-1 SH\", or shear_modulus = … with its source",
    )?;
    let found = material::find(&written, wire?, own);
    if found.is_none() {
        let help = format!(
            "known: {}; or a table of your own under [drawing] materials, or shear_modulus = … with its source",
            material::known(own).join(", ")
        );
        table.fault(
            &table.place("material"),
            format!("the material \"{written}\" is not in the table"),
            help,
        );
    }
    found
}

fn read_stated(table: Table<'_>, units: System) -> Option<Material> {
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
    let spread = stated.tolerance / stated.nominal;
    let spread = (!spread.is_nan()).then_some(spread);
    Some(material::stated(stated.nominal, spread, source?))
}

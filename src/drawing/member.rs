//! One spring of a drawing: geometry and material.

use crate::text::Table;
use crate::units::System;

use super::material::{FAMILIES, SHEAR_SPREAD, Shear, family};
use super::open::Arrangement;

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

pub(super) fn read_members(
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

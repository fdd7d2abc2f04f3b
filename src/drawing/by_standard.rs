//! Limits that a standard gives where the drawing names one. What the drawing states itself wins.

use crate::formula::{Forming, rate};
use crate::quantity::Quantity;
use crate::spring::{Coil, Member, Sized};
use crate::standard::{Drawn, Found, OutOfRange, Standard, Toleranced};
use crate::text::Table;

use super::limits::Limits;

/// What limits may be ruled by.
pub(super) struct Ruling {
    /// The standard the drawing names for everything that has no limits of its own.
    pub general: Option<Standard>,
    /// The springs.
    pub springs: Springs,
    /// Whether the drawing requires a rate.
    pub rate_required: bool,
}

/// What a standard could rule.
pub(super) enum Springs {
    /// One spring.
    One(Drawn),
    /// A set, which no standard tolerances.
    Several,
    /// The springs have faults of their own, which are noted already.
    Unknown,
}

impl Springs {
    /// Of the springs as read.
    pub(super) fn of(members: Option<&[Member]>) -> Self {
        match members {
            Some([member]) => drawn(member).map_or(Self::Unknown, Self::One),
            Some(_) => Self::Several,
            None => Self::Unknown,
        }
    }
}

/// Keys that state limits outright.
const OUTRIGHT: [&str; 5] = ["tolerance", "plus", "minus", "minimum", "maximum"];

/// The spring as a standard looks at it.
fn drawn(member: &Member) -> Option<Drawn> {
    let (wire, coil, active) = (
        member.wire.nominal,
        member.mean_coil(),
        member.active.nominal,
    );
    Some(Drawn {
        wire,
        coil,
        active,
        free: member.free.nominal,
        rate: rate(wire, coil, active, member.material.shear)?.get(),
        ends: member.ends,
        cold: member.forming == Forming::Cold,
    })
}

impl Ruling {
    /// Whether a standard rules the limits in this table.
    pub(super) fn rules(&self, table: Table<'_>) -> bool {
        table.has("standard")
            || (self.general.is_some() && !OUTRIGHT.iter().any(|key| table.has(key)))
    }

    /// The limits that the standard gives, and its words; every fault is noted in the table.
    pub(super) fn limits(
        &self,
        table: Table<'_>,
        quantity: Quantity,
        scale: f64,
    ) -> Option<(Limits, String)> {
        let standard = self.standard(table)?;
        let jis = matches!(standard, Standard::Jis2704(_));
        if jis && self.rate_required && quantity.at_length().is_some() {
            table.fault(
                &table.place("standard"),
                "JIS B 2704-2 gives loads no tolerance where a rate is specified",
                "write the load’s tolerance itself, or require no rate",
            );
            return None;
        }
        let upper_only = matches!(quantity, Quantity::Squareness | Quantity::Parallelism);
        let nominal = table.number("nominal").map(|number| number.value * scale);
        if nominal.is_none() && !upper_only {
            if !table.has("nominal") {
                table.missing("nominal", "a standard’s tolerance needs the nominal value");
            }
            return None;
        }
        let found = self.found(
            table,
            standard,
            toleranced(quantity, nominal.unwrap_or(0.0)),
        )?;
        let half = found.half_width;
        let limits = Limits {
            nominal,
            lower: nominal.map(|nominal| nominal - half),
            upper: Some(nominal.unwrap_or(0.0) + half),
        };
        Some((limits, found.source))
    }

    fn standard(&self, table: Table<'_>) -> Option<Standard> {
        if !table.has("standard") {
            return self.general;
        }
        if OUTRIGHT.iter().any(|key| table.has(key)) {
            table.fault(
                &table.span(),
                "a limit is stated and left to a standard at once",
                "write the tolerance, or the standard",
            );
            return None;
        }
        table.word("standard", &Standard::WORDS)
    }

    fn found(&self, table: Table<'_>, standard: Standard, what: Toleranced) -> Option<Found> {
        match &self.springs {
            Springs::One(spring) => noted(table, standard.half_width(spring, what)),
            Springs::Unknown => None,
            Springs::Several => {
                table.fault(
                    &table.place("standard"),
                    "a standard’s tolerance is that of one spring, and this drawing has several",
                    "write the limits themselves",
                );
                None
            }
        }
    }
}

fn noted(table: Table<'_>, found: Result<Found, OutOfRange>) -> Option<Found> {
    match found {
        Ok(found) => Some(found),
        Err(why) => {
            let help = "write the limit itself: tolerance = …, or minimum and maximum";
            table.fault(&table.place("standard"), why.to_string(), help);
            None
        }
    }
}

const fn toleranced(quantity: Quantity, nominal: f64) -> Toleranced {
    match quantity {
        Quantity::LoadAt(length) => Toleranced::Load {
            nominal,
            length: length.get(),
        },
        Quantity::Rate | Quantity::RateOf(_) => Toleranced::Rate(nominal),
        Quantity::FreeLength => Toleranced::FreeLength,
        Quantity::OutsideDiameter | Quantity::InsideDiameter => Toleranced::CoilDiameter,
        Quantity::Squareness => Toleranced::Squareness,
        Quantity::Parallelism => Toleranced::Parallelism,
        other => Toleranced::Other(other.title()),
    }
}

/// Gives coil diameter and free length of a `[[spring]]` the tolerances of a standard: the one named there, or the general
/// one where nothing is stated.
pub(super) fn sizes(
    table: Table<'_>,
    member: &mut Member,
    general: Option<Standard>,
) -> Option<()> {
    let coil = match member.coil {
        Coil::Outside(_) => "outside_diameter",
        Coil::Mean(_) => "mean_diameter",
        Coil::Inside(_) => "inside_diameter",
    };
    let spring = drawn(member)?;
    let of = |key: &str, what: Toleranced| -> Option<Option<f64>> {
        let inner = if table.is_table(key) {
            Some(table.table(key))
        } else {
            None
        };
        let named = inner.filter(|inner| inner.has("standard"));
        let stated = inner.is_some_and(|inner| inner.has("tolerance"));
        if let Some(inner) = named {
            if stated {
                inner.fault(
                    &inner.span(),
                    "a tolerance is stated and left to a standard at once",
                    "write the tolerance, or the standard",
                );
                return None;
            }
            let standard = inner.word("standard", &Standard::WORDS)?;
            return noted(inner, standard.half_width(&spring, what))
                .map(|found| Some(found.half_width));
        }
        match general {
            Some(standard) if !stated => {
                noted(table, standard.half_width(&spring, what)).map(|found| Some(found.half_width))
            }
            _ => Some(None),
        }
    };
    let (across, free) = (
        of(coil, Toleranced::CoilDiameter),
        of("free_length", Toleranced::FreeLength),
    );
    let sized = |sized: Sized, half: Option<f64>| Sized {
        tolerance: half.unwrap_or(sized.tolerance),
        ..sized
    };
    let across = across?;
    member.coil = match member.coil {
        Coil::Outside(drawn) => Coil::Outside(sized(drawn, across)),
        Coil::Mean(drawn) => Coil::Mean(sized(drawn, across)),
        Coil::Inside(drawn) => Coil::Inside(sized(drawn, across)),
    };
    member.free = sized(member.free, free?);
    Some(())
}

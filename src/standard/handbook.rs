//! Machinery's Handbook, 31st ed., tables 8, 10 and 11, for springs coiled cold with squared (closed) and ground ends.

use super::Found;
use super::en15800::{Drawn, OutOfRange, Toleranced, shown};
use super::handbook_tables::{Cell, TABLE_8, TABLE_10, TABLE_11};
use crate::formula::Ends;

pub(super) const NAME: &str = "Machinery's Handbook";
/// Millimetres in an inch.
const INCH: f64 = 25.4;
/// Shorter springs have the length tolerance of this free length, in (below table 8).
const SHORTEST: f64 = 0.5;
/// Ends that are not ground have so many times the length tolerance (below table 8).
const NOT_GROUND: f64 = 1.7;
/// A size converted from millimetres may miss a bound by rounding.
const ROUNDING: f64 = 1e-9;

/// The half-width (or largest value) that the tables give; between printed cells what lies straight between them, over the
/// deflection along its reciprocal.
///
/// # Errors
/// [`OutOfRange`] outside the printed tables, or for what they do not tolerance.
pub(super) fn handbook(spring: &Drawn, what: Toleranced) -> Result<Found, OutOfRange> {
    if !spring.cold {
        return Err(OutOfRange::NotCold { standard: NAME });
    }
    let nothing = |what, why| OutOfRange::Nothing {
        standard: NAME,
        what,
        why,
    };
    let tables = " in tables 8, 10 and 11, which are all that is held here";
    let (half_width, table, between) = match what {
        Toleranced::FreeLength => {
            let (inches, between) = free_length(spring)?;
            (inches * INCH, "table 8", between)
        }
        Toleranced::Load { nominal, length } => {
            squared_and_ground(spring, "the load")?;
            let (share, between) = load(spring, (spring.free - length) / INCH)?;
            (share * nominal.abs(), "tables 8 and 11", between)
        }
        Toleranced::Squareness => {
            squared_and_ground(spring, "squareness")?;
            let slender = within("L0/D", spring.free / spring.coil, (0.5, 12.0))?;
            let cell = TABLE_10.at(slender, index(spring)?);
            let Cell { value, between } = cell.ok_or_else(|| nothing("squareness", ""))?;
            (spring.free * value.to_radians().tan(), "table 10", between)
        }
        Toleranced::Rate(_) => return Err(nothing("the rate", tables)),
        Toleranced::CoilDiameter => return Err(nothing("the coil diameter", tables)),
        Toleranced::Parallelism => return Err(nothing("parallelism", tables)),
        Toleranced::Other(name) => return Err(nothing(name, tables)),
    };
    let note = if between { " (interpolated)" } else { "" };
    Ok(Found {
        half_width,
        source: format!("{NAME}, 31st ed., {table}{note}"),
    })
}

fn within(what: &'static str, value: f64, (from, to): (f64, f64)) -> Result<f64, OutOfRange> {
    if value >= from * (1.0 - ROUNDING) && value <= to * (1.0 + ROUNDING) {
        Ok(value)
    } else {
        Err(OutOfRange::of(NAME, what, value, (from, to)))
    }
}

fn index(spring: &Drawn) -> Result<f64, OutOfRange> {
    within("index w", spring.index(), (4.0, 16.0))
}

fn squared_and_ground(spring: &Drawn, what: &'static str) -> Result<(), OutOfRange> {
    if spring.ends == Ends::ClosedGround {
        return Ok(());
    }
    Err(OutOfRange::Nothing {
        standard: NAME,
        what,
        why: " of ends that are not closed and ground",
    })
}

/// ± inch of the free length, and whether it lies between printed cells.
fn free_length(spring: &Drawn) -> Result<(f64, bool), OutOfRange> {
    let refused = |why| OutOfRange::Nothing {
        standard: NAME,
        what: "the free length",
        why,
    };
    let ground = match spring.ends {
        Ends::ClosedGround => 1.0,
        Ends::Closed => NOT_GROUND,
        Ends::Open | Ends::OpenGround => return Err(refused(" of ends that are not closed")),
    };
    let free = spring.free / INCH;
    let coils = within(
        "active coils for each inch of free length",
        spring.active / free,
        (0.5, 20.0),
    )?;
    let cell = TABLE_8.at(coils, index(spring)?);
    let Cell { value, between } = cell.ok_or_else(|| refused(""))?;
    Ok((value * free.max(SHORTEST) * ground, between))
}

/// The tolerance of a load `deflection` inches from the free length, as a share of it.
fn load(spring: &Drawn, deflection: f64) -> Result<(f64, bool), OutOfRange> {
    let (length, by_table_8) = free_length(spring)?;
    let cell = TABLE_11
        .at(length, deflection)
        .ok_or_else(|| OutOfRange::NotPrinted {
            standard: NAME,
            deflection: shown(deflection),
            length: shown(length),
        })?;
    Ok((cell.value / 100.0, cell.between || by_table_8))
}

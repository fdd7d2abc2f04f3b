//! JIS B 2704-2 (2018), cold-formed compression springs.

use super::Found;
use super::en15800::{Drawn, Grade, OutOfRange, Toleranced};

const NAME: &str = "JIS B 2704-2";
/// A size converted from inches may miss a bound by rounding.
const ROUNDING: f64 = 1e-9;

/// Load at a length and rate, ± share by grade: 3 to 10 active coils, and more.
const FEW_COILS: [f64; 3] = [0.05, 0.10, 0.15];
const MANY_COILS: [f64; 3] = [0.04, 0.08, 0.12];

/// One stretch of the index: its upper end (included), ± share by grade, and at least so many mm.
struct Row {
    up_to: f64,
    share: [f64; 3],
    least: [f64; 3],
}

#[rustfmt::skip] // keeps the table a table
const FREE: [Row; 3] = [
    Row { up_to: 8.0, share: [0.010, 0.020, 0.030], least: [0.2, 0.5, 0.7] },
    Row { up_to: 15.0, share: [0.015, 0.030, 0.040], least: [0.6, 0.7, 0.8] }, // older editions: at least 0.3 in grade 1
    Row { up_to: 22.0, share: [0.020, 0.040, 0.060], least: [0.6, 0.8, 1.0] },
];
#[rustfmt::skip] // keeps the table a table
const COIL: [Row; 2] = [
    Row { up_to: 8.0, share: [0.010, 0.015, 0.025], least: [0.15, 0.2, 0.4] },
    Row { up_to: 15.0, share: [0.015, 0.020, 0.030], least: [0.2, 0.3, 0.5] },
];
/// Side lean at no load as a share of the free length.
const LEAN: [f64; 3] = [0.02, 0.05, 0.08];

/// The half-width (or largest value) that JIS B 2704-2 gives; of the coil diameter as a share of D.
///
/// # Errors
/// [`OutOfRange`] outside the standard's ranges, or for what it does not tolerance.
pub(super) fn jis2704(grade: Grade, spring: &Drawn, what: Toleranced) -> Result<Found, OutOfRange> {
    if !spring.cold {
        return Err(OutOfRange::NotCold { standard: NAME });
    }
    let nothing = |what| OutOfRange::Nothing {
        standard: NAME,
        what,
        why: "",
    };
    let half_width = match what {
        Toleranced::Load { nominal, .. } | Toleranced::Rate(nominal) => {
            by_coils(grade, spring)? * nominal.abs()
        }
        Toleranced::FreeLength => by_index(&FREE, grade, spring, spring.free)?,
        Toleranced::CoilDiameter => by_index(&COIL, grade, spring, spring.coil)?,
        Toleranced::Squareness => grade.of(LEAN) * spring.free,
        Toleranced::Parallelism => return Err(nothing("parallelism")),
        Toleranced::Other(name) => return Err(nothing(name)),
    };
    Ok(Found {
        half_width,
        source: format!("{NAME} grade {}", grade.number()),
    })
}

fn by_coils(grade: Grade, spring: &Drawn) -> Result<f64, OutOfRange> {
    if spring.active < 3.0 * (1.0 - ROUNDING) {
        return Err(OutOfRange::of(
            NAME,
            "active coils n",
            spring.active,
            (3.0, f64::INFINITY),
        ));
    }
    Ok(grade.of(if spring.active <= 10.0 * (1.0 + ROUNDING) {
        FEW_COILS
    } else {
        MANY_COILS
    }))
}

fn by_index(rows: &[Row], grade: Grade, spring: &Drawn, size: f64) -> Result<f64, OutOfRange> {
    let index = spring.index();
    let most = rows.last().map_or(0.0, |row| row.up_to);
    let row = rows
        .iter()
        .find(|row| index <= row.up_to * (1.0 + ROUNDING));
    match row {
        Some(row) if index >= 3.0 * (1.0 - ROUNDING) => {
            Ok((grade.of(row.share) * size).max(grade.of(row.least)))
        }
        _ => Err(OutOfRange::of(NAME, "index w", index, (3.0, most))),
    }
}

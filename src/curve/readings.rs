//! A spring of which only loads at a few lengths are known: its readings, longest length first.

use crate::export::RawCurve;
use crate::rig::{Means, Rig};

use super::error::CurveError;
use super::site::Site;

/// Two lengths nearer than this are one, mm: what turning units leaves behind, never a step of a scale.
pub const SAME_LENGTH: f64 = 1e-6;

/// A load at a length.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PointReading {
    /// Length as indicated, mm.
    pub length: f64,
    /// Load, N.
    pub load: f64,
}

/// One spring's readings.
#[derive(Clone, Debug, PartialEq)]
pub struct Readings {
    /// The spring.
    pub id: String,
    /// The export, as written.
    pub export: String,
    /// First and last line of the spring in the export.
    pub lines: (u64, u64),
    /// The readings, longest length first; two at least.
    pub readings: Vec<PointReading>,
}

/// The readings of one spring's rows.
///
/// # Errors
/// [`CurveError`] where they are no spring's: fewer than two, one length read twice, a load that does not rise.
pub fn readings(raw: &RawCurve, rig: &Rig) -> Result<Readings, CurveError> {
    let last_row = raw.load.len().saturating_sub(1);
    let site = Site {
        raw,
        last: raw.line(last_row),
    };
    let lengths: Vec<f64> = site.travel(Means::Length)?.iter().map(|u| -u).collect();
    let mut readings = pairs(&lengths, &raw.load);
    let further = rig.dialect.rarer.length_columns().iter().skip(1);
    for (column, loads) in further.zip(&raw.beside) {
        readings.extend(pairs(&vec![column.length; loads.len()], loads));
    }
    readings.sort_by(|a, b| b.length.total_cmp(&a.length));
    if readings.len() < 2 {
        return Err(site.one_reading());
    }
    let contact = rig.contact_load.get();
    let (mut lowest, mut highest) = (f64::INFINITY, f64::NEG_INFINITY);
    let mut before: Option<PointReading> = None;
    for one in &readings {
        if before.is_some_and(|before| before.length - one.length <= SAME_LENGTH) {
            return Err(site.length_twice(one.length));
        }
        if highest - one.load > contact {
            return Err(site.load_falls_at(one.length, highest - one.load));
        }
        (lowest, highest) = (lowest.min(one.load), highest.max(one.load));
        before = Some(*one);
    }
    if highest <= contact {
        return Err(site.no_contact(highest - lowest, contact));
    }
    Ok(Readings {
        id: raw.id.clone(),
        export: raw.export.clone(),
        lines: (raw.first_line, site.last),
        readings,
    })
}

fn pairs(lengths: &[f64], loads: &[f64]) -> Vec<PointReading> {
    let both = lengths.iter().zip(loads);
    both.map(|(length, load)| PointReading {
        length: *length,
        load: *load,
    })
    .collect()
}

//! Loads at a few lengths of one spring, measured; what tells copies of such tables from chance.

use std::collections::HashSet;
use std::hash::{DefaultHasher, Hasher};

use crate::characteristic::{MeasureError, measure_points};
use crate::curve::{Kept, KeptPoint, PointReading, SAME_LENGTH, readings};
use crate::drawing::Way;
use crate::export::RawCurve;

use super::read::{How, Reading};

/// So many loads of two exports never agree digit for digit by chance; fewer may, loads come in steps.
const NO_CHANCE: usize = 10;

/// Measures one spring of which loads were read at a few lengths.
///
/// # Errors
/// [`MeasureError`] where they are no spring's.
pub(super) fn reading(raw: &RawCurve, how: How<'_>) -> Result<Reading, MeasureError> {
    let setup = how.setup;
    let of = readings(raw, setup.rig)?;
    let caliper = how
        .caliper
        .get(&raw.identity)
        .map_or(how.of_all, Vec::as_slice);
    let measurement = measure_points(setup, &of, caliper)?;
    let touched = |one: &&PointReading| one.load > setup.rig.contact_load.get();
    let mut touching = of.readings.iter().filter(touched);
    let plain_rate = touching
        .next()
        .zip(touching.next_back())
        .map(|(long, short)| (short.load - long.load) / (long.length - short.length));
    let widen =
        |(low, high): (f64, f64), one: &PointReading| (low.min(one.load), high.max(one.load));
    let none = (f64::INFINITY, f64::NEG_INFINITY);
    let kept = how.keep.for_archive.then(|| Kept {
        id: of.id.clone(),
        export: of.export.clone(),
        origin: measurement.origin,
        points: kept_points(&of.readings, measurement.read_between),
    });
    Ok(Reading {
        id: of.id,
        export: of.export,
        lines: of.lines,
        fingerprint: fingerprint(&of.readings),
        short_strokes: 0,
        plain_rate,
        zero_read: false,
        loads: of.readings.iter().fold(none, widen),
        strokes: 0,
        odd: Vec::new(),
        measurement,
        reduced: None,
        kept,
    })
}

/// The readings as an archive keeps points; those the rate is drawn from are in its window.
fn kept_points(of: &[PointReading], between: Option<(f64, f64)>) -> Vec<KeptPoint> {
    let ends = |one: &PointReading| {
        between.is_some_and(|(longer, shorter)| {
            [longer, shorter]
                .iter()
                .any(|end| (one.length - end).abs() <= SAME_LENGTH)
        })
    };
    of.iter()
        .map(|one| KeptPoint {
            stroke: Way::Loading,
            in_window: ends(one),
            u: -one.length,
            load: one.load,
        })
        .collect()
}

fn fingerprint(of: &[PointReading]) -> u64 {
    let mut hasher = DefaultHasher::new();
    for one in of {
        hasher.write_u64(one.length.to_bits());
        hasher.write_u64(one.load.to_bits());
    }
    hasher.finish()
}

/// Two springs may well share three loads in every digit; two exports of many readings do not. So a reading's
/// fingerprint becomes that of its whole export, or of its name where the export holds too few to tell.
pub(super) fn tell_apart(batch: &mut [Result<Reading, MeasureError>]) {
    let points: Vec<&mut Reading> = batch
        .iter_mut()
        .filter_map(|one| one.as_mut().ok())
        .filter(|one| one.is_points())
        .collect();
    let different: HashSet<u64> = points.iter().map(|one| one.fingerprint).collect();
    let mut whole = DefaultHasher::new();
    for one in &points {
        whole.write_u64(one.fingerprint);
    }
    for (place, one) in points.into_iter().enumerate() {
        let mut hasher = whole.clone();
        hasher.write_usize(place);
        if different.len() < NO_CHANCE / 2 {
            hasher.write(one.export.as_bytes());
        }
        one.fingerprint = hasher.finish();
    }
}

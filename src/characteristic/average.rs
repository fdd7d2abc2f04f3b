//! Repeated measurements of one spring as one.

use crate::stats::StatsError;

use super::budget::{Estimate, combine};
use super::measure::{Characteristic, Measured, Measurement};

/// The characteristics of repeated measurements of one spring, averaged one by one. A characteristic that one of
/// them lacks is averaged over the others.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub fn average(measurements: &[&Measurement]) -> Result<Vec<Characteristic>, StatsError> {
    let Some(first) = measurements.first() else {
        return Ok(Vec::new());
    };
    let mut averaged = Vec::new();
    for (place, characteristic) in first.characteristics.iter().enumerate() {
        let all = || {
            measurements
                .iter()
                .filter_map(|one| one.characteristics.get(place))
                .map(|one| &one.measured)
        };
        let values: Vec<Estimate> = all()
            .filter_map(|one| {
                if let Measured::Value(estimate) = one {
                    Some(estimate.clone())
                } else {
                    None
                }
            })
            .collect();
        let measured = match combine(&values)? {
            Some(estimate) => Measured::Value(estimate),
            None => lowest(all()).unwrap_or_else(|| characteristic.measured.clone()),
        };
        averaged.push(Characteristic {
            quantity: characteristic.quantity,
            measured,
        });
    }
    Ok(averaged)
}

/// Of several bounds from above, the lowest.
fn lowest<'a>(all: impl Iterator<Item = &'a Measured>) -> Option<Measured> {
    let bounds = all.filter_map(|one| {
        if let Measured::Below(estimate) = one {
            Some(estimate)
        } else {
            None
        }
    });
    bounds
        .min_by(|a, b| a.value.total_cmp(&b.value))
        .map(|estimate| Measured::Below(estimate.clone()))
}

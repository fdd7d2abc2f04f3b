//! Which measurement of a study is whose.

use std::collections::BTreeMap;
use std::path::Path;

use crate::bench::Observation;
use crate::characteristic::Measured;
use crate::export::read_small;
use crate::intake::{Assigned, Belongs, StudyFile, natural_order};
use crate::quantity::Quantity;
use crate::text::InputFile;

use super::super::read::Reading;
use super::error::RigJobError;

/// A measurement and where it belongs.
pub(super) struct Placed {
    pub(super) reading: Reading,
    pub(super) belongs: Belongs,
}

/// Every measurement with its part, operator and trial, in natural order of these.
pub(super) fn placed(
    file: &StudyFile,
    readings: Vec<Reading>,
    inputs: &mut Vec<InputFile>,
) -> Result<Vec<Placed>, RigJobError> {
    for (place, one) in readings.iter().enumerate() {
        if readings.iter().take(place).any(|other| other.id == one.id) {
            return Err(RigJobError::Twice {
                measurement: one.id.clone(),
            });
        }
    }
    let mut placed = Vec::new();
    match &file.assigned {
        Assigned::Names(names) => {
            for reading in readings {
                let belongs = names.read(&reading.id).ok_or_else(|| RigJobError::Name {
                    measurement: reading.id.clone(),
                })?;
                placed.push(Placed { reading, belongs });
            }
        }
        Assigned::Table((written, path)) => {
            let mut rows = table(path, written, inputs)?;
            for reading in readings {
                let belongs = rows
                    .remove(&reading.id)
                    .ok_or_else(|| RigJobError::Unassigned {
                        measurement: reading.id.clone(),
                    })?;
                placed.push(Placed { reading, belongs });
            }
            if let Some(measurement) = rows.into_keys().next() {
                return Err(RigJobError::NoMeasurement { measurement });
            }
        }
    }
    placed.sort_by(|a, b| {
        let (a, b) = (&a.belongs, &b.belongs);
        natural_order(&a.operator, &b.operator)
            .then_with(|| natural_order(&a.part, &b.part))
            .then_with(|| natural_order(&a.trial, &b.trial))
    });
    Ok(placed)
}

/// The table of the study: what belongs where, by measurement.
fn table(
    path: &Path,
    written: &str,
    inputs: &mut Vec<InputFile>,
) -> Result<BTreeMap<String, Belongs>, RigJobError> {
    let table = read_small(path, written).map_err(|fault| RigJobError::Export(Box::new(fault)))?;
    let wanted: Vec<&str> = table.header.iter().map(String::as_str).collect();
    let operators = match wanted.as_slice() {
        ["measurement", "part", "operator", "trial"] => true,
        ["measurement", "part", "trial"] => false,
        _ => {
            return Err(RigJobError::Columns {
                name: table.name.clone(),
                found: table.header.join(", "),
            });
        }
    };
    inputs.push(InputFile {
        role: "study table".to_owned(),
        path: table.name.clone(),
        sha256: table.sha256.clone(),
    });
    let mut rows = BTreeMap::new();
    for (_, cells) in table.rows {
        let mut cells = cells.into_iter();
        let mut next = || cells.next().unwrap_or_default();
        let (measurement, part) = (next(), next());
        let operator = if operators { next() } else { String::new() };
        let belongs = Belongs {
            part,
            operator,
            trial: next(),
        };
        if rows.insert(measurement.clone(), belongs).is_some() {
            return Err(RigJobError::Twice { measurement });
        }
    }
    Ok(rows)
}

/// The observations of one value of each measurement.
///
/// # Errors
/// The measurements that have none.
pub(super) fn laid_out(
    placed: &[Placed],
    of: impl Fn(&Reading) -> Option<f64>,
) -> Result<Vec<Observation>, Vec<String>> {
    let mut missing = Vec::new();
    let mut found = Vec::new();
    for one in placed {
        match of(&one.reading) {
            Some(value) => found.push(Observation {
                part: one.belongs.part.clone(),
                operator: one.belongs.operator.clone(),
                trial: one.belongs.trial.clone(),
                value,
            }),
            None => missing.push(one.reading.id.clone()),
        }
    }
    if missing.is_empty() {
        Ok(found)
    } else {
        Err(missing)
    }
}

pub(super) fn value_of(reading: &Reading, quantity: Quantity) -> Option<f64> {
    let all = &reading.measurement.characteristics;
    match &all.iter().find(|one| one.quantity == quantity)?.measured {
        Measured::Value(estimate) => Some(estimate.value),
        Measured::Below(_) | Measured::Absent(_) => None,
    }
}

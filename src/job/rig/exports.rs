//! Reads the exports of a check or a study.

use crate::intake::Export;
use crate::record::LedgerFacts;
use crate::text::InputFile;

use super::super::read::{How, Reading, read};
use super::super::threads::side_by_side;
use super::error::RigJobError;

/// Faults of exports shown at once.
const SHOWN: usize = 20;

/// The files read and their row ledgers.
#[derive(Default)]
pub(super) struct Sources {
    pub(super) inputs: Vec<InputFile>,
    pub(super) ledgers: Vec<LedgerFacts>,
}

/// Every measurement of some exports, in their order; no two of them alike in every digit.
///
/// # Errors
/// Every fault of the exports, or of the first measurement that is no spring's.
pub(super) fn measurements(
    exports: &[Export],
    how: How<'_>,
    sources: &mut Sources,
) -> Result<Vec<Reading>, RigJobError> {
    let mut readings = Vec::new();
    let mut faults = Vec::new();
    for batch in side_by_side(exports, |export| read(export, how)) {
        match batch {
            Ok(batch) => {
                readings.extend(batch.readings);
                sources.inputs.push(batch.input);
                sources.ledgers.push(batch.ledger);
            }
            Err(fault) => faults.push(fault),
        }
    }
    if let [_, _, ..] = faults.as_slice() {
        let count = faults.len();
        faults.truncate(SHOWN);
        return Err(RigJobError::Exports {
            count,
            shown: faults,
        });
    }
    if let Some(fault) = faults.pop() {
        return Err(RigJobError::Export(Box::new(fault)));
    }
    let readings: Result<Vec<Reading>, _> = readings.into_iter().collect();
    let readings = readings.map_err(|fault| RigJobError::Measure(Box::new(fault)))?;
    refuse_copies(&readings)?;
    Ok(readings)
}

fn refuse_copies(readings: &[Reading]) -> Result<(), RigJobError> {
    for (place, one) in readings.iter().enumerate() {
        let mut before = readings.iter().take(place);
        if let Some(same) = before.find(|other| other.fingerprint == one.fingerprint) {
            return Err(RigJobError::SamePoints {
                first: same.id.clone(),
                first_export: same.export.clone(),
                second: one.id.clone(),
                second_export: one.export.clone(),
            });
        }
    }
    Ok(())
}

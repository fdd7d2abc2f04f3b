//! The files of a lot, opened and held against each other.

use std::path::Path;

use crate::doubt::lengths;
use crate::drawing::{self, Drawing, Requirement};
use crate::intake::{self, Caliper, Lot, read_findings};
use crate::quantity::Quantity;
use crate::rig::{self, Rig};
use crate::text::{Fault, Faults, Place};

use super::error::{AcceptError, Forwarded};
use super::group::{self, Spring};

/// The files of a lot, opened.
pub(super) struct Files {
    pub(super) lot: Lot,
    pub(super) drawing: Drawing,
    pub(super) rig: Rig,
    pub(super) caliper: Caliper,
}

/// Opens the lot file and all it names.
///
/// # Errors
/// Every fault of the files that could be read, together.
pub(super) fn open(path: &Path, as_written: &str) -> miette::Result<Files> {
    let lot = intake::open(path, as_written)?;
    let (drawing, rig) = match (
        drawing::open(&lot.drawing.1, &lot.drawing.0),
        rig::open(&lot.rig.1, &lot.rig.0),
    ) {
        (Ok(drawing), Ok(rig)) => (drawing, rig),
        (Err(one), Err(other)) => {
            return Err(AcceptError::Files {
                faults: vec![Forwarded(one), Forwarded(other)],
            }
            .into());
        }
        (Err(fault), _) | (_, Err(fault)) => return Err(fault),
    };
    check_requirements(&lot, &drawing)?;
    let caliper = match &lot.findings_file {
        Some((written, path)) => read_findings(path, written, &lot.caliper)?,
        None => Caliper::default(),
    };
    Ok(Files {
        lot,
        drawing,
        rig,
        caliper,
    })
}

/// The drawing must state terms and require something that is inspected; what is not inspected must be required.
fn check_requirements(lot: &Lot, drawing: &Drawing) -> miette::Result<()> {
    let file = || drawing.input.path.clone();
    if drawing.acceptance.is_none() {
        return Err(AcceptError::NoTerms { drawing: file() }.into());
    }
    if drawing.requirements.is_empty() {
        return Err(AcceptError::NoRequirements { drawing: file() }.into());
    }
    for left_out in &lot.not_inspected {
        if !drawing
            .requirements
            .iter()
            .any(|one| one.quantity == left_out.quantity)
        {
            let place = Place::in_text(&lot.source.name, &lot.source.text, left_out.span.clone());
            let fault = Fault::new(
                "the drawing does not require this",
                "name a requirement of the drawing; a load with its length",
                Some(place),
            );
            return Err(Faults::new(&lot.source.name, vec![fault]).into());
        }
    }
    let inspected = |one: &Requirement| {
        !lot.not_inspected
            .iter()
            .any(|left_out| left_out.quantity == one.quantity)
    };
    if !drawing.requirements.iter().any(inspected) {
        return Err(AcceptError::NothingInspected.into());
    }
    Ok(())
}

/// Every row of the caliper findings must belong to a spring, and no column may lie off the drawing by what only a mistake of
/// units explains.
pub(super) fn check_findings(files: &Files, springs: &[Spring]) -> Result<(), AcceptError> {
    let caliper = &files.caliper;
    let known = |id: &String| springs.iter().any(|spring| spring.id == group::printed(id));
    if let Some(id) = caliper.springs.keys().find(|id| !known(id)) {
        return Err(AcceptError::UnknownFinding {
            spring: group::printed(id),
            known: group::known(springs),
        });
    }
    let by_caliper = files
        .drawing
        .requirements
        .iter()
        .filter(|one| one.quantity.by_caliper() || one.quantity == Quantity::FreeLength);
    for requirement in by_caliper {
        let quantity = requirement.quantity;
        let found = caliper.springs.values().flatten();
        let values: Vec<f64> = found
            .filter(|(of, _)| *of == quantity)
            .map(|(_, value)| *value)
            .collect();
        let doubt = requirement
            .limits
            .nominal
            .and_then(|nominal| lengths(&values, nominal));
        if let Some((ratio, finding)) = doubt {
            return Err(AcceptError::FindingUnits {
                column: quantity.name(),
                ratio,
                finding,
            });
        }
    }
    Ok(())
}

//! The run of plate on plate: read, fitted, held against the rig file.

use crate::bench::{Frame, Plates, frame};
use crate::export::{BLOCK_BYTES, RawCurve};
use crate::intake::Export;
use crate::record::{FrameFacts, GivePoint, LackFacts};
use crate::rig::{Change, Compliance, Give, Rig};
use crate::text::{Alphabet, InputFile, printable};
use crate::units::{Finite, Millimetres, Newtons};

use super::super::accept::figures::budget;
use super::super::facts::figure;
use super::super::read::ledger;
use super::error::RigJobError;
use super::exports::Sources;

/// Reads the run and fits it.
///
/// # Errors
/// [`RigJobError`] where the export is not as the rig file says, or no frame's.
pub(super) fn measure(
    export: &Export,
    rig: &Rig,
    sources: &mut Sources,
) -> Result<Frame, RigJobError> {
    if rig.dialect.rarer.points.is_some() {
        return Err(RigJobError::PlatesAsPoints {
            export: printable(&export.written, &Alphabet::Any),
        });
    }
    let mut curves: Vec<RawCurve> = Vec::new();
    let mut each = |more: Vec<RawCurve>| curves.extend(more);
    let read = crate::export::read(
        &export.path,
        &export.written,
        &rig.dialect,
        BLOCK_BYTES,
        &mut each,
    );
    let read = read.map_err(|fault| RigJobError::Export(Box::new(fault)))?;
    let shown = printable(&export.written, &Alphabet::Any);
    sources.inputs.push(InputFile {
        role: "plates".to_owned(),
        path: shown.clone(),
        sha256: read.sha256,
    });
    sources.ledgers.push(ledger(shown.clone(), &read.ledger));
    let [curve] = curves.as_slice() else {
        return Err(RigJobError::PlatesOfMany {
            export: shown,
            found: curves.len(),
        });
    };
    let run = Plates {
        load: &curve.load,
        travel: &curve.travel,
    };
    Ok(frame(run, rig)?)
}

/// What goes into the rig file; `None` where the run cannot say how well it knows it.
pub(super) fn change(frame: &Frame) -> Option<Change> {
    let sum = frame.compliance.uncertainty?;
    Some(Change::Compliance {
        give: frame.give.clone(),
        standard: sum.expanded / 2.0,
    })
}

/// The frame as the record tells it.
///
/// # Errors
/// [`RigJobError::NotFinite`] where a figure is not.
pub(super) fn facts(frame: &Frame, rig: &Rig) -> Result<FrameFacts, RigJobError> {
    let missing = || RigJobError::NotFinite { of: "frame" };
    let sum = frame.compliance.uncertainty;
    let (low, high) = frame.loads;
    let between = |give: &Give| give.at(high) - give.at(low);
    let measured = between(&frame.give);
    let e_n = |stated: f64, standard: f64| {
        let reach = high - low;
        let measured_u = sum?.standard;
        figure((measured - stated) / (2.0 * reach * measured_u.hypot(standard)))
    };
    let (stated, e_n) = match &rig.frame {
        Compliance::Measured { give, standard } => {
            (Some(between(give)), e_n(between(give), *standard))
        }
        Compliance::NotCorrected { .. } | Compliance::DeclaredNegligible => (None, None),
    };
    let newtons = |value: f64| Newtons::try_from(value).map_err(|_| missing());
    let millimetres = |value: f64| Millimetres::try_from(value).map_err(|_| missing());
    Ok(FrameFacts {
        compliance_mm_per_n: figure(frame.compliance.value).ok_or_else(missing)?,
        standard_uncertainty_mm_per_n: sum.and_then(|sum| figure(sum.standard)),
        expanded_uncertainty_mm_per_n: sum.and_then(|sum| figure(sum.expanded)),
        coverage_factor: sum.and_then(|sum| figure(sum.factor)),
        from_n: newtons(low)?,
        to_n: newtons(high)?,
        passes: u32::try_from(frame.passes).unwrap_or(u32::MAX),
        readings: frame.points as u64,
        lack_of_fit: frame.lack.as_ref().and_then(|lack| {
            Some(LackFacts {
                f: figure(lack.f)?,
                p: figure(lack.p)?,
                bend_percent: lack.bend.and_then(|bend| figure(100.0 * bend))?,
                warns: matches!(frame.give, Give::Table(_)),
            })
        }),
        departure_mm: millimetres(frame.departure)?,
        table: table(&frame.give),
        stated_give_mm: stated.map(millimetres).transpose()?,
        measured_give_mm: millimetres(measured)?,
        e_n,
        budget: budget(&frame.compliance),
    })
}

fn table(give: &Give) -> Option<Vec<GivePoint>> {
    let Give::Table(points) = give else {
        return None;
    };
    let row = |(load, give): &(f64, f64)| {
        Some(GivePoint {
            load_n: Newtons::try_from(*load).ok()?,
            give_mm: Millimetres::try_from(*give).ok()?,
        })
    };
    points.iter().map(row).collect()
}

/// Whether the frame contradicts the rig file.
pub(super) fn differs(facts: &FrameFacts) -> Option<Finite> {
    facts.e_n.filter(|e_n| e_n.get().abs() > 1.0)
}

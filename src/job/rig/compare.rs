//! The reference spring: measured, averaged, compared.

use std::collections::BTreeMap;

use crate::bench::{Certified, Comparison, compare};
use crate::characteristic::{Characteristic, Estimate, Measured, Measurement, Setup, average};
use crate::curve::{Bounds, WindowOf};
use crate::drawing::{Method, Stroke, Way};
use crate::intake::{CertifiedValue, CheckFile, ReferenceCheck, ReferenceSpring};
use crate::quantity::Quantity;
use crate::record::{Caution, ComparisonFacts, ReferenceFacts};
use crate::rig::{Means, Rig};
use crate::units::Finite;

use super::super::accept::figures::budget;
use super::super::facts::figure;
use super::super::read::{How, Keep, Reading};
use super::error::RigJobError;
use super::exports::{Sources, measurements};
use super::tolerances::Tightest;

/// The window of the rate where the certificate states no lengths: as `rate` has it without a drawing.
const WINDOW: (f64, f64) = (0.3, 0.7);

/// What the reference spring says.
pub(super) struct Compared {
    pub(super) comparisons: Vec<ComparisonFacts>,
    pub(super) facts: ReferenceFacts,
    pub(super) cautions: Vec<Caution>,
}

/// Whether the bench can be checked on this quantity at all: where the export gives deflections, lengths hang on the
/// certified free length itself, which would then be compared with itself.
pub(super) fn checked(rig: &Rig, of: &CertifiedValue) -> bool {
    rig.means != Means::Deflection || of.quantity != Quantity::FreeLength
}

/// Measures and compares.
///
/// # Errors
/// A report where an export or a figure cannot be used.
pub(super) fn compared(
    file: &CheckFile,
    check: &ReferenceCheck,
    rig: &Rig,
    tightest: &Tightest,
    sources: &mut Sources,
) -> miette::Result<Compared> {
    let spring = &check.spring;
    let values: Vec<&CertifiedValue> = spring
        .values
        .iter()
        .filter(|one| checked(rig, one))
        .collect();
    let wanted: Vec<Quantity> = values.iter().map(|one| one.quantity).collect();
    let readings = read(file, check, rig, &wanted, sources)?;
    let all: Vec<&Measurement> = readings.iter().map(|one| &one.measurement).collect();
    let averaged = average(&all).map_err(RigJobError::from)?;
    let mut comparisons = Vec::new();
    for one in values {
        let measured = averaged.iter().find(|found| found.quantity == one.quantity);
        let allowed = tightest.half(one).map(|half| half * file.share);
        let each = |reading: &Measurement| {
            let mut all = reading.characteristics.iter();
            all.find(|found| found.quantity == one.quantity)
                .map(|found| found.measured.clone())
        };
        let each: Vec<Measured> = all.iter().filter_map(|reading| each(reading)).collect();
        comparisons.push(comparison(one, measured, &each, allowed)?);
    }
    Ok(Compared {
        comparisons,
        facts: ReferenceFacts {
            certificate: spring.certificate.clone(),
            calibrated: spring
                .calibrated
                .map(|(on, until)| format!("{on} … {until}")),
            measurements: u32::try_from(readings.len()).unwrap_or(u32::MAX),
            window: window_words(spring),
        },
        cautions: cautions(spring, rig, &readings),
    })
}

fn read(
    file: &CheckFile,
    check: &ReferenceCheck,
    rig: &Rig,
    wanted: &[Quantity],
    sources: &mut Sources,
) -> Result<Vec<Reading>, RigJobError> {
    let spring = &check.spring;
    let free = spring
        .values
        .iter()
        .find(|one| one.quantity == Quantity::FreeLength && rig.means == Means::Deflection);
    let own: Vec<(Quantity, f64)> = free
        .map(|free| (free.quantity, free.value))
        .into_iter()
        .collect();
    let standard: Vec<(&'static str, f64)> = free
        .map(|free| (free.quantity.name(), free.standard))
        .into_iter()
        .collect();
    let setup = Setup {
        rig,
        conditions: file.conditions,
        bounds: window(spring),
        stroke: Stroke {
            index: None,
            way: Way::Loading,
        },
        method: Method::Fit,
        full_load: None,
        wanted,
        stages: &[],
        caliper: &standard,
    };
    let how = How {
        setup: &setup,
        caliper: &BTreeMap::new(),
        of_all: &own,
        keep: Keep::default(),
        block_bytes: None,
    };
    measurements(&check.exports, how, sources)
}

fn window(spring: &ReferenceSpring) -> Bounds {
    match spring.between {
        Some((from, to)) => Bounds {
            of: WindowOf::Length,
            from,
            to,
        },
        None => Bounds {
            of: WindowOf::Travel,
            from: WINDOW.0,
            to: WINDOW.1,
        },
    }
}

fn window_words(spring: &ReferenceSpring) -> String {
    match spring.between {
        Some((from, to)) => format!("between the lengths {from} and {to} mm, as certified"),
        None => "30 to 70 % of the travel from contact to the greatest compression; the certificate states no lengths"
            .to_owned(),
    }
}

fn comparison(
    of: &CertifiedValue,
    measured: Option<&Characteristic>,
    each: &[Measured],
    allowed: Option<f64>,
) -> Result<ComparisonFacts, RigJobError> {
    let missing = || RigJobError::NotFinite {
        of: "reference spring",
    };
    let absent = Measured::Absent(crate::characteristic::Absence::NotMeasured);
    let measured = measured.map_or(&absent, |one| &one.measured);
    let certified = Certified {
        quantity: of.quantity,
        value: of.value,
        standard: of.standard,
    };
    let each: Vec<Comparison> = each
        .iter()
        .map(|one| compare(&certified, one, None))
        .collect();
    let found = compare(&certified, measured, allowed).beside(&each);
    let estimate: Option<&Estimate> = match measured {
        Measured::Value(estimate) => Some(estimate),
        Measured::Below(_) | Measured::Absent(_) => None,
    };
    let optional = |value: Option<f64>| value.and_then(figure);
    let stated = |value: f64| -> Result<Finite, RigJobError> { figure(value).ok_or_else(missing) };
    Ok(ComparisonFacts {
        name: of.quantity.name().to_owned(),
        at_length_mm: of.quantity.at_length(),
        unit: of.quantity.unit(),
        reference: stated(of.value)?,
        reference_expanded_uncertainty: stated(found.reference_expanded)?,
        value: optional(estimate.map(|one| one.value)),
        expanded_uncertainty: optional(found.expanded),
        error: optional(found.error),
        e_n: optional(found.e_n),
        allowed_error: optional(found.allowed),
        smallest_error_shown: optional(found.shows),
        finding: found.finding,
        reason: match measured {
            Measured::Absent(why) => Some(why.into()),
            Measured::Below(_) => None,
            Measured::Value(one) => one
                .uncertainty
                .is_none()
                .then_some(crate::record::Reason::UncertaintyUnknown),
        },
        budget: estimate.map_or(Vec::new(), budget),
    })
}

/// What the readings make necessary to say: loads outside the range of the force scale, strokes left out, no zero.
fn cautions(spring: &ReferenceSpring, rig: &Rig, readings: &[Reading]) -> Vec<Caution> {
    let mut found = Vec::new();
    let least = rig.force.usable_from();
    let mut loads = spring
        .values
        .iter()
        .filter(|one| one.quantity.at_length().is_some());
    let below = loads.any(|one| least.is_some_and(|least| one.value < least));
    let most = rig.force.range.map(|(_, most)| most);
    let above = |one: &Reading| most.is_some_and(|most| one.loads.1 > most);
    let springs: Vec<String> = readings
        .iter()
        .filter(|one| below || above(one))
        .map(|one| one.id.clone())
        .collect();
    if !springs.is_empty() {
        found.push(Caution::LoadOutsideRange { springs });
    }
    let unread: Vec<String> = readings
        .iter()
        .filter(|one| !one.zero_read)
        .map(|one| one.id.clone())
        .collect();
    if !unread.is_empty() {
        found.push(Caution::NoZeroReading { springs: unread });
    }
    found
}

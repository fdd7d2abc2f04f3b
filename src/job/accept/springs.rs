//! One spring judged, as the result tells it.

use std::collections::HashSet;

use crate::characteristic::{Characteristic, Measured, Measurement, average};
use crate::curve::{Kept, Reduced};
use crate::drawing::{Acceptance, Requirement};
use crate::lot::{Advice, advise};
use crate::quantity::Class;
use crate::record::{CharacteristicResult, FindingResult, SpringResult};
use crate::stats::StatsError;
use crate::verdict::{self, Overall, Verdict, overall};

use super::super::odd;
use super::super::read::Reading;
use super::Files;
use super::figures::{fit_facts, result};
use super::group::{self, Spring};

/// A judged spring with what the lot still needs of it.
pub(super) struct Judged {
    pub(super) overall: Overall,
    pub(super) result: SpringResult,
    pub(super) reduced: Option<Reduced>,
    /// Its measurements' curves for an archive.
    pub(super) kept: Vec<Kept>,
    /// A first idea of its rate, N/mm.
    pub(super) plain_rate: Option<f64>,
    /// Whether the empty platen was read in every measurement.
    pub(super) zero_read: bool,
    /// Smallest and largest load, N.
    pub(super) loads: (f64, f64),
    /// Strokes left out as too short.
    pub(super) short_strokes: bool,
    /// Whether gauge and bench disagree.
    pub(super) gauge_differs: bool,
    /// What its figures rest on.
    pub(super) basis: Basis,
}

/// What a spring's figures rest on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Basis {
    /// A curve.
    Curve,
    /// Loads at a few lengths, and the two that the rate is drawn from, longer first, mm; `None` without a rate.
    Readings(Option<(f64, f64)>),
}

/// Why statistics failed on a spring.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[error("the verdict on spring `{spring}` cannot be computed")]
#[diagnostic(
    code(coilassay::accept::statistics),
    help("a figure in the rig file or the export is far out of any usable size")
)]
pub(super) struct NoVerdict {
    spring: String,
    #[source]
    cause: StatsError,
}

/// The characteristics of one spring, judged.
#[derive(Default)]
struct Verdicts<'a> {
    judged: Vec<(&'a Requirement, verdict::Judged)>,
    results: Vec<CharacteristicResult>,
    advice: Vec<Advice>,
}

/// Judges one spring.
///
/// # Errors
/// [`NoVerdict`] where a quantile cannot be had.
pub(super) fn judge(
    files: &Files,
    terms: &Acceptance,
    spring: Spring,
) -> Result<Judged, NoVerdict> {
    let id = spring.id;
    let failed = |cause| NoVerdict {
        spring: id.clone(),
        cause,
    };
    let measurements: Vec<&Measurement> = spring
        .readings
        .iter()
        .map(|reading| &reading.measurement)
        .collect();
    let characteristics = average(&measurements).map_err(failed)?;
    let times = u32::try_from(spring.readings.len()).unwrap_or(u32::MAX);
    let mut verdicts = Verdicts::default();
    for characteristic in &characteristics {
        verdicts
            .add(files, terms, characteristic, times)
            .map_err(failed)?;
    }
    let findings = findings(files, &id);
    let found: Vec<Class> = findings.iter().map(|one| one.class).collect();
    let overall = overall(
        verdicts
            .judged
            .iter()
            .map(|(requirement, judged)| (requirement.class, judged)),
        &found,
    );
    let last = spring.readings.last();
    let fit = last.and_then(|reading| reading.measurement.fit.as_ref());
    let result = SpringResult {
        id: id.clone(),
        verdict: overall.verdict,
        failing_class: overall.failing,
        simple_verdict: overall.simple,
        in_sample: true, // settled once the order of the sample is known
        characteristics: verdicts.results,
        fit: fit.map(|fit| fit_facts(fit, last.and_then(|reading| reading.measurement.origin))),
        loading_strokes: last.map_or(0, |reading| {
            u32::try_from(reading.strokes).unwrap_or(u32::MAX)
        }),
        measurements: spring.measurements,
        odd: spring
            .readings
            .iter()
            .flat_map(|reading| odd::lines(&reading.odd, &reading.export))
            .collect(),
        findings,
        advice: if overall.verdict == Verdict::Undecided {
            verdicts.advice
        } else {
            Vec::new()
        },
    };
    Ok(with_readings(overall, result, spring.readings))
}

/// What the lot still needs of a spring's readings, beside its result.
fn with_readings(overall: Overall, result: SpringResult, mut readings: Vec<Reading>) -> Judged {
    let widen = |a: (f64, f64), b: (f64, f64)| (a.0.min(b.0), a.1.max(b.1));
    let loads = readings.iter().map(|reading| reading.loads).reduce(widen);
    let any = |of: fn(&Reading) -> bool| readings.iter().any(of);
    let (zero_missing, short_strokes, gauge_differs) = (
        any(|one| !one.zero_read),
        any(|one| one.short_strokes > 0),
        any(|one| one.measurement.gauge_differs),
    );
    let id = result.id.clone();
    let kept = readings
        .iter_mut()
        .filter_map(|reading| reading.kept.take())
        .map(|kept| Kept {
            id: id.clone(),
            ..kept
        })
        .collect();
    let last = readings.into_iter().last();
    Judged {
        overall,
        result,
        plain_rate: last.as_ref().and_then(|reading| reading.plain_rate),
        zero_read: !zero_missing,
        short_strokes,
        gauge_differs,
        basis: last
            .as_ref()
            .filter(|reading| reading.is_points())
            .map_or(Basis::Curve, |reading| {
                Basis::Readings(reading.measurement.read_between)
            }),
        loads: loads.unwrap_or((0.0, 0.0)),
        reduced: last
            .and_then(|reading| reading.reduced)
            .map(|reduced| Reduced { id, ..reduced }),
        kept,
    }
}

impl<'a> Verdicts<'a> {
    fn add(
        &mut self,
        files: &'a Files,
        terms: &Acceptance,
        characteristic: &Characteristic,
        times: u32,
    ) -> Result<(), StatsError> {
        let (quantity, measured) = (characteristic.quantity, &characteristic.measured);
        let requirement = files
            .drawing
            .requirements
            .iter()
            .find(|one| one.quantity == quantity);
        let left_out = files
            .lot
            .not_inspected
            .iter()
            .any(|one| one.quantity == quantity);
        let found = match requirement {
            Some(one) => Some((
                one,
                verdict::judge(measured, &one.limits, terms.rule, terms.guard)?,
            )),
            None => None,
        };
        // What was left out of the inspection and yet measured is not judged, unless it is proven to fail.
        let found = found.filter(|(_, judged)| !left_out || judged.verdict == Verdict::Fails);
        if let Some((requirement, judged)) = &found
            && judged.verdict == Verdict::Undecided
        {
            self.advice.push(advise(
                quantity,
                measured,
                &requirement.limits,
                terms.guard,
                times,
            )?);
        }
        let judged = found.as_ref().map(|(_, judged)| judged);
        let silent = requirement.is_none() && !matches!(measured, Measured::Value(_));
        if silent {
            return Ok(()); // nobody asked for it, and there is nothing to say
        }
        self.results.push(result(
            characteristic,
            requirement,
            judged,
            left_out && judged.is_none(),
        ));
        self.judged.extend(found);
        Ok(())
    }
}

fn findings(files: &Files, id: &str) -> Vec<FindingResult> {
    let of_this = files
        .lot
        .findings
        .iter()
        .filter(|one| group::printed(&one.spring.value) == id);
    of_this
        .map(|one| FindingResult {
            text: one.text.clone(),
            class: one.class,
        })
        .collect()
}

/// Says of every spring whether it is in the sample: the first `size` of those that may be.
pub(super) fn mark_sample(judged: &mut [Judged], sampled: &[String], size: u64) {
    let size = usize::try_from(size).unwrap_or(usize::MAX);
    let inside: HashSet<&str> = sampled.iter().take(size).map(String::as_str).collect();
    for spring in judged {
        spring.result.in_sample = inside.contains(spring.result.id.as_str());
    }
}

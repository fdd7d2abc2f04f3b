//! `rig verify`: a check file in, a checked rig out.

use std::path::Path;

use crate::bench::{Finding, Serving, overall};
use crate::curve::thin;
use crate::intake::{CheckFile, ReferenceSpring, open_check};
use crate::record::{
    BenchCaution, Caution, CheckKind, CheckReason, CheckRecord, ComparisonFacts, EarlierCheck,
    FORMAT, FrameFacts,
};
use crate::rig::{self, Change, Rig, edit};
use crate::text::{InputFile, Source};

use super::super::accept::rig_cautions::{of_rig, refused};
use super::super::facts;
use super::compare::{Compared, checked, compared};
use super::error::RigJobError;
use super::exports::Sources;
use super::plates;
use super::tolerances::{Tightest, tightest};
use super::{Proposal, RigOptions, provenance};

/// Readings of the plates' run that a chart keeps.
const DRAWN: usize = 400;

/// A checked rig.
#[derive(Debug)]
pub struct Verified {
    /// The result.
    pub record: CheckRecord,
    /// The rig file with the frame's give in it, where a run of plate on plate gave one.
    pub proposal: Option<Proposal>,
    /// Load (N) and give (mm) of the plates' run, thinned for drawing.
    pub readings: Vec<(f64, f64)>,
}

/// Checks the rig of the check file at `path`, written as `as_written`; `earlier` are checks on record, of any rig.
///
/// # Errors
/// A report that names file, line and column where a file or an export cannot be used, or what `--strict` refuses.
pub fn rig_verify(
    path: &Path,
    as_written: &str,
    options: &RigOptions,
    earlier: Vec<EarlierCheck>,
) -> miette::Result<Verified> {
    let file = open_check(path, as_written)?;
    let rig_source = Source::open(&file.rig.1, &file.rig.0)?;
    let rig = rig::from_source(&rig_source)?;
    let mut inputs = vec![file.source.input("check"), rig_source.input("rig")];
    let mut sources = Sources::default();
    let mut frame = None;
    if let Some(export) = &file.plates {
        frame = Some(plates::measure(export, &rig, &mut sources)?);
    }
    let mut words = Vec::new();
    let mut found = None;
    if let Some(check) = &file.reference {
        let tightest: Tightest = tightest(&check.judged, &mut inputs)?;
        found = Some(compared(&file, check, &rig, &tightest, &mut sources)?);
        words = tightest.words;
    }
    let frame_facts = frame.as_ref().map(|frame| plates::facts(frame, &rig));
    let frame_facts = frame_facts.transpose()?;
    let mut all = earlier;
    all.extend(from_files(&file, &mut inputs)?);
    let change = frame.as_ref().and_then(plates::change);
    let proposal = change
        .map(|change| propose(&rig_source, &change))
        .transpose()?;
    let record = record(
        (&file, &rig),
        (found, frame_facts, words),
        all,
        provenance(inputs, sources, options),
        options,
    )?;
    let readings = frame.map_or(Vec::new(), |frame| thin(&frame.readings, DRAWN));
    Ok(Verified {
        record,
        proposal,
        readings,
    })
}

/// The rig file with a change in it, proven to open.
fn propose(source: &Source, change: &Change) -> miette::Result<Proposal> {
    let edited = edit(source, std::slice::from_ref(change))?;
    rig::from_source(&edited.source)?;
    Ok(Proposal { edited })
}

/// Earlier checks from the results the check file names.
fn from_files(
    file: &CheckFile,
    inputs: &mut Vec<InputFile>,
) -> Result<Vec<EarlierCheck>, RigJobError> {
    let mut found = Vec::new();
    for named in &file.earlier {
        let source = Source::open(&named.path, &named.written)?;
        let record: Result<CheckRecord, _> = serde_json::from_str(&source.text);
        let record = record.map_err(|cause| RigJobError::Earlier {
            name: source.name.clone(),
            cause,
        })?;
        inputs.push(source.input("earlier check"));
        found.extend(record.as_earlier());
    }
    Ok(found)
}

/// Those of this rig on this reference, up to the day, oldest first, none twice.
fn of_this(
    mut earlier: Vec<EarlierCheck>,
    rig: &Rig,
    reference: Option<&str>,
    options: &RigOptions,
) -> Vec<EarlierCheck> {
    earlier.retain(|one| {
        one.rig == rig.name && Some(one.reference.as_str()) == reference && one.date <= options.date
    });
    earlier.sort_by_key(|one| one.date); // stable: the quantities of one check keep their order
    let mut kept: Vec<EarlierCheck> = Vec::new();
    for one in earlier {
        if !kept.contains(&one) {
            kept.push(one);
        }
    }
    kept
}

fn record(
    (file, rig): (&CheckFile, &Rig),
    (found, frame, tolerances): (Option<Compared>, Option<FrameFacts>, Vec<String>),
    earlier: Vec<EarlierCheck>,
    provenance: crate::record::Provenance,
    options: &RigOptions,
) -> Result<CheckRecord, RigJobError> {
    let spring = file.reference.as_ref().map(|check| &check.spring);
    let (comparisons, reference_facts, of_readings) = match found {
        Some(found) => (found.comparisons, Some(found.facts), found.cautions),
        None => (Vec::new(), None, Vec::new()),
    };
    let mut of_bench = of_rig(rig, options.date);
    of_bench.extend(of_readings);
    if options.strict {
        refuse(&of_bench, spring, options)?;
    }
    let reasons = reasons(&comparisons, frame.as_ref(), spring, options);
    let decision = decision(&comparisons, &reasons);
    let measurements = reference_facts.as_ref().map(|facts| facts.measurements);
    let cautions = cautions(
        of_bench,
        (file, rig),
        &comparisons,
        frame.as_ref(),
        measurements,
        options,
    );
    let reference = spring.map(|spring| spring.name.clone());
    Ok(CheckRecord {
        format: FORMAT,
        kind: CheckKind::RigVerify,
        decision,
        reasons,
        passed: decision == Serving::Serves && reference.is_some(),
        judged_at: options.date,
        rig: rig.name.clone(),
        note: file.note.clone(),
        inspector: file.inspector.clone(),
        share: facts::figure(file.share).ok_or(RigJobError::NotFinite { of: "share" })?,
        tolerances,
        cautions,
        bench: facts::rig(rig, None),
        reference_facts,
        comparisons,
        frame,
        earlier: of_this(earlier, rig, reference.as_deref(), options),
        reference,
        provenance,
        files: Vec::new(),
    })
}

fn covers(spring: &ReferenceSpring, options: &RigOptions) -> bool {
    spring
        .calibrated
        .is_none_or(|(on, until)| on <= options.date && options.date <= until)
}

fn refuse(
    cautions: &[Caution],
    spring: Option<&ReferenceSpring>,
    options: &RigOptions,
) -> Result<(), RigJobError> {
    let expired = spring
        .filter(|spring| !covers(spring, options))
        .map(|spring| {
            format!(
                "the certificate of reference spring {} does not cover the day of the check",
                spring.name
            )
        });
    expired
        .or_else(|| refused(cautions))
        .map_or(Ok(()), |what| Err(RigJobError::Strict { what }))
}

fn reasons(
    comparisons: &[ComparisonFacts],
    frame: Option<&FrameFacts>,
    spring: Option<&ReferenceSpring>,
    options: &RigOptions,
) -> Vec<CheckReason> {
    let mut found = Vec::new();
    for finding in [
        Finding::Disagrees,
        Finding::BeyondShare,
        Finding::CannotTell,
        Finding::NotMeasured,
    ] {
        let places = (0..).zip(comparisons);
        let of = places.filter(|(_, one)| one.finding == finding);
        let comparisons: Vec<u32> = of.map(|(place, _)| place).collect();
        if !comparisons.is_empty() {
            found.push(CheckReason::Compared {
                finding,
                comparisons,
            });
        }
    }
    if frame.and_then(plates::differs).is_some() {
        found.push(CheckReason::FrameDiffers);
    }
    match spring {
        None => found.push(CheckReason::NoReference),
        Some(spring) if !covers(spring, options) => found.push(CheckReason::ReferenceNotValid),
        Some(_) if found.is_empty() => found.push(CheckReason::AllAgree {
            compared: u32::try_from(comparisons.len()).unwrap_or(u32::MAX),
        }),
        Some(_) => {}
    }
    found
}

fn decision(comparisons: &[ComparisonFacts], reasons: &[CheckReason]) -> Serving {
    let of_reasons = reasons.iter().filter_map(|reason| match reason {
        CheckReason::FrameDiffers => Some(Serving::Fails),
        CheckReason::NoReference | CheckReason::ReferenceNotValid => Some(Serving::Undecided),
        CheckReason::AllAgree { .. } | CheckReason::Compared { .. } => None,
    });
    overall(
        comparisons
            .iter()
            .map(|one| one.finding.serving())
            .chain(of_reasons),
    )
}

fn cautions(
    of_bench: Vec<Caution>,
    (file, rig): (&CheckFile, &Rig),
    comparisons: &[ComparisonFacts],
    frame: Option<&FrameFacts>,
    measurements: Option<u32>,
    options: &RigOptions,
) -> Vec<BenchCaution> {
    let mut found = Vec::new();
    if let Some(check) = &file.reference {
        let spring = &check.spring;
        let reference = spring.name.clone();
        match spring.calibrated {
            None => found.push(BenchCaution::ReferenceUndated { reference }),
            Some((_, until)) if !covers(spring, options) => {
                let until = until.to_string();
                found.push(BenchCaution::ReferenceExpired { reference, until });
            }
            Some(_) => {}
        }
        if spring.values.iter().any(|one| !checked(rig, one)) {
            found.push(BenchCaution::FreeLengthNotChecked);
        }
    }
    if measurements == Some(1) {
        found.push(BenchCaution::MeasuredOnce);
    }
    if let Some(e_n) = frame.and_then(plates::differs) {
        found.push(BenchCaution::FrameDiffers { e_n });
    }
    if frame.is_some_and(|frame| frame.expanded_uncertainty_mm_per_n.is_none()) {
        found.push(BenchCaution::FrameUncertaintyUnknown);
    }
    let without = comparisons.iter().filter(|one| one.allowed_error.is_none());
    found.extend(without.map(|one| BenchCaution::NoTolerance {
        name: one.name.clone(),
        at_length_mm: one.at_length_mm,
    }));
    found.extend(
        of_bench
            .into_iter()
            .map(|caution| BenchCaution::Rig { caution }),
    );
    found
}

//! `rig verify`: a check file in, a checked rig out.

use std::path::Path;

use jiff::civil::Date;

use crate::bench::Serving;
use crate::curve::thin;
use crate::intake::{CheckFile, open_check};
use crate::record::{CheckKind, CheckRecord, EarlierCheck, FORMAT, FrameFacts};
use crate::rig::{self, Change, Rig, edit};
use crate::text::{InputFile, Source};

use super::super::accept::rig_cautions::of_rig;
use super::super::facts;
use super::compare::{Compared, compared};
use super::error::RigJobError;
use super::exports::Sources;
use super::plates;
use super::tolerances::{Tightest, tightest};
use super::verify_outcome::{cautions, decision, reasons, refuse};
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
    let provenance = provenance(inputs, sources, options);
    let measured = RigOptions {
        date: day(&file, options)?,
        ..options.clone()
    };
    let found = (found, frame_facts, words);
    let record = record((&file, &rig), found, all, provenance, &measured)?;
    let readings = frame.map_or(Vec::new(), |frame| thin(&frame.readings, DRAWN));
    Ok(Verified {
        record,
        proposal,
        readings,
    })
}

/// The day that the check speaks of: the day it was measured. A check measured long ago and judged today holds from then.
///
/// # Errors
/// [`RigJobError::Measured`] where that day is still to come.
fn day(file: &CheckFile, options: &RigOptions) -> Result<Date, RigJobError> {
    match file.on {
        Some(on) if on > options.date => Err(RigJobError::Measured {
            on,
            date: options.date,
        }),
        on => Ok(on.unwrap_or(options.date)),
    }
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

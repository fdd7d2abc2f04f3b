//! A folder of results: lots and checks from the `result.json` files in it and in its folders.

use std::fs;
use std::path::{Path, PathBuf};

use rayon::prelude::*;
use serde::Deserialize;

use super::error::{ArchiveError, reading, shown};
use super::figures::{Figure, LotFigures};
use super::read::LotHead;
use crate::record::{AcceptRecord, CheckRecord, EarlierCheck, Key, find, occurring};
use crate::stats::{mean, standard_deviation};
use crate::units::{Finite, Millimetres};

/// A quantity of a check and its certified value.
pub type Referenced = (EarlierCheck, Finite);

/// What a folder of results holds.
#[derive(Debug, Default)]
pub struct Results {
    /// Lots, in the order of the folders.
    pub lots: Vec<LotFigures>,
    /// Checks of rigs on a reference spring.
    pub checks: Vec<Referenced>,
}

enum Read {
    Lot(Box<LotFigures>),
    Check(Vec<Referenced>),
    Other,
}

/// Reads every `result.json` in `dir` and in the folders right below it; results of other jobs are left out.
///
/// # Errors
/// [`ArchiveError`] where there is none, or one cannot be read.
pub fn read_results(dir: &Path) -> Result<Results, ArchiveError> {
    let mut folders = vec![dir.to_owned()];
    for entry in fs::read_dir(dir).map_err(reading(dir))? {
        folders.push(entry.map_err(reading(dir))?.path());
    }
    folders.sort();
    let files: Vec<PathBuf> = folders
        .into_iter()
        .map(|folder| folder.join("result.json"))
        .filter(|file| file.is_file())
        .collect();
    if files.is_empty() {
        return Err(ArchiveError::Unreadable {
            file: shown(dir),
            why: "it holds neither an `archive.json` nor a `result.json`".to_owned(),
        });
    }
    let read: Result<Vec<Read>, ArchiveError> = files.par_iter().map(|file| one(file)).collect();
    let mut results = Results::default();
    for read in read? {
        match read {
            Read::Lot(lot) => results.lots.push(*lot),
            Read::Check(check) => results.checks.extend(check),
            Read::Other => {}
        }
    }
    Ok(results)
}

#[derive(Deserialize)]
struct Headed {
    kind: String,
}

fn one(path: &Path) -> Result<Read, ArchiveError> {
    let bytes = fs::read(path).map_err(reading(path))?;
    let unreadable = |why: String| ArchiveError::Unreadable {
        file: shown(path),
        why,
    };
    let wrong = |fault: serde_json::Error| unreadable(fault.to_string());
    let head: Headed = serde_json::from_slice(&bytes).map_err(wrong)?;
    match head.kind.as_str() {
        "accept" => {
            let record: AcceptRecord = serde_json::from_slice(&bytes).map_err(wrong)?;
            lot(&record)
                .map(|lot| Read::Lot(Box::new(lot)))
                .map_err(unreadable)
        }
        "rig-verify" => {
            let record: CheckRecord = serde_json::from_slice(&bytes).map_err(wrong)?;
            Ok(Read::Check(referenced(&record)))
        }
        _ => Ok(Read::Other),
    }
}

/// The quantities of a check beside their certified values.
fn referenced(record: &CheckRecord) -> Vec<Referenced> {
    let beside = |one: EarlierCheck| {
        let of = record
            .comparisons
            .iter()
            .find(|of| of.name == one.name && of.at_length_mm == one.at_length_mm)?;
        Some((one, of.reference))
    };
    record.as_earlier().into_iter().filter_map(beside).collect()
}

fn lot(record: &AcceptRecord) -> Result<LotFigures, String> {
    let date = |text: &str| text.parse().map_err(|_| format!("`{text}` is no date"));
    let figures = occurring(record);
    Ok(LotFigures {
        head: LotHead {
            drawing: record.drawing.number.clone(),
            lot: record.lot.number.clone(),
            supplier: record.lot.supplier.clone(),
            date: date(&record.provenance.date)?,
            received: record.lot.received.as_deref().map(date).transpose()?,
            rig: record.rig.name.clone(),
            tags: record.lot.tags.clone(),
            decision: record.decision,
        },
        run: None,
        figures: figures
            .iter()
            .filter_map(|(key, _)| figure(record, key))
            .collect(),
    })
}

fn figure(record: &AcceptRecord, key: &Key) -> Option<Figure> {
    let found: Vec<_> = record
        .springs
        .iter()
        .filter_map(|spring| find(spring, key))
        .filter(|of| of.value.is_some())
        .collect();
    let first = found.first()?;
    let number = |value: Option<Finite>| value.map(Finite::get);
    let values: Vec<f64> = found.iter().filter_map(|of| number(of.value)).collect();
    let own: Option<Vec<f64>> = found
        .iter()
        .map(|of| number(of.own_uncertainty).map(|own| own * own))
        .collect();
    let common: Option<Vec<f64>> = found
        .iter()
        .map(|of| number(of.common_uncertainty))
        .collect();
    Some(Figure {
        characteristic: key.0.clone(),
        at_length_mm: key.1.map(Millimetres::get),
        unit: first.unit,
        nominal: number(first.nominal),
        lower: number(first.lower),
        upper: number(first.upper),
        springs: values.len() as u64,
        mean: mean(&values)?,
        standard_deviation: standard_deviation(&values),
        own_uncertainty: own.and_then(|squares| mean(&squares)).map(f64::sqrt),
        common_uncertainty: common.and_then(|common| mean(&common)),
    })
}

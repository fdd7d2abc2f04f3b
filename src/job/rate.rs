//! `rate`: rate and loads of one or more curves, without a drawing.

use std::collections::BTreeMap;
use std::path::PathBuf;

use serde::Serialize;

use crate::characteristic::{Measured, Setup};
use crate::curve::{Bounds, WindowOf};
use crate::drawing::{Method, Stroke, Way};
use crate::export::{Columns, Look, look, sketch};
use crate::intake::{Conditions, Export};
use crate::quantity::Quantity;
use crate::record::OddLines;
use crate::rig::{self, Accuracy, Compliance, Known, Means, Rig, Scale};
use crate::text::{Head, InputFile};
use crate::units::{Finite, Millimetres, Newtons};

use super::facts::figure;
use super::read::{Batch, How, Keep, Reading, read};

/// The window where there is no drawing: shares of the travel from contact to the greatest compression before solid.
const WINDOW: (f64, f64) = (0.3, 0.7);
/// Contact load where there is no rig file, as a share of the largest load read in the first lines, N at least.
const CONTACT: f64 = 0.5;

/// What is known of the bench.
#[derive(Clone, Debug)]
pub enum Bench {
    /// A rig file: as written.
    File(String),
    /// Two columns, named on the command line, and whether travel is a length.
    Columns(Columns, Means),
    /// Nothing.
    Nothing,
}

/// What `rate` is asked.
#[derive(Clone, Debug)]
pub struct RateOptions {
    /// What is known of the bench.
    pub bench: Bench,
    /// Lengths at which loads are wanted.
    pub at_lengths: Vec<Millimetres>,
}

/// A load at a place of the curve.
#[derive(Clone, Debug, Serialize)]
pub struct LoadAt {
    /// Length.
    pub at_length_mm: Millimetres,
    /// Load; absent where the curve does not reach the length or has no lengths.
    pub load_n: Option<Finite>,
    /// U, k for 95.45 %.
    pub expanded_uncertainty_n: Option<Finite>,
}

/// One spring's rate.
#[derive(Clone, Debug, Serialize)]
pub struct RateResult {
    /// The spring.
    pub id: String,
    /// The export.
    pub export: String,
    /// Rate; absent where the curve has none.
    pub rate_n_per_mm: Option<Finite>,
    /// U; absent where it cannot be known.
    pub expanded_uncertainty_n_per_mm: Option<Finite>,
    /// k.
    pub coverage_factor: Option<Finite>,
    /// Points in the window.
    pub points: u64,
    /// Lines of the export in the window.
    pub lines: Option<(u64, u64)>,
    /// Largest residual over the largest load, %.
    pub straightness_percent: Option<Finite>,
    /// Largest load.
    pub largest_load_n: Option<Newtons>,
    /// Loads asked for.
    pub loads: Vec<LoadAt>,
    /// What is odd in its rows.
    pub odd: Vec<OddLines>,
    /// Whether U holds what is known of the rig, or only the scatter.
    pub rig_known: bool,
}

/// What a file looks like to someone who said nothing of it.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum Guess {
    #[error("nothing is said of the columns of `{name}`{found}")]
    #[diagnostic(code(coilassay::rate::columns), help("{advice}"))]
    Asked {
        name: String,
        found: String,
        advice: String,
    },
    #[error("no line of `{name}` holds both columns `{load}` and `{travel}`{found}")]
    #[diagnostic(
        code(coilassay::rate::names),
        help("write the names as they stand in the file")
    )]
    NotThere {
        name: String,
        load: String,
        travel: String,
        found: String,
    },
}

/// Measures the springs of `exports`.
///
/// # Errors
/// A report where a file cannot be read, or [`Guess`] where nothing is said of its columns.
pub fn rate(exports: &[String], options: &RateOptions) -> miette::Result<Vec<RateResult>> {
    let mut wanted = vec![Quantity::Rate];
    wanted.extend(
        options
            .at_lengths
            .iter()
            .map(|length| Quantity::LoadAt(*length)),
    );
    let caliper = BTreeMap::new();
    let mut results = Vec::new();
    for written in exports {
        let rig = bench(written, &options.bench)?;
        let setup = Setup {
            rig: &rig,
            conditions: Conditions {
                temperature: Some(20.0),
                presetting_strokes: None,
                presetting_recorded: 0,
            },
            bounds: Bounds {
                of: WindowOf::Travel,
                from: WINDOW.0,
                to: WINDOW.1,
            },
            stroke: Stroke {
                index: None,
                way: Way::Loading,
            },
            method: Method::Fit,
            full_load: None,
            wanted: &wanted,
            stages: &[],
            caliper: &[],
        };
        let how = How {
            setup: &setup,
            caliper: &caliper,
            keep: Keep::default(),
            of_all: &[],
            block_bytes: None,
        };
        let export = Export {
            written: written.clone(),
            path: PathBuf::from(written),
        };
        let Batch { readings, .. } = read(&export, how)?;
        let known = matches!(options.bench, Bench::File(_));
        for reading in readings {
            results.push(result(&reading?, known));
        }
    }
    Ok(results)
}

fn bench(export: &str, bench: &Bench) -> miette::Result<Rig> {
    match bench {
        Bench::File(path) => rig::open(&PathBuf::from(path), path),
        Bench::Columns(columns, means) => {
            let head = Head::read(&PathBuf::from(export), export)?;
            let Some(dialect) = sketch(&head, columns) else {
                return Err(Guess::NotThere {
                    name: head.name.clone(),
                    load: columns.load.0.clone(),
                    travel: columns.travel.0.clone(),
                    found: found(&look(&head)),
                }
                .into());
            };
            Ok(unknown_rig(dialect, *means))
        }
        Bench::Nothing => {
            let head = Head::read(&PathBuf::from(export), export)?;
            let seen = look(&head);
            let column = |name: &Option<String>, other: &str| {
                name.clone().unwrap_or_else(|| other.to_owned())
            };
            let advice = format!(
                "if that is right, say so: --load \"{}:N\" --travel \"{}:mm:length\" (or :deflection), or give a rig file with --rig",
                column(&seen.load, "COLUMN"),
                column(&seen.travel, "COLUMN")
            );
            Err(Guess::Asked {
                name: head.name.clone(),
                found: found(&seen),
                advice,
            }
            .into())
        }
    }
}

fn found(look: &Look) -> String {
    let Some(line) = look.header_line else {
        return "; no table was recognised in its first lines".to_owned();
    };
    let named = |what: &str, name: &Option<String>| {
        name.as_ref().map_or(String::new(), |name| {
            format!(", {what} looks like `{name}`")
        })
    };
    let columns: Vec<String> = look
        .columns
        .iter()
        .map(|name| crate::text::printable(name, &crate::text::Alphabet::Any))
        .collect();
    format!(
        "; line {line} looks like the names: {}{}{}",
        columns.join(", "),
        named("load", &look.load),
        named("travel", &look.travel)
    )
}

/// A bench of which nothing is known but its columns.
fn unknown_rig(dialect: rig::Dialect, means: Means) -> Rig {
    let scale = || Scale {
        accuracy: Accuracy::DeclaredNegligible,
        resolution: Known::DeclaredNegligible,
        range: None,
        calibrated: None,
    };
    Rig {
        input: InputFile {
            role: "rig".to_owned(),
            path: String::new(),
            sha256: String::new(),
        },
        name: "unknown".to_owned(),
        check_every: None,
        dialect,
        means,
        force: scale(),
        travel: scale(),
        zero: Known::DeclaredNegligible,
        set_at_length: 0.0,
        zeroed_at_load: 0.0,
        frame: Compliance::DeclaredNegligible,
        contact_load: Newtons::try_from(CONTACT).unwrap_or(Newtons::ZERO),
        repeatability: Vec::new(),
    }
}

fn result(reading: &Reading, rig_known: bool) -> RateResult {
    let of = |quantity: Quantity| {
        let found = reading
            .measurement
            .characteristics
            .iter()
            .find(|one| one.quantity == quantity);
        match found.map(|one| &one.measured) {
            Some(Measured::Value(estimate)) => Some(estimate.clone()),
            _ => None,
        }
    };
    let rate = of(Quantity::Rate);
    let uncertainty = rate.as_ref().and_then(|one| one.uncertainty);
    let fit = reading.measurement.fit.as_ref();
    let at = reading
        .measurement
        .characteristics
        .iter()
        .filter_map(|one| one.quantity.at_length());
    let loads = at.map(|length| {
        let load = of(Quantity::LoadAt(length));
        LoadAt {
            at_length_mm: length,
            load_n: load.as_ref().and_then(|one| figure(one.value)),
            expanded_uncertainty_n: load
                .and_then(|one| one.uncertainty)
                .and_then(|one| figure(one.expanded)),
        }
    });
    RateResult {
        id: reading.id.clone(),
        export: reading.export.clone(),
        rate_n_per_mm: rate.and_then(|one| figure(one.value)),
        expanded_uncertainty_n_per_mm: uncertainty.and_then(|one| figure(one.expanded)),
        coverage_factor: uncertainty.and_then(|one| figure(one.factor)),
        points: fit.map_or(0, |fit| fit.line.count as u64),
        lines: fit.map(|fit| fit.lines),
        straightness_percent: fit.and_then(|fit| figure(100.0 * fit.straightness)),
        largest_load_n: reading.loads.1.try_into().ok(),
        loads: loads.collect(),
        odd: super::odd::lines(&reading.odd, &reading.export),
        rig_known,
    }
}

//! Reads exports and measures their springs as they come, in parallel; only figures and reduced curves are kept.

use std::collections::BTreeMap;
use std::hash::{DefaultHasher, Hasher};
use std::path::Path;
use std::sync::mpsc::sync_channel;

use rayon::prelude::*;

use crate::characteristic::{MeasureError, Measurement, Setup, judged, measure};
use crate::curve::{
    Axis, Curve, Kept, MOST_POINTS, OddRows, Path as Stroke, Reduced, Zero, correct, kept_points,
    thin,
};
use crate::drawing::Way;
use crate::export::{BLOCK_BYTES, ExportError, Ledger, RawCurve};
use crate::intake::Export;
use crate::quantity::Quantity;
use crate::record::{LedgerFacts, SetAside};
use crate::text::InputFile;

use super::points;

/// One measurement of one spring.
#[derive(Debug)]
pub(super) struct Reading {
    /// The spring's id, printable.
    pub(super) id: String,
    /// The export, as written.
    pub(super) export: String,
    /// First and last line in the export.
    pub(super) lines: (u64, u64),
    /// Equal for two measurements whose points are the same, digit for digit.
    pub(super) fingerprint: u64,
    /// Strokes too short to be strokes of the test.
    pub(super) short_strokes: usize,
    /// A first idea of the rate, N/mm, for plausibility.
    pub(super) plain_rate: Option<f64>,
    /// Whether the empty platen was read.
    pub(super) zero_read: bool,
    /// Smallest and largest load, N.
    pub(super) loads: (f64, f64),
    /// Loading strokes.
    pub(super) strokes: usize,
    /// What is odd in its rows.
    pub(super) odd: Vec<OddRows>,
    /// What was measured.
    pub(super) measurement: Measurement,
    /// The curve for the charts, where they are wanted.
    pub(super) reduced: Option<Reduced>,
    /// The curve for the archive, where one is kept.
    pub(super) kept: Option<Kept>,
}

impl Reading {
    /// Whether loads were read at a few lengths only.
    pub(super) const fn is_points(&self) -> bool {
        self.strokes == 0 // a curve without a loading stroke is refused
    }
}

/// What is kept of a curve beside its figures.
#[derive(Clone, Copy, Debug, Default)]
pub struct Keep {
    /// The curve thinned for charts.
    pub for_charts: bool,
    /// The curve for an archive, the points of the window whole.
    pub for_archive: bool,
}

/// One export, read.
pub(super) struct Batch {
    pub(super) readings: Vec<Result<Reading, MeasureError>>,
    pub(super) ledger: LedgerFacts,
    pub(super) input: InputFile,
}

/// How exports are read.
#[derive(Clone, Copy)]
pub(super) struct How<'a> {
    pub(super) setup: &'a Setup<'a>,
    pub(super) caliper: &'a BTreeMap<String, Vec<(Quantity, f64)>>,
    pub(super) keep: Keep,
    /// What is known of every spring of these exports without the bench: a reference spring's certificate.
    pub(super) of_all: &'a [(Quantity, f64)],
    pub(super) block_bytes: Option<usize>,
}

/// Reads one export and measures its springs.
///
/// # Errors
/// [`ExportError`] at the first line that is not as the rig file says.
pub(super) fn read(export: &Export, how: How<'_>) -> Result<Batch, ExportError> {
    read_at(&export.path, &export.written, how)
}

fn read_at(path: &Path, written: &str, how: How<'_>) -> Result<Batch, ExportError> {
    let block = how.block_bytes.unwrap_or(BLOCK_BYTES);
    // While the springs of one block are measured the next block is read; one may wait between the two.
    let (hand_on, take) = sync_channel::<Vec<RawCurve>>(1);
    let (read, readings) = std::thread::scope(|scope| {
        let measuring = scope.spawn(move || {
            let measure = |curves: Vec<RawCurve>| {
                curves
                    .into_par_iter()
                    .map(|raw| {
                        if how.setup.rig.dialect.rarer.points.is_some() {
                            points::reading(&raw, how)
                        } else {
                            reading(&raw, how)
                        }
                    })
                    .collect::<Vec<_>>()
            };
            take.into_iter().flat_map(measure).collect::<Vec<_>>()
        });
        let mut each = |curves| _ = hand_on.send(curves); // the other end is there until this one is dropped
        let read = crate::export::read(path, written, &how.setup.rig.dialect, block, &mut each);
        drop(hand_on);
        let readings = measuring
            .join()
            .unwrap_or_else(|panic| std::panic::resume_unwind(panic));
        (read, readings)
    });
    let read = read?;
    let mut readings = readings;
    points::tell_apart(&mut readings);
    let shown = crate::text::printable(written, &crate::text::Alphabet::Any);
    let input = InputFile {
        role: "export".to_owned(),
        path: shown.clone(),
        sha256: read.sha256,
    };
    let mut ledger = ledger(shown, &read.ledger);
    let measured = readings.iter().filter_map(|reading| reading.as_ref().ok());
    super::odd::set_aside(&mut ledger, measured.flat_map(|reading| &reading.odd));
    Ok(Batch {
        readings,
        ledger,
        input,
    })
}

pub(super) fn ledger(export: String, ledger: &Ledger) -> LedgerFacts {
    let aside = |one: &crate::export::Aside| SetAside {
        reason: one.reason.as_str().to_owned(),
        first_line: one.first_line,
        last_line: one.last_line,
    };
    LedgerFacts {
        export,
        lines: ledger.lines,
        points: ledger.points,
        set_aside: ledger.set_aside.iter().map(aside).collect(),
    }
}

fn reading(raw: &RawCurve, how: How<'_>) -> Result<Reading, MeasureError> {
    let setup = how.setup;
    let curve = correct(raw, setup.rig)?;
    let plain_rate = curve.loading.last().and_then(|path| path.rate);
    let caliper = how
        .caliper
        .get(&raw.identity)
        .map_or(how.of_all, Vec::as_slice);
    let mut measurement = measure(setup, &curve, caliper)?;
    let reduced = how.keep.for_charts.then(|| reduce(&curve, &measurement));
    let kept = how
        .keep
        .for_archive
        .then(|| keep(setup, &curve, &measurement));
    if let Some(fit) = &mut measurement.fit {
        fit.forget_points();
    }
    Ok(Reading {
        id: raw.id.clone(),
        export: curve.export,
        lines: curve.lines,
        fingerprint: fingerprint(raw),
        short_strokes: curve.short_strokes,
        plain_rate,
        zero_read: matches!(curve.zero, Zero::Read { .. }),
        loads: curve.loads,
        strokes: curve.loading.len(),
        odd: curve.odd,
        measurement,
        reduced,
        kept,
    })
}

/// The points as one number.
fn fingerprint(raw: &RawCurve) -> u64 {
    let mut hasher = DefaultHasher::new();
    for figure in raw.load.iter().chain(&raw.travel) {
        hasher.write_u64(figure.to_bits());
    }
    hasher.finish()
}

/// The judged strokes thinned for drawing; abscissae are lengths where there are any, else deflections from contact.
fn reduce(curve: &Curve, measurement: &Measurement) -> Reduced {
    let start = curve.loading.last().map_or(0.0, |path| path.start);
    let shown = |u: f64| match measurement.origin {
        Some(origin) => origin - u,
        None => u - start,
    };
    let stroke = |path: Option<&Stroke>| {
        let points: Vec<(f64, f64)> = path
            .iter()
            .flat_map(|path| &path.nodes)
            .map(|node| (shown(node.u), node.load))
            .collect();
        thin(&points, MOST_POINTS)
    };
    let residuals = measurement.fit.as_ref().map_or(Vec::new(), |fit| {
        let points: Vec<(f64, f64)> = fit
            .travel
            .iter()
            .zip(&fit.line.residuals)
            .map(|(u, residual)| (shown(*u), *residual))
            .collect();
        thin(&points, MOST_POINTS)
    });
    Reduced {
        id: curve.id.clone(),
        axis: if measurement.origin.is_some() {
            Axis::Length
        } else {
            Axis::Deflection
        },
        loading: stroke(curve.loading.last()),
        unloading: stroke(curve.unloading.last()),
        residuals,
    }
}

/// The judged stroke, its window whole, and the last stroke of the other way.
fn keep(setup: &Setup<'_>, curve: &Curve, measurement: &Measurement) -> Kept {
    let other = match setup.stroke.way {
        Way::Loading => &curve.unloading,
        Way::Unloading => &curve.loading,
    };
    let window = measurement.fit.as_ref().map(|fit| fit.window);
    Kept {
        id: curve.id.clone(),
        export: curve.export.clone(),
        origin: measurement.origin,
        points: kept_points(judged(setup, curve), other.last(), window),
    }
}

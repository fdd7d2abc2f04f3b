//! `track`: a characteristic over lots: what moved, when, how fast, and whether it was the springs or the rig.

mod charted;
mod error;
mod found;
mod moved;
mod side_by_side;

use std::path::PathBuf;

use jiff::civil::Date;

use crate::drift::{LotPoint, Rule};
use crate::record::{
    FORMAT, LotOrder, Provenance, TOOL, TrackCaution, TrackKind, TrackRecord, Tracked,
};
use crate::units::Finite;

pub use error::TrackError;
use found::Series;

/// Lots of a baseline, at least: limits from fewer say nothing.
const FEWEST: usize = 8;
/// Lots of a baseline where none is named: the first half, but no more than this.
const BASELINE: usize = 20;

/// What is asked.
#[derive(Clone, Debug)]
pub struct TrackOptions {
    /// Drawing number; needed where the lots are of several.
    pub drawing: Option<String>,
    /// `rate`, `load@40` …; rate where none is named.
    pub characteristic: Option<String>,
    /// Received, or judged, on this day or later.
    pub since: Option<Date>,
    /// First and last day of the baseline.
    pub baseline: Option<(Date, Date)>,
    /// How many lots count as the newest.
    pub newest: u32,
    /// Order of the lots.
    pub order: LotOrder,
    /// All eight run rules.
    pub all_rules: bool,
    /// `supplier`, `rig` or a tag to compare by.
    pub by: Option<String>,
    /// Date of the report.
    pub date: Date,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
}

/// Charts what `sources` hold, each an archive, a folder of results or a table of per-lot figures; a path and how it was written.
///
/// # Errors
/// [`TrackError`] where a source cannot be read, or it is not clear what to chart.
pub fn track(
    sources: &[(PathBuf, String)],
    options: &TrackOptions,
) -> Result<TrackRecord, TrackError> {
    let series = found::series(sources, options)?;
    let baseline = baseline(&series, options);
    let mut record = begun(&series, options, &baseline)?;
    if baseline.iter().filter(|of| **of).count() < FEWEST || baseline.len() <= FEWEST {
        return Ok(record); // too few lots
    }
    let points: Vec<LotPoint> = series.lots.iter().map(|lot| lot.point).collect();
    charted::chart(&mut record, &points, &baseline)?;
    moved::told(&mut record, &series, &points)?;
    record.groups = side_by_side::groups(&series, options.by.as_deref())?;
    Ok(record)
}

/// Which lots belong to the baseline.
fn baseline(series: &Series, options: &TrackOptions) -> Vec<bool> {
    let count = series.lots.len();
    let first = BASELINE.min((count / 2).max(FEWEST));
    let lots = series.lots.iter().enumerate();
    lots.map(|(place, lot)| match options.baseline {
        Some((from, to)) => (from..=to).contains(&lot.head.when()),
        None => place < first,
    })
    .collect()
}

/// The record before anything is charted.
fn begun(
    series: &Series,
    options: &TrackOptions,
    baseline: &[bool],
) -> Result<TrackRecord, TrackError> {
    let stated = |value: Option<f64>| value.and_then(|value| Finite::try_from(value).ok());
    let rules: &[Rule] = if options.all_rules {
        &Rule::ALL
    } else {
        &Rule::DEFAULT
    };
    Ok(TrackRecord {
        format: FORMAT,
        kind: TrackKind::Track,
        decision: Tracked::TooFewLots,
        drawing: series.drawing.clone(),
        characteristic: series.characteristic.clone(),
        at_length_mm: series.at_length_mm.and_then(|at| at.try_into().ok()),
        unit: series.unit,
        nominal: stated(series.limits.0),
        lower: stated(series.limits.1),
        upper: stated(series.limits.2),
        order: options.order,
        newest: options.newest,
        baseline_lots: count(baseline.iter().filter(|of| **of).count()),
        rules: rules.to_vec(),
        mean_limits: None,
        ewma_limits: None,
        cusum_limit: None,
        alarms: Vec::new(),
        false_alarm_interval: None,
        components: None,
        steps: Vec::new(),
        trend: None,
        capability: Vec::new(),
        by: options.by.clone(),
        groups: Vec::new(),
        checks: series.checks.iter().map(|(one, _)| one.clone()).collect(),
        cautions: (series.without > 0)
            .then(|| TrackCaution::LotsWithout {
                lots: count(series.without),
            })
            .into_iter()
            .collect(),
        lots: charted::lots(series, baseline)?,
        provenance: Provenance {
            tool: TOOL.to_owned(),
            version: env!("CARGO_PKG_VERSION").to_owned(),
            date: options.date.to_string(),
            flags: options.flags.clone(),
            inputs: series.inputs.clone(),
            ledgers: Vec::new(),
            archive: None,
        },
        files: Vec::new(),
    })
}

/// A count as a record holds it.
fn count(number: usize) -> u32 {
    u32::try_from(number).unwrap_or(u32::MAX)
}

/// A figure that must be finite.
fn finite(value: f64, what: &'static str) -> Result<Finite, TrackError> {
    Finite::try_from(value).map_err(|_| TrackError::NotFinite { what })
}

/// A figure that may not be.
fn maybe(value: Option<f64>) -> Option<Finite> {
    value.and_then(|value| Finite::try_from(value).ok())
}

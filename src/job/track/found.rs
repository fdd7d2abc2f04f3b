//! The lots of all sources as one series.

use std::cmp::Ordering;
use std::collections::BTreeSet;
use std::path::{Path, PathBuf};

use super::{TrackError, TrackOptions};
use crate::archive::{
    Archive, Figure, LotFigures, LotHead, Referenced, latest, read_results, read_table,
};
use crate::drift::LotPoint;
use crate::intake::natural_order;
use crate::quantity::Unit;
use crate::record::LotOrder;
use crate::text::{InputFile, sha256_of};

/// One lot of the series.
pub(super) struct Charted {
    pub(super) head: LotHead,
    pub(super) run: Option<String>,
    pub(super) point: LotPoint,
    limits: Limits,
}

/// Nominal, lower, upper.
type Limits = (Option<f64>, Option<f64>, Option<f64>);

/// A characteristic over lots, in their order.
pub(super) struct Series {
    pub(super) drawing: String,
    pub(super) characteristic: String,
    pub(super) at_length_mm: Option<f64>,
    pub(super) unit: Unit,
    /// Of the newest lot.
    pub(super) limits: Limits,
    /// Whether some lot has others.
    pub(super) limits_changed: bool,
    /// Lots that have no value of it.
    pub(super) without: usize,
    pub(super) lots: Vec<Charted>,
    /// Checks of the same quantity, oldest first.
    pub(super) checks: Vec<Referenced>,
    pub(super) inputs: Vec<InputFile>,
}

#[derive(Default)]
struct Read {
    lots: Vec<LotFigures>,
    checks: Vec<Referenced>,
    inputs: Vec<InputFile>,
}

pub(super) fn series(
    sources: &[(PathBuf, String)],
    options: &TrackOptions,
) -> Result<Series, TrackError> {
    let mut read = Read::default();
    for (path, written) in sources {
        read.source(path, written, options.drawing.as_deref())?;
    }
    let Read {
        mut lots,
        mut checks,
        inputs,
    } = read;
    lots.retain(|lot| options.wants(&lot.head));
    let drawing = drawing(&lots)?;
    once(&lots)?;
    let (characteristic, at) = asked(&lots, options.characteristic.as_deref())?;
    let all = lots.len();
    let mut charted = with_value(lots, &characteristic, at);
    charted.sort_by(|(a, _), (b, _)| order(options.order, &a.head, &b.head));
    let (_, newest) = charted.last().ok_or(TrackError::NoLot)?;
    let (unit, limits) = (newest.unit, limits(newest));
    if let Some((lot, other)) = charted.iter().find(|(_, one)| one.unit != unit) {
        return Err(TrackError::Units {
            lot: lot.head.lot.clone(),
            one: other.unit.symbol(),
            other: unit.symbol(),
        });
    }
    checks.retain(|(one, _)| {
        one.name == characteristic && same(one.at_length_mm.map(f64::from), at) && one.unit == unit
    });
    checks.sort_by_key(|(one, _)| one.date);
    let lots: Vec<Charted> = charted.into_iter().map(Charted::from).collect();
    Ok(Series {
        drawing,
        characteristic,
        at_length_mm: at,
        unit,
        limits,
        limits_changed: lots.iter().any(|lot| !alike(lot.limits, limits)),
        without: all - lots.len(),
        lots,
        checks,
        inputs,
    })
}

/// The lots that have a value of the characteristic, each with its figure.
fn with_value(
    lots: Vec<LotFigures>,
    characteristic: &str,
    at: Option<f64>,
) -> Vec<(LotFigures, Figure)> {
    let is = |one: &Figure| one.characteristic == characteristic && same(one.at_length_mm, at);
    let with = |mut lot: LotFigures| {
        let place = lot.figures.iter().position(is)?;
        let figure = lot.figures.swap_remove(place);
        Some((lot, figure))
    };
    lots.into_iter().filter_map(with).collect()
}

impl From<(LotFigures, Figure)> for Charted {
    fn from((lot, figure): (LotFigures, Figure)) -> Self {
        Self {
            head: lot.head,
            run: lot.run.map(|run| run.id),
            limits: limits(&figure),
            point: LotPoint {
                springs: figure.springs,
                mean: figure.mean,
                deviation: figure.standard_deviation,
                own: figure.own_uncertainty,
            },
        }
    }
}

impl TrackOptions {
    fn wants(&self, lot: &LotHead) -> bool {
        self.since.is_none_or(|since| lot.when() >= since)
            && (self.drawing.as_ref()).is_none_or(|drawing| *drawing == lot.drawing)
    }
}

impl Read {
    fn source(
        &mut self,
        path: &Path,
        written: &str,
        drawing: Option<&str>,
    ) -> Result<(), TrackError> {
        if path.is_file() {
            self.lots.extend(read_table(path)?);
            self.inputs.push(InputFile {
                role: "figures".to_owned(),
                path: crate::text::printable(written, &crate::text::Alphabet::Any),
                sha256: sha256_of(path, written)?,
            });
        } else if path.is_dir() && !path.join("archive.json").is_file() {
            let results = read_results(path)?;
            self.lots.extend(results.lots);
            self.checks.extend(results.checks);
        } else {
            let archive = Archive::open(path)?;
            let (runs, broken) = archive.runs(drawing)?.passed_over();
            if let Some(first) = broken.first() {
                return Err(TrackError::Broken {
                    count: broken.len(),
                    first: first.to_string(),
                });
            }
            self.lots
                .extend(latest(runs).into_iter().map(LotFigures::from));
            for check in archive.checks()? {
                self.checks.extend(check.into_referenced());
            }
        }
        Ok(())
    }
}

/// The one drawing of the lots.
fn drawing(lots: &[LotFigures]) -> Result<String, TrackError> {
    let found: BTreeSet<&String> = lots.iter().map(|lot| &lot.head.drawing).collect();
    let mut drawings = found.into_iter();
    match (drawings.next(), drawings.next()) {
        (None, _) => Err(TrackError::NoLot),
        (Some(one), None) => Ok(one.clone()),
        (Some(one), Some(two)) => Err(TrackError::Drawings {
            found: [one, two].into_iter().chain(drawings).cloned().collect(),
        }),
    }
}

/// Refuses a lot that is there twice: nobody can say which counts.
fn once(lots: &[LotFigures]) -> Result<(), TrackError> {
    let mut known = BTreeSet::new();
    match lots.iter().find(|lot| !known.insert(lot.head.identity())) {
        Some(lot) => Err(TrackError::Twice {
            lot: lot.head.lot.clone(),
        }),
        None => Ok(()),
    }
}

/// The characteristic that is asked for; rate where nothing is.
fn asked(lots: &[LotFigures], wanted: Option<&str>) -> Result<(String, Option<f64>), TrackError> {
    let mut known: Vec<(String, Option<f64>)> = Vec::new();
    for figure in lots.iter().flat_map(|lot| &lot.figures) {
        let is = |one: &&(String, Option<f64>)| {
            one.0 == figure.characteristic && same(one.1, figure.at_length_mm)
        };
        if !known.iter().any(|one| is(&one)) {
            known.push((figure.characteristic.clone(), figure.at_length_mm));
        }
    }
    let wanted = wanted.unwrap_or("rate");
    let (name, at) = match wanted.split_once('@') {
        Some((name, at)) => (name, at.parse::<f64>().ok()),
        None => (wanted, None),
    };
    if let Some(found) = known.iter().find(|one| one.0 == name && same(one.1, at)) {
        return Ok(found.clone());
    }
    let shown = |(name, at): &(String, Option<f64>)| match at {
        Some(at) => format!("{name}@{at}"),
        None => name.clone(),
    };
    Err(TrackError::Characteristic {
        wanted: wanted.to_owned(),
        found: known.iter().map(shown).collect(),
    })
}

fn limits(of: &Figure) -> Limits {
    (of.nominal, of.lower, of.upper)
}

fn same(one: Option<f64>, other: Option<f64>) -> bool {
    one.map(f64::to_bits) == other.map(f64::to_bits)
}

fn alike(one: Limits, other: Limits) -> bool {
    same(one.1, other.1) && same(one.2, other.2)
}

fn order(by: LotOrder, one: &LotHead, other: &LotHead) -> Ordering {
    let lots = || natural_order(&one.lot, &other.lot);
    match by {
        LotOrder::Date => one.when().cmp(&other.when()).then_with(lots),
        LotOrder::Lot => lots().then_with(|| one.when().cmp(&other.when())),
    }
    .then_with(|| one.supplier.cmp(&other.supplier))
}

//! Per-lot figures: what a chart over lots needs of each lot, from the springs files or from a table that another engine
//! computed over them.

use serde::Serialize;

use super::read::{LotHead, LotRun, Series};
use super::springs::Run;
use crate::quantity::Unit;
use crate::stats::{mean, standard_deviation};

/// Mean and spread of one characteristic over the springs of a lot; figures in `unit`.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Figure {
    /// The quantity's name.
    pub characteristic: String,
    /// Length of a load, mm.
    pub at_length_mm: Option<f64>,
    /// Unit of the figures below.
    pub unit: Unit,
    /// Nominal value of the drawing.
    pub nominal: Option<f64>,
    /// Lower limit of the drawing.
    pub lower: Option<f64>,
    /// Upper limit of the drawing.
    pub upper: Option<f64>,
    /// Springs with a value.
    pub springs: u64,
    /// Their mean.
    pub mean: f64,
    /// Their standard deviation, n − 1; none of a single spring.
    pub standard_deviation: Option<f64>,
    /// Root mean square of the springs' own standard uncertainties; none where one of them is not known.
    pub own_uncertainty: Option<f64>,
    /// Mean of the standard uncertainties common to the rig; none where one of them is not known.
    pub common_uncertainty: Option<f64>,
}

/// A lot and the figures of each of its characteristics.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct LotFigures {
    /// The lot.
    #[serde(flatten)]
    pub head: LotHead,
    /// The run the figures come from; none in a table of another engine.
    pub run: Option<Run>,
    /// One for each characteristic with a value, in the order of the result.
    pub figures: Vec<Figure>,
}

impl From<LotRun> for LotFigures {
    fn from(run: LotRun) -> Self {
        Self {
            figures: run.series.iter().filter_map(figure).collect(),
            head: run.head,
            run: Some(run.run),
        }
    }
}

fn figure(series: &Series) -> Option<Figure> {
    let values: Vec<f64> = series.values.iter().map(|one| one.value).collect();
    let own = |one: &super::read::SpringValue| one.own.map(|own| own * own);
    let own: Option<Vec<f64>> = series.values.iter().map(own).collect();
    let common: Option<Vec<f64>> = series.values.iter().map(|one| one.common).collect();
    Some(Figure {
        characteristic: series.characteristic.clone(),
        at_length_mm: series.at_length_mm,
        unit: series.unit,
        nominal: series.nominal,
        lower: series.lower,
        upper: series.upper,
        springs: values.len() as u64,
        mean: mean(&values)?,
        standard_deviation: standard_deviation(&values),
        own_uncertainty: own.and_then(|squares| mean(&squares)).map(f64::sqrt),
        common_uncertainty: common.and_then(|common| mean(&common)),
    })
}

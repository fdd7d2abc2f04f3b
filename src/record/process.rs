//! What the sample says of the lot, characteristic by characteristic.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::quantity::Unit;
use crate::units::{Finite, Millimetres};

/// A 95 % interval; the bench's common uncertainty is in it whole.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct IntervalFacts {
    /// Lower end.
    pub lower: Finite,
    /// Upper end.
    pub upper: Finite,
}

/// A figure and its interval.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct EstimatedFacts {
    /// The figure.
    pub value: Finite,
    /// Its 95 % interval.
    pub interval: IntervalFacts,
}

/// Whether figures of the normal model mean anything.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum ShapeFacts {
    /// Fewer than eight values: not tested.
    TooFew,
    /// All values are equal.
    NoSpread,
    /// Nothing speaks against a normal distribution at the 5 % level.
    Normal {
        /// Anderson–Darling A², corrected for the size of the sample.
        statistic: Finite,
        /// Its p value.
        p: Finite,
    },
    /// Not normal at the 5 % level: figures of the normal model mislead.
    NotNormal {
        /// Anderson–Darling A², corrected for the size of the sample.
        statistic: Finite,
        /// Its p value.
        p: Finite,
    },
}

/// Process figures of one characteristic. They speak of this lot; of the supplier's process only as far as the lot stands
/// for it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ProcessFacts {
    /// The quantity's name.
    pub name: String,
    /// The length a load is asked at.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Springs with a value and its uncertainty.
    pub springs: u64,
    /// Mean.
    pub mean: Finite,
    /// Interval of the lot's mean.
    pub mean_interval: Option<IntervalFacts>,
    /// Common standard uncertainty of the mean: not smaller for more springs.
    pub common_uncertainty: Finite,
    /// Standard deviation s of the values.
    pub standard_deviation: Option<Finite>,
    /// The bench's own standard uncertainty, root mean square over the springs.
    pub own_uncertainty: Finite,
    /// Standard deviation of the springs, √(s² − own²); 0 where the bench's own scatter explains all that was seen.
    pub springs_deviation: Option<EstimatedFacts>,
    /// Whether the bench's own scatter makes up more than half of s², so that no capability is given.
    pub bench_dominates: bool,
    /// Shape.
    pub shape: ShapeFacts,
    /// Springs that stand out by Grubbs' test (5 %, either side); all figures include them.
    pub outliers: Vec<String>,
    /// Values outside the limits as drawn.
    pub outside_count: Option<u64>,
    /// Share outside by count, 0 … 1 (Clopper–Pearson, the lot also shifted by the common part).
    pub outside_share: Option<IntervalFacts>,
    /// Pp.
    pub pp: Option<EstimatedFacts>,
    /// Ppk.
    pub ppk: Option<EstimatedFacts>,
    /// Share outside by the normal model, 0 … 1.
    pub outside_by_model: Option<EstimatedFacts>,
    /// 99 % of the springs lie within, at 95 % confidence (exact two-sided factor).
    pub tolerance: Option<IntervalFacts>,
    /// 99 % lie above `lower`, and 99 % below `upper`, each at 95 % confidence (exact one-sided factor).
    pub one_sided: Option<IntervalFacts>,
}

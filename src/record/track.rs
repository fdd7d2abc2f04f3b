//! The result of `track`: a characteristic over lots.

use std::collections::BTreeMap;

use jiff::civil::Date;
use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::accept::{OutputFile, Provenance};
use super::check::EarlierCheck;
use super::track_parts::{AbleFacts, ComponentFacts, GroupFacts, StepFacts, TrendFacts};
use crate::drift::Rule;
use crate::quantity::Unit;
use crate::units::{Finite, Millimetres};

/// The job that wrote it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum TrackKind {
    /// `track`.
    Track,
}

/// What the charts say of the newest lots.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Tracked {
    /// No rule fires on them.
    Quiet,
    /// One does.
    Fires,
    /// There are too few lots for limits.
    TooFewLots,
}

/// What the lots are ordered by.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum LotOrder {
    /// Date received, else judged.
    Date,
    /// Lot number, numbers inside it by value.
    Lot,
}

/// A chart.
#[derive(
    Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize, JsonSchema,
)]
#[serde(rename_all = "snake_case")]
pub enum ChartKind {
    /// The lots' means as individuals, limits from their moving ranges.
    Mean,
    /// Standard deviations within lots.
    Spread,
    /// Exponentially weighted mean.
    Ewma,
    /// Tabular CUSUM.
    Cusum,
}

/// A centre line and its limits.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct LimitFacts {
    /// Centre line.
    pub centre: Finite,
    /// Lower limit.
    pub lower: Finite,
    /// Upper limit.
    pub upper: Finite,
}

/// A rule that fires.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct AlarmFacts {
    /// On which chart.
    pub chart: ChartKind,
    /// Which rule.
    pub rule: Rule,
    /// Place in `lots` of the last lot of the pattern, from 0.
    pub at: u32,
}

/// One lot on the charts; figures in the unit of the characteristic.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TrackedLot {
    /// Lot number.
    pub lot: String,
    /// Supplier.
    pub supplier: Option<String>,
    /// Date received, else judged.
    #[schemars(with = "String")]
    pub date: Date,
    /// Rig.
    pub rig: String,
    /// Tags.
    pub tags: BTreeMap<String, String>,
    /// The archive's run; `null` from another source.
    pub run: Option<String>,
    /// Springs with a value.
    pub springs: u64,
    /// Their mean.
    pub mean: Finite,
    /// Their standard deviation.
    pub standard_deviation: Option<Finite>,
    /// Root mean square of their own standard uncertainties.
    pub own_uncertainty: Option<Finite>,
    /// Whether it belongs to the baseline.
    pub baseline: bool,
    /// Limits of its mean if lots did not differ: centre ± 3·s_within/√n.
    pub within_limits: Option<LimitFacts>,
    /// Limits of its standard deviation.
    pub spread_limits: Option<LimitFacts>,
    /// Weighted mean.
    pub ewma: Option<Finite>,
    /// Upper CUSUM, in standard deviations of the lots' means.
    pub cusum_high: Option<Finite>,
    /// Lower CUSUM.
    pub cusum_low: Option<Finite>,
}

/// What page one must say besides.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum TrackCaution {
    /// Limits come from fewer than 40 lots; the middle 80 % of the true run length that such baselines give.
    FewBaselineLots {
        /// Lots.
        lots: u32,
        /// 10 % are shorter.
        short: Finite,
        /// 10 % are longer.
        long: Finite,
    },
    /// A rule fires inside the baseline.
    BaselineFires {
        /// Lots it fires on.
        lots: u32,
    },
    /// The lots' numbers of springs differ by more than a factor of two.
    SizesDiffer {
        /// Fewest.
        fewest: u64,
        /// Most.
        most: u64,
    },
    /// Lots were measured on several rigs.
    SeveralRigs {
        /// How many.
        rigs: u32,
    },
    /// Lots without a value of this characteristic are in no chart.
    LotsWithout {
        /// How many.
        lots: u32,
    },
    /// The limits on the drawing changed; the newest lot's are shown.
    LimitsChanged,
}

/// `result.json` of `track`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TrackRecord {
    /// Version of this layout.
    pub format: u32,
    /// `track`.
    pub kind: TrackKind,
    /// What the charts say of the newest lots.
    pub decision: Tracked,
    /// Drawing number.
    pub drawing: String,
    /// The quantity's name.
    pub characteristic: String,
    /// Length of a load.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Nominal value of the drawing.
    pub nominal: Option<Finite>,
    /// Lower limit of the drawing.
    pub lower: Option<Finite>,
    /// Upper limit of the drawing.
    pub upper: Option<Finite>,
    /// Order of the lots.
    pub order: LotOrder,
    /// How many lots count as the newest.
    pub newest: u32,
    /// Lots of the baseline.
    pub baseline_lots: u32,
    /// Rules asked on the charts of means and spreads; EWMA and CUSUM have their limits.
    pub rules: Vec<Rule>,
    /// Limits of the lots' means.
    pub mean_limits: Option<LimitFacts>,
    /// Limits of the weighted mean.
    pub ewma_limits: Option<LimitFacts>,
    /// Decision interval of the CUSUM, in standard deviations of the lots' means.
    pub cusum_limit: Option<Finite>,
    /// Rules that fire, by lot.
    pub alarms: Vec<AlarmFacts>,
    /// Lots until the first false alarm of all charts together, on the average, by simulation with known limits.
    pub false_alarm_interval: Option<Finite>,
    /// Variance components over all lots.
    pub components: Option<ComponentFacts>,
    /// Change points.
    pub steps: Vec<StepFacts>,
    /// Trend over all lots.
    pub trend: Option<TrendFacts>,
    /// Capability over time.
    pub capability: Vec<AbleFacts>,
    /// What the lots are compared by; `null` where nothing was asked.
    pub by: Option<String>,
    /// Side by side.
    pub groups: Vec<GroupFacts>,
    /// The rig's own line: checks of this quantity on a reference spring.
    pub checks: Vec<EarlierCheck>,
    /// What page one must say besides.
    pub cautions: Vec<TrackCaution>,
    /// The lots, in their order.
    pub lots: Vec<TrackedLot>,
    /// Provenance.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

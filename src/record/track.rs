//! The result of `track`: a characteristic over lots.

use std::collections::BTreeMap;

use jiff::civil::Date;
use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::accept::{OutputFile, Provenance};
use super::check::EarlierCheck;
use crate::drift::{Culprit, Rule};
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

/// Variance components.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ComponentFacts {
    /// Standard deviation between lots.
    pub between: Finite,
    /// Within lots: springs and measurement.
    pub within: Finite,
    /// Between springs; `null` where the measurement's is not known.
    pub springs: Option<Finite>,
    /// Of the measurement.
    pub measurement: Option<Finite>,
    /// F of the mean squares.
    pub f: Option<Finite>,
    /// Chance of such an F.
    pub p: Option<Finite>,
}

/// What the reference spring did at a change point.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ReferenceMoved {
    /// Checks before.
    pub checks_before: u32,
    /// Checks after.
    pub checks_after: u32,
    /// How far the reference moved, as a shift of the lots would look.
    pub moved: Finite,
    /// Standard uncertainty of it.
    pub standard_uncertainty: Finite,
}

/// A change point.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StepFacts {
    /// Place in `lots` of the first lot after it.
    pub at: u32,
    /// The last lot before it.
    pub lot_before: String,
    /// The first lot after it.
    pub lot_after: String,
    /// Earliest place of the first lot after it, 95 %.
    pub from: u32,
    /// Latest place.
    pub to: u32,
    /// Mean before it.
    pub before: Finite,
    /// Mean after it.
    pub after: Finite,
    /// After less before.
    pub jump: Finite,
    /// Standard uncertainty of the jump, from the scatter of the lots.
    pub standard_uncertainty: Finite,
    /// Chance of such a jump somewhere in the stretch, at most.
    pub chance: Finite,
    /// Springs or rig.
    pub culprit: Culprit,
    /// What the reference did, where it can be compared.
    pub reference: Option<ReferenceMoved>,
    /// Tags, supplier and rig that are one thing on all lots before and another on all lots after, as `name: before → after`.
    pub changed_with: Vec<String>,
}

/// The trend.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TrendFacts {
    /// Theil–Sen slope per lot.
    pub slope_per_lot: Finite,
    /// Lower end of its interval of 95 %.
    pub lower: Finite,
    /// Upper end.
    pub upper: Finite,
    /// Mann–Kendall's deviate.
    pub z: Finite,
    /// Its p.
    pub p: Finite,
    /// Whether p is below 0.05.
    pub moves: bool,
    /// When it would cross a limit; `null` where it would not.
    pub crossing: Option<CrossingFacts>,
}

/// When the trend would cross a limit, in lots from the newest.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CrossingFacts {
    /// The limit.
    pub limit: Finite,
    /// By the median slope.
    pub lots: Finite,
    /// At the earliest, 95 %.
    pub earliest: Finite,
    /// At the latest; `null` where that may never be.
    pub latest: Option<Finite>,
}

/// Capability of a stretch of lots.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct AbleFacts {
    /// Place of its first lot.
    pub from: u32,
    /// Place of its last lot.
    pub to: u32,
    /// Pp.
    pub pp: Option<Finite>,
    /// Ppk.
    pub ppk: Finite,
    /// Lower end of its interval of 95 %.
    pub lower: Finite,
    /// Upper end.
    pub upper: Finite,
}

/// Lots of one supplier, rig or tag.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct GroupFacts {
    /// Its value; `null` for lots that state none.
    pub value: Option<String>,
    /// Lots.
    pub lots: u32,
    /// Springs.
    pub springs: u64,
    /// Mean over its springs.
    pub mean: Finite,
    /// Standard deviation between its lots.
    pub between: Option<Finite>,
    /// Within them.
    pub within: Option<Finite>,
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

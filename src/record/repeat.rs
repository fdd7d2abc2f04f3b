//! The result of `rig repeat`.

use jiff::civil::Date;
use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::accept::{OutputFile, Provenance};
use super::bench_caution::BenchCaution;
use super::facts::RigFacts;
use crate::bench::Serving;
use crate::quantity::Unit;
use crate::units::{Finite, Millimetres};

/// The job that wrote it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub enum RepeatKind {
    /// `rig repeat`.
    #[serde(rename = "rig-repeat")]
    RigRepeat,
}

/// A line of the analysis of variance.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VarianceRow {
    /// `part`, `operator`, `interaction`, `repeats`, `total`.
    pub source: String,
    /// Sum of squares.
    pub sum_of_squares: Finite,
    /// Degrees of freedom.
    pub degrees_of_freedom: Finite,
    /// Mean square; `null` for the total.
    pub mean_square: Option<Finite>,
    /// F.
    pub f: Option<Finite>,
    /// Its upper-tail probability.
    pub p: Option<Finite>,
}

/// A component of the study's variation.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VariationShare {
    /// `repeatability`, `operator`, `interaction`, `within`, `part`, `total`.
    pub source: String,
    /// Standard deviation, in the quantity's unit.
    pub standard_deviation: Finite,
    /// Share of the variance, 0 … 1.
    pub contribution: Option<Finite>,
    /// Share of the study variation, 0 … 1.
    pub of_study: Option<Finite>,
    /// 6 s over the tolerance, 0 … 1.
    pub of_tolerance: Option<Finite>,
}

/// The study by average and range; standard deviations.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RangeFacts {
    /// Mean range of the repeats.
    pub mean_range: Finite,
    /// Range of the operators' means.
    pub operator_range: Option<Finite>,
    /// Range of the parts' means.
    pub part_range: Finite,
    /// Repeatability.
    pub repeatability: Finite,
    /// Reproducibility.
    pub reproducibility: Finite,
    /// Both.
    pub within: Finite,
    /// Parts.
    pub part: Finite,
    /// All.
    pub total: Finite,
}

/// One value of the study.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StudyValue {
    /// The spring.
    pub part: String,
    /// The operator.
    pub operator: String,
    /// The trial.
    pub trial: String,
    /// The value.
    pub value: Finite,
}

/// One quantity of the study.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StudyFacts {
    /// The quantity's name.
    pub name: String,
    /// The length of a load.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Lower limit of the drawing.
    pub lower: Option<Finite>,
    /// Upper limit of the drawing.
    pub upper: Option<Finite>,
    /// Whether the drawing requires it.
    pub required: bool,
    /// The table.
    pub variance: Vec<VarianceRow>,
    /// `full`, or `pooled` where the interaction is taken for scatter (p above 0.25).
    pub model: String,
    /// The components of that model.
    pub shares: Vec<VariationShare>,
    /// The components of the other model, where there is one.
    pub other_shares: Vec<VariationShare>,
    /// Standard deviation within a spring: repeats and operators.
    pub within_spring: Finite,
    /// Distinct categories; `null` where nothing varies.
    pub categories: Option<u32>,
    /// By average and range.
    pub ranges: Option<RangeFacts>,
    /// Whether the bench serves for it; `null` where the drawing gives it no tolerance.
    pub serving: Option<Serving>,
    /// Every value.
    pub values: Vec<StudyValue>,
}

/// A figure for the rig file.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ProposedFigure {
    /// What `[[repeatability]]` calls it.
    pub of: String,
    /// Within-spring standard deviation.
    pub standard_deviation: Finite,
    /// Its unit.
    pub unit: Unit,
    /// What the rig file has now.
    pub stated: Option<Finite>,
}

/// Why a study came out as it did.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum RepeatReason {
    /// Every required quantity takes at most 30 % of its tolerance.
    WithinTolerance {
        /// The largest share, 0 … 1.
        largest: Finite,
    },
    /// A quantity takes more than 30 % of its tolerance.
    BeyondTolerance {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// 6 s over the tolerance, 0 … 1.
        share: Finite,
    },
    /// A required quantity could not be analysed.
    NotAnalysed {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
    },
    /// There is no tolerance to hold anything against.
    NoTolerance,
}

/// `result.json` of `rig repeat`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RepeatRecord {
    /// Version of this layout.
    pub format: u32,
    /// `rig-repeat`.
    pub kind: RepeatKind,
    /// Whether the rig serves.
    pub decision: Serving,
    /// Why.
    pub reasons: Vec<RepeatReason>,
    /// Day of the study.
    #[schemars(with = "String")]
    pub judged_at: Date,
    /// The rig's name.
    pub rig: String,
    /// A note the study file asks to print.
    pub note: Option<String>,
    /// Number and revision of the drawing the tolerances come from.
    pub drawing: Option<String>,
    /// The springs.
    pub parts: Vec<String>,
    /// The operators.
    pub operators: Vec<String>,
    /// Trials of each spring by each operator.
    pub trials: u32,
    /// What page one must say besides.
    pub cautions: Vec<BenchCaution>,
    /// The rig, as its file states it.
    pub bench: RigFacts,
    /// The quantities.
    pub studies: Vec<StudyFacts>,
    /// What goes into the rig file.
    pub proposed: Vec<ProposedFigure>,
    /// Provenance.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

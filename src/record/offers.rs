//! The result of `plan`: plans side by side.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::accept::{Kind, OutputFile, Provenance};
use super::plan::StateFacts;
use crate::units::Finite;

/// The bench that the plans are carried out on.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct BenchFacts {
    /// Expanded uncertainty U as a share of the half tolerance, percent.
    pub expanded_percent: Finite,
    /// Standard deviation of the springs as a share of the half tolerance, percent.
    pub spread_percent: Finite,
    /// Share of u² that all springs have in common, percent.
    pub common_percent: Finite,
}

/// What a lot of one quality may expect.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CurvePoint {
    /// Percent nonconforming.
    pub quality_percent: Finite,
    /// Chance of acceptance on a bench without uncertainty, 0 … 1.
    pub accepted: Finite,
    /// The same on the bench; `null` where none was stated.
    pub accepted_on_bench: Option<Finite>,
    /// Chance of rejection on the bench.
    pub rejected_on_bench: Option<Finite>,
    /// Chance that the bench leaves the lot undecided.
    pub undecided_on_bench: Option<Finite>,
}

/// One plan.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct OfferFacts {
    /// What it is, in a few words.
    pub name: String,
    /// `ISO 2859-1`, `MIL-STD-414 Table B`, `designed`, `zero-accept`.
    pub source: String,
    /// Code letter from lot size and level.
    pub code_letter: Option<String>,
    /// Letter of the plan an arrow led to.
    pub used_letter: Option<String>,
    /// Springs to measure.
    pub sample_size: u64,
    /// Ac.
    pub accept: Option<u64>,
    /// Re.
    pub reject: Option<u64>,
    /// k for one limit.
    pub k: Option<Finite>,
    /// M for two limits, percent.
    pub most_percent: Option<Finite>,
    /// Springs a rejection needs on the bench, where its own scatter raises n.
    pub raised_sample_size: Option<u64>,
    /// The quality that the producer's risk is stated for, percent: the AQL, or p1.
    pub producers_quality_percent: Option<Finite>,
    /// Chance that a lot of that quality is not accepted, 0 … 1.
    pub producers_risk: Option<Finite>,
    /// The quality that the consumer's risk is stated for, percent: p2 or the limiting quality.
    pub consumers_quality_percent: Option<Finite>,
    /// Chance that a lot of that quality is accepted, 0 … 1.
    pub consumers_risk: Option<Finite>,
    /// Quality accepted 95 times in a hundred, percent.
    pub accepted_95_percent: Finite,
    /// Quality accepted as often as not, percent.
    pub accepted_50_percent: Finite,
    /// Quality accepted 10 times in a hundred, percent.
    pub accepted_10_percent: Finite,
    /// The operating characteristic.
    pub curve: Vec<CurvePoint>,
}

/// `result.json` of `plan`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct OffersRecord {
    /// Version of this layout.
    pub format: u32,
    /// `plan`.
    pub kind: Kind,
    /// Springs in the lot.
    pub lot_size: u64,
    /// The state that past lots give.
    pub state: Option<StateFacts>,
    /// The bench.
    pub bench: Option<BenchFacts>,
    /// The plans in the order asked for.
    pub plans: Vec<OfferFacts>,
    /// Provenance.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

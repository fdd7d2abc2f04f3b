//! The result of `accept`.

use std::collections::BTreeMap;

use jiff::civil::Date;
use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::caution::Caution;
use super::facts::{RigFacts, TheoryFacts, WindowFacts};
use super::plan::PlanFacts;
use super::process::ProcessFacts;
use super::spring::{LedgerFacts, SpringResult};
use super::told::Told;
use crate::drawing::Policy;
use crate::lot::{Decision, LotReason};
use crate::quantity::{Class, Unit};
use crate::text::InputFile;
use crate::units::{Finite, Millimetres};

/// Which job wrote a result.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Kind {
    /// `accept`.
    Accept,
    /// `expect`.
    Expect,
    /// `plan`.
    Plan,
}

/// What simple acceptance would have said, and whose risk it is.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SimpleAcceptance {
    /// Its decision.
    pub decision: Decision,
    /// Springs of the sample it would call failing.
    pub failing: u64,
}

/// The lot, as its file states it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct LotFacts {
    /// Lot number, as written.
    pub number: String,
    /// Springs in the lot.
    pub size: u64,
    /// Supplier.
    pub supplier: Option<String>,
    /// Date received, YYYY-MM-DD.
    pub received: Option<String>,
    /// Inspector.
    pub inspector: Option<String>,
    /// How the sample was drawn.
    pub sample_drawn: Option<String>,
    /// Free tags.
    pub tags: BTreeMap<String, String>,
    /// A note the lot file asks to print, e.g. that a sample is invented.
    pub note: Option<String>,
    /// Concession, printed beside the decision and never changing it.
    pub concession: Option<String>,
    /// The supplier's own statement of values.
    pub supplier_values: Option<String>,
    /// Requirements that are not inspected, and why.
    pub not_inspected: Vec<String>,
    /// Conditions of the test.
    pub conditions: ConditionFacts,
}

/// Conditions of the test.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ConditionFacts {
    /// Temperature, °C.
    pub temperature_c: Option<Finite>,
    /// Presetting strokes made before the recording.
    pub presetting_strokes: Option<u64>,
    /// Loading strokes at the start of each export that are presetting.
    pub presetting_recorded: u64,
}

/// One requirement of the drawing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RequirementFacts {
    /// The quantity's name.
    pub name: String,
    /// The length a load is asked at.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Nominal value.
    pub nominal: Option<Finite>,
    /// Lower limit.
    pub lower: Option<Finite>,
    /// Upper limit.
    pub upper: Option<Finite>,
    /// Class.
    pub class: Class,
    /// Mean of the measured values.
    pub mean: Option<Finite>,
    /// Standard deviation of the measured values.
    pub standard_deviation: Option<Finite>,
    /// Smallest and largest measured value.
    pub smallest: Option<Finite>,
    /// Largest measured value.
    pub largest: Option<Finite>,
    /// Largest expanded uncertainty among the springs.
    pub largest_expanded_uncertainty: Option<Finite>,
    /// Springs of each verdict: conforming.
    pub conforming: u32,
    /// Springs proven failing.
    pub failing: u32,
    /// Springs undecided.
    pub undecided: u32,
}

/// The drawing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct DrawingFacts {
    /// Drawing number.
    pub number: String,
    /// Revision.
    pub revision: Option<String>,
    /// Title.
    pub title: Option<String>,
    /// Requirements in the order of the drawing.
    pub requirements: Vec<RequirementFacts>,
    /// `guarded` or `simple`.
    pub rule: String,
    /// `t95` (95 % conformance probability) or `U`.
    pub guard: String,
    /// How undecided springs count.
    pub undecided_springs: Policy,
}

/// A file of the output folder.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct OutputFile {
    /// Path inside the folder.
    pub path: String,
    /// SHA-256 of its bytes.
    pub sha256: String,
}

/// Where the result comes from.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct Provenance {
    /// `coilassay`.
    pub tool: String,
    /// Version.
    pub version: String,
    /// Date of the judgement, YYYY-MM-DD.
    pub date: String,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
    /// Every file read, with its hash.
    pub inputs: Vec<InputFile>,
    /// The row ledger of every export.
    pub ledgers: Vec<LedgerFacts>,
    /// What an archive told; `null` where none was asked.
    #[serde(default)]
    pub archive: Option<Told>,
}

impl Provenance {
    /// Of a result of this tool in this version, made without an archive.
    pub fn new(
        date: Date,
        flags: Vec<String>,
        inputs: Vec<InputFile>,
        ledgers: Vec<LedgerFacts>,
    ) -> Self {
        Self {
            tool: super::TOOL.to_owned(),
            version: env!("CARGO_PKG_VERSION").to_owned(),
            date: date.to_string(),
            flags,
            inputs,
            ledgers,
            archive: None,
        }
    }
}

/// `result.json` of `accept`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct AcceptRecord {
    /// Version of this layout.
    pub format: u32,
    /// `accept`.
    pub kind: Kind,
    /// The decision.
    pub decision: Decision,
    /// Why.
    pub reasons: Vec<LotReason>,
    /// What simple acceptance would have said.
    pub simple: SimpleAcceptance,
    /// What page one must say besides.
    pub cautions: Vec<Caution>,
    /// The lot.
    pub lot: LotFacts,
    /// The drawing.
    pub drawing: DrawingFacts,
    /// Theory.
    pub theory: TheoryFacts,
    /// The window of the rate.
    pub window: WindowFacts,
    /// The rig.
    pub rig: RigFacts,
    /// The plan.
    pub plan: PlanFacts,
    /// What the sample says of the lot, in the order of the requirements.
    #[serde(default)]
    pub process: Vec<ProcessFacts>,
    /// The springs, by id.
    pub springs: Vec<SpringResult>,
    /// Provenance.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

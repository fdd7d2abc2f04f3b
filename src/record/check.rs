//! The result of `rig verify`.

use jiff::civil::Date;
use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::accept::{OutputFile, Provenance};
use super::bench_caution::BenchCaution;
use super::facts::RigFacts;
use super::spring::{BudgetFigure, LackFacts};
use crate::bench::{Finding, Serving};
use crate::quantity::Unit;
use crate::units::{Finite, Millimetres, Newtons};
use crate::verdict::Reason;

/// The job that wrote it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub enum CheckKind {
    /// `rig verify`.
    #[serde(rename = "rig-verify")]
    RigVerify,
}

/// The reference spring, as its certificate states it.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct ReferenceFacts {
    /// Certificate.
    pub certificate: Option<String>,
    /// Calibrated, `YYYY-MM-DD … YYYY-MM-DD`.
    pub calibrated: Option<String>,
    /// Measurements of it.
    pub measurements: u32,
    /// Where its rate is taken, in words.
    pub window: String,
}

/// One quantity of the reference spring.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ComparisonFacts {
    /// The quantity's name.
    pub name: String,
    /// The length of a load.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Certified value.
    pub reference: Finite,
    /// Its expanded uncertainty, k = 2.
    pub reference_expanded_uncertainty: Finite,
    /// Measured value, mean of the measurements.
    pub value: Option<Finite>,
    /// Its expanded uncertainty, k = 2.
    pub expanded_uncertainty: Option<Finite>,
    /// Measured less certified.
    pub error: Option<Finite>,
    /// Error over both expanded uncertainties, ISO 13528.
    pub e_n: Option<Finite>,
    /// The largest error allowed; `null` where nothing is judged by this quantity.
    pub allowed_error: Option<Finite>,
    /// The smallest error that this check can show.
    pub smallest_error_shown: Option<Finite>,
    /// What it came to.
    pub finding: Finding,
    /// Why there is no value.
    pub reason: Option<Reason>,
    /// Budget of the measured value.
    pub budget: Vec<BudgetFigure>,
}

/// A row of the frame's table.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct GivePoint {
    /// Load.
    pub load_n: Newtons,
    /// Give of the frame.
    pub give_mm: Millimetres,
}

/// The frame, from the run of plate on plate. There is no type for mm/N: the unit stands in the keys.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct FrameFacts {
    /// Slope of the straight line.
    pub compliance_mm_per_n: Finite,
    /// Its standard uncertainty; `null` where the run is too short to give one.
    pub standard_uncertainty_mm_per_n: Option<Finite>,
    /// Its expanded uncertainty.
    pub expanded_uncertainty_mm_per_n: Option<Finite>,
    /// k for 95.45 %.
    pub coverage_factor: Option<Finite>,
    /// Smallest load fitted.
    pub from_n: Newtons,
    /// Largest load fitted.
    pub to_n: Newtons,
    /// Loading passes.
    pub passes: u32,
    /// Readings fitted.
    pub readings: u64,
    /// Lack of fit of the straight line.
    pub lack_of_fit: Option<LackFacts>,
    /// Largest distance of the table from the straight line.
    pub departure_mm: Millimetres,
    /// The table, where the straight line does not do.
    pub table: Option<Vec<GivePoint>>,
    /// Give at the largest load as the rig file has it; `null` where it has none.
    pub stated_give_mm: Option<Millimetres>,
    /// Give at the largest load as measured.
    pub measured_give_mm: Millimetres,
    /// E_n of the give at the largest load against the rig file's.
    pub e_n: Option<Finite>,
    /// Budget of the slope, mm/N.
    pub budget: Vec<BudgetFigure>,
}

/// One quantity of an earlier check: what a trend is drawn from.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct EarlierCheck {
    /// Date of the check.
    #[schemars(with = "String")]
    pub date: Date,
    /// The rig's name.
    pub rig: String,
    /// The reference spring.
    pub reference: String,
    /// The quantity's name.
    pub name: String,
    /// The length of a load.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Measured less certified.
    pub error: Finite,
    /// Expanded uncertainty of the measured value, k = 2.
    pub expanded_uncertainty: Finite,
    /// E_n.
    pub e_n: Finite,
    /// Whether the whole check was passed.
    pub passed: bool,
}

/// A passed check on record, as `accept` is told of it.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct LastCheck {
    /// Date of the check.
    #[schemars(with = "String")]
    pub date: Date,
    /// What it is known by: the reference spring, or a record's name.
    pub id: String,
}

/// Why a check came out as it did.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum CheckReason {
    /// All that was compared agrees.
    AllAgree {
        /// How many quantities.
        compared: u32,
    },
    /// Quantities of one finding other than `serves`.
    Compared {
        /// The finding.
        finding: Finding,
        /// Place of each in `comparisons`.
        comparisons: Vec<u32>,
    },
    /// The run of plate on plate contradicts the rig file.
    FrameDiffers,
    /// No reference spring was measured.
    NoReference,
    /// The certificate of the reference spring does not cover the day.
    ReferenceNotValid,
}

/// `result.json` of `rig verify`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CheckRecord {
    /// Version of this layout.
    pub format: u32,
    /// `rig-verify`.
    pub kind: CheckKind,
    /// Whether the rig serves.
    pub decision: Serving,
    /// Why.
    pub reasons: Vec<CheckReason>,
    /// Whether this counts as a passed check: the decision is `serves` and a reference spring was measured.
    pub passed: bool,
    /// Day of the check: when it was measured, as the check file states it, else when it was judged.
    #[schemars(with = "String")]
    pub judged_at: Date,
    /// The rig's name.
    pub rig: String,
    /// The reference spring's name; `null` where only the frame was measured.
    pub reference: Option<String>,
    /// A note the check file asks to print.
    pub note: Option<String>,
    /// Who checked.
    pub inspector: Option<String>,
    /// Largest error allowed as a share of the tightest half tolerance, 0 … 1.
    pub share: Finite,
    /// What the tolerances are taken from, in words.
    pub tolerances: Vec<String>,
    /// What page one must say besides.
    pub cautions: Vec<BenchCaution>,
    /// The rig, as its file states it.
    pub bench: RigFacts,
    /// The certificate.
    pub reference_facts: Option<ReferenceFacts>,
    /// The quantities compared.
    pub comparisons: Vec<ComparisonFacts>,
    /// The frame.
    pub frame: Option<FrameFacts>,
    /// Earlier checks of this rig on this reference, oldest first.
    pub earlier: Vec<EarlierCheck>,
    /// Provenance.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

impl CheckRecord {
    /// This check as one of the earlier ones of a later check: a line for each quantity that has an E_n.
    pub fn as_earlier(&self) -> Vec<EarlierCheck> {
        let one = |of: &ComparisonFacts| {
            Some(EarlierCheck {
                date: self.judged_at,
                rig: self.rig.clone(),
                reference: self.reference.clone()?,
                name: of.name.clone(),
                at_length_mm: of.at_length_mm,
                unit: of.unit,
                error: of.error?,
                expanded_uncertainty: of.expanded_uncertainty?,
                e_n: of.e_n?,
                passed: self.passed,
            })
        };
        self.comparisons.iter().filter_map(one).collect()
    }

    /// This check as `accept` wants to hear of it; `None` where it was not passed.
    pub fn as_last(&self) -> Option<LastCheck> {
        let id = self.reference.clone().filter(|_| self.passed)?;
        Some(LastCheck {
            date: self.judged_at,
            id,
        })
    }
}

//! What was concluded about one spring.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::caution::Oddity;
use crate::characteristic::Part;
use crate::lot::Advice;
use crate::quantity::{Class, Unit};
use crate::units::{Finite, Millimetres, Newtons, NewtonsPerMillimetre};
use crate::verdict::{Reason, Verdict};

/// One line of an uncertainty budget.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct BudgetFigure {
    /// What it comes from, e.g. `force scale`, `fit`, `length zero`.
    pub source: String,
    /// Own or common.
    pub part: Part,
    /// Signed contribution to the value's standard uncertainty, in the value's unit.
    pub contribution: Finite,
    /// Degrees of freedom; `null` for a line known without doubt.
    pub degrees_of_freedom: Option<Finite>,
    /// Whether it enters the sum; a line that another one already holds is shown with `false`.
    pub counted: bool,
}

/// One characteristic of one spring, judged.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CharacteristicResult {
    /// The quantity's name: `rate`, `load`, `free_length` …
    pub name: String,
    /// The length a load is taken at.
    pub at_length_mm: Option<Millimetres>,
    /// The measured value.
    pub value: Option<Finite>,
    /// Combined standard uncertainty u.
    pub standard_uncertainty: Option<Finite>,
    /// The part of u that is this spring's own.
    pub own_uncertainty: Option<Finite>,
    /// The part of u that all springs of this set-up share.
    pub common_uncertainty: Option<Finite>,
    /// U = k·u.
    pub expanded_uncertainty: Option<Finite>,
    /// k for 95.45 % at the effective degrees of freedom.
    pub coverage_factor: Option<Finite>,
    /// Effective degrees of freedom (Welch–Satterthwaite); `null` where infinite or unknown.
    pub degrees_of_freedom: Option<Finite>,
    /// Unit of all figures of this characteristic.
    pub unit: Unit,
    /// Nominal value on the drawing.
    pub nominal: Option<Finite>,
    /// Lower limit of the drawing.
    pub lower: Option<Finite>,
    /// Upper limit of the drawing.
    pub upper: Option<Finite>,
    /// At or above this conformance with the lower limit is proven.
    pub accept_lower: Option<Finite>,
    /// At or below this conformance with the upper limit is proven.
    pub accept_upper: Option<Finite>,
    /// Below this failing the lower limit is proven.
    pub reject_lower: Option<Finite>,
    /// Above this failing the upper limit is proven.
    pub reject_upper: Option<Finite>,
    /// `null` where the drawing states no limit: then the value informs.
    pub verdict: Option<Verdict>,
    /// Why it has this verdict or no value.
    pub reason: Option<Reason>,
    /// Probability that the true value is inside the limits (flat prior), 0 … 1.
    pub conformance_probability: Option<Finite>,
    /// Class of the requirement.
    pub class: Option<Class>,
    /// The uncertainty budget.
    pub budget: Vec<BudgetFigure>,
}

/// Lines of an export that hold no point, and why.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct SetAside {
    /// Why: `metadata`, `header`, `units`, `blank at the end`.
    pub reason: String,
    /// First such line, 1-based.
    pub first_line: u64,
    /// Last such line.
    pub last_line: u64,
}

/// The row ledger of one export: `lines` = `points` + lines set aside.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct LedgerFacts {
    /// The export, as written.
    pub export: String,
    /// Lines in the file.
    pub lines: u64,
    /// Lines read as points.
    pub points: u64,
    /// Lines set aside.
    pub set_aside: Vec<SetAside>,
}

/// Lack of fit of the straight line.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct LackFacts {
    /// F statistic.
    pub f: Finite,
    /// Its upper-tail probability.
    pub p: Finite,
    /// Change of the local rate from one end of the window to the other, in %.
    pub bend_percent: Finite,
    /// Whether the curve bends by more than the straight line may hide.
    pub warns: bool,
}

/// The fit of the rate, and what stands beside it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct FitFacts {
    /// Export the points come from.
    pub export: String,
    /// First line of the export in the window.
    pub first_line: u64,
    /// Last line of the export in the window.
    pub last_line: u64,
    /// Travel at the window's start: length, or deflection where there is no absolute length.
    pub from_mm: Millimetres,
    /// Travel at the window's end.
    pub to_mm: Millimetres,
    /// Points fitted, dwell points averaged.
    pub points: u64,
    /// Effective number of independent points.
    pub effective_points: Option<Finite>,
    /// Lag-1 autocorrelation of the residuals, corrected for bias.
    pub lag1: Option<Finite>,
    /// Standard error of the slope as least squares gives it.
    pub standard_error: NewtonsPerMillimetre,
    /// Standard deviation of the residuals.
    pub residual_sd_n: Newtons,
    /// Largest residual as a share of Fn, %.
    pub straightness_percent: Option<Finite>,
    /// Lack of fit.
    pub lack_of_fit: Option<LackFacts>,
    /// Rate from the two ends of the window.
    pub two_point_rate: Option<NewtonsPerMillimetre>,
    /// Robust rate (Theil's incomplete method).
    pub robust_rate: Option<NewtonsPerMillimetre>,
}

/// A repeated measurement of a spring.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct RepeatFacts {
    /// The export of this measurement.
    pub export: String,
    /// Why it was taken; `null` for the first one.
    pub reason: Option<String>,
    /// Why it does not count, where it does not.
    pub invalid: Option<String>,
}

/// Lines of an export in which something is odd.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct OddLines {
    /// What.
    pub what: Oddity,
    /// The export.
    pub export: String,
    /// First such line.
    pub first_line: u64,
    /// Last such line.
    pub last_line: u64,
}

/// Something seen or measured without the bench.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct FindingResult {
    /// What was seen.
    pub text: String,
    /// Its class.
    pub class: Class,
}

/// Everything concluded about one spring.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SpringResult {
    /// The spring's id, as written.
    pub id: String,
    /// The verdict.
    pub verdict: Verdict,
    /// Class of the gravest proven failure.
    pub failing_class: Option<Class>,
    /// What simple acceptance (the value against the limits as drawn) would have said.
    pub simple_verdict: Verdict,
    /// Whether it counts for the lot decision.
    pub in_sample: bool,
    /// Its characteristics in the order of the drawing.
    pub characteristics: Vec<CharacteristicResult>,
    /// The fit of the rate.
    pub fit: Option<FitFacts>,
    /// Loading strokes in the export.
    pub loading_strokes: u32,
    /// Measurements of this spring.
    pub measurements: Vec<RepeatFacts>,
    /// What is odd in its rows, line by line; the cautions name the springs.
    pub odd: Vec<OddLines>,
    /// Visual findings.
    pub findings: Vec<FindingResult>,
    /// What would settle what is undecided.
    pub advice: Vec<Advice>,
}

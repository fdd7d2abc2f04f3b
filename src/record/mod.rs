//! What a job concluded, whole, with provenance: the types of `result.json`, written and read here.
//! Every figure is finite or absent (`null`), in mm, N, N/mm, MPa or %; there is no bare `f64`.

mod accept;
mod caution;
mod facts;
mod find;
mod spring;

pub use accept::{
    AcceptRecord, ClassPlan, ConditionFacts, DrawingFacts, Kind, LotFacts, OutputFile, PlanFacts,
    Provenance, RequirementFacts, SimpleAcceptance,
};
pub use caution::{Caution, Oddity};
pub use facts::{MemberFacts, RigFacts, StressFacts, TheoryFacts, WindowFacts};
pub use find::{Key, find, occurring};
pub use spring::{
    BudgetFigure, CharacteristicResult, FindingResult, FitFacts, LackFacts, LedgerFacts, OddLines,
    RepeatFacts, SetAside, SpringResult,
};

pub use crate::characteristic::Part;
pub use crate::curve::WindowOf;
pub use crate::drawing::Policy as Undecided;
pub use crate::lot::{Advice, Decision, LotReason};
pub use crate::verdict::{Reason, Verdict};

/// The version of the layout of `result.json`.
pub const FORMAT: u32 = 1;

/// The name under which the tool signs its results.
pub const TOOL: &str = "coilassay";

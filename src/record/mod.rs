//! What a job concluded, whole, with provenance: the types of `result.json`, written and read here.
//! Every figure is finite or absent (`null`), in mm, N, N/mm, MPa or %; there is no bare `f64`.

mod accept;
mod spring;

pub use accept::{
    AcceptRecord, Caution, ClassPlan, ConditionFacts, Decision, DrawingFacts, Kind, LotFacts,
    LotReason, MemberFacts, OutputFile, PlanFacts, Provenance, RequirementFacts, RigFacts,
    SimpleAcceptance, StressFacts, TheoryFacts, Undecided, WindowFacts, WindowOf,
};
pub use spring::{
    Advice, BudgetFigure, CharacteristicResult, FindingResult, FitFacts, LackFacts, LedgerFacts,
    Part, Reason, RepeatFacts, SetAside, SpringResult, Verdict,
};

/// The version of the layout of `result.json`.
pub const FORMAT: u32 = 1;

/// The name under which the tool signs its results.
pub const TOOL: &str = "coilassay";

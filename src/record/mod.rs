//! What a job concluded, whole, with provenance: the types of `result.json`, written and read here.
//! Every figure is finite or absent (`null`), in mm, N, N/mm, MPa or %; there is no bare `f64`.

mod accept;
mod bench_caution;
mod caution;
mod check;
mod compare;
mod expect;
mod facts;
mod find;
mod offers;
mod plan;
mod process;
mod repeat;
mod spring;
mod told;
mod track;
mod track_parts;

pub use accept::{
    AcceptRecord, ConditionFacts, DrawingFacts, Kind, LotFacts, OutputFile, Provenance,
    RequirementFacts, SimpleAcceptance,
};
pub use bench_caution::BenchCaution;
pub use caution::{Caution, Oddity};
pub use check::{
    CheckKind, CheckReason, CheckRecord, ComparisonFacts, EarlierCheck, FrameFacts, GivePoint,
    LastCheck, ReferenceFacts,
};
pub use compare::{ACROSS_VERSIONS, Closeness, Difference, differences};
pub use expect::{
    Expected, ExpectedRequirement, MemberAnswer, ServiceFacts, StageFacts, StressAnswer,
};
pub use facts::{MemberFacts, RigFacts, StressFacts, TheoryFacts, WindowFacts};
pub use find::{Key, find, occurring};
pub use offers::{BenchFacts, CurvePoint, OfferFacts, OffersRecord};
pub use plan::{ClassPlan, PlanFacts, SettlingFacts, StateFacts, VariablesFacts, ZeroAcceptFacts};
pub use process::{EstimatedFacts, IntervalFacts, ProcessFacts, ShapeFacts};
pub use repeat::{
    ProposedFigure, RangeFacts, RepeatKind, RepeatReason, RepeatRecord, StudyFacts, StudyValue,
    VarianceRow, VariationShare,
};
pub use spring::{
    BudgetFigure, CharacteristicResult, FindingResult, FitFacts, LackFacts, LedgerFacts, OddLines,
    RepeatFacts, SetAside, SpringResult,
};

pub use crate::bench::{Finding, Serving};
pub use told::Told;
pub use track::{
    AlarmFacts, ChartKind, LimitFacts, LotOrder, TrackCaution, TrackKind, TrackRecord, Tracked,
    TrackedLot,
};
pub use track_parts::{
    AbleFacts, ComponentFacts, CrossingFacts, GroupFacts, ReferenceMoved, StepFacts, TrendFacts,
};

pub use crate::drift::{Culprit, Rule, Unclear};

pub use crate::characteristic::Part;
pub use crate::curve::WindowOf;
pub use crate::drawing::Policy as Undecided;
pub use crate::lot::{Advice, Comparison, Decision, LotReason};
pub use crate::review::{
    Basis, Clearance, DrawingFinding, Fatigue, FatigueMargin, Fitting, Needed, Outlook,
    Permissible, ReadAs, SpringBuckling, StrengthGap, StrengthLine, StressPlace,
};
pub use crate::sampling::Reason as StateReason;
pub use crate::verdict::{Reason, Verdict};

/// The version of the layout of `result.json`.
pub const FORMAT: u32 = 1;

/// The name under which the tool signs its results.
pub const TOOL: &str = "coilassay";

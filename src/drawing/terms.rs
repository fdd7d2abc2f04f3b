//! What the drawing states of the test and of acceptance: data only.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::quantity::Class;

/// The acceptance quality limits of ISO 2859-1 in percent nonconforming, left to right as in its tables. (They go on
/// to 1000 nonconformities per hundred, which springs do not need.)
pub const AQLS: [f64; 16] = [
    0.01, 0.015, 0.025, 0.04, 0.065, 0.1, 0.15, 0.25, 0.4, 0.65, 1.0, 1.5, 2.5, 4.0, 6.5, 10.0,
];

/// Inspection level of ISO 2859-1.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[expect(missing_docs, reason = "the names are the standard's")]
pub enum Level {
    S1,
    S2,
    S3,
    S4,
    I,
    II,
    III,
}

impl Level {
    /// Every level with the word the standard uses.
    pub const WORDS: [(&'static str, Self); 7] = [
        ("S-1", Self::S1),
        ("S-2", Self::S2),
        ("S-3", Self::S3),
        ("S-4", Self::S4),
        ("I", Self::I),
        ("II", Self::II),
        ("III", Self::III),
    ];

    /// The word for it.
    pub fn word(self) -> &'static str {
        Self::WORDS
            .iter()
            .find(|(_, level)| *level == self)
            .map_or("", |(word, _)| word)
    }
}

/// The acceptance quality limits of MIL-STD-414 Table B in percent nonconforming.
pub const AQLS_414: [f64; 14] = [
    0.04, 0.065, 0.1, 0.15, 0.25, 0.4, 0.65, 1.0, 1.5, 2.5, 4.0, 6.5, 10.0, 15.0,
];

/// Inspection level of MIL-STD-414; IV where nothing is stated.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[expect(missing_docs, reason = "the names are the standard's")]
pub enum Level414 {
    I,
    II,
    III,
    IV,
    V,
}

impl Level414 {
    /// Every level with the word the standard uses.
    pub const WORDS: [(&'static str, Self); 5] = [
        ("I", Self::I),
        ("II", Self::II),
        ("III", Self::III),
        ("IV", Self::IV),
        ("V", Self::V),
    ];

    /// The word for it.
    pub fn word(self) -> &'static str {
        Self::WORDS
            .iter()
            .find(|(_, level)| *level == self)
            .map_or("", |(word, _)| word)
    }
}

/// State of inspection.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum State {
    /// Normal.
    Normal,
    /// Tightened.
    Tightened,
    /// Reduced.
    Reduced,
}

impl State {
    /// Every state with its word.
    pub const WORDS: [(&'static str, Self); 3] = [
        ("normal", Self::Normal),
        ("tightened", Self::Tightened),
        ("reduced", Self::Reduced),
    ];

    /// The word for it.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Normal => "normal",
            Self::Tightened => "tightened",
            Self::Reduced => "reduced",
        }
    }
}

/// The window of the rate as the drawing states it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Window {
    /// Shares of Fn.
    FullLoad(f64, f64),
    /// Shares of the deflection L0 − Ln.
    Deflection(f64, f64),
    /// From a longer to a shorter length, mm.
    Lengths(f64, f64),
}

/// Which way the platen moves.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Way {
    /// Compressing.
    Loading,
    /// Releasing.
    Unloading,
}

/// The stroke that is judged.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stroke {
    /// `Some(0)` the first, `Some(1)` the second …; `None` the last.
    pub index: Option<usize>,
    /// Loading or unloading.
    pub way: Way,
}

/// How the rate is drawn from the points of the window.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Method {
    /// Least squares of load on deflection.
    Fit,
    /// The two ends of the window.
    TwoPoint,
}

/// The rate test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RateTest {
    /// The window.
    pub window: Window,
    /// Fn in N, where the drawing states it.
    pub full_load: Option<f64>,
    /// The stroke.
    pub stroke: Stroke,
    /// The method.
    pub method: Method,
}

/// The decision rule.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Rule {
    /// Conformance and failure each need proof beyond the guard band.
    Guarded,
    /// The value against the limits as drawn.
    Simple,
}

/// The width of the guard band.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Guard {
    /// 95 % conformance probability: t₀.₉₅(ν)·u.
    T95,
    /// The expanded uncertainty U.
    U,
}

/// How undecided springs count for the lot.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Policy {
    /// They leave the lot undecided.
    Report,
    /// They count as conforming.
    Pass,
    /// They count as failing.
    Fail,
}

/// Acceptance quality limits by class.
#[derive(Clone, Debug, PartialEq)]
pub enum Aqls {
    /// One for all classes (`critical` stays zero-accept).
    All(f64),
    /// One for each class named.
    ByClass(Vec<(Class, f64)>),
}

/// The sampling plan as agreed.
#[derive(Clone, Debug, PartialEq)]
pub enum PlanTerms {
    /// ISO 2859-1, single sampling.
    Attributes {
        /// Inspection level.
        level: Level,
        /// Acceptance quality limits.
        aql: Aqls,
        /// State of inspection, where no history says it.
        state: State,
        /// Whether reduced inspection is agreed, should a history earn it.
        reduced_agreed: bool,
    },
    /// MIL-STD-414 Table B, standard deviation unknown: one plan for each characteristic.
    Variables {
        /// Inspection level.
        level: Level414,
        /// Acceptance quality limits.
        aql: Aqls,
        /// State of inspection: normal or tightened.
        state: State,
    },
    /// A plan by variables designed from two points of the operating characteristic, shares 0 to 1.
    Designed {
        /// Quality to accept.
        p1: f64,
        /// Producer's risk there.
        alpha: f64,
        /// Quality to reject.
        p2: f64,
        /// Consumer's risk there.
        beta: f64,
    },
    /// No spring of the sample may fail, whatever its class; shares 0 to 1.
    ZeroAccept {
        /// Limiting quality.
        limiting_quality: f64,
        /// Consumer's risk there.
        consumer_risk: f64,
    },
    /// Every spring of the lot is measured and none may fail.
    EverySpring,
}

/// The acceptance terms.
#[derive(Clone, Debug, PartialEq)]
pub struct Acceptance {
    /// Decision rule.
    pub rule: Rule,
    /// Guard band.
    pub guard: Guard,
    /// Undecided springs.
    pub undecided: Policy,
    /// Plan.
    pub plan: PlanTerms,
}

/// The words for the first strokes.
pub(super) const ORDINALS: [&str; 5] = ["first", "second", "third", "fourth", "fifth"];

impl Stroke {
    /// The words for it, as a drawing states it.
    pub fn words(self) -> String {
        let ordinal = self
            .index
            .map_or("last", |index| ORDINALS.get(index).copied().unwrap_or("?"));
        let way = match self.way {
            Way::Loading => "loading",
            Way::Unloading => "unloading",
        };
        format!("{ordinal} {way}")
    }
}

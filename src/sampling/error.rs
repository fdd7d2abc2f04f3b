//! What a plan asked for cannot be.
#![expect(missing_docs, reason = "the messages say it")]

use crate::drawing::State;
use crate::quantity::Class;
use crate::stats::StatsError;

/// Faults of a plan asked for.
#[derive(Clone, Debug, PartialEq, thiserror::Error, miette::Diagnostic)]
pub enum PlanError {
    #[error("a lot of {found} cannot be sampled, the table begins at {least}")]
    #[diagnostic(
        code(coilassay::plan::size),
        help("check the size of the lot; for so small a lot agree by = \"every-spring\"")
    )]
    LotTooSmall { found: u64, least: u64 },
    #[error("AQL {found} % is not in {table}, which has {known}")]
    #[diagnostic(code(coilassay::plan::aql))]
    UnknownAql {
        found: f64,
        table: &'static str,
        known: String,
    },
    #[error("a finding or requirement is {}, and the drawing agrees no AQL for that class", class.word())]
    #[diagnostic(
        code(coilassay::plan::class),
        help("write aql = {{ {} = … }} into the drawing's plan, or give the finding a class that has one", class.word())
    )]
    NoAql { class: Class },
    #[error("{table} has no plan for letter {letter} at AQL {aql} % under {} inspection", state.word())]
    #[diagnostic(code(coilassay::plan::cell), help("agree another AQL or level"))]
    NoPlan {
        table: &'static str,
        letter: char,
        aql: f64,
        state: State,
    },
    #[error("the plan takes {wanted} springs and the lot holds {lot}")]
    #[diagnostic(
        code(coilassay::plan::lot_smaller),
        help(
            "a plan by variables needs its whole sample; for this lot agree by = \"every-spring\" or by = \"attributes\""
        )
    )]
    SampleExceedsLot { wanted: u64, lot: u64 },
    #[error("{what} is {found} %, not above 0 and below 100 %")]
    #[diagnostic(
        code(coilassay::plan::share),
        help("write it as a share such as \"5 %\"")
    )]
    NoShare { what: &'static str, found: f64 },
    #[error("p1 = {p1} % is not below p2 = {p2} %")]
    #[diagnostic(
        code(coilassay::plan::points),
        help(
            "p1 is the quality to be accepted nearly always, p2 the one to be rejected nearly always"
        )
    )]
    PointsReversed { p1: f64, p2: f64 },
    #[error("alpha {alpha} % and beta {beta} % together leave no plan: they must stay below 100 %")]
    #[diagnostic(code(coilassay::plan::risks), help("usual are 5 % and 10 %"))]
    RisksTooLarge { alpha: f64, beta: f64 },
    #[error("no plan of at most {most} springs keeps both risks")]
    #[diagnostic(
        code(coilassay::plan::too_many),
        help("let p1 and p2 lie farther apart, or allow larger risks")
    )]
    TooMany { most: u64 },
    #[error("the plan's figures cannot be computed")]
    #[diagnostic(code(coilassay::plan::statistics))]
    Statistics {
        #[from]
        source: StatsError,
    },
}

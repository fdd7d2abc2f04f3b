//! What is asked of `plan`, and what it refuses.

use jiff::civil::Date;

use super::super::accept::Past;
use crate::drawing::{Level, Level414, State};
use crate::sampling::Points;
use crate::wording::number;

/// A plan asked for; shares 0 to 1, AQLs in percent.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Asked {
    /// ISO 2859-1.
    Attributes {
        /// Inspection level.
        level: Level,
        /// AQL.
        aql: f64,
        /// State; `None` where past lots give it, else normal.
        state: Option<State>,
    },
    /// MIL-STD-414 Table B.
    Variables {
        /// Inspection level.
        level: Level414,
        /// AQL.
        aql: f64,
        /// State.
        state: State,
    },
    /// Designed by variables.
    Designed(Points),
    /// Zero-accept.
    ZeroAccept {
        /// Limiting quality.
        limiting_quality: f64,
        /// Consumer's risk.
        consumer_risk: f64,
    },
}

/// The bench, shares 0 to 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BenchAsked {
    /// U over the half tolerance.
    pub expanded: f64,
    /// Standard deviation of the springs over the half tolerance.
    pub spread: f64,
    /// Common share of u².
    pub common: f64,
}

/// What is asked.
#[derive(Clone, Debug)]
pub struct PlanOptions {
    /// Springs in the lot.
    pub lot_size: u64,
    /// The plans.
    pub asked: Vec<Asked>,
    /// The bench.
    pub bench: Option<BenchAsked>,
    /// Past lots.
    pub past: Option<Past>,
    /// Whether reduced inspection is agreed.
    pub reduced_agreed: bool,
    /// Date.
    pub date: Date,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
}

/// Why plans cannot be compared.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum CompareError {
    #[error("no plan is asked for")]
    #[diagnostic(
        code(coilassay::plan::none),
        help("add --aql 1.0, --mil-std-414 1.0, --designed 1%:5%:5%:10% or --zero-accept 4%:10%")
    )]
    NoPlan,
    #[error("inspection is discontinued: lot {lot} was the fifth not accepted while tightened")]
    #[diagnostic(
        code(coilassay::plan::discontinued),
        help("once the supplier has acted, add a line with the decision resumed to the history")
    )]
    Discontinued { lot: String },
    #[error("the bench's {what} is {found} %, which is no usable share")]
    #[diagnostic(
        code(coilassay::plan::bench),
        help(
            "--bench U:SPREAD:COMMON, for instance 25%:33%:80%: U and the springs' standard deviation over the half tolerance, above 0, and the common share of u², 0 to 100 %"
        )
    )]
    Bench { what: &'static str, found: f64 },
}

fn percent(share: f64) -> String {
    number(Some(100.0 * share), 4)
}

/// What a plan is, in a few words.
pub(super) fn name(asked: Asked, now: State) -> String {
    match asked {
        Asked::Attributes { level, aql, state } => {
            let state = state.unwrap_or(now).word();
            format!(
                "level {}, AQL {}, {state}",
                level.word(),
                number(Some(aql), 4)
            )
        }
        Asked::Variables { level, aql, state } => format!(
            "MIL-STD-414 level {}, AQL {}, {}",
            level.word(),
            number(Some(aql), 4),
            state.word()
        ),
        Asked::Designed(points) => format!(
            "designed {} % (α {} %) to {} % (β {} %)",
            percent(points.p1),
            percent(points.alpha),
            percent(points.p2),
            percent(points.beta)
        ),
        Asked::ZeroAccept {
            limiting_quality,
            consumer_risk,
        } => format!(
            "zero-accept, LQ {} % at {} %",
            percent(limiting_quality),
            percent(consumer_risk)
        ),
    }
}

//! What `stats` refuses.
#![expect(missing_docs, reason = "the messages say it")]

/// Faults of a distribution asked for what it cannot give.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum StatsError {
    #[error("probability {found} is not strictly between 0 and 1")]
    Probability { found: f64 },
    #[error("share {found} is not within 0 and 1")]
    Share { found: f64 },
    #[error("degrees of freedom {found} are not within {from} and {to}")]
    Dof { found: f64, from: f64, to: f64 },
    #[error("argument {found} is not a number this distribution takes")]
    Argument { found: f64 },
    #[error("{found} trials are more than the {most} the binomial sum is proven for")]
    Trials { found: u64, most: u64 },
    #[error("quantile {quantile} has probability {got}, wanted {wanted}")]
    Missed {
        quantile: f64,
        got: f64,
        wanted: f64,
    },
    #[error("no value between {low} and {high} gives what was asked for")]
    NoRoot { low: f64, high: f64 },
}

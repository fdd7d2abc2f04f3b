//! What `fit` refuses.
#![expect(missing_docs, reason = "the messages say it")]

/// Points through which no line can be laid.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum FitError {
    #[error("{x} abscissae for {y} ordinates")]
    LengthsDiffer { x: usize, y: usize },
    #[error("point {point} of the fit is not finite")] // 1-based
    NotFinite { point: usize },
    #[error("a line needs points at three or more abscissae, found {found}")]
    TooFewAbscissae { found: usize },
    #[error("the points are too far apart or too close for a line in double precision")]
    OutOfRange,
    #[error("`linreg` refused the points: {reason}")]
    Refused { reason: String },
}

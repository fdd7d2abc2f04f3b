//! What `cause` refuses.
#![expect(missing_docs, reason = "the messages say it")]

/// Faults of findings that cannot be weighed.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum CauseError {
    #[error("{what} is {found}, not a number above zero")]
    NotAboveZero { what: &'static str, found: f64 },
    #[error("{what} is {found}, not a finite number")]
    NotFinite { what: &'static str, found: f64 },
    #[error("{measure:?} is compared twice")]
    Twice { measure: super::Measure },
    #[error("nothing measured is compared with the baseline")]
    Nothing,
    #[error("mean coil diameter {coil} mm is not larger than the wire of {wire} mm")]
    Coil { coil: f64, wire: f64 },
    #[error("{total} coils in all are fewer than the {active} active ones")]
    Coils { total: f64, active: f64 },
    #[error("free length {free} mm is not above the solid length {solid} mm")]
    Lengths { free: f64, solid: f64 },
    #[error("the findings' uncertainties contradict each other: their covariance is not positive")]
    Covariance,
}

//! The check on a reference spring: measured value against the certificate's.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::characteristic::Measured;
use crate::quantity::Quantity;

/// k of the expanded uncertainties under E_n (ISO 13528).
const K: f64 = 2.0;

/// What a certificate says of one quantity of the reference spring.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Certified {
    /// Which.
    pub quantity: Quantity,
    /// Its value, in the quantity's unit.
    pub value: f64,
    /// Standard uncertainty, U/k.
    pub standard: f64,
}

/// What one comparison came to.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Finding {
    /// The error is within both uncertainties and within what is allowed.
    Serves,
    /// |E_n| above 1: the error is larger than both uncertainties together explain.
    Disagrees,
    /// The error is beyond the allowed share of the tolerance.
    BeyondShare,
    /// Reference and repeats are too uncertain to show an error as small as is allowed.
    CannotTell,
    /// The mean agrees, but a measurement by itself does not: they may not all be of this spring.
    Scattered,
    /// No value, or none whose uncertainty is known.
    NotMeasured,
}

/// Whether a bench serves.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Serving {
    /// It does.
    Serves,
    /// It does not.
    Fails,
    /// What was measured does not settle it.
    Undecided,
}

impl Finding {
    /// What it means for the bench.
    pub const fn serving(self) -> Serving {
        match self {
            Self::Serves => Serving::Serves,
            Self::Disagrees | Self::BeyondShare => Serving::Fails,
            Self::CannotTell | Self::Scattered | Self::NotMeasured => Serving::Undecided,
        }
    }
}

/// Several findings as one: one failure fails, else one that is open leaves it open. None at all is open.
pub fn overall(findings: impl IntoIterator<Item = Serving>) -> Serving {
    let mut worst = None;
    for one in findings {
        worst = match (worst, one) {
            (Some(Serving::Fails), _) | (_, Serving::Fails) => Some(Serving::Fails),
            (Some(Serving::Undecided), _) | (_, Serving::Undecided) => Some(Serving::Undecided),
            _ => Some(Serving::Serves),
        };
    }
    worst.unwrap_or(Serving::Undecided)
}

/// One quantity compared.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Comparison {
    /// Measured less certified.
    pub error: Option<f64>,
    /// Expanded uncertainty of the measured value, k = 2.
    pub expanded: Option<f64>,
    /// Expanded uncertainty of the certified value, k = 2.
    pub reference_expanded: f64,
    /// (x − x_ref)/√(U² + U_ref²).
    pub e_n: Option<f64>,
    /// The largest error allowed.
    pub allowed: Option<f64>,
    /// The smallest error this check can show: 2·√(u_own² + u_ref²). What is common to the rig is not in it, for that
    /// is what the check is after.
    pub shows: Option<f64>,
    /// What it came to.
    pub finding: Finding,
}

impl Comparison {
    /// The comparison of a mean, beside that of each measurement by itself: a mean hides what they do.
    #[must_use]
    pub fn beside(self, each: &[Self]) -> Self {
        let off = |one: &Self| one.e_n.is_none_or(|e_n| e_n.abs() > 1.0);
        if self.finding == Finding::Serves && each.iter().any(off) {
            return Self {
                finding: Finding::Scattered,
                ..self
            };
        }
        self
    }
}

/// Compares a measured value with the certificate's; `allowed` is the largest error allowed, where one is stated.
pub fn compare(certified: &Certified, measured: &Measured, allowed: Option<f64>) -> Comparison {
    let reference_expanded = K * certified.standard;
    let absent = Comparison {
        error: None,
        expanded: None,
        reference_expanded,
        e_n: None,
        allowed,
        shows: None,
        finding: Finding::NotMeasured,
    };
    let Measured::Value(estimate) = measured else {
        return absent;
    };
    let error = estimate.value - certified.value;
    let Some(uncertainty) = estimate.uncertainty else {
        return Comparison {
            error: Some(error),
            ..absent
        };
    };
    let expanded = K * uncertainty.standard;
    let e_n = error / expanded.hypot(reference_expanded);
    let shows = K * uncertainty.own.hypot(certified.standard);
    Comparison {
        error: Some(error),
        expanded: Some(expanded),
        e_n: Some(e_n),
        shows: Some(shows),
        finding: finding(e_n, error, shows, allowed),
        ..absent
    }
}

fn finding(e_n: f64, error: f64, shows: f64, allowed: Option<f64>) -> Finding {
    if e_n.is_nan() {
        return Finding::NotMeasured; // neither value has any uncertainty
    }
    if e_n.abs() > 1.0 {
        return Finding::Disagrees;
    }
    match allowed {
        Some(allowed) if shows > allowed => Finding::CannotTell,
        Some(allowed) if error.abs() > allowed => Finding::BeyondShare,
        _ => Finding::Serves,
    }
}

//! Whether normal-model figures mean anything, and which springs stand out.

use crate::stats::{FEWEST, StatsError, anderson_darling, grubbs_outlier};

/// Level of both tests.
const LEVEL: f64 = 0.05;
/// Values named one after another; a second one may hide behind the first.
const NAMED: usize = 3;

/// What the Anderson–Darling test says of the values.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Shape {
    /// Fewer than eight values: not tested.
    TooFew,
    /// All values are equal.
    NoSpread,
    /// Nothing speaks against a normal distribution at the 5 % level.
    Normal {
        /// Corrected A².
        statistic: f64,
        /// p.
        p: f64,
    },
    /// Not normal at the 5 % level: figures of the normal model mislead.
    NotNormal {
        /// Corrected A².
        statistic: f64,
        /// p.
        p: f64,
    },
}

/// The shape of some values.
///
/// # Errors
/// [`StatsError`] for a value that is not finite.
pub(super) fn shape(values: &[f64]) -> Result<Shape, StatsError> {
    if values.len() < FEWEST {
        return Ok(Shape::TooFew);
    }
    let Some(found) = anderson_darling(values)? else {
        return Ok(Shape::NoSpread);
    };
    let (statistic, p) = (found.corrected, found.p);
    Ok(if p < LEVEL {
        Shape::NotNormal { statistic, p }
    } else {
        Shape::Normal { statistic, p }
    })
}

/// The places of up to three values that stand out, each found beside the rest; none is left out of any figure.
///
/// # Errors
/// [`StatsError`] where a critical value cannot be had.
pub(super) fn outliers(values: &[f64]) -> Result<Vec<usize>, StatsError> {
    let mut left: Vec<(usize, f64)> = values.iter().copied().enumerate().collect();
    let mut found = Vec::new();
    while found.len() < NAMED {
        let rest: Vec<f64> = left.iter().map(|(_, value)| *value).collect();
        let Some(place) = grubbs_outlier(&rest, LEVEL)? else {
            break;
        };
        found.push(left.remove(place).0);
    }
    Ok(found)
}

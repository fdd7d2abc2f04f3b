//! Variance between lots, between the springs of a lot, and of the measurement.

use super::LotPoint;
use crate::stats::f_upper_tail;

/// A one-way analysis of variance over lots, and what it splits into.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Components {
    /// Sum of squares between lots.
    pub sum_between: f64,
    /// Its degrees of freedom.
    pub dof_between: f64,
    /// Sum of squares within lots.
    pub sum_within: f64,
    /// Its degrees of freedom.
    pub dof_within: f64,
    /// F of the two mean squares.
    pub f: Option<f64>,
    /// Chance of such an F or a larger one.
    pub p: Option<f64>,
    /// n0: the size of lot that equal lots would have.
    pub size: f64,
    /// Variance between lots, (MSB − MSW)/n0; none below zero.
    pub between: f64,
    /// Variance within lots, MSW: springs and measurement together.
    pub within: f64,
    /// Variance of the measurement that is each spring's own; `None` where one is not known.
    pub measurement: Option<f64>,
    /// Mean over all springs.
    pub mean: f64,
    /// Springs.
    pub springs: f64,
}

impl Components {
    /// Variance between the springs of a lot: within less measurement, none below zero.
    pub fn spring_to_spring(&self) -> Option<f64> {
        self.measurement
            .map(|measurement| (self.within - measurement).max(0.0))
    }

    /// Mean square between lots.
    pub fn mean_square_between(&self) -> f64 {
        self.sum_between / self.dof_between
    }
}

/// The components over lots; `None` for fewer than two lots, or where no lot has two springs.
pub fn components(lots: &[LotPoint]) -> Option<Components> {
    let springs: f64 = lots.iter().map(|lot| lot.springs as f64).sum();
    let count = lots.len() as f64;
    let (dof_between, dof_within) = (count - 1.0, springs - count);
    if dof_between < 1.0 || dof_within < 1.0 {
        return None;
    }
    let first = lots.first()?.mean; // sums about a lot's mean lose no digits to the level
    let lifted = |lot: &LotPoint| lot.springs as f64 * (lot.mean - first);
    let mean = first + lots.iter().map(lifted).sum::<f64>() / springs;
    let between = |lot: &LotPoint| lot.springs as f64 * (lot.mean - mean).powi(2);
    let within = |lot: &LotPoint| {
        let dof = lot.springs.saturating_sub(1) as f64;
        dof * lot.deviation.map_or(0.0, |deviation| deviation * deviation)
    };
    let sum_between: f64 = lots.iter().map(between).sum();
    let sum_within: f64 = lots.iter().map(within).sum();
    let squares: f64 = lots.iter().map(|lot| (lot.springs as f64).powi(2)).sum();
    let size = (springs - squares / springs) / dof_between;
    let (msb, msw) = (sum_between / dof_between, sum_within / dof_within);
    let f = Some(msb / msw).filter(|f| f.is_finite());
    let own = |lot: &LotPoint| lot.own.map(|own| lot.springs as f64 * own * own);
    let own: Option<Vec<f64>> = lots.iter().map(own).collect();
    Some(Components {
        sum_between,
        dof_between,
        sum_within,
        dof_within,
        f,
        p: f.and_then(|f| f_upper_tail(f, dof_between, dof_within).ok()),
        size,
        between: ((msb - msw) / size).max(0.0),
        within: msw,
        measurement: own.map(|own| own.iter().sum::<f64>() / springs),
        mean,
        springs,
    })
    .filter(|found| found.mean.is_finite() && found.sum_between.is_finite())
}

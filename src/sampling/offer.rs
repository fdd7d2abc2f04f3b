//! One plan as it is compared with others: its numbers and its operating characteristic, with and without the bench.

use super::curve::{Bench, Chances, Counted, Measured, attributes_chances, variables_chances};
use super::zero_accept::nonconforming;
use super::{Designed, PlanError, SinglePlan, VariablesPlan, ZeroAccept};
use crate::stats::none_drawn;

/// Halvings of the search for a quality: to the last digit of a share.
const HALVINGS: u32 = 60;

/// A plan to compare.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Offer {
    /// ISO 2859-1.
    Attributes(SinglePlan),
    /// MIL-STD-414 Table B.
    Variables(VariablesPlan),
    /// Designed from two points.
    Designed(Designed),
    /// Zero-accept.
    ZeroAccept(ZeroAccept),
}

impl Offer {
    /// Springs to measure of a lot of `lot_size`.
    pub fn sample_size(&self, lot_size: u64) -> u64 {
        match self {
            Self::Attributes(plan) => u64::from(plan.sample_size).min(lot_size),
            Self::Variables(plan) => plan.sample_size,
            Self::Designed(found) => found.plan.sample_size,
            Self::ZeroAccept(plan) => plan.sample_size,
        }
    }

    /// The plan by variables in it.
    pub const fn measured(&self) -> Option<&VariablesPlan> {
        match self {
            Self::Variables(plan) => Some(plan),
            Self::Designed(found) => Some(&found.plan),
            Self::Attributes(_) | Self::ZeroAccept(_) => None,
        }
    }

    /// Ac and Re; `None` for a plan by variables.
    pub fn counted(&self, lot_size: u64) -> Option<Counted> {
        let sample_size = self.sample_size(lot_size);
        match self {
            Self::Attributes(plan) => Some(Counted {
                sample_size,
                accept: plan.accept.into(),
                reject: plan.reject.into(),
            }),
            Self::ZeroAccept(_) => Some(Counted {
                sample_size,
                accept: 0,
                reject: 1,
            }),
            Self::Variables(_) | Self::Designed(_) => None,
        }
    }

    /// The chance that a lot of the share `p` nonconforming is accepted, on a bench without uncertainty. A zero-accept plan
    /// draws from this one lot (hypergeometric); the others judge a stream of lots.
    ///
    /// # Errors
    /// [`PlanError::Statistics`] for a p outside 0…1.
    pub fn accepted(&self, lot_size: u64, p: f64) -> Result<f64, PlanError> {
        if let Self::ZeroAccept(plan) = self {
            let marked = if p <= 0.0 {
                0
            } else {
                nonconforming(lot_size, p)
            };
            return Ok(none_drawn(lot_size, marked, plan.sample_size)?);
        }
        let none = Bench {
            own: 0.0,
            common: 0.0,
        };
        Ok(self.chances(lot_size, none, p)?.accepted)
    }

    /// The chances in a stream of lots of the share `p` nonconforming, with the bench.
    ///
    /// # Errors
    /// [`PlanError::Statistics`] for a p outside 0…1.
    pub fn chances(&self, lot_size: u64, bench: Bench, p: f64) -> Result<Chances, PlanError> {
        match (self.measured(), self.counted(lot_size)) {
            (Some(plan), _) => variables_chances(Measured::on(plan, bench), bench, p),
            (None, Some(plan)) => attributes_chances(plan, bench, p),
            (None, None) => Err(PlanError::LotTooSmall {
                found: lot_size,
                least: 2,
            }), // never: a plan is one or the other
        }
    }

    /// The quality that is accepted with the chance `level`.
    ///
    /// # Errors
    /// As [`Offer::accepted`].
    pub fn quality_at(&self, lot_size: u64, level: f64) -> Result<f64, PlanError> {
        let (mut low, mut high) = (0.0, 1.0);
        for _ in 0..HALVINGS {
            let middle = f64::midpoint(low, high);
            if self.accepted(lot_size, middle)? > level {
                low = middle;
            } else {
                high = middle;
            }
        }
        Ok(high)
    }
}

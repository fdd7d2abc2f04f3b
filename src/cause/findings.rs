//! The measured changes with their covariance, and the sights.

use super::{CauseError, Measure, Sight};

/// One measured change, in the measure's unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Compared {
    /// What was compared.
    pub measure: Measure,
    /// Returned minus baseline.
    pub change: f64,
    /// Spread of new springs about the baseline; 0 where the baseline is this very spring.
    pub lot_spread: f64,
    /// Standard uncertainty of the difference that no other finding shares.
    pub own: f64,
}

/// An error that several findings share: its part in each, signed, one standard uncertainty large.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Shared(pub Vec<(Measure, f64)>);

/// Everything that is weighed.
#[derive(Clone, Debug, PartialEq)]
pub struct Findings {
    compared: Vec<Compared>,
    shared: Vec<Shared>,
    sights: Vec<(Sight, bool)>,
}

impl Findings {
    /// Changes, the errors they share, and what was looked for: seen or not.
    ///
    /// # Errors
    /// [`CauseError`] where a figure is not finite, a change has no spread at all, or a measure stands twice.
    pub fn new(
        compared: Vec<Compared>,
        shared: Vec<Shared>,
        sights: Vec<(Sight, bool)>,
    ) -> Result<Self, CauseError> {
        if compared.is_empty() {
            return Err(CauseError::Nothing);
        }
        for (place, one) in compared.iter().enumerate() {
            if !one.change.is_finite() {
                let (what, found) = ("a change", one.change);
                return Err(CauseError::NotFinite { what, found });
            }
            let spread = one.lot_spread.hypot(one.own);
            if !(spread.is_finite() && spread > 0.0 && one.lot_spread >= 0.0 && one.own >= 0.0) {
                let (what, found) = ("the uncertainty of a change", spread);
                return Err(CauseError::NotAboveZero { what, found });
            }
            let measure = one.measure;
            if compared
                .iter()
                .take(place)
                .any(|other| other.measure == measure)
            {
                return Err(CauseError::Twice { measure });
            }
        }
        let parts = shared.iter().flat_map(|source| &source.0);
        for (_, part) in parts {
            if !part.is_finite() {
                let (what, found) = ("a shared uncertainty", *part);
                return Err(CauseError::NotFinite { what, found });
            }
        }
        Ok(Self {
            compared,
            shared,
            sights,
        })
    }

    /// The changes, in the order they came.
    pub fn compared(&self) -> &[Compared] {
        &self.compared
    }

    /// What was looked for.
    pub fn sights(&self) -> &[(Sight, bool)] {
        &self.sights
    }

    /// Standard uncertainty of one change, lot spread and shared errors included.
    pub fn uncertainty(&self, one: &Compared) -> f64 {
        self.covariance_of(one, one).sqrt()
    }

    /// Covariance of the changes, by rows.
    pub(super) fn covariance(&self) -> Vec<Vec<f64>> {
        let row = |a: &Compared| {
            self.compared
                .iter()
                .map(|b| self.covariance_of(a, b))
                .collect()
        };
        self.compared.iter().map(row).collect()
    }

    fn covariance_of(&self, a: &Compared, b: &Compared) -> f64 {
        let alone = match (a.measure, b.measure) {
            (one, other) if one == other => a.lot_spread.powi(2) + a.own.powi(2),
            // A short spring of the lot is short on the bench and under the gauge: one surprise, not two.
            (Measure::FreeLength, Measure::GaugeLength)
            | (Measure::GaugeLength, Measure::FreeLength) => a.lot_spread.min(b.lot_spread).powi(2),
            _ => 0.0,
        };
        let part = |source: &Shared, of: Measure| -> f64 {
            let parts = source.0.iter().filter(|(measure, _)| *measure == of);
            parts.map(|(_, part)| part).sum()
        };
        let common = self
            .shared
            .iter()
            .map(|source| part(source, a.measure) * part(source, b.measure));
        alone + common.sum::<f64>()
    }
}

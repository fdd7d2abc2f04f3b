//! What a characteristic is compared with in its chart: the limits, and theory for the rate.

use crate::quantity::Quantity;
use crate::record::{AcceptRecord, CharacteristicResult, Key};
use crate::sheet::canvas::{Drawn, LIMIT, Sheet, THEORY};
use crate::sheet::plot::Plot;
use crate::units::Finite;

/// What the plot compares with.
pub(super) struct Lines {
    /// Lower limit.
    pub(super) lower: Option<f64>,
    /// Upper limit.
    pub(super) upper: Option<f64>,
    /// Theory: lowest, nominal, highest.
    pub(super) theory: Option<(f64, f64, f64)>,
}

impl Lines {
    /// What a characteristic is compared with, in the units of the plot; `first` is one that has limits.
    pub(super) fn new(
        record: &AcceptRecord,
        key: &Key,
        first: Option<&CharacteristicResult>,
        scale: f64,
    ) -> Self {
        let shown = |value: Option<Finite>| value.map(|value| value.get() / scale);
        let theory = &record.theory;
        Self {
            lower: first.and_then(|of| shown(of.lower)),
            upper: first.and_then(|of| shown(of.upper)),
            theory: (key.0 == Quantity::Rate.name()).then(|| {
                (
                    theory.rate_lowest.get() / scale,
                    theory.rate_n_per_mm.get() / scale,
                    theory.rate_highest.get() / scale,
                )
            }),
        }
    }

    /// Draws them across the plot, and not across what stands beside it.
    pub(super) fn draw(&self, sheet: &mut Sheet<'_>, plot: &Plot) -> Drawn {
        let ((left, right), y) = (plot.x.paper, plot.y.value);
        if let Some((low, middle, high)) = self.theory {
            let held = |value: f64| plot.y.at(value.clamp(y.0, y.1));
            sheet.block((left, held(low)), (right, held(high)), THEORY, 0.10)?;
            if middle > y.0 && middle < y.1 {
                let at = plot.y.at(middle);
                sheet.dashes((left, at), (right, at), THEORY, 1.4)?;
            }
        }
        for bound in [self.lower, self.upper].into_iter().flatten() {
            let at = plot.y.at(bound);
            sheet.line(&[(left, at), (right, at)], LIMIT, 1.8)?;
        }
        Ok(())
    }
}

//! Figures of the normal model: how far the limits lie off, Pp, Ppk, the share outside.

use super::CONFIDENCE;
use super::common::common_uncertainty;
use super::figures::{Capability, Estimated, Interval, Sample};
use crate::stats::{StatsError, cpk_bounds, distance_bounds, mean, normal_cdf, spread_factors};

impl Sample<'_> {
    /// How far the mean lies inside a limit, in the springs' standard deviations; each bound at the one-sided `tail`.
    fn distance(&self, limit: f64, side: f64, tail: f64) -> Result<Option<Estimated>, StatsError> {
        let of = |values: &[f64]| Some(side * (limit - mean(values)?) / self.sigma(values)?);
        let values: Vec<f64> = self.of.iter().map(|one| one.value).collect();
        let (Some(value), Some(sigma)) = (of(&values), self.sigma(&values)) else {
            return Ok(None);
        };
        let Some(common) = common_uncertainty(self.of, of) else {
            return Ok(None);
        };
        let ratio = self.s / sigma;
        let (least, most) = distance_bounds(value / ratio, self.n, tail)?;
        let interval = self.widened(value, (least * ratio, most * ratio), common);
        Ok(Some(Estimated { value, interval }))
    }

    pub(super) fn capability(&self) -> Result<Option<Capability>, StatsError> {
        let tail = (1.0 - CONFIDENCE) / 2.0;
        let (lower, upper) = (self.limits.lower, self.limits.upper);
        let tail = if lower.is_some() && upper.is_some() {
            tail / 2.0 // the shares of both tails are added: each bound holds with twice the certainty
        } else {
            tail
        };
        let mut sides = Vec::new();
        for (limit, side) in [(lower, -1.0), (upper, 1.0)] {
            if let Some(limit) = limit {
                sides.extend(self.distance(limit, side, tail)?);
            }
        }
        let Some(nearest) = sides
            .iter()
            .copied()
            .min_by(|a, b| a.value.total_cmp(&b.value))
        else {
            return Ok(None);
        };
        let outside = beyond(&sides)?;
        let (pp, ppk) = match (lower, upper) {
            (Some(lower), Some(upper)) => (self.pp(upper - lower)?, self.ppk(lower, upper)?),
            _ => (None, Some(nearest.over(3.0))),
        };
        Ok(ppk.map(|ppk| Capability { pp, ppk, outside }))
    }

    /// Pp; its sampled interval is that of the springs' deviation turned over.
    fn pp(&self, width: f64) -> Result<Option<Estimated>, StatsError> {
        let of = |values: &[f64]| Some(width / (6.0 * self.sigma(values)?));
        let (least, most) = spread_factors(self.n, CONFIDENCE)?;
        let at = |factor: f64| width / (6.0 * self.variance(self.s * factor).sqrt());
        self.index(of, |_, _, _| Ok((at(most), at(least))))
    }

    fn ppk(&self, lower: f64, upper: f64) -> Result<Option<Estimated>, StatsError> {
        let of = |values: &[f64]| {
            let centre = mean(values)?;
            Some((upper - centre).min(centre - lower) / (3.0 * self.sigma(values)?))
        };
        self.index(of, cpk_bounds)
    }

    fn index(
        &self,
        of: impl Fn(&[f64]) -> Option<f64>,
        bounds: impl Fn(f64, u64, f64) -> Result<(f64, f64), StatsError>,
    ) -> Result<Option<Estimated>, StatsError> {
        let values: Vec<f64> = self.of.iter().map(|one| one.value).collect();
        let Some(value) = of(&values) else {
            return Ok(None);
        };
        let Some(common) = common_uncertainty(self.of, of) else {
            return Ok(None);
        };
        let interval = self.widened(value, bounds(value, self.n, CONFIDENCE)?, common);
        Ok(Some(Estimated { value, interval }))
    }
}

impl Estimated {
    fn over(self, divisor: f64) -> Self {
        Self {
            value: self.value / divisor,
            interval: Interval {
                lower: self.interval.lower / divisor,
                upper: self.interval.upper / divisor,
            },
        }
    }
}

/// The share beyond the limits from the distances to them.
fn beyond(sides: &[Estimated]) -> Result<Estimated, StatsError> {
    let sum = |of: fn(&Estimated) -> f64| {
        let shares = sides.iter().map(|side| normal_cdf(-of(side)));
        shares.sum::<Result<f64, StatsError>>()
    };
    Ok(Estimated {
        value: sum(|side| side.value)?.min(1.0),
        interval: Interval {
            lower: sum(|side| side.interval.upper)?,
            upper: sum(|side| side.interval.lower)?.min(1.0),
        },
    })
}

//! The figures of one characteristic over a sample.

use super::common::{Observation, common_factor, common_of_mean, common_uncertainty, leaned};
use super::shape::{Shape, outliers, shape};
use super::{CONFIDENCE, CONTENT};
use crate::drawing::Limits;
use crate::stats::{
    Dof, StatsError, clopper_pearson, mean, normal_quantile, one_sided_factor, spread_factors,
    standard_deviation, student_quantile, two_sided_factor,
};

/// Share of s² that must be the springs' own for figures that divide by their standard deviation: with less, what the
/// bench adds decides them.
const SPRINGS_SHARE: f64 = 0.5;
/// Most springs for which the distributions behind the intervals were proven.
const MOST: usize = 100_000;
/// Fewest springs of a capability figure.
const FEWEST: usize = 3;

/// A 95 % interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    /// Lower end.
    pub lower: f64,
    /// Upper end.
    pub upper: f64,
}

/// A figure and its interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Estimated {
    /// The figure.
    pub value: f64,
    /// Its interval.
    pub interval: Interval,
}

/// The share outside the limits by count: of the values as measured, the interval also for the lot shifted by the common
/// part either way.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Outside {
    /// Values outside.
    pub count: u64,
    /// Bounds of the share, 0 to 1.
    pub share: Interval,
}

/// Figures of the normal model; they mean something only where the values look normal.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Capability {
    /// Pp; `None` with one limit.
    pub pp: Option<Estimated>,
    /// Ppk.
    pub ppk: Estimated,
    /// Share outside by the normal model, 0 to 1.
    pub outside: Estimated,
}

/// What a sample says of a lot.
#[derive(Clone, Debug, PartialEq)]
pub struct Figures {
    /// Springs with a value.
    pub count: u64,
    /// Mean; no interval for one spring.
    pub mean: (f64, Option<Interval>),
    /// Common standard uncertainty of the mean.
    pub common: f64,
    /// Standard deviation of the values; `None` for one.
    pub spread: Option<f64>,
    /// The bench's own standard uncertainty, root mean square.
    pub own: f64,
    /// Standard deviation of the springs, √(s² − own²), 0 where the bench's scatter explains all.
    pub springs: Option<Estimated>,
    /// Whether the bench's own scatter is too large for capability figures.
    pub hidden: bool,
    /// Shape.
    pub shape: Shape,
    /// Places of the values that stand out.
    pub outliers: Vec<usize>,
    /// Outside the limits by count.
    pub outside: Option<Outside>,
    /// Of the normal model.
    pub capability: Option<Capability>,
    /// 99 % of the springs lie within these, with 95 % confidence.
    pub tolerance: Option<Interval>,
    /// 99 % of the springs lie above `lower`, and 99 % below `upper`, each with 95 % confidence.
    pub one_sided: Option<Interval>,
}

/// A sample in the making of its figures.
pub(super) struct Sample<'a> {
    pub(super) of: &'a [Observation],
    pub(super) limits: &'a Limits,
    pub(super) n: u64,
    mean: f64,
    /// s.
    pub(super) s: f64,
    /// Mean square of the own uncertainties.
    own: f64,
    /// Factor of the common part.
    factor: f64,
}

/// The figures of `of` under `limits`; `None` without values, or for more than 100 000.
///
/// # Errors
/// [`StatsError`] where a distribution cannot answer.
pub fn figures(of: &[Observation], limits: &Limits) -> Result<Option<Figures>, StatsError> {
    let values: Vec<f64> = of.iter().map(|one| one.value).collect();
    let Some(centre) = mean(&values) else {
        return Ok(None);
    };
    if of.len() > MOST {
        return Ok(None);
    }
    let squares: Vec<f64> = of.iter().map(|one| one.own * one.own).collect();
    let sample = Sample {
        of,
        limits,
        n: of.len() as u64,
        mean: centre,
        s: standard_deviation(&values).unwrap_or(0.0),
        own: mean(&squares).unwrap_or(0.0),
        factor: common_factor(of, CONFIDENCE)?,
    };
    let several = of.len() > 1;
    let hidden = several && sample.hidden()?;
    let capable = of.len() >= FEWEST && sample.s > 0.0 && !hidden;
    let spreads = several && sample.s > 0.0;
    Ok(Some(Figures {
        count: sample.n,
        mean: (
            centre,
            if several {
                Some(sample.mean_interval()?)
            } else {
                None
            },
        ),
        common: common_of_mean(of),
        spread: several.then_some(sample.s),
        own: sample.own.sqrt(),
        springs: if several { sample.springs()? } else { None },
        hidden,
        shape: shape(&values)?,
        outliers: outliers(&values)?,
        outside: sample.outside()?,
        capability: if capable { sample.capability()? } else { None },
        tolerance: if spreads {
            sample.tolerance(two_sided_factor, normal_quantile(0.5 + CONTENT / 2.0)?)?
        } else {
            None
        },
        one_sided: if spreads {
            sample.tolerance(one_sided_factor, normal_quantile(CONTENT)?)?
        } else {
            None
        },
    }))
}

impl Sample<'_> {
    /// The springs' variance where the values have the standard deviation `s`.
    pub(super) fn variance(&self, s: f64) -> f64 {
        (s * s - self.own).max(0.0)
    }

    /// Whether the bench's scatter is too large a part of what was seen: of s², or of the least that σ² may be.
    fn hidden(&self) -> Result<bool, StatsError> {
        let least = self.s * spread_factors(self.n, CONFIDENCE)?.0;
        let hidden = self.variance(self.s) < SPRINGS_SHARE * self.s * self.s;
        Ok(self.own > 0.0 && (hidden || self.variance(least) <= 0.0))
    }

    /// The springs' standard deviation of some values; `None` where the bench's scatter explains all.
    pub(super) fn sigma(&self, values: &[f64]) -> Option<f64> {
        let sigma = self.variance(standard_deviation(values)?).sqrt();
        (sigma > 0.0).then_some(sigma)
    }

    /// A sampled interval about `value`, each end moved out by the common part in squares: the interval of a sum from the
    /// intervals of its parts (the method of variance estimates recovery; Zou and Donner, from memory).
    pub(super) fn widened(&self, value: f64, sampled: (f64, f64), common: f64) -> Interval {
        let common = self.factor * common;
        Interval {
            lower: value - (value - sampled.0).hypot(common),
            upper: value + (sampled.1 - value).hypot(common),
        }
    }

    fn mean_interval(&self) -> Result<Interval, StatsError> {
        let nu = Dof::Finite(self.n as f64 - 1.0);
        let t = student_quantile(0.5 + CONFIDENCE / 2.0, nu)?;
        let reach = t * self.s / (self.n as f64).sqrt();
        let common = common_of_mean(self.of);
        let sampled = (self.mean - reach, self.mean + reach);
        Ok(self.widened(self.mean, sampled, common))
    }

    fn springs(&self) -> Result<Option<Estimated>, StatsError> {
        let (least, most) = spread_factors(self.n, CONFIDENCE)?;
        let of = |s: f64| self.variance(s).sqrt();
        let value = of(self.s);
        let figure = |values: &[f64]| Some(of(standard_deviation(values)?));
        let common = common_uncertainty(self.of, figure).unwrap_or(0.0);
        let found = self.widened(value, (of(self.s * least), of(self.s * most)), common);
        let lower = found.lower.max(0.0);
        Ok(Some(Estimated {
            value,
            interval: Interval { lower, ..found },
        }))
    }

    fn outside(&self) -> Result<Option<Outside>, StatsError> {
        let Limits { lower, upper, .. } = *self.limits;
        if lower.is_none() && upper.is_none() {
            return Ok(None);
        }
        let count = |values: &[f64]| {
            let out = |value: &&f64| {
                lower.is_some_and(|limit| **value < limit)
                    || upper.is_some_and(|limit| **value > limit)
            };
            values.iter().filter(out).count() as u64
        };
        let counts = [-1.0, 0.0, 1.0].map(|side| count(&leaned(self.of, side * self.factor)));
        let [down, found, up] = counts;
        let least = clopper_pearson(down.min(found).min(up), self.n, CONFIDENCE)?.0;
        let most = clopper_pearson(down.max(found).max(up), self.n, CONFIDENCE)?.1;
        Ok(Some(Outside {
            count: found,
            share: Interval {
                lower: least,
                upper: most,
            },
        }))
    }

    /// Mean ± k·s, moved out by the common part of mean ± z·s. s is that of the values: the bench's own scatter in it
    /// makes the interval wider than the springs need, never narrower.
    fn tolerance(
        &self,
        factor: impl Fn(u64, f64, f64) -> Result<f64, StatsError>,
        z: f64,
    ) -> Result<Option<Interval>, StatsError> {
        let k = factor(self.n, CONTENT, CONFIDENCE)?;
        let end = |side: f64| {
            let of = |values: &[f64]| Some(mean(values)? + side * z * standard_deviation(values)?);
            let common = self.factor * common_uncertainty(self.of, of)?;
            let reach = ((k - z) * self.s).hypot(common);
            Some(self.mean + side * (z * self.s + reach))
        };
        Ok(end(-1.0)
            .zip(end(1.0))
            .map(|(lower, upper)| Interval { lower, upper }))
    }
}

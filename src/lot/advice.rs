//! What would settle an undecided characteristic.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::characteristic::{Measured, Uncertainty};
use crate::drawing::{Guard, Limits};
use crate::quantity::{Quantity, Unit};
use crate::stats::{Dof, StatsError, student_quantile};
use crate::units::{Finite, Millimetres};

/// Further measurements beyond which a better bench is the better advice.
const MOST_REPEATS: u32 = 10;

/// What would settle an undecided characteristic.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "do", rename_all = "snake_case")]
pub enum Advice {
    /// Repeating on this bench can settle it.
    Repeat {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// Further measurements wanted.
        times: u32,
    },
    /// Only a bench with a smaller uncertainty can settle it.
    BetterBench {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// The largest expanded uncertainty that would settle it; `null` where the value lies on the limit.
        expanded_uncertainty: Option<Finite>,
        /// Its unit.
        unit: Unit,
    },
    /// The characteristic must be measured first.
    Measure {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
    },
}

/// Advice on a characteristic left undecided, measured `times` times so far: repeating helps only if the own part can
/// shrink the guard band below the distance to the nearest limit.
///
/// # Errors
/// [`StatsError`] where a quantile cannot be had.
pub fn advise(
    quantity: Quantity,
    measured: &Measured,
    limits: &Limits,
    guard: Guard,
    times: u32,
) -> Result<Advice, StatsError> {
    let name = quantity.name().to_owned();
    let at_length_mm = quantity.at_length();
    let (value, uncertainty) = match measured {
        Measured::Value(estimate) => (estimate.value, estimate.uncertainty),
        _ => return Ok(Advice::Measure { name, at_length_mm }),
    };
    let Some(uncertainty) = uncertainty else {
        return Ok(Advice::Repeat {
            name,
            at_length_mm,
            times: 2,
        });
    };
    let distances = [limits.lower, limits.upper]
        .into_iter()
        .flatten()
        .map(|limit| (value - limit).abs());
    let distance = distances.fold(f64::INFINITY, f64::min);
    if let Some(times) = repeats(&uncertainty, distance, guard, times)? {
        return Ok(Advice::Repeat {
            name,
            at_length_mm,
            times,
        });
    }
    let wanted = settling(distance, guard)?;
    Ok(Advice::BetterBench {
        name,
        at_length_mm,
        expanded_uncertainty: wanted.and_then(|wanted| Finite::try_from(wanted).ok()),
        unit: quantity.unit(),
    })
}

/// The largest expanded uncertainty whose guard band stays within `distance` of the limit; `None` on the limit itself.
///
/// # Errors
/// [`StatsError`] where the quantile cannot be had.
pub fn settling(distance: f64, guard: Guard) -> Result<Option<f64>, StatsError> {
    let share = match guard {
        Guard::T95 => student_quantile(0.95, Dof::Infinite)? / 2.0,
        Guard::U => 1.0,
    };
    Ok((distance > 0.0).then(|| distance / share))
}

/// Further measurements that bring the guard band under `distance`; `None` where no reasonable number does.
fn repeats(
    uncertainty: &Uncertainty,
    distance: f64,
    guard: Guard,
    times: u32,
) -> Result<Option<u32>, StatsError> {
    let proof = match guard {
        Guard::T95 => student_quantile(0.95, uncertainty.dof)?,
        Guard::U => uncertainty.factor,
    };
    let own = uncertainty.own * f64::from(times.max(1)).sqrt();
    for further in 1..=MOST_REPEATS {
        let own = own / f64::from(times.max(1) + further).sqrt();
        if proof * own.hypot(uncertainty.common) < distance {
            return Ok(Some(further));
        }
    }
    Ok(None)
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;

    /// g is 1.645 u = 0.8225 U, or U itself: the advice names the U with which g reaches the limit.
    #[test]
    fn the_advised_uncertainty_settles_it_under_its_own_guard() {
        let t95 = settling(1.0, Guard::T95).unwrap().unwrap();
        assert!(
            (t95 * 1.644_853_626_951_472 / 2.0 - 1.0).abs() < 1e-12,
            "{t95}"
        );
        assert_eq!(settling(1.0, Guard::U).unwrap(), Some(1.0));
        assert_eq!(settling(0.0, Guard::U).unwrap(), None);
        let uncertainty = Uncertainty {
            own: 0.5,
            common: 0.1,
            standard: 0.51,
            dof: Dof::Infinite,
            factor: 2.0,
            expanded: 1.02,
        };
        // after n more: 1.645·√(0.25/(1 + n) + 0.01) or 2·√(…) below 0.6: n 1 and n 3 by hand (0.605, 0.505; 0.734, 0.608, 0.539)
        assert_eq!(repeats(&uncertainty, 0.6, Guard::T95, 1).unwrap(), Some(2));
        assert_eq!(repeats(&uncertainty, 0.6, Guard::U, 1).unwrap(), Some(3));
    }
}

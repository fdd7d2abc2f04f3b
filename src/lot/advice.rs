//! What would settle an undecided characteristic.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::characteristic::{Measured, Uncertainty};
use crate::drawing::Limits;
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
    if let Some(times) = repeats(&uncertainty, distance, times)? {
        return Ok(Advice::Repeat {
            name,
            at_length_mm,
            times,
        });
    }
    let proof = student_quantile(0.95, Dof::Infinite)?;
    let expanded_uncertainty = if distance > 0.0 {
        Finite::try_from(2.0 * distance / proof).ok()
    } else {
        None
    };
    Ok(Advice::BetterBench {
        name,
        at_length_mm,
        expanded_uncertainty,
        unit: quantity.unit(),
    })
}

/// Further measurements that bring the guard band under `distance`; `None` where no reasonable number does.
fn repeats(
    uncertainty: &Uncertainty,
    distance: f64,
    times: u32,
) -> Result<Option<u32>, StatsError> {
    let proof = student_quantile(0.95, uncertainty.dof)?;
    let own = uncertainty.own * f64::from(times.max(1)).sqrt();
    for further in 1..=MOST_REPEATS {
        let own = own / f64::from(times.max(1) + further).sqrt();
        if proof * own.hypot(uncertainty.common) < distance {
            return Ok(Some(further));
        }
    }
    Ok(None)
}

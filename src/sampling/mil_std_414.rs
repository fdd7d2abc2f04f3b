//! Plans by variables of MIL-STD-414 Table B: letter, k and M, arrows followed.

use super::PlanError;
use super::mil_std_414_table::{LETTERS, NONE, PLANS};
use crate::drawing::{AQLS_414, Level414, State};
use crate::stats::share_beyond;

/// The name of the table, for faults and reports.
const TABLE: &str = "MIL-STD-414 Table B";

/// A plan by variables, standard deviation unknown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct VariablesPlan {
    /// The letter that lot size and level gave, and the letter whose plan is used; `None` where the plan was designed.
    pub letters: Option<(char, char)>,
    /// Springs to measure.
    pub sample_size: u64,
    /// Acceptance constant for one limit: the mean must lie k standard deviations inside.
    pub k: f64,
    /// Largest estimated share nonconforming that accepts where there are two limits; 0 to 1.
    pub most: f64,
}

/// Share of the springs' standard deviation up to which the bench's own scatter is left out of account.
pub const FREE_OF_SCATTER: f64 = 0.1;

impl VariablesPlan {
    /// Springs to measure where the bench's own standard uncertainty is `ratio` of the springs' standard deviation:
    /// n·(1 + ratio²), rounded up.
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "a small factor on a sample size; a cast of more saturates"
    )]
    pub fn raised(&self, ratio: f64) -> u64 {
        let product = self.sample_size as f64 * (1.0 + ratio * ratio);
        (product - 1e-9).ceil() as u64
    }
}

/// The plan of MIL-STD-414 Table B for a lot of `lot_size` springs. An arrow takes the sample size of its plan too.
///
/// # Errors
/// [`PlanError::LotTooSmall`] under 3 springs, [`PlanError::UnknownAql`], [`PlanError::NoPlan`] for reduced inspection
/// (another table) and at the tightest AQL tightened, [`PlanError::SampleExceedsLot`].
pub fn variables_plan(
    lot_size: u64,
    level: Level414,
    aql: f64,
    state: State,
) -> Result<VariablesPlan, PlanError> {
    let (found, least) = (lot_size, 3);
    if lot_size < least {
        return Err(PlanError::LotTooSmall { found, least });
    }
    let printed = letter(lot_size, level).ok_or(PlanError::LotTooSmall { found, least })?;
    let column = AQLS_414
        .iter()
        .position(|known| (known - aql).abs() < 1e-9)
        .ok_or_else(|| unknown(aql))?;
    let no_plan = || PlanError::NoPlan {
        table: TABLE,
        letter: printed,
        aql,
        state,
    };
    let column = match state {
        State::Normal => column,
        State::Tightened => column.checked_sub(1).ok_or_else(no_plan)?,
        State::Reduced => return Err(no_plan()),
    };
    let below = PLANS
        .iter()
        .skip_while(|(letter, ..)| *letter != printed)
        .find_map(|(letter, n, cells)| {
            let cell = *cells.get(column)?;
            (cell.0 > NONE.0).then_some((*letter, *n, cell))
        });
    let (used, sample_size, (k, most)) = below.ok_or_else(no_plan)?;
    if sample_size > lot_size {
        let wanted = sample_size;
        return Err(PlanError::SampleExceedsLot {
            wanted,
            lot: lot_size,
        });
    }
    Ok(VariablesPlan {
        letters: Some((printed, used)),
        sample_size,
        k,
        most: most / 100.0,
    })
}

fn unknown(found: f64) -> PlanError {
    let known: Vec<String> = AQLS_414.iter().map(f64::to_string).collect();
    PlanError::UnknownAql {
        found,
        table: TABLE,
        known: known.join(", "),
    }
}

fn letter(lot_size: u64, level: Level414) -> Option<char> {
    let (_, letters) = LETTERS.iter().find(|(largest, _)| lot_size <= *largest)?;
    let place = Level414::WORDS
        .iter()
        .position(|(_, known)| *known == level)?;
    letters.get(place).copied()
}

/// M that belongs to k at `n` springs: the estimated share beyond a limit k standard deviations off.
///
/// # Errors
/// [`PlanError::Statistics`] for n under 3.
pub fn most_share(n: u64, k: f64) -> Result<f64, PlanError> {
    Ok(share_beyond(n, k)?)
}

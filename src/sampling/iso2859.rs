//! Single sampling plans by attributes after ISO 2859-1: normal, tightened and reduced inspection.
//! Here: letter, plan with arrows followed, what a plan lets through.
//! Elsewhere: which state holds (`switching`), the decision on a lot (`lot`). Where the sample size reaches the lot size
//! the caller inspects every spring with the acceptance number unchanged.

use std::fmt;

use super::PlanError;
use super::iso2859_table::{Cell, LETTERS, cell, sizes};
use crate::drawing::{AQLS, Level, State};
use crate::stats::{StatsError, binomial_cdf};

/// The name of the table, for faults.
const TABLE: &str = "ISO 2859-1";

/// Sample size code letter, A to R without I and O.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct CodeLetter(char);

impl CodeLetter {
    /// The letter for a lot of `lot_size` springs.
    ///
    /// # Errors
    /// [`PlanError::LotTooSmall`] under 2 springs.
    pub fn of(lot_size: u64, level: Level) -> Result<Self, PlanError> {
        let too_small = PlanError::LotTooSmall {
            found: lot_size,
            least: 2,
        };
        if lot_size < 2 {
            return Err(too_small);
        }
        let row = LETTERS.iter().find(|(largest, _)| lot_size <= *largest);
        row.and_then(|(_, letters)| {
            Level::WORDS
                .into_iter()
                .zip(letters)
                .find(|(known, _)| known.1 == level)
        })
        .map(|(_, letter)| Self(*letter))
        .ok_or(too_small) // never: the last row is open
    }

    /// The letter as printed.
    pub fn get(self) -> char {
        self.0
    }
}

impl fmt::Display for CodeLetter {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        fmt::Display::fmt(&self.0, out)
    }
}

/// Acceptance quality limit in percent nonconforming; one of the table's values.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
pub struct Aql(f64);

impl Aql {
    /// Every value of the table, in percent, ascending.
    pub fn all() -> impl Iterator<Item = Self> {
        AQLS.into_iter().map(Self)
    }

    /// The value in percent.
    pub fn get(self) -> f64 {
        self.0
    }
}

impl TryFrom<f64> for Aql {
    type Error = PlanError;
    fn try_from(found: f64) -> Result<Self, PlanError> {
        // The table's number itself, whatever way 0.1 was written; 1e-9 is far under half a step of its digits.
        let known = AQLS.into_iter().find(|aql| (aql - found).abs() < 1e-9);
        known.map(Self).ok_or_else(|| PlanError::UnknownAql {
            found,
            table: TABLE,
            known: listed(),
        })
    }
}

impl From<Aql> for f64 {
    fn from(aql: Aql) -> Self {
        aql.0
    }
}

impl fmt::Display for Aql {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        fmt::Display::fmt(&self.0, out)
    }
}

fn listed() -> String {
    let all: Vec<String> = AQLS.iter().map(f64::to_string).collect();
    all.join(", ")
}

/// Which way the cell of the letter sent us.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Arrow {
    /// The cell holds the plan.
    None,
    /// The first plan below it was taken.
    Down,
    /// The first plan above it was taken.
    Up,
}

/// A single sampling plan. An arrow in the table takes the sample size of the plan it points to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct SinglePlan {
    /// The state of inspection the plan is for.
    pub state: State,
    /// The letter that lot size and level gave.
    pub printed_letter: CodeLetter,
    /// The letter whose plan is used.
    pub letter: CodeLetter,
    /// Springs to inspect; where this reaches the lot size, all of them.
    pub sample_size: u32,
    /// Largest number of nonconforming springs that accepts.
    pub accept: u32,
    /// Least number of nonconforming springs that rejects.
    pub reject: u32,
    /// Way from the printed letter to the used one.
    pub arrow: Arrow,
}

/// The plan for a lot of `lot_size` springs.
///
/// # Errors
/// [`PlanError::LotTooSmall`] under 2 springs.
pub fn single(
    lot_size: u64,
    level: Level,
    aql: Aql,
    state: State,
) -> Result<SinglePlan, PlanError> {
    let printed_letter = CodeLetter::of(lot_size, level)?;
    let no_plan = || PlanError::NoPlan {
        table: TABLE,
        letter: printed_letter.0,
        aql: aql.0,
        state,
    };
    let sizes = sizes(state);
    let row = sizes
        .iter()
        .position(|(letter, _)| *letter == printed_letter.0);
    let column = AQLS
        .iter()
        .position(|known| known.total_cmp(&aql.0).is_eq());
    let (row, column) = row.zip(column).ok_or_else(no_plan)?;
    let plan_in = |row: usize| match cell(state, row, column) {
        Cell::Plan(accept) => sizes.get(row).map(|size| (*size, accept)),
        Cell::Down | Cell::Up => None,
    };
    let (arrow, found) = match cell(state, row, column) {
        Cell::Plan(_) => (Arrow::None, plan_in(row)),
        Cell::Down => (Arrow::Down, (row..sizes.len()).find_map(plan_in)),
        Cell::Up => (Arrow::Up, (0..row).rev().find_map(plan_in)),
    };
    let ((letter, sample_size), accept) = found.ok_or_else(no_plan)?;
    Ok(SinglePlan {
        state,
        printed_letter,
        letter: CodeLetter(letter),
        sample_size,
        accept,
        reject: accept + 1,
        arrow,
    })
}

/// The next tighter AQL of the table; `None` below the tightest.
pub fn tighter(aql: Aql) -> Option<Aql> {
    AQLS.into_iter()
        .rev()
        .find(|known| *known < aql.0 - 1e-9)
        .map(Aql)
}

/// Chance that `plan` accepts a stream of lots with a share `p` (0 to 1) of nonconforming springs, binomial.
///
/// # Errors
/// [`StatsError::Share`] for a p outside 0…1.
pub fn probability_of_acceptance(plan: &SinglePlan, p: f64) -> Result<f64, StatsError> {
    binomial_cdf(plan.accept.into(), plan.sample_size.into(), p)
}

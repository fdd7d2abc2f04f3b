//! Single sampling plans by attributes, normal inspection, after ISO 2859-1.
//! Here: letter, plan with arrows followed, what a plan lets through.
//! Elsewhere: tightened and reduced inspection, the decision on a lot. Where the sample size reaches the lot size
//! the caller inspects every spring with the acceptance number unchanged.

use std::fmt;

use super::plan_table::{Cell, LETTERS, SIZES, cell};
use crate::drawing::{AQLS, Level};
use crate::quantity::Class;
use crate::stats::{StatsError, binomial_cdf};

/// Faults of a plan asked for.
#[derive(Clone, Debug, PartialEq, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum PlanError {
    #[error("a lot of {found} cannot be sampled, the table begins at 2")]
    #[diagnostic(
        code(coilassay::lot::size),
        help(
            "check `size` in the lot file; for so small a lot agree by = \"every-spring\" in the drawing"
        )
    )]
    LotTooSmall { found: u64 },
    #[error("AQL {found} % is not in the table, which has {}", listed())]
    UnknownAql { found: f64 },
    #[error("a finding or requirement is {}, and the drawing agrees no AQL for that class", class.word())]
    #[diagnostic(
        code(coilassay::lot::aql),
        help("write aql = {{ {} = … }} into the drawing's plan, or give the finding a class that has one", class.word())
    )]
    NoAql { class: Class },
    #[error("no plan for letter {letter} at AQL {aql} %")]
    NoPlan { letter: CodeLetter, aql: Aql },
}

/// Sample size code letter, A to R without I and O.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct CodeLetter(char);

impl CodeLetter {
    /// The letter for a lot of `lot_size` springs.
    ///
    /// # Errors
    /// [`PlanError::LotTooSmall`] under 2 springs.
    pub fn of(lot_size: u64, level: Level) -> Result<Self, PlanError> {
        let too_small = PlanError::LotTooSmall { found: lot_size };
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
        known.map(Self).ok_or(PlanError::UnknownAql { found })
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

/// The plan for a lot of `lot_size` springs under normal inspection.
///
/// # Errors
/// [`PlanError::LotTooSmall`] under 2 springs.
pub fn normal_single(lot_size: u64, level: Level, aql: Aql) -> Result<SinglePlan, PlanError> {
    let printed_letter = CodeLetter::of(lot_size, level)?;
    let no_plan = PlanError::NoPlan {
        letter: printed_letter,
        aql,
    };
    let place = |letter: CodeLetter| SIZES.iter().position(|size| size.0 == letter.0);
    let column = AQLS
        .iter()
        .position(|known| known.total_cmp(&aql.0).is_eq());
    let (Some(row), Some(column)) = (place(printed_letter), column) else {
        return Err(no_plan);
    };
    let plan_in = |row: usize| match cell(row, column) {
        Cell::Plan(accept) => SIZES.get(row).map(|size| (*size, accept)),
        Cell::Down | Cell::Up => None,
    };
    let (arrow, found) = match cell(row, column) {
        Cell::Plan(_) => (Arrow::None, plan_in(row)),
        Cell::Down => (Arrow::Down, (row..SIZES.len()).find_map(plan_in)),
        Cell::Up => (Arrow::Up, (0..row).rev().find_map(plan_in)),
    };
    let ((letter, sample_size), accept) = found.ok_or(no_plan)?;
    Ok(SinglePlan {
        printed_letter,
        letter: CodeLetter(letter),
        sample_size,
        accept,
        reject: accept + 1,
        arrow,
    })
}

/// Chance that `plan` accepts a stream of lots with a share `p` (0 to 1) of nonconforming springs, binomial.
///
/// # Errors
/// [`StatsError::Share`] for a p outside 0…1.
pub fn probability_of_acceptance(plan: &SinglePlan, p: f64) -> Result<f64, StatsError> {
    binomial_cdf(plan.accept.into(), plan.sample_size.into(), p)
}

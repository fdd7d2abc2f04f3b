//! A crossed study: every part by every operator, equally often.

use super::BenchError;

/// One value and where it belongs.
#[derive(Clone, Debug, PartialEq)]
pub struct Observation {
    /// The part: a spring.
    pub part: String,
    /// Who measured it.
    pub operator: String,
    /// Which of the repeats.
    pub trial: String,
    /// The value, in the unit of the characteristic.
    pub value: f64,
}

/// The repeats of one part by one operator.
#[derive(Clone, Debug, PartialEq)]
pub struct Cell {
    /// Place of the part.
    pub part: usize,
    /// Place of the operator.
    pub operator: usize,
    /// Its values.
    pub values: Vec<f64>,
}

impl Cell {
    /// Mean of its values.
    pub fn mean(&self) -> f64 {
        self.values.iter().sum::<f64>() / self.values.len() as f64
    }

    /// Largest less smallest.
    pub fn range(&self) -> f64 {
        let most = self
            .values
            .iter()
            .copied()
            .fold(f64::NEG_INFINITY, f64::max);
        most - self.values.iter().copied().fold(f64::INFINITY, f64::min)
    }
}

/// A balanced crossed study of one characteristic.
#[derive(Clone, Debug, PartialEq)]
pub struct Crossed {
    /// The parts, in the order of their first observation.
    pub parts: Vec<String>,
    /// The operators, likewise.
    pub operators: Vec<String>,
    /// Repeats of each part by each operator.
    pub trials: usize,
    /// The cells, operator by operator.
    pub cells: Vec<Cell>,
}

impl Crossed {
    /// Lays out some observations.
    ///
    /// # Errors
    /// [`BenchError`] where a trial stands twice, a cell has fewer or more repeats than the others, or there are not
    /// two parts with two repeats.
    pub fn new(observations: &[Observation]) -> Result<Self, BenchError> {
        refuse_twice(observations)?;
        let parts = distinct(observations, |one| &one.part);
        let operators = distinct(observations, |one| &one.operator);
        let mut cells = Vec::new();
        for (operator, by) in operators.iter().enumerate() {
            for (part, of) in parts.iter().enumerate() {
                let mine = observations
                    .iter()
                    .filter(|one| one.part == *of && one.operator == *by);
                let values = mine.map(|one| one.value).collect();
                cells.push(Cell {
                    part,
                    operator,
                    values,
                });
            }
        }
        let trials = cells
            .iter()
            .map(|cell| cell.values.len())
            .max()
            .unwrap_or(0);
        for cell in &cells {
            if cell.values.len() != trials {
                let name = |names: &[String], at: usize| names.get(at).cloned().unwrap_or_default();
                return Err(BenchError::Unbalanced {
                    part: name(&parts, cell.part),
                    operator: name(&operators, cell.operator),
                    found: cell.values.len(),
                    wanted: trials,
                });
            }
        }
        for (what, found) in [("springs", parts.len()), ("trials of each spring", trials)] {
            if found < 2 {
                return Err(BenchError::TooFew { what, found });
            }
        }
        Ok(Self {
            parts,
            operators,
            trials,
            cells,
        })
    }

    /// Mean of all values.
    pub fn mean(&self) -> f64 {
        mean(self.cells.iter().map(Cell::mean))
    }

    /// Mean of each part.
    pub fn part_means(&self) -> Vec<f64> {
        let of = |part| {
            mean(
                self.cells
                    .iter()
                    .filter(|cell| cell.part == part)
                    .map(Cell::mean),
            )
        };
        (0..self.parts.len()).map(of).collect()
    }

    /// Mean of each operator.
    pub fn operator_means(&self) -> Vec<f64> {
        let of = |by| {
            mean(
                self.cells
                    .iter()
                    .filter(|cell| cell.operator == by)
                    .map(Cell::mean),
            )
        };
        (0..self.operators.len()).map(of).collect()
    }
}

/// The number of groups of parts that the study can tell apart, √2·(part SD)/(measuring SD), truncated.
/// `None` where nothing varies in measuring. Source: AIAG MSA, number of distinct categories.
pub fn categories(part: f64, measuring: f64) -> Option<u32> {
    let number = (std::f64::consts::SQRT_2 * part / measuring).floor();
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "a whole number between the bounds tested beside it"
    )]
    (number.is_finite() && (0.0..1e9).contains(&number)).then_some(number as u32)
}

fn mean(values: impl Iterator<Item = f64>) -> f64 {
    let (sum, count) = values.fold((0.0, 0.0), |(sum, count), value| (sum + value, count + 1.0));
    sum / count
}

fn refuse_twice(observations: &[Observation]) -> Result<(), BenchError> {
    for (place, one) in observations.iter().enumerate() {
        let same = |other: &Observation| {
            (&other.part, &other.operator, &other.trial) == (&one.part, &one.operator, &one.trial)
        };
        if observations.iter().take(place).any(same) {
            return Err(BenchError::Twice {
                part: one.part.clone(),
                operator: one.operator.clone(),
                trial: one.trial.clone(),
            });
        }
    }
    Ok(())
}

fn distinct(observations: &[Observation], of: impl Fn(&Observation) -> &String) -> Vec<String> {
    let mut names: Vec<String> = Vec::new();
    for one in observations {
        if !names.contains(of(one)) {
            names.push(of(one).clone());
        }
    }
    names
}

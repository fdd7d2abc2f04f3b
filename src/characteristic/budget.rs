//! The budget of a value: lines, their sum, effective degrees of freedom, coverage factor.
//! Source: JCGM 100:2008 (GUM), 5.1.2 and G.4.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::stats::{Dof, StatsError, standard_deviation, student_quantile};

/// The probability below +2 standard deviations of a normal distribution: k is 2 where ν is infinite.
const BELOW_TWO_SIGMA: f64 = 0.977_249_868_051_820_8;

/// Whether a line is this spring's own or shared by all springs of one rig set-up.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Part {
    /// Independent from spring to spring.
    Own,
    /// The same for all springs measured in this set-up.
    Common,
}

/// One line of a budget.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Line {
    /// Where it comes from.
    pub source: &'static str,
    /// Own or common.
    pub part: Part,
    /// Sensitivity times standard uncertainty, signed, in the value's unit.
    pub contribution: f64,
    /// Degrees of freedom.
    pub dof: Dof,
    /// Whether it enters the sum; what another line already holds is shown uncounted.
    pub counted: bool,
}

impl Line {
    /// A counted line without doubt about its size.
    pub const fn new(source: &'static str, part: Part, contribution: f64) -> Self {
        Self {
            source,
            part,
            contribution,
            dof: Dof::Infinite,
            counted: true,
        }
    }

    /// The same for a value that changes by `sensitivity` for one of this line's.
    #[must_use]
    pub fn times(self, sensitivity: f64) -> Self {
        Self {
            contribution: self.contribution * sensitivity,
            ..self
        }
    }

    /// The same with degrees of freedom.
    #[must_use]
    pub const fn with_dof(self, dof: Dof) -> Self {
        Self { dof, ..self }
    }
}

/// The sum of a budget.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Uncertainty {
    /// Own part.
    pub own: f64,
    /// Common part.
    pub common: f64,
    /// Combined standard uncertainty u.
    pub standard: f64,
    /// Effective degrees of freedom.
    pub dof: Dof,
    /// Coverage factor for 95.45 %.
    pub factor: f64,
    /// U = k·u.
    pub expanded: f64,
}

/// A value and its budget. `uncertainty` is absent where a line that matters cannot be known.
#[derive(Clone, Debug, PartialEq)]
pub struct Estimate {
    /// The value, in its quantity's unit.
    pub value: f64,
    /// The budget.
    pub lines: Vec<Line>,
    /// Its sum.
    pub uncertainty: Option<Uncertainty>,
}

impl Estimate {
    /// A value with the sum of its lines.
    ///
    /// # Errors
    /// [`StatsError`] where the coverage factor cannot be had.
    pub fn new(value: f64, lines: Vec<Line>) -> Result<Self, StatsError> {
        let uncertainty = Some(sum(&lines)?);
        Ok(Self {
            value,
            lines,
            uncertainty,
        })
    }

    /// A value whose uncertainty cannot be known.
    pub const fn without_uncertainty(value: f64, lines: Vec<Line>) -> Self {
        Self {
            value,
            lines,
            uncertainty: None,
        }
    }
}

fn sum(lines: &[Line]) -> Result<Uncertainty, StatsError> {
    let counted = || lines.iter().filter(|line| line.counted);
    let of = |part: Part| {
        let lines = counted().filter(|line| line.part == part);
        lines.fold(0.0, |sum, line| sum + line.contribution.powi(2)) // an empty `sum()` is −0
    };
    let (own, common) = (of(Part::Own), of(Part::Common));
    let variance = own + common;
    let mut known = 0.0;
    for line in counted() {
        if let Dof::Finite(dof) = line.dof {
            known += line.contribution.powi(4) / dof;
        }
    }
    let dof = if known > 0.0 {
        Dof::Finite(variance * variance / known)
    } else {
        Dof::Infinite
    };
    let standard = variance.sqrt();
    let factor = student_quantile(BELOW_TWO_SIGMA, dof)?;
    Ok(Uncertainty {
        own: own.sqrt(),
        common: common.sqrt(),
        standard,
        dof,
        factor,
        expanded: factor * standard,
    })
}

/// The larger of the rig's repeatability and the lines that a repeat would show too is counted, never the sum.
pub(super) fn with_repeatability(
    mut shown_by_repeat: Vec<Line>,
    repeatability: Option<f64>,
) -> Vec<Line> {
    let Some(stated) = repeatability else {
        return shown_by_repeat;
    };
    let sum: f64 = shown_by_repeat
        .iter()
        .filter(|line| line.counted)
        .map(|line| line.contribution.powi(2))
        .sum();
    let mut line = Line::new("repeatability", Part::Own, stated);
    if stated * stated >= sum {
        for other in &mut shown_by_repeat {
            other.counted = false;
        }
    } else {
        line.counted = false;
    }
    shown_by_repeat.push(line);
    shown_by_repeat
}

/// The mean of repeated measurements of one quantity: own lines fall with their number, common ones do not.
///
/// # Errors
/// [`StatsError`] as in [`Estimate::new`].
pub fn combine(estimates: &[Estimate]) -> Result<Option<Estimate>, StatsError> {
    let Some(first) = estimates.first() else {
        return Ok(None);
    };
    if estimates.len() == 1 {
        return Ok(Some(first.clone()));
    }
    let count = estimates.len() as f64;
    let value = estimates.iter().map(|one| one.value).sum::<f64>() / count;
    let mut lines: Vec<Line> = Vec::new();
    for line in estimates.iter().flat_map(|one| &one.lines) {
        let same = |known: &&mut Line| known.source == line.source && known.counted == line.counted;
        match lines.iter_mut().find(same) {
            None => lines.push(*line),
            Some(known) => {
                known.contribution = match line.part {
                    Part::Own => known.contribution.hypot(line.contribution),
                    Part::Common => known.contribution + line.contribution,
                };
            }
        }
    }
    for line in &mut lines {
        line.contribution /= count;
    }
    add_spread(&mut lines, estimates);
    if estimates.iter().any(|one| one.uncertainty.is_none()) {
        return Ok(Some(Estimate::without_uncertainty(value, lines)));
    }
    Estimate::new(value, lines).map(Some)
}

/// Repeats that differ by more than their own lines say: then their spread is counted instead, never both.
fn add_spread(lines: &mut Vec<Line>, estimates: &[Estimate]) {
    let values: Vec<f64> = estimates.iter().map(|one| one.value).collect();
    let Some(sd) = standard_deviation(&values) else {
        return;
    };
    let count = values.len() as f64;
    let own = |line: &&mut Line| line.part == Part::Own && line.counted;
    let stated: f64 = lines
        .iter_mut()
        .filter(own)
        .map(|line| line.contribution.powi(2))
        .sum();
    let spread = Line::new("repeat to repeat", Part::Own, sd / count.sqrt())
        .with_dof(Dof::Finite(count - 1.0));
    let larger = spread.contribution.powi(2) > stated;
    for line in lines.iter_mut().filter(own) {
        line.counted = !larger;
    }
    lines.push(Line {
        counted: larger,
        ..spread
    });
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use approx::assert_relative_eq;

    /// GUM (JCGM 100:2008) H.1, end gauge: u 25 (18), 9.7 (25.6), 2.9 (50), 16.6 (2) nm; ν_eff 16.7 (from memory).
    #[test]
    fn end_gauge_of_the_gum() {
        let line = |u: f64, dof: f64| Line::new("x", Part::Own, u).with_dof(Dof::Finite(dof));
        let lines = vec![
            line(25.0, 18.0),
            line(9.7, 25.6),
            line(2.9, 50.0),
            line(16.6, 2.0),
        ];
        let Dof::Finite(dof) = sum(&lines).unwrap().dof else {
            unreachable!()
        };
        assert_relative_eq!(dof, 16.7, epsilon = 0.0, max_relative = 0.004);
    }

    #[test]
    fn repeats_shrink_what_is_own_only() {
        let lines = vec![
            Line::new("a", Part::Own, 3.0),
            Line::new("b", Part::Common, -4.0),
        ];
        let one = Estimate::new(10.0, lines).unwrap();
        let mean = combine(&[one.clone(), one.clone(), one.clone(), one])
            .unwrap()
            .unwrap();
        let sum = mean.uncertainty.unwrap();
        assert_relative_eq!(sum.own, 1.5, epsilon = 0.0, max_relative = 1e-12);
        assert_relative_eq!(sum.common, 4.0, epsilon = 0.0, max_relative = 1e-12);
    }

    #[test]
    fn repeatability_and_what_it_holds_are_never_added() {
        let fit = || {
            vec![
                Line::new("fit", Part::Own, 0.3),
                Line::new("resolution", Part::Own, 0.4),
            ]
        };
        for (stated, wanted) in [(0.6, 0.6), (0.1, 0.5), (0.3, 0.5), (0.51, 0.51)] {
            let got = sum(&with_repeatability(fit(), Some(stated)))
                .unwrap()
                .standard;
            assert_relative_eq!(got, wanted, epsilon = 0.0, max_relative = 1e-12);
        }
    }
}

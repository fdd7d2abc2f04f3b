//! Values with their uncertainty, and how a figure moves when the lot is shifted along what all springs share.

use crate::stats::{Dof, StatsError, mean, student_quantile};

/// One common line of a value's budget.
#[derive(Clone, Debug, PartialEq)]
pub struct CommonPart {
    /// Source; the same name is the same error in every spring.
    pub source: String,
    /// Signed standard uncertainty in the value's unit.
    pub contribution: f64,
    /// Degrees of freedom.
    pub dof: Dof,
}

/// A value with its uncertainty.
#[derive(Clone, Debug, PartialEq)]
pub struct Observation {
    /// The value.
    pub value: f64,
    /// Own standard uncertainty.
    pub own: f64,
    /// The common lines.
    pub common: Vec<CommonPart>,
}

/// The sources that all observations share, in order of their first appearance.
fn sources(of: &[Observation]) -> Vec<&str> {
    let mut found: Vec<&str> = Vec::new();
    for part in of.iter().flat_map(|one| &one.common) {
        if !found.contains(&part.source.as_str()) {
            found.push(&part.source);
        }
    }
    found
}

/// The values shifted along one source by `by` of its standard uncertainties.
fn shifted(of: &[Observation], source: &str, by: f64) -> Vec<f64> {
    of.iter()
        .map(|one| {
            let parts = one.common.iter().filter(|part| part.source == source);
            one.value + by * parts.map(|part| part.contribution).sum::<f64>()
        })
        .collect()
}

/// The standard uncertainty of a figure that comes from the common sources: the lot is shifted along each, the figure
/// taken anew, and half the differences added in squares. `None` where the figure does not exist for a shifted lot.
///
/// Nothing is divided by √n: what all springs share, their mean shares too.
pub(super) fn common_uncertainty(
    of: &[Observation],
    figure: impl Fn(&[f64]) -> Option<f64>,
) -> Option<f64> {
    let mut sum = 0.0;
    for source in sources(of) {
        let up = figure(&shifted(of, source, 1.0))?;
        let down = figure(&shifted(of, source, -1.0))?;
        sum += ((up - down) / 2.0).powi(2);
    }
    Some(sum.sqrt())
}

/// The common standard uncertainty of the mean.
pub fn common_of_mean(of: &[Observation]) -> f64 {
    common_uncertainty(of, mean).unwrap_or(0.0)
}

/// The factor that makes a 95 % interval of the common part: Student's t at the effective degrees of freedom of the mean
/// shifts (Welch–Satterthwaite).
///
/// # Errors
/// [`StatsError`] where the quantile cannot be had.
pub(super) fn common_factor(of: &[Observation], confidence: f64) -> Result<f64, StatsError> {
    let n = of.len() as f64;
    let (mut variance, mut known) = (0.0, 0.0);
    for source in sources(of) {
        let parts = || {
            of.iter()
                .flat_map(|one| &one.common)
                .filter(|part| part.source == source)
        };
        let mean = parts().map(|part| part.contribution).sum::<f64>() / n;
        variance += mean * mean;
        if let Some(Dof::Finite(dof)) = parts().next().map(|part| part.dof) {
            known += mean.powi(4) / dof;
        }
    }
    let dof = if known > 0.0 {
        Dof::Finite((variance * variance / known).max(1.0))
    } else {
        Dof::Infinite
    };
    student_quantile(0.5 + confidence / 2.0, dof)
}

/// Largest shift of each value: its whole common part, all sources leaning one way.
pub(super) fn leaned(of: &[Observation], by: f64) -> Vec<f64> {
    of.iter()
        .map(|one| {
            let squares: f64 = sources(std::slice::from_ref(one))
                .into_iter()
                .map(|source| {
                    let same = one.common.iter().filter(|part| part.source == source);
                    same.map(|part| part.contribution).sum::<f64>().powi(2)
                })
                .sum();
            one.value + by * squares.sqrt()
        })
        .collect()
}

//! Ratios that a whole lot shares only by a mistake of units, sign or columns.

use crate::stats::median;

/// Share of the lot's springs that must show one ratio.
const SHARED: f64 = 0.8;
/// How near a ratio must lie to a factor, relative.
const NEAR: f64 = 0.1;

/// What a factor between measured and expected rate means.
const FACTORS: [(f64, &str); 11] = [
    (4.448, "loads in N were read as lbf"),
    (0.2248, "loads in lbf were read as N"),
    (9.807, "loads in N were read as kgf"),
    (0.1020, "loads in kgf were read as N"),
    (25.4, "travel in inches was read as mm"),
    (0.03937, "travel in mm was read as inches"),
    (
        5.710,
        "loads in lbf and travel in inches were read as N and mm",
    ),
    (
        0.1751,
        "loads in N and travel in mm were read as lbf and inches",
    ),
    (1000.0, "loads in N were read as kN"),
    (0.001, "loads in kN were read as N"),
    (-1.0, "a sign is turned"),
];

/// What a factor between measured and drawn lengths means.
const LENGTH_FACTORS: [(f64, &str); 2] = [
    (25.4, "millimetres were written under inches"),
    (0.03937, "inches were written under millimetres"),
];

/// The ratio that at least 80 % of `values` share with a mistake of units about `nominal`, and what it means; both in mm.
pub fn lengths(values: &[f64], nominal: f64) -> Option<(f64, &'static str)> {
    let near = |factor: f64| {
        values
            .iter()
            .filter(|value| (*value / nominal / factor - 1.0).abs() <= NEAR)
            .count()
    };
    let shared = |factor: f64| near(factor) as f64 >= SHARED * values.len() as f64;
    let (factor, finding) = LENGTH_FACTORS
        .into_iter()
        .find(|(factor, _)| !values.is_empty() && shared(*factor))?;
    let ratios: Vec<f64> = values.iter().map(|value| value / nominal).collect();
    Some((median(ratios).unwrap_or(factor), finding))
}

/// What a lot's rates say of its units.
#[derive(Clone, Debug, PartialEq)]
pub struct Doubt {
    /// What it looks like, in words.
    pub finding: String,
    /// Springs that share it.
    pub sharing: usize,
    /// Springs with a rate.
    pub of: usize,
    /// The ratio they share, measured over expected.
    pub ratio: f64,
}

/// The lot is not judged.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum DoubtError {
    #[error(
        "{sharing} of {of} springs have {ratio:.4} times the expected rate {expected:.4} N/mm: {finding}"
    )]
    #[diagnostic(
        code(coilassay::doubt::units),
        help(
            "check the units and columns in the rig file against the export, and `units` at the top of the drawing; if they are right, judge with --units-confirmed, which the report will say"
        )
    )]
    MixedUp {
        finding: String,
        sharing: usize,
        of: usize,
        ratio: f64,
        expected: f64,
    },
}

impl Doubt {
    /// As a fault that ends the run.
    pub fn into_error(self, expected: f64) -> DoubtError {
        DoubtError::MixedUp {
            finding: self.finding,
            sharing: self.sharing,
            of: self.of,
            ratio: self.ratio,
            expected,
        }
    }
}

/// Holds the plain rates of a lot (N/mm) against the expected one. A doubt is raised only if at least 80 % of the
/// springs share one mistake within ± 10 %; a single odd spring among good ones never raises it.
pub fn doubt(rates: &[f64], expected: f64) -> Option<Doubt> {
    let ratios: Vec<f64> = rates.iter().map(|rate| rate / expected).collect();
    let shared = |near: &dyn Fn(f64) -> bool| {
        let sharing: Vec<f64> = ratios
            .iter()
            .copied()
            .filter(|ratio| near(*ratio))
            .collect();
        let enough = !sharing.is_empty() && sharing.len() as f64 >= SHARED * ratios.len() as f64;
        if enough {
            median(sharing.clone()).map(|ratio| (sharing.len(), ratio))
        } else {
            None
        }
    };
    let by_factor = FACTORS.iter().find_map(|(factor, words)| {
        shared(&|ratio| (ratio / factor - 1.0).abs() <= NEAR).map(|found| (*words, found))
    });
    // Load and travel swapped: the slope comes out as 1/R instead of R.
    let swapped = || {
        let near_one = |ratio: f64| (ratio - 1.0).abs() <= NEAR;
        shared(&|ratio| !near_one(ratio) && near_one(ratio * expected * expected))
            .map(|found| ("load and travel columns look swapped", found))
    };
    let (words, (sharing, ratio)) = by_factor.or_else(swapped)?;
    Some(Doubt {
        finding: format!("it looks as if {words}"),
        sharing,
        of: ratios.len(),
        ratio,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_factor_is_named_and_a_good_lot_is_not() {
        for (factor, _) in FACTORS {
            let rates: Vec<f64> = (0..10)
                .map(|place| 10.8 * factor * (1.0 + 0.01 * f64::from(place - 5)))
                .collect();
            assert!(doubt(&rates, 10.8).is_some(), "{factor}");
        }
        let good: Vec<f64> = (0..10)
            .map(|place| 10.8 * (1.0 + 0.08 * f64::from(place - 5)))
            .collect();
        assert_eq!(doubt(&good, 10.8), None);
        assert!(
            doubt(&[1.0 / 10.8; 5], 10.8).is_some_and(|found| found.finding.contains("swapped"))
        );
    }

    #[test]
    fn one_odd_spring_among_good_ones_is_judged() {
        let mut rates = vec![10.8; 9];
        rates.push(10.8 * 4.448);
        assert_eq!(doubt(&rates, 10.8), None);
        let mut rates = vec![10.8 * 4.448; 7];
        rates.extend([10.8; 3]);
        assert_eq!(doubt(&rates, 10.8), None);
    }
}

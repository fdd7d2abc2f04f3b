//! Run rules over a chart, in standard deviations from its centre line.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

/// A rule. Source: the eight tests of ISO 8258:1991 (Nelson 1984), from memory.
#[derive(
    Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize, JsonSchema,
)]
#[serde(rename_all = "snake_case")]
pub enum Rule {
    /// One point beyond a limit.
    Beyond,
    /// Nine in a row on one side.
    NineOneSide,
    /// Six in a row steadily up or down.
    SixSteady,
    /// Fourteen in a row up and down by turns.
    FourteenAlternating,
    /// Two of three beyond two standard deviations on one side.
    TwoOfThree,
    /// Four of five beyond one standard deviation on one side.
    FourOfFive,
    /// Fifteen in a row within one standard deviation.
    FifteenWithin,
    /// Eight in a row beyond one standard deviation, on either side.
    EightBeyondOne,
}

impl Rule {
    /// What is asked without a request.
    pub const DEFAULT: [Self; 2] = [Self::Beyond, Self::NineOneSide];
    /// All eight.
    pub const ALL: [Self; 8] = [
        Self::Beyond,
        Self::NineOneSide,
        Self::SixSteady,
        Self::FourteenAlternating,
        Self::TwoOfThree,
        Self::FourOfFive,
        Self::FifteenWithin,
        Self::EightBeyondOne,
    ];

    /// Points that it looks at.
    pub const fn length(self) -> usize {
        match self {
            Self::Beyond => 1,
            Self::TwoOfThree => 3,
            Self::FourOfFive => 5,
            Self::SixSteady => 6,
            Self::EightBeyondOne => 8,
            Self::NineOneSide => 9,
            Self::FourteenAlternating => 14,
            Self::FifteenWithin => 15,
        }
    }

    /// Whether it fires on the last of `last` points, as many as it looks at.
    fn says(self, last: &[f64]) -> bool {
        let all = |holds: &dyn Fn(f64) -> bool| last.iter().all(|z| holds(*z));
        let some = |wanted: usize, bound: f64| {
            let newest = last.last().copied().unwrap_or(0.0);
            [1.0, -1.0].into_iter().any(|side| {
                side * newest > bound
                    && last.iter().filter(|z| side * **z > bound).count() >= wanted
            })
        };
        let moves: Vec<f64> = last
            .iter()
            .zip(last.iter().skip(1))
            .map(|(one, next)| next - one)
            .collect();
        match self {
            Self::Beyond => all(&|z| z.abs() > 3.0),
            Self::NineOneSide => all(&|z| z > 0.0) || all(&|z| z < 0.0),
            Self::SixSteady => {
                moves.iter().all(|step| *step > 0.0) || moves.iter().all(|step| *step < 0.0)
            }
            Self::FourteenAlternating => {
                let turns = moves.iter().zip(moves.iter().skip(1));
                turns.fold(true, |all, (one, next)| all && one * next < 0.0)
            }
            Self::TwoOfThree => some(2, 2.0),
            Self::FourOfFive => some(4, 1.0),
            Self::FifteenWithin => all(&|z| z.abs() < 1.0),
            Self::EightBeyondOne => all(&|z| z.abs() > 1.0),
        }
    }
}

/// Where a rule fires in `scores`: the place of the last point of each pattern.
pub fn fired(rule: Rule, scores: &[f64]) -> Vec<usize> {
    let length = rule.length();
    scores
        .windows(length)
        .zip(length - 1..)
        .filter(|(last, _)| rule.says(last))
        .map(|(_, place)| place)
        .collect()
}

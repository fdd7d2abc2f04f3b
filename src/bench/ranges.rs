//! The average-and-range method of the repeatability study.
//! Source: AIAG, Measurement Systems Analysis; its printed factors K1, K2 and K3 are 1/d2, 1/d2* and 1/d2*, four digits.

use super::{Cell, Crossed};

/// d2 and d3 of the range of 2 … 25 normal values, by numerical integration to 8 decimals (own computation, agrees
/// with the printed tables of control-chart constants).
#[rustfmt::skip] // keeps the table a table
#[expect(clippy::approx_constant, reason = "d2 of two values is 2/√π")]
const D2_D3: [(f64, f64); 24] = [
    (1.128_379_17, 0.852_502_47), (1.692_568_75, 0.888_368_00), (2.058_750_75, 0.879_808_20), (2.325_928_95, 0.864_081_94),
    (2.534_412_72, 0.848_039_69), (2.704_356_75, 0.833_205_34), (2.847_200_61, 0.819_831_49), (2.970_026_32, 0.807_834_27),
    (3.077_505_46, 0.797_050_67), (3.172_872_70, 0.787_314_62), (3.258_455_28, 0.778_478_34), (3.335_980_35, 0.770_416_20),
    (3.406_763_11, 0.763_023_10), (3.471_826_89, 0.756_211_43), (3.531_982_79, 0.749_908_09), (3.587_883_96, 0.744_051_78),
    (3.640_063_76, 0.738_590_85), (3.688_963_02, 0.733_481_50), (3.734_950_12, 0.728_686_35), (3.778_335_83, 0.724_173_34),
    (3.819_384_64, 0.719_914_81), (3.858_323_42, 0.715_886_74), (3.895_348_15, 0.712_068_18), (3.930_629_22, 0.708_440_77),
];

/// 1/d2 for the mean of many ranges of `count` values.
fn of_many(count: usize) -> Option<f64> {
    D2_D3.get(count.checked_sub(2)?).map(|(d2, _)| 1.0 / d2)
}

/// 1/d2* for one range of `count` values; d2*² = d2² + d3².
fn of_one(count: usize) -> Option<f64> {
    D2_D3
        .get(count.checked_sub(2)?)
        .map(|(d2, d3)| 1.0 / d2.hypot(*d3))
}

/// What average and range say; standard deviations in the unit of the values.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AverageAndRange {
    /// Mean range of the repeats.
    pub mean_range: f64,
    /// Range of the operators' means; absent with one operator.
    pub operator_range: Option<f64>,
    /// Range of the parts' means.
    pub part_range: f64,
    /// Repeatability.
    pub repeatability: f64,
    /// Reproducibility; 0 where the repeats alone explain the operators' range.
    pub reproducibility: f64,
    /// Parts.
    pub part: f64,
}

impl AverageAndRange {
    /// Repeatability and reproducibility together.
    pub fn within(&self) -> f64 {
        self.repeatability.hypot(self.reproducibility)
    }

    /// The whole study's.
    pub fn total(&self) -> f64 {
        self.within().hypot(self.part)
    }
}

/// The study by average and range; `None` where it has more than 25 parts, operators or trials: a range of so many
/// values says too little.
pub fn average_and_range(study: &Crossed) -> Option<AverageAndRange> {
    let mean_range = study.cells.iter().map(Cell::range).sum::<f64>() / study.cells.len() as f64;
    let repeatability = mean_range * of_many(study.trials)?;
    let part_range = range(&study.part_means());
    let part = part_range * of_one(study.parts.len())?;
    let several = study.operators.len() > 1;
    let operator_range = several.then(|| range(&study.operator_means()));
    let repeats = (study.parts.len() * study.trials) as f64;
    let reproducibility = match operator_range {
        Some(range) => {
            let seen = range * of_one(study.operators.len())?;
            (seen.powi(2) - repeatability.powi(2) / repeats)
                .max(0.0)
                .sqrt()
        }
        None => 0.0,
    };
    Some(AverageAndRange {
        mean_range,
        operator_range,
        part_range,
        repeatability,
        reproducibility,
        part,
    })
}

fn range(values: &[f64]) -> f64 {
    let most = values.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    most - values.iter().copied().fold(f64::INFINITY, f64::min)
}

//! How long charts run before they cry without cause, by simulation with a stream of its own: the same on every run.

use super::charts::{H, K, L, LAMBDA, individuals};
use super::rules::Rule;
use crate::stats::{mean, normal_cdf, normal_quantile};

/// Runs of the combined charts.
const RUNS: u32 = 1500;
/// Lots after which a run is given up: hardly any comes so far.
const LONGEST: u32 = 20_000;
/// Baselines drawn for the spread of the true run length.
const BASELINES: u32 = 2000;
/// Seed of the stream.
const SEED: u64 = 0x5EED_0F10_7500;

/// The middle 80 % of the true run lengths that baselines of one size give.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spread {
    /// 10 % are shorter.
    pub short: f64,
    /// Half are.
    pub middle: f64,
    /// 10 % are longer.
    pub long: f64,
}

/// A stream of normal values (SplitMix64, from memory; the quantile of a uniform value).
struct Stream(u64);

impl Stream {
    fn normal(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^= z >> 31;
        let unit = ((z >> 11) as f64 + 0.5) / 9_007_199_254_740_992.0; // 2^53
        normal_quantile(unit.clamp(1e-11, 1.0 - 1e-11)).unwrap_or(0.0)
    }
}

/// Lots until the first alarm of individuals with `rules`, EWMA, CUSUM and, where `spread`, a chart of spreads, all read together,
/// while nothing moves and limits are known; the mean of many runs.
///
/// The chart of spreads is taken as one of normal values: its false alarms for lots of 5 springs and more are within a factor of
/// two of that.
pub fn combined_run_length(rules: &[Rule], spread: bool) -> f64 {
    let mut stream = Stream(SEED);
    let settled = (LAMBDA / (2.0 - LAMBDA)).sqrt();
    let length = |stream: &mut Stream| {
        let (mut means, mut spreads) = (Recent::default(), Recent::default());
        let (mut z, mut high, mut low) = (0.0_f64, 0.0_f64, 0.0_f64);
        for lot in 1..=LONGEST {
            let value = stream.normal();
            z += LAMBDA * (value - z);
            high = (high + value - K).max(0.0);
            low = (low - value - K).max(0.0);
            let mut alarm = z.abs() > L * settled || high > H || low > H;
            alarm |= means.fires(rules, value);
            if spread {
                alarm |= spreads.fires(&Rule::DEFAULT, stream.normal());
            }
            if alarm {
                return f64::from(lot);
            }
        }
        f64::from(LONGEST)
    };
    let total: f64 = (0..RUNS).map(|_| length(&mut stream)).sum();
    total / f64::from(RUNS)
}

/// The last values of a chart.
#[derive(Default)]
struct Recent(Vec<f64>);

impl Recent {
    /// Whether a rule fires on `value`.
    fn fires(&mut self, rules: &[Rule], value: f64) -> bool {
        if self.0.len() == 15 {
            self.0.remove(0);
        }
        self.0.push(value);
        rules.iter().any(|rule| {
            let from = self.0.len().checked_sub(rule.length());
            let last = from.and_then(|from| self.0.get(from..));
            last.is_some_and(|last| !super::rules::fired(*rule, last).is_empty())
        })
    }
}

/// The spread of the true run length of an individuals chart whose limits come from `lots` lots; `None` below two.
pub fn true_run_length(lots: usize) -> Option<Spread> {
    let mut stream = Stream(SEED);
    let mut lengths = Vec::new();
    for _ in 0..BASELINES {
        let baseline: Vec<f64> = (0..lots.min(1000)).map(|_| stream.normal()).collect();
        mean(&baseline)?;
        let Some(limits) = individuals(&baseline) else {
            continue;
        };
        let outside = normal_cdf(limits.lower).ok()? + normal_cdf(-limits.upper).ok()?;
        lengths.push(1.0 / outside.max(1e-12));
    }
    lengths.sort_by(f64::total_cmp);
    let at = |tenths: usize| lengths.get(lengths.len() * tenths / 10).copied();
    Some(Spread {
        short: at(1)?,
        middle: at(5)?,
        long: at(9)?,
    })
}

//! The integral of a peaked function given by its logarithm.
//!
//! The mode is sought on a grid and narrowed by golden section; panels of 8 Gauss–Legendre points then widen by
//! doubling to either side of it, from half the peak's width to the bounds, so that a peak a ten-thousandth of the
//! range wide is integrated as well as a flat stretch.

/// Nodes above zero and weights of the 8-point Gauss–Legendre rule on −1 … 1; Abramowitz & Stegun, table 25.4.
#[rustfmt::skip]
const NODES: [(f64, f64); 4] = [
    (0.183_434_642_495_650, 0.362_683_783_378_362),
    (0.525_532_409_916_329, 0.313_706_645_877_887),
    (0.796_666_477_413_627, 0.222_381_034_453_374),
    (0.960_289_856_497_536, 0.101_228_536_290_376),
];
/// Points of the first grid: the peaks here are smooth in the logarithm, so their slope shows from afar.
const GRID: u32 = 24;
/// Narrowings by golden section: the rest is 0.618^30 of two grid steps.
const NARROWINGS: u32 = 30;
const GOLDEN: f64 = 0.618_033_988_749_895;

/// What an integral found.
#[derive(Clone, Copy, Debug)]
pub(super) struct Found {
    /// ln of the mean of the function over the bounds.
    pub(super) ln_mean: f64,
    /// Where it is largest.
    pub(super) mode: f64,
    /// Standard deviation of the argument, the function as weight.
    pub(super) sd: f64,
}

/// The mean of exp(`ln_f`) over `from` … `to`.
pub(super) fn mean(from: f64, to: f64, ln_f: impl Fn(f64) -> f64) -> Found {
    let mode = mode(from, to, &ln_f);
    let top = ln_f(mode);
    let half = width(mode, (from, to), &ln_f) / 2.0;
    let mut edges = vec![mode];
    for (end, sign) in [(from, -1.0), (to, 1.0)] {
        let mut reach = half;
        while reach < (end - mode) * sign {
            edges.push(mode + sign * reach);
            reach *= if reach < 4.0 * half { 2.0 } else { 1.5 };
        }
        edges.push(end);
    }
    edges.sort_by(f64::total_cmp);
    let panels = edges.iter().zip(edges.iter().skip(1));
    let (mut sum, mut first, mut second) = (0.0, 0.0, 0.0);
    for (low, high) in panels {
        let (middle, half) = (f64::midpoint(*low, *high), (high - low) / 2.0);
        for (node, weight) in NODES {
            for side in [-1.0, 1.0] {
                let x = middle + side * half * node;
                let part = half * weight * (ln_f(x) - top).exp();
                sum += part;
                first += part * (x - mode);
                second += part * (x - mode).powi(2);
            }
        }
    }
    let sd = (second / sum - (first / sum).powi(2)).max(0.0).sqrt();
    let ln_mean = top + (sum / (to - from)).ln();
    Found { ln_mean, mode, sd }
}

fn mode(from: f64, to: f64, ln_f: &impl Fn(f64) -> f64) -> f64 {
    let step = (to - from) / f64::from(GRID);
    let grid = (0..=GRID).map(|i| from + f64::from(i) * step);
    let best = grid
        .max_by(|a, b| ln_f(*a).total_cmp(&ln_f(*b)))
        .unwrap_or(from);
    let (mut low, mut high) = ((best - step).max(from), (best + step).min(to));
    for _ in 0..NARROWINGS {
        let (a, b) = (high - GOLDEN * (high - low), low + GOLDEN * (high - low));
        if ln_f(a) >= ln_f(b) {
            high = b;
        } else {
            low = a;
        }
    }
    f64::midpoint(low, high)
}

/// Distance from the mode at which the logarithm has fallen by one half, on the narrower side.
fn width(mode: f64, (from, to): (f64, f64), ln_f: &impl Fn(f64) -> f64) -> f64 {
    let top = ln_f(mode);
    let mut width = (to - from) / 2.0;
    let fallen = |width: f64| {
        [-1.0, 1.0].into_iter().any(|side| {
            let x = mode + side * width;
            x >= from && x <= to && top - ln_f(x) > 0.5
        })
    };
    let smallest = (to - from) * 1e-6;
    while width > smallest && fallen(width) {
        width /= 2.0;
    }
    width
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// A normal peak of any width, anywhere, cut by the bounds or not: its share is known from the distribution.
    #[test]
    fn a_normal_peak_is_its_share() {
        let below = |z: f64| crate::stats::normal_cdf(z).unwrap_or(f64::NAN);
        for sd in [1e-4, 3e-3, 0.02, 0.3, 4.0] {
            for at in [-0.3, 0.0, 1e-5, 0.013, 0.5, 0.777, 1.0, 1.2] {
                // Beyond a bound by many deviations nothing but the edge is left; the distribution has no digits there.
                let off = (at - 1.0_f64).max(-at).max(0.0) / sd;
                if off > 6.0 {
                    continue;
                }
                let found = mean(0.0, 1.0, |x| -0.5 * ((x - at) / sd).powi(2));
                let share = below((1.0 - at) / sd) - below(-at / sd);
                let wanted = share * sd * std::f64::consts::TAU.sqrt();
                assert_relative_eq!(
                    found.ln_mean.exp(),
                    wanted,
                    epsilon = 0.0,
                    max_relative = 1e-6
                );
            }
        }
    }

    /// A skewed peak against the plain sum over a million points.
    #[test]
    fn a_skewed_peak_is_the_plain_sum() {
        let ln_f = |x: f64| -0.5 * ((4.0 * (1.0 - x).ln() + 0.4) / 0.01).powi(2) - x;
        let steps = 1_000_000;
        let points = (0..steps).map(|i| 0.25 * (f64::from(i) + 0.5) / f64::from(steps));
        let wanted = points.map(|x| ln_f(x).exp()).sum::<f64>() / f64::from(steps);
        let found = mean(0.0, 0.25, ln_f);
        assert_relative_eq!(
            found.ln_mean.exp(),
            wanted,
            epsilon = 0.0,
            max_relative = 1e-6
        );
        assert_relative_eq!(
            found.mode,
            1.0 - (-0.1_f64).exp(),
            epsilon = 0.0,
            max_relative = 1e-3
        );
    }
}

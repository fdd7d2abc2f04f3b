//! Proof by simulation of the type A uncertainty alone: how often its 95 % interval holds the true slope.

use coilassay::fit::{LineFit, TypeA, type_a};
use coilassay::stats::{Dof, student_quantile};

use crate::published::Misses;

const CURVES: u32 = 10_000;
const SLOPE: f64 = 10.8;

/// A seeded generator by hand: splitmix64 (OOPSLA 2014), normal by the polar angle.
struct Noise(u64);

impl Noise {
    fn uniform(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        ((z ^ (z >> 31)) >> 11) as f64 / 2_f64.powi(53)
    }

    fn normal(&mut self) -> f64 {
        let radius = (-2.0 * (1.0 - self.uniform()).ln()).sqrt();
        radius * (std::f64::consts::TAU * self.uniform()).cos()
    }

    /// AR(1) errors of unit variance, stationary from the first on.
    fn errors(&mut self, n: usize, rho: f64) -> Vec<f64> {
        let step = (1.0 - rho * rho).sqrt();
        let mut last = self.normal();
        let mut errors = vec![last];
        while errors.len() < n {
            last = rho * last + step * self.normal();
            errors.push(last);
        }
        errors
    }
}

/// Of the curves whose fit speaks for itself: how many there are, and the share whose interval holds the truth.
fn coverage(n: usize, rho: f64, seed: u64) -> (u32, f64) {
    let mut noise = Noise(seed);
    let x: Vec<f64> = (0..n).map(|i| 5.0 + 0.1 * i as f64).collect();
    let (mut known, mut held) = (0_u32, 0_u32);
    for _ in 0..CURVES {
        let errors = noise.errors(n, rho);
        let y: Vec<f64> = x
            .iter()
            .zip(errors)
            .map(|(x, e)| SLOPE * x + 0.02 * e)
            .collect();
        let line = LineFit::through(&x, &y).unwrap();
        if let TypeA::Known {
            standard_uncertainty,
            dof,
            ..
        } = type_a(&line, &x).unwrap()
        {
            known += 1;
            let reach = student_quantile(0.975, dof).unwrap() * standard_uncertainty;
            held += u32::from((line.slope - SLOPE).abs() <= reach);
        }
    }
    (known, f64::from(held) / f64::from(known))
}

/// Runs (n, rho) cases; every case's coverage must lie in the band.
fn check(
    cases: &[(usize, f64)],
    effective: std::ops::Range<f64>,
    band: std::ops::RangeInclusive<f64>,
) {
    let mut misses = Vec::new();
    for (case, &(n, rho)) in cases.iter().enumerate() {
        let count = n as f64 * (1.0 - rho) / (1.0 + rho);
        assert!(
            effective.contains(&count),
            "{n} points at {rho} are worth {count}"
        );
        let (known, share) = coverage(n, rho, 4471 + case as u64);
        let line = format!("n {n}, rho {rho}, effective {count:.1}: {share:.4} of {known}");
        if !band.contains(&share) || known < CURVES / 3 {
            misses.push(line);
        }
    }
    assert!(misses.is_empty(), "{misses:#?}");
}

#[test]
fn from_thirty_effective_points_on() {
    #[rustfmt::skip]
    let cases = [
        (30, 0.0), (40, 0.0), (100, 0.0), (300, 0.0), (56, 0.3), (75, 0.3), (186, 0.3),
        (120, 0.6), (160, 0.6), (400, 0.6),
    ];
    check(&cases, 30.0..f64::INFINITY, 0.93..=0.97);
}

#[test]
fn from_ten_to_thirty_effective_points() {
    #[rustfmt::skip]
    let cases = [
        (10, 0.0), (12, 0.0), (20, 0.0), (19, 0.3), (23, 0.3), (28, 0.3), (47, 0.3),
        (40, 0.6), (44, 0.6), (49, 0.6), (60, 0.6), (80, 0.6), (100, 0.6),
    ];
    check(&cases, 10.0..30.0, 0.90..=0.98);
}

/// A line of slope 10 with wandering errors made of fractional parts.
fn wandering(n: usize, rho: f64) -> (Vec<f64>, Vec<f64>) {
    let mut last = 0.0;
    let point = |i: usize| {
        let i = i as f64;
        last = rho * last + (i * i * 0.618_033_988_7 + i * 0.37) % 1.0 - 0.5;
        (0.1 * i, 10.0 * (0.1 * i) + 0.05 * last)
    };
    (0..n).map(point).unzip()
}

#[test]
fn type_a_by_whole_matrices() {
    #[rustfmt::skip]
    const ROWS: [(usize, f64, f64, f64, f64, f64, f64); 3] = [
        // n, made with rho; lag-1, u, inflation, effective n, nu: own, numpy. u from (X'X)^-1 X'RX (X'X)^-1 times
        // residual SS/(n - tr HR), H and R written out as matrices; nu from the two relative variances
        (40, 0.1, 0.014_835_423_855_8, 0.001_834_318_136_095, 1.027_824_904_138, 38.830_515_884_08, 31.572_337_881_43),
        (40, 0.4, 0.289_136_319_553_9, 0.002_460_023_023_223, 1.727_775_323_645, 22.057_052_296_60, 8.887_407_508_083),
        (60, 0.6, 0.382_534_578_913_9, 0.001_537_740_888_158, 2.138_826_288_220, 26.797_105_714_55, 13.279_282_127_39),
    ];
    let mut misses = Misses::default();
    for (n, made, rho, u, factor, effective, nu) in ROWS {
        let (x, y) = wandering(n, made);
        let line = LineFit::through(&x, &y).unwrap();
        let TypeA::Known {
            standard_uncertainty,
            dof: Dof::Finite(dof),
            lag1,
            effective_count,
            inflation,
        } = type_a(&line, &x).unwrap()
        else {
            panic!("{n} points made with {made} are enough");
        };
        let mut near = |what: &str, got, want| {
            misses.relative(&format!("{what}, n {n}, {made}"), got, want, 1e-9);
        };
        near("lag-1", lag1, rho);
        near("u", standard_uncertainty, u);
        near("inflation", inflation, factor);
        near("effective n", effective_count, effective);
        near("nu", dof, nu);
    }
    misses.none();
}

#[test]
fn ten_effective_points_are_needed() {
    for (n, enough) in [(9, false), (10, true)] {
        let x: Vec<f64> = (0..n).map(f64::from).collect();
        let sign = |x: &f64| if x % 2.0 < 1.0 { 1.0 } else { -1.0 };
        let y: Vec<f64> = x.iter().map(|x| 3.0 * x + sign(x)).collect();
        let line = LineFit::through(&x, &y).unwrap();
        let known = matches!(type_a(&line, &x).unwrap(), TypeA::Known { .. });
        assert_eq!(known, enough, "{n} alternating points");
    }
}

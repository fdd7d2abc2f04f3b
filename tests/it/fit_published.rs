//! `fit` against NIST StRD, GUM H.3 and sums by hand; "derived" is exact-rational own computation on StRD data.

use coilassay::fit::{FitError, LackKind, LineFit, TypeA, lack_of_fit, two_point_slope, type_a};
use coilassay::stats::Dof;

use crate::published::{Misses, column};

#[test]
fn norris() {
    let (x, y) = (column("Norris.csv", 0), column("Norris.csv", 1));
    let line = LineFit::through(&x, &y).unwrap();
    let mut misses = Misses::default();
    let mut near = |what: &str, got, want| {
        misses.relative(
            &format!("NIST StRD Norris, certified {what}"),
            got,
            want,
            1e-9,
        );
    };
    near("B0", line.intercept, -0.262_323_073_774_029);
    near("B0 at 0", line.at(0.0), -0.262_323_073_774_029);
    near("SD of B0", line.intercept_error, 0.232_818_234_301_152);
    near(
        "SD of B0 at 0",
        line.mean_error_at(0.0),
        0.232_818_234_301_152,
    );
    near("B1", line.slope, 1.002_116_818_020_45);
    near("SD of B1", line.slope_error, 0.429_796_848_199_937e-3);
    near("residual SD", line.residual_sd, 0.884_796_396_144_373);
    near("R squared", line.r_squared.unwrap(), 0.999_993_745_883_712);
    let sse: f64 = line.residuals.iter().map(|r| r * r).sum();
    near("residual SS", sse, 26.617_398_529_422_4);
    near(
        "regression SS",
        line.slope.powi(2) * line.sxx,
        4_255_954.132_323_69,
    );
    misses.none();
    assert_eq!(line.count, 36);
}

#[test]
fn pontius_both_ways() {
    let (load, deflection) = (column("Pontius.csv", 0), column("Pontius.csv", 1));
    let soft = LineFit::through(&load, &deflection).unwrap();
    let rate = LineFit::through(&deflection, &load).unwrap();
    let mut misses = Misses::default();
    let mut near = |what: &str, got, want| {
        misses.relative(
            &format!("NIST StRD Pontius, derived {what}"),
            got,
            want,
            1e-9,
        );
    };
    near(
        "B0, deflection on load",
        soft.intercept,
        0.006_149_684_210_526_316,
    );
    near(
        "B1, deflection on load",
        soft.slope,
        7.221_025_814_536_341e-7,
    );
    near("SD of B0", soft.intercept_error, 7.132_051_674_656_124e-4);
    near("SD of B1", soft.slope_error, 3.969_147_804_044_248e-10);
    near("s", soft.residual_sd, 0.002_171_272_596_056_750_4);
    near(
        "R squared",
        soft.r_squared.unwrap(),
        0.999_988_519_115_218_8,
    );
    near(
        "B0, load on deflection",
        rate.intercept,
        -8_498.177_989_213_26,
    );
    near("rate", rate.slope, 1_384_828.893_842_457);
    near("SD of B0, load", rate.intercept_error, 991.774_077_462_697);
    near("SD of the rate", rate.slope_error, 761.192_482_085_697_5);
    near("s, load", rate.residual_sd, 3_006.858_288_174_031_9);
    misses.none();
}

#[test]
fn pontius_is_no_line() {
    let (load, deflection) = (column("Pontius.csv", 0), column("Pontius.csv", 1));
    let line = LineFit::through(&load, &deflection).unwrap();
    let lack = lack_of_fit(&load, &deflection, &line).unwrap();
    let mut misses = Misses::default();
    misses.relative("derived F(18, 20)", lack.f, 214.746_923_654, 1e-9);
    misses.relative("derived p", lack.p, 5.5037e-19, 1e-5);
    misses.absolute("derived dof", lack.dof1, 18.0, 0.0);
    misses.absolute("derived dof", lack.dof2, 20.0, 0.0);
    // NIST StRD Pontius, certified B1 and B2; slope B1 + 2·B2·x at x = 3e6 over that at 1.5e5
    let (b1, b2) = (0.732_059_160_401_003e-6, -0.316_081_871_345_029e-14);
    let bend = (b1 + 2.0 * b2 * 3e6) / (b1 + 2.0 * b2 * 1.5e5) - 1.0;
    misses.relative(
        "bend of the certified parabola",
        lack.bend.unwrap(),
        bend,
        1e-9,
    );
    misses.none();
    assert_eq!(lack.kind, LackKind::PureError);
    assert!(lack.warns(), "2.5 % of bend at p 5e-19");
}

#[test]
fn one_run_of_pontius_by_curvature() {
    // The first twenty rows are one run: no load repeats, so the parabola is the test.
    let (load, deflection) = (column("Pontius.csv", 0), column("Pontius.csv", 1));
    let (x, y) = (&load[..20], &deflection[..20]);
    let line = LineFit::through(x, y).unwrap();
    let lack = lack_of_fit(x, y, &line).unwrap();
    // Own, mpmath: F = (SSE1 - SSE2)/(SSE2/17) from independent least squares of degree 1 and 2
    let mut misses = Misses::default();
    misses.relative("F(1, 17)", lack.f, 2_172.366_280_52, 1e-6);
    misses.relative("bend", lack.bend.unwrap(), -0.025_151_891_247_8, 1e-8);
    misses.absolute("dof", lack.dof2, 17.0, 0.0);
    misses.none();
    assert_eq!(lack.kind, LackKind::Curvature);
    assert!(lack.warns());
}

#[test]
fn a_warning_needs_both_p_and_bend() {
    // y = 10 x + c x² on 0..=100 of 1 mm: bend = 2c·100/10 = 20 c, exact up to a ripple of +-0.001
    let x: Vec<f64> = (0..=100).map(f64::from).collect();
    let with = |c: f64, ripple: f64| {
        let sign = |x: f64| if x.rem_euclid(2.0) < 1.0 { 1.0 } else { -1.0 };
        let y: Vec<f64> = x
            .iter()
            .map(|x| 10.0 * x + c * x * x + ripple * sign(*x))
            .collect();
        let line = LineFit::through(&x, &y).unwrap();
        lack_of_fit(&x, &y, &line).unwrap()
    };
    let (small, large, unseen) = (
        with(0.000_45, 1e-3),
        with(-0.000_55, 1e-3),
        with(0.000_55, 50.0),
    );
    let mut misses = Misses::default();
    misses.absolute("by hand, 20 * 0.00045", small.bend.unwrap(), 0.009, 1e-5);
    misses.absolute("by hand, -20 * 0.00055", large.bend.unwrap(), -0.011, 1e-5);
    misses.none();
    assert!(small.p < 0.01 && !small.warns(), "{small:?}");
    assert!(large.p < 0.01 && large.warns(), "{large:?}");
    assert!(unseen.p > 0.01 && !unseen.warns(), "{unseen:?}");
}

#[test]
fn pure_error_needs_three_scattering_groups() {
    let kind = |x: &[f64], y: &[f64]| {
        let line = LineFit::through(x, y).unwrap();
        lack_of_fit(x, y, &line).unwrap().kind
    };
    let three = [1.0, 1.0, 2.0, 2.0, 3.0, 3.0];
    let two = [1.0, 1.0, 2.0, 2.0, 3.0, 4.0];
    let y = [1.0, 1.1, 2.2, 2.1, 3.0, 3.2];
    assert_eq!(kind(&three, &y), LackKind::PureError);
    assert_eq!(kind(&two, &y), LackKind::Curvature);
    assert_eq!(
        kind(&three, &[1.0, 1.0, 2.2, 2.2, 3.0, 3.0]),
        LackKind::Curvature
    );
    let line = LineFit::through(&[1.0, 2.0, 3.0], &[1.0, 2.0, 3.5]).unwrap();
    assert_eq!(
        lack_of_fit(&[1.0, 2.0, 3.0], &[1.0, 2.0, 3.5], &line),
        None,
        "nothing left to test by"
    );
    // By hand: four points leave the parabola 4 - 3 = 1
    let (x, y) = ([1.0, 2.0, 3.0, 4.0], [1.0, 2.0, 3.5, 4.0]);
    let line = LineFit::through(&x, &y).unwrap();
    approx::assert_abs_diff_eq!(lack_of_fit(&x, &y, &line).unwrap().dof2, 1.0);
}

#[test]
fn gum_h3() {
    // JCGM 100:2008 H.3, thermometer calibration, from memory; unrounded figures recomputed
    #[rustfmt::skip]
    let t = [21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.010, 26.511];
    #[rustfmt::skip]
    let b = [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.160];
    let line = LineFit::through(&t, &b).unwrap();
    let mut misses = Misses::default();
    let mut near = |what: &str, got, want| {
        misses.absolute(&format!("GUM H.3, {what}"), got, want, 1e-9);
    };
    near("y1 at 20", line.at(20.0), -0.171_203_790_13);
    near("u(y1)", line.mean_error_at(20.0), 0.002_877_597_84);
    near("y2", line.slope, 0.002_182_697_74);
    near("u(y2)", line.slope_error, 0.000_667_938_77);
    near("s", line.residual_sd, 0.003_497_563_96);
    near("b at 30", line.at(30.0), -0.149_376_812_73);
    near("u(b at 30)", line.mean_error_at(30.0), 0.004_138_595_75);
    misses.none();
}

#[test]
fn two_points_are_the_means_of_the_ends() {
    // Span 0..20, ends reach 1.0: by hand (0+1)/2 -> (1+2)/2, (19+20)/2 -> (40+43)/2: 40/19
    let x = [0.0, 1.0, 1.1, 10.0, 18.9, 19.0, 20.0];
    let y = [1.0, 2.0, 99.0, 5.0, -7.0, 40.0, 43.0];
    let mut misses = Misses::default();
    let slope = two_point_slope(&x, &y).unwrap();
    misses.relative("by hand, 40/19", slope, 40.0 / 19.0, 1e-14);
    misses.none();
    assert_eq!(two_point_slope(&[1.0, 1.0], &[1.0, 2.0]), None);
    assert_eq!(two_point_slope(&[1.0, 2.0], &[1.0]), None);
    assert_eq!(
        two_point_slope(&[1.0, f64::NAN, 2.0], &[1.0, 2.0, 3.0]),
        None
    );
}

#[test]
fn what_is_no_line_is_refused() {
    let fit = |x: &[f64], y: &[f64]| LineFit::through(x, y).unwrap_err();
    let two = FitError::TooFewAbscissae { found: 2 };
    assert_eq!(
        fit(&[0.1; 3], &[1.0, 2.0, 3.0]),
        FitError::TooFewAbscissae { found: 1 }
    );
    assert_eq!(fit(&[1.0, 2.0, 2.0, 1.0], &[1.0, 2.0, 3.0, 4.0]), two);
    assert_eq!(fit(&[], &[]), FitError::TooFewAbscissae { found: 0 });
    assert_eq!(
        fit(&[1.0, 2.0, 3.0], &[1.0, f64::NAN, 3.0]),
        FitError::NotFinite { point: 2 }
    );
    assert_eq!(
        fit(&[1.0, 2.0, f64::INFINITY], &[1.0, 1.0, 3.0]),
        FitError::NotFinite { point: 3 }
    );
    assert_eq!(
        fit(&[1.0, 2.0], &[1.0]),
        FitError::LengthsDiffer { x: 2, y: 1 }
    );
    assert_eq!(
        fit(&[-1e200, 0.0, 1e200], &[1.0, 2.0, 3.0]),
        FitError::OutOfRange
    );
    let flat = LineFit::through(&[1.0, 2.0, 3.0], &[5.0; 3]).unwrap();
    assert_eq!(flat.r_squared, None, "nothing varies, nothing is explained");
}

#[test]
fn type_a_says_when_it_cannot() {
    let x: Vec<f64> = (0..12).map(f64::from).collect();
    let wander: Vec<f64> = x.iter().map(|x| 2.0 * x + (x / 3.0).sin()).collect();
    let line = LineFit::through(&x, &wander).unwrap();
    let few = type_a(&line, &x).unwrap();
    assert!(
        matches!(few, TypeA::TooFewEffective { effective_count, .. } if effective_count < 10.0)
    );
    assert!(type_a(&line, &x[1..]).is_err());
    // Twelve points that alternate: limited to coefficient 0, the textbook error and n - 2.
    let ripple: Vec<f64> = x
        .iter()
        .map(|x| 2.0 * x + (x * std::f64::consts::PI).cos())
        .collect();
    let line = LineFit::through(&x, &ripple).unwrap();
    let TypeA::Known {
        standard_uncertainty,
        dof,
        effective_count,
        ..
    } = type_a(&line, &x).unwrap()
    else {
        panic!("alternating points are independent enough");
    };
    let mut misses = Misses::default();
    misses.relative("textbook", standard_uncertainty, line.slope_error, 1e-12);
    misses.relative("all points", effective_count, 12.0, 1e-14);
    misses.none();
    assert_eq!(dof, Dof::Finite(10.0));
}

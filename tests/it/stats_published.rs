//! `stats` against published values; "own" marks what was computed elsewhere (mpmath, 40 digits) for this test.

use coilassay::stats::{
    Dof, StatsError, binomial_cdf, corrected_lag1, effective_n, f_upper_tail,
    incomplete_theil_slope, lag1, mean, mean_inflation, median, normal_cdf, normal_quantile,
    slope_inflation, standard_deviation, student_cdf, student_quantile,
};

use crate::published::{Misses, column};

const INF: f64 = f64::INFINITY; // in the tables below: Dof::Infinite

fn dof(nu: f64) -> Dof {
    if nu.is_infinite() {
        Dof::Infinite
    } else {
        Dof::Finite(nu)
    }
}

#[test]
fn strd_univariate() {
    #[rustfmt::skip]
    const SETS: [(&str, f64, f64, f64); 2] = [ // NIST StRD, certified mean, SD, lag-1 coefficient
        ("Lottery.csv", 518.958_715_596_330, 291.699_727_470_969, -0.120_948_622_967_393),
        ("Mavro.csv", 2.001_856_000_000_00, 0.000_429_123_454_003_053, 0.937_989_183_438_248),
    ];
    let mut misses = Misses::default();
    for (set, centre, sd, rho) in SETS {
        let y = column(set, 0);
        misses.relative(set, mean(&y).unwrap(), centre, 1e-14);
        // Mavro's values are 5000 times their spread, which costs four of the sixteen digits.
        misses.relative(set, standard_deviation(&y).unwrap(), sd, 1e-11);
        misses.relative(set, lag1(&y).unwrap(), rho, 1e-11);
    }
    misses.none();
}

#[test]
fn student_quantiles() {
    // 1e-10: the library stops its iteration there.
    #[rustfmt::skip]
    const ROWS: [(&str, f64, f64, f64, f64); 27] = [ // source, p, nu, t, within (relative)
        ("own, tan(0.475 pi)", 0.975, 1.0, 12.706_204_736_174_7, 1e-10),
        ("own, 0.95/sqrt(2*0.975*0.025)", 0.975, 2.0, 4.302_652_729_696_14, 1e-10),
        ("own, mpmath", 0.975, 5.0, 2.570_581_835_636, 1e-10),
        ("own, mpmath", 0.977_25, 5.0, 2.648_654_254_283, 1e-10),
        ("own, mpmath", 0.975, 23.7, 2.065_281_963_315, 1e-10),
        ("own, mpmath", 0.977_25, 23.7, 2.111_161_096_692, 1e-10),
        ("own, mpmath", 0.995, 23.7, 2.799_959_116_34, 1e-10),
        ("own, mpmath", 0.6, 1001.0, 0.253_414_448_483_498, 2e-11),
        ("own, mpmath", 0.977_25, 1001.0, 2.002_503_013_583_82, 2e-11),
        ("own, mpmath", 0.999_999, 1001.0, 4.781_580_319_032_73, 1e-9),
        ("own, mpmath", 0.977_25, 1e3, 2.002_505_517_219, 1e-10),
        ("own, mpmath", 0.995, 1e3, 2.580_754_698_066, 1e-10),
        ("own, mpmath", 0.975, 1e4, 1.960_201_239_891, 1e-10),
        ("own, mpmath", 0.977_25, 1e5, 2.000_027_444_285, 1e-10),
        ("own, mpmath", 0.975, 1e6, 1.959_966_356_814, 1e-10),
        ("own, mpmath", 0.977_25, 1e7, 2.000_002_693_9, 1e-10),
        ("own, mpmath", 0.977_25, 1e8, 2.000_002_468_9, 1e-10),
        ("own, mpmath", 0.977_25, 1e9, 2.000_002_446_4, 1e-10),
        ("own, mpmath", 0.995, 1e9, 2.575_829_308_465, 1e-10),
        ("own, mpmath", 0.977_25, INF, 2.000_002_443_9, 1e-10),
        ("own, scipy t.ppf", 0.975, 37.0, 2.026_192_463_029_109_3, 1e-10),
        ("own, scipy t.ppf", 0.995, 8.0, 3.355_387_331_333_395, 1e-10),
        // GUM (JCGM 100:2008) Table G.2, 95.45 %, from memory; printed to two decimals
        ("GUM G.2, nu 1", 0.977_25, 1.0, 13.97, 0.005 / 13.97),
        ("GUM G.2, nu 2", 0.977_25, 2.0, 4.53, 0.005 / 4.53),
        ("GUM G.2, nu 5", 0.977_25, 5.0, 2.65, 0.005 / 2.65),
        ("GUM G.2, nu 20", 0.977_25, 20.0, 2.13, 0.005 / 2.13),
        ("GUM G.2, nu 100", 0.977_25, 100.0, 2.025, 0.0005 / 2.025),
    ];
    let mut misses = Misses::default();
    for (source, p, nu, want, within) in ROWS {
        let source = format!("{source}, p {p}, nu {nu}");
        let high = student_quantile(p, dof(nu)).unwrap();
        misses.relative(&source, high, want, within);
        let low = student_quantile(1.0 - p, dof(nu)).unwrap();
        misses.relative(&source, low, -want, within);
    }
    misses.none();
}

#[test]
fn normal_f_and_binomial() {
    let mut misses = Misses::default();
    let mut near = |source: &str, got: Result<f64, StatsError>, want: f64, within: f64| {
        misses.relative(source, got.unwrap(), want, within);
    };
    near(
        "own, norm.ppf",
        normal_quantile(0.95),
        1.644_853_626_951_472_2,
        1e-14,
    );
    near(
        "own, norm.ppf",
        normal_quantile(0.99),
        2.326_347_874_040_840_8,
        1e-14,
    );
    // JCGM 106:2012, example of the guard band factors, from memory and recomputed
    near("normal below 1", normal_cdf(1.0), 0.841_345, 5e-7);
    near("normal below 3", normal_cdf(3.0), 0.998_650, 5e-7);
    near(
        "own, mpmath",
        student_cdf(-3.0, Dof::Finite(23.7)),
        0.003_129_607_422_844_94,
        1e-12,
    );
    near(
        "own, mpmath",
        student_cdf(-3.0, Dof::Finite(1e4)),
        0.001_353_224_094_998_83,
        1e-10,
    );
    near(
        "own, f.ppf(.95, 9, 40)",
        f_upper_tail(2.124_029_264_016_695_3, 9.0, 40.0),
        0.05,
        1e-12,
    );
    // NIST StRD, certified F of SiRstv with its derived p
    near(
        "SiRstv",
        f_upper_tail(1.180_462_374_402_55, 4.0, 20.0),
        0.349_447_493_402,
        1e-11,
    );
    near(
        "SmLs01",
        f_upper_tail(21.0, 8.0, 180.0),
        2.583_264_337_27e-22,
        1e-10,
    );
    near(
        "own, f.sf",
        f_upper_tail(200.0, 1.0, 1000.0),
        1.578_131_843_356e-41,
        1e-9,
    );
    near(
        "one and two sides",
        f_upper_tail(4.0, 1.0, 1e7),
        0.045_500_263_896_36,
        1e-6,
    );
    near(
        "by hand, 1 - 1e-6",
        f_upper_tail(1e-6, 2.0, 1e5),
        1.0 - 1e-6,
        1e-11,
    );
    near("by hand, 0.9^3", binomial_cdf(0, 3, 0.1), 0.729, 1e-14);
    near(
        "by hand, 0.9^3+3*0.1*0.81",
        binomial_cdf(1, 3, 0.1),
        0.972,
        1e-14,
    );
    near("by hand, all", binomial_cdf(3, 3, 0.1), 1.0, 1e-14);
    misses.none();
}

#[test]
fn arguments_out_of_range_are_refused() {
    for p in [0.0, 1.0, -0.1, 1.1, f64::NAN, 1e-13] {
        assert!(normal_quantile(p).is_err(), "{p}");
        assert!(student_quantile(p, Dof::Finite(5.0)).is_err(), "{p}");
        assert!(student_quantile(p, Dof::Finite(5e7)).is_err(), "{p}");
    }
    for nu in [0.0, 0.4, -1.0, f64::NAN, f64::INFINITY] {
        assert!(student_quantile(0.9, Dof::Finite(nu)).is_err(), "{nu}");
        assert!(student_cdf(1.0, Dof::Finite(nu)).is_err(), "{nu}");
        assert!(f_upper_tail(1.0, nu, 5.0).is_err(), "{nu}");
    }
    assert!(student_cdf(f64::NAN, Dof::Infinite).is_err());
    assert!(f_upper_tail(-1.0, 2.0, 5.0).is_err());
    assert!(f_upper_tail(1.0, 2.0, 1e6).is_err());
    assert!(binomial_cdf(1, 5, 1.5).is_err());
    assert!(binomial_cdf(1, 200_000, 0.5).is_err());
    // The quantile that the library gets wrong at nu 1 is caught by its cdf.
    let missed = student_quantile(1e-10, Dof::Finite(1.0));
    assert!(
        matches!(missed, Err(StatsError::Missed { .. })),
        "{missed:?}"
    );
}

#[test]
fn inflation_of_ar1_errors() {
    #[rustfmt::skip]
    const ROWS: [(u16, f64, f64, f64, f64); 3] = [ // n, rho, mean, slope, effective n: own, scipy
        (20, 0.5, 2.800_000_190_734_863_3, 2.412_029_316_550_807, 6.666_666_666_666_667),
        (50, 0.3, 1.832_653_061_224_489_6, 1.783_745_468_199_774_2, 26.923_076_923_076_923),
        (100, 0.8, 8.600_000_000_081_486, 7.809_600_959_805_558, 11.111_111_111_111_109),
    ];
    let mut misses = Misses::default();
    for (count, rho, of_mean, of_slope, effective) in ROWS {
        let n = usize::from(count);
        let x: Vec<f64> = (0..count).map(|i| 3.0 + 0.25 * f64::from(i)).collect();
        let source = format!("n {n}, rho {rho}");
        misses.relative(&source, mean_inflation(n, rho).unwrap(), of_mean, 1e-12);
        misses.relative(&source, slope_inflation(&x, rho).unwrap(), of_slope, 1e-12);
        misses.relative(&source, effective_n(n, rho), effective, 1e-14);
    }
    // By hand, uneven x 0 1 5 (c -2 -1 3), rho 0.5: (14 + 2(0.5*2 - 0.5*3 - 0.25*6))/14 = 10/14
    let uneven = slope_inflation(&[0.0, 1.0, 5.0], 0.5).unwrap();
    misses.relative("by hand, uneven", uneven, 10.0 / 14.0, 1e-14);
    misses.none();
    assert_eq!(slope_inflation(&[2.0, 2.0], 0.5), None);
    assert_eq!(mean_inflation(0, 0.5), None);
}

#[test]
fn corrected_coefficient() {
    let mut misses = Misses::default();
    let mut near = |source: &str, rho: f64, n: usize, want: f64| {
        misses.relative(source, corrected_lag1(rho, n).unwrap(), want, 1e-14);
    };
    near("by hand, (20*0.4+2)/16", 0.4, 20, 0.625);
    near("by hand, (24*0.1+2)/20", 0.1, 24, 0.22);
    near("limit above", 0.99, 20, 0.999);
    near("limit below", -0.5, 20, 0.0);
    misses.none();
    assert_eq!(corrected_lag1(0.1, 4), None);
    assert_eq!(corrected_lag1(f64::NAN, 40), None);
}

#[test]
fn medians_and_the_robust_slope() {
    let mut misses = Misses::default();
    let mut near = |source: &str, got: Option<f64>, want: f64| {
        misses.absolute(source, got.unwrap_or(f64::NAN), want, 1e-12);
    };
    near("odd", median(vec![5.0, 1.0, 9.0]), 5.0);
    near(
        "no digits lost",
        mean(&vec![0.1; 1_000_000]).map(|mean| 1e4 * (mean - 0.1)),
        0.0,
    );
    near("even", median(vec![5.0, 1.0, 9.0, 6.0]), 5.5);
    // By hand: sorted x 1 2 3 4 5 6, pairs (1,4) (2,5) (3,6): slopes 2, (10-4)/3 = 2, (99-6)/3 = 31
    let x = [6.0, 2.0, 3.0, 4.0, 5.0, 1.0];
    let y = [99.0, 4.0, 6.0, 8.0, 10.0, 2.0];
    near("one wild point", incomplete_theil_slope(&x, &y), 2.0);
    // Odd count, by hand: pairs (0,3) (1,4) of x 0 1 2 3 4: slopes 3/3 and 9/3, their mean 2
    let (x, y) = ([0.0, 1.0, 2.0, 3.0, 4.0], [0.0, 1.0, 50.0, 3.0, 10.0]);
    near("odd count", incomplete_theil_slope(&x, &y), 2.0);
    // Pairs (1,1) and (1,3): the first has no slope
    let (x, y) = ([1.0, 1.0, 1.0, 3.0], [0.0, 2.0, 1.0, 5.0]);
    near("equal abscissae", incomplete_theil_slope(&x, &y), 2.0);
    misses.none();
    assert_eq!(incomplete_theil_slope(&[1.0, 1.0], &[2.0, 3.0]), None);
    assert_eq!(incomplete_theil_slope(&[1.0, 2.0], &[2.0]), None);
    assert_eq!(incomplete_theil_slope(&[1.0, f64::NAN], &[2.0, 3.0]), None);
    assert_eq!(median(vec![]), None);
    assert_eq!(median(vec![1.0, f64::NAN]), None);
    assert_eq!(mean(&[]), None);
    assert_eq!(standard_deviation(&[1.0]), None);
    assert_eq!(lag1(&[3.0, 3.0, 3.0]), None);
}

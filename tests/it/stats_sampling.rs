//! What plans and process figures are made of, against published values and oracles. "Own" marks what was computed
//! elsewhere (scipy, mpmath) for this test.

#![expect(
    clippy::items_after_statements,
    reason = "each table stands beside what is held against it"
)]

use coilassay::stats::{
    chi_square_quantile, chi_square_upper, clopper_pearson, cp_bounds, cpk_bounds, distance_bounds,
    mean, noncentral_cdf, noncentral_quantile, noncentrality, none_drawn, one_sided_factor,
    share_beyond, spread_factors, standard_deviation, two_sided_factor,
};

use crate::published::Misses;

/// ISO 16269-6 (from memory): breaking load of twelve yarns.
pub(crate) const YARN: [f64; 12] = [
    228.6, 232.7, 238.8, 317.2, 315.8, 275.1, 222.2, 236.7, 224.7, 251.2, 210.4, 270.7,
];

#[test]
fn noncentral_t() {
    #[rustfmt::skip]
    const ROWS: [(f64, f64, f64, f64); 14] = [ // t, ν, δ, share below: own, mpmath, 30 digits
        (1.0, 4.0, 0.0, 0.813_049_516_849_970_6),
        (9.397_6, 4.0, 3.678, 0.950_002_355_032_229_4),
        (-1.0, 5.0, 1.0, 0.030_807_353_260_750_21),
        (20.0, 29.0, 15.0, 0.961_150_930_778_726_8),
        (2.5, 2.0, 1.0, 0.781_613_476_272_160_3),
        (0.1, 1.0, 0.5, 0.337_432_509_982_814),
        (45.0, 299.0, 40.0, 0.991_630_730_226_069_1),
        (232.0, 9999.0, 230.0, 0.850_364_246_720_929_3),
        (90.0, 1199.0, 92.5, 0.114_514_443_267_131_2),
        (-3.0, 10.0, -1.5, 0.116_648_375_765_644_8),
        (0.0, 7.0, 1.2, 0.115_069_670_221_708_3),
        (6.0, 1.0, 2.0, 0.741_182_622_842_062_1),
        (11.5, 24.0, 8.7, 0.919_785_200_310_324_4),
        (1000.0, 3.0, 300.0, 0.965_567_315_237_998_8),
    ];
    let mut misses = Misses::default();
    for (t, nu, delta, share) in ROWS {
        let name = format!("t {t}, ν {nu}, δ {delta}");
        misses.absolute(&name, noncentral_cdf(t, nu, delta).unwrap(), share, 1e-10);
        if share > 1e-6 && share < 1.0 - 1e-6 {
            let quantile = noncentral_quantile(share, nu, delta).unwrap();
            misses.absolute(&name, quantile, t, 1e-8 * t.abs().max(1.0));
            misses.relative(
                &name,
                noncentrality(share, nu, t).unwrap() + 1e3,
                delta + 1e3,
                1e-9,
            );
        }
    }
    misses.none();
    for (t, nu, delta) in [
        (f64::NAN, 5.0, 1.0),
        (1.0, 0.5, 1.0),
        (1.0, 5.0, f64::INFINITY),
        (1.0, 1e6, 0.0),
    ] {
        assert!(noncentral_cdf(t, nu, delta).is_err());
    }
    for p in [0.0, 1.0, -0.1, f64::NAN] {
        assert!(noncentral_quantile(p, 5.0, 1.0).is_err());
    }
}

#[test]
fn chi_square() {
    let mut misses = Misses::default();
    // NIST e-Handbook 7.2.6.3: χ²(0.01; 42) = 23.650095
    misses.absolute(
        "χ²(.01; 42)",
        chi_square_quantile(0.01, 42.0).unwrap(),
        23.650_094_677_826_19,
        1e-9,
    );
    #[rustfmt::skip]
    const ROWS: [(f64, f64, f64); 6] = [ // ν, p, x: own, mpmath
        (1.0, 0.05, 0.003_932_140_000_019_52),
        (2.0, 0.975, 7.377_758_908_227_87),
        (9.0, 0.025, 2.700_389_499_980_36),
        (99.0, 0.99, 134.641_616_855_789),
        (1999.0, 0.05, 1_896.145_712_510_6),
        (9999.0, 0.975, 10_278.056_320_256_9),
    ];
    for (nu, p, x) in ROWS {
        misses.relative(
            &format!("ν {nu}, p {p}"),
            chi_square_quantile(p, nu).unwrap(),
            x,
            1e-9,
        );
        misses.absolute(
            &format!("ν {nu}, x {x}"),
            chi_square_upper(x, nu).unwrap(),
            1.0 - p,
            1e-9,
        );
    }
    misses.none();
}

#[test]
fn one_sided_tolerance_factors() {
    #[rustfmt::skip]
    const ROWS: [(u64, [f64; 5]); 11] = [ // own, scipy: (.90, .95) (.95, .90) (.95, .95) (.99, .95) (.99, .99), exact
        (3, [6.1553, 5.3115, 7.6559, 10.5527, 23.8956]), (4, [4.1619, 3.9566, 5.1439, 7.0424, 12.3873]),
        (5, [3.4066, 3.3998, 4.2027, 5.7411, 8.9390]), (6, [3.0063, 3.0919, 3.7077, 5.0620, 7.3346]),
        (8, [2.5819, 2.7543, 3.1873, 4.3539, 5.8118]), (10, [2.3546, 2.5684, 2.9110, 3.9811, 5.0737]),
        (12, [2.2101, 2.4483, 2.7363, 3.7471, 4.6330]), (20, [1.9260, 2.2078, 2.3960, 3.2952, 3.8316]),
        (30, [1.7773, 2.0798, 2.2198, 3.0639, 3.4465]), (50, [1.6456, 1.9653, 2.0650, 2.8624, 3.1246]),
        (100, [1.5267, 1.8613, 1.9265, 2.6840, 2.8496]),
    ];
    let shares = [
        (0.90, 0.95),
        (0.95, 0.90),
        (0.95, 0.95),
        (0.99, 0.95),
        (0.99, 0.99),
    ];
    let mut misses = Misses::default();
    for (n, factors) in ROWS {
        for ((p, confidence), want) in shares.into_iter().zip(factors) {
            let got = one_sided_factor(n, p, confidence).unwrap();
            misses.absolute(&format!("n {n}, {p}/{confidence}"), got, want, 5.1e-5);
        }
    }
    // NIST/SEMATECH e-Handbook 7.2.6.3, n 43, p .90, γ .99: exact 1.8740 in print (from memory), 1.8739536 own
    let got = one_sided_factor(43, 0.90, 0.99).unwrap();
    misses.absolute("handbook, n 43", got, 1.874_0, 5e-5);
    misses.absolute("handbook, n 43, own", got, 1.873_953_6, 5e-8);
    // ISO 16269-6, yarn (from memory): lower limit 154.75 for 95 % at 95 %
    let (centre, sd) = (mean(&YARN).unwrap(), standard_deviation(&YARN).unwrap());
    let k = one_sided_factor(12, 0.95, 0.95).unwrap();
    misses.absolute("yarn, lower limit", centre - k * sd, 154.75, 5e-3);
    misses.none();
    assert!(one_sided_factor(1, 0.95, 0.95).is_err());
    assert!(one_sided_factor(10, 1.0, 0.95).is_err());
}

#[test]
fn two_sided_tolerance_factors() {
    #[rustfmt::skip]
    const ROWS: [(u64, [f64; 3]); 12] = [ // own, scipy: (.90, .95) (.95, .95) (.99, .95), exact
        (3, [8.3059, 9.7888, 12.6471]), (4, [5.3681, 6.3411, 8.2207]), (5, [4.2906, 5.0769, 6.5980]),
        (6, [3.7326, 4.4222, 5.7577]), (8, [3.1560, 3.7455, 4.8892]), (10, [2.8563, 3.3934, 4.4369]),
        (12, [2.6703, 3.1747, 4.1555]), (20, [2.3188, 2.7603, 3.6210]), (30, [2.1451, 2.5549, 3.3546]),
        (40, [2.0553, 2.4484, 3.2159]), (50, [1.9990, 2.3816, 3.1288]), (100, [1.8748, 2.2339, 2.9355]),
    ];
    let mut misses = Misses::default();
    for (n, factors) in ROWS {
        for (p, want) in [0.90, 0.95, 0.99].into_iter().zip(factors) {
            let got = two_sided_factor(n, p, 0.95).unwrap();
            misses.absolute(&format!("n {n}, {p}"), got, want, 5.1e-5);
        }
    }
    // the example of NIST/SEMATECH e-Handbook 7.2.6.3, n 43, p .90, γ .99, exact: own
    misses.absolute(
        "handbook, n 43",
        two_sided_factor(43, 0.90, 0.99).unwrap(),
        2.222_825_2,
        5e-8,
    );
    misses.none();
}

#[test]
fn proportions() {
    let mut misses = Misses::default();
    #[rustfmt::skip]
    const ROWS: [(u64, u64, f64, f64); 7] = [ // hits, trials, 95 % bounds: own, scipy
        (0, 20, 0.0, 0.168_433_470_983_085),
        (1, 20, 0.001_265_089_497_949_8, 0.248_732_762_772_028),
        (2, 80, 0.003_042_086_164_809_6, 0.087_407_155_930_592_3),
        (10, 80, 0.061_602_096_558_434_2, 0.217_889_134_069_436),
        (20, 20, 0.831_566_529_016_915, 1.0),
        (3, 1250, 0.000_495_211_430_023_39, 0.006_997_654_497_259_49),
        (700, 20000, 0.032_495_777_515_490_1, 0.037_640_541_451_223_3),
    ];
    for (hits, trials, lower, upper) in ROWS {
        let (low, high) = clopper_pearson(hits, trials, 0.95).unwrap();
        misses.absolute(&format!("{hits} of {trials}, lower"), low, lower, 1e-11);
        misses.absolute(&format!("{hits} of {trials}, upper"), high, upper, 1e-11);
    }
    #[rustfmt::skip]
    const NONE: [(u64, u64, u64, f64); 5] = [ // all, marked, drawn, chance of none: own, scipy
        (100, 5, 37, 0.093_360_054_893_560_04), (50, 5, 18, 0.095_044_271_2), (500, 10, 102, 0.099_762_665_8),
        (1000, 10, 258, 0.049_795_803_3), (1200, 48, 56, 0.096_207_406_3),
    ];
    for (all, marked, drawn, chance) in NONE {
        misses.absolute(
            &format!("{all}, {marked}, {drawn}"),
            none_drawn(all, marked, drawn).unwrap(),
            chance,
            5.1e-11,
        );
    }
    misses.none();
    assert!(clopper_pearson(3, 2, 0.95).is_err() && clopper_pearson(0, 0, 0.95).is_err());
    assert!(none_drawn(5, 6, 1).is_err() && none_drawn(5, 3, 3).unwrap() <= 0.0);
}

#[test]
fn share_beyond_a_limit() {
    #[rustfmt::skip]
    const ROWS: [(u64, [f64; 6]); 4] = [ // own, scipy: percent at q = 0, 0.5, 1, 1.5, 2, 2.5
        (5, [50.0, 32.4404, 16.3638, 3.7988, 0.0, 0.0]), (10, [50.0, 31.3669, 15.9729, 5.8747, 1.1712, 0.0412]),
        (20, [50.0, 31.06, 15.8902, 6.3387, 1.8091, 0.3174]), (35, [50.0, 30.961, 15.8733, 6.4959, 2.0251, 0.4507]),
    ];
    let mut misses = Misses::default();
    for (n, shares) in ROWS {
        for (q, want) in [0.0, 0.5, 1.0, 1.5, 2.0, 2.5].into_iter().zip(shares) {
            misses.absolute(
                &format!("n {n}, q {q}"),
                100.0 * share_beyond(n, q).unwrap(),
                want,
                5.1e-5,
            );
        }
    }
    // closed forms: n 3 is ½ − asin(q√3/2)/π, n 4 is ½ − q/3
    let q = 0.7_f64;
    let three = 0.5 - (q * 3.0_f64.sqrt() / 2.0).asin() / std::f64::consts::PI;
    misses.absolute("n 3", share_beyond(3, q).unwrap(), three, 1e-13);
    misses.absolute("n 4", share_beyond(4, q).unwrap(), 0.5 - q / 3.0, 1e-13);
    // MIL-STD-414 example B-1 (from memory): 197 188 184 205 201 under 209 and over 180; own with s to nine digits
    let values = [197.0, 188.0, 184.0, 205.0, 201.0];
    let (centre, sd) = (mean(&values).unwrap(), standard_deviation(&values).unwrap());
    let above = 100.0 * share_beyond(5, (209.0 - centre) / sd).unwrap();
    let below = 100.0 * share_beyond(5, (centre - 180.0) / sd).unwrap();
    misses.absolute("example B-1, Q", (209.0 - centre) / sd, 1.59, 5e-3);
    misses.absolute("example B-1, above", above, 2.19, 1e-2);
    misses.absolute("example B-1, above, own", above, 2.182_311_749_597, 1e-8);
    misses.absolute("example B-1, below, own", below, 0.616_896_787_942, 1e-8);
    misses.none();
    assert!(share_beyond(2, 1.0).is_err() && share_beyond(5, f64::NAN).is_err());
}

#[test]
fn capability() {
    let mut misses = Misses::default();
    // Montgomery, Introduction to Statistical Quality Control (from memory): USL 62, LSL 38, s 1.75, n 20: 1.57 … 3.01
    let found = 24.0 / (6.0 * 1.75);
    let (low, high) = cp_bounds(found, 20, 0.95).unwrap();
    misses.absolute("Montgomery, lower", low, 1.57, 6e-3);
    misses.absolute("Montgomery, upper", high, 3.01, 6e-3);
    #[rustfmt::skip]
    const ROWS: [(u64, f64, f64, f64, f64, f64); 5] = [ // n; Cp 1.33; Cpk 1.33; one limit, lower 95 % one-sided: own, scipy
        (10, 0.728_524, 1.933_603, 0.681_778, 1.978_222, 0.777_314), (20, 0.910_602, 1.748_872, 0.882_606, 1.777_394, 0.948_685),
        (30, 0.989_351, 1.670_001, 0.967_529, 1.692_471, 1.021_557), (50, 1.067_301, 1.592_177, 1.050_939, 1.609_061, 1.093_070),
        (100, 1.144_898, 1.514_795, 1.133_564, 1.526_436, 1.163_692),
    ];
    for (n, cp_low, cp_high, cpk_low, cpk_high, one) in ROWS {
        let (low, high) = cp_bounds(1.33, n, 0.95).unwrap();
        misses.absolute(&format!("Cp, n {n}"), low, cp_low, 6e-7);
        misses.absolute(&format!("Cp, n {n}"), high, cp_high, 6e-7);
        let (low, high) = cpk_bounds(1.33, n, 0.95).unwrap();
        misses.absolute(&format!("Cpk, n {n}"), low, cpk_low, 6e-7);
        misses.absolute(&format!("Cpk, n {n}"), high, cpk_high, 6e-7);
        let bound = distance_bounds(3.0 * 1.33, n, 0.05).unwrap().0 / 3.0;
        misses.absolute(&format!("one limit, n {n}"), bound, one, 6e-7);
    }
    let (least, most) = spread_factors(20, 0.95).unwrap();
    misses.absolute(
        "σ, n 20",
        (1.75 * least) / 1.75,
        1.748_872_f64.recip() * 1.33,
        1e-5,
    );
    misses.absolute("σ, n 20", most, 1.33 / 0.910_602, 2e-6);
    misses.none();
}

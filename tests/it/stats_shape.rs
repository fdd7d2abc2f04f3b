//! Anderson–Darling and Grubbs against published values. "Own" marks what was computed elsewhere (scipy) for this test.

use coilassay::stats::{
    anderson_darling, grubbs_critical, grubbs_outlier, mean, normal_quantile, standard_deviation,
};

use crate::published::{Misses, column};
use crate::stats_sampling::YARN;

#[test]
fn anderson_darling_test() {
    let mut misses = Misses::default();
    let mut check = |name: &str, values: &[f64], statistic: f64, corrected: f64, p: f64| {
        let got = anderson_darling(values).unwrap().unwrap();
        misses.relative(name, got.statistic, statistic, 1e-9);
        misses.relative(name, got.corrected, corrected, 1e-7);
        misses.relative(name, got.p, p, 2.1e-5); // five digits are printed
    };
    // yarn of ISO 16269-6 and NIST StRD Mavro: own, scipy
    check(
        "yarn",
        &YARN,
        0.661_038_058_55,
        0.712_681_656_87,
        0.062_941_3,
    );
    check(
        "Mavro",
        &column("Mavro.csv", 0),
        1.668_465_484_66,
        1.694_994_08,
        2.412_7e-4,
    );
    misses.none();
    assert!(anderson_darling(&YARN[..7]).unwrap().is_none());
    assert!(anderson_darling(&[1.0; 20]).unwrap().is_none());
    // one value so far off that the normal tail there is 0: still a finite answer
    let mut far: Vec<f64> = (0..4000).map(|n| f64::from(n % 7)).collect();
    far.push(1e6);
    let got = anderson_darling(&far).unwrap().unwrap();
    assert!(got.statistic.is_finite() && got.p < 1e-10, "{got:?}");
}

/// D'Agostino and Stephens (1986), from memory: corrected A² at 10, 5, 2.5 and 1 %, met by the p values.
#[test]
fn p_at_the_tabled_points() {
    // A sample of normal scores has a known small A²; stretched tails raise it through the tabled points.
    let mut last = f64::INFINITY;
    for stretch in [0.0, 0.05, 0.1, 0.2, 0.3] {
        let values: Vec<f64> = (0..50)
            .map(|n| (f64::from(n) + 0.5) / 50.0)
            .map(|p| normal_quantile(p).unwrap())
            .map(|z| z + stretch * z.powi(3))
            .collect();
        let got = anderson_darling(&values).unwrap().unwrap();
        assert!(got.p < last, "p falls as A² rises: {got:?}");
        last = got.p;
        for (critical, level) in [(0.631, 0.10), (0.752, 0.05), (0.873, 0.025), (1.035, 0.01)] {
            assert_eq!(got.corrected > critical, got.p < level, "{got:?}");
        }
    }
}

#[test]
fn grubbs() {
    #[rustfmt::skip]
    const ROWS: [(usize, [f64; 4]); 9] = [ // own, scipy: one-sided 5 %, 2.5 %, 1 %, 0.5 %
        (3, [1.1531, 1.1543, 1.1546, 1.1547]), (4, [1.4625, 1.4813, 1.4925, 1.4962]), (5, [1.6714, 1.7150, 1.7489, 1.7637]),
        (8, [2.0317, 2.1266, 2.2208, 2.2744]), (10, [2.1761, 2.2900, 2.4097, 2.4821]), (15, [2.4090, 2.5483, 2.7049, 2.8061]),
        (20, [2.5566, 2.7082, 2.8838, 3.0008]), (50, [2.9570, 3.1282, 3.3366, 3.4825]), (100, [3.2095, 3.3841, 3.6002, 3.7540]),
    ];
    let mut misses = Misses::default();
    for (n, criticals) in ROWS {
        for (alpha, want) in [0.05, 0.025, 0.01, 0.005].into_iter().zip(criticals) {
            misses.absolute(
                &format!("n {n}, {alpha}"),
                grubbs_critical(n, alpha).unwrap(),
                want,
                5.1e-5,
            );
        }
    }
    // NIST/SEMATECH e-Handbook 1.3.5.17.1: G 2.46876, critical 2.03165 at 5 % one-sided
    let values = [
        199.31, 199.53, 200.19, 200.82, 201.92, 201.95, 202.18, 245.57,
    ];
    let g = (245.57 - mean(&values).unwrap()) / standard_deviation(&values).unwrap();
    misses.absolute("handbook, G", g, 2.468_76, 5.1e-6);
    misses.absolute(
        "handbook, critical",
        grubbs_critical(8, 0.05).unwrap(),
        2.031_65,
        5.1e-6,
    );
    misses.none();
    assert_eq!(grubbs_outlier(&values, 0.05).unwrap(), Some(7));
    assert_eq!(grubbs_outlier(&values[..7], 0.05).unwrap(), None);
    assert_eq!(grubbs_outlier(&[1.0; 9], 0.05).unwrap(), None);
}

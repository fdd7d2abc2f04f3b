//! Roots and integrals of smooth functions, to about 1e-13.
//! Elsewhere: which function (`noncentral`, `tolerance`, `proportion`).

use super::StatsError;

/// Nodes above zero and weights of the 16-point Gauss–Legendre rule on −1 … 1; own, mpmath, 30 digits.
#[rustfmt::skip]
const NODES: [(f64, f64); 8] = [
    (0.095_012_509_837_637_44, 0.189_450_610_455_068_5),
    (0.281_603_550_779_258_9, 0.182_603_415_044_923_6),
    (0.458_016_777_657_227_4, 0.169_156_519_395_002_5),
    (0.617_876_244_402_643_8, 0.149_595_988_816_576_73),
    (0.755_404_408_355_003, 0.124_628_971_255_533_87),
    (0.865_631_202_387_831_8, 0.095_158_511_682_492_78),
    (0.944_575_023_073_232_6, 0.062_253_523_938_647_89),
    (0.989_400_934_991_649_9, 0.027_152_459_411_754_095),
];
/// Steps of a root search: every third halves the stretch where the secant did not, so 400 exhaust any stretch asked for.
const STEPS: u32 = 400;
/// Width of the last stretch, as a share of the root.
const CLOSE: f64 = 1e-14;

/// Nodes and weights of a rule of `panels` stretches of 16 points over `from` … `to`.
pub(super) fn rule(from: f64, to: f64, panels: u32) -> Vec<(f64, f64)> {
    let half = (to - from) / f64::from(panels) / 2.0;
    let middles = (0..panels).map(|panel| from + half * f64::from(2 * panel + 1));
    middles
        .flat_map(|middle| {
            NODES.into_iter().flat_map(move |(node, weight)| {
                [-1.0, 1.0].map(|side| (middle + side * half * node, half * weight))
            })
        })
        .collect()
}

/// The integral of `f` over `from` … `to`.
pub(super) fn integral(from: f64, to: f64, panels: u32, f: impl Fn(f64) -> f64) -> f64 {
    let rule = rule(from, to, panels);
    rule.into_iter().map(|(x, weight)| weight * f(x)).sum()
}

/// Where the monotone `f` crosses zero between `low` and `high`, by the false position that halves a lagging end
/// (Illinois) with a halving of the stretch where it stalls.
///
/// # Errors
/// [`StatsError::NoRoot`] where both ends lie on one side; what `f` refuses.
pub(super) fn root(
    low: f64,
    high: f64,
    mut f: impl FnMut(f64) -> Result<f64, StatsError>,
) -> Result<f64, StatsError> {
    let (mut a, mut b) = (low, high);
    let (mut at_a, mut at_b) = (f(a)?, f(b)?);
    if at_a == 0.0 {
        return Ok(a);
    }
    if at_b == 0.0 {
        return Ok(b);
    }
    if at_a.is_nan() || at_b.is_nan() || at_a.signum() == at_b.signum() {
        return Err(StatsError::NoRoot { low, high });
    }
    let mut width = (b - a).abs();
    for step in 0..STEPS {
        let middle = a.midpoint(b);
        let secant = (a * at_b - b * at_a) / (at_b - at_a);
        let stalled = step % 3 == 2 && (b - a).abs() > width / 2.0;
        if step % 3 == 2 {
            width = (b - a).abs();
        }
        let inside = secant > a.min(b) && secant < a.max(b);
        let x = if stalled || !inside { middle } else { secant };
        let at_x = f(x)?;
        if at_x == 0.0 || (b - a).abs() <= CLOSE * x.abs() {
            return Ok(x);
        }
        if at_x.signum() == at_b.signum() {
            (b, at_b) = (x, at_x);
            at_a /= 2.0;
        } else {
            (a, at_a) = (b, at_b);
            (b, at_b) = (x, at_x);
        }
    }
    Ok(a.midpoint(b))
}

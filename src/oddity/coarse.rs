//! The step that readings come in.

/// A step beyond this many times the stated one is coarser than stated: a display that rounds to 2 or 5 is.
const COARSER: f64 = 1.5;
/// Where the resolution is declared negligible: a step beyond this share of the range is not.
const NEGLIGIBLE: f64 = 1e-3;
/// Relative size of rounding in a difference of two readings, far above that of `f64`, far below any display's step.
const ROUNDING: f64 = 1e-10;
/// Differences that must agree on a step before it is believed.
const ENOUGH: usize = 10;

/// The largest step of which all differences between neighbours in `values` are multiples, if it is larger than
/// `least`; in the unit of the values. `None` where there is none, or too few differences to tell.
pub fn step_of(values: &[f64], least: f64) -> Option<f64> {
    let size = values.iter().fold(0.0_f64, |most, one| most.max(one.abs()));
    let zero = (ROUNDING * size).max(f64::MIN_POSITIVE);
    let mut step = 0.0;
    let mut counted = 0;
    for pair in values.windows(2) {
        let [a, b] = pair else { continue };
        let difference = (b - a).abs();
        if difference <= zero {
            continue;
        }
        counted += 1;
        step = common(step, difference, zero);
        if step <= least {
            return None;
        }
    }
    (counted >= ENOUGH && step > least).then_some(step)
}

/// The greatest common divisor of two lengths, by Euclid, to within `zero`.
fn common(mut a: f64, mut b: f64, zero: f64) -> f64 {
    // Every quotient multiplies the rounding it was made from, so what counts as nothing grows with it.
    let mut nothing = zero;
    while b > nothing {
        let quotient = (a / b).round();
        nothing = zero.max(nothing * quotient.max(1.0));
        (a, b) = (b, (a - b * quotient).abs());
    }
    a
}

/// The step of `values` where it is coarser than `stated` (0: declared negligible).
pub fn coarser(values: &[f64], stated: f64) -> Option<f64> {
    let least = if stated > 0.0 {
        COARSER * stated
    } else {
        let low = values.iter().copied().fold(f64::INFINITY, f64::min);
        let high = values.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        NEGLIGIBLE * (high - low)
    };
    step_of(values, least)
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;

    #[test]
    fn the_step_of_a_display_is_found_in_any_unit() {
        for (step, unit) in [
            (0.1, 1.0),
            (0.5, 9.806_65),
            (0.02, 4.448_221_615),
            (5.0, 1000.0),
        ] {
            let values: Vec<f64> = (0..200)
                .map(|n| f64::from(n * n % 977 + 3 * n))
                .map(|whole| (whole * step * 1e4).round() / 1e4 * unit + 0.0)
                .collect();
            let found = step_of(&values, 0.0).unwrap();
            assert!(
                (found / (step * unit) - 1.0).abs() < 1e-4,
                "{step} {unit}: {found}"
            );
            assert!(coarser(&values, step * unit).is_none());
            assert!(coarser(&values, step * unit / 2.0).is_some());
        }
    }

    #[test]
    fn readings_without_a_step_have_none() {
        let values: Vec<f64> = (0..200)
            .map(|n| (f64::from(n) * 0.731).sin() * 300.0)
            .collect();
        assert_eq!(coarser(&values, 0.01), None);
        assert_eq!(coarser(&[1.0; 50], 0.01), None, "a level");
    }
}

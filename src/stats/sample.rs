//! Figures of one sample: mean, standard deviation, median; in the unit of the values.
//! Elsewhere: what the values are and how many digits to print (`characteristic`, `report`).

/// Arithmetic mean; `None` without values or where it is not a finite number.
///
/// Two passes: the second adds the mean of what the first left, so that many values lose no digits.
pub fn mean(values: &[f64]) -> Option<f64> {
    if values.is_empty() {
        return None;
    }
    let n = values.len() as f64;
    let first = values.iter().sum::<f64>() / n;
    let rest = values.iter().map(|value| value - first).sum::<f64>() / n;
    Some(first + rest).filter(|mean| mean.is_finite())
}

/// Standard deviation with n − 1; `None` for fewer than two values or where it is not a finite number.
///
/// Two passes about the mean: the sum of squares less n times the squared mean would cancel.
pub fn standard_deviation(values: &[f64]) -> Option<f64> {
    if values.len() < 2 {
        return None;
    }
    let centre = mean(values)?;
    let squares: f64 = values.iter().map(|value| (value - centre).powi(2)).sum();
    Some((squares / (values.len() - 1) as f64).sqrt()).filter(|sd| sd.is_finite())
}

/// Median, for an even count the mean of the middle two; `None` without values or if any is not finite.
///
/// Takes its own copy and selects in O(n); the order of the values does not matter.
pub fn median(mut values: Vec<f64>) -> Option<f64> {
    if !values.iter().all(|value| value.is_finite()) {
        return None;
    }
    let middle = values.len() / 2;
    let even = values.len().is_multiple_of(2);
    if values.is_empty() {
        return None;
    }
    let (below, &mut upper, _) = values.select_nth_unstable_by(middle, f64::total_cmp);
    if !even {
        return Some(upper);
    }
    let lower = below.iter().copied().max_by(f64::total_cmp)?;
    Some(lower.midpoint(upper))
}

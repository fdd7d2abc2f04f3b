//! Constants of control charts for normal values.

/// From here on the series in 1/(n − 1) is used; its next term is below 1e-13.
const SERIES_FROM: u64 = 1000;

/// c4: the expected standard deviation of `n` normal values over the true one; `None` below two.
///
/// Source: √(2/(n−1))·Γ(n/2)/Γ((n−1)/2), the quotient of the two by its recursion g(n+1)·g(n) = (n−1)/2; above 1000
/// its series in 1/(n−1).
pub fn c4(n: u64) -> Option<f64> {
    if n < 2 {
        return None;
    }
    let nu = (n - 1) as f64;
    if n > SERIES_FROM {
        return Some(1.0 - 1.0 / (4.0 * nu) + 1.0 / (32.0 * nu * nu) + 5.0 / (128.0 * nu.powi(3)));
    }
    let mut quotient = std::f64::consts::PI.sqrt().recip(); // Γ(1)/Γ(½)
    for lower in 2..n {
        quotient = (lower - 1) as f64 / 2.0 / quotient;
    }
    Some((2.0 / nu).sqrt() * quotient)
}

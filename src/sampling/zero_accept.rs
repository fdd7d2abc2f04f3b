//! Plans that accept on zero, by the exact hypergeometric distribution.

use super::PlanError;
use crate::stats::none_drawn;

/// A zero-accept plan.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ZeroAccept {
    /// Springs to measure; none may fail.
    pub sample_size: u64,
    /// Nonconforming springs in a lot of the limiting quality: ⌈N·LQ⌉, at least 1.
    pub nonconforming: u64,
    /// Chance that such a lot is accepted.
    pub accepted: f64,
}

/// The smallest sample that lets a lot of `lot_size` springs of the limiting quality (a share) through with at most the
/// `consumer_risk`.
///
/// # Errors
/// [`PlanError::LotTooSmall`] under 2 springs, [`PlanError::NoShare`] for shares outside 0…1.
pub fn zero_accept(
    lot_size: u64,
    limiting_quality: f64,
    consumer_risk: f64,
) -> Result<ZeroAccept, PlanError> {
    checked_share("limiting quality", limiting_quality)?;
    checked_share("consumer's risk", consumer_risk)?;
    if lot_size < 2 {
        let (found, least) = (lot_size, 2);
        return Err(PlanError::LotTooSmall { found, least });
    }
    let nonconforming = nonconforming(lot_size, limiting_quality);
    let (mut low, mut high) = (0, lot_size); // all of them find every one
    while high - low > 1 {
        let middle = low.midpoint(high);
        if none_drawn(lot_size, nonconforming, middle)? <= consumer_risk {
            high = middle;
        } else {
            low = middle;
        }
    }
    Ok(ZeroAccept {
        sample_size: high,
        nonconforming,
        accepted: none_drawn(lot_size, nonconforming, high)?,
    })
}

/// Nonconforming springs in a lot at the share `p`: ⌈N·p⌉, at least 1; a product such as 100 × 0.07 = 7.000000000000001
/// is 7.
#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "between 1 and the lot size"
)]
pub(super) fn nonconforming(lot_size: u64, p: f64) -> u64 {
    let product = lot_size as f64 * p;
    ((product - 1e-9 * product.max(1.0)).ceil().max(1.0) as u64).min(lot_size)
}

/// A share strictly between 0 and 1.
pub(super) fn checked_share(what: &'static str, share: f64) -> Result<(), PlanError> {
    if share > 0.0 && share < 1.0 {
        return Ok(());
    }
    Err(PlanError::NoShare {
        what,
        found: 100.0 * share,
    })
}

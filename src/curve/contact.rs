//! Where a stroke touches the spring: the travel at zero load, contact load put back.

use super::path::Path;

/// The local slope is the secant from the contact load to this many times of it.
const BEYOND: f64 = 3.0;

/// Where a stroke meets the spring.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Contact {
    /// Travel at which the load vanishes, mm: the travel at the contact load, less contact load over local slope.
    pub u: f64,
    /// Local slope, N/mm.
    pub slope: f64,
    /// Standard uncertainty of `u` from the scatter of single loads, mm.
    pub scatter: f64,
}

/// Finds contact on `path`: with u₁ and u₃ the travels at which the load first reaches the contact load `contact` (N) and
/// three times of it, the local slope is 2·F_c/(u₃ − u₁) and the load vanishes at u₁ − (u₃ − u₁)/2. `None` where the
/// stroke does not start below the contact load (contact was not recorded) or does not go on to three times of it.
pub(super) fn find(path: &Path, contact: f64) -> Option<Contact> {
    let first = path.reached(contact)?;
    let third = path.reached(BEYOND * contact)?;
    let apart = third - first;
    let slope = (BEYOND - 1.0) * contact / apart;
    if !(slope > 0.0 && slope.is_finite()) {
        return None;
    }
    let back = apart / (BEYOND - 1.0);
    // u = 1.5 u₁ − 0.5 u₃, each read off with the scatter of one load over the slope.
    let scatter = path.scatter()? / slope * 1.5_f64.hypot(0.5);
    Some(Contact {
        u: first - back,
        slope,
        scatter,
    })
}

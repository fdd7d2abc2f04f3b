//! Where a stroke touches the spring: the travel at zero load, contact load put back.

use super::path::Path;

/// The local line goes from the contact load to this many times of it.
const BEYOND: f64 = 3.0;
/// The local line has at least so many points.
const LEAST: usize = 3;

/// Where a stroke meets the spring.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Contact {
    /// Travel at which the load vanishes, mm: the line through the first loads on the spring, taken back to zero.
    pub u: f64,
    /// Slope of the line, N/mm.
    pub slope: f64,
    /// Standard uncertainty of `u` from the scatter of single loads, mm.
    pub scatter: f64,
    /// How far the line is taken back from the mean of its points, mm.
    pub back: f64,
}

impl Contact {
    /// Standard uncertainty from what is not seen, mm: the ends seat there, so that the spring touches earlier than the
    /// line says, by up to a quarter of the way back; one-sided and not corrected, so its root mean square about 0.
    pub fn seating(&self) -> f64 {
        self.back / 4.0 / 3.0_f64.sqrt()
    }
}

/// Finds contact on `path`: the line through the nodes after the last one below the contact load `contact` (N), up to
/// three times of it and at least three, taken back to zero load. No node in the air is in it, for between air and
/// spring lies a kink that nothing may be interpolated across. `None` where the stroke does not start below the contact
/// load (contact was not recorded) or does not go on to three times of it.
pub(super) fn find(path: &Path, contact: f64) -> Option<Contact> {
    let risen = path
        .nodes
        .iter()
        .position(|node| node.load >= BEYOND * contact)?;
    let air = path.nodes.get(..risen)?;
    let last = air.iter().rposition(|node| node.load < contact)?;
    let after = path.nodes.get(last + 1..)?;
    let low = after
        .iter()
        .take_while(|node| node.load <= BEYOND * contact);
    let near = after.iter().take(low.count().max(LEAST));
    let (travel, load): (Vec<f64>, Vec<f64>) = near.map(|node| (node.u, node.load)).unzip();
    if travel.len() < LEAST {
        return None;
    }
    let count = travel.len() as f64;
    let mean = |values: &[f64]| values.iter().sum::<f64>() / count;
    let (mean_u, mean_load) = (mean(&travel), mean(&load));
    let squares = travel.iter().map(|u| (u - mean_u).powi(2)).sum::<f64>();
    let products = travel.iter().zip(&load);
    let products = products.map(|(u, f)| (u - mean_u) * (f - mean_load));
    let slope = products.sum::<f64>() / squares;
    if !(slope > 0.0 && slope.is_finite()) {
        return None;
    }
    let back = mean_load / slope;
    Some(Contact {
        u: mean_u - back,
        slope,
        scatter: path.scatter()? / slope * (1.0 / count + back * back / squares).sqrt(),
        back,
    })
}

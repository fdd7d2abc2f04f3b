//! Where a stroke touches the spring: the travel at zero load, contact load put back.

use super::path::{Node, Path};

/// Where a stroke meets the spring.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Contact {
    /// Travel at which the load vanishes: the local line through the first loads, taken back to zero. mm.
    pub u: f64,
    /// Slope of the local line, N/mm.
    pub slope: f64,
    /// Standard uncertainty of `u` from the scatter about the local line, mm.
    pub scatter: f64,
}

/// Finds contact on `path`: a straight line through the nodes from the contact load `contact` (N) to three
/// times of it (at least three nodes), taken back to zero load. `None` where the stroke does not start below the contact
/// load: then contact was not recorded.
pub(super) fn find(path: &Path, contact: f64) -> Option<Contact> {
    let start = path.crossing(contact)?;
    let after: Vec<&Node> = path.nodes.iter().filter(|node| node.u >= start).collect();
    let low = after
        .iter()
        .take_while(|node| node.load <= 3.0 * contact)
        .count()
        .max(3);
    let near = after.get(..low.min(after.len()))?;
    let count = near.len() as f64;
    if near.len() < 2 {
        return None;
    }
    let mean_u = near.iter().map(|node| node.u).sum::<f64>() / count;
    let mean_load = near.iter().map(|node| node.load).sum::<f64>() / count;
    let sxx = near
        .iter()
        .map(|node| (node.u - mean_u).powi(2))
        .sum::<f64>();
    let sxy = near
        .iter()
        .map(|node| (node.u - mean_u) * (node.load - mean_load))
        .sum::<f64>();
    let slope = sxy / sxx;
    if !(slope > 0.0 && slope.is_finite()) {
        return None;
    }
    let u = mean_u - mean_load / slope;
    let sse = near
        .iter()
        .map(|node| (node.load - mean_load - slope * (node.u - mean_u)).powi(2))
        .sum::<f64>();
    let sd = if near.len() > 2 {
        (sse / (count - 2.0)).sqrt()
    } else {
        0.0
    };
    Some(Contact {
        u,
        slope,
        scatter: sd / slope * (1.0 / count + (u - mean_u).powi(2) / sxx).sqrt(),
    })
}

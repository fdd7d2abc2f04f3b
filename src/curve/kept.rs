//! A curve as an archive keeps it: the points of the rate's window whole, the rest thinned.

use crate::drawing::Way;

use super::path::{Node, Path};
use super::reduced::{MOST_POINTS, thin};

/// One point of a kept curve, after correction.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct KeptPoint {
    /// The stroke it belongs to.
    pub stroke: Way,
    /// Whether the rate was fitted through it.
    pub in_window: bool,
    /// Travel, mm, growing with compression; its origin is the rig's.
    pub u: f64,
    /// Load, N.
    pub load: f64,
}

/// One measurement of one spring: judged stroke and the last one of the other way, each in growing compression.
#[derive(Clone, Debug, PartialEq)]
pub struct Kept {
    /// The spring's id.
    pub id: String,
    /// The export, as written.
    pub export: String,
    /// Length of the spring where `u` is 0, mm; `None` without absolute length.
    pub origin: Option<f64>,
    /// The points.
    pub points: Vec<KeptPoint>,
}

/// The points of `judged`, those within `window` (mm of `u`, ends included) whole, and of `other`.
pub fn kept_points(
    judged: Option<&Path>,
    other: Option<&Path>,
    window: Option<(f64, f64)>,
) -> Vec<KeptPoint> {
    let mut points = Vec::new();
    if let Some(path) = judged {
        let (from, to) = window.unwrap_or((f64::INFINITY, f64::INFINITY));
        let before: Vec<Node> = path
            .nodes
            .iter()
            .filter(|one| one.u < from)
            .copied()
            .collect();
        let after: Vec<Node> = path
            .nodes
            .iter()
            .filter(|one| one.u > to)
            .copied()
            .collect();
        points.extend(thinned(path.side, &before));
        points.extend(path.between(from, to).into_iter().map(|node| KeptPoint {
            stroke: path.side,
            in_window: true,
            u: node.u,
            load: node.load,
        }));
        points.extend(thinned(path.side, &after));
    }
    if let Some(path) = other {
        points.extend(thinned(path.side, &path.nodes));
    }
    points
}

fn thinned(stroke: Way, nodes: &[Node]) -> impl Iterator<Item = KeptPoint> + use<> {
    let plain: Vec<(f64, f64)> = nodes.iter().map(|node| (node.u, node.load)).collect();
    thin(&plain, MOST_POINTS)
        .into_iter()
        .map(move |(u, load)| KeptPoint {
            stroke,
            in_window: false,
            u,
            load,
        })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn path(side: Way, count: u32) -> Path {
        let node = |n: u32| Node {
            u: f64::from(n),
            load: 2.0 * f64::from(n),
            first_line: 1,
            last_line: 1,
        };
        Path {
            nodes: (0..count).map(node).collect(),
            side,
            contact: None,
            start: 0.0,
            rate: None,
            odd: Vec::new(),
            gaps: Vec::new(),
            steps: Vec::new(),
            zero_shifted: false,
        }
    }

    #[test]
    fn the_window_stays_whole_and_the_rest_is_thinned() {
        let judged = path(Way::Loading, 5000);
        let other = path(Way::Unloading, 5000);
        let points = kept_points(Some(&judged), Some(&other), Some((1000.0, 3500.0)));
        let inside: Vec<f64> = points
            .iter()
            .filter(|one| one.in_window)
            .map(|one| one.u)
            .collect();
        assert_eq!(inside.len(), 2501);
        assert!(inside.first() == Some(&1000.0) && inside.last() == Some(&3500.0));
        assert!(points.len() <= 2501 + 3 * MOST_POINTS);
        let loading = points.iter().filter(|one| one.stroke == Way::Loading);
        assert!(loading.map(|one| one.u).is_sorted());
    }

    #[test]
    fn without_a_window_nothing_is_marked() {
        let judged = path(Way::Loading, 10);
        let points = kept_points(Some(&judged), None, None);
        assert!(points.len() == 10 && points.iter().all(|one| !one.in_window));
    }
}

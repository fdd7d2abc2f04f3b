//! The rise to solid at the end of a loading stroke.

use super::path::Path;

/// The tangent rate beyond which the coils are taken to lie on each other, over the rate of the stroke.
const STEEP: f64 = 5.0;
/// The travel over which a tangent is taken, as a share of the stroke.
const TANGENT: f64 = 1.0 / 200.0;

/// Nodes a rise is made of at least: one reading is no rise.
const LEAST: usize = 3;
/// The travel over which the load must have risen, as a share of the stroke, and the least rise over it, as a share of
/// what the stroke's rate would give.
const STILL: (f64, f64) = (0.03, 0.05);
/// Loads below this share of the largest may belong to the ends' seating.
const SEATED: f64 = 0.2;

/// Where the rise to solid begins.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rise {
    /// Travel, mm.
    pub u: f64,
    /// Load there, N.
    pub load: f64,
    /// Travel over which the tangent was taken, mm.
    pub tangent_over: f64,
}

/// A first idea of the stroke's rate, N/mm: the median of the tangents over equal pieces of travel after contact.
pub(super) fn plain_rate(path: &Path, contact_u: f64) -> Option<f64> {
    let (_, end) = path.reach()?;
    let step = (end - contact_u) / 20.0;
    if step <= 0.0 {
        return None;
    }
    let mut slopes = Vec::new();
    let mut ahead = path.nodes.iter().filter(|node| node.u >= contact_u);
    let mut last = *ahead.next()?;
    for node in ahead {
        if node.u - last.u >= step {
            slopes.push((node.load - last.load) / (node.u - last.u));
            last = *node;
        }
    }
    crate::stats::median(slopes)
}

/// The rise at the end of `path`, whose rate is about `rate` (N/mm); `None` where it was not reached.
pub(super) fn rise(path: &Path, contact_u: f64, rate: f64) -> Option<Rise> {
    let (_, end) = path.reach()?;
    let over = TANGENT * (end - contact_u);
    let nodes = &path.nodes;
    let mut begin = None;
    let mut ahead = nodes.len().checked_sub(1)?;
    for place in (0..nodes.len().saturating_sub(1)).rev() {
        let here = nodes.get(place)?;
        while ahead > place + 1 && nodes.get(ahead - 1)?.u - here.u >= over {
            ahead -= 1;
        }
        let there = nodes.get(ahead)?;
        if there.load - here.load <= STEEP * rate * (there.u - here.u).max(over) {
            // Too near the end of the stroke to tell: a tangent needs its length of travel.
            if begin.is_none() && there.u - here.u < over {
                continue;
            }
            break;
        }
        if nodes.len() - place < LEAST {
            continue;
        }
        begin = Some(Rise {
            u: f64::midpoint(here.u, there.u), // the bend lies somewhere on this tangent
            load: f64::midpoint(here.load, there.load),
            tangent_over: (there.u - here.u).max(over),
        });
    }
    begin
}

/// A stretch of a loading stroke in which the load stands still while the platen goes on: a load cell at its end, or a
/// spring that gives way.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Standstill {
    pub(super) load: f64,
    pub(super) travel: f64,
    pub(super) lines: (u64, u64),
}

/// The first standstill of `path` from `start` on; `rate` is the stroke's own, N/mm.
pub(super) fn standstill(path: &Path, start: f64, rate: f64) -> Option<Standstill> {
    let (_, end) = path.reach()?;
    let largest = path.nodes.iter().map(|node| node.load).fold(0.0, f64::max);
    let over = STILL.0 * (end - start);
    let mut ahead = 0;
    for (place, here) in path.nodes.iter().enumerate() {
        if here.u < start || here.load < SEATED * largest {
            continue;
        }
        ahead = ahead.max(place);
        while path
            .nodes
            .get(ahead)
            .is_some_and(|there| there.u - here.u < over)
        {
            ahead += 1;
        }
        let there = path.nodes.get(ahead)?;
        if there.load - here.load < STILL.1 * rate * (there.u - here.u) && ahead - place >= LEAST {
            return Some(Standstill {
                load: here.load,
                travel: there.u - here.u,
                lines: (here.first_line, there.last_line),
            });
        }
    }
    None
}

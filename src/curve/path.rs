//! A stroke as a path of nodes in growing compression, dwell points averaged.

use std::ops::Range;

use crate::drawing::Way;

use crate::export::RawCurve;
use crate::oddity::Odd;

use super::contact::{self, Contact};
use super::inspect::{Stretch, rows};
use super::screen::OddRows;
use super::solid::{self, Rise};

/// Nodes averaged on either side when a crossing is looked for.
const SMOOTH: usize = 2;
/// The load of one dwell changes by less than this share of the largest (a spring held still relaxes by a per cent);
/// beyond it the travel is stuck. Three rows at least.
const STUCK: f64 = 0.03;

/// Points of one dwell, averaged.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Node {
    /// Travel, mm, growing with compression.
    pub u: f64,
    /// Load, N.
    pub load: f64,
    /// First line of the export.
    pub first_line: u64,
    /// Last line of the export.
    pub last_line: u64,
}

/// Which side of the loop a path is.
pub type Side = Way;

/// A stroke's nodes in growing `u`.
#[derive(Clone, Debug, PartialEq)]
pub struct Path {
    /// The nodes.
    pub nodes: Vec<Node>,
    /// Loading or unloading.
    pub side: Side,
    /// Where the stroke meets the spring; `None` where contact was not recorded.
    pub contact: Option<Contact>,
    /// Where the stroke has the spring in hand, mm: from contact on, or from its start where contact was not recorded.
    pub start: f64,
    /// A first idea of the rate, N/mm, for plausibility only: no window, no uncertainty.
    pub rate: Option<f64>,
    /// What is odd on it; the rows that are set aside are in no node.
    pub odd: Vec<OddRows>,
    /// Stretches of travel in which rows are missing.
    pub(super) gaps: Vec<Stretch>,
    /// Travels at which the load steps, mm.
    pub(super) steps: Vec<f64>,
    /// Whether the empty platens show another load on this stroke than before the first contact.
    pub zero_shifted: bool,
}

/// A curve's corrected points, before they are split into strokes.
#[derive(Clone, Copy, Debug)]
pub(super) struct Points<'a> {
    /// Travel, mm.
    pub(super) u: &'a [f64],
    /// Load, N.
    pub(super) load: &'a [f64],
    /// The rows they come from.
    pub(super) raw: &'a RawCurve,
    /// Which of those rows they are; `None` for all.
    pub(super) kept: Option<&'a [usize]>,
    /// Resolution of travel, mm.
    pub(super) resolution: f64,
    /// Contact load, N.
    pub(super) contact_load: f64,
}

impl Points<'_> {
    pub(super) fn line(&self, point: usize) -> u64 {
        let row = self
            .kept
            .map_or(point, |rows| rows.get(point).copied().unwrap_or(point));
        self.raw.line(row)
    }
}

/// Points of one dwell: the sums, the first travel, how many, lowest and highest load.
struct Dwell {
    node: Node,
    first: f64,
    count: f64,
    loads: (f64, f64),
}

impl Dwell {
    fn mean(&self) -> Node {
        Node {
            u: self.node.u / self.count,
            load: self.node.load / self.count,
            ..self.node
        }
    }
}

/// The dwells of a stroke, in the order of measuring.
fn dwells(points: Points<'_>, range: Range<usize>) -> Vec<Dwell> {
    let mut dwells: Vec<Dwell> = Vec::with_capacity(range.len());
    let start = range.start;
    let (u, load) = (
        points.u.get(range.clone()).unwrap_or(&[]),
        points.load.get(range).unwrap_or(&[]),
    );
    for (offset, (x, f)) in u.iter().zip(load).enumerate() {
        let line = points.line(start + offset);
        match dwells.last_mut() {
            Some(dwell) if (x - dwell.first).abs() <= points.resolution / 2.0 => {
                dwell.node.u += x;
                dwell.node.load += f;
                dwell.node.last_line = line;
                dwell.count += 1.0;
                dwell.loads = (dwell.loads.0.min(*f), dwell.loads.1.max(*f));
            }
            _ => dwells.push(Dwell {
                node: Node {
                    u: *x,
                    load: *f,
                    first_line: line,
                    last_line: line,
                },
                first: *x,
                count: 1.0,
                loads: (*f, *f),
            }),
        }
    }
    dwells
}

/// The nodes of some dwells, and those in which the travel is stuck: the load changes there by more than a spring held
/// still, or four steps of travel, make.
fn part_stuck(dwells: &[Dwell], resolution: f64) -> (Vec<Node>, Vec<OddRows>) {
    let ends = dwells
        .iter()
        .flat_map(|dwell| [dwell.loads.0, dwell.loads.1]);
    let largest = ends.fold(0.0, |most: f64, load| most.max(load.abs()));
    let reach = |one: Option<&Dwell>| one.map_or(0.0, |dwell| dwell.first);
    let travel = (reach(dwells.last()) - reach(dwells.first())).abs();
    let by_step = 4.0 * resolution * largest / travel;
    let bound = (STUCK * largest).max(by_step);
    let mut odd = Vec::new();
    let mut nodes = Vec::with_capacity(dwells.len());
    for dwell in dwells {
        if dwell.count > 2.5 && dwell.loads.1 - dwell.loads.0 > bound {
            odd.push(rows(Odd::TravelStuck, &dwell.node, &dwell.node));
        } else {
            nodes.push(dwell.mean());
        }
    }
    (nodes, odd)
}

impl Path {
    /// The path of one stroke, the points in `range`. Consecutive points within half a resolution of travel are one
    /// dwell, so that sampling density does not weigh.
    pub(super) fn new(points: Points<'_>, range: Range<usize>, side: Side) -> Self {
        let (nodes, odd) = part_stuck(&dwells(points, range), points.resolution);
        let mut path = Self {
            nodes,
            side,
            contact: None,
            start: 0.0,
            rate: None,
            odd,
            gaps: Vec::new(),
            steps: Vec::new(),
            zero_shifted: false,
        };
        if side == Way::Unloading {
            path.nodes.reverse();
        }
        path.take_off_stray();
        path.contact = contact::find(&path, points.contact_load);
        let begins = path.reach().map_or(0.0, |(begins, _)| begins);
        path.start = path.contact.map_or(begins, |contact| contact.u);
        path.rate = solid::plain_rate(&path, path.start);
        path.note_oddities();
        path.note_zero(points.contact_load);
        path
    }

    /// The rise to solid at the end of the stroke.
    pub fn rise(&self) -> Option<Rise> {
        solid::rise(self, self.start, self.rate?)
    }

    /// The travel at which the smoothed load first reaches `level`, in mm: loads averaged over five nodes and made
    /// monotone, then interpolated. `None` where the stroke starts above the level or never reaches it; the first and
    /// last two nodes cannot reach it alone, so that a single reading opens no window.
    pub fn crossing(&self, level: f64) -> Option<f64> {
        let mut before: Option<(f64, f64)> = None;
        for five in self.nodes.windows(2 * SMOOTH + 1) {
            let count = five.len() as f64;
            let u = five.iter().map(|node| node.u).sum::<f64>() / count;
            let load = five.iter().map(|node| node.load).sum::<f64>() / count;
            if load >= level {
                let (u0, load0) = before?;
                return Some(u0 + (level - load0) / (load - load0) * (u - u0));
            }
            if before.is_none_or(|(_, highest)| load > highest) {
                before = Some((u, load));
            }
        }
        None
    }

    /// Standard deviation of a single load about a smooth curve, N: from the median distance of a node from the chord
    /// between its neighbours, which a line does not have and a bend hardly. `None` under three nodes.
    pub fn scatter(&self) -> Option<f64> {
        let off = |three: &[Node]| match three {
            [a, b, c] if c.u > a.u => {
                let share = (b.u - a.u) / (c.u - a.u);
                let chord = a.load + share * (c.load - a.load);
                // The variance of the distance, over that of one load.
                let variance = 1.0 + share * share + (1.0 - share) * (1.0 - share);
                Some((b.load - chord).abs() / variance.sqrt())
            }
            _ => None,
        };
        let sizes: Vec<f64> = self.nodes.windows(3).filter_map(off).collect();
        // For normal scatter the median size is 0.6745 standard deviations.
        Some(crate::stats::median(sizes)? / 0.674_489_75)
    }

    /// The nodes with `from ≤ u ≤ to`.
    pub fn between(&self, from: f64, to: f64) -> Vec<Node> {
        self.nodes
            .iter()
            .filter(|node| node.u >= from && node.u <= to)
            .copied()
            .collect()
    }

    /// Smallest and largest travel of the stroke, mm.
    pub fn reach(&self) -> Option<(f64, f64)> {
        let least = self.nodes.iter().map(|node| node.u).reduce(f64::min)?;
        Some((
            least,
            self.nodes.iter().map(|node| node.u).fold(least, f64::max),
        ))
    }

    /// Work over the travel `from` … `to` by the trapezium rule, N·mm; ends interpolated.
    pub fn work(&self, from: f64, to: f64) -> Option<f64> {
        let mut sum = 0.0;
        let mut last = (from, self.load_at(from)?);
        for node in self
            .nodes
            .iter()
            .filter(|node| node.u > from && node.u < to)
        {
            sum += (node.u - last.0) * (node.load + last.1) / 2.0;
            last = (node.u, node.load);
        }
        Some(sum + (to - last.0) * (self.load_at(to)? + last.1) / 2.0)
    }

    /// Load at travel `u` between its two neighbours, N; `None` outside the stroke.
    pub fn load_at(&self, u: f64) -> Option<f64> {
        self.nodes.windows(2).find_map(|pair| match pair {
            [a, b] if a.u <= u && u <= b.u => {
                let share = if b.u > a.u {
                    (u - a.u) / (b.u - a.u)
                } else {
                    0.0
                };
                Some(a.load + share * (b.load - a.load))
            }
            _ => None,
        })
    }
}

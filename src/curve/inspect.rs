//! What is odd on one stroke: nodes that are none are taken off, gaps and steps in load noted.

use crate::drawing::Way;
use crate::oddity::{Odd, gaps, steps, stray, uneven};

use super::path::{Node, Path};
use super::screen::OddRows;

/// Behind the turn of an unloading stroke, friction lets the load fall within this share of the travel.
const BEHIND_TURN: f64 = 0.05;

/// Loads in the air differ from the first by at most so many contact loads; over their travel a touched spring would
/// show so many.
const AIR: (f64, f64) = (1.5, 6.0);
/// The load in the air is another one beyond this share of the contact load, and so many times the scatter of its mean.
const SHIFTED: (f64, f64) = (0.5, 6.0);

/// A stretch of travel without a row, mm.
pub(super) type Stretch = (f64, f64);

impl Path {
    /// Takes stray readings off the nodes.
    pub(super) fn take_off_stray(&mut self) {
        let points = points(&self.nodes);
        let found = self
            .scatter()
            .and_then(|scatter| stray(&points, scatter, self.largest()))
            .unwrap_or_default();
        for place in found.iter().rev() {
            if *place < self.nodes.len() {
                let node = self.nodes.remove(*place);
                self.odd.push(rows(Odd::Stray, &node, &node));
            }
        }
    }

    /// Notes gaps, steps in load and uneven sampling on the nodes from contact on.
    pub(super) fn note_oddities(&mut self) {
        let from = self
            .nodes
            .iter()
            .position(|node| node.u >= self.start)
            .unwrap_or(0)
            .saturating_sub(1);
        let nodes = self.nodes.get(from..).unwrap_or(&[]);
        let node = |place: usize| nodes.get(place).or(nodes.last());
        let mut odd = Vec::new();
        let mut missing: Vec<Stretch> = Vec::new();
        let all: Vec<f64> = self.nodes.iter().map(|node| node.u).collect();
        for gap in gaps(&all).iter().filter(|gap| gap.to > self.start) {
            missing.push((gap.from, gap.to));
            let ends = self
                .nodes
                .get(gap.before)
                .zip(self.nodes.get(gap.before + 1));
            odd.extend(ends.map(|(a, b)| rows(Odd::RowsMissing, a, b)));
        }
        let travel = all.get(from..).unwrap_or(&[]);
        let mut stepped = Vec::new();
        if let (Some(rate), Some(scatter)) = (self.rate, self.scatter()) {
            let turn = travel.last().copied().unwrap_or(0.0);
            let most = match self.side {
                Way::Loading => turn,
                Way::Unloading => turn - BEHIND_TURN * (turn - self.start),
            };
            for step in steps(&points(nodes), rate, scatter, self.largest()) {
                if step.at <= most && step.at >= self.start {
                    stepped.push(step.at);
                    odd.extend(
                        node(step.before)
                            .zip(node(step.after))
                            .map(|(a, b)| rows(Odd::LoadSteps, a, b)),
                    );
                }
            }
        }
        if self.side == Way::Loading && uneven(travel) {
            odd.extend(
                nodes
                    .first()
                    .zip(nodes.last())
                    .map(|(a, b)| rows(Odd::Uneven, a, b)),
            );
        }
        self.odd.append(&mut odd);
        self.gaps = missing;
        self.steps = stepped;
    }

    /// Notes where the load in the air, zero by then, is none: the first nodes in growing travel, over which the load
    /// would rise by several contact loads if the spring were touched.
    pub(super) fn note_zero(&mut self, contact: f64) {
        let (Some(first), Some(rate), Some(scatter)) =
            (self.nodes.first(), self.rate, self.scatter())
        else {
            return;
        };
        let level = |node: &&Node| (node.load - first.load).abs() <= AIR.0 * contact;
        let flat: Vec<&Node> = self.nodes.iter().take_while(level).collect();
        let Some(end) = flat.last().map(|node| node.u) else {
            return;
        };
        let clear = end - 2.0 * AIR.0 * contact / rate;
        let air: Vec<&&Node> = flat.iter().filter(|node| node.u <= clear).collect();
        if air.len() < 3 || rate * (end - first.u) < AIR.1 * contact {
            return;
        }
        let Some(shown) = crate::stats::median(air.iter().map(|node| node.load).collect()) else {
            return;
        };
        let bound = (SHIFTED.0 * contact).max(SHIFTED.1 * scatter / (air.len() as f64).sqrt());
        if shown.abs() > bound {
            self.zero_shifted = true;
            let ends = air.first().zip(air.last());
            self.odd
                .extend(ends.map(|(a, b)| rows(Odd::ZeroShifted, a, b)));
        }
    }

    /// Largest size of a load on the stroke, N.
    pub(super) fn largest(&self) -> f64 {
        self.nodes
            .iter()
            .map(|node| node.load.abs())
            .fold(0.0, f64::max)
    }

    /// Whether no row lies within some travel around `u`: a gap spans it.
    pub fn is_missing(&self, u: f64) -> bool {
        self.gaps.iter().any(|(from, to)| *from <= u && u <= *to)
    }

    /// The widest gap within a travel `from` … `to`, mm.
    pub fn widest_gap(&self, from: f64, to: f64) -> f64 {
        let inside = |(start, end): &Stretch| end.min(to) - start.max(from);
        self.gaps.iter().map(inside).fold(0.0, f64::max)
    }

    /// Whether the load steps within a travel `from` … `to`.
    pub fn steps_between(&self, from: f64, to: f64) -> bool {
        self.steps.iter().any(|at| *at >= from && *at <= to)
    }
}

fn points(nodes: &[Node]) -> Vec<(f64, f64)> {
    nodes.iter().map(|node| (node.u, node.load)).collect()
}

/// The lines of two nodes and all between them.
pub(super) fn rows(what: Odd, a: &Node, b: &Node) -> OddRows {
    OddRows {
        first_line: a.first_line.min(b.first_line),
        last_line: a.last_line.max(b.last_line),
        what,
    }
}

//! What the drawing's window means on a curve: one window for the whole lot, fixed from the drawing.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drawing::{Drawing, Window};
use crate::quantity::Quantity;

use super::correct::{Curve, Frame};
use super::path::Path;

/// What the window's bounds are.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum WindowOf {
    /// Loads in N.
    Load,
    /// Deflections in mm from contact.
    Deflection,
    /// Lengths in mm.
    Length,
    /// Shares of the travel from contact to the greatest compression before solid (no drawing).
    Travel,
}

/// The window with its bounds in N or mm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bounds {
    /// What the bounds are.
    pub of: WindowOf,
    /// Start, N or mm.
    pub from: f64,
    /// End, N or mm.
    pub to: f64,
}

/// Why a window has no place on a curve.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum WindowMiss {
    /// The stroke does not span it.
    NotReached,
    /// It is given in lengths, and the curve has none.
    NoAbsoluteLength,
}

/// Fn in N, the load at the smallest permitted length Ln: as stated under `[rate_test] full_load`, else
/// nominal rate (stated, or else theory's) times L0 − Ln; with several stages theory's load there.
pub fn full_load(drawing: &Drawing) -> f64 {
    if let Some(stated) = drawing.rate_test.full_load {
        return stated;
    }
    if drawing.theory.stages.len() > 1 {
        return drawing.theory.load_at(drawing.theory.smallest.get());
    }
    nominal_rate(drawing) * travel_to_smallest(drawing)
}

/// The rate that springs should have, N/mm: as stated, or else theory's; with several stages that of the longest one,
/// which a median over the whole travel shows.
pub fn nominal_rate(drawing: &Drawing) -> f64 {
    if drawing.theory.stages.len() > 1 {
        return longest_stage(drawing);
    }
    let rate = drawing
        .requirements
        .iter()
        .find(|one| one.quantity == Quantity::Rate);
    rate.and_then(|one| one.limits.nominal)
        .unwrap_or(drawing.theory.rate.get())
}

fn longest_stage(drawing: &Drawing) -> f64 {
    let set = &drawing.theory;
    let ends = set
        .stages
        .iter()
        .skip(1)
        .map(|stage| stage.from.get())
        .chain([set.smallest.get()]);
    let longest = set
        .stages
        .iter()
        .zip(ends)
        .map(|(stage, end)| (stage.from.get() - end, stage.rate.get()))
        .max_by(|a, b| a.0.total_cmp(&b.0));
    longest.map_or(set.rate.get(), |(_, rate)| rate)
}

fn travel_to_smallest(drawing: &Drawing) -> f64 {
    drawing.theory.free.get() - drawing.theory.smallest.get()
}

/// The window of `drawing` with its bounds in N or mm. With several stages a window that is not between two lengths is
/// that of the first stage whose rate is required.
pub fn window_of(drawing: &Drawing) -> Bounds {
    let of_stage = drawing.requirements.iter().find_map(|one| one.between);
    if let (Some((from, to)), Window::FullLoad(..) | Window::Deflection(..)) =
        (of_stage, drawing.rate_test.window)
    {
        return Bounds {
            of: WindowOf::Length,
            from,
            to,
        };
    }
    match drawing.rate_test.window {
        Window::FullLoad(from, to) => {
            let full = full_load(drawing);
            Bounds {
                of: WindowOf::Load,
                from: from * full,
                to: to * full,
            }
        }
        Window::Deflection(from, to) => {
            let travel = travel_to_smallest(drawing);
            Bounds {
                of: WindowOf::Deflection,
                from: from * travel,
                to: to * travel,
            }
        }
        Window::Lengths(from, to) => Bounds {
            of: WindowOf::Length,
            from,
            to,
        },
    }
}

impl Bounds {
    /// Points of a stroke between the window's loads, where its loads reach from below the window to beyond it; `None`
    /// where they do not, or the window is not one of loads.
    pub fn loads_inside(&self, path: &Path) -> Option<usize> {
        let loads = || path.nodes.iter().map(|node| node.load);
        let spans = loads().any(|load| load < self.from) && loads().any(|load| load >= self.to);
        let inside = loads()
            .filter(|load| (self.from..=self.to).contains(load))
            .count();
        (self.of == WindowOf::Load && spans).then_some(inside)
    }

    /// A stroke's largest load and the window's upper one, N, where the window is one of loads.
    pub fn loads_short(&self, path: &Path) -> Option<(f64, f64)> {
        let largest = path.nodes.iter().map(|node| node.load).reduce(f64::max)?;
        (self.of == WindowOf::Load).then_some((largest, self.to))
    }

    /// The window as travel on one stroke of `curve`, in mm of `u`. `free` is the spring's own measured free
    /// length where the export gives none.
    ///
    /// # Errors
    /// [`WindowMiss`]; the window is never shrunk to fit, and no point past the rise to solid is in it.
    pub fn on(
        &self,
        curve: &Curve,
        path: &Path,
        free: Option<f64>,
    ) -> Result<(f64, f64), WindowMiss> {
        let (least, end) = path.reach().ok_or(WindowMiss::NotReached)?;
        let most = path.rise().map_or(end, |rise| rise.u.min(end));
        let contact = || {
            path.contact
                .map(|contact| contact.u)
                .ok_or(WindowMiss::NotReached)
        };
        let (from, to) = match self.of {
            WindowOf::Load => {
                let at = |level| path.crossing(level).ok_or(WindowMiss::NotReached);
                (at(self.from)?, at(self.to)?)
            }
            WindowOf::Deflection => (contact()? + self.from, contact()? + self.to),
            WindowOf::Travel => {
                let at = |share: f64| path.start + share * (most - path.start);
                (at(self.from), at(self.to))
            }
            WindowOf::Length => {
                let origin = match (curve.frame, free) {
                    (Frame::Absolute, _) => 0.0,
                    (Frame::Relative, Some(free)) => contact()? + free,
                    (Frame::Relative, None) => return Err(WindowMiss::NoAbsoluteLength),
                };
                (origin - self.from, origin - self.to)
            }
        };
        let inside = from >= least && to <= most && from < to;
        if inside {
            Ok((from, to))
        } else {
            Err(WindowMiss::NotReached)
        }
    }
}

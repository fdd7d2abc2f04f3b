//! The give of the frame, from a run of plate on plate: travel goes on while nothing lies between the platens.

use crate::characteristic::{Estimate, Line, Part, scale_lines};
use crate::fit::{LackOfFit, LineFit, TypeA, lack_of_fit, type_a};
use crate::rig::{Accuracy, Give, Means, Rig};
use crate::stats::{Dof, mean, standard_deviation};

use super::BenchError;
use super::knots::{knots, table};
use super::passes::rising;

/// Readings that a pass needs.
const LEAST: usize = 10;
/// More give than this is a spring's, mm (common practice, no source).
const MOST_GIVE: f64 = 2.0;
/// Below this p a lack of fit is taken as shown.
const SHOWN: f64 = 0.01;
/// What ISO 9513 allows at short travel, mm per relative half-width of the class: 1.5 µm at class 0.5 (from memory).
const SHORT_TRAVEL: f64 = 0.3;

/// A run of plate on plate as read.
#[derive(Clone, Copy, Debug)]
pub struct Plates<'a> {
    /// Loads, N, pushing positive.
    pub load: &'a [f64],
    /// Travel as indicated, mm.
    pub travel: &'a [f64],
}

/// The frame as measured.
#[derive(Clone, Debug)]
pub struct Frame {
    /// Straight line or table, for the rig file.
    pub give: Give,
    /// The straight line's slope with its budget, mm/N; the uncertainty holds for a table as well.
    pub compliance: Estimate,
    /// Smallest and largest load of the fit, N.
    pub loads: (f64, f64),
    /// Loading passes.
    pub passes: usize,
    /// Readings fitted.
    pub points: usize,
    /// Lack of fit of the straight line.
    pub lack: Option<LackOfFit>,
    /// Largest distance of the table from the straight line, mm.
    pub departure: f64,
    /// Load and give of every reading fitted, give 0 where the straight line meets load 0.
    pub readings: Vec<(f64, f64)>,
}

/// Load and travel of the readings of one pass.
type Pass = (Vec<f64>, Vec<f64>);

/// Fits the frame's give.
///
/// Travel is regressed on load over every loading pass, from twice the contact load on: below it the plates still seat.
/// A table stands in for the line where a parabola fits better (p under 0.01) and the table leaves the line by more than
/// one step of the travel scale.
///
/// # Errors
/// [`BenchError`] where the run is no frame's.
pub fn frame(run: Plates<'_>, rig: &Rig) -> Result<Frame, BenchError> {
    let passes = passes(run, rig)?;
    let mut lines = Vec::new();
    for (load, travel) in &passes {
        lines.push(LineFit::through(load, travel)?);
    }
    if rig.means != Means::Deflection
        && !matches!(rig.means, Means::Length)
        && lines.iter().all(|line| line.slope < 0.0)
    {
        // A platen position may count either way.
        let turned: Vec<f64> = run.travel.iter().map(|x| -x).collect();
        let run = Plates {
            travel: &turned,
            ..run
        };
        return fitted(&self::passes(run, rig)?, rig);
    }
    fitted(&passes, rig)
}

/// The loading passes, loads net of the empty platens', travel growing with compression.
fn passes(run: Plates<'_>, rig: &Rig) -> Result<Vec<Pass>, BenchError> {
    let contact = rig.contact_load.get();
    let base = empty(run.load, contact);
    let sign = if rig.means == Means::Length {
        -1.0
    } else {
        1.0
    };
    let ranges = rising(run.load);
    let mut passes = Vec::new();
    let mut rise = 0.0_f64;
    for range in ranges {
        let mut pass = (Vec::new(), Vec::new());
        let points = run
            .load
            .iter()
            .zip(run.travel)
            .take(range.end)
            .skip(range.start);
        for (load, travel) in points {
            let load = load - base;
            rise = rise.max(load);
            if load >= 2.0 * contact {
                pass.0.push(load);
                pass.1.push(sign * travel);
            }
        }
        passes.push(pass);
    }
    if rise <= 2.0 * contact {
        return Err(BenchError::NoLoad);
    }
    match passes.iter().map(|pass| pass.0.len()).min() {
        Some(found) if found < LEAST => Err(BenchError::FewReadings { found }),
        _ => Ok(passes),
    }
}

/// Mean of the readings before the plates touch; 0 where fewer than three were made.
fn empty(load: &[f64], contact: f64) -> f64 {
    let first = load.first().copied().unwrap_or(0.0);
    let before: Vec<f64> = load
        .iter()
        .copied()
        .take_while(|load| load - first <= contact / 2.0)
        .collect();
    match before.len() {
        0..=2 => 0.0,
        _ => mean(&before).unwrap_or(0.0),
    }
}

fn fitted(passes: &[Pass], rig: &Rig) -> Result<Frame, BenchError> {
    let mut slopes = Vec::new();
    let mut scatter = Vec::new();
    let (mut load, mut give) = (Vec::new(), Vec::new());
    for (x, y) in passes {
        let line = LineFit::through(x, y)?;
        slopes.push(line.slope);
        scatter.push(type_a(&line, x)?);
        // Each pass may start from another place: only what it adds to its own line's start counts.
        load.extend(x);
        give.extend(y.iter().map(|y| y - line.intercept));
    }
    let line = LineFit::through(&load, &give)?;
    let slope = mean(&slopes).unwrap_or(line.slope);
    let low = load.iter().copied().fold(f64::INFINITY, f64::min);
    let high = load.iter().copied().fold(0.0, f64::max);
    if slope <= 0.0 {
        return Err(BenchError::WrongWay);
    }
    if slope * high > MOST_GIVE {
        return Err(BenchError::NoFrame {
            give: slope * high,
            load: high,
        });
    }
    let budget = budget(rig, slope, high - low, &slopes, &scatter);
    let compliance = match budget {
        (lines, true) => Estimate::new(slope, lines)?,
        (lines, false) => Estimate::without_uncertainty(slope, lines),
    };
    let lack = lack_of_fit(&load, &give, &line);
    let knots = knots(&load, &give, &line);
    let off = |(at, give): &(f64, f64)| (give - line.at(*at)).abs();
    let departure = knots.iter().map(off).fold(0.0, f64::max);
    let bent = lack.is_some_and(|lack| lack.p < SHOWN) && departure > rig.travel.resolution.get();
    Ok(Frame {
        give: match table(&knots) {
            Some(table) if bent => table,
            _ => Give::Line(slope),
        },
        compliance,
        loads: (low, high),
        passes: passes.len(),
        points: load.len(),
        lack,
        departure,
        readings: load.into_iter().zip(give).collect(),
    })
}

/// Lines of the compliance, mm/N, and whether its scatter is known.
fn budget(
    rig: &Rig,
    slope: f64,
    span: f64,
    slopes: &[f64],
    scatter: &[TypeA],
) -> (Vec<Line>, bool) {
    let count = slopes.len() as f64;
    let mut lines = Vec::new();
    let known: Option<Vec<(f64, Dof)>> = scatter
        .iter()
        .map(|one| match one {
            TypeA::Known {
                standard_uncertainty,
                dof,
                ..
            } => Some((*standard_uncertainty, *dof)),
            TypeA::TooFewEffective { .. } => None,
        })
        .collect();
    let of_fit = known.map(|known| {
        let squares: f64 = known.iter().map(|(u, _)| u * u).sum();
        let dof = known.iter().fold(0.0, |sum, (_, dof)| match dof {
            Dof::Finite(dof) => sum + dof,
            Dof::Infinite => f64::INFINITY,
        });
        let dof = if dof.is_finite() {
            Dof::Finite(dof)
        } else {
            Dof::Infinite
        };
        Line::new("fit", Part::Own, squares.sqrt() / count).with_dof(dof)
    });
    let of_passes = standard_deviation(slopes).map(|sd| {
        Line::new("pass to pass", Part::Own, sd / count.sqrt()).with_dof(Dof::Finite(count - 1.0))
    });
    let is_known = of_fit.is_some() || of_passes.is_some();
    match (of_fit, of_passes) {
        (Some(mut fit), Some(mut passes)) => {
            fit.counted = fit.contribution >= passes.contribution;
            passes.counted = !fit.counted;
            lines.extend([fit, passes]);
        }
        (fit, passes) => lines.extend(fit.into_iter().chain(passes)),
    }
    let step = rig.travel.resolution.get() / 6.0_f64.sqrt(); // a difference of two readings
    lines.push(Line::new("resolution of travel", Part::Own, step / span));
    lines.extend(scale_lines(
        &rig.force,
        ["force scale", "force error found", "force drift"],
        -slope,
    ));
    lines.extend(scale_lines(
        &rig.travel,
        ["travel scale", "travel error found", "travel drift"],
        slope,
    ));
    if let Accuracy::Class { half_width, .. } = &rig.travel.accuracy {
        // Over short travel a class allows a fixed error; it stands in for the relative one where it is larger.
        let floor = Line::new(
            "travel scale at short travel",
            Part::Common,
            SHORT_TRAVEL * half_width / span / 3.0_f64.sqrt(),
        );
        let relative = lines.iter_mut().find(|line| line.source == "travel scale");
        match relative {
            Some(relative) if relative.contribution < floor.contribution => *relative = floor,
            _ => {}
        }
    }
    (lines, is_known)
}

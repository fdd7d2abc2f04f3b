//! All curves with the window and the limits at the test lengths, and the residuals about the fits.

use super::bounds;
use super::field::{self, Line};
use super::{Chart, chart, verdict_of};
use crate::curve::{Axis, Reduced, thin};
use crate::quantity::Unit;
use crate::record::AcceptRecord;
use crate::sheet::ChartError;
use crate::sheet::canvas::{INK, LIMIT, WIDTH, WINDOW};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::System;
use crate::wording::{per_unit, unit_symbol};

/// Height of the plot of loads, and of residuals.
const TALL: f64 = 235.0;
const LOW: f64 = 115.0;

/// Residuals drawn over all springs, and at least of one spring.
const MOST_RESIDUALS: usize = 4000;
const FEWEST_RESIDUALS: usize = 60;

/// All curves.
///
/// # Errors
/// [`ChartError`].
pub(super) fn loads(
    record: &AcceptRecord,
    curves: &[&Reduced],
    only: bool,
    show_in: System,
) -> Result<Chart, ChartError> {
    let axis = curves.first().map_or(Axis::Length, |curve| curve.axis);
    let lines = lines(record, curves, show_in, |curve| {
        (&curve.loading, &curve.unloading)
    });
    let bars = if axis == Axis::Length {
        bounds::bars(record, show_in)
    } else {
        Vec::new()
    };
    let window = bounds::window(record, curves, axis, show_in);
    let mut entries = field::entries(&lines);
    if !matches!(window, bounds::Window::Unknown) {
        entries.push((Sample::Patch(WINDOW, 0.22), "window of the rate".to_owned()));
    }
    if !bars.is_empty() {
        entries.push((
            Sample::Line(LIMIT, 2.4),
            "limits of the load at a test length".to_owned(),
        ));
    }
    let points = || {
        lines
            .iter()
            .flat_map(|line| line.points.iter().chain(&line.back))
    };
    let mut x = plot::range(
        points()
            .map(|point| point.0)
            .chain(bars.iter().map(|bar| bar.at)),
        0.02,
    );
    if axis == Axis::Length {
        x = (x.1, x.0);
    }
    let ends = bars
        .iter()
        .flat_map(|bar| [bar.lower, bar.upper].into_iter().flatten());
    let y = plot::range(points().map(|point| point.1).chain(ends).chain([0.0]), 0.04);
    let (file, caption) = match (axis, only) {
        (Axis::Length, _) => (
            "curves",
            "Load over length; lengths fall to the right, so that loads rise with compression.",
        ),
        (Axis::Deflection, true) => (
            "curves",
            "Load over deflection. Without an absolute length the limits at the test lengths cannot be drawn.",
        ),
        (Axis::Deflection, false) => (
            "curves-by-deflection",
            "Springs without an absolute length: load over deflection. The limits at the test lengths cannot be drawn.",
        ),
    };
    chart(
        file,
        "Load–deflection curves",
        caption.to_owned(),
        height(&entries, TALL),
        |sheet| {
            let plot = laid_out(&entries, TALL, x, y);
            plot::legend(sheet, &entries)?;
            plot::upward_axis(
                sheet,
                &plot,
                7,
                &format!("load F ({})", unit_symbol(Unit::Newton, show_in)),
            )?;
            plot::across_axis(sheet, &plot, 9, &across(axis, show_in))?;
            bounds::draw_window(sheet, &plot, window)?;
            field::draw(sheet, &plot, &lines)?;
            bounds::draw_bars(sheet, &plot, &bars)?;
            plot::frame(sheet, &plot)
        },
    )
}

/// The residuals about the fits; `None` where there are none.
///
/// # Errors
/// [`ChartError`].
pub(super) fn residuals(
    record: &AcceptRecord,
    curves: &[&Reduced],
    only: bool,
    show_in: System,
) -> Result<Option<Chart>, ChartError> {
    let axis = curves.first().map_or(Axis::Length, |curve| curve.axis);
    let none = Vec::new();
    let mut lines = lines(record, curves, show_in, |curve| (&curve.residuals, &none));
    lines.retain(|line| !line.points.is_empty());
    let most = (MOST_RESIDUALS / lines.len().max(1)).max(FEWEST_RESIDUALS);
    for line in &mut lines {
        line.points = thin(&line.points, most);
    }
    if lines.is_empty() {
        return Ok(None);
    }
    let entries = field::entries(&lines);
    let points = || lines.iter().flat_map(|line| &line.points);
    let mut x = plot::range(points().map(|point| point.0), 0.02);
    if axis == Axis::Length {
        x = (x.1, x.0);
    }
    let y = plot::range(points().map(|point| point.1).chain([0.0]), 0.08);
    let file = if axis == Axis::Deflection && !only {
        "residuals-by-deflection"
    } else {
        "residuals"
    };
    let caption = "Measured load less the fitted line, within the window. A shape common to all springs is the rig’s or the design’s.";
    let made = chart(
        file,
        "Residuals about the fit",
        caption.to_owned(),
        height(&entries, LOW),
        |sheet| {
            let plot = laid_out(&entries, LOW, x, y);
            plot::legend(sheet, &entries)?;
            plot::upward_axis(
                sheet,
                &plot,
                5,
                &format!("residual ({})", unit_symbol(Unit::Newton, show_in)),
            )?;
            plot::across_axis(sheet, &plot, 9, &across(axis, show_in))?;
            field::draw(sheet, &plot, &lines)?;
            let zero = plot.y.at(0.0);
            sheet.line(&[(plot.x.paper.0, zero), (plot.x.paper.1, zero)], INK, 0.9)?;
            plot::frame(sheet, &plot)
        },
    );
    made.map(Some)
}

fn lines<'a>(
    record: &AcceptRecord,
    curves: &[&'a Reduced],
    show_in: System,
    take: impl Fn(&'a Reduced) -> (&'a Vec<(f64, f64)>, &'a Vec<(f64, f64)>),
) -> Vec<Line<'a>> {
    let shown = |points: &[(f64, f64)]| -> Vec<(f64, f64)> {
        let (length, force) = (
            per_unit(Unit::Millimetre, show_in),
            per_unit(Unit::Newton, show_in),
        );
        let finite = points
            .iter()
            .filter(|point| point.0.is_finite() && point.1.is_finite());
        finite.map(|(x, y)| (x / length, y / force)).collect()
    };
    let line = |curve: &&'a Reduced| {
        let (points, back) = take(curve);
        Line {
            id: &curve.id,
            verdict: verdict_of(record, &curve.id),
            points: shown(points),
            back: shown(back),
        }
    };
    curves.iter().map(line).collect()
}

fn across(axis: Axis, show_in: System) -> String {
    let unit = unit_symbol(Unit::Millimetre, show_in);
    match axis {
        Axis::Length => format!("length L ({unit})"),
        Axis::Deflection => format!("deflection s ({unit})"),
    }
}

fn height(entries: &[Entry], tall: f64) -> f64 {
    plot::legend_height(entries) + LEADING * 1.6 + tall + LEADING * 2.6
}

fn laid_out(entries: &[Entry], tall: f64, x: (f64, f64), y: (f64, f64)) -> Plot {
    let top = plot::legend_height(entries) + LEADING * 1.6;
    let left = EDGE + plot::labels_width(y, 7) + 10.0;
    Plot {
        x: Scale {
            value: x,
            paper: (left, WIDTH - field::LABEL_WIDTH),
        },
        y: Scale {
            value: y,
            paper: (top + tall, top),
        },
    }
}

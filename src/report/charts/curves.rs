//! All curves with the window and the limits at the test lengths, and the residuals about the fits.

use super::field::{self, Line};
use super::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use super::sheet::{Anchor, Drawn, INK, LIMIT, Sheet, TYPE, WIDTH, WINDOW};
use super::{Chart, chart, verdict_of};
use crate::curve::{Axis, Reduced, thin};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, RequirementFacts, WindowOf};
use crate::report::figure::{Place, figure, per_unit, symbol};
use crate::report::{ReportError, font};
use crate::units::{Finite, System};

/// Height of the plot of loads, and of residuals.
const TALL: f64 = 290.0;
const LOW: f64 = 150.0;

/// Residuals drawn over all springs, and at least of one spring.
const MOST_RESIDUALS: usize = 4000;
const FEWEST_RESIDUALS: usize = 60;

/// The window, in the values of the plot.
#[derive(Clone, Copy)]
enum Window {
    Across(f64, f64),
    Up(f64, f64),
    Unknown,
}

/// The limits of a load at a test length, in the values of the plot.
struct Bar {
    at: f64,
    lower: Option<f64>,
    upper: Option<f64>,
    words: String,
}

/// All curves.
///
/// # Errors
/// [`ReportError::Chart`].
pub(super) fn loads(
    record: &AcceptRecord,
    curves: &[&Reduced],
    only: bool,
    show_in: System,
) -> Result<Chart, ReportError> {
    let axis = curves.first().map_or(Axis::Length, |curve| curve.axis);
    let lines = lines(record, curves, show_in, |curve| {
        (&curve.loading, &curve.unloading)
    });
    let bars = if axis == Axis::Length {
        bars(record, show_in)
    } else {
        Vec::new()
    };
    let window = window(record, curves, axis, show_in);
    let mut entries = field::entries(&lines);
    if !matches!(window, Window::Unknown) {
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
                &format!("load F in {}", symbol(Unit::Newton, show_in)),
            )?;
            plot::across_axis(sheet, &plot, 9, &across(axis, show_in))?;
            draw_window(sheet, &plot, window)?;
            field::draw(sheet, &plot, &lines)?;
            draw_bars(sheet, &plot, &bars)?;
            plot::frame(sheet, &plot)
        },
    )
}

/// The residuals about the fits; `None` where there are none.
///
/// # Errors
/// [`ReportError::Chart`].
pub(super) fn residuals(
    record: &AcceptRecord,
    curves: &[&Reduced],
    only: bool,
    show_in: System,
) -> Result<Option<Chart>, ReportError> {
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
                &format!("residual in {}", symbol(Unit::Newton, show_in)),
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
    let unit = symbol(Unit::Millimetre, show_in);
    match axis {
        Axis::Length => format!("length L in {unit}"),
        Axis::Deflection => format!("deflection s in {unit}"),
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

fn window(record: &AcceptRecord, curves: &[&Reduced], axis: Axis, show_in: System) -> Window {
    let of = &record.window;
    if of.of == WindowOf::Load {
        let scale = per_unit(Unit::Newton, show_in);
        return Window::Up(of.from.get() / scale, of.to.get() / scale);
    }
    let scale = per_unit(Unit::Millimetre, show_in);
    let same = matches!(
        (of.of, axis),
        (WindowOf::Length, Axis::Length) | (WindowOf::Deflection, Axis::Deflection)
    );
    if same {
        return Window::Across(of.from.get() / scale, of.to.get() / scale);
    }
    let fits: Vec<(f64, f64)> = record
        .springs
        .iter()
        .filter(|spring| curves.iter().any(|curve| curve.id == spring.id))
        .filter_map(|spring| spring.fit.as_ref())
        .map(|fit| (fit.from_mm.get() / scale, fit.to_mm.get() / scale))
        .collect();
    let middle = |take: fn(&(f64, f64)) -> f64| {
        let mut values: Vec<f64> = fits.iter().map(take).collect();
        values.sort_by(f64::total_cmp);
        values.get(values.len() / 2).copied()
    };
    match (middle(|fit| fit.0), middle(|fit| fit.1)) {
        (Some(from), Some(to)) => Window::Across(from, to),
        _ => Window::Unknown,
    }
}

fn draw_window(sheet: &mut Sheet<'_>, plot: &Plot, window: Window) -> Drawn {
    let ((left, right), (bottom, top)) = (plot.x.paper, plot.y.paper);
    match window {
        Window::Up(from, to) => {
            let (low, high) = (
                plot.y.at(from).clamp(top, bottom),
                plot.y.at(to).clamp(top, bottom),
            );
            sheet.block((left, low), (right, high), WINDOW, 0.22)
        }
        Window::Across(from, to) => {
            let (start, end) = (
                plot.x.at(from).clamp(left, right),
                plot.x.at(to).clamp(left, right),
            );
            sheet.block((start, bottom), (end, top), WINDOW, 0.22)
        }
        Window::Unknown => Ok(()),
    }
}

fn bars(record: &AcceptRecord, show_in: System) -> Vec<Bar> {
    let force = per_unit(Unit::Newton, show_in);
    let bar = |of: &RequirementFacts| {
        let at = of
            .at_length_mm
            .filter(|_| of.lower.is_some() || of.upper.is_some())?;
        let stated = |value: Option<Finite>| figure(value, Unit::Newton, Place::Stated, show_in);
        let shown = |value: Option<Finite>| value.map(|value| value.get() / force);
        let length = figure(Some(at), Unit::Millimetre, Place::Stated, show_in);
        Some(Bar {
            at: at.get() / per_unit(Unit::Millimetre, show_in),
            lower: shown(of.lower),
            upper: shown(of.upper),
            words: format!("L {length}: {} … {}", stated(of.lower), stated(of.upper)),
        })
    };
    record.drawing.requirements.iter().filter_map(bar).collect()
}

fn draw_bars(sheet: &mut Sheet<'_>, plot: &Plot, bars: &[Bar]) -> Drawn {
    let (bottom, top) = plot.y.paper;
    let ends = |bar: &Bar| {
        let high = bar.upper.map_or(top, |value| plot.y.at(value));
        let low = bar.lower.map_or(bottom, |value| plot.y.at(value));
        (high, low)
    };
    let wanted: Vec<f64> = bars.iter().map(|bar| ends(bar).0 - 4.0).collect();
    let heights = plot::spread(&wanted, LEADING, top + LEADING * 0.5, bottom - LEADING);
    for (bar, height) in bars.iter().zip(heights) {
        let x = plot.x.at(bar.at);
        let (high, low) = ends(bar);
        sheet.line(&[(x, high), (x, low)], LIMIT, 2.4)?;
        for (value, y) in [(bar.upper, high), (bar.lower, low)] {
            if value.is_some() {
                sheet.line(&[(x - 6.0, y), (x + 6.0, y)], LIMIT, 2.4)?;
            }
        }
        let wide = font::width(&bar.words, TYPE, false);
        let right = (x - 10.0).max(plot.x.paper.0 + wide + 4.0);
        sheet.block(
            (right - wide - 3.0, height - 8.0),
            (right + 3.0, height + 8.0),
            plotters::style::WHITE,
            0.8,
        )?;
        sheet.text(&bar.words, (right, height), Anchor::End, LIMIT)?;
    }
    Ok(())
}

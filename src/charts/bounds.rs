//! What the curves are held against: the window of the rate, the limits at the test lengths.

use crate::curve::{Axis, Reduced};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, RequirementFacts, WindowOf};
use crate::sheet::canvas::{Anchor, Drawn, LIMIT, Sheet, TYPE, WINDOW};
use crate::sheet::plot::{self, LEADING, Plot};
use crate::units::{Finite, System};
use crate::wording::font;
use crate::wording::{Place, figure, per_unit};

/// The window, in the values of the plot.
#[derive(Clone, Copy)]
pub(super) enum Window {
    Across(f64, f64),
    Up(f64, f64),
    Unknown,
}

/// The limits of a load at a test length, in the values of the plot.
pub(super) struct Bar {
    /// The length.
    pub at: f64,
    /// Lower limit.
    pub lower: Option<f64>,
    /// Upper limit.
    pub upper: Option<f64>,
    words: String,
}

impl Bar {
    /// Limits at a length, with their words.
    pub(super) fn new(at: f64, lower: Option<f64>, upper: Option<f64>, words: String) -> Self {
        Self {
            at,
            lower,
            upper,
            words,
        }
    }
}

/// The window in the values of a plot of these curves.
pub(super) fn window(
    record: &AcceptRecord,
    curves: &[&Reduced],
    axis: Axis,
    show_in: System,
) -> Window {
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

/// Draws the window.
pub(super) fn draw_window(sheet: &mut Sheet<'_>, plot: &Plot, window: Window) -> Drawn {
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

/// The limits at the test lengths.
pub(super) fn bars(record: &AcceptRecord, show_in: System) -> Vec<Bar> {
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

/// Draws the limits, each with its words to the left of its upper end.
pub(super) fn draw_bars(sheet: &mut Sheet<'_>, plot: &Plot, bars: &[Bar]) -> Drawn {
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

//! What a drawing leads to expect: the predicted line with its band, the limits at the test lengths, the window, and
//! where the travel ends.

use super::bounds::{Bar, Window, draw_bars, draw_window};
use super::{Chart, chart};
use crate::quantity::Unit;
use crate::record::{Expected, SpringBuckling, StageFacts, WindowOf};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Anchor, Drawn, FAILS, FIELD, INK, LIMIT, Sheet, TYPE, WIDTH, WINDOW};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::{Finite, System};
use crate::wording::font;
use crate::wording::{Place, figure, per_unit, unit_symbol, with_unit};

/// Height of the plot.
const TALL: f64 = 270.0;
/// Room above the plot for the names of the places where the travel ends.
const NAMES: f64 = LEADING * 1.2;
const CAPTION: &str = "Theory: load over length, lengths falling to the right. The band holds twice the standard uncertainty of the rate and the drawn \
     tolerance of the free length; nothing was measured. Lc solid length, Ln smallest permitted test length, LK where a spring buckles as \
     it is seated.";

/// The chart.
///
/// # Errors
/// [`ChartError`].
pub(crate) fn expected(of: &Expected, show_in: System) -> Result<Vec<Chart>, ChartError> {
    let drawn = Drawing::new(of, show_in);
    let made = chart(
        "expected",
        "Predicted load–deflection line",
        CAPTION.to_owned(),
        plot::legend_height(&drawn.entries()) + NAMES + LEADING * 1.6 + TALL + LEADING * 2.6,
        |sheet| drawn.draw(sheet, show_in),
    );
    Ok(vec![made?])
}

/// Everything in the values of the plot.
struct Drawing {
    line: Vec<(f64, f64)>,
    lower: Vec<(f64, f64)>,
    upper: Vec<(f64, f64)>,
    bars: Vec<Bar>,
    window: Window,
    ends: Vec<(String, f64)>,
    buckling: Vec<f64>,
}

impl Drawing {
    fn new(of: &Expected, show_in: System) -> Self {
        let length = per_unit(Unit::Millimetre, show_in);
        let set = &of.theory;
        let solid = set.solid_length_mm.get();
        let band = |sign: f64| {
            let shift = sign * of.free_length_tolerance_mm.get();
            let rate = |stage: &StageFacts| {
                stage.rate_n_per_mm.get() + sign * 2.0 * stage.rate_standard_uncertainty.get()
            };
            shown(&path(&of.stages, shift, solid, rate), show_in)
        };
        let plain = |stage: &StageFacts| stage.rate_n_per_mm.get();
        let free = set.free_length_mm.get();
        let buckling = of.outlooks.iter().filter_map(|one| match one.buckling {
            SpringBuckling::From { deflection_mm } => Some((free - deflection_mm.get()) / length),
            _ => None,
        });
        Self {
            line: shown(&path(&of.stages, 0.0, solid, plain), show_in),
            lower: band(-1.0),
            upper: band(1.0),
            bars: bars(of, show_in),
            window: window(of, show_in),
            ends: vec![
                ("Lc".to_owned(), solid / length),
                ("Ln".to_owned(), set.smallest_length_mm.get() / length),
            ],
            buckling: buckling.filter(|at| *at * length > solid).collect(),
        }
    }

    fn entries(&self) -> Vec<Entry> {
        let mut entries = vec![
            (Sample::Line(FIELD, 2.0), "theory".to_owned()),
            (
                Sample::Patch(FIELD, 0.18),
                "its band (k = 2, free length as toleranced)".to_owned(),
            ),
        ];
        if !matches!(self.window, Window::Unknown) {
            entries.push((Sample::Patch(WINDOW, 0.22), "window of the rate".to_owned()));
        }
        if !self.bars.is_empty() {
            entries.push((
                Sample::Line(LIMIT, 2.4),
                "limits of the load at a test length".to_owned(),
            ));
        }
        entries
    }

    fn draw(&self, sheet: &mut Sheet<'_>, show_in: System) -> Drawn {
        let entries = self.entries();
        let plot = self.laid_out(&entries);
        plot::legend(sheet, &entries)?;
        let (force, length) = (
            unit_symbol(Unit::Newton, show_in),
            unit_symbol(Unit::Millimetre, show_in),
        );
        plot::upward_axis(sheet, &plot, 7, &format!("load F ({force})"))?;
        plot::across_axis(sheet, &plot, 9, &format!("length L ({length})"))?;
        draw_window(sheet, &plot, self.window)?;
        let ring = self.lower.iter().chain(self.upper.iter().rev());
        let ring: Vec<_> = ring.map(|point| plot.at(*point)).collect();
        sheet.area(&ring, FIELD, 0.18)?;
        let line: Vec<_> = self.line.iter().map(|point| plot.at(*point)).collect();
        sheet.line(&line, FIELD, 2.0)?;
        for (name, at) in &self.ends {
            ending(sheet, &plot, name, *at, INK)?;
        }
        for at in &self.buckling {
            ending(sheet, &plot, "LK", *at, FAILS)?;
        }
        draw_bars(sheet, &plot, &self.bars)?;
        plot::frame(sheet, &plot)
    }

    fn laid_out(&self, entries: &[Entry]) -> Plot {
        let points = || self.lower.iter().chain(&self.upper);
        let ends = self.ends.iter().map(|(_, at)| *at);
        let x = plot::range(points().map(|point| point.0).chain(ends), 0.03);
        let limits = self.bars.iter().flat_map(|bar| [bar.lower, bar.upper]);
        let y = plot::range(
            points()
                .map(|point| point.1)
                .chain(limits.flatten())
                .chain([0.0]),
            0.04,
        );
        let top = plot::legend_height(entries) + NAMES + LEADING * 1.6;
        let left = EDGE + plot::labels_width(y, 7) + 10.0;
        Plot {
            x: Scale {
                value: (x.1, x.0),
                paper: (left, WIDTH - EDGE * 2.0),
            },
            y: Scale {
                value: y,
                paper: (top + TALL, top),
            },
        }
    }
}

/// A dashed line across the plot at a length, its name above.
fn ending(
    sheet: &mut Sheet<'_>,
    plot: &Plot,
    name: &str,
    at: f64,
    colour: plotters::style::RGBColor,
) -> Drawn {
    let (bottom, top) = plot.y.paper;
    let x = plot.x.at(at);
    sheet.dashes((x, bottom), (x, top), colour, 1.2)?;
    let half = font::width(name, TYPE, false) / 2.0;
    let middle = x.clamp(plot.x.paper.0 + half, plot.x.paper.1 - half);
    sheet.text(name, (middle, top - 8.0), Anchor::Middle, colour)
}

/// Length and load from the free length to solid, mm and N: every stage with its rate by `rate`, all lengths shifted.
fn path(
    stages: &[StageFacts],
    shift: f64,
    solid: f64,
    rate: impl Fn(&StageFacts) -> f64,
) -> Vec<(f64, f64)> {
    let mut points = Vec::new();
    let mut load = 0.0;
    for (place, stage) in stages.iter().enumerate() {
        let from = stage.from_length_mm.get() + shift;
        let to = stages
            .get(place + 1)
            .map_or(solid, |next| next.from_length_mm.get() + shift);
        points.push((from, load));
        load += rate(stage) * (from - to);
        points.push((to, load));
    }
    points
}

fn shown(points: &[(f64, f64)], show_in: System) -> Vec<(f64, f64)> {
    let (length, force) = (
        per_unit(Unit::Millimetre, show_in),
        per_unit(Unit::Newton, show_in),
    );
    points
        .iter()
        .map(|(at, load)| (at / length, load / force))
        .collect()
}

/// The limits of the loads; a load without limits of its own is a point.
fn bars(of: &Expected, show_in: System) -> Vec<Bar> {
    let force = per_unit(Unit::Newton, show_in);
    let bar = |one: &crate::record::ExpectedRequirement| {
        let at = one.at_length_mm?;
        let value = |value: Option<Finite>| value.map(|value| value.get() / force);
        let stated = |value: Option<Finite>| figure(value, Unit::Newton, Place::Stated, show_in);
        let words = format!(
            "L {}: {} … {}",
            with_unit(Some(at), Unit::Millimetre, Place::Stated, show_in),
            stated(one.lower),
            stated(one.upper)
        );
        let at = at.get() / per_unit(Unit::Millimetre, show_in);
        Some(Bar::new(at, value(one.lower), value(one.upper), words))
    };
    of.requirements.iter().filter_map(bar).collect()
}

fn window(of: &Expected, show_in: System) -> Window {
    let (from, to) = (of.window.from.get(), of.window.to.get());
    let (length, force) = (
        per_unit(Unit::Millimetre, show_in),
        per_unit(Unit::Newton, show_in),
    );
    let free = of.theory.free_length_mm.get();
    match of.window.of {
        WindowOf::Load => Window::Up(from / force, to / force),
        WindowOf::Length => Window::Across(from / length, to / length),
        WindowOf::Deflection => Window::Across((free - from) / length, (free - to) / length),
        WindowOf::Travel => Window::Unknown,
    }
}

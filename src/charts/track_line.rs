//! One line over lots: values, limits of each lot, what they are held against.

use crate::record::Verdict;
use crate::sheet::canvas::{
    Anchor, Drawn, FAINT, FIELD, INK, LIMIT, OPEN, Sheet, THEORY, TYPE, WIDTH,
};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Scale};
use crate::wording::font;

/// Height of a plot.
pub(super) const TALL: f64 = 150.0;

/// A line of values over lots, and what it is held against.
#[derive(Default)]
pub(super) struct Line {
    pub(super) values: Vec<Option<f64>>,
    /// A second line in the same plot.
    pub(super) beside: Vec<Option<f64>>,
    /// Limits of each lot, lower and upper.
    pub(super) limits: Vec<Option<(f64, f64)>>,
    pub(super) centre: Option<f64>,
    pub(super) drawing: Vec<f64>,
    pub(super) nominal: Option<f64>,
    pub(super) fires: Vec<bool>,
    /// Words for a point, a point that stands out, the dashes.
    pub(super) words: Option<[&'static str; 3]>,
    pub(super) labels: Vec<String>,
    pub(super) baseline: Vec<bool>,
}

/// Draws it under its legend.
pub(super) fn draw(sheet: &mut Sheet<'_>, line: &Line, entries: &[Entry], unit: &str) -> Drawn {
    let ends = line
        .limits
        .iter()
        .flatten()
        .flat_map(|(low, high)| [*low, *high]);
    let values = line.values.iter().chain(&line.beside).flatten().copied();
    let y = plot::range(
        values
            .chain(ends)
            .chain(line.drawing.iter().copied())
            .chain(line.nominal),
        0.06,
    );
    let top = plot::legend_height(entries) + LEADING * 1.6;
    let last = line.values.len().max(2) as f64 - 1.0;
    let plot = Plot {
        x: Scale {
            value: (-0.02 * last, 1.02 * last),
            paper: (EDGE + plot::labels_width(y, 6) + 10.0, WIDTH - EDGE),
        },
        y: Scale {
            value: y,
            paper: (top + TALL, top),
        },
    };
    plot::legend(sheet, entries)?;
    let first = line.baseline.iter().position(|of| *of);
    if let (Some(first), Some(last)) = (first, line.baseline.iter().rposition(|of| *of)) {
        let left = plot.x.at(first as f64 - 0.5).max(plot.x.paper.0);
        let corner = (plot.x.at(last as f64 + 0.5), plot.y.paper.1);
        sheet.block((left, plot.y.paper.0), corner, FIELD, 0.06)?;
    }
    plot::upward_axis(sheet, &plot, 6, unit)?;
    across(sheet, &plot, line)?;
    points(sheet, &plot, line)?;
    labels(sheet, &plot, &line.labels)?;
    plot::frame(sheet, &plot)
}

/// What goes straight across, and the limits of each lot.
fn across(sheet: &mut Sheet<'_>, plot: &Plot, line: &Line) -> Drawn {
    let (left, right) = plot.x.paper;
    for bound in &line.drawing {
        let at = plot.y.at(*bound);
        sheet.line(&[(left, at), (right, at)], LIMIT, 1.8)?;
    }
    if let Some(nominal) = line.nominal {
        let at = plot.y.at(nominal);
        sheet.dashes((left, at), (right, at), THEORY, 1.4)?;
    }
    if let Some(centre) = line.centre {
        let at = plot.y.at(centre);
        sheet.line(&[(left, at), (right, at)], FAINT, 1.0)?;
    }
    for upper in [false, true] {
        let mut place = 0;
        // Stretches of equal limits are one line.
        for stretch in line.limits.chunk_by(|one, next| one == next) {
            let to = place + stretch.len();
            if let Some(Some(limits)) = stretch.first() {
                let at = plot.y.at(if upper { limits.1 } else { limits.0 });
                let ends =
                    [place as f64 - 0.5, to as f64 - 0.5].map(|x| plot.x.at(x).clamp(left, right));
                let [from, till] = ends;
                sheet.dashes((from, at), (till, at), OPEN, 1.4)?;
            }
            place = to;
        }
    }
    Ok(())
}

fn points(sheet: &mut Sheet<'_>, plot: &Plot, line: &Line) -> Drawn {
    for values in [&line.values, &line.beside] {
        let path: Vec<(f64, f64)> = values
            .iter()
            .enumerate()
            .filter_map(|(place, value)| value.map(|value| plot.at((place as f64, value))))
            .collect();
        if path.len() > 1 {
            sheet.line(&path, FIELD, 0.9)?;
        }
    }
    let size = if line.values.len() > 100 { 2.2 } else { 3.6 };
    for (place, fires) in line.fires.iter().enumerate() {
        let limits = line.limits.get(place).copied().flatten();
        for values in [&line.values, &line.beside] {
            let Some(Some(value)) = values.get(place) else {
                continue;
            };
            // Of two lines in one plot only the one that is beyond its limit stands out.
            let beyond = limits.is_some_and(|(low, high)| *value < low || *value > high);
            let mark = if *fires && (line.beside.is_empty() || beyond) {
                Verdict::Fails
            } else {
                Verdict::Conforms
            };
            sheet.mark(mark, plot.at((place as f64, *value)), size)?;
        }
    }
    Ok(())
}

/// Names under the points, as many as keep clear of each other; the last one first.
fn labels(sheet: &mut Sheet<'_>, plot: &Plot, names: &[String]) -> Drawn {
    let mut free = WIDTH - EDGE + 1.0;
    for (place, name) in names.iter().enumerate().rev() {
        let text = font::shortened(&font::fitting(name), TYPE, 64.0);
        let half = font::width(&text, TYPE, false) / 2.0;
        let x = plot.x.at(place as f64).min(WIDTH - EDGE - half);
        if x + half < free && x - half > plot.x.paper.0 - 20.0 {
            let at = (x, plot.y.paper.0 + LEADING * 0.75);
            sheet.text(&text, at, Anchor::Middle, INK)?;
            free = x - half - 10.0;
        }
    }
    Ok(())
}

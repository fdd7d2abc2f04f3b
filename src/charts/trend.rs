//! The error of one quantity of a reference spring over the checks on record.

use jiff::civil::Date;

use super::check::mark;
use super::{Chart, chart};
use crate::record::{CheckRecord, EarlierCheck, Verdict};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Anchor, Drawn, FAINT, LIMIT, Sheet, TYPE, WIDTH, colour};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::System;
use crate::wording;
use crate::wording::{font, per_unit, unit_symbol};

/// Height of the plot.
const TALL: f64 = 150.0;

/// One point of a trend.
struct Point {
    date: Date,
    error: f64,
    expanded: f64,
    verdict: Verdict,
}

/// The error of one quantity over earlier checks and this one; `None` where there are no earlier ones.
pub(super) fn trend(
    record: &CheckRecord,
    place: usize,
    show_in: System,
) -> Result<Option<Chart>, ChartError> {
    let Some(of) = record.comparisons.get(place) else {
        return Ok(None);
    };
    let scale = per_unit(of.unit, show_in);
    let same = |one: &&EarlierCheck| one.name == of.name && one.at_length_mm == of.at_length_mm;
    let mut points: Vec<Point> = record
        .earlier
        .iter()
        .filter(same)
        .map(|one| Point {
            date: one.date,
            error: one.error.get() / scale,
            expanded: one.expanded_uncertainty.get() / scale,
            verdict: if one.e_n.get().abs() > 1.0 {
                Verdict::Fails
            } else {
                Verdict::Conforms
            },
        })
        .collect();
    if points.is_empty() {
        return Ok(None);
    }
    if let (Some(error), Some(expanded)) = (of.error, of.expanded_uncertainty) {
        points.push(Point {
            date: record.judged_at,
            error: error.get() / scale,
            expanded: expanded.get() / scale,
            verdict: mark(of.finding),
        });
    }
    let allowed = of.allowed_error.map(|allowed| allowed.get() / scale);
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    let file = match of.at_length_mm {
        Some(at) => format!("trend-{}-at-{}-mm", of.name, at.get()),
        None => format!("trend-{}", of.name),
    };
    let unit = unit_symbol(of.unit, show_in);
    let title = format!("Error of the {name} over the checks on record");
    let caption = format!(
        "Measured less certified with the interval ± U (k = 2), {} earlier and this one (the last).",
        wording::count(
            u64::try_from(points.len().saturating_sub(1)).unwrap_or(u64::MAX),
            "check"
        )
    );
    let entries = trend_entries(&points, allowed.is_some());
    let height = plot::legend_height(&entries) + LEADING * 1.6 + TALL + LEADING * 1.6;
    chart(&file, &title, caption, height, |sheet| {
        draw_trend(
            sheet,
            &points,
            allowed,
            &entries,
            &format!("error ({unit})"),
        )
    })
    .map(Some)
}

fn trend_entries(points: &[Point], allowed: bool) -> Vec<Entry> {
    let mut entries: Vec<Entry> = [
        (Verdict::Conforms, "agrees"),
        (Verdict::Fails, "does not"),
        (Verdict::Undecided, "cannot tell"),
    ]
    .into_iter()
    .filter(|(verdict, _)| points.iter().any(|point| point.verdict == *verdict))
    .map(|(verdict, words)| (Sample::Mark(verdict), words.to_owned()))
    .collect();
    if allowed {
        entries.push((Sample::Line(LIMIT, 1.8), "error allowed now".to_owned()));
    }
    entries
}

fn draw_trend(
    sheet: &mut Sheet<'_>,
    points: &[Point],
    allowed: Option<f64>,
    entries: &[Entry],
    title: &str,
) -> Drawn {
    let bounds = allowed.into_iter().flat_map(|allowed| [-allowed, allowed]);
    let ends = points
        .iter()
        .flat_map(|point| [point.error - point.expanded, point.error + point.expanded]);
    let y = plot::range(ends.chain(bounds).chain([0.0]), 0.06);
    let top = plot::legend_height(entries) + LEADING * 1.6;
    let first = points.first().map_or(Date::ZERO, |point| point.date);
    let days = |date: Date| date.duration_since(first).as_hours() as f64 / 24.0;
    let span = points
        .iter()
        .map(|point| days(point.date))
        .fold(1.0, f64::max);
    let plot = Plot {
        x: Scale {
            value: (-0.04 * span, 1.04 * span),
            paper: (EDGE + plot::labels_width(y, 6) + 10.0, WIDTH - EDGE),
        },
        y: Scale {
            value: y,
            paper: (top + TALL, top),
        },
    };
    plot::legend(sheet, entries)?;
    plot::upward_axis(sheet, &plot, 6, title)?;
    let across = |value: f64| {
        [
            (plot.x.paper.0, plot.y.at(value)),
            (plot.x.paper.1, plot.y.at(value)),
        ]
    };
    sheet.line(&across(0.0), FAINT, 1.2)?;
    if let Some(allowed) = allowed {
        for bound in [-allowed, allowed] {
            sheet.line(&across(bound), LIMIT, 1.8)?;
        }
    }
    for point in points {
        let x = plot.x.at(days(point.date));
        let ends = [point.error - point.expanded, point.error + point.expanded];
        sheet.line(
            &ends.map(|end| (x, plot.y.at(end))),
            colour(point.verdict),
            1.3,
        )?;
        sheet.mark(point.verdict, (x, plot.y.at(point.error)), 4.0)?;
    }
    dates(sheet, &plot, points, &days)?;
    plot::frame(sheet, &plot)
}

/// Dates under the points, as many as keep clear of each other; the last one first.
fn dates(
    sheet: &mut Sheet<'_>,
    plot: &Plot,
    points: &[Point],
    days: &dyn Fn(Date) -> f64,
) -> Drawn {
    let mut free = WIDTH - EDGE + 1.0;
    for point in points.iter().rev() {
        let text = point.date.to_string();
        let half = font::width(&text, TYPE, false) / 2.0;
        let x = plot.x.at(days(point.date)).min(WIDTH - EDGE - half);
        if x + half < free {
            sheet.text(
                &text,
                (x, plot.y.paper.0 + LEADING * 0.75),
                Anchor::Middle,
                FAINT,
            )?;
            free = x - half - 10.0;
        }
    }
    Ok(())
}

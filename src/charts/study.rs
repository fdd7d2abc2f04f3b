//! Charts of a repeatability study: every measurement about its spring's mean, and what makes up the variation.

use super::{Chart, chart};
use crate::record::{RepeatRecord, StudyFacts, Verdict};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Anchor, Drawn, FAINT, FIELD, INK, LIMIT, Sheet, TYPE, WIDTH, WINDOW};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::System;
use crate::wording;
use crate::wording::{font, per_unit, percent, unit_symbol};

/// Height of the plot of the measurements.
const TALL: f64 = 150.0;
/// Height of a row of the shares.
const ROW: f64 = 36.0;
/// Share of the tolerance up to which a bench serves, for the line in the chart.
const SERVES: f64 = 0.3;

/// The charts of a study.
///
/// # Errors
/// [`ChartError`] where the drawing library refuses.
pub(crate) fn study(record: &RepeatRecord, show_in: System) -> Result<Vec<Chart>, ChartError> {
    let mut charts = Vec::new();
    for of in &record.studies {
        charts.push(deviations(record, of, show_in)?);
    }
    for of in &record.studies {
        charts.push(shares(of, show_in)?);
    }
    Ok(charts)
}

fn file(what: &str, of: &StudyFacts) -> String {
    match of.at_length_mm {
        Some(at) => format!("{what}-{}-at-{}-mm", of.name, at.get()),
        None => format!("{what}-{}", of.name),
    }
}

/// One cell of the study: place across, the deviations of its values.
struct Column {
    operator: usize,
    values: Vec<f64>,
}

fn columns(record: &RepeatRecord, of: &StudyFacts, scale: f64) -> Vec<Column> {
    let mut columns = Vec::new();
    for (operator, by) in record.operators.iter().enumerate() {
        for part in &record.parts {
            let all: Vec<f64> = of
                .values
                .iter()
                .filter(|one| one.part == *part)
                .map(|one| one.value.get())
                .collect();
            let mean = all.iter().sum::<f64>() / (all.len() as f64).max(1.0);
            let mine = of
                .values
                .iter()
                .filter(|one| one.part == *part && one.operator == *by);
            columns.push(Column {
                operator,
                values: mine.map(|one| (one.value.get() - mean) / scale).collect(),
            });
        }
    }
    columns
}

/// Every measurement less the mean of its spring, operator by operator.
fn deviations(
    record: &RepeatRecord,
    of: &StudyFacts,
    show_in: System,
) -> Result<Chart, ChartError> {
    let scale = per_unit(of.unit, show_in);
    let columns = columns(record, of, scale);
    let sd = of.within_spring.get() / scale;
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    let entries: Vec<Entry> = vec![
        (Sample::Mark(Verdict::Conforms), "measurement".to_owned()),
        (
            Sample::Patch(WINDOW, 0.2),
            "± 2 s within a spring".to_owned(),
        ),
    ];
    let title = format!("{} about each spring’s mean", wording::sentence(&name));
    let caption = "Every measurement less the mean of its spring, spring by spring in the order of page one; a line joins the \
                   repeats of one operator."
        .to_owned();
    let height = plot::legend_height(&entries) + LEADING * 1.6 + TALL + LEADING * 1.8;
    chart(&file("repeats", of), &title, caption, height, |sheet| {
        let title = format!("deviation ({})", unit_symbol(of.unit, show_in));
        draw(sheet, record, &columns, sd, &entries, &title)
    })
}

fn draw(
    sheet: &mut Sheet<'_>,
    record: &RepeatRecord,
    columns: &[Column],
    sd: f64,
    entries: &[Entry],
    title: &str,
) -> Drawn {
    let values = columns
        .iter()
        .flat_map(|column| column.values.iter().copied());
    let y = plot::range(values.chain([-2.0 * sd, 2.0 * sd]), 0.08);
    let top = plot::legend_height(entries) + LEADING * 1.6;
    let plot = Plot {
        x: Scale {
            value: (0.0, columns.len() as f64),
            paper: (EDGE + plot::labels_width(y, 6) + 10.0, WIDTH - EDGE),
        },
        y: Scale {
            value: y,
            paper: (top + TALL, top),
        },
    };
    plot::legend(sheet, entries)?;
    let corner = |x: f64, y: f64| (plot.x.at(x), plot.y.at(y));
    sheet.block(
        corner(0.0, -2.0 * sd),
        corner(columns.len() as f64, 2.0 * sd),
        WINDOW,
        0.2,
    )?;
    plot::upward_axis(sheet, &plot, 6, title)?;
    sheet.line(
        &[corner(0.0, 0.0), corner(columns.len() as f64, 0.0)],
        FAINT,
        1.2,
    )?;
    for (number, column) in columns.iter().enumerate() {
        let x = number as f64 + 0.5;
        let low = column.values.iter().copied().fold(f64::INFINITY, f64::min);
        let high = column
            .values
            .iter()
            .copied()
            .fold(f64::NEG_INFINITY, f64::max);
        sheet.line(&[corner(x, low), corner(x, high)], FIELD, 1.3)?;
        for value in &column.values {
            sheet.mark(Verdict::Conforms, corner(x, *value), 3.4)?;
        }
    }
    operators(sheet, record, columns, &plot)?;
    plot::frame(sheet, &plot)
}

/// The operators' names under their springs, and a line between two of them.
fn operators(
    sheet: &mut Sheet<'_>,
    record: &RepeatRecord,
    columns: &[Column],
    plot: &Plot,
) -> Drawn {
    let parts = record.parts.len() as f64;
    for (number, name) in record.operators.iter().enumerate() {
        let from = number as f64 * parts;
        let here = columns
            .iter()
            .filter(|column| column.operator == number)
            .count() as f64;
        let middle = plot.x.at(from + here / 2.0);
        let room = plot.x.at(from + here) - plot.x.at(from) - 8.0;
        let words = if name.is_empty() {
            wording::count(
                u64::try_from(record.parts.len()).unwrap_or(u64::MAX),
                "spring",
            )
        } else {
            format!("operator {name}")
        };
        let words = font::shortened(&words, TYPE, room);
        sheet.text(
            &words,
            (middle, plot.y.paper.0 + LEADING * 0.9),
            Anchor::Middle,
            INK,
        )?;
        if number > 0 {
            let x = plot.x.at(from);
            sheet.line(&[(x, plot.y.paper.0), (x, plot.y.paper.1)], FAINT, 1.0)?;
        }
    }
    Ok(())
}

/// A source of variation: its name, its share of the study, its share of the tolerance.
type Share = (String, f64, Option<f64>);

/// What makes up the variation: each source's share of the study variation and of the tolerance.
fn shares(of: &StudyFacts, show_in: System) -> Result<Chart, ChartError> {
    let rows: Vec<Share> = of
        .shares
        .iter()
        .filter(|share| share.source != "total")
        .map(|share| {
            let name = wording::sentence(wording::component_word(&share.source));
            let get = |value: Option<crate::units::Finite>| value.map(crate::units::Finite::get);
            (
                name,
                get(share.of_study).unwrap_or(0.0),
                get(share.of_tolerance),
            )
        })
        .collect();
    let limited = rows.iter().any(|row| row.2.is_some());
    let mut entries: Vec<Entry> = vec![(
        Sample::Patch(FIELD, 0.75),
        "s over that of the study".to_owned(),
    )];
    if limited {
        entries.push((
            Sample::Patch(WINDOW, 0.75),
            "6 s over the tolerance".to_owned(),
        ));
        entries.push((Sample::Line(LIMIT, 1.8), "30 % of the tolerance".to_owned()));
    }
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    let title = format!("What the {name} varies by");
    let caption = "Standard deviations, so that the bars of one colour do not add up to the whole. What is within a spring goes into the rig file."
        .to_owned();
    let top = plot::legend_height(&entries) + LEADING * 0.5;
    let tall = ROW * rows.len() as f64;
    chart(
        &file("shares", of),
        &title,
        caption,
        top + tall + LEADING * 2.4,
        |sheet| draw_shares(sheet, &rows, limited, &entries, (top, tall)),
    )
}

fn draw_shares(
    sheet: &mut Sheet<'_>,
    rows: &[Share],
    limited: bool,
    entries: &[Entry],
    (top, tall): (f64, f64),
) -> Drawn {
    let widest = rows
        .iter()
        .map(|row| font::width(&row.0, TYPE, false))
        .fold(0.0, f64::max);
    let shares = rows.iter().flat_map(|row| [Some(row.1), row.2]).flatten();
    let most = 100.0 * shares.fold(1.0, f64::max) * 1.12;
    let plot = Plot {
        x: Scale {
            value: (0.0, most),
            paper: (EDGE + widest + 10.0, WIDTH - EDGE),
        },
        y: Scale {
            value: (0.0, 1.0),
            paper: (top + tall, top),
        },
    };
    plot::legend(sheet, entries)?;
    plot::across_axis(sheet, &plot, 8, "%")?;
    for (number, (name, study, tolerance)) in rows.iter().enumerate() {
        let middle = top + ROW * (number as f64 + 0.5);
        sheet.text(name, (plot.x.paper.0 - 8.0, middle), Anchor::End, INK)?;
        bar(sheet, &plot, *study, (middle - 14.0, middle - 1.0), FIELD)?;
        if let Some(tolerance) = tolerance {
            bar(
                sheet,
                &plot,
                *tolerance,
                (middle + 1.0, middle + 14.0),
                WINDOW,
            )?;
        }
    }
    if limited {
        let x = plot.x.at(100.0 * SERVES);
        sheet.line(&[(x, top), (x, top + tall)], LIMIT, 1.8)?;
    }
    plot::frame(sheet, &plot)
}

fn bar(
    sheet: &mut Sheet<'_>,
    plot: &Plot,
    share: f64,
    (from, to): (f64, f64),
    colour: plotters::style::RGBColor,
) -> Drawn {
    let end = plot.x.at(100.0 * share);
    sheet.block((plot.x.at(0.0), from), (end, to), colour, 0.75)?;
    let words = percent(Some(share));
    let middle = f64::midpoint(from, to);
    sheet.text(&words, (end + 4.0, middle), Anchor::Start, FAINT)
}

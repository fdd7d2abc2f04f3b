//! Charts of a check: E_n of each quantity, the error over earlier checks, the give of the frame.

use super::trend::trend;
use super::{Chart, chart};
use crate::quantity::Unit;
use crate::record::{CheckRecord, Finding, FrameFacts, Verdict};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Anchor, FAINT, INK, LIMIT, THEORY, TYPE, WIDTH, WINDOW, colour};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::System;
use crate::wording;
use crate::wording::{font, per_unit, unit_symbol};

/// Height of a row of the E_n chart, and of the frame's plot.
const ROW: f64 = 24.0;
const TALL_FRAME: f64 = 210.0;

/// The charts of a check; `readings` are load (N) and give (mm) of the plates' run.
///
/// # Errors
/// [`ChartError`] where the drawing library refuses.
pub(crate) fn check(
    record: &CheckRecord,
    readings: &[(f64, f64)],
    show_in: System,
) -> Result<Vec<Chart>, ChartError> {
    let mut charts = Vec::new();
    if record.comparisons.iter().any(|of| of.e_n.is_some()) {
        charts.push(numbers(record, show_in)?);
    }
    for place in 0..record.comparisons.len() {
        charts.extend(trend(record, place, show_in)?);
    }
    if let Some(frame) = &record.frame {
        charts.push(give(frame, readings, show_in)?);
    }
    Ok(charts)
}

pub(super) const fn mark(of: Finding) -> Verdict {
    match of {
        Finding::Serves => Verdict::Conforms,
        Finding::Disagrees | Finding::BeyondShare => Verdict::Fails,
        Finding::CannotTell | Finding::Scattered | Finding::NotMeasured => Verdict::Undecided,
    }
}

/// E_n of each quantity on one scale.
fn numbers(record: &CheckRecord, show_in: System) -> Result<Chart, ChartError> {
    let rows: Vec<(String, Finding, f64)> = record
        .comparisons
        .iter()
        .filter_map(|of| {
            let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
            Some((wording::sentence(&name), of.finding, of.e_n?.get()))
        })
        .collect();
    let entries: Vec<Entry> = [
        (Finding::Serves, "agrees"),
        (Finding::Disagrees, "does not agree, or is too far off"),
        (Finding::CannotTell, "cannot tell"),
    ]
    .into_iter()
    .filter(|(of, _)| rows.iter().any(|row| mark(row.1) == mark(*of)))
    .map(|(of, words)| (Sample::Mark(mark(of)), words.to_owned()))
    .chain([(Sample::Patch(WINDOW, 0.2), "|E_n| ≤ 1".to_owned())])
    .collect();
    let top = plot::legend_height(&entries) + LEADING * 0.4;
    let tall = ROW * rows.len() as f64;
    let most = rows.iter().map(|row| row.2.abs()).fold(1.0, f64::max) * 1.15;
    let left = EDGE
        + 10.0
        + rows
            .iter()
            .map(|row| font::width(&row.0, TYPE, false))
            .fold(0.0, f64::max);
    let plot = Plot {
        x: Scale {
            value: (-most, most),
            paper: (left, WIDTH - EDGE),
        },
        y: Scale {
            value: (0.0, rows.len() as f64),
            paper: (top, top + tall),
        },
    };
    let across = Plot {
        y: Scale {
            paper: (top + tall, top),
            ..plot.y
        },
        ..plot
    };
    let caption = "E_n of each quantity of the reference spring: the error over both expanded uncertainties. Whether an error is \
                   also within its share of the tolerance stands in the table."
        .to_owned();
    chart(
        "e-n",
        "E_n of the reference spring",
        caption,
        top + tall + LEADING * 2.4,
        |sheet| {
            plot::legend(sheet, &entries)?;
            sheet.block(
                (plot.x.at(-1.0), top),
                (plot.x.at(1.0), top + tall),
                WINDOW,
                0.2,
            )?;
            plot::across_axis(sheet, &across, 8, "E_n")?;
            let zero = plot.x.at(0.0);
            sheet.line(&[(zero, top), (zero, top + tall)], FAINT, 1.2)?;
            for (number, (name, finding, e_n)) in rows.iter().enumerate() {
                let y = plot.y.at(number as f64 + 0.5);
                sheet.text(name, (left - 8.0, y), Anchor::End, INK)?;
                let verdict = mark(*finding);
                sheet.line(&[(zero, y), (plot.x.at(*e_n), y)], colour(verdict), 1.3)?;
                sheet.mark(verdict, (plot.x.at(*e_n), y), 4.5)?;
            }
            plot::frame(sheet, &across)
        },
    )
}

/// The give of the frame over the load: readings, the straight line, the table.
fn give(frame: &FrameFacts, readings: &[(f64, f64)], show_in: System) -> Result<Chart, ChartError> {
    let (force, length) = (
        per_unit(Unit::Newton, show_in),
        per_unit(Unit::Millimetre, show_in),
    );
    let shown = |(load, give): (f64, f64)| (load / force, give / length);
    let readings: Vec<(f64, f64)> = readings.iter().copied().map(shown).collect();
    let most = frame.to_n.get();
    let line = [
        (0.0, 0.0),
        shown((most, frame.compliance_mm_per_n.get() * most)),
    ];
    let start = frame
        .table
        .as_ref()
        .map_or(0.0, |table| offset(table, frame));
    let table: Vec<(f64, f64)> = frame
        .table
        .iter()
        .flatten()
        .skip(1)
        .map(|point| shown((point.load_n.get(), point.give_mm.get() + start)))
        .collect();
    let mut entries: Vec<Entry> = vec![
        (Sample::Mark(Verdict::Conforms), "readings".to_owned()),
        (Sample::Dashes(THEORY), "straight line".to_owned()),
    ];
    if !table.is_empty() {
        entries.push((Sample::Line(LIMIT, 1.8), "table".to_owned()));
    }
    let all = readings.iter().chain(&line).chain(&table);
    let y = plot::range(all.map(|point| point.1), 0.05);
    let top = plot::legend_height(&entries) + LEADING * 1.6;
    let plot = Plot {
        x: Scale {
            value: plot::range([0.0, most / force].into_iter(), 0.02),
            paper: (EDGE + plot::labels_width(y, 6) + 10.0, WIDTH - EDGE),
        },
        y: Scale {
            value: y,
            paper: (top + TALL_FRAME, top),
        },
    };
    let caption = "Travel of the platens on each other over the load, each loading pass from where its own straight line meets no load."
        .to_owned();
    let height = top + TALL_FRAME + LEADING * 2.4;
    chart("frame", "Give of the frame", caption, height, |sheet| {
        plot::legend(sheet, &entries)?;
        plot::upward_axis(
            sheet,
            &plot,
            6,
            &format!("give ({})", unit_symbol(Unit::Millimetre, show_in)),
        )?;
        plot::across_axis(
            sheet,
            &plot,
            8,
            &format!("load ({})", unit_symbol(Unit::Newton, show_in)),
        )?;
        for reading in &readings {
            sheet.mark(Verdict::Conforms, plot.at(*reading), 2.4)?;
        }
        let [from, to] = line.map(|point| plot.at(point));
        sheet.dashes(from, to, THEORY, 1.6)?;
        let table: Vec<(f64, f64)> = table.iter().map(|point| plot.at(*point)).collect();
        if !table.is_empty() {
            sheet.line(&table, LIMIT, 1.8)?;
        }
        plot::frame(sheet, &plot)
    })
}

/// What lies between the table, which starts from no give at no load, and the straight line, so that both meet in the middle.
fn offset(table: &[crate::record::GivePoint], frame: &FrameFacts) -> f64 {
    let rest = table.get(1..).unwrap_or(&[]);
    let off = rest
        .iter()
        .map(|point| frame.compliance_mm_per_n.get() * point.load_n.get() - point.give_mm.get());
    let (sum, count) = off.fold((0.0, 0.0), |(sum, count), one| (sum + one, count + 1.0));
    if count > 0.0 { sum / count } else { 0.0 }
}

//! A characteristic over lots: means, spreads, EWMA, CUSUM, and the rig's own line.

use super::{Chart, chart};
use crate::record::{ChartKind, EarlierCheck, LimitFacts, TrackRecord, Verdict};
use crate::sheet::ChartError;
use crate::sheet::canvas::{
    Anchor, Drawn, FAINT, FIELD, INK, LIMIT, OPEN, Sheet, THEORY, TYPE, WIDTH,
};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::{Finite, System};
use crate::wording::{self, font, per_unit, unit_symbol};

/// Height of a plot.
const TALL: f64 = 150.0;
/// Lots drawn, the newest.
const DRAWN: usize = 400;

/// A line of values over lots, and what it is held against.
#[derive(Default)]
struct Line {
    values: Vec<Option<f64>>,
    /// A second line in the same plot.
    beside: Vec<Option<f64>>,
    /// Limits of each lot, lower and upper.
    limits: Vec<Option<(f64, f64)>>,
    centre: Option<f64>,
    drawing: Vec<f64>,
    nominal: Option<f64>,
    fires: Vec<bool>,
    labels: Vec<String>,
    baseline: Vec<bool>,
}

/// The charts, plots first.
///
/// # Errors
/// [`ChartError`] where the drawing library refuses.
pub(crate) fn tracked(of: &TrackRecord, show_in: System) -> Result<Vec<Chart>, ChartError> {
    if of.mean_limits.is_none() {
        return Ok(Vec::new());
    }
    let unit = unit_symbol(of.unit, show_in);
    let name = wording::characteristic(&of.characteristic, of.at_length_mm, show_in);
    let mut charts = vec![one(
        "means",
        &format!("Means of the lots, {name}"),
        "Limits from the moving ranges of the baseline’s means; the baseline is shaded.",
        &means(of, show_in),
        unit,
    )?];
    if of.lots.iter().any(|lot| lot.spread_limits.is_some()) {
        charts.push(one(
            "spreads",
            &format!("Standard deviations within lots, {name}"),
            "Limits for each lot’s number of springs from the baseline’s pooled spread.",
            &spreads(of, show_in),
            unit,
        )?);
    }
    charts.push(one(
        "ewma",
        &format!("EWMA of the means, {name}"),
        "λ 0.2; slow shifts show here first.",
        &ewma(of, show_in),
        unit,
    )?);
    charts.push(one(
        "cusum",
        &format!("CUSUM of the means, {name}"),
        "Upper sum, and lower sum drawn downwards, in standard deviations of the baseline’s means.",
        &cusum(of),
        "σ",
    )?);
    charts.extend(rig(of, show_in)?);
    Ok(charts)
}

fn skipped(of: &TrackRecord) -> usize {
    of.lots.len().saturating_sub(DRAWN)
}

/// What all charts over lots share.
fn begun(of: &TrackRecord, kind: ChartKind) -> Line {
    let from = skipped(of);
    let mut fires = vec![false; of.lots.len()];
    for alarm in of.alarms.iter().filter(|alarm| alarm.chart == kind) {
        if let Some(fires) = fires.get_mut(alarm.at as usize) {
            *fires = true;
        }
    }
    Line {
        fires: fires.split_off(from),
        labels: of
            .lots
            .iter()
            .skip(from)
            .map(|lot| lot.lot.clone())
            .collect(),
        baseline: of.lots.iter().skip(from).map(|lot| lot.baseline).collect(),
        ..Line::default()
    }
}

fn bounds(limits: Option<&LimitFacts>, scale: f64) -> Option<(f64, f64)> {
    limits.map(|of| (of.lower.get() / scale, of.upper.get() / scale))
}

fn means(of: &TrackRecord, show_in: System) -> Line {
    let scale = per_unit(of.unit, show_in);
    let shown = |value: Option<Finite>| value.map(|value| value.get() / scale);
    let lots = || of.lots.iter().skip(skipped(of));
    Line {
        values: lots().map(|lot| Some(lot.mean.get() / scale)).collect(),
        limits: lots()
            .map(|_| bounds(of.mean_limits.as_ref(), scale))
            .collect(),
        centre: shown(of.mean_limits.map(|limits| limits.centre)),
        drawing: [of.lower, of.upper].into_iter().filter_map(shown).collect(),
        nominal: shown(of.nominal),
        ..begun(of, ChartKind::Mean)
    }
}

fn spreads(of: &TrackRecord, show_in: System) -> Line {
    let scale = per_unit(of.unit, show_in);
    let lots = || of.lots.iter().skip(skipped(of));
    let deviation = |value: Option<Finite>| value.map(|value| value.get() / scale);
    Line {
        values: lots()
            .map(|lot| deviation(lot.standard_deviation))
            .collect(),
        limits: lots()
            .map(|lot| bounds(lot.spread_limits.as_ref(), scale))
            .collect(),
        ..begun(of, ChartKind::Spread)
    }
}

fn ewma(of: &TrackRecord, show_in: System) -> Line {
    let scale = per_unit(of.unit, show_in);
    let lots = || of.lots.iter().skip(skipped(of));
    Line {
        values: lots()
            .map(|lot| lot.ewma.map(|value| value.get() / scale))
            .collect(),
        limits: lots()
            .map(|_| bounds(of.ewma_limits.as_ref(), scale))
            .collect(),
        centre: of.ewma_limits.map(|limits| limits.centre.get() / scale),
        ..begun(of, ChartKind::Ewma)
    }
}

fn cusum(of: &TrackRecord) -> Line {
    let lots = || of.lots.iter().skip(skipped(of));
    let limit = of.cusum_limit.map(|limit| (-limit.get(), limit.get()));
    Line {
        values: lots().map(|lot| lot.cusum_high.map(Finite::get)).collect(),
        beside: lots()
            .map(|lot| lot.cusum_low.map(|low| -low.get()))
            .collect(),
        limits: lots().map(|_| limit).collect(),
        centre: Some(0.0),
        ..begun(of, ChartKind::Cusum)
    }
}

fn one(
    file: &str,
    title: &str,
    caption: &str,
    line: &Line,
    unit: &str,
) -> Result<Chart, ChartError> {
    let mut entries: Vec<Entry> = vec![
        (Sample::Mark(Verdict::Conforms), "lot".to_owned()),
        (Sample::Mark(Verdict::Fails), "a rule fires".to_owned()),
        (Sample::Dashes(OPEN), "limits of the chart".to_owned()),
    ];
    if !line.drawing.is_empty() {
        entries.push((Sample::Line(LIMIT, 1.8), "limits of the drawing".to_owned()));
    }
    if line.nominal.is_some() {
        entries.push((Sample::Dashes(THEORY), "nominal".to_owned()));
    }
    let height = plot::legend_height(&entries) + LEADING * 1.6 + TALL + LEADING * 1.6;
    chart(
        &format!("track-{file}"),
        title,
        caption.to_owned(),
        height,
        |sheet| draw(sheet, line, &entries, unit),
    )
}

fn draw(sheet: &mut Sheet<'_>, line: &Line, entries: &[Entry], unit: &str) -> Drawn {
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
        let mark = if *fires {
            Verdict::Fails
        } else {
            Verdict::Conforms
        };
        for values in [&line.values, &line.beside] {
            if let Some(Some(value)) = values.get(place) {
                sheet.mark(mark, plot.at((place as f64, *value)), size)?;
            }
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

/// The error of the reference spring over the checks of each rig.
fn rig(of: &TrackRecord, show_in: System) -> Result<Vec<Chart>, ChartError> {
    let scale = per_unit(of.unit, show_in);
    let mut lines: Vec<(&str, &str)> = of
        .checks
        .iter()
        .map(|one| (one.rig.as_str(), one.reference.as_str()))
        .collect();
    lines.sort_unstable();
    lines.dedup();
    let mut charts = Vec::new();
    for (number, (rig, reference)) in (1..).zip(lines) {
        let is = |one: &&EarlierCheck| one.rig == rig && one.reference == reference;
        let checks: Vec<&EarlierCheck> = of.checks.iter().filter(is).collect();
        let from = checks.len().saturating_sub(DRAWN);
        let checks = || checks.iter().skip(from);
        let line = Line {
            values: checks().map(|one| Some(one.error.get() / scale)).collect(),
            limits: checks()
                .map(|one| one.expanded_uncertainty.get() / scale)
                .map(|u| Some((-u, u)))
                .collect(),
            centre: Some(0.0),
            fires: checks().map(|one| one.e_n.get().abs() > 1.0).collect(),
            labels: checks().map(|one| one.date.to_string()).collect(),
            ..Line::default()
        };
        let title = format!("The rig’s own line: {rig} on {reference}");
        let caption = "Error of each check on the reference spring, measured less certified; the dashes are ± U (k = 2) of the measured value, a cross is a check that disagrees.";
        charts.push(one(
            &format!("rig-{number}"),
            &title,
            caption,
            &line,
            unit_symbol(of.unit, show_in),
        )?);
    }
    Ok(charts)
}

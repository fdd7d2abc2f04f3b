//! A characteristic over lots: means, spreads, EWMA, CUSUM, and the rig's own line.

use super::track_line::{Line, TALL, draw};
use super::{Chart, chart};
use crate::record::{ChartKind, EarlierCheck, LimitFacts, TrackRecord, Verdict};
use crate::sheet::ChartError;
use crate::sheet::canvas::{LIMIT, OPEN, THEORY};
use crate::sheet::plot::{self, Entry, LEADING, Sample};
use crate::units::{Finite, System};
use crate::wording::{self, per_unit, unit_symbol};

/// Lots drawn, the newest.
const DRAWN: usize = 400;

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
    let lots = ["lot", "a rule fires", "limits of the chart"];
    let [plain, out, dashes] = line.words.unwrap_or(lots);
    let mut entries: Vec<Entry> = vec![
        (Sample::Mark(Verdict::Conforms), plain.to_owned()),
        (Sample::Mark(Verdict::Fails), out.to_owned()),
        (Sample::Dashes(OPEN), dashes.to_owned()),
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
            words: Some(["check", "disagrees", "± U (k = 2) of the measured value"]),
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

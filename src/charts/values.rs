//! One characteristic over the springs: each value with its interval against the limits, and the distribution beside it.

use super::compared::Lines;
use super::{Chart, chart};
use super::{histogram, ids};
use crate::quantity::{Quantity, Unit};
use crate::record::{AcceptRecord, CharacteristicResult, SpringResult, Verdict};
use crate::record::{Key, find, occurring};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Drawn, LIMIT, Sheet, THEORY, WIDTH, colour};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::System;
use crate::wording;
use crate::wording::{Place, per_unit, unit_symbol, with_unit};

/// Height of the plot.
const TALL: f64 = 150.0;
/// Width of the distribution.
const SIDE: f64 = 108.0;

/// A spring's value, in the units of the plot.
pub(super) struct Measured<'a> {
    /// The spring.
    pub id: &'a str,
    /// The verdict on this value; `None` where it informs.
    pub verdict: Option<Verdict>,
    value: f64,
    expanded: f64,
}

/// A chart for every characteristic with limits, and for the rate.
///
/// # Errors
/// [`ChartError`].
pub(super) fn all(record: &AcceptRecord, show_in: System) -> Result<Vec<Chart>, ChartError> {
    let mut charts = Vec::new();
    for ((name, at), unit) in occurring(record) {
        let key = (name, at);
        let found: Vec<&CharacteristicResult> = record
            .springs
            .iter()
            .filter_map(|spring| find(spring, &key))
            .collect();
        let limited = found
            .iter()
            .any(|of| of.lower.is_some() || of.upper.is_some());
        let measured = found.iter().any(|of| of.value.is_some());
        if measured && (limited || key.0 == Quantity::Rate.name()) {
            charts.push(one(record, &key, unit, show_in)?);
        }
    }
    Ok(charts)
}

fn one(record: &AcceptRecord, key: &Key, unit: Unit, show_in: System) -> Result<Chart, ChartError> {
    let values = measured(record, key, per_unit(unit, show_in));
    let first = record
        .springs
        .iter()
        .filter_map(|spring| find(spring, key))
        .find(|of| of.lower.is_some() || of.upper.is_some());
    let lines = Lines::new(record, key, first, per_unit(unit, show_in));
    let name = wording::characteristic(&key.0, key.1, show_in);
    let file = match key.1 {
        Some(at) => format!("{}-at-{}-mm", key.0, at.get()),
        None => key.0.clone(),
    };
    let entries = entries(&values, &lines, first, &record.theory, show_in);
    let bottom = ids::labels_height(&values);
    let height = plot::legend_height(&entries) + LEADING * 1.6 + TALL + bottom;
    let title = format!("{} of each spring", wording::sentence(&name));
    let caption = caption(record, key, &values, &lines);
    chart(&file, &title, caption, height, |sheet| {
        draw(
            sheet,
            &values,
            &lines,
            &entries,
            &format!("{name} ({})", unit_symbol(unit, show_in)),
        )
    })
}

fn measured<'a>(record: &'a AcceptRecord, key: &Key, scale: f64) -> Vec<Measured<'a>> {
    let one = |spring: &'a SpringResult| {
        let of = find(spring, key)?;
        Some(Measured {
            id: &spring.id,
            verdict: of.verdict,
            value: of.value?.get() / scale,
            expanded: of
                .expanded_uncertainty
                .map_or(0.0, |value| value.get() / scale),
        })
    };
    record.springs.iter().filter_map(one).collect()
}

fn caption(record: &AcceptRecord, key: &Key, values: &[Measured<'_>], lines: &Lines) -> String {
    let against = if lines.theory.is_some() {
        "limits and theory"
    } else {
        "limits"
    };
    let beside = if values.len() >= histogram::FEWEST {
        "; to the right the distribution over the springs"
    } else {
        ""
    };
    let without: Vec<String> = record
        .springs
        .iter()
        .filter(|spring| find(spring, key).is_none_or(|of| of.value.is_none()))
        .map(|spring| spring.id.clone())
        .collect();
    let absent = if without.is_empty() {
        String::new()
    } else {
        format!(" Without a value: {}.", wording::list(&without))
    };
    format!(
        "Each spring’s value with its interval ± U (95.45 %) against {against}{beside}.{absent}"
    )
}

fn entries(
    values: &[Measured<'_>],
    lines: &Lines,
    first: Option<&CharacteristicResult>,
    theory: &crate::record::TheoryFacts,
    show_in: System,
) -> Vec<Entry> {
    let mut entries = Vec::new();
    for (verdict, word) in [
        (Verdict::Conforms, "conforms"),
        (Verdict::Fails, "fails"),
        (Verdict::Undecided, "undecided"),
    ] {
        if values
            .iter()
            .any(|value| value.verdict.unwrap_or(Verdict::Conforms) == verdict)
        {
            let word = if values.iter().all(|value| value.verdict.is_none()) {
                "measured"
            } else {
                word
            };
            entries.push((Sample::Mark(verdict), word.to_owned()));
        }
    }
    if let Some(of) = first {
        let stated = |value| with_unit(value, of.unit, Place::Stated, show_in);
        let words = match (of.lower, of.upper) {
            (Some(_), Some(_)) => format!("limits {} and {}", stated(of.lower), stated(of.upper)),
            (Some(_), None) => format!("lower limit {}", stated(of.lower)),
            _ => format!("upper limit {}", stated(of.upper)),
        };
        entries.push((Sample::Line(LIMIT, 1.8), words));
    }
    if lines.theory.is_some() {
        let rate = |value| {
            with_unit(
                Some(value),
                Unit::NewtonPerMillimetre,
                Place::Significant(4),
                show_in,
            )
        };
        entries.push((
            Sample::Dashes(THEORY),
            format!(
                "theory {} (tolerances {} to {})",
                rate(theory.rate_n_per_mm),
                rate(theory.rate_lowest),
                rate(theory.rate_highest)
            ),
        ));
    }
    entries
}

fn draw(
    sheet: &mut Sheet<'_>,
    values: &[Measured<'_>],
    lines: &Lines,
    entries: &[Entry],
    title: &str,
) -> Drawn {
    let beside = values.len() >= histogram::FEWEST;
    let y = up(values, lines);
    let top = plot::legend_height(entries) + LEADING * 1.6;
    let left = EDGE + plot::labels_width(y, 6) + 10.0;
    let right = WIDTH - EDGE - if beside { SIDE } else { 0.0 };
    let plot = Plot {
        x: Scale {
            value: (0.0, (values.len() as f64).max(1.0)),
            paper: (left, right),
        },
        y: Scale {
            value: y,
            paper: (top + TALL, top),
        },
    };
    plot::legend(sheet, entries)?;
    plot::upward_axis(sheet, &plot, 6, title)?;
    lines.draw(sheet, &plot)?;
    marks(sheet, &plot, values)?;
    ids::labels(sheet, &plot, values)?;
    if beside {
        let all: Vec<f64> = values.iter().map(|value| value.value).collect();
        histogram::draw(sheet, &plot.y, (right + 10.0, WIDTH - EDGE), &all)?;
    }
    plot::frame(sheet, &plot)
}

/// The range of the values, of the limits, and of the theory where it is not far off.
fn up(values: &[Measured<'_>], lines: &Lines) -> (f64, f64) {
    let bounds = [lines.lower, lines.upper].into_iter().flatten();
    let intervals = values
        .iter()
        .flat_map(|value| [value.value - value.expanded, value.value + value.expanded]);
    let tight = plot::range(intervals.chain(bounds), 0.06);
    let reach = (tight.1 - tight.0) * 0.6;
    let near = lines
        .theory
        .into_iter()
        .flat_map(|(low, middle, high)| [low, middle, high])
        .filter(|value| *value > tight.0 - reach && *value < tight.1 + reach);
    plot::range(near.chain([tight.0, tight.1]), 0.0)
}

fn marks(sheet: &mut Sheet<'_>, plot: &Plot, values: &[Measured<'_>]) -> Drawn {
    let crowded = values.len() > 80;
    for (number, value) in values.iter().enumerate() {
        let verdict = value.verdict.unwrap_or(Verdict::Conforms);
        let x = plot.x.at(number as f64 + 0.5);
        if value.expanded > 0.0 {
            let ends = [
                (x, plot.y.at(value.value - value.expanded)),
                (x, plot.y.at(value.value + value.expanded)),
            ];
            sheet.line(&ends, colour(verdict), if crowded { 0.8 } else { 1.3 })?;
        }
        let size = match (verdict, crowded) {
            (Verdict::Conforms, true) => 2.0,
            (_, true) => 3.2,
            (_, false) => 4.0,
        };
        sheet.mark(verdict, (x, plot.y.at(value.value)), size)?;
    }
    Ok(())
}

//! The report's charts as SVG. Here: what is drawn. Elsewhere: figures (`figure`), words (`wording`).
//! Marks differ by shape as well as by colour, so that a black-and-white print says the same.

mod bounds;
mod check;
mod compared;
mod curves;
mod expected;
mod field;
mod histogram;
mod ids;
pub(crate) mod operating;
mod share;
mod study;
mod track;
mod track_line;
mod trend;
mod values;

pub(crate) use check::check;
pub(crate) use expected::expected;
pub(crate) use study::study;
pub(crate) use track::tracked;

use crate::curve::{Axis, Reduced};
use crate::record::{AcceptRecord, Verdict};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Drawn, Sheet, drawn};
use crate::units::System;
use crate::wording::font;

/// Curves drawn one by one; above this the conforming ones are a band.
const SINGLE: usize = 40;

/// A chart.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Chart {
    /// Path inside the output folder.
    pub file: String,
    /// Title.
    pub title: String,
    /// What to see.
    pub caption: String,
    /// The drawing.
    pub svg: String,
}

/// Every chart of the report, in its order.
///
/// # Errors
/// [`ChartError`] where the drawing library refuses.
pub(crate) fn all(
    record: &AcceptRecord,
    curves: &[Reduced],
    show_in: System,
) -> Result<Vec<Chart>, ChartError> {
    let mut charts = Vec::new();
    for axis in [Axis::Length, Axis::Deflection] {
        let some: Vec<&Reduced> = curves.iter().filter(|curve| curve.axis == axis).collect();
        if some.is_empty() {
            continue;
        }
        let only = some.len() == curves.len();
        charts.push(curves::loads(record, &some, only, show_in)?);
        charts.extend(curves::residuals(record, &some, only, show_in)?);
    }
    charts.extend(share::chart_of(record, show_in)?);
    charts.extend(values::all(record, show_in)?);
    Ok(charts)
}

/// A chart of the drawing `draw` makes.
fn chart(
    file: &str,
    title: &str,
    caption: String,
    height: f64,
    draw: impl FnOnce(&mut Sheet<'_>) -> Drawn,
) -> Result<Chart, ChartError> {
    let file = format!("charts/{file}.svg");
    match drawn(&font::fitting(title), height, draw) {
        Ok(svg) => Ok(Chart {
            file,
            title: title.to_owned(),
            caption,
            svg,
        }),
        Err(cause) => Err(ChartError {
            chart: file,
            message: cause.to_string(),
        }),
    }
}

/// A spring's verdict by its id.
fn verdict_of(record: &AcceptRecord, id: &str) -> Verdict {
    let found = record.springs.iter().find(|spring| spring.id == id);
    found.map_or(Verdict::Undecided, |spring| spring.verdict)
}

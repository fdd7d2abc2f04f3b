//! Operating characteristics of plans side by side.

use plotters::style::RGBColor;

use super::{Chart, chart};
use crate::record::{CurvePoint, OfferFacts, OffersRecord};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Drawn, FIELD, INK, LIMIT, OPEN, Sheet, THEORY, WIDTH, WINDOW};
use crate::sheet::plot::{self, EDGE, Entry, LEADING, Plot, Sample, Scale};
use crate::units::Finite;

/// Colours of the plans, and widths, so that they differ without colour too; a seventh plan begins anew.
const LINES: [(RGBColor, f64); 6] = [
    (FIELD, 2.6),
    (LIMIT, 1.6),
    (WINDOW, 3.4),
    (THEORY, 1.0),
    (OPEN, 2.0),
    (INK, 1.3),
];
/// Height of the field.
const TALL: f64 = 250.0;

/// The charts of `plan`: acceptance, and with a bench also what it leaves undecided.
///
/// # Errors
/// [`ChartError`] where the drawing library refuses.
pub(crate) fn all(record: &OffersRecord) -> Result<Vec<Chart>, ChartError> {
    let accepted = "Acceptance by quality";
    let mut charts = vec![one(
        record,
        ("operating-characteristic", accepted),
        "Chance that a lot is accepted, on a bench without uncertainty.",
        |point| Some(point.accepted),
    )?];
    if record.bench.is_some() {
        charts.push(one(
            record,
            ("accepted-on-bench", "Acceptance on this bench"),
            "Chance that a lot is accepted, the bench’s uncertainty included, under the guarded rule.",
            |point| point.accepted_on_bench,
        )?);
        charts.push(one(
            record,
            ("undecided-on-bench", "Left undecided by this bench"),
            "Chance that the bench’s uncertainty leaves the lot undecided.",
            |point| point.undecided_on_bench,
        )?);
    }
    Ok(charts)
}

fn one(
    record: &OffersRecord,
    (file, title): (&str, &str),
    caption: &str,
    of: fn(&CurvePoint) -> Option<Finite>,
) -> Result<Chart, ChartError> {
    let line = |number: usize| {
        LINES
            .get(number % LINES.len())
            .copied()
            .unwrap_or((INK, 1.0))
    };
    let entries: Vec<Entry> = record
        .plans
        .iter()
        .enumerate()
        .map(|(number, plan)| {
            let (colour, width) = line(number);
            (Sample::Line(colour, width), plan.name.clone())
        })
        .collect();
    let top = plot::legend_height(&entries) + LEADING * 1.6;
    let height = top + TALL + LEADING * 2.6;
    chart(file, title, caption.to_owned(), height, |sheet| {
        let plot = field(record, top);
        plot::legend(sheet, &entries)?;
        plot::upward_axis(sheet, &plot, 6, "chance (%)")?;
        plot::across_axis(sheet, &plot, 9, "nonconforming (%)")?;
        for (number, plan) in record.plans.iter().enumerate() {
            curve(sheet, &plot, plan, line(number), of)?;
        }
        plot::frame(sheet, &plot)
    })
}

fn field(record: &OffersRecord, top: f64) -> Plot {
    let qualities = record
        .plans
        .iter()
        .flat_map(|plan| &plan.curve)
        .map(|point| point.quality_percent.get());
    let across = (0.0, qualities.fold(0.0, f64::max).max(1e-9));
    let up = (0.0, 100.0);
    let left = EDGE + plot::labels_width(up, 6) + 10.0;
    Plot {
        x: Scale {
            value: across,
            paper: (left, WIDTH - EDGE - 14.0),
        },
        y: Scale {
            value: up,
            paper: (top + TALL, top),
        },
    }
}

fn curve(
    sheet: &mut Sheet<'_>,
    plot: &Plot,
    plan: &OfferFacts,
    (colour, width): (RGBColor, f64),
    of: fn(&CurvePoint) -> Option<Finite>,
) -> Drawn {
    let points: Vec<(f64, f64)> = plan
        .curve
        .iter()
        .filter_map(|point| {
            let chance = 100.0 * of(point)?.get();
            Some(plot.at((point.quality_percent.get(), chance)))
        })
        .collect();
    sheet.line(&points, colour, width)
}

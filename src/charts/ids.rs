//! The springs' ids under a plot of values.

use super::values::Measured;
use crate::record::Verdict;
use crate::sheet::canvas::{Anchor, Drawn, FAINT, INK, Sheet, TYPE, WIDTH};
use crate::sheet::plot::{EDGE, LEADING, Plot};
use crate::wording::font;

/// The longest label of a spring.
const LONGEST: f64 = 64.0;
/// Springs whose every label is drawn.
const LABELLED: usize = 26;

fn widest(values: &[Measured<'_>]) -> f64 {
    let width = |value: &Measured<'_>| font::width(&shown_id(value.id), TYPE, false);
    values.iter().map(width).fold(0.0, f64::max)
}

fn shown_id(id: &str) -> String {
    font::shortened(&font::fitting(id), TYPE, LONGEST)
}

/// Whether every label fits beside its neighbours without being turned.
fn level(values: &[Measured<'_>]) -> bool {
    (widest(values) + 8.0) * values.len() as f64 <= WIDTH * 0.6
}

/// The height they need.
pub(super) fn labels_height(values: &[Measured<'_>]) -> f64 {
    let labels = if level(values) {
        LEADING * 0.8
    } else {
        widest(values)
    };
    labels + LEADING * 1.6 + EDGE
}

/// Labels of the springs under the plot: all while they are few, else those that do not conform and every so many.
pub(super) fn labels(sheet: &mut Sheet<'_>, plot: &Plot, values: &[Measured<'_>]) -> Drawn {
    let all = values.len() <= LABELLED;
    let every = values.len().div_ceil(16).max(1);
    let apart = TYPE + 2.0;
    let mut taken: Vec<f64> = Vec::new();
    let conforms = |value: &Measured<'_>| {
        value
            .verdict
            .is_none_or(|verdict| verdict == Verdict::Conforms)
    };
    for first in [true, false] {
        for (number, value) in values.iter().enumerate() {
            let wanted = if first {
                !conforms(value)
            } else {
                conforms(value) && (all || number % every == 0)
            };
            let x = plot.x.at(number as f64 + 0.5);
            if !wanted || (!level(values) && taken.iter().any(|other| (other - x).abs() < apart)) {
                continue;
            }
            taken.push(x);
            let ink = if conforms(value) { FAINT } else { INK };
            if level(values) {
                sheet.text(
                    &shown_id(value.id),
                    (x, plot.y.paper.0 + LEADING * 0.75),
                    Anchor::Middle,
                    ink,
                )?;
            } else {
                sheet.upward(&shown_id(value.id), (x, plot.y.paper.0 + 6.0), ink)?;
            }
        }
    }
    let under = plot.y.paper.0 + labels_height(values) - EDGE - LEADING * 0.4;
    let middle = f64::midpoint(plot.x.paper.0, plot.x.paper.1);
    sheet.bold("spring", (middle, under), Anchor::Middle, INK)
}

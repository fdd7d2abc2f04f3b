//! Axes, scales, the legend, labels that keep clear of each other.

use super::canvas::{Anchor, At, Drawn, FAINT, GRID, INK, Sheet, TYPE, WIDTH};
use crate::record::Verdict;
use crate::wording::font;

/// Height of a line of type.
pub(crate) const LEADING: f64 = 17.0;
/// Space kept at the edges of a sheet.
pub(crate) const EDGE: f64 = 8.0;

/// A stretch of values along a stretch of paper.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Scale {
    /// Value at the start and the end.
    pub value: (f64, f64),
    /// Paper at the start and the end.
    pub paper: (f64, f64),
}

impl Scale {
    /// Where a value lies on the paper.
    pub(crate) fn at(&self, value: f64) -> f64 {
        let part = (value - self.value.0) / (self.value.1 - self.value.0);
        self.paper.0 + part * (self.paper.1 - self.paper.0)
    }
}

/// A plot: two scales.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Plot {
    /// Across.
    pub x: Scale,
    /// Up.
    pub y: Scale,
}

impl Plot {
    /// Where a point lies on the paper.
    pub(crate) fn at(&self, (x, y): (f64, f64)) -> At {
        (self.x.at(x), self.y.at(y))
    }
}

/// The range of some values, widened by a share of itself on both sides; never empty.
pub(crate) fn range(values: impl Iterator<Item = f64>, share: f64) -> (f64, f64) {
    let (low, high) = values
        .filter(|value| value.is_finite())
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), value| {
            (low.min(value), high.max(value))
        });
    if low > high {
        return (0.0, 1.0);
    }
    let wide = (high - low).max(high.abs().max(low.abs()) * 1e-6).max(1e-9);
    (low - wide * share, high + wide * share)
}

/// Round values in a range, about `wanted` of them, and the places after the point they need.
pub(crate) fn ticks(range: (f64, f64), wanted: u8) -> (Vec<f64>, usize) {
    let (low, high) = (range.0.min(range.1), range.0.max(range.1));
    let rough = (high - low) / f64::from(wanted.max(1));
    let power = rough.log10().floor();
    let base = 10_f64.powf(power);
    let factor = [1.0, 2.0, 5.0, 10.0]
        .into_iter()
        .find(|factor| factor * base >= rough * (1.0 - 1e-9))
        .unwrap_or(10.0);
    let step = factor * base;
    let places = (0_u8..=12).find(|places| {
        let scaled = step * 10_f64.powi(i32::from(*places));
        (scaled - scaled.round()).abs() < 1e-6 * scaled
    });
    let first = (low / step - 1e-9).ceil();
    let values = (0_u8..50)
        .map(|n| (first + f64::from(n)) * step)
        .take_while(|value| *value <= high + step * 1e-9);
    (values.collect(), usize::from(places.unwrap_or(12)))
}

/// A tick's label.
pub(crate) fn label(value: f64, places: usize) -> String {
    let text = format!("{value:.places$}");
    match text.strip_prefix('-') {
        Some(rest) if rest.chars().any(|c| matches!(c, '1'..='9')) => format!("−{rest}"),
        Some(rest) => rest.to_owned(),
        None => text,
    }
}

/// The width the labels of an upward axis need.
pub(crate) fn labels_width(range: (f64, f64), wanted: u8) -> f64 {
    let (values, places) = ticks(range, wanted);
    values
        .iter()
        .map(|value| font::width(&label(*value, places), TYPE, false))
        .fold(0.0, f64::max)
}

/// Grid and labels of the upward axis, its title above it.
pub(crate) fn upward_axis(sheet: &mut Sheet<'_>, plot: &Plot, wanted: u8, title: &str) -> Drawn {
    let (values, places) = ticks(plot.y.value, wanted);
    for value in values {
        let y = plot.y.at(value);
        sheet.line(&[(plot.x.paper.0, y), (plot.x.paper.1, y)], GRID, 0.8)?;
        sheet.text(
            &label(value, places),
            (plot.x.paper.0 - 6.0, y),
            Anchor::End,
            FAINT,
        )?;
    }
    sheet.bold(
        title,
        (EDGE, plot.y.paper.1 - LEADING * 0.8),
        Anchor::Start,
        INK,
    )
}

/// Grid and labels of the axis across, its title under it.
pub(crate) fn across_axis(sheet: &mut Sheet<'_>, plot: &Plot, wanted: u8, title: &str) -> Drawn {
    let (values, places) = ticks(plot.x.value, wanted);
    for value in values {
        let x = plot.x.at(value);
        sheet.line(&[(x, plot.y.paper.0), (x, plot.y.paper.1)], GRID, 0.8)?;
        sheet.text(
            &label(value, places),
            (x, plot.y.paper.0 + LEADING * 0.75),
            Anchor::Middle,
            FAINT,
        )?;
    }
    let middle = f64::midpoint(plot.x.paper.0, plot.x.paper.1);
    sheet.bold(
        title,
        (middle, plot.y.paper.0 + LEADING * 1.75),
        Anchor::Middle,
        INK,
    )
}

/// The frame: the two axes.
pub(crate) fn frame(sheet: &mut Sheet<'_>, plot: &Plot) -> Drawn {
    let (left, right) = plot.x.paper;
    let (bottom, top) = plot.y.paper;
    sheet.line(&[(left, top), (left, bottom), (right, bottom)], INK, 1.0)
}

/// What an entry of a legend shows before its words.
#[derive(Clone, Copy, Debug)]
pub(crate) enum Sample {
    /// A verdict's mark.
    Mark(Verdict),
    /// A line of a colour and width.
    Line(plotters::style::RGBColor, f64),
    /// A dashed line.
    Dashes(plotters::style::RGBColor),
    /// A filled patch.
    Patch(plotters::style::RGBColor, f64),
}

/// An entry of a legend.
pub(crate) type Entry = (Sample, String);

/// Where the entries of a legend stand, and how many lines they fill.
fn placed(entries: &[Entry]) -> (Vec<At>, u8) {
    let (mut x, mut line) = (EDGE, 0_u8);
    let mut places = Vec::new();
    for (_, words) in entries {
        let wide = 26.0 + font::width(words, TYPE, false) + 16.0;
        if x > EDGE && x + wide > WIDTH - EDGE {
            x = EDGE;
            line += 1;
        }
        places.push((x, EDGE + LEADING * (f64::from(line) + 0.5)));
        x += wide;
    }
    (places, line + 1)
}

/// The height a legend needs.
pub(crate) fn legend_height(entries: &[Entry]) -> f64 {
    EDGE + LEADING * f64::from(placed(entries).1)
}

/// Draws a legend at the head of the sheet.
pub(crate) fn legend(sheet: &mut Sheet<'_>, entries: &[Entry]) -> Drawn {
    for ((sample, words), (x, y)) in entries.iter().zip(placed(entries).0) {
        match *sample {
            Sample::Mark(verdict) => sheet.mark(verdict, (x + 10.0, y), 4.0)?,
            Sample::Line(colour, width) => sheet.line(&[(x, y), (x + 20.0, y)], colour, width)?,
            Sample::Dashes(colour) => sheet.dashes((x, y), (x + 20.0, y), colour, 1.6)?,
            Sample::Patch(colour, alpha) => {
                sheet.block((x, y - 5.0), (x + 20.0, y + 5.0), colour, alpha)?;
            }
        }
        sheet.text(words, (x + 26.0, y), Anchor::Start, INK)?;
    }
    Ok(())
}

/// Heights moved apart until none is nearer than `apart` to the next, inside `top` to `bottom`; the order is kept.
pub(crate) fn spread(wanted: &[f64], apart: f64, top: f64, bottom: f64) -> Vec<f64> {
    let mut order: Vec<(usize, f64)> = wanted.iter().copied().enumerate().collect();
    order.sort_by(|a, b| a.1.total_cmp(&b.1));
    let mut free = top;
    for (_, y) in &mut order {
        *y = y.max(free);
        free = *y + apart;
    }
    let mut free = bottom;
    for (_, y) in order.iter_mut().rev() {
        *y = y.min(free);
        free = *y - apart;
    }
    order.sort_by_key(|(number, _)| *number);
    order.into_iter().map(|(_, y)| y).collect()
}

#[cfg(test)]
mod tests {
    #![expect(clippy::indexing_slicing, reason = "tests")]
    use super::*;

    #[test]
    fn ticks_are_round() {
        let (values, places) = ticks((10.2, 11.4), 6);
        let shown: Vec<String> = values.iter().map(|value| label(*value, places)).collect();
        assert_eq!(
            shown,
            ["10.2", "10.4", "10.6", "10.8", "11.0", "11.2", "11.4"]
        );
        let (values, places) = ticks((-0.3, 0.3), 4);
        let shown: Vec<String> = values.iter().map(|value| label(*value, places)).collect();
        assert_eq!(shown, ["−0.2", "0.0", "0.2"]);
    }

    #[test]
    fn labels_keep_clear() {
        let placed = spread(&[50.0, 51.0, 10.0, 99.0, 98.0], 12.0, 0.0, 100.0);
        let mut sorted = placed.clone();
        sorted.sort_by(f64::total_cmp);
        assert!(
            sorted
                .windows(2)
                .all(|pair| pair[1] - pair[0] >= 12.0 - 1e-9),
            "{placed:?}"
        );
        assert!(placed[2] < placed[0] && placed[0] < placed[1] && placed[4] < placed[3]);
    }
}

//! The distribution of a characteristic, lying on its side along the axis of the values.

use crate::sheet::canvas::{Anchor, Drawn, FAINT, FIELD, INK, Sheet, TYPE};
use crate::sheet::plot::{LEADING, Scale};
use crate::wording::font;

/// Fewer values show no distribution.
pub(super) const FEWEST: usize = 5;
/// Classes at least and at most.
const CLASSES: (f64, f64) = (4.0, 24.0);

/// Draws the distribution between two places across.
pub(super) fn draw(sheet: &mut Sheet<'_>, up: &Scale, across: (f64, f64), values: &[f64]) -> Drawn {
    let (low, step, counts) = classes(values);
    let most = counts.iter().copied().max().unwrap_or(1).max(1);
    let number = most.to_string();
    let room = (across.1 - across.0 - font::width(&number, TYPE, false) - 6.0).max(1.0);
    for (place, count) in counts.iter().enumerate().filter(|(_, count)| **count > 0) {
        let from = low + step * place as f64;
        let (bottom, top) = (up.at(from), up.at(from + step));
        let gap = ((bottom - top) * 0.08).min(0.8);
        let right = across.0 + room * f64::from(*count) / f64::from(most);
        sheet.block((across.0, top + gap), (right, bottom - gap), FIELD, 0.45)?;
        if *count == most {
            sheet.text(
                &number,
                (right + 4.0, f64::midpoint(top, bottom)),
                Anchor::Start,
                FAINT,
            )?;
        }
    }
    sheet.line(&[(across.0, up.paper.1), (across.0, up.paper.0)], INK, 0.8)?;
    let middle = f64::midpoint(across.0, across.1);
    sheet.text(
        "springs per class",
        (middle, up.paper.0 + LEADING * 0.75),
        Anchor::Middle,
        FAINT,
    )?;
    sheet.bold(
        "distribution",
        (middle, up.paper.1 - LEADING * 0.8),
        Anchor::Middle,
        INK,
    )
}

/// The start of the first class, the width of one, and how many values each holds.
fn classes(values: &[f64]) -> (f64, f64, Vec<u32>) {
    let low = values.iter().copied().fold(f64::INFINITY, f64::min);
    let high = values.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let wanted = (values.len() as f64)
        .sqrt()
        .ceil()
        .clamp(CLASSES.0, CLASSES.1)
        + 1.0;
    let wide = (high - low).max(high.abs() * 1e-9).max(1e-12);
    let step = wide / (wanted - 1.0);
    let start = low - step / 2.0;
    let mut number = 0_u8;
    let mut counts = Vec::new();
    while f64::from(number) < wanted {
        let from = start + step * f64::from(number);
        let inside = values
            .iter()
            .filter(|value| **value >= from && **value < from + step)
            .count();
        counts.push(u32::try_from(inside).unwrap_or(u32::MAX));
        number += 1;
    }
    (start, step, counts)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_value_is_in_one_class() {
        let values: Vec<f64> = (0..200)
            .map(|n| 10.0 + f64::from(n * 37 % 101) / 100.0)
            .collect();
        assert_eq!(classes(&values).2.iter().sum::<u32>(), 200);
        assert_eq!(classes(&[5.0; 7]).2.iter().sum::<u32>(), 7);
    }
}

//! Many curves on one plot: lines while they are few, a band with the springs that do not conform when they are many.

use super::SINGLE;
use crate::record::Verdict;
use crate::sheet::canvas::{Anchor, Drawn, FAINT, FIELD, INK, Sheet, TYPE, colour};
use crate::sheet::plot::{Entry, LEADING, Plot, Sample, spread};
use crate::wording::{self, font};

/// Departure from a line through neighbours, on paper, below which a point is not drawn.
const INVISIBLE: f64 = 0.3;
/// Places across at which the band is taken.
const ACROSS: u32 = 120;
/// Lines that do not conform before they are drawn thinner.
const CROWD: usize = 6;
/// Marks along a line that does not conform.
const MARKS: usize = 4;
/// Labels at the ends of curves.
const LABELS: usize = 12;
/// Width of such a label.
pub(super) const LABEL_WIDTH: f64 = 66.0;

/// One spring's curve, in the values of the plot.
pub(super) struct Line<'a> {
    /// The spring.
    pub id: &'a str,
    /// Its verdict.
    pub verdict: Verdict,
    /// Its points.
    pub points: Vec<(f64, f64)>,
    /// A second stroke, drawn thinner.
    pub back: Vec<(f64, f64)>,
}

/// Whether that many curves become a band.
pub(super) const fn banded(number: usize) -> bool {
    number > SINGLE
}

/// The legend's entries for these curves.
pub(super) fn entries(lines: &[Line<'_>]) -> Vec<Entry> {
    let of = |verdict| lines.iter().filter(|line| line.verdict == verdict).count();
    let named = |number: usize, word: &str| {
        format!(
            "{} {word}",
            wording::count(u64::try_from(number).unwrap_or(u64::MAX), "spring")
        )
    };
    let mut entries = Vec::new();
    let conforming = of(Verdict::Conforms);
    if conforming > 0 && banded(lines.len()) {
        entries.push((
            Sample::Patch(FIELD, 0.3),
            format!(
                "{} conforming (band)",
                wording::count(u64::try_from(conforming).unwrap_or(u64::MAX), "spring")
            ),
        ));
    } else if conforming > 0 {
        entries.push((Sample::Line(FIELD, 1.0), named(conforming, "conforming")));
    }
    for (verdict, word) in [
        (Verdict::Fails, "failing"),
        (Verdict::Undecided, "undecided"),
    ] {
        if of(verdict) > 0 {
            entries.push((Sample::Mark(verdict), named(of(verdict), word)));
        }
    }
    entries
}

/// Draws the curves, then labels those that do not conform at their ends.
pub(super) fn draw(sheet: &mut Sheet<'_>, plot: &Plot, lines: &[Line<'_>]) -> Drawn {
    let (conforming, others): (Vec<&Line<'_>>, Vec<&Line<'_>>) = lines
        .iter()
        .partition(|line| line.verdict == Verdict::Conforms);
    if banded(lines.len()) {
        band(sheet, plot, &conforming)?;
    } else {
        for line in conforming {
            sheet.faint_line(&visible(plot, &line.back), FIELD, 0.4)?;
            sheet.faint_line(&visible(plot, &line.points), FIELD, 0.7)?;
        }
    }
    for (number, line) in others.iter().enumerate() {
        if !banded(lines.len()) {
            sheet.line(&visible(plot, &line.back), colour(line.verdict), 0.7)?;
        }
        let width = if others.len() > CROWD { 0.7 } else { 1.3 };
        sheet.line(&visible(plot, &line.points), colour(line.verdict), width)?;
        marks(sheet, plot, line, number)?;
    }
    labels(sheet, plot, &others)
}

fn marks(sheet: &mut Sheet<'_>, plot: &Plot, line: &Line<'_>, number: usize) -> Drawn {
    let count = line.points.len();
    for place in 0..MARKS {
        let at = count * (2 * place + 1 + number % 2) / (2 * MARKS + 1);
        if let Some(point) = line.points.get(at) {
            sheet.mark(line.verdict, plot.at(*point), 2.8)?;
        }
    }
    Ok(())
}

fn labels(sheet: &mut Sheet<'_>, plot: &Plot, lines: &[&Line<'_>]) -> Drawn {
    let (right, (bottom, top)) = (plot.x.paper.1, plot.y.paper);
    let apart = LEADING * 0.85;
    let fitting = (0..LABELS)
        .take_while(|number| (*number as f64 + 1.0) * apart < bottom - top)
        .count();
    let ends: Vec<(f64, f64)> = lines
        .iter()
        .take(fitting)
        .filter_map(|line| {
            line.points
                .iter()
                .copied()
                .map(|point| plot.at(point))
                .max_by(|a, b| a.0.total_cmp(&b.0))
        })
        .collect();
    let wanted: Vec<f64> = ends.iter().map(|end| end.1).collect();
    let heights = spread(&wanted, apart, top, bottom - apart);
    for ((line, end), y) in lines.iter().zip(&ends).zip(heights) {
        sheet.line(&[*end, (right + 4.0, y)], FAINT, 0.5)?;
        let words = font::shortened(&font::fitting(line.id), TYPE, LABEL_WIDTH - 12.0);
        sheet.text(&words, (right + 8.0, y), Anchor::Start, INK)?;
    }
    if lines.len() > fitting {
        let more = format!("+ {} more", lines.len() - fitting);
        sheet.text(
            &more,
            (right + 8.0, top - LEADING * 0.9),
            Anchor::Start,
            FAINT,
        )?;
    }
    Ok(())
}

fn band(sheet: &mut Sheet<'_>, plot: &Plot, lines: &[&Line<'_>]) -> Drawn {
    let (mut upper, mut lower) = (Vec::new(), Vec::new());
    let sorted: Vec<Vec<(f64, f64)>> = lines
        .iter()
        .map(|line| {
            let mut points = line.points.clone();
            points.sort_by(|a, b| a.0.total_cmp(&b.0));
            points
        })
        .collect();
    for number in 0..=ACROSS {
        let (from, to) = plot.x.value;
        let x = from + (to - from) * f64::from(number) / f64::from(ACROSS);
        let loads = sorted.iter().filter_map(|points| between(points, x));
        let (low, high) = loads.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), y| {
            (low.min(y), high.max(y))
        });
        if low <= high {
            upper.push(plot.at((x, high)));
            lower.push(plot.at((x, low)));
        }
    }
    let outline: Vec<(f64, f64)> = upper
        .iter()
        .copied()
        .chain(lower.iter().rev().copied())
        .collect();
    sheet.area(&outline, FIELD, 0.3)?;
    sheet.line(&simplified(&upper, INVISIBLE), FIELD, 0.6)?;
    sheet.line(&simplified(&lower, INVISIBLE), FIELD, 0.6)
}

/// The ordinate at `x` between the two neighbours of a sorted curve.
fn between(points: &[(f64, f64)], x: f64) -> Option<f64> {
    let after = points.partition_point(|point| point.0 < x);
    let right = points.get(after)?;
    let Some(left) = after.checked_sub(1).and_then(|before| points.get(before)) else {
        return (right.0 <= x).then_some(right.1);
    };
    let wide = right.0 - left.0;
    if wide <= 0.0 {
        return Some(right.1);
    }
    Some(left.1 + (right.1 - left.1) * (x - left.0) / wide)
}

fn visible(plot: &Plot, points: &[(f64, f64)]) -> Vec<(f64, f64)> {
    let paper: Vec<(f64, f64)> = points.iter().map(|point| plot.at(*point)).collect();
    simplified(&paper, INVISIBLE)
}

/// The line without points nearer than `within` to what is left (Douglas and Peucker's method).
fn simplified(points: &[(f64, f64)], within: f64) -> Vec<(f64, f64)> {
    let Some(last) = points.len().checked_sub(1) else {
        return Vec::new();
    };
    let mut kept = vec![false; points.len()];
    for end in [0, last] {
        if let Some(slot) = kept.get_mut(end) {
            *slot = true;
        }
    }
    let mut open = vec![(0, last)];
    while let Some((from, to)) = open.pop() {
        let (Some(start), Some(end)) = (points.get(from), points.get(to)) else {
            continue;
        };
        let inner = points.get(from + 1..to).unwrap_or(&[]).iter().enumerate();
        let farthest = inner
            .map(|(number, point)| (from + 1 + number, distance(*point, *start, *end)))
            .max_by(|a, b| a.1.total_cmp(&b.1));
        if let Some((at, _)) = farthest.filter(|(_, away)| *away > within) {
            if let Some(slot) = kept.get_mut(at) {
                *slot = true;
            }
            open.extend([(from, at), (at, to)]);
        }
    }
    points
        .iter()
        .zip(kept)
        .filter_map(|(point, keep)| keep.then_some(*point))
        .collect()
}

fn distance(point: (f64, f64), start: (f64, f64), end: (f64, f64)) -> f64 {
    let along = (end.0 - start.0, end.1 - start.1);
    let length = along.0.hypot(along.1);
    let to = (point.0 - start.0, point.1 - start.1);
    if length <= 0.0 {
        return to.0.hypot(to.1);
    }
    (along.0 * to.1 - along.1 * to.0).abs() / length
}

#[cfg(test)]
mod tests {
    #![expect(clippy::indexing_slicing, reason = "tests")]
    use super::*;

    #[test]
    fn a_straight_line_needs_two_points_and_a_spike_stays() {
        let straight: Vec<(f64, f64)> = (0..400)
            .map(|n| (f64::from(n), 2.0 * f64::from(n)))
            .collect();
        assert_eq!(simplified(&straight, 0.1).len(), 2);
        let mut spiked = straight.clone();
        spiked[200].1 += 5.0;
        let kept = simplified(&spiked, 0.1);
        assert!(kept.contains(&spiked[200]) && kept.len() <= 5);
        assert_eq!(simplified(&[], 0.1), []);
    }

    #[test]
    fn interpolates_inside_only() {
        let points = [(0.0, 0.0), (2.0, 4.0)];
        assert_eq!(between(&points, 1.0), Some(2.0));
        assert_eq!(between(&points, 0.0), Some(0.0));
        assert_eq!(between(&points, 2.5), None);
        assert_eq!(between(&points, -0.5), None);
    }
}

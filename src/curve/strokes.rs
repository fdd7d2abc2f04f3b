//! Splits a curve at its reversals.

use std::ops::Range;

use crate::drawing::Way;

/// A retrace smaller than this share of the whole travel is no reversal.
const RETRACE: f64 = 0.02;
/// A stroke shorter than this share of the longest of its way is no stroke of the test.
const FULL: f64 = 0.5;

/// Points of a leap at most.
const LEAP: usize = 3;

/// One pass of the platen.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Stroke {
    /// Which way.
    pub way: Way,
    /// Its points in the curve.
    pub points: Range<usize>,
}

/// The strokes of a travel record.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Strokes {
    /// The full ones, in order.
    pub full: Vec<Stroke>,
    /// Short ones left out (a jog, a stroke cut off).
    pub short: usize,
    /// First and last point of each leap back: a short stroke within three points is no move of the platen.
    pub leaps: Vec<(usize, usize)>,
}

/// The full strokes of a travel record `u` (mm, growing with compression), split where it turns back by
/// more than 2 % of the travel or five steps of its `resolution`. Shorter strokes than half the longest of
/// their way (jogging, a start-up move) are left out.
pub fn split(u: &[f64], resolution: f64) -> Strokes {
    let (low, high) = u
        .iter()
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), x| {
            (low.min(*x), high.max(*x))
        });
    let threshold = (RETRACE * (high - low)).max(5.0 * resolution);
    let pivots = pivots(u, threshold);
    let at = |index: usize| u.get(index).copied().unwrap_or(f64::NAN);
    let mut strokes: Vec<(Stroke, f64)> = Vec::new();
    for pair in pivots.windows(2) {
        let [from, to] = pair else { continue };
        let span = at(*to) - at(*from);
        let way = if span > 0.0 {
            Way::Loading
        } else {
            Way::Unloading
        };
        strokes.push((
            Stroke {
                way,
                points: *from..to + 1,
            },
            span.abs(),
        ));
    }
    let longest = |way: Way| {
        strokes
            .iter()
            .filter(|(stroke, _)| stroke.way == way)
            .map(|(_, span)| *span)
            .fold(0.0, f64::max)
    };
    let (loading, unloading) = (longest(Way::Loading), longest(Way::Unloading));
    let is_full = |stroke: &Stroke, span: f64| {
        span > 0.0
            && span
                >= FULL
                    * if stroke.way == Way::Loading {
                        loading
                    } else {
                        unloading
                    }
    };
    let (full, short): (Vec<_>, Vec<_>) = strokes
        .into_iter()
        .partition(|(stroke, span)| is_full(stroke, *span));
    let leap = |(stroke, _): &(Stroke, f64)| {
        let Range { start, end } = stroke.points;
        (end - start <= LEAP && start > 0 && end < u.len()).then(|| (start, end - 1))
    };
    Strokes {
        full: full.into_iter().map(|(stroke, _)| stroke).collect(),
        short: short.len(),
        leaps: short.iter().filter_map(leap).collect(),
    }
}

/// Indices where the record turns, first and last point included.
fn pivots(u: &[f64], threshold: f64) -> Vec<usize> {
    let mut pivots = vec![0];
    let (mut highest, mut lowest) = (0, 0);
    let mut way: Option<Way> = None;
    let at = |index: usize| u.get(index).copied().unwrap_or(f64::NAN);
    for (index, x) in u.iter().enumerate() {
        if *x > at(highest) {
            highest = index;
        }
        if *x < at(lowest) {
            lowest = index;
        }
        let fell = at(highest) - x > threshold;
        let rose = x - at(lowest) > threshold;
        match way {
            None | Some(Way::Unloading) if rose => {
                if way.is_some() || lowest > 0 {
                    pivots.push(lowest);
                }
                way = Some(Way::Loading);
                highest = index;
            }
            None | Some(Way::Loading) if fell => {
                if way.is_some() || highest > 0 {
                    pivots.push(highest);
                }
                way = Some(Way::Unloading);
                lowest = index;
            }
            _ => {}
        }
    }
    let end = match way {
        Some(Way::Loading) => highest,
        Some(Way::Unloading) => lowest,
        None => u.len().saturating_sub(1),
    };
    pivots.push(end);
    pivots.dedup();
    pivots
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn three_cycles_with_jitter_give_six_strokes() {
        let mut u = Vec::new();
        for cycle in 0..3 {
            for step in 0..=100 {
                u.push(
                    f64::from(step) * 0.1
                        + if step % 7 == 3 { -0.12 } else { 0.0 }
                        + f64::from(cycle) * 0.0,
                );
            }
            for step in (0..100).rev() {
                u.push(f64::from(step) * 0.1);
            }
        }
        let strokes = split(&u, 0.001).full;
        let ways: Vec<Way> = strokes.iter().map(|stroke| stroke.way).collect();
        assert_eq!(
            ways,
            [
                Way::Loading,
                Way::Unloading,
                Way::Loading,
                Way::Unloading,
                Way::Loading,
                Way::Unloading
            ]
        );
    }

    #[test]
    fn a_start_up_jog_is_no_stroke() {
        let mut u: Vec<f64> = (0..10).map(f64::from).collect();
        u.extend((0..9).rev().map(f64::from));
        u.extend((1..=100).map(f64::from));
        let strokes = split(&u, 0.001);
        assert_eq!(
            (strokes.full.len(), strokes.short),
            (1 + usize::from(strokes.full.len() == 2), 1)
        );
        assert_eq!(
            strokes.full.last().map(|stroke| stroke.points.end),
            Some(u.len())
        );
    }
}

//! What is seen in the rows themselves, before they are parted into strokes.

use std::ops::Range;

use super::coarse::step_of;

/// Rows at the end of the load cell that make a saturation at least.
const LEAST: usize = 3;
/// How much the load should have risen over them: so many times the band they lie in, and this share of the largest load.
const RISE: (f64, f64) = (5.0, 0.002);
/// Rows before them that tell how fast the load rose.
const BEFORE: usize = 10;
/// A travel reading is off where it leaps away and back by so many times the usual step, and this share of the range.
const LEAP: (f64, f64) = (8.0, 0.02);
/// Fewer rows than this are no curve.
const CURVE: usize = 20;

/// A load cell at its end.
#[derive(Clone, Debug, PartialEq)]
pub struct Saturation {
    /// Loads at and above this are no readings, in the unit of the loads.
    pub level: f64,
    /// The rows at or above it.
    pub rows: Vec<usize>,
}

/// Finds out whether the largest load is the end of the load cell: three or more rows in a row stand there, digit for
/// digit or within two steps of `resolution`, while the travel `u` goes on.
pub fn saturation(u: &[f64], load: &[f64], resolution: f64) -> Option<Saturation> {
    let most = load.iter().copied().reduce(f64::max)?;
    let band = (2.0 * resolution).max(1e-9 * most.abs());
    let level = most - band;
    let at_end = |row: &usize| load.get(*row).is_some_and(|load| *load >= level);
    let mut row = 0;
    let mut found = false;
    while row < load.len() && !found {
        let end = (row..load.len())
            .find(|row| !at_end(row))
            .unwrap_or(load.len());
        found = end >= row + LEAST && goes_on(u, load, row..end, most, band);
        row = end.max(row) + 1;
    }
    found.then(|| Saturation {
        level,
        rows: (0..load.len()).filter(at_end).collect(),
    })
}

/// Whether the load should have risen over `run`, going by the rows before it.
fn goes_on(u: &[f64], load: &[f64], run: Range<usize>, most: f64, band: f64) -> bool {
    let over = |rows: Range<usize>| {
        let some = u.get(rows).unwrap_or(&[]);
        let low = some.iter().copied().fold(f64::INFINITY, f64::min);
        some.iter().copied().fold(f64::NEG_INFINITY, f64::max) - low
    };
    let start = run.start.saturating_sub(BEFORE);
    let rate = match (u.get(start), u.get(run.start), load.get(start)) {
        (Some(from), Some(to), Some(low)) if start < run.start => (most - low) / (to - from),
        _ => {
            let low = load.iter().copied().fold(f64::INFINITY, f64::min);
            (most - low) / over(0..u.len())
        }
    };
    // A display that steps coarsely stands still for one of its steps.
    let step = step_of(load, band).unwrap_or(0.0);
    let wanted = (RISE.0 * band).max(RISE.1 * most).max(3.0 * step);
    rate.is_finite() && rate * over(run) > wanted
}

/// Rows that repeat the row before in travel, load and time, digit for digit, while the platen moves: a row between two
/// others that moved on. Without times a coarse display looks the same, so there at least one step of travel between
/// any two rows is wanted.
pub fn doubled(u: &[f64], load: &[f64], time: Option<&[f64]>) -> Vec<usize> {
    let same = |values: &[f64], row: usize| match (values.get(row.wrapping_sub(1)), values.get(row))
    {
        (Some(before), Some(here)) => before.to_bits() == here.to_bits(),
        _ => false,
    };
    let twice =
        |row: &usize| same(u, *row) && same(load, *row) && time.is_none_or(|time| same(time, *row));
    let rows: Vec<usize> = (1..u.len()).filter(twice).collect();
    if time.is_some() {
        return rows;
    }
    let stands = (1..u.len())
        .filter(|row| same(u, *row) && !twice(row))
        .count();
    let moving = |row: &usize| {
        let row = *row;
        !same(u, row - 1) && !same(u, row + 1) && row >= 2 && row + 1 < u.len()
    };
    // Where the travel also stands still with loads that differ, equal rows are the display's.
    if stands > 0 {
        Vec::new()
    } else {
        rows.into_iter().filter(moving).collect()
    }
}

/// Rows whose travel leaps away from both neighbours, which agree with each other: no platen does that.
pub fn travel_jumps(u: &[f64]) -> Vec<usize> {
    if u.len() < CURVE {
        return Vec::new();
    }
    let low = u.iter().copied().fold(f64::INFINITY, f64::min);
    let range = u.iter().copied().fold(f64::NEG_INFINITY, f64::max) - low;
    let candidate = |three: &[f64]| match three {
        [a, b, c] => {
            let (there, back) = (b - a, c - b);
            there * back < 0.0 && there.abs().min(back.abs()) > LEAP.1 * range
        }
        _ => false,
    };
    let rows: Vec<usize> = (1..)
        .zip(u.windows(3))
        .filter(|(_, three)| candidate(three))
        .map(|(row, _)| row)
        .collect();
    if rows.is_empty() {
        return rows;
    }
    let steps: Vec<f64> = u
        .windows(2)
        .filter_map(|pair| match pair {
            [a, b] if a.to_bits() != b.to_bits() => Some((b - a).abs()),
            _ => None,
        })
        .collect();
    let usual = crate::stats::median(steps).unwrap_or(f64::INFINITY);
    let off = |row: &usize| {
        let (Some(a), Some(b), Some(c)) = (u.get(row - 1), u.get(*row), u.get(row + 1)) else {
            return false;
        };
        let leap = (b - a).abs().min((c - b).abs());
        leap > LEAP.0 * usual && (c - a).abs() < leap / 2.0
    };
    rows.into_iter().filter(off).collect()
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, clippy::indexing_slicing, reason = "tests")]
    use super::*;

    fn stroke() -> (Vec<f64>, Vec<f64>) {
        let u: Vec<f64> = (0..100).map(|n| f64::from(n) * 0.4).collect();
        let noise = |n: usize| (n as f64 * 12.9898).sin() * 0.08;
        let load = u
            .iter()
            .enumerate()
            .map(|(n, u)| 10.0 * u + noise(n))
            .collect();
        (u, load)
    }

    #[test]
    fn a_load_cell_at_its_end_is_found_and_a_peak_is_not() {
        let (u, load) = stroke();
        assert_eq!(saturation(&u, &load, 0.01), None);
        let clipped: Vec<f64> = load.iter().map(|load| load.min(350.0)).collect();
        let found = saturation(&u, &clipped, 0.01).unwrap();
        assert_eq!(found.rows, (found.rows[0]..100).collect::<Vec<_>>());
        assert!((87..=88).contains(&found.rows[0]));
        // A dwell at the top is none, nor a display in steps of 5 N.
        let dwell = |values: &[f64]| [values, &[values[99]; 20]].concat();
        assert_eq!(saturation(&dwell(&u), &dwell(&load), 0.01), None);
        let coarse: Vec<f64> = load.iter().map(|load| (load / 5.0).round() * 5.0).collect();
        assert_eq!(saturation(&u, &coarse, 0.01), None);
    }

    #[test]
    fn rows_twice_and_leaps_are_found() {
        let (u, load) = stroke();
        assert!(doubled(&u, &load, None).is_empty() && travel_jumps(&u).is_empty());
        let twice = |values: &[f64]| [&values[..41], &values[40..]].concat();
        assert_eq!(doubled(&twice(&u), &twice(&load), None), [41]);
        let mut leaping = u.clone();
        leaping[50] += 30.0;
        assert_eq!(travel_jumps(&leaping), [50]);
        let back: Vec<f64> = u.iter().chain(u.iter().rev()).copied().collect();
        assert!(travel_jumps(&back).is_empty());
    }
}

//! Ways that spoil the rows of one export: what benches, cables and people do to them.

use super::text_ways::Spoil;
use super::{Row, joined, rows};
use crate::random::Random;

fn on(text: &str, change: impl FnOnce(Vec<Row>) -> Vec<Row>) -> Vec<u8> {
    let (header, all) = rows(text);
    joined(&header, &change(all)).into_bytes()
}

fn each(text: &str, change: impl Fn(Row) -> Row) -> Vec<u8> {
    on(text, |all| all.into_iter().map(change).collect())
}

/// The rows of a late loading stroke: the one that goes furthest in the second half, so the second or the third.
fn late_loading(all: &[Row]) -> std::ops::Range<usize> {
    let bottom = (all.len() / 2..all.len())
        .min_by(|a, b| all[*a][1].total_cmp(&all[*b][1]))
        .unwrap();
    // The last row before the bottom that is longer than the one after it by being in the air: where the unloading ends.
    let start = (0..bottom)
        .rev()
        .take_while(|row| all[*row][1] > all[row + 1][1])
        .last();
    let start = start.unwrap_or(bottom);
    start..bottom + 1
}

/// Row of the last loading stroke where the length first falls below `length`.
fn at(all: &[Row], length: f64) -> usize {
    late_loading(all)
        .find(|row| all[*row][1] < length)
        .unwrap_or(late_loading(all).start)
}

/// Loads from row `from` on are off by `by`.
fn step(text: &str, length: f64, by: f64) -> Vec<u8> {
    on(text, |mut all| {
        let from = at(&all, length);
        for row in &mut all[from..] {
            row[2] += by;
        }
        all
    })
}

fn clipped(text: &str, at: f64, noise: f64) -> Vec<u8> {
    let mut random = Random::new(3, 3);
    on(text, |mut all| {
        for row in &mut all {
            if row[2] > at {
                row[2] = at + random.normal(noise);
            }
        }
        all
    })
}

/// The travel stands still over 20 rows from `length` on, then shows what it is again, or goes on from where it stood.
fn stuck(text: &str, length: f64, loses: bool) -> Vec<u8> {
    on(text, |mut all| {
        let from = at(&all, length);
        let (held, back) = (all[from][1], all[from + 20][1]);
        all[from..from + 20]
            .iter_mut()
            .for_each(|row| row[1] = held);
        if loses {
            all[from + 20..]
                .iter_mut()
                .for_each(|row| row[1] += held - back);
        }
        all
    })
}

fn without(text: &str, from: f64, rows: usize) -> Vec<u8> {
    on(text, |mut all| {
        let from = at(&all, from);
        all.drain(from..from + rows);
        all
    })
}

fn spike(text: &str, length: f64, column: usize, by: f64) -> Vec<u8> {
    on(text, |mut all| {
        let row = at(&all, length);
        all[row][column] += by;
        all
    })
}

fn round(text: &str, column: usize, step: f64) -> Vec<u8> {
    each(text, |mut row| {
        row[column] = (row[column] / step).round() * step;
        row
    })
}

#[rustfmt::skip] // one way a line
pub(crate) const WAYS: &[(&str, Spoil)] = &[
    ("load of the opposite sign", |t, _| each(t, |[t, l, f]| [t, l, -f])),
    ("length of the opposite sign", |t, _| each(t, |[t, l, f]| [t, -l, f])),
    ("deflection for length", |t, _| each(t, |[t, l, f]| [t, 92.2 - l, f])),
    ("load column holds the length again", |t, _| each(t, |[t, l, _]| [t, l, l])),
    ("length column holds the load again", |t, _| each(t, |[t, _, f]| [t, f, f])),
    ("load column holds the time", |t, _| each(t, |[t, l, _]| [t, l, t])),
    ("load and length swapped below the header", |t, _| each(t, |[t, l, f]| [t, f, l])),
    ("load dead at 0", |t, _| each(t, |[t, l, _]| [t, l, 0.0])),
    ("length dead", |t, _| each(t, |[t, _, f]| [t, 80.0, f])),
    ("constant offset of the load", |t, _| each(t, |[t, l, f]| [t, l, f + 6.0])),
    ("last row lost", |t, _| on(t, |a| a[..a.len() - 1].to_vec())),
    ("cut at the end of the second cycle", |t, _| on(t, |a| { let s = late_loading(&a).start; a[..s].to_vec() })),
    ("cut in the last loading stroke, within the window", |t, _| on(t, |a| { let e = at(&a, 68.0); a[..e].to_vec() })),
    ("cut in the last loading stroke, beyond the window", |t, _| on(t, |a| { let e = at(&a, 49.0); a[..e].to_vec() })),
    ("late start: recording begins in the first loading stroke", |t, _| on(t, |a| { let s = a.iter().position(|r| r[1] < 75.0).unwrap(); a[s..].to_vec() })),
    ("late start in the last loading stroke", |t, _| on(t, |a| { let s = at(&a, 80.0); a[s..].to_vec() })),
    ("late start within the window", |t, _| on(t, |a| { let s = at(&a, 68.0); a[s..].to_vec() })),
    ("recording begins at the turn", |t, _| on(t, |a| { let s = late_loading(&a).end; a[s - 1..].to_vec() })),
    ("first cycle lost", |t, _| on(t, |a| { let s = a.len() / 3; a[s..].to_vec() })),
    ("every second row lost", |t, _| on(t, |a| a.into_iter().step_by(2).collect())),
    ("every tenth row only", |t, _| on(t, |a| a.into_iter().step_by(10).collect())),
    ("a row in twenty lost", |t, r| on(t, |a| a.into_iter().filter(|_| r.unit() > 0.05).collect())),
    ("3 rows lost in the window", |t, _| without(t, 70.0, 3)),
    ("12 rows lost in the window", |t, _| without(t, 74.0, 12)),
    ("12 rows lost about the test length", |t, _| without(t, 55.0, 12)),
    ("rows lost about contact", |t, _| without(t, 90.6, 8)),
    ("one row twice", |t, _| on(t, |mut a| { let row = at(&a, 70.0); a.insert(row, a[row]); a })),
    ("every row twice", |t, _| on(t, |a| a.into_iter().flat_map(|row| [row, row]).collect())),
    ("a block of 15 rows twice", |t, _| on(t, |mut a| { let s = at(&a, 70.0); let block = a[s..s + 15].to_vec(); a.splice(s..s, block); a })),
    ("rows shuffled", |t, r| on(t, |mut a| { for i in (1..a.len()).rev() { let s = r.unit(); let j = (0..=i).find(|j| *j as f64 + 1.0 > s * (i as f64 + 1.0)).unwrap(); a.swap(i, j); } a })),
    ("rows shuffled, times in order", |t, r| on(t, |mut a| { let times: Vec<f64> = a.iter().map(|x| x[0]).collect(); for i in (1..a.len()).rev() { let s = r.unit(); let j = (0..=i).find(|j| *j as f64 + 1.0 > s * (i as f64 + 1.0)).unwrap(); a.swap(i, j); } a.iter_mut().zip(times).for_each(|(x, t)| x[0] = t); a })),
    ("rows in reverse", |t, _| on(t, |a| a.into_iter().rev().collect())),
    ("rows in reverse, times in order", |t, _| on(t, |a| a.iter().zip(a.iter().rev()).map(|(x, y)| [x[0], y[1], y[2]]).collect())),
    ("rows sorted by length, times in order", |t, _| on(t, |a| { let mut s = a.clone(); s.sort_by(|x, y| y[1].total_cmp(&x[1])); a.iter().zip(s).map(|(x, y)| [x[0], y[1], y[2]]).collect() })),
    ("two rows swapped", |t, _| on(t, |mut a| { let row = at(&a, 70.0); a.swap(row, row + 3); a })),
    ("two rows swapped, times in order", |t, _| on(t, |mut a| { let row = at(&a, 70.0); let (x, y) = (a[row], a[row + 3]); a[row] = [x[0], y[1], y[2]]; a[row + 3] = [y[0], x[1], x[2]]; a })),
    ("saturated below the window's end", |t, _| clipped(t, 260.0, 0.0)),
    ("saturated between window and test length", |t, _| clipped(t, 380.0, 0.0)),
    ("saturated beyond all that is judged", |t, _| clipped(t, 440.0, 0.0)),
    ("saturated softly below the window's end", |t, _| clipped(t, 260.0, 0.1)),
    ("saturated softly below the test length", |t, _| clipped(t, 390.0, 0.1)),
    ("saturated at once", |t, _| clipped(t, 20.0, 0.0)),
    ("travel stuck over 20 rows in the window, then right again", |t, _| stuck(t, 75.0, false)),
    ("travel stuck over 20 rows in the window, then off", |t, _| stuck(t, 75.0, true)),
    ("travel stuck about the test length, then right again", |t, _| stuck(t, 56.0, false)),
    ("travel stuck from the window to the end", |t, _| on(t, |mut a| { let s = at(&a, 66.0); let held = a[s][1]; for r in &mut a[s..] { r[1] = held; } a })),
    ("load stuck over 20 rows in the window", |t, _| on(t, |mut a| { let s = at(&a, 75.0); let held = a[s][2]; for r in &mut a[s..s + 20] { r[2] = held; } a })),
    ("load stuck over 3 rows in the window", |t, _| on(t, |mut a| { let s = at(&a, 75.0); let held = a[s][2]; for r in &mut a[s..s + 3] { r[2] = held; } a })),
    ("a stray load of + 40 N in the window", |t, _| spike(t, 62.0, 2, 40.0)),
    ("a stray load of − 8 N in the window", |t, _| spike(t, 75.0, 2, -8.0)),
    ("a stray load of + 40 N at the test length", |t, _| spike(t, 52.2, 2, 40.0)),
    ("a stray length of + 20 mm", |t, _| spike(t, 65.0, 1, 20.0)),
    ("a stray length of − 2 mm", |t, _| spike(t, 65.0, 1, -2.0)),
    ("slip of 15 N in the window", |t, _| step(t, 68.0, -15.0)),
    ("slip of 5 N in the window", |t, _| step(t, 68.0, -5.0)),
    ("slip of 15 N before the window", |t, _| step(t, 84.0, -15.0)),
    ("slip of 15 N before the test length", |t, _| step(t, 54.0, -15.0)),
    ("the load's zero jumps by + 12 N in the last stroke", |t, _| step(t, 72.0, 12.0)),
    ("the length's zero jumps by 1.5 mm in the last stroke", |t, _| on(t, |mut a| { let s = at(&a, 66.0); for r in &mut a[s..] { r[1] += 1.5; } a })),
    ("loads rounded to 1 N", |t, _| round(t, 2, 1.0)),
    ("loads rounded to 20 N", |t, _| round(t, 2, 20.0)),
    ("lengths rounded to 0.1 mm", |t, _| round(t, 1, 0.1)),
    ("lengths rounded to 2 mm", |t, _| round(t, 1, 2.0)),
    ("noise of 4 N on the loads", |t, r| on(t, |mut a| { for x in &mut a { x[2] += r.normal(4.0); } a })),
    ("a burst of noise of 30 N over 10 rows in the window", |t, r| on(t, |mut a| { let s = at(&a, 72.0); for x in &mut a[s..s + 10] { x[2] += r.normal(30.0); } a })),
    ("sampled five times as densely in part of the window", |t, _| on(t, |a| { let s = at(&a, 70.0); let mut out = Vec::new(); for (n, w) in a.windows(2).enumerate() { out.push(w[0]); if (s..s + 8).contains(&n) { for k in 1..5 { let g = f64::from(k) / 5.0; out.push([w[0][0] + g * (w[1][0] - w[0][0]), w[0][1] + g * (w[1][1] - w[0][1]), w[0][2] + g * (w[1][2] - w[0][2])]); } } } out })),
];

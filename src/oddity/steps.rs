//! A step in load: a coil that slipped, a grip that gave way, an end that fell into its seat.

use std::ops::Range;

/// A step counts beyond so many times the scatter, and this share of the largest load.
const FAR: (f64, f64) = (9.0, 0.007);
/// Readings on either side that say how the load goes.
const SIDE: usize = 5;
/// Readings a step may take.
const WIDE: usize = 3;
/// What must be left of the step between the lines of both sides.
const STAYS: f64 = 0.5;

/// A step in load.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Step {
    /// The place of the last reading before it.
    pub before: usize,
    /// The place of the first reading after it.
    pub after: usize,
    /// Travel in the middle of it.
    pub at: f64,
    /// How far the load stepped, in its unit.
    pub size: f64,
}

/// The steps on one stroke (`points`: travel, growing, and load) whose rate is about `rate`. A bend is none: within it
/// the load rises at a rate between those on either side. The first and last three readings can show none.
pub fn steps(points: &[(f64, f64)], rate: f64, scatter: f64, largest: f64) -> Vec<Step> {
    let far = (FAR.0 * scatter).max(FAR.1 * largest);
    let mut found: Vec<Step> = Vec::new();
    let mut place = 0;
    while place + 1 < points.len() {
        let next = (1..=WIDE).find_map(|width| {
            let plain = jump(points, place, place + width, rate)?;
            (plain.abs() > far).then(|| step(points, place, place + width, far))?
        });
        match next {
            Some(step) => {
                place = step.after;
                match found.last_mut() {
                    // One slip over more readings than are looked at together.
                    Some(last) if last.after == step.before && last.size * step.size > 0.0 => {
                        last.after = step.after;
                        last.size += step.size;
                    }
                    _ => found.push(step),
                }
            }
            None => place += 1,
        }
    }
    found
}

/// What the load rose from one place to another beyond a rate.
fn jump(points: &[(f64, f64)], from: usize, to: usize, rate: f64) -> Option<f64> {
    let (a, b) = (points.get(from)?, points.get(to)?);
    Some(b.1 - a.1 - rate * (b.0 - a.0))
}

fn step(points: &[(f64, f64)], before: usize, after: usize, far: f64) -> Option<Step> {
    let left = line(points, (before + 1).saturating_sub(SIDE)..before + 1)?;
    let right = line(points, after..(after + SIDE).min(points.len()))?;
    let beyond = [left.slope, right.slope].map(|slope| jump(points, before, after, slope));
    let [Some(by_left), Some(by_right)] = beyond else {
        return None;
    };
    let size = if by_left.abs() < by_right.abs() {
        by_left
    } else {
        by_right
    };
    let at = f64::midpoint(points.get(before)?.0, points.get(after)?.0);
    let stays = (right.at(at) - left.at(at)) * size.signum();
    let whole =
        by_left * by_right > 0.0 && size.abs() > far && stays > (STAYS * size.abs()).max(far / 2.0);
    whole.then_some(Step {
        before,
        after,
        at,
        size,
    })
}

struct Line {
    middle: (f64, f64),
    slope: f64,
}

impl Line {
    fn at(&self, u: f64) -> f64 {
        self.middle.1 + self.slope * (u - self.middle.0)
    }
}

/// The least-squares line through some readings; `None` under three of them.
fn line(points: &[(f64, f64)], range: Range<usize>) -> Option<Line> {
    let some = points.get(range)?;
    if some.len() < 3 {
        return None;
    }
    let count = some.len() as f64;
    let middle = (
        some.iter().map(|point| point.0).sum::<f64>() / count,
        some.iter().map(|point| point.1).sum::<f64>() / count,
    );
    let squares: f64 = some.iter().map(|point| (point.0 - middle.0).powi(2)).sum();
    let products: f64 = some
        .iter()
        .map(|point| (point.0 - middle.0) * (point.1 - middle.1))
        .sum();
    let slope = products / squares;
    slope.is_finite().then_some(Line { middle, slope })
}

#[cfg(test)]
mod tests {
    #![expect(clippy::indexing_slicing, reason = "tests")]
    use super::*;

    fn curve(shape: &dyn Fn(f64) -> f64) -> Vec<(f64, f64)> {
        let noise = |n: u32| (f64::from(n) * 78.233).sin() * 0.05;
        (0..100)
            .map(|n| (f64::from(n), shape(f64::from(n)) + noise(n)))
            .collect()
    }

    #[test]
    fn a_slip_is_found_where_it_is() {
        for (fall, wide) in [(-12.0, 1.0), (9.0, 1.0), (-20.0, 3.0)] {
            let slipped = curve(&|u| 4.0 * u + fall * ((u - 40.0) / wide).clamp(0.0, 1.0));
            let found = steps(&slipped, 4.0, 0.04, 400.0);
            assert_eq!(found.len(), 1, "{found:?}");
            // A slip over three readings is told from its edges only roughly.
            let near = (found[0].at - 41.0).abs() < 1.6 && found[0].size / fall > 0.6;
            assert!(near && found[0].size / fall < 1.3, "{found:?}");
        }
    }

    #[test]
    fn bends_are_no_steps() {
        let knee = curve(&|u| 4.0 * u + 4.0 * (u - 50.0).max(0.0));
        let solid = curve(&|u| 4.0 * u + 240.0 * (u - 90.0).max(0.0));
        let contact = curve(&|u| 4.0 * (u - 10.0).max(0.0));
        let progressive = curve(&|u| 2.0 * u + 0.02 * u * u);
        for (name, bent) in [
            ("knee", knee),
            ("solid", solid),
            ("contact", contact),
            ("progressive", progressive),
        ] {
            let largest = bent[99].1;
            assert!(steps(&bent, 4.0, 0.04, largest).is_empty(), "{name}");
        }
    }
}

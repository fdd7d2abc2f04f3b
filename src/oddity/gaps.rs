//! Rows that are missing from a stroke, and stretches sampled more densely than others.

/// A leap in travel beyond so many times what is usual nearby is one; at least so, and this many times the spread of
/// the usual steps.
const LEAP: (f64, f64) = (1.9, 2.2);
/// Steps looked at on either side.
const NEAR: usize = 5;
/// A leap below this share of the stroke is no matter.
const SMALL: f64 = 0.01;
/// Shares of the stroke looked at for evenness, in four parts, and the counts' ratio that is uneven.
const MIDDLE: (f64, f64) = (0.3, 0.7);
const UNEVEN: usize = 4;

/// A leap in travel with no row in it, in mm of travel.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Gap {
    /// The place of the row before it.
    pub before: usize,
    /// Travel there.
    pub from: f64,
    /// Travel of the row after it.
    pub to: f64,
}

/// The gaps in a stroke whose travels `u` grow.
pub fn gaps(u: &[f64]) -> Vec<Gap> {
    let steps: Vec<f64> = u.windows(2).map(step).collect();
    let (Some(start), Some(end)) = (u.first(), u.last()) else {
        return Vec::new();
    };
    let least = SMALL * (end - start);
    let places: Vec<usize> = (0..steps.len())
        .filter(|place| steps.get(*place).is_some_and(|step| *step > least))
        .filter(|place| ratio(&steps, *place).is_some_and(|ratio| ratio > LEAP.0))
        .collect();
    if places.is_empty() {
        return Vec::new();
    }
    let mut ratios: Vec<f64> = (0..steps.len())
        .filter_map(|place| ratio(&steps, place))
        .collect();
    ratios.sort_by(f64::total_cmp);
    // Where steps differ by themselves, a leap must stand out from what they do: from the highest tenth of them.
    let tenth = ratios.len() - ratios.len() / 10 - 1;
    let usual = ratios.get(tenth).copied().unwrap_or(1.0);
    let bound = LEAP.0.max(LEAP.1 * usual);
    places
        .into_iter()
        .filter(|place| ratio(&steps, *place).is_some_and(|ratio| ratio > bound))
        .filter_map(|before| {
            Some(Gap {
                before,
                from: *u.get(before)?,
                to: *u.get(before + 1)?,
            })
        })
        .collect()
}

fn step(pair: &[f64]) -> f64 {
    match pair {
        [a, b] => b - a,
        _ => 0.0,
    }
}

/// A step over the larger of the usual steps before and after it: where the platen changes its speed one of them fits.
/// `None` among the first and last three steps, where only one side is known.
fn ratio(steps: &[f64], place: usize) -> Option<f64> {
    let side = |range: std::ops::Range<usize>| {
        let some: Vec<f64> = steps.get(range)?.to_vec();
        (some.len() >= 3).then(|| crate::stats::median(some))?
    };
    let before = side(place.saturating_sub(NEAR)..place);
    let after = side(place + 1..(place + 1 + NEAR).min(steps.len()));
    let usual = before?.max(after?);
    (usual > 0.0).then(|| steps.get(place).map(|step| step / usual))?
}

/// Whether the middle of a stroke, travels `u` growing, is sampled unevenly: one quarter of it holds four times the
/// rows of another.
pub fn uneven(u: &[f64]) -> bool {
    let (Some(start), Some(end)) = (u.first(), u.last()) else {
        return false;
    };
    let from = start + MIDDLE.0 * (end - start);
    let wide = (MIDDLE.1 - MIDDLE.0) * (end - start) / 4.0;
    let count = |part: f64| {
        let low = from + part * wide;
        u.iter().filter(|u| **u >= low && **u < low + wide).count()
    };
    let counts = [count(0.0), count(1.0), count(2.0), count(3.0)];
    let (least, most) = counts.iter().fold((usize::MAX, 0), |(least, most), one| {
        (least.min(*one), most.max(*one))
    });
    most >= 3 * UNEVEN && most >= UNEVEN * least.max(1)
}

#[cfg(test)]
mod tests {
    #![expect(clippy::indexing_slicing, reason = "tests")]
    use super::*;

    #[test]
    fn lost_rows_are_found_and_another_speed_is_none() {
        let even: Vec<f64> = (0..100).map(f64::from).collect();
        assert!(gaps(&even).is_empty());
        let lost = [&even[..40], &even[42..]].concat();
        assert_eq!(
            gaps(&lost),
            [Gap {
                before: 39,
                from: 39.0,
                to: 42.0
            }]
        );
        let mut faster = even.clone();
        faster.extend((1..30).map(|n| 99.0 + 8.0 * f64::from(n)));
        assert!(gaps(&faster).is_empty());
        // Steps drawn between a fifth and nine fifths of the mean.
        let mut random = 7_u64;
        let mut at = 0.0;
        let jittered: Vec<f64> = (0..200)
            .map(|_| {
                random = random
                    .wrapping_mul(6_364_136_223_846_793_005)
                    .wrapping_add(1);
                at += 0.2 + 1.6 * (random >> 40) as f64 / (1_u64 << 24) as f64;
                at
            })
            .collect();
        assert!(gaps(&jittered).is_empty(), "{:?}", gaps(&jittered));
        assert!(!uneven(&even) && !uneven(&jittered));
        let mut dense: Vec<f64> = (0..100)
            .map(f64::from)
            .chain((0..200).map(|n| 40.5 + 0.05 * f64::from(n)))
            .collect();
        dense.sort_by(f64::total_cmp);
        assert!(uneven(&dense));
    }
}

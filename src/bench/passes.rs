//! The loading passes of a run of plate on plate: where the load rises, from a valley to a peak.

use std::ops::Range;

/// A turn of the load smaller than this share of its whole rise is noise.
const TURN: f64 = 0.1;
/// A pass that rises by less than this share of the whole rise is none.
const FULL: f64 = 0.5;

/// The ranges of points over which the load rises by at least half of its whole rise, in order.
pub(super) fn rising(load: &[f64]) -> Vec<Range<usize>> {
    let low = load.iter().copied().fold(f64::INFINITY, f64::min);
    let rise = load.iter().copied().fold(f64::NEG_INFINITY, f64::max) - low;
    let mut passes = Vec::new();
    let Some(first) = load.first() else {
        return Vec::new();
    };
    let (mut valley, mut peak) = ((0, *first), (0, *first));
    let mut up = true;
    for (place, force) in load.iter().copied().enumerate() {
        if up {
            if force > peak.1 {
                peak = (place, force);
            }
            if peak.1 - force > TURN * rise {
                passes.push((valley, peak));
                (valley, up) = ((place, force), false);
            } else if force < valley.1 && peak.1 - valley.1 <= TURN * rise {
                (valley, peak) = ((place, force), (place, force)); // it has not risen yet
            }
        } else {
            if force < valley.1 {
                valley = (place, force);
            }
            if force - valley.1 > TURN * rise {
                (peak, up) = ((place, force), true);
            }
        }
    }
    if up {
        passes.push((valley, peak));
    }
    let full = passes
        .into_iter()
        .filter(|(valley, peak)| peak.1 - valley.1 >= FULL * rise && rise > 0.0);
    full.map(|(valley, peak)| valley.0..peak.0 + 1).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn passes_go_from_valley_to_peak() {
        let load = [
            0.0, 0.1, 5.0, 10.0, 9.9, 6.0, 0.0, 0.1, 4.0, 9.0, 8.95, 10.0,
        ];
        assert_eq!(rising(&load), [0..4, 6..12]);
        assert!(rising(&[1.0; 5]).is_empty());
        assert!(rising(&[]).is_empty());
        assert_eq!(rising(&[3.0, 0.0, 10.0]).first(), Some(&(1..3)));
    }
}

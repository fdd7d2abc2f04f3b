//! Single readings far off the curve of their neighbours.

/// A reading is far off beyond so many times the scatter, and this share of the largest load.
const FAR: (f64, f64) = (10.0, 0.005);
/// What the neighbours of a stray reading show of it, with the other sign, at least.
const ECHO: f64 = 0.2;
/// More stray readings than this share of a stroke are no single ones.
const MOST: f64 = 0.02;

/// Places of the readings on one stroke (`points`: travel, growing, and load) that stand off their neighbours by more
/// than ten times the `scatter` and half a per cent of the `largest` load. A bend or a step is none: there the
/// neighbours do not show it with the other sign. `None` where there are too many to be single ones.
pub fn stray(points: &[(f64, f64)], scatter: f64, largest: f64) -> Option<Vec<usize>> {
    let far = (FAR.0 * scatter).max(FAR.1 * largest);
    let found: Vec<usize> = (2..points.len().saturating_sub(2))
        .filter(|place| {
            let Some(off) = off_chord(points, *place) else {
                return false;
            };
            let echo = |place: usize| {
                off_chord(points, place)
                    .is_none_or(|other| other * off.signum() < -ECHO * off.abs())
            };
            off.abs() > far && echo(place - 1) && echo(place + 1)
        })
        .collect();
    let most = (MOST * points.len() as f64).max(3.0);
    (found.len() as f64 <= most).then_some(found)
}

/// How far a reading lies above the chord between its neighbours; `None` where those are at one travel.
fn off_chord(points: &[(f64, f64)], place: usize) -> Option<f64> {
    let (a, b, c) = (
        points.get(place.checked_sub(1)?)?,
        points.get(place)?,
        points.get(place + 1)?,
    );
    (c.0 > a.0).then(|| b.1 - a.1 - (c.1 - a.1) * (b.0 - a.0) / (c.0 - a.0))
}

#[cfg(test)]
mod tests {
    #![expect(clippy::indexing_slicing, reason = "tests")]
    use super::*;

    #[test]
    fn a_spike_is_stray_and_a_bend_or_a_step_is_not() {
        let curve = |shape: &dyn Fn(f64) -> f64| -> Vec<(f64, f64)> {
            (0..100).map(f64::from).map(|u| (u, shape(u))).collect()
        };
        let mut spiked = curve(&|u| 4.0 * u);
        spiked[30].1 += 20.0;
        assert_eq!(stray(&spiked, 0.05, 400.0), Some(vec![30]));
        let bent = curve(&|u| 4.0 * u + 200.0 * (u - 80.0).max(0.0));
        assert_eq!(stray(&bent, 0.05, 4000.0), Some(vec![]));
        let stepped = curve(&|u| 4.0 * u - if u > 50.0 { 30.0 } else { 0.0 });
        assert_eq!(stray(&stepped, 0.05, 400.0), Some(vec![]));
        let noisy = curve(&|u| 4.0 * u + if u % 4.0 < 0.5 { 20.0 } else { 0.0 });
        assert_eq!(stray(&noisy, 0.05, 400.0), None);
    }
}

//! A curve small enough to draw. No figure is ever taken from it.

/// The most points a stroke keeps for drawing.
pub const MOST_POINTS: usize = 400;

/// What the abscissa of a reduced curve is, in mm.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Axis {
    /// Length of the spring.
    Length,
    /// Deflection from contact; there is no absolute length.
    Deflection,
}

/// One spring's strokes and residuals, thinned for charts; abscissae in mm, ordinates in N.
#[derive(Clone, Debug, PartialEq)]
pub struct Reduced {
    /// The spring's id.
    pub id: String,
    /// What the abscissae are.
    pub axis: Axis,
    /// The judged loading stroke.
    pub loading: Vec<(f64, f64)>,
    /// The unloading stroke after it.
    pub unloading: Vec<(f64, f64)>,
    /// Load less the fitted line, within the window.
    pub residuals: Vec<(f64, f64)>,
}

/// At most `most` of the points, in their order: first, last, and of every stretch between them the lowest and the highest.
pub fn thin(points: &[(f64, f64)], most: usize) -> Vec<(f64, f64)> {
    let (Some(first), Some(last)) = (points.first(), points.last()) else {
        return Vec::new();
    };
    if points.len() <= most || most < 4 {
        return points.iter().copied().take(most.max(1)).collect();
    }
    let inner = points.get(1..points.len() - 1).unwrap_or(&[]);
    let stretches = (most - 2) / 2;
    let mut kept = Vec::with_capacity(most);
    kept.push(*first);
    for number in 0..stretches {
        let from = inner.len() * number / stretches;
        let to = inner.len() * (number + 1) / stretches;
        let stretch = inner.get(from..to).unwrap_or(&[]);
        let by_load = |a: &(usize, &(f64, f64)), b: &(usize, &(f64, f64))| a.1.1.total_cmp(&b.1.1);
        let lowest = stretch.iter().enumerate().min_by(by_load);
        let highest = stretch.iter().enumerate().max_by(by_load);
        if let (Some((low_at, low)), Some((high_at, high))) = (lowest, highest) {
            match low_at.cmp(&high_at) {
                std::cmp::Ordering::Less => kept.extend([*low, *high]),
                std::cmp::Ordering::Greater => kept.extend([*high, *low]),
                std::cmp::Ordering::Equal => kept.push(*low),
            }
        }
    }
    kept.push(*last);
    kept
}

#[cfg(test)]
mod tests {
    #![expect(clippy::indexing_slicing, reason = "tests")]
    use super::*;

    #[test]
    fn ends_and_extremes_stay() {
        let mut points: Vec<(f64, f64)> = (0..5000)
            .map(|n| (f64::from(n), f64::from(n % 7)))
            .collect();
        if let Some(point) = points.get_mut(2345) {
            point.1 = 99.0;
        }
        if let Some(point) = points.get_mut(4001) {
            point.1 = -99.0;
        }
        let kept = thin(&points, MOST_POINTS);
        assert!(kept.len() <= MOST_POINTS && kept.len() > 300);
        assert!(kept.contains(&(2345.0, 99.0)) && kept.contains(&(4001.0, -99.0)));
        assert!(kept.first() == points.first() && kept.last() == points.last());
        assert!(kept.windows(2).all(|pair| pair[0].0 < pair[1].0));
    }

    #[test]
    fn a_short_curve_stays_whole() {
        let points = [(0.0, 1.0), (1.0, 2.0), (2.0, 0.5)];
        assert_eq!(thin(&points, MOST_POINTS), points);
        assert_eq!(thin(&[], MOST_POINTS), []);
    }
}

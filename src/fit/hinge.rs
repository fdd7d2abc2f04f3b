//! A line with one hinge, from running sums: least squares at any place of the hinge, and over all of them.

/// Running sums of points in growing x, so that any hinge costs the same.
pub(super) struct Sums {
    x: Vec<f64>,
    origin: (f64, f64),
    /// Sums over the first i points: count, x, y, x², xy, y², about the origin.
    running: Vec<[f64; 6]>,
}

/// The least-squares hinge at one place.
pub(super) struct Hinge {
    knee: f64,
    level: f64,
    /// Slope before the knee.
    pub(super) slope: f64,
    /// Change of slope at the knee.
    pub(super) bend: f64,
    /// Sum of squares left.
    squares: f64,
    /// Variance of the bend over that of one point.
    pub(super) bend_variance: f64,
}

impl Hinge {
    /// y at x.
    pub(super) fn value(&self, x: f64) -> f64 {
        self.level + self.slope * (x - self.knee) + self.bend * (x - self.knee).max(0.0)
    }
}

/// The best hinge of all.
#[derive(Clone, Copy)]
pub(super) struct Best {
    /// Its place.
    pub(super) knee: f64,
    /// Sum of squares left.
    pub(super) squares: f64,
}

impl Sums {
    pub(super) fn of(x: &[f64], y: &[f64]) -> Self {
        let count = x.len().max(1) as f64;
        let origin = (x.iter().sum::<f64>() / count, y.iter().sum::<f64>() / count);
        let mut running = vec![[0.0; 6]];
        let mut sum = [0.0; 6];
        for (x, y) in x.iter().zip(y) {
            let (x, y) = (x - origin.0, y - origin.1);
            for (sum, term) in sum.iter_mut().zip([1.0, x, y, x * x, x * y, y * y]) {
                *sum += term;
            }
            running.push(sum);
        }
        Self {
            x: x.to_vec(),
            origin,
            running,
        }
    }

    /// Sums about x = `knee`, of the points before it and from it on.
    fn split(&self, knee: f64) -> Option<[[f64; 6]; 2]> {
        let at = self.x.partition_point(|x| *x < knee);
        let (before, all) = (self.running.get(at)?, self.running.last()?);
        let moved = |[n, x, y, xx, xy, yy]: [f64; 6]| {
            let k = knee - self.origin.0;
            [
                n,
                x - n * k,
                y,
                xx - 2.0 * k * x + n * k * k,
                xy - k * y,
                yy,
            ]
        };
        let mut after = *all;
        for (after, before) in after.iter_mut().zip(before) {
            *after -= before;
        }
        Some([moved(*before), moved(after)])
    }

    /// The least-squares hinge at `knee`; `None` where the points do not carry it.
    pub(super) fn at(&self, knee: f64) -> Option<Hinge> {
        let [[n1, x1, y1, xx1, xy1, yy1], [n2, x2, y2, xx2, xy2, yy2]] = self.split(knee)?;
        // y = level + slope·t + bend·max(t, 0), t = x − knee: normal equations in (level, slope, bend).
        let matrix = [
            [n1 + n2, x1 + x2, x2],
            [x1 + x2, xx1 + xx2, xx2],
            [x2, xx2, xx2],
        ];
        let right = [y1 + y2, xy1 + xy2, xy2];
        let inverse = inverse(matrix)?;
        let solved = inverse.map(|row| row.iter().zip(&right).map(|(a, b)| a * b).sum::<f64>());
        let explained: f64 = solved.iter().zip(&right).map(|(a, b)| a * b).sum();
        let [level, slope, bend] = solved;
        let [_, _, [_, _, bend_variance]] = inverse;
        Some(Hinge {
            knee,
            level: level + self.origin.1,
            slope,
            bend,
            squares: (yy1 + yy2 - explained).max(0.0),
            bend_variance,
        })
    }

    /// Sum of squares of the best hinge at `knee`.
    fn squares(&self, knee: f64) -> f64 {
        self.at(knee).map_or(f64::INFINITY, |hinge| hinge.squares)
    }

    /// The best hinge over every interval between two points that leaves `least` points on either side. Within an interval
    /// the optimum is where the two separate lines meet, if they meet there, else one of its ends (Hudson 1966; from memory).
    pub(super) fn best(&self, least: usize) -> Option<Best> {
        let mut best: Option<Best> = None;
        let mut take = |knee: f64| {
            let squares = self.squares(knee);
            if squares.is_finite() && best.is_none_or(|known| squares < known.squares) {
                best = Some(Best { knee, squares });
            }
        };
        for (place, pair) in self.x.windows(2).enumerate() {
            let [low, high] = pair else { continue };
            let before = place + 1;
            if before < least || self.x.len() - before < least {
                continue;
            }
            take(*low);
            take(*high);
            if let Some(meeting) = self.meeting(before)
                && meeting > *low
                && meeting < *high
            {
                take(meeting);
            }
        }
        best
    }

    /// Where the line of the first `before` points meets that of the others.
    fn meeting(&self, before: usize) -> Option<f64> {
        let first = self.running.get(before)?;
        let all = self.running.last()?;
        let mut rest = *all;
        for (rest, first) in rest.iter_mut().zip(first) {
            *rest -= first;
        }
        let line = |[n, x, y, xx, xy, _]: [f64; 6]| {
            let spread = xx - x * x / n;
            let slope = (xy - x * y / n) / spread;
            (slope, (y - slope * x) / n)
        };
        let ((b1, a1), (b2, a2)) = (line(*first), line(rest));
        let meeting = (a1 - a2) / (b2 - b1) + self.origin.0;
        meeting.is_finite().then_some(meeting)
    }

    /// The hull of all places of the hinge whose sum of squares is at most `allowed`, about the best one.
    pub(super) fn profile(&self, best: f64, allowed: f64) -> (f64, f64) {
        let inside = |knee: &f64| self.squares(*knee) <= allowed;
        let low = self
            .x
            .iter()
            .copied()
            .find(|x| inside(x))
            .map_or(best, |x| x.min(best));
        let high = self
            .x
            .iter()
            .rev()
            .copied()
            .find(|x| inside(x))
            .map_or(best, |x| x.max(best));
        let outer = |from: f64, next: Option<f64>| match next {
            Some(beyond) => self.edge(from, beyond, allowed),
            None => from,
        };
        let before = self.x.iter().rev().copied().find(|x| *x < low);
        let after = self.x.iter().copied().find(|x| *x > high);
        (outer(low, before), outer(high, after))
    }

    /// Where the sum of squares crosses `allowed` between a place inside and one outside.
    fn edge(&self, mut inside: f64, mut outside: f64, allowed: f64) -> f64 {
        for _ in 0..60 {
            let middle = f64::midpoint(inside, outside);
            if self.squares(middle) <= allowed {
                inside = middle;
            } else {
                outside = middle;
            }
        }
        inside
    }
}

/// The inverse of a symmetric matrix; `None` where it has none to speak of.
#[expect(clippy::many_single_char_names, reason = "entries of a matrix")]
fn inverse(m: [[f64; 3]; 3]) -> Option<[[f64; 3]; 3]> {
    let [[a, b, c], [_, d, e], [_, _, f]] = m;
    let (aa, bb, cc) = (d * f - e * e, c * e - b * f, b * e - c * d);
    let determinant = a * aa + b * bb + c * cc;
    let size = (a * d * f).abs();
    if determinant.abs() <= 1e-13 * size || !determinant.is_finite() {
        return None;
    }
    let (dd, ee, ff) = (a * f - c * c, b * c - a * e, a * d - b * b);
    let over = |value: f64| value / determinant;
    Some([
        [over(aa), over(bb), over(cc)],
        [over(bb), over(dd), over(ee)],
        [over(cc), over(ee), over(ff)],
    ])
}

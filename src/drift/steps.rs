//! Change points: where the level of a series jumps.

use crate::stats::f_upper_tail;

/// Lots on either side of a change point, at least.
pub const SHORTEST: usize = 3;
/// A change point is one where chance alone would show such a jump in at most this share of series.
const CHANCE: f64 = 0.01;
/// Share of certainty of the interval of its place.
const CERTAINTY: f64 = 0.95;

/// A jump of the level.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Step {
    /// Place of the first value after it.
    pub at: usize,
    /// Earliest place of the interval of 95 %.
    pub from: usize,
    /// Latest place.
    pub to: usize,
    /// Start of the stretch before it.
    pub begins: usize,
    /// End of the stretch after it: the first place beyond.
    pub ends: usize,
    /// Mean before it.
    pub before: f64,
    /// Mean after it.
    pub after: f64,
    /// Standard uncertainty of the jump.
    pub uncertainty: f64,
    /// Chance of such a jump somewhere in the stretch, at most (Bonferroni over the places).
    pub chance: f64,
}

/// Sums over a stretch in O(1).
struct Sums {
    sums: Vec<(f64, f64)>,
}

impl Sums {
    fn of(values: &[f64]) -> Self {
        let centre = crate::stats::mean(values).unwrap_or(0.0);
        let mut sums = vec![(0.0, 0.0)];
        let (mut one, mut two) = (0.0, 0.0);
        for value in values {
            one += value - centre;
            two += (value - centre).powi(2);
            sums.push((one, two));
        }
        Self { sums }
    }

    /// Count, mean about the centre of all, sum of squares about that mean.
    fn over(&self, from: usize, to: usize) -> (f64, f64, f64) {
        let at = |place: usize| self.sums.get(place).copied().unwrap_or((0.0, 0.0));
        let n = to.saturating_sub(from) as f64;
        let (one, two) = (at(to).0 - at(from).0, at(to).1 - at(from).1);
        (n, one / n, (two - one * one / n).max(0.0))
    }
}

/// The change points of `values`, in their order: the best of the whole series, then of each part, while chance alone would
/// seldom show one.
pub fn steps(values: &[f64]) -> Vec<Step> {
    let sums = Sums::of(values);
    let mut cuts = Vec::new();
    let mut open = vec![(0, values.len())];
    while let Some((from, to)) = open.pop() {
        if let Some(at) = best(&sums, from, to) {
            cuts.push(at);
            open.push((from, at));
            open.push((at, to));
        }
    }
    cuts.sort_unstable();
    let ends = |place: usize| cuts.get(place + 1).copied().unwrap_or(values.len());
    let mut found = Vec::new();
    for (place, at) in cuts.iter().enumerate() {
        let begins = place.checked_sub(1).and_then(|last| cuts.get(last));
        found.extend(step(
            &sums,
            values,
            begins.copied().unwrap_or(0),
            *at,
            ends(place),
        ));
    }
    found
}

/// The chance of the jump at `at` being chance, over all its possible places.
fn chance(sums: &Sums, from: usize, at: usize, to: usize) -> Option<f64> {
    let whole = sums.over(from, to);
    let (left, right) = (sums.over(from, at), sums.over(at, to));
    let rest = left.2 + right.2;
    let dof = whole.0 - 2.0;
    let f = (whole.2 - rest).max(0.0) / (rest / dof);
    let places = whole.0 - 2.0 * SHORTEST as f64 + 1.0;
    f_upper_tail(f, 1.0, dof)
        .ok()
        .map(|p| (p * places).min(1.0))
}

fn places(from: usize, to: usize) -> std::ops::RangeInclusive<usize> {
    from + SHORTEST..=to.saturating_sub(SHORTEST)
}

fn best(sums: &Sums, from: usize, to: usize) -> Option<usize> {
    let rest = |at: usize| sums.over(from, at).2 + sums.over(at, to).2;
    let at = places(from, to).min_by(|a, b| rest(*a).total_cmp(&rest(*b)))?;
    chance(sums, from, at, to)
        .is_some_and(|chance| chance <= CHANCE)
        .then_some(at)
}

/// The jump between two stretches; its place is weighed by the likelihood of every place between them, the level and the scatter
/// being whatever fits best there.
fn step(sums: &Sums, values: &[f64], begins: usize, at: usize, ends: usize) -> Option<Step> {
    let rest = |at: usize| sums.over(begins, at).2 + sums.over(at, ends).2;
    let least = rest(at);
    let (left, right) = (sums.over(begins, at), sums.over(at, ends));
    let dof = left.0 + right.0 - 2.0;
    let weight = |place: usize| {
        let ratio = least / rest(place);
        if ratio.is_finite() {
            ratio.powf(dof / 2.0)
        } else {
            f64::from(u8::from(place == at))
        }
    };
    let mut weights: Vec<(usize, f64)> = places(begins, ends).map(|p| (p, weight(p))).collect();
    weights.sort_by(|a, b| b.1.total_cmp(&a.1));
    let all: f64 = weights.iter().map(|(_, weight)| weight).sum();
    let (mut from, mut to, mut held) = (at, at, 0.0);
    for (place, weight) in weights {
        if held >= CERTAINTY * all {
            break;
        }
        held += weight;
        (from, to) = (from.min(place), to.max(place));
    }
    let variance = least / dof;
    let mean = |from: usize, to: usize| crate::stats::mean(values.get(from..to)?);
    Some(Step {
        at,
        from,
        to,
        begins,
        ends,
        before: mean(begins, at)?,
        after: mean(at, ends)?,
        uncertainty: (variance * (1.0 / left.0 + 1.0 / right.0)).sqrt(),
        chance: chance(sums, begins, at, ends)?,
    })
}

//! What travel means, which way loads push, and how the spring is taken through the test, from the rows of one spring.

use crate::curve::split;
use crate::drawing::Way;
use crate::export::RawCurve;
use crate::oddity::step_of;
use crate::rig::Pushing;

/// A deflection begins within this share of its range.
const BEGINS: f64 = 0.15;
/// The contact load drafted, as a share of the largest load.
const CONTACT: f64 = 0.005;

/// What the rows of one spring say.
#[derive(Clone, Debug)]
pub struct Meaning {
    /// `deflection` or `length`.
    pub means: &'static str,
    /// Why.
    pub why: String,
    /// What speaks against it.
    pub doubts: Vec<String>,
    /// The sign of travel that pushes, for a deflection.
    pub travel_pushing: Pushing,
    /// The sign of loads that push.
    pub load_pushing: Pushing,
    /// Loading and unloading strokes.
    pub strokes: (usize, usize),
    /// Steps of load and travel, N and mm.
    pub steps: (Option<f64>, Option<f64>),
    /// A contact load, N.
    pub contact: f64,
    /// Whether the recording begins on a loaded spring.
    pub starts_loaded: bool,
}

/// What the rows of `curve` say, read with loads and travel as written; `name` is the travel column's.
pub fn meaning(curve: &RawCurve, name: &str) -> Meaning {
    let (low, high) = ends(&curve.load);
    let first = curve.load.first().copied().unwrap_or(0.0);
    let pulls = (low - first).abs() > (high - first).abs();
    let size = if pulls { first - low } else { high - first };
    let load: Vec<f64> = curve
        .load
        .iter()
        .map(|load| if pulls { -load } else { *load })
        .collect();
    let place = place_of_most(&load);
    let start = curve.travel.first().copied().unwrap_or(0.0);
    let at_most = curve.travel.get(place).copied().unwrap_or(0.0);
    let grows = at_most > start;
    let (from, to) = ends(&curve.travel);
    let lower = name.to_lowercase();
    let is_length = ["length", "länge", "height", "höhe", "gap"]
        .iter()
        .any(|word| lower.contains(word));
    let near_zero = start.abs() <= BEGINS * (to - from);
    let mut doubts = Vec::new();
    let (means, why) = match (grows, near_zero) {
        (true, true) => (
            "deflection",
            "the travel begins near 0 and grows with the load".to_owned(),
        ),
        (true, false) => {
            doubts.push("the travel does not begin near 0: if it is the position of the platen, write means = \"platen position\" and at_zero_gap = the reading with the platens touching".to_owned());
            ("deflection", "the travel grows with the load".to_owned())
        }
        (false, true) if start <= 0.0 || to <= BEGINS * (to - from) => (
            "deflection",
            "the travel begins near 0 and goes below it as the load grows".to_owned(),
        ),
        (false, _) => (
            "length",
            "the travel falls as the load grows, and stays above 0".to_owned(),
        ),
    };
    if means == "length" && !is_length {
        doubts.push("the name does not say that it is a length: a platen position that falls looks the same; hold a gauge block between the platens to tell".to_owned());
    }
    if means == "deflection" && is_length {
        doubts.push("the name speaks of a length, but it grows with the load".to_owned());
    }
    let sign = if grows { 1.0 } else { -1.0 };
    let u: Vec<f64> = curve.travel.iter().map(|travel| sign * travel).collect();
    let strokes = split(&u, step_of(&curve.travel, 0.0).unwrap_or(0.0)).full;
    let count = |way: Way| strokes.iter().filter(|stroke| stroke.way == way).count();
    let contact = nice(CONTACT * size);
    Meaning {
        means,
        why,
        doubts,
        travel_pushing: if means == "deflection" && !grows {
            Pushing::Negative
        } else {
            Pushing::Positive
        },
        load_pushing: if pulls {
            Pushing::Negative
        } else {
            Pushing::Positive
        },
        strokes: (count(Way::Loading), count(Way::Unloading)),
        steps: (step_of(&curve.load, 1e-6), step_of(&curve.travel, 1e-6)),
        contact,
        starts_loaded: first.abs() > 0.1 * size,
    }
}

fn ends(values: &[f64]) -> (f64, f64) {
    let low = values.iter().copied().fold(f64::INFINITY, f64::min);
    (
        low,
        values.iter().copied().fold(f64::NEG_INFINITY, f64::max),
    )
}

fn place_of_most(values: &[f64]) -> usize {
    let best = values.iter().enumerate().max_by(|a, b| a.1.total_cmp(b.1));
    best.map_or(0, |(place, _)| place)
}

/// The largest of 1, 2, 5 times a power of ten that is not above `value`; 0.01 at least.
fn nice(value: f64) -> f64 {
    let value = value.max(0.01);
    let power = 10.0_f64.powf(value.log10().floor());
    let digit = [5.0, 2.0]
        .into_iter()
        .find(|digit| digit * power <= value)
        .unwrap_or(1.0);
    // Written with two digits, so that the file does not show rounding.
    (digit * power * 100.0).round() / 100.0
}

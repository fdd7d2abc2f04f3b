//! Which values an oddity of the curve withholds: none is made from rows that do not hold it.

use crate::curve::{Curve, Path};
use crate::drawing::Way;
use crate::oddity::Odd;
use crate::quantity::Quantity;

use super::measure::{Absence, Setup};
use super::rate::RateFit;

/// A gap within the window hides no bend up to this share of it; one within a loop, up to this share of its travel.
const OF_WINDOW: f64 = 0.2;
const OF_LOOP: f64 = 0.05;

/// Rates of two strokes of one spring are never further apart: share of the rate, and multiple of the loads' scatter
/// over the travel (the median of twenty tangents has an uncertainty of about eight times that).
const APART: (f64, f64) = (0.02, 64.0);
/// Strokes are of the same travel within this share of it.
const SAME_TRAVEL: f64 = 0.05;

/// Why `quantity` has no value on this curve, whose judged stroke is `path`; `None` where nothing odd forbids it.
pub(super) fn withheld(
    setup: &Setup<'_>,
    curve: &Curve,
    path: Option<&Path>,
    fit: Option<&RateFit>,
    quantity: Quantity,
) -> Option<Absence> {
    let first = usize::try_from(setup.conditions.presetting_recorded)
        .ok()
        .and_then(|preset| curve.loading.get(preset));
    let last = (curve.loading.last(), curve.unloading.last());
    let found = |odd: bool, why: Absence| odd.then_some(why);
    let shifted = |path: Option<&Path>| {
        found(
            path.is_some_and(|path| path.zero_shifted),
            Absence::ZeroShifted,
        )
    };
    let wide = |path: Option<&Path>| {
        path.is_some_and(|path| {
            let (from, to) = path.reach().unwrap_or((0.0, 0.0));
            path.widest_gap(from, to) > OF_LOOP * (to - from)
        })
    };
    // What slipped once is off from there on: a step counts against all later strokes.
    let slipped =
        |by: Option<&Path>| found(by.is_some_and(|by| slipped(curve, by)), Absence::LoadSteps);
    if !quantity.by_caliper() && path.is_some_and(|path| of_two(setup, curve, path)) {
        return Some(Absence::StrokesDiffer);
    }
    match quantity {
        Quantity::Rate | Quantity::Straightness => {
            let (path, (from, to)) = (path?, fit?.window);
            let wide = path.widest_gap(from, to) > OF_WINDOW * (to - from);
            found(path.steps_between(from, to), Absence::LoadSteps)
                .or_else(|| found(wide, Absence::RowsMissing))
        }
        Quantity::LoadAt(_) => slipped(path).or_else(|| shifted(path)),
        Quantity::SolidLength => slipped(last.0),
        Quantity::FreeLength => slipped(first).or_else(|| shifted(first)),
        Quantity::Set => slipped(last.0)
            .or_else(|| shifted(curve.loading.first()))
            .or_else(|| shifted(last.0)),
        Quantity::Hysteresis => found(curve.saturated, Absence::LoadCellAtItsEnd)
            .or_else(|| slipped(last.0).or_else(|| slipped(last.1)))
            .or_else(|| shifted(last.0).or_else(|| shifted(last.1)))
            .or_else(|| found(wide(last.0) || wide(last.1), Absence::RowsMissing)),
        // Where a stage begins is found on the curve itself, so a gap anywhere may hide it.
        Quantity::RateOf(_) | Quantity::Knee(_) => {
            slipped(path).or_else(|| found(wide(path), Absence::RowsMissing))
        }
        Quantity::OutsideDiameter
        | Quantity::InsideDiameter
        | Quantity::WireDiameter
        | Quantity::Squareness
        | Quantity::Parallelism => None,
    }
}

/// Whether another loading stroke after presetting, of the same travel as the judged one, has another rate: by 2 %, and
/// by eight times what the scatter of its loads does to a rate of this kind.
fn of_two(setup: &Setup<'_>, curve: &Curve, judged: &Path) -> bool {
    let preset = usize::try_from(setup.conditions.presetting_recorded).unwrap_or(usize::MAX);
    let strokes = curve.loading.get(preset..).unwrap_or(&[]);
    let (Some(rate), Some((_, end)), Some(scatter)) =
        (judged.rate, judged.reach(), judged.scatter())
    else {
        return false;
    };
    let travel = end - judged.start;
    let bound = (APART.0 * rate).max(APART.1 * scatter / travel);
    let alike = |path: &&Path| {
        let near = |a: f64, b: f64| (a - b).abs() < SAME_TRAVEL * travel;
        near(path.start, judged.start) && path.reach().is_some_and(|reach| near(reach.1, end))
    };
    judged.side == Way::Loading
        && strokes
            .iter()
            .filter(alike)
            .filter_map(|path| path.rate)
            .any(|other| (other - rate).abs() > bound)
}

/// Whether the load steps, or the travel leaps back, on the stroke `by` or before it.
fn slipped(curve: &Curve, by: &Path) -> bool {
    let end = by.nodes.iter().map(|node| node.last_line).max();
    curve
        .odd
        .iter()
        .any(|rows| rows.what == Odd::LoadSteps && Some(rows.first_line) <= end)
}

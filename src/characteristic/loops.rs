//! Hysteresis and set: what differs between strokes.

use crate::curve::{Curve, Path};
use crate::stats::StatsError;

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::measure::{Absence, Setup};
use super::scales;

/// Readings a stroke has at least to be one side of a loop.
const TRACED: usize = 10;

/// Hysteresis of the last full cycle, (loading work − unloading work) / loading work over the travel common to
/// both strokes and before any rise to solid, in %.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn hysteresis(
    setup: &Setup<'_>,
    curve: &Curve,
    residual_sd: Option<f64>,
) -> Result<Result<Estimate, Absence>, StatsError> {
    let cycles = curve.loading.len().min(curve.unloading.len());
    let last = cycles
        .checked_sub(1)
        .and_then(|last| Some((curve.loading.get(last)?, curve.unloading.get(last)?)));
    let traced = |path: &Path| path.nodes.len() >= TRACED;
    let Some((loading, unloading)) = last.filter(|(one, other)| traced(one) && traced(other))
    else {
        return Ok(Err(Absence::NoFullCycle));
    };
    let common = || {
        let from = loading.start.max(unloading.reach()?.0);
        let end = loading.reach()?.1.min(unloading.reach()?.1);
        let to = loading.rise().map_or(end, |rise| rise.u.min(end));
        let works = (loading.work(from, to)?, unloading.work(from, to)?);
        (works.0 > 0.0).then_some((from, to, works))
    };
    let Some((from, to, (given, back))) = common() else {
        return Ok(Err(Absence::NoFullCycle));
    };
    let percent = 100.0 * (given - back) / given;
    let mean_load = given / (to - from);
    let points = loading.between(from, to).len().max(1) as f64;
    let scatter = residual_sd.map_or(0.0, |sd| 100.0 * sd / mean_load * (2.0 / points).sqrt());
    let shown = vec![
        Line::new("scatter", Part::Own, scatter),
        Line::new(
            "resolution of load",
            Part::Own,
            100.0 * curve.load_resolution / 6.0_f64.sqrt() / mean_load,
        ),
    ];
    let mut lines = with_repeatability(shown, setup.repeatability("hysteresis"));
    lines.push(Line::new(
        "force reversibility",
        Part::Common,
        100.0 * scales::reversibility(setup.rig),
    ));
    Estimate::new(percent, lines).map(Ok)
}

/// Set: length at contact, first less last loading stroke, presetting strokes of the recording included, mm.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn set(
    setup: &Setup<'_>,
    curve: &Curve,
) -> Result<Result<Estimate, Absence>, StatsError> {
    let [first, .., last] = curve.loading.as_slice() else {
        return Ok(Err(Absence::OneLoadingStroke));
    };
    let Some((first, last)) = first.contact.zip(last.contact) else {
        return Ok(Err(Absence::ContactNotRecorded));
    };
    let set = last.u - first.u;
    let shown = vec![
        Line::new("contact", Part::Own, first.scatter.hypot(last.scatter)),
        // Both strokes seat alike; how far each is seen differs with where its points lie: half of the seating each.
        Line::new(
            "seating",
            Part::Own,
            first.seating().hypot(last.seating()) / 2.0,
        ),
        Line::new(
            "resolution of travel",
            Part::Own,
            curve.travel_resolution / 6.0_f64.sqrt(),
        ),
    ];
    let mut lines = with_repeatability(shown, setup.repeatability("set"));
    lines.extend(scales::travel_scale(setup.rig, -set));
    Estimate::new(set, lines).map(Ok)
}

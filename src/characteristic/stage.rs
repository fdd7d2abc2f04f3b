//! Sets whose members engage one after the other: the rate of a stage, the length at a knee.

use crate::curve::{Bounds, Curve, WindowOf};
use crate::drawing::Drawing;
use crate::fit::{Segmented, segmented};
use crate::quantity::Quantity;
use crate::stats::StatsError;

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::length::{self, OwnFree};
use super::load;
use super::measure::{Absence, MeasureError, Measured, Setup};
use super::rate;

/// A knee is searched from here to there: shares of the stage before and of the stage after, from the knee's outer ends.
const LEFT_OUT: f64 = 0.15;
/// A bend of less than this share of the slope before it is no knee.
const LEAST_BEND: f64 = 0.1;
/// Standard errors by which the two slopes must differ.
const CLEAR: f64 = 5.0;

/// Between which lengths a stage's rate is fitted, or a knee searched.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StageWindow {
    /// A rate of a stage, or a knee.
    pub quantity: Quantity,
    /// The longer length, mm.
    pub from: f64,
    /// The shorter length, mm.
    pub to: f64,
}

/// The windows of a drawing's stages and knees.
pub fn stage_windows(drawing: &Drawing) -> Vec<StageWindow> {
    let set = &drawing.theory;
    let begins = |stage: usize| {
        set.stages
            .get(stage)
            .map_or(set.smallest.get(), |stage| stage.from.get())
    };
    let mut windows = Vec::new();
    for one in &drawing.requirements {
        match (one.quantity, one.between) {
            (Quantity::RateOf(_), Some((from, to))) => windows.push(StageWindow {
                quantity: one.quantity,
                from,
                to,
            }),
            (Quantity::Knee(number), _) => {
                let knee = usize::from(number);
                let (before, at, after) = (begins(knee - 1), begins(knee), begins(knee + 1));
                windows.push(StageWindow {
                    quantity: one.quantity,
                    from: before - LEFT_OUT * (before - at),
                    to: after + LEFT_OUT * (at - after),
                });
            }
            _ => {}
        }
    }
    windows
}

/// The rate of a stage or the length at a knee.
///
/// # Errors
/// [`MeasureError`] where the curve is no usable one.
pub(super) fn measure(
    setup: &Setup<'_>,
    curve: &Curve,
    quantity: Quantity,
    own: Option<OwnFree>,
) -> Result<Measured, MeasureError> {
    let Some(window) = setup.stages.iter().find(|one| one.quantity == quantity) else {
        return Ok(Measured::Absent(Absence::NotMeasured));
    };
    let found = match quantity {
        Quantity::Knee(_) => knee(setup, curve, window, own),
        _ => return rate_of(setup, curve, window, own),
    };
    let found = found.map_err(|cause| MeasureError::Statistics {
        spring: curve.id.clone(),
        cause,
    })?;
    Ok(found.map_or_else(Measured::Absent, Measured::Value))
}

fn rate_of(
    setup: &Setup<'_>,
    curve: &Curve,
    window: &StageWindow,
    own: Option<OwnFree>,
) -> Result<Measured, MeasureError> {
    let setup = Setup {
        bounds: Bounds {
            of: WindowOf::Length,
            from: window.from,
            to: window.to,
        },
        ..*setup
    };
    let free = own.map(|own| own.value);
    let Some(path) = rate::judged(&setup, curve) else {
        return Ok(Measured::Absent(Absence::StrokeNotRecorded));
    };
    let fit = match rate::fit(&setup, curve, path, free)? {
        Ok(fit) => fit,
        Err(why) => return Ok(Measured::Absent(why)),
    };
    let found = rate::estimate(&setup, curve, &fit, free);
    found
        .map(Measured::Value)
        .map_err(|cause| MeasureError::Statistics {
            spring: curve.id.clone(),
            cause,
        })
}

/// The length at which the straight stages meet, mm, by the segmented fit of the judged stroke.
fn knee(
    setup: &Setup<'_>,
    curve: &Curve,
    window: &StageWindow,
    own: Option<OwnFree>,
) -> Result<Result<Estimate, Absence>, StatsError> {
    let Some(path) = rate::judged(setup, curve) else {
        return Ok(Err(Absence::StrokeNotRecorded));
    };
    let Some(origin) = load::origin(setup, curve, own) else {
        return Ok(Err(Absence::NoAbsoluteLength));
    };
    let (from, to) = (origin.u - window.from, origin.u - window.to);
    let end = path.reach().map_or(from, |(_, end)| end);
    let before_solid = path.rise().map_or(end, |rise| rise.u.min(end));
    let nodes = path.between(from.max(path.start), to.min(before_solid));
    let u: Vec<f64> = nodes.iter().map(|node| node.u).collect();
    let loads: Vec<f64> = nodes.iter().map(|node| node.load).collect();
    let Ok(found) = segmented(&u, &loads) else {
        return Ok(Err(Absence::LengthNotReached));
    };
    if !clear(&found) {
        return Ok(Err(Absence::NoKnee));
    }
    let contact = setup
        .first_contact(curve)
        .map_or(path.start, |contact| contact.u);
    let at = length::Place {
        length: origin.u - found.knee,
        load: found.at_knee,
        deflection: found.knee - contact,
    };
    estimate(setup, &found, &at, length::lines(setup, &at, origin.own)).map(Ok)
}

/// Whether the stages differ at all.
fn clear(found: &Segmented) -> bool {
    let bend = found.after - found.before;
    bend > LEAST_BEND * found.before.abs() && bend > CLEAR * found.slope_difference_error
}

fn estimate(
    setup: &Setup<'_>,
    found: &Segmented,
    at: &length::Place,
    common: Vec<Line>,
) -> Result<Estimate, StatsError> {
    let mut shown = vec![Line::new(
        "resolution of travel",
        Part::Own,
        setup.rig.travel.resolution.get() / 12.0_f64.sqrt(),
    )];
    if let Some((standard, dof)) = found.standard {
        shown.push(Line::new("fit", Part::Own, standard).with_dof(dof));
    }
    let repeatability = setup.repeatability("knee");
    let mut lines = with_repeatability(shown, repeatability);
    // How much is left out of the transition is a choice: rectangular between this one and twice as much.
    lines.push(Line::new(
        "transition",
        Part::Own,
        found.moved / 12.0_f64.sqrt(),
    ));
    lines.extend(common);
    if found.standard.is_some() || repeatability.is_some() {
        Estimate::new(at.length, lines)
    } else {
        Ok(Estimate::without_uncertainty(at.length, lines))
    }
}

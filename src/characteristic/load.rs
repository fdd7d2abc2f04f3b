//! Load at a length: interpolated at the corrected length from the judged stroke's own points.

use crate::curve::{Contact, Curve, Frame, Path, Zero};
use crate::fit::LineFit;
use crate::stats::{Dof, StatsError};

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::length::{self, OwnFree};
use super::measure::{Absence, Setup};
use super::scales;

/// Points within this share of the travel on either side are near.
const NEAR: f64 = 0.01;
/// Fewer near points than this, and the two neighbours are interpolated instead.
const ENOUGH: usize = 5;

/// Where lengths lie on a stroke: `u` of length 0, so that `u = origin − L`.
pub(super) struct Origin {
    /// mm of `u`.
    pub(super) u: f64,
    /// The spring's own measured free length, where the export gives no lengths.
    pub(super) own: Option<(OwnFree, Contact)>,
}

/// The origin of lengths; `None` where there is no absolute length. Where the export gives deflections, the spring's
/// own free length lies at contact on its first loading stroke after presetting.
pub(super) fn origin(setup: &Setup<'_>, curve: &Curve, own: Option<OwnFree>) -> Option<Origin> {
    match (curve.frame, own) {
        (Frame::Absolute, _) => Some(Origin { u: 0.0, own: None }),
        (Frame::Relative, Some(own)) => {
            let contact = setup.first_contact(curve)?;
            Some(Origin {
                u: contact.u + own.value,
                own: Some((own, contact)),
            })
        }
        (Frame::Relative, None) => None,
    }
}

struct Local {
    load: f64,
    slope: f64,
    scatter: Line,
}

/// Load at `length` (mm) on the judged stroke, N.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn estimate(
    setup: &Setup<'_>,
    curve: &Curve,
    path: &Path,
    own: Option<OwnFree>,
    length: f64,
) -> Result<Result<Estimate, Absence>, StatsError> {
    let Some(origin) = origin(setup, curve, own) else {
        return Ok(Err(Absence::NoAbsoluteLength));
    };
    let Some(local) = local(path, origin.u - length) else {
        return Ok(Err(Absence::LengthNotReached));
    };
    let rig = setup.rig;
    let single = 12.0_f64.sqrt(); // one reading of one step
    let by_travel = local.slope * curve.travel_resolution / single;
    let shown = vec![
        local.scatter,
        Line::new(
            "resolution of load",
            Part::Own,
            curve.load_resolution / single,
        ),
        Line::new("resolution of travel", Part::Own, by_travel),
    ];
    let mut lines = with_repeatability(shown, setup.repeatability("load"));
    lines.push(zero_line(setup, curve));
    lines.extend(scales::force_scale(rig, local.load));
    let at = length::Place {
        length,
        load: local.load,
        deflection: local.load / local.slope,
    };
    let of_length = length::lines(setup, &at, origin.own);
    lines.extend(of_length.into_iter().map(|line| line.times(local.slope)));
    lines.push(scales::temperature(
        setup.conditions.temperature,
        local.load,
    ));
    if curve.starts_loaded {
        return Ok(Ok(Estimate::without_uncertainty(local.load, lines))); // the zero may be anything
    }
    Estimate::new(local.load, lines).map(Ok)
}

/// The load's zero: its readings' scatter, or a line for not having been read.
pub(super) fn zero_line(setup: &Setup<'_>, curve: &Curve) -> Line {
    match curve.zero {
        Zero::Read {
            standard, count, ..
        } => Line::new("load zero", Part::Own, standard).with_dof(Dof::Finite(count as f64 - 1.0)),
        Zero::NotRead => Line::new(
            "load zero not read",
            Part::Common,
            scales::unread_zero(setup.rig),
        ),
    }
}

fn local(path: &Path, u: f64) -> Option<Local> {
    let (least, most) = path.reach()?;
    if u < least || u > most {
        return None;
    }
    let near = NEAR * (most - least);
    let nodes = path.between(u - near, u + near);
    let below = nodes.iter().filter(|node| node.u <= u).count();
    if nodes.len() >= ENOUGH && below > 0 && below < nodes.len() {
        let travel: Vec<f64> = nodes.iter().map(|node| node.u).collect();
        let load: Vec<f64> = nodes.iter().map(|node| node.load).collect();
        let line = LineFit::through(&travel, &load).ok()?;
        let dof = Dof::Finite(nodes.len() as f64 - 2.0);
        let scatter = Line::new("local fit", Part::Own, line.mean_error_at(u)).with_dof(dof);
        return (line.slope > 0.0).then_some(Local {
            load: line.at(u),
            slope: line.slope,
            scatter,
        });
    }
    let load = path.load_at(u)?;
    let wider = path.between(u - 10.0 * near, u + 10.0 * near);
    let (start, end) = (wider.first()?, wider.last()?);
    let slope = (end.load - start.load) / (end.u - start.u);
    let scatter = Line::new("local fit", Part::Own, path.scatter()?);
    (slope > 0.0 && slope.is_finite()).then_some(Local {
        load,
        slope,
        scatter,
    })
}

//! Free length and solid length.

use crate::curve::{Curve, Frame, Path};
use crate::stats::StatsError;

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::load;
use super::measure::{Absence, Setup};
use super::scales;

/// A spring's own measured free length, from the caliper findings.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OwnFree {
    /// mm.
    pub value: f64,
    /// Standard uncertainty of the gauge, mm.
    pub standard: f64,
}

/// The free length by gauge, mm.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn by_gauge(own: OwnFree) -> Result<Estimate, StatsError> {
    Estimate::new(
        own.value,
        vec![Line::new("gauge", Part::Common, own.standard)],
    )
}

/// The free length from contact on the first loading stroke after presetting, contact load put back, mm.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn free(
    setup: &Setup<'_>,
    curve: &Curve,
) -> Result<Result<Estimate, Absence>, StatsError> {
    if curve.frame == Frame::Relative {
        return Ok(Err(Absence::NoAbsoluteLength));
    }
    let Some(contact) = setup.first_contact(curve) else {
        return Ok(Err(Absence::StrokeNotRecorded));
    };
    let length = -contact.u;
    let seating = setup.rig.contact_load.get() / contact.slope;
    let shown = vec![
        Line::new("contact", Part::Own, contact.scatter),
        Line::new(
            "resolution of travel",
            Part::Own,
            setup.rig.travel.resolution.get() / 12.0_f64.sqrt(),
        ),
        // The stretch below the contact load is not seen: half of it either way, rectangular.
        Line::new("seating", Part::Own, seating / 12.0_f64.sqrt()),
    ];
    let mut lines = with_repeatability(shown, setup.repeatability("free_length"));
    let zero = load::zero_line(setup, curve);
    lines.push(Line {
        contribution: zero.contribution / contact.slope,
        ..zero
    });
    lines.push(Line::new("length zero", Part::Common, setup.rig.zero.get()));
    lines.extend(scales::travel_scale(
        setup.rig,
        length - setup.rig.set_at_length,
    ));
    Estimate::new(length, lines).map(Ok)
}

/// What a curve says of the solid length.
pub(super) enum Solid {
    /// The rise was seen.
    Seen(Estimate),
    /// The rise was not reached: the solid length is below this.
    Below(Estimate),
    /// Nothing.
    Absent(Absence),
}

/// The solid length where the rise is seen on the last loading stroke, else the shortest length reached, mm.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn solid(
    setup: &Setup<'_>,
    curve: &Curve,
    own: Option<OwnFree>,
) -> Result<Solid, StatsError> {
    let Some(path) = curve.loading.last() else {
        return Ok(Solid::Absent(Absence::StrokeNotRecorded));
    };
    let Some(origin) = load::origin(setup, curve, own) else {
        return Ok(Solid::Absent(Absence::NoAbsoluteLength));
    };
    let gauge = origin.own.map(|(own, contact)| {
        let common = Line::new("own free length", Part::Common, own.standard);
        (
            own.value,
            [common, Line::new("contact", Part::Own, contact.scatter)],
        )
    });
    if let Some(rise) = curve.rise(path, setup.rig.contact_load.get()) {
        let shown = vec![
            Line::new("tangent", Part::Own, rise.tangent_over / 3.0_f64.sqrt()),
            Line::new(
                "resolution of travel",
                Part::Own,
                setup.rig.travel.resolution.get() / 12.0_f64.sqrt(),
            ),
        ];
        let lines = with_repeatability(shown, setup.repeatability("solid_length"));
        let length = origin.u - rise.u;
        return Estimate::new(length, length_lines(setup, lines, length, rise.load, gauge))
            .map(Solid::Seen);
    }
    let shortest = shortest(path).map(|(u, load)| (origin.u - u, load));
    let Some((length, load)) = shortest else {
        return Ok(Solid::Absent(Absence::LengthNotReached));
    };
    let own = vec![Line::new(
        "resolution of travel",
        Part::Own,
        setup.rig.travel.resolution.get() / 12.0_f64.sqrt(),
    )];
    Estimate::new(length, length_lines(setup, own, length, load, gauge)).map(Solid::Below)
}

fn shortest(path: &Path) -> Option<(f64, f64)> {
    path.nodes
        .iter()
        .map(|node| (node.u, node.load))
        .max_by(|a, b| a.0.total_cmp(&b.0))
}

fn length_lines(
    setup: &Setup<'_>,
    mut lines: Vec<Line>,
    length: f64,
    load: f64,
    gauge: Option<(f64, [Line; 2])>,
) -> Vec<Line> {
    let rig = setup.rig;
    let (scaled, zeroed_at) = match gauge {
        Some((free, gauge)) => {
            lines.extend(gauge);
            (length - free, 0.0)
        }
        None => {
            lines.push(Line::new("length zero", Part::Common, rig.zero.get()));
            (length - rig.set_at_length, rig.zeroed_at_load)
        }
    };
    lines.extend(scales::travel_scale(rig, scaled));
    let free = setup
        .drawing
        .members
        .first()
        .map_or(0.0, |member| member.free.nominal);
    lines.extend(scales::frame(rig, load - zeroed_at, free - length));
    lines
}

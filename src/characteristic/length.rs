//! Free length and solid length.

use crate::curve::{Contact, Curve, Frame, Path};
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

/// Whether the gauge and the bench disagree by more than both expanded uncertainties; never where the bench gives none.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn differs(setup: &Setup<'_>, curve: &Curve, own: OwnFree) -> Result<bool, StatsError> {
    let Ok(bench) = free(setup, curve)? else {
        return Ok(false);
    };
    let expanded = |of: &Estimate| {
        of.uncertainty
            .map_or(0.0, |uncertainty| uncertainty.expanded)
    };
    let gauge = by_gauge(own)?;
    Ok((bench.value - own.value).abs() > expanded(&bench).hypot(expanded(&gauge)) * 1.5)
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
        return Ok(Err(Absence::ContactNotRecorded));
    };
    let length = -contact.u;
    let shown = vec![
        Line::new("contact", Part::Own, contact.scatter),
        Line::new(
            "resolution of travel",
            Part::Own,
            curve.travel_resolution / 12.0_f64.sqrt(),
        ),
        Line::new("seating", Part::Own, contact.seating()),
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

/// A place on the stroke, as a length.
pub(super) struct Place {
    /// mm.
    pub(super) length: f64,
    /// N.
    pub(super) load: f64,
    /// From contact, mm.
    pub(super) deflection: f64,
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
    let contact = setup.first_contact(curve).map_or(0.0, |contact| contact.u);
    let place = |u: f64, load: f64| Place {
        length: origin.u - u,
        load,
        deflection: u - contact,
    };
    let resolution = Line::new(
        "resolution of travel",
        Part::Own,
        curve.travel_resolution / 12.0_f64.sqrt(),
    );
    let with = |mut shown: Vec<Line>, at: &Place| {
        shown.extend(lines(setup, at, origin.own));
        Estimate::new(at.length, shown)
    };
    if let Some(rise) = path.rise() {
        let tangent = Line::new("tangent", Part::Own, rise.tangent_over / 12.0_f64.sqrt());
        let shown = with_repeatability(
            vec![tangent, resolution],
            setup.repeatability("solid_length"),
        );
        return with(shown, &place(rise.u, rise.load)).map(Solid::Seen);
    }
    let Some((u, load)) = furthest(path) else {
        return Ok(Solid::Absent(Absence::LengthNotReached));
    };
    with(vec![resolution], &place(u, load)).map(Solid::Below)
}

/// Travel and load at the greatest compression of a stroke.
fn furthest(path: &Path) -> Option<(f64, f64)> {
    let places = path.nodes.iter().map(|node| (node.u, node.load));
    places.max_by(|a, b| a.0.total_cmp(&b.0))
}

/// What makes a length on a stroke uncertain besides reading it, in mm; `own` where lengths hang on the spring's own
/// free length.
pub(super) fn lines(setup: &Setup<'_>, at: &Place, own: Option<(OwnFree, Contact)>) -> Vec<Line> {
    let rig = setup.rig;
    let mut lines = Vec::new();
    let (scaled, zeroed_at) = if let Some((own, contact)) = own {
        lines.push(Line::new("own free length", Part::Common, own.standard));
        lines.push(Line::new("contact", Part::Own, contact.scatter));
        lines.push(Line::new("seating", Part::Own, contact.seating()));
        (at.length - own.value, 0.0)
    } else {
        lines.push(Line::new("length zero", Part::Common, rig.zero.get()));
        (at.length - rig.set_at_length, rig.zeroed_at_load)
    };
    lines.extend(scales::travel_scale(rig, scaled));
    lines.extend(scales::frame(rig, at.load - zeroed_at, at.deflection));
    lines
}

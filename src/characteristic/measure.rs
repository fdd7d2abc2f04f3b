//! Every characteristic of one spring, in the order of the drawing.

use crate::curve::{Bounds, Contact, Curve, CurveError};
use crate::drawing::{Drawing, Method, Stroke};
use crate::intake::Conditions;
use crate::quantity::Quantity;
use crate::rig::Rig;
use crate::stats::StatsError;

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::length::{self, OwnFree, Solid};
use super::rate::{self, RateFit};
use super::stage::{self, StageWindow};
use super::{load, loops, odd};

/// Work gained up to this is never called a reversal, %: drift of a load cell between strokes may look like it.
const LEAST_GAIN: f64 = 0.5;

/// What measuring needs to know besides the curve: the same for the whole lot.
#[derive(Clone, Copy, Debug)]
pub struct Setup<'a> {
    /// The rig.
    pub rig: &'a Rig,
    /// Conditions of the test.
    pub conditions: Conditions,
    /// The window.
    pub bounds: Bounds,
    /// The judged stroke.
    pub stroke: Stroke,
    /// How the rate is drawn from the window.
    pub method: Method,
    /// Fn, N; without a drawing each curve's own largest load stands in.
    pub full_load: Option<f64>,
    /// What is measured, in order.
    pub wanted: &'a [Quantity],
    /// Windows of stages and knees; empty where the drawing has none.
    pub stages: &'a [StageWindow],
    /// Standard uncertainty of the caliper by quantity, mm.
    pub caliper: &'a [(&'static str, f64)],
}

impl Setup<'_> {
    pub(super) fn repeatability(&self, of: &str) -> Option<f64> {
        self.rig
            .repeatability
            .iter()
            .find(|(name, _)| *name == of)
            .map(|(_, stated)| *stated)
    }

    /// Contact on the first loading stroke after the presetting strokes of the recording.
    pub(super) fn first_contact(&self, curve: &Curve) -> Option<Contact> {
        let preset = usize::try_from(self.conditions.presetting_recorded).ok()?;
        curve.loading.get(preset)?.contact
    }

    /// Fn, or the curve's own largest load.
    pub(super) fn full_load_of(&self, curve: &Curve) -> f64 {
        self.full_load.unwrap_or(curve.loads.1)
    }

    fn caliper(&self, of: Quantity) -> f64 {
        self.caliper
            .iter()
            .find(|(name, _)| *name == of.name())
            .map_or(0.0, |(_, standard)| *standard)
    }
}

/// Why there is no value.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Absence {
    /// Deflections only, and no free length of this spring's own.
    NoAbsoluteLength,
    /// The curve does not span the window; where that is one of loads, the largest load and the one to go beyond, N.
    WindowNotReached {
        /// The stroke's largest load and the window's upper one.
        loads: Option<(f64, f64)>,
    },
    /// The curve does not reach the length.
    LengthNotReached,
    /// The stroke starts on a loaded spring.
    ContactNotRecorded,
    /// The stroke is not in the export.
    StrokeNotRecorded,
    /// No full cycle.
    NoFullCycle,
    /// One loading stroke only.
    OneLoadingStroke,
    /// The two stages do not differ enough for a knee.
    NoKnee,
    /// Nothing measured it.
    NotMeasured,
    /// The load cell was at its end before the curve came there.
    LoadCellAtItsEnd,
    /// The load steps, or the travel leaps back, on its stroke or before it: the spring, the grip or the scale slipped.
    LoadSteps,
    /// Rows are missing where it is taken from.
    RowsMissing,
    /// The empty platens show another load on its stroke than before the first contact.
    ZeroShifted,
    /// Two strokes of the same travel differ in rate as no spring does from one stroke to the next.
    StrokesDiffer,
    /// It needs a curve, and the bench read loads at a few lengths.
    PointReadings,
    /// No load was read at this length.
    LengthNotRead,
    /// Fewer than two loads were read within the window of the rate.
    WindowNotRead,
}

/// What is known of a characteristic.
#[derive(Clone, Debug, PartialEq)]
pub enum Measured {
    /// A value.
    Value(Estimate),
    /// The true value lies below this one (a solid length that was not reached).
    Below(Estimate),
    /// No value.
    Absent(Absence),
}

/// One characteristic.
#[derive(Clone, Debug, PartialEq)]
pub struct Characteristic {
    /// Which.
    pub quantity: Quantity,
    /// What is known of it.
    pub measured: Measured,
}

/// All that one curve says.
#[derive(Clone, Debug)]
pub struct Measurement {
    /// The fit of the rate.
    pub fit: Option<RateFit>,
    /// The characteristics, those of the drawing first and in its order.
    pub characteristics: Vec<Characteristic>,
    /// Whether the gauge and the bench disagree on the free length by more than both expanded uncertainties.
    pub gauge_differs: bool,
    /// Origin of lengths in `u` on the judged stroke, mm; `None` where there are none.
    pub origin: Option<f64>,
    /// Where loads were read at a few lengths only: the two lengths that the rate is drawn from, longer first, mm.
    pub read_between: Option<(f64, f64)>,
}

/// Why a spring cannot be measured.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum MeasureError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    Curve(#[from] CurveError),
    #[error("the uncertainty of spring `{spring}` cannot be computed")]
    #[diagnostic(
        code(coilassay::characteristic::statistics),
        help("a figure in the rig file or the export is far out of any usable size")
    )]
    Statistics {
        spring: String,
        #[source]
        cause: StatsError,
    },
}

/// Measures everything the drawing requires, and what informs beside it. `caliper` holds this spring's values by
/// caliper, mm.
///
/// # Errors
/// [`MeasureError`] where the curve is no usable one.
pub fn measure(
    setup: &Setup<'_>,
    curve: &Curve,
    caliper: &[(Quantity, f64)],
) -> Result<Measurement, MeasureError> {
    let own = own_free(setup, caliper);
    let path = rate::judged(setup, curve);
    let fit = match path {
        Some(path) => rate::fit(setup, curve, path, own.map(|own| own.value))?,
        None => Err(Absence::StrokeNotRecorded),
    };
    let spring = Spring {
        setup,
        curve,
        fit: &fit,
        own,
    };
    let failed = |cause| MeasureError::Statistics {
        spring: curve.id.clone(),
        cause,
    };
    let mut characteristics = Vec::new();
    for quantity in setup.wanted.iter().copied() {
        let measured = if quantity.by_caliper() {
            by_gauge(setup, caliper, quantity).map_err(failed)?
        } else if matches!(quantity, Quantity::RateOf(_) | Quantity::Knee(_)) {
            let path = rate::judged(setup, curve);
            match odd::withheld(setup, curve, path, spring.fit.as_ref().ok(), quantity) {
                Some(why) => Measured::Absent(why),
                None => stage::measure(setup, curve, quantity, own)?,
            }
        } else {
            spring.unless_odd(quantity).map_err(failed)?
        };
        refuse_reversed(curve, quantity, &measured)?;
        characteristics.push(Characteristic { quantity, measured });
    }
    let origin = load::origin(setup, curve, own).map(|origin| origin.u);
    let gauge_differs = own
        .map_or(Ok(false), |own| length::differs(setup, curve, own))
        .map_err(failed)?;
    Ok(Measurement {
        fit: fit.ok(),
        characteristics,
        gauge_differs,
        origin,
        read_between: None,
    })
}

fn by_caliper(caliper: &[(Quantity, f64)], quantity: Quantity) -> Option<f64> {
    let found = caliper.iter().find(|(known, _)| *known == quantity);
    found.map(|(_, value)| *value)
}

/// The spring's own free length by gauge.
pub(super) fn own_free(setup: &Setup<'_>, caliper: &[(Quantity, f64)]) -> Option<OwnFree> {
    by_caliper(caliper, Quantity::FreeLength).map(|value| OwnFree {
        value,
        standard: setup.caliper(Quantity::FreeLength),
    })
}

/// What a gauge measured.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn by_gauge(
    setup: &Setup<'_>,
    caliper: &[(Quantity, f64)],
    quantity: Quantity,
) -> Result<Measured, StatsError> {
    let lines = vec![Line::new("gauge", Part::Common, setup.caliper(quantity))];
    match by_caliper(caliper, quantity) {
        Some(value) => Estimate::new(value, lines).map(Measured::Value),
        None => Ok(Measured::Absent(Absence::NotMeasured)),
    }
}

/// A spring gives back less than it takes: work gained beyond the uncertainty means rows out of order.
fn refuse_reversed(
    curve: &Curve,
    quantity: Quantity,
    measured: &Measured,
) -> Result<(), CurveError> {
    let Measured::Value(estimate) = measured else {
        return Ok(());
    };
    let expanded = estimate
        .uncertainty
        .map_or(0.0, |uncertainty| uncertainty.expanded);
    if quantity != Quantity::Hysteresis || estimate.value + expanded.max(LEAST_GAIN) >= 0.0 {
        return Ok(());
    }
    Err(CurveError::Reversed {
        spring: curve.id.clone(),
        export: curve.export.clone(),
        first: curve.lines.0,
        last: curve.lines.1,
        percent: -estimate.value,
    })
}

/// What is measured for a drawing: its requirements in their order, then what informs beside them.
pub fn wanted(drawing: &Drawing) -> Vec<Quantity> {
    let mut wanted: Vec<Quantity> = drawing
        .requirements
        .iter()
        .map(|one| one.quantity)
        .collect();
    let by_stages = drawing.theory.stages.len() > 1;
    for informs in [
        Quantity::Rate,
        Quantity::FreeLength,
        Quantity::Hysteresis,
        Quantity::Set,
    ] {
        // Over a knee a rate without its stage means nothing.
        let meaningless = by_stages && informs == Quantity::Rate;
        if !meaningless && !wanted.contains(&informs) {
            wanted.push(informs);
        }
    }
    wanted
}

struct Spring<'a> {
    setup: &'a Setup<'a>,
    curve: &'a Curve,
    fit: &'a Result<RateFit, Absence>,
    own: Option<OwnFree>,
}

impl Spring<'_> {
    /// Measures, unless something odd in the curve forbids it.
    fn unless_odd(&self, quantity: Quantity) -> Result<Measured, StatsError> {
        let (setup, curve, path) = (self.setup, self.curve, rate::judged(self.setup, self.curve));
        if let Some(why) = odd::withheld(setup, curve, path, self.fit.as_ref().ok(), quantity) {
            return Ok(Measured::Absent(why));
        }
        if let (Quantity::LoadAt(length), Some(path)) = (quantity, path)
            && load::origin(setup, curve, self.own)
                .is_some_and(|origin| path.is_missing(origin.u - length.get()))
        {
            return Ok(Measured::Absent(Absence::RowsMissing));
        }
        let short = |why: &Absence| {
            matches!(
                why,
                Absence::WindowNotReached { .. } | Absence::LengthNotReached
            )
        };
        Ok(match self.measure(quantity)? {
            Measured::Absent(why) if curve.saturated && short(&why) => {
                Measured::Absent(Absence::LoadCellAtItsEnd)
            }
            measured => measured,
        })
    }

    fn measure(&self, quantity: Quantity) -> Result<Measured, StatsError> {
        let (setup, curve) = (self.setup, self.curve);
        let residual_sd = self.fit.as_ref().ok().map(|fit| fit.line.residual_sd);
        let found = match quantity {
            Quantity::Rate => self.rate()?,
            Quantity::LoadAt(length) => match rate::judged(setup, curve) {
                Some(path) => load::estimate(setup, curve, path, self.own, length.get())?,
                None => Err(Absence::StrokeNotRecorded),
            },
            Quantity::FreeLength => match self.own {
                Some(own) => Ok(length::by_gauge(own)?),
                None => length::free(setup, curve)?,
            },
            Quantity::SolidLength => {
                return Ok(match length::solid(setup, curve, self.own)? {
                    Solid::Seen(estimate) => Measured::Value(estimate),
                    Solid::Below(estimate) => Measured::Below(estimate),
                    Solid::Absent(why) => Measured::Absent(why),
                });
            }
            Quantity::Hysteresis => loops::hysteresis(setup, curve, residual_sd)?,
            Quantity::Set => loops::set(setup, curve)?,
            Quantity::Straightness => self.straightness()?,
            Quantity::RateOf(_)
            | Quantity::Knee(_)
            | Quantity::OutsideDiameter
            | Quantity::InsideDiameter
            | Quantity::WireDiameter
            | Quantity::Squareness
            | Quantity::Parallelism => Err(Absence::NotMeasured),
        };
        Ok(found.map_or_else(Measured::Absent, Measured::Value))
    }

    fn rate(&self) -> Result<Result<Estimate, Absence>, StatsError> {
        match self.fit {
            Ok(fit) => {
                rate::estimate(self.setup, self.curve, fit, self.own.map(|own| own.value)).map(Ok)
            }
            Err(why) => Ok(Err(*why)),
        }
    }

    fn straightness(&self) -> Result<Result<Estimate, Absence>, StatsError> {
        let fit = match self.fit {
            Ok(fit) => fit,
            Err(why) => return Ok(Err(*why)),
        };
        let scatter = Line::new(
            "scatter",
            Part::Own,
            100.0 * fit.line.residual_sd / self.setup.full_load_of(self.curve),
        );
        let lines = with_repeatability(vec![scatter], self.setup.repeatability("straightness"));
        Estimate::new(100.0 * fit.straightness, lines).map(Ok)
    }
}

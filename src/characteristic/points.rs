//! Loads at a few lengths, without a curve: loads where they were read, the rate from two of them, nothing else.

use crate::curve::{Bounds, CurveError, PointReading, Readings, SAME_LENGTH, WindowOf};
use crate::drawing::Way;
use crate::quantity::Quantity;
use crate::stats::StatsError;

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::length;
use super::measure::{
    Absence, Characteristic, MeasureError, Measured, Measurement, Setup, by_gauge, own_free,
};
use super::scales;

type Found = Result<Result<Estimate, Absence>, StatsError>;

/// Measures what readings at a few lengths can say. `caliper` holds this spring's values by caliper, mm.
///
/// # Errors
/// [`MeasureError`] where the two lengths of a rate lie too near each other, or a coverage factor cannot be had.
pub fn measure_points(
    setup: &Setup<'_>,
    of: &Readings,
    caliper: &[(Quantity, f64)],
) -> Result<Measurement, MeasureError> {
    let spring = Spring {
        setup,
        of,
        free: own_free(setup, caliper).map(|own| own.value),
    };
    let failed = |cause| MeasureError::Statistics {
        spring: of.id.clone(),
        cause,
    };
    let mut characteristics = Vec::new();
    for quantity in setup.wanted.iter().copied() {
        let gauged = quantity == Quantity::FreeLength && spring.free.is_some();
        let measured = if quantity.by_caliper() || gauged {
            by_gauge(setup, caliper, quantity).map_err(failed)?
        } else {
            spring.wide_enough(quantity)?;
            let found = spring.measure(quantity).map_err(failed)?;
            found.map_or_else(Measured::Absent, Measured::Value)
        };
        characteristics.push(Characteristic { quantity, measured });
    }
    let ends = spring.ends(setup.bounds).ok();
    Ok(Measurement {
        fit: None,
        characteristics,
        gauge_differs: false,
        origin: Some(0.0),
        read_between: ends.map(|(longer, shorter)| (longer.length, shorter.length)),
    })
}

struct Spring<'a> {
    setup: &'a Setup<'a>,
    of: &'a Readings,
    /// The spring's own free length by gauge, mm.
    free: Option<f64>,
}

impl Spring<'_> {
    fn measure(&self, quantity: Quantity) -> Found {
        match quantity {
            Quantity::LoadAt(length) => self.load(length.get()),
            Quantity::Rate | Quantity::RateOf(_) => match self.bounds_of(quantity) {
                Some(bounds) => match self.ends(bounds) {
                    Ok((longer, shorter)) => self.rate(longer, shorter).map(Ok),
                    Err(why) => Ok(Err(why)),
                },
                None => Ok(Err(Absence::NotMeasured)),
            },
            _ => Ok(Err(Absence::PointReadings)),
        }
    }

    fn bounds_of(&self, quantity: Quantity) -> Option<Bounds> {
        if quantity == Quantity::Rate {
            return Some(self.setup.bounds);
        }
        let stage = self
            .setup
            .stages
            .iter()
            .find(|one| one.quantity == quantity)?;
        Some(Bounds {
            of: WindowOf::Length,
            from: stage.from,
            to: stage.to,
        })
    }

    /// Refuses a rate over less than 20 steps of the travel's resolution, as of curves.
    fn wide_enough(&self, quantity: Quantity) -> Result<(), CurveError> {
        let rates = matches!(quantity, Quantity::Rate | Quantity::RateOf(_));
        let bounds = self.bounds_of(quantity).filter(|_| rates);
        let ends = bounds.and_then(|bounds| self.ends(bounds).ok());
        let resolution = self.setup.rig.travel.resolution.get();
        match ends {
            Some((a, b)) if a.length - b.length < 20.0 * resolution => {
                Err(CurveError::NarrowWindow {
                    spring: self.of.id.clone(),
                    export: self.of.export.clone(),
                    window: a.length - b.length,
                    resolution,
                })
            }
            _ => Ok(()),
        }
    }

    /// Whether the spring was touched: below the contact load it may be free, and then no slope leads through.
    fn touched(&self, one: &PointReading) -> bool {
        one.load > self.setup.rig.contact_load.get()
    }

    /// A load at the end of the stated range or beyond may be any larger one: no plateau shows it.
    fn at_its_end(&self, one: &PointReading) -> bool {
        let range = self.setup.rig.force.range;
        range.is_some_and(|(_, most)| one.load >= most)
    }

    /// A bench of readings knows of no strokes: only what asks for the last loading stroke can be answered.
    fn stroke(&self) -> Result<(), Absence> {
        let (stroke, conditions) = (self.setup.stroke, self.setup.conditions);
        let plain = stroke.way == Way::Loading
            && stroke.index.is_none()
            && conditions.presetting_recorded == 0;
        if plain {
            Ok(())
        } else {
            Err(Absence::StrokeNotRecorded)
        }
    }

    /// The two readings a rate is drawn from: the longest and the shortest length within the window, ends included.
    fn ends(&self, bounds: Bounds) -> Result<(PointReading, PointReading), Absence> {
        self.stroke()?;
        let within = |one: &PointReading| -> Result<bool, Absence> {
            Ok(match bounds.of {
                WindowOf::Length => {
                    one.length <= bounds.from + SAME_LENGTH && one.length >= bounds.to - SAME_LENGTH
                }
                WindowOf::Load => (bounds.from..=bounds.to).contains(&one.load),
                WindowOf::Deflection => {
                    let deflection = self.free.ok_or(Absence::NoAbsoluteLength)? - one.length;
                    (bounds.from - SAME_LENGTH..=bounds.to + SAME_LENGTH).contains(&deflection)
                }
                WindowOf::Travel => true, // no drawing: the longest and the shortest length that were read
            })
        };
        let mut inside = Vec::new();
        for one in self.of.readings.iter().filter(|one| self.touched(one)) {
            if within(one)? {
                inside.push(*one);
            }
        }
        match inside.as_slice() {
            [longer, .., shorter] if self.at_its_end(longer) || self.at_its_end(shorter) => {
                Err(Absence::LoadCellAtItsEnd)
            }
            [longer, .., shorter] => Ok((*longer, *shorter)),
            _ => Err(Absence::WindowNotRead),
        }
    }

    /// The rate between two readings, N/mm. The zeros of load and length fall out of it.
    fn rate(&self, longer: PointReading, shorter: PointReading) -> Result<Estimate, StatsError> {
        let (setup, rig) = (self.setup, self.setup.rig);
        let wide = longer.length - shorter.length;
        let rate = (shorter.load - longer.load) / wide;
        let difference = 6.0_f64.sqrt(); // two readings of one step each
        let shown = vec![
            Line::new(
                "resolution of load",
                Part::Own,
                rig.force.resolution.get() / difference / wide,
            ),
            Line::new(
                "resolution of travel",
                Part::Own,
                rate * rig.travel.resolution.get() / difference / wide,
            ),
        ];
        let of_loads = setup
            .repeatability("load")
            .map(|load| 2.0_f64.sqrt() * load / wide);
        let stated = setup.repeatability("rate").into_iter().chain(of_loads);
        let repeatability = stated.reduce(f64::max);
        let mut lines = with_repeatability(shown, repeatability);
        lines.extend(scales::force_scale(rig, rate));
        lines.extend(scales::travel_scale(rig, -rate));
        lines.extend(scales::frame(rig, rate * rate, rate));
        lines.push(scales::temperature(setup.conditions.temperature, rate));
        if repeatability.is_some() {
            Estimate::new(rate, lines)
        } else {
            Ok(Estimate::without_uncertainty(rate, lines))
        }
    }

    /// The load read at `length`, N; none between two lengths.
    fn load(&self, length: f64) -> Found {
        if let Err(why) = self.stroke() {
            return Ok(Err(why));
        }
        let readings = &self.of.readings;
        let at = |one: &PointReading| (one.length - length).abs() <= SAME_LENGTH;
        let Some((place, one)) = readings.iter().enumerate().find(|(_, one)| at(one)) else {
            return Ok(Err(Absence::LengthNotRead));
        };
        if self.at_its_end(one) {
            return Ok(Err(Absence::LoadCellAtItsEnd));
        }
        let (setup, rig) = (self.setup, self.setup.rig);
        let single = 12.0_f64.sqrt(); // one reading of one step
        let slope = self.slope_at(place);
        let by_travel = slope.unwrap_or(0.0) * rig.travel.resolution.get() / single;
        let shown = vec![
            Line::new(
                "resolution of load",
                Part::Own,
                rig.force.resolution.get() / single,
            ),
            Line::new("resolution of travel", Part::Own, by_travel),
        ];
        let repeatability = setup.repeatability("load");
        let mut lines = with_repeatability(shown, repeatability);
        lines.push(Line::new(
            "load zero not read",
            Part::Common,
            scales::unread_zero(rig),
        ));
        lines.extend(scales::force_scale(rig, one.load));
        lines.push(scales::temperature(setup.conditions.temperature, one.load));
        let (Some(slope), Some(_)) = (slope, repeatability) else {
            return Ok(Ok(Estimate::without_uncertainty(one.load, lines)));
        };
        let place = length::Place {
            length,
            load: one.load,
            deflection: one.load / slope,
        };
        let of_length = length::lines(setup, &place, None);
        lines.extend(of_length.into_iter().map(|line| line.times(slope)));
        Estimate::new(one.load, lines).map(Ok)
    }

    /// The steeper of the slopes to the two neighbouring lengths, N/mm: what an error of length is worth. `None` where
    /// the spring was not touched there or at no neighbour.
    fn slope_at(&self, place: usize) -> Option<f64> {
        let readings = &self.of.readings;
        let touched = |one: &&PointReading| self.touched(one);
        let one = readings.get(place).filter(touched)?;
        let before = place.checked_sub(1).and_then(|before| readings.get(before));
        let neighbours = before.into_iter().chain(readings.get(place + 1));
        let slopes = neighbours
            .filter(touched)
            .map(|other| (other.load - one.load) / (one.length - other.length));
        slopes.reduce(f64::max).filter(|slope| *slope > 0.0)
    }
}

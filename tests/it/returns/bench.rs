//! The generator's bench, calipers and scale: true readings, and readings with errors.

use coilassay::cause::Measure;

use super::springs::Body;
use crate::random::Random;

/// Standard uncertainties of the instruments of one case.
#[derive(Clone, Copy)]
pub(crate) struct Tools {
    pub(crate) noise: f64,
    pub(crate) length: f64,
    pub(crate) zero: f64,
    pub(crate) force: f64,
    pub(crate) gauge: f64,
    pub(crate) wire: f64,
    pub(crate) diameter: f64,
    pub(crate) turns: f64,
    pub(crate) mass: f64,
}

impl Tools {
    pub(crate) fn drawn(random: &mut Random) -> Self {
        Self {
            noise: random.between(0.0003, 0.0015),
            length: random.between(0.01, 0.05),
            zero: random.between(0.02, 0.1),
            force: random.between(0.002, 0.005),
            gauge: random.between(0.02, 0.06),
            wire: random.between(0.003, 0.01),
            diameter: random.between(0.02, 0.05),
            turns: random.between(0.03, 0.1),
            mass: random.between(0.0005, 0.002),
        }
    }
}

/// Errors of one set-up, shared by all its springs.
#[derive(Clone, Copy, Default)]
pub(crate) struct Setup {
    pub(crate) zero: f64,
    pub(crate) force: f64,
}

/// One finding as read.
pub(crate) type Reading = (Measure, f64);

/// Everything that can be read off `body`; with `random`, with errors. `way` is the drawn way to solid, mm.
pub(crate) fn read(
    body: &Body,
    way: f64,
    tools: &Tools,
    setup: Setup,
    mut random: Option<&mut Random>,
) -> Vec<Reading> {
    let mut off = |sd: f64| {
        random
            .as_deref_mut()
            .map_or(0.0, |random| random.normal(sd))
    };
    let (half, end) = (0.5 * way, 0.8 * way);
    let top = body.load(end, half);
    let points: Vec<(f64, f64, f64)> = (0..=160)
        .map(|i| {
            let s = end * f64::from(i) / 160.0;
            let load = body.load(s, half) * (1.0 + setup.force);
            let up = load * (1.0 + body.drag() / 2.0) + off(tools.noise * top);
            let down = load * (1.0 - body.drag() / 2.0) + off(tools.noise * top);
            (s, up, down)
        })
        .collect();
    let slope = |from: f64, to: f64| {
        let part: Vec<_> = points
            .iter()
            .filter(|(s, ..)| *s >= from * way && *s <= to * way)
            .collect();
        let n = part.len() as f64;
        let (mx, my) = part
            .iter()
            .fold((0.0, 0.0), |(a, b), (s, up, _)| (a + s / n, b + up / n));
        let sxy: f64 = part.iter().map(|(s, up, _)| (s - mx) * (up - my)).sum();
        let sxx: f64 = part.iter().map(|(s, ..)| (s - mx).powi(2)).sum();
        (sxy / sxx, mx - my * sxx / sxy)
    };
    let ((lower, start), (upper, _)) = (slope(0.2, 0.45), slope(0.62, 0.8));
    let work = |pick: fn(&(f64, f64, f64)) -> f64| points.iter().map(pick).sum::<f64>();
    let (up, down) = (work(|p| p.1), work(|p| p.2));
    let (wire, spread) = body.places();
    vec![
        (
            Measure::FreeLength,
            body.free + body.zero() + setup.zero + off(tools.length),
        ),
        (Measure::GaugeLength, body.free + off(tools.gauge)),
        (Measure::Rate, lower.ln()),
        (Measure::Bend, (upper / lower).ln()),
        (Measure::Toe, start),
        (
            Measure::SolidLength,
            body.solid() + body.zero() + setup.zero + off(0.1),
        ),
        (Measure::Hysteresis, (up - down) / up),
        (Measure::Wire, wire + off(tools.wire)),
        (Measure::WireSpread, spread + off(2.0 * tools.wire)),
        (
            Measure::OutsideDiameter,
            body.coil + wire + off(tools.diameter),
        ),
        (Measure::Coils, body.total + off(tools.turns)),
        (Measure::Mass, body.mass().ln() + off(tools.mass)),
        (Measure::Squareness, body.askew() + off(0.05)),
    ]
}

//! Proof by simulation of the full budget: how often y ± U holds the truth, the rig's errors drawn anew for every
//! curve from the distributions its rig file states. Springs, bench and random numbers are the sample generator's.

use coilassay::characteristic::{Estimate, Measured, Setup, measure, wanted};
use coilassay::curve::{correct, full_load, window_of};
use coilassay::intake::Conditions;
use coilassay::quantity::Quantity;
use rayon::prelude::*;

use crate::bench::Travel;
use crate::coverage_cases::{Case, MIXED, NORMAL, Scale, draw, drawing, rig};
use crate::random::Random;

const CURVES: u64 = 10_000;
const SEED: u64 = 20_261_201;
/// Errors over u of one characteristic, and whether U held the truth.
#[derive(Default)]
struct Tally {
    errors: Vec<(f64, f64)>,
    held: u64,
    /// Curves on which U may hold more than the band says.
    bounded: u64,
}

impl Tally {
    fn share(&self) -> f64 {
        self.held as f64 / self.errors.len() as f64
    }

    /// Mean error and root mean square error, each over the root mean square u.
    fn shape(&self) -> (f64, f64) {
        let count = self.errors.len() as f64;
        let u = (self.errors.iter().map(|(_, u)| u * u).sum::<f64>() / count).sqrt();
        let mean = self.errors.iter().map(|(e, _)| e).sum::<f64>() / count;
        let square = self.errors.iter().map(|(e, _)| e * e).sum::<f64>() / count;
        (mean / u, square.sqrt() / u)
    }
}

/// Whether ± U may hold the truth in more than 99.5 of 100, although the budget is right. A rectangle of u² share 0.95
/// and a normal rest are held in 99.5 (by hand), so where one leads by more. Seating is a bound on a shape that is not
/// known, the springs are not drawn from it: where it has a tenth, or stands beside such a rectangle. Set and solid
/// length are held on the side that matters.
fn may_hold_more(case: &Case, quantity: Quantity, estimate: &Estimate, u: f64) -> bool {
    let share = |source: &str, rectangular: bool| {
        let line = estimate.lines.iter().find(|line| line.source == source);
        let line = line.filter(|line| line.counted && rectangular);
        line.map_or(0.0, |line| (line.contribution / u).powi(2))
    };
    let force = share("force scale", matches!(case.force, Scale::Class(..)));
    let travel = share("travel scale", matches!(case.scale, Scale::Class(..)));
    let seating = share("seating", true);
    seating > 0.1
        || force.max(travel) + seating > 0.95
        || matches!(quantity, Quantity::Set | Quantity::SolidLength)
}

/// Each characteristic's error, u and U on one curve, and whether U may hold more.
fn errors(case: &Case, setup: &Setup<'_>, purpose: u64) -> Vec<Option<([f64; 3], bool)>> {
    let mut random = Random::new(SEED, purpose);
    let (specimen, raw, gauge) = draw(case, &mut random);
    let caliper = match case.travel {
        Travel::Deflection => vec![(Quantity::FreeLength, gauge)],
        _ => Vec::new(),
    };
    let curve = correct(&raw, setup.rig).unwrap();
    let found = measure(setup, &curve, &caliper).unwrap();
    let error = |quantity: &Quantity| {
        let truth = match quantity {
            Quantity::Rate => specimen.rate(),
            Quantity::LoadAt(length) => specimen.load(length.get()),
            Quantity::Set => specimen.set,
            // Where the tangent is five rates, of which the coils' meeting gives four of its sixty (by hand).
            Quantity::SolidLength => specimen.members[0].solid + 0.03 * (56.0_f64 / 4.0).ln(),
            _ => specimen.free() + specimen.set,
        };
        let one = found
            .characteristics
            .iter()
            .find(|one| one.quantity == *quantity)?;
        let Measured::Value(estimate) = &one.measured else {
            return None;
        };
        let sum = estimate.uncertainty?;
        let more = may_hold_more(case, *quantity, estimate, sum.standard);
        let figures = [estimate.value - truth, sum.standard, sum.expanded];
        Some((figures, more))
    };
    setup.wanted.iter().map(error).collect()
}

/// Coverage of every characteristic over all curves of a case.
fn coverage(case: &Case, number: u64) -> Vec<(Quantity, Tally)> {
    let (rig, drawing) = (rig(case), drawing());
    let mut judged = wanted(&drawing);
    judged.truncate(drawing.requirements.len());
    let setup = Setup {
        rig: &rig,
        conditions: Conditions {
            temperature: case.temperature,
            presetting_strokes: Some(3),
            presetting_recorded: 0,
        },
        bounds: window_of(&drawing),
        stroke: drawing.rate_test.stroke,
        method: drawing.rate_test.method,
        full_load: Some(full_load(&drawing)),
        wanted: &judged,
        stages: &[],
        caliper: &[("free_length", case.zero)],
    };
    let all: Vec<_> = (0..CURVES)
        .into_par_iter()
        .map(|curve| errors(case, &setup, number * CURVES + curve))
        .collect();
    let mut tallies: Vec<_> = judged.iter().map(|of| (*of, Tally::default())).collect();
    for one in all {
        for ((_, tally), found) in tallies.iter_mut().zip(one) {
            let Some(([error, u, expanded], more)) = found else {
                continue;
            };
            tally.errors.push((error, u));
            tally.held += u64::from(error.abs() <= expanded);
            tally.bounded += u64::from(more);
        }
    }
    tallies
}

fn check(cases: &[Case], band: std::ops::RangeInclusive<f64>) {
    let mut misses = Vec::new();
    for (number, case) in (1..).zip(cases) {
        for (quantity, tally) in coverage(case, number) {
            if tally.errors.is_empty() {
                continue;
            }
            let (mean, spread) = tally.shape();
            let at = quantity
                .at_length()
                .map_or(String::new(), |at| format!(" at {} mm", at.get()));
            let line = format!(
                "{:<32} {:<22} {:.2} % of {}; mean error {mean:+.2} u, rms error {spread:.2} u",
                case.name,
                format!("{}{at}", quantity.name()),
                100.0 * tally.share(),
                tally.errors.len()
            );
            println!("{line}");
            let one_sided = 2 * tally.bounded > tally.errors.len() as u64;
            let upper = if one_sided { 1.0 } else { *band.end() };
            let few = (tally.errors.len() as u64) < CURVES * 98 / 100;
            if few || !(*band.start()..=upper).contains(&tally.share()) {
                misses.push(line);
            }
        }
    }
    assert!(misses.is_empty(), "outside {band:?}: {misses:#?}");
}

#[test]
fn full_budget() {
    check(&MIXED, 0.94..=0.995);
}

#[test]
fn all_contributions_normal() {
    check(&NORMAL, 0.94..=0.965);
}

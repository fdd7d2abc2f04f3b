//! One plan as the result tells it: its numbers, risks and operating characteristic.

use super::super::facts::figure;
use super::asked::{Asked, PlanOptions, name};
use crate::drawing::State;
use crate::record::{CurvePoint, OfferFacts};
use crate::sampling::{Bench, Designed, Measured, Offer, PlanError, Points};

/// Rows of the table of chances, about; each has five points of the curve.
const ROWS: f64 = 10.0;
/// Points of the curve from one row to the next.
const POINTS: u32 = 5;

/// The qualities that producer's and consumer's risk are stated for, shares.
const fn stated(asked: Asked) -> (Option<f64>, Option<f64>) {
    match asked {
        Asked::Attributes { aql, .. } | Asked::Variables { aql, .. } => (Some(aql / 100.0), None),
        Asked::Designed(Points { p1, p2, .. }) => (Some(p1), Some(p2)),
        Asked::ZeroAccept {
            limiting_quality, ..
        } => (None, Some(limiting_quality)),
    }
}

pub(super) fn told(
    asked: Asked,
    offer: Offer,
    options: &PlanOptions,
    bench: Option<Bench>,
    now: State,
    grid: &[f64],
) -> miette::Result<OfferFacts> {
    let size = options.lot_size;
    let (letters, source) = match offer {
        Offer::Attributes(plan) => (
            Some((plan.printed_letter.get(), plan.letter.get())),
            "ISO 2859-1",
        ),
        Offer::Variables(plan) => (plan.letters, "MIL-STD-414 Table B"),
        Offer::Designed(Designed { .. }) => (None, "designed"),
        Offer::ZeroAccept(_) => (None, "zero-accept"),
    };
    let counted = offer.counted(size);
    let plan = offer.measured();
    let raised = plan
        .zip(bench)
        .map(|(plan, bench)| Measured::on(plan, bench).sample_size);
    let accepted = |p: Option<f64>| p.map(|p| offer.accepted(size, p)).transpose();
    let (producers, consumers) = stated(asked);
    let at = |level| Ok::<_, PlanError>(figure(100.0 * offer.quality_at(size, level)?));
    let whole = |found: Option<crate::units::Finite>| {
        found.ok_or_else(|| miette::miette!("a quality of this plan is no finite number"))
    };
    Ok(OfferFacts {
        name: name(asked, now),
        source: source.to_owned(),
        code_letter: letters.map(|(printed, _)| printed.to_string()),
        used_letter: letters.map(|(_, used)| used.to_string()),
        sample_size: offer.sample_size(size),
        accept: counted.map(|plan| plan.accept),
        reject: counted.map(|plan| plan.reject),
        k: plan.and_then(|plan| figure(plan.k)),
        most_percent: plan.and_then(|plan| figure(100.0 * plan.most)),
        raised_sample_size: raised,
        producers_quality_percent: producers.and_then(|p| figure(100.0 * p)),
        producers_risk: accepted(producers)?.and_then(|chance| figure(1.0 - chance)),
        consumers_quality_percent: consumers.and_then(|p| figure(100.0 * p)),
        consumers_risk: accepted(consumers)?.and_then(figure),
        accepted_95_percent: whole(at(0.95)?)?,
        accepted_50_percent: whole(at(0.50)?)?,
        accepted_10_percent: whole(at(0.10)?)?,
        curve: curve(offer, size, bench, grid)?,
    })
}

/// Qualities up to about `farthest`, rows at round percentages.
pub(super) fn grid(farthest: f64) -> Vec<f64> {
    let rough = 100.0 * farthest / ROWS;
    let power = 10_f64.powf(rough.log10().floor());
    let round = [1.0, 2.0, 5.0, 10.0].map(|factor| factor * power);
    let step = round
        .into_iter()
        .find(|step| *step >= rough * (1.0 - 1e-9))
        .unwrap_or(rough);
    let mut found = vec![0.0];
    let mut place = 1_u32;
    while f64::from(place) * step / f64::from(POINTS) <= 100.0 * farthest.min(1.0) + step {
        let percent = step * f64::from(place) / f64::from(POINTS);
        if percent > 100.0 {
            break;
        }
        found.push(percent / 100.0);
        place += 1;
    }
    found
}

fn curve(
    offer: Offer,
    lot_size: u64,
    bench: Option<Bench>,
    grid: &[f64],
) -> Result<Vec<CurvePoint>, PlanError> {
    let mut points = Vec::new();
    for p in grid.iter().copied() {
        let on_bench = bench
            .map(|bench| offer.chances(lot_size, bench, p))
            .transpose()?;
        let accepted = offer.accepted(lot_size, p)?;
        if let (Some(quality_percent), Some(accepted)) = (figure(100.0 * p), figure(accepted)) {
            points.push(CurvePoint {
                quality_percent,
                accepted,
                accepted_on_bench: on_bench.and_then(|one| figure(one.accepted)),
                rejected_on_bench: on_bench.and_then(|one| figure(one.rejected)),
                undecided_on_bench: on_bench.and_then(|one| figure(one.undecided)),
            });
        }
    }
    Ok(points)
}

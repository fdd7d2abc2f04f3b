//! `plan`: plans side by side, and what each lets through.

mod asked;
mod flags;
mod told;

use crate::drawing::State;
use crate::record::{BenchFacts, FORMAT, Kind, OffersRecord, Provenance, StateFacts};
use crate::sampling::{
    Aql, Bench, Offer, PlanError, Reason, designed, next, single, variables_plan, zero_accept,
};

use super::accept::Past;
use super::facts::figure;

pub use asked::{Asked, BenchAsked, CompareError, PlanOptions};
pub use flags::PlanFlags;

/// Beyond the quality accepted five times in a hundred by this factor nothing is drawn.
const BEYOND: f64 = 1.1;

/// Compares the plans.
///
/// # Errors
/// [`PlanError`] where a plan does not exist, [`CompareError`] where nothing can be compared.
pub fn plan(options: &PlanOptions) -> miette::Result<OffersRecord> {
    if options.asked.is_empty() {
        return Err(CompareError::NoPlan.into());
    }
    let bench = options.bench.map(bench_of).transpose()?;
    let state = options
        .past
        .as_ref()
        .map(|past| state_of(past, options.reduced_agreed))
        .transpose()?;
    let now = state.as_ref().map_or(State::Normal, |(state, _)| *state);
    let size = options.lot_size;
    let mut offers = Vec::new();
    for asked in &options.asked {
        offers.push((*asked, offer(*asked, size, now)?));
    }
    let mut farthest = 0.0_f64;
    for (_, offer) in &offers {
        farthest = farthest.max(offer.quality_at(size, 0.05)?);
    }
    let grid = told::grid((farthest * BEYOND).min(1.0));
    let plans = offers
        .iter()
        .map(|(asked, offer)| told::told(*asked, *offer, options, bench, now, &grid))
        .collect::<Result<Vec<_>, _>>()?;
    let inputs = options.past.as_ref().and_then(|past| past.input.clone());
    Ok(OffersRecord {
        format: FORMAT,
        kind: Kind::Plan,
        lot_size: size,
        state: state.map(|(_, told)| told),
        bench: options.bench.and_then(bench_facts),
        plans,
        provenance: Provenance::new(
            options.date,
            options.flags.clone(),
            inputs.into_iter().collect(),
            Vec::new(),
        ),
        files: Vec::new(),
    })
}

/// The bench in the springs' standard deviations.
fn bench_of(asked: BenchAsked) -> Result<Bench, CompareError> {
    let refuse = |what, share: f64| CompareError::Bench {
        what,
        found: 100.0 * share,
    };
    for (what, share) in [("uncertainty", asked.expanded), ("spread", asked.spread)] {
        if !(share > 0.0 && share <= 10.0) {
            return Err(refuse(what, share));
        }
    }
    if !(0.0..=1.0).contains(&asked.common) {
        return Err(refuse("common share", asked.common));
    }
    let standard = asked.expanded / 2.0 / asked.spread;
    Ok(Bench {
        own: standard * (1.0 - asked.common).sqrt(),
        common: standard * asked.common.sqrt(),
    })
}

fn bench_facts(asked: BenchAsked) -> Option<BenchFacts> {
    Some(BenchFacts {
        expanded_percent: figure(100.0 * asked.expanded)?,
        spread_percent: figure(100.0 * asked.spread)?,
        common_percent: figure(100.0 * asked.common)?,
    })
}

fn state_of(past: &Past, reduced_agreed: bool) -> Result<(State, StateFacts), CompareError> {
    let found = next(&past.lots, State::Normal, reduced_agreed);
    if let Reason::Discontinued { lot } = found.reason {
        return Err(CompareError::Discontinued { lot });
    }
    let told = StateFacts {
        state: found.state.word().to_owned(),
        history: Some(past.from.clone()),
        lots: past.lots.len() as u64,
        reason: Some(found.reason),
    };
    Ok((found.state, told))
}

fn offer(asked: Asked, lot_size: u64, now: State) -> Result<Offer, PlanError> {
    Ok(match asked {
        Asked::Attributes { level, aql, state } => {
            let state = state.unwrap_or(now);
            Offer::Attributes(single(lot_size, level, Aql::try_from(aql)?, state)?)
        }
        Asked::Variables { level, aql, state } => {
            Offer::Variables(variables_plan(lot_size, level, aql, state)?)
        }
        Asked::Designed(points) => {
            let found = designed(points)?;
            let wanted = found.plan.sample_size;
            if wanted > lot_size {
                return Err(PlanError::SampleExceedsLot {
                    wanted,
                    lot: lot_size,
                });
            }
            Offer::Designed(found)
        }
        Asked::ZeroAccept {
            limiting_quality,
            consumer_risk,
        } => Offer::ZeroAccept(zero_accept(lot_size, limiting_quality, consumer_risk)?),
    })
}

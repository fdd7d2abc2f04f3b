//! The charts: limits from the baseline, what each lot is on them, rules that fire.

use super::found::{Charted, Series};
use super::{TrackError, count, finite, maybe};
use crate::drift::{
    H, K, L, LAMBDA, Limits, LotPoint, Rule, combined_run_length, components, fired, individuals,
    spread_limits, tabular_cusum, true_run_length, weighted,
};
use crate::record::{
    AlarmFacts, ChartKind, LimitFacts, TrackCaution, TrackRecord, Tracked, TrackedLot,
};

/// Baselines of fewer lots carry a caution.
const MANY: u32 = 40;

/// The lots before anything is charted.
pub(super) fn lots(series: &Series, baseline: &[bool]) -> Result<Vec<TrackedLot>, TrackError> {
    let one = |(lot, baseline): (&Charted, &bool)| {
        Ok(TrackedLot {
            lot: lot.head.lot.clone(),
            supplier: lot.head.supplier.clone(),
            date: lot.head.when(),
            rig: lot.head.rig.clone(),
            tags: lot.head.tags.clone(),
            run: lot.run.clone(),
            springs: lot.point.springs,
            mean: finite(lot.point.mean, "a lot's mean")?,
            standard_deviation: maybe(lot.point.deviation),
            own_uncertainty: maybe(lot.point.own),
            baseline: *baseline,
            within_limits: None,
            spread_limits: None,
            ewma: None,
            cusum_high: None,
            cusum_low: None,
        })
    };
    series.lots.iter().zip(baseline).map(one).collect()
}

/// Charts the lots of `record`.
pub(super) fn chart(
    record: &mut TrackRecord,
    points: &[LotPoint],
    baseline: &[bool],
) -> Result<(), TrackError> {
    let inside = points.iter().zip(baseline).filter(|(_, of)| **of);
    let base: Vec<LotPoint> = inside.map(|(point, _)| *point).collect();
    let base_means: Vec<f64> = base.iter().map(|point| point.mean).collect();
    let limits = individuals(&base_means).ok_or(TrackError::NoScatter { lots: base.len() })?;
    let means: Vec<f64> = points.iter().map(|point| point.mean).collect();
    let score = |value: f64| (value - limits.centre) / limits.sigma;
    let scores: Vec<f64> = means.iter().map(|mean| score(*mean)).collect();
    record.mean_limits = facts(limits)?;
    alarms(record, ChartKind::Mean, &scores);
    let spread = spreads(record, points, &base, limits.centre)?;
    averages(record, &means, limits)?;
    sums(record, &scores);
    record.cusum_limit = maybe(Some(H));
    record
        .alarms
        .sort_by_key(|alarm| (alarm.at, alarm.chart, alarm.rule));
    let first = count(points.len()).saturating_sub(record.newest);
    record.decision = if record.alarms.iter().any(|alarm| alarm.at >= first) {
        Tracked::Fires
    } else {
        Tracked::Quiet
    };
    record.false_alarm_interval = maybe(Some(combined_run_length(&record.rules, spread)));
    cautions(record, baseline)
}

fn facts(limits: Limits) -> Result<Option<LimitFacts>, TrackError> {
    Ok(Some(LimitFacts {
        centre: finite(limits.centre, "a centre line")?,
        lower: finite(limits.lower, "a limit")?,
        upper: finite(limits.upper, "a limit")?,
    }))
}

fn alarms(record: &mut TrackRecord, chart: ChartKind, scores: &[f64]) {
    for rule in record.rules.clone() {
        let places = fired(rule, scores).into_iter();
        let alarm = |at| AlarmFacts {
            chart,
            rule,
            at: count(at),
        };
        record.alarms.extend(places.map(alarm));
    }
}

/// The chart of standard deviations; whether there is one. A lot of one spring is no point of it.
fn spreads(
    record: &mut TrackRecord,
    points: &[LotPoint],
    base: &[LotPoint],
    centre: f64,
) -> Result<bool, TrackError> {
    let within = components(base).map(|found| found.within.sqrt());
    let Some(sigma) = within.filter(|sigma| *sigma > 0.0) else {
        return Ok(false);
    };
    let (mut scores, mut places) = (Vec::new(), Vec::new());
    for (place, (lot, point)) in record.lots.iter_mut().zip(points).enumerate() {
        let root = (point.springs as f64).sqrt();
        lot.within_limits = facts(Limits::about(centre, sigma / root, 3.0))?;
        let (Some(deviation), Some(limits)) =
            (point.deviation, spread_limits(point.springs, sigma))
        else {
            continue;
        };
        lot.spread_limits = facts(limits)?;
        scores.push((deviation - limits.centre) / limits.sigma);
        places.push(place);
    }
    for rule in Rule::DEFAULT {
        let at = fired(rule, &scores).into_iter();
        let found = at.filter_map(|at| places.get(at)).map(|at| AlarmFacts {
            chart: ChartKind::Spread,
            rule,
            at: count(*at),
        });
        record.alarms.extend(found);
    }
    Ok(true)
}

fn averages(record: &mut TrackRecord, means: &[f64], of: Limits) -> Result<(), TrackError> {
    let settled = of.sigma * (LAMBDA / (2.0 - LAMBDA)).sqrt();
    let limits = Limits::about(of.centre, settled, L);
    record.ewma_limits = facts(limits)?;
    let values = weighted(means, of.centre, LAMBDA);
    for (place, (lot, value)) in record.lots.iter_mut().zip(values).enumerate() {
        lot.ewma = maybe(Some(value));
        if value < limits.lower || value > limits.upper {
            record.alarms.push(beyond(ChartKind::Ewma, place));
        }
    }
    Ok(())
}

fn sums(record: &mut TrackRecord, scores: &[f64]) {
    let sums = tabular_cusum(scores, 0.0, K);
    for (place, (lot, sum)) in record.lots.iter_mut().zip(sums).enumerate() {
        (lot.cusum_high, lot.cusum_low) = (maybe(Some(sum.high)), maybe(Some(sum.low)));
        if sum.high > H || sum.low > H {
            record.alarms.push(beyond(ChartKind::Cusum, place));
        }
    }
}

fn beyond(chart: ChartKind, place: usize) -> AlarmFacts {
    AlarmFacts {
        chart,
        rule: Rule::Beyond,
        at: count(place),
    }
}

fn cautions(record: &mut TrackRecord, baseline: &[bool]) -> Result<(), TrackError> {
    let lots = record.baseline_lots;
    if lots < MANY
        && let Some(spread) = true_run_length(lots as usize)
    {
        record.cautions.push(TrackCaution::FewBaselineLots {
            lots,
            short: finite(spread.short, "a run length")?,
            long: finite(spread.long, "a run length")?,
        });
    }
    let mut fires: Vec<u32> = record.alarms.iter().map(|alarm| alarm.at).collect();
    fires.dedup(); // alarms stand by lot
    fires.retain(|at| baseline.get(*at as usize).is_some_and(|of| *of));
    if !fires.is_empty() {
        let lots = count(fires.len());
        record.cautions.push(TrackCaution::BaselineFires { lots });
    }
    let sizes = || record.lots.iter().map(|lot| lot.springs);
    if let (Some(fewest), Some(most)) = (sizes().min(), sizes().max())
        && most > 2 * fewest
    {
        let differ = TrackCaution::SizesDiffer { fewest, most };
        record.cautions.push(differ);
    }
    Ok(())
}

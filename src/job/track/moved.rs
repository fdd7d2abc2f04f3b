//! What moved, when, how fast, and whose it was.

use std::collections::{BTreeMap, BTreeSet};

use jiff::civil::Date;

use super::found::{Charted, Series};
use super::{TrackError, count, finite, maybe};
use crate::drift::{
    ChecksCompared, Components, LotPoint, ReferencePoint, Side, Step, able, components, crossing,
    culprit, steps, trend,
};
use crate::quantity::Unit;
use crate::record::{
    AbleFacts, ComponentFacts, CrossingFacts, ReferenceMoved, StepFacts, TrackCaution, TrackRecord,
    TrendFacts,
};

/// Stretches that capability is told of.
const STRETCHES: usize = 10;
/// Lots of a stretch, at least.
const SHORTEST: usize = 5;

pub(super) fn told(
    record: &mut TrackRecord,
    series: &Series,
    points: &[LotPoint],
) -> Result<(), TrackError> {
    let means: Vec<f64> = points.iter().map(|point| point.mean).collect();
    record.components = components(points).as_ref().map(parts).transpose()?;
    let found = steps(&means).into_iter().map(|one| step(series, &one));
    record.steps = found.collect::<Result<_, _>>()?;
    record.trend = trending(series, &means)?;
    record.capability = capability(series, points)?;
    let rigs: BTreeSet<&String> = series.lots.iter().map(|lot| &lot.head.rig).collect();
    if rigs.len() > 1 {
        let rigs = count(rigs.len());
        record.cautions.push(TrackCaution::SeveralRigs { rigs });
    }
    if series.limits_changed {
        record.cautions.push(TrackCaution::LimitsChanged);
    }
    Ok(())
}

pub(super) fn parts(of: &Components) -> Result<ComponentFacts, TrackError> {
    let root = |variance: Option<f64>| maybe(variance.map(f64::sqrt));
    Ok(ComponentFacts {
        between: finite(of.between.sqrt(), "a component")?,
        within: finite(of.within.sqrt(), "a component")?,
        springs: root(of.spring_to_spring()),
        measurement: root(of.measurement),
        f: maybe(of.f),
        p: maybe(of.p),
    })
}

fn day(date: Date) -> f64 {
    date.duration_since(Date::ZERO).as_hours() as f64 / 24.0
}

fn step(series: &Series, of: &Step) -> Result<StepFacts, TrackError> {
    let lots = &series.lots;
    let (before, after) = (
        lots.get(of.begins..of.at).unwrap_or_default(),
        lots.get(of.at..of.ends).unwrap_or_default(),
    );
    let points = reference_points(series, f64::midpoint(of.before, of.after));
    let mut later = side(after);
    if of.ends == lots.len() {
        later.to = f64::INFINITY;
    }
    let (whose, moved) = culprit(of.after - of.before, side(before), later, &points);
    let name = |of: Option<&Charted>| of.map(|lot| lot.head.lot.clone()).unwrap_or_default();
    Ok(StepFacts {
        at: count(of.at),
        lot_before: name(before.last()),
        lot_after: name(after.first()),
        from: count(of.from),
        to: count(of.to),
        before: finite(of.before, "a level")?,
        after: finite(of.after, "a level")?,
        jump: finite(of.after - of.before, "a jump")?,
        standard_uncertainty: finite(of.uncertainty, "a jump's uncertainty")?,
        chance: finite(of.chance, "a chance")?,
        culprit: whose,
        reference: moved.map(reference).transpose()?,
        // Lots inside the interval of its place may be of either side.
        changed_with: changed_with(
            lots.get(of.begins..of.from).unwrap_or_default(),
            lots.get(of.to..of.ends).unwrap_or_default(),
        ),
    })
}

/// The checks as points, for lots about a level.
fn reference_points(series: &Series, level: f64) -> Vec<ReferencePoint> {
    series
        .checks
        .iter()
        .map(|(check, certified)| ReferencePoint {
            day: day(check.date),
            rig: check.rig.clone(),
            reference: check.reference.clone(),
            error: check.error.get(),
            factor: factor(series.unit, level, certified.get()),
        })
        .collect()
}

/// What an error on the reference spring stands for on the lots' springs: an error of the force scale grows with the load, one of
/// the travel scale by length is taken as it is.
fn factor(unit: Unit, level: f64, certified: f64) -> f64 {
    match unit {
        Unit::Newton | Unit::NewtonPerMillimetre if certified.abs() > 0.0 => level / certified,
        _ => 1.0,
    }
}

fn reference(of: ChecksCompared) -> Result<ReferenceMoved, TrackError> {
    Ok(ReferenceMoved {
        checks_before: count(of.before),
        checks_after: count(of.after),
        moved: finite(of.moved, "what the reference did")?,
        standard_uncertainty: finite(of.uncertainty, "what the reference did")?,
    })
}

fn side(lots: &[Charted]) -> Side<'_> {
    let days = || lots.iter().map(|lot| day(lot.head.when()));
    let rig = lots.first().map(|lot| lot.head.rig.as_str());
    Side {
        from: days().fold(f64::INFINITY, f64::min),
        to: days().fold(f64::NEG_INFINITY, f64::max),
        rig: rig.filter(|rig| lots.iter().all(|lot| lot.head.rig == *rig)),
    }
}

/// What is one thing on all lots before and another on all after.
fn changed_with(before: &[Charted], after: &[Charted]) -> Vec<String> {
    let (old, new) = (common(before), common(after));
    let changed = |(name, value): (String, String)| {
        let now = new.get(&name).filter(|now| **now != value)?;
        Some(format!("{name}: {value}, then {now}"))
    };
    old.into_iter().filter_map(changed).collect()
}

/// What all of some lots have in common.
fn common(lots: &[Charted]) -> BTreeMap<String, String> {
    let facts = |lot: &Charted| -> BTreeMap<String, String> {
        let mut facts = lot.head.tags.clone();
        facts.insert("rig".to_owned(), lot.head.rig.clone());
        let supplier = lot.head.supplier.clone();
        facts.extend(supplier.map(|supplier| ("supplier".to_owned(), supplier)));
        facts
    };
    let mut common = lots.first().map(facts).unwrap_or_default();
    for lot in lots {
        let now = facts(lot);
        common.retain(|name, value| now.get(name) == Some(value));
    }
    common
}

fn trending(series: &Series, means: &[f64]) -> Result<Option<TrendFacts>, TrackError> {
    let Some(found) = trend(means) else {
        return Ok(None);
    };
    let crosses = crossing(&found, series.limits.1, series.limits.2);
    let crossing = crosses.map(|of| {
        Ok::<_, TrackError>(CrossingFacts {
            limit: finite(of.limit, "a limit")?,
            lots: finite(of.steps, "a crossing")?,
            earliest: finite(of.earliest, "a crossing")?,
            latest: maybe(of.latest),
        })
    });
    Ok(Some(TrendFacts {
        slope_per_lot: finite(found.slope, "a slope")?,
        lower: finite(found.slope_lower, "a slope")?,
        upper: finite(found.slope_upper, "a slope")?,
        z: finite(found.z, "a deviate")?,
        p: finite(found.p, "a chance")?,
        moves: found.moves(),
        crossing: crossing.transpose()?,
    }))
}

/// Capability of stretches of equal numbers of lots.
fn capability(series: &Series, points: &[LotPoint]) -> Result<Vec<AbleFacts>, TrackError> {
    let long = points.len().div_ceil(STRETCHES).max(SHORTEST);
    let mut told = Vec::new();
    for (place, stretch) in points.chunks(long).enumerate() {
        let of = components(stretch).filter(|_| stretch.len() >= SHORTEST);
        let of = of.and_then(|of| able(&of, series.limits.1, series.limits.2));
        let Some(of) = of else {
            continue;
        };
        told.push(AbleFacts {
            from: count(place * long),
            to: count(place * long + stretch.len() - 1),
            pp: maybe(of.pp),
            ppk: finite(of.ppk, "a capability")?,
            lower: finite(of.lower, "a capability")?,
            upper: finite(of.upper, "a capability")?,
        });
    }
    Ok(told)
}

//! The page of `track`.

use super::facts::{Facts, fact};
use super::page::{Page, PageDecision};
use super::short;
use super::track_tables as tables;
use crate::record::{AlarmFacts, TrackRecord, Tracked, TrackedLot};
use crate::units::System;
use crate::wording::{self, Place, count, number, with_unit};

/// Lots written out on which a rule fires.
const SHOWN: usize = 6;

/// The page of a characteristic over lots, its figures in the units of `show_in`.
pub fn track_page(of: &TrackRecord, show_in: System) -> Page {
    let name = wording::characteristic(&of.characteristic, of.at_length_mm, show_in);
    let subject = format!(
        "{} of drawing {} over {}",
        wording::sentence(&name),
        of.drawing,
        count(of.lots.len() as u64, "lot")
    );
    let mut page = Page::begun(
        "track",
        "Drift over lots",
        subject.clone(),
        &of.provenance,
        show_in,
    );
    page.short = short(&subject);
    page.decision = decision(of, &subject, show_in);
    page.facts = vec![facts(of, show_in)];
    page.cautions = of.cautions.iter().map(wording::tracked).collect();
    page.tables = tables::page_one(of, show_in);
    let mut sections = tables::sections(of, show_in);
    sections.append(&mut page.sections);
    page.sections = sections;
    page
}

fn decision(of: &TrackRecord, subject: &str, show_in: System) -> PageDecision {
    let (code, word) = match of.decision {
        Tracked::Quiet => ("accepted", "NO RULE FIRES"),
        Tracked::Fires => ("rejected", "A RULE FIRES"),
        Tracked::TooFewLots => ("undecided", "TOO FEW LOTS"),
    };
    let first = of.lots.len().saturating_sub(of.newest as usize);
    let mut why = firing(of, first);
    let more = why.len().saturating_sub(SHOWN);
    why.truncate(SHOWN);
    if more > 0 {
        why.push(format!("And {more} more of the newest lots."));
    }
    if of.decision == Tracked::TooFewLots {
        why.push(format!(
            "A baseline of 8 lots and one lot beside it are needed; there is a baseline of {} among {}.",
            of.baseline_lots,
            count(of.lots.len() as u64, "lot")
        ));
    }
    why.extend(of.steps.iter().map(|step| wording::step(step, of, show_in)));
    why.extend(wording::trend(of, show_in));
    PageDecision {
        code,
        word: word.to_owned(),
        about: format!("{subject}: the newest {}.", count(of.newest, "lot")),
        why,
    }
}

/// What fires on the lots from `first` on, a line for each lot, the newest first.
fn firing(of: &TrackRecord, first: usize) -> Vec<String> {
    let lots = of.lots.iter().enumerate().skip(first).rev();
    let line = |(place, lot): (usize, &TrackedLot)| {
        let alarms: Vec<&AlarmFacts> = of
            .alarms
            .iter()
            .filter(|alarm| alarm.at as usize == place)
            .collect();
        let charts = alarms.chunk_by(|one, next| one.chart == next.chart);
        let words: Vec<String> = charts
            .filter_map(|alarms| {
                let rules: Vec<&str> = alarms.iter().map(|of| wording::rule(of.rule)).collect();
                let chart = wording::chart(alarms.first()?.chart);
                Some(format!("{chart} ({})", rules.join("; ")))
            })
            .collect();
        (!words.is_empty()).then(|| format!("Lot {}: {}.", lot.lot, words.join(", ")))
    };
    lots.filter_map(line).collect()
}

fn facts(of: &TrackRecord, show_in: System) -> Facts {
    let value = |value| with_unit(value, of.unit, Place::Stated, show_in);
    let shown = |value| with_unit(value, of.unit, Place::Significant(5), show_in);
    let mut facts = vec![
        fact(
            "Lots",
            format!(
                "{}, {} of them the baseline",
                of.lots.len(),
                of.baseline_lots
            ),
        ),
        fact("Nominal", value(of.nominal)),
        fact(
            "Limits",
            format!("{} to {}", value(of.lower), value(of.upper)),
        ),
    ];
    if let Some(limits) = &of.mean_limits {
        facts.push(fact(
            "Charts of means",
            format!(
                "centre {}, limits {} to {}",
                shown(Some(limits.centre)),
                shown(Some(limits.lower)),
                shown(Some(limits.upper))
            ),
        ));
    }
    if let Some(lots) = of.false_alarm_interval {
        facts.push(fact(
            "False alarms",
            format!(
                "one in {} lots on the average, all charts together, limits known",
                number(Some(lots), 2)
            ),
        ));
    }
    Facts {
        title: "Series".to_owned(),
        rows: facts,
    }
}

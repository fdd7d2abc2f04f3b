//! The tables of the page of `track`.

use super::table::{Column, Row, Section, Table};
use crate::record::{ComponentFacts, TrackRecord, TrackedLot};
use crate::units::{Finite, System};
use crate::wording::{self, ABSENT, Place, figure, number, unit_symbol};

/// Lots of the table, the newest.
const NEWEST: usize = 40;

/// Change points, components, side by side.
pub(super) fn page_one(of: &TrackRecord, show_in: System) -> Vec<Table> {
    let mut tables = Vec::new();
    if !of.steps.is_empty() {
        tables.push(steps(of, show_in));
    }
    if let Some(parts) = &of.components {
        tables.push(components(of, parts, show_in));
    }
    if !of.groups.is_empty() {
        tables.push(groups(of, show_in));
    }
    if !of.capability.is_empty() {
        tables.push(capability(of));
    }
    tables
}

/// What stands behind page one.
pub(super) fn sections(of: &TrackRecord, show_in: System) -> Vec<Section> {
    vec![
        Section {
            title: "How it was charted".to_owned(),
            text: method(of),
            tables: Vec::new(),
        },
        Section {
            title: "The lots".to_owned(),
            text: Vec::new(),
            tables: vec![lots(of, show_in)],
        },
    ]
}

fn method(of: &TrackRecord) -> Vec<String> {
    let rules: Vec<String> = of
        .rules
        .iter()
        .map(|rule| wording::rule(*rule).to_owned())
        .collect();
    vec![
        "Means: each lot’s mean as an individual, limits at the baseline’s mean ± 3/d2 times the mean of its moving ranges, so that what lots \
         always differ by is no alarm. Standard deviations: c4·σ ± 3σ·√(1 − c4²), σ pooled within the baseline’s lots. EWMA: λ 0.2, \
         limits 2.86 standard deviations of the settled mean. CUSUM: k 0.5, h 5 standard deviations of the lots’ means."
            .to_owned(),
        format!("Rules on the chart of means: {}.", rules.join("; ")),
        "Change points: the best jump of the level by least squares, then of each part, while chance alone would show it in at most \
         1 % of series; the interval of its place by the likelihood of every place. Trend: Theil–Sen and Mann–Kendall over all lots; \
         it takes no notice of jumps. Components: one-way analysis of variance by moments."
            .to_owned(),
        "Springs or rig: the errors of checks on one reference spring before and after the jump; the rig’s where the reference moved \
         by more than half of it, 3 checks before and 5 after being there. Errors of loads and rates are taken in proportion to \
         what is measured."
            .to_owned(),
    ]
}

fn steps(of: &TrackRecord, show_in: System) -> Table {
    let unit = unit_symbol(of.unit, show_in);
    let columns = vec![
        Column::words("First lot after"),
        Column::words("95 %"),
        Column::figures("Before", unit),
        Column::figures("After", unit),
        Column::figures("Jump", unit),
        Column::figures("u", unit),
        Column::figures("Reference moved", unit),
        Column::words("Whose"),
    ];
    let lot = |at: u32| of.lots.get(at as usize).map_or("", |lot| lot.lot.as_str());
    let rows = of.steps.iter().map(|step| {
        let value = |value: Finite| figure(Some(value), of.unit, Place::Significant(5), show_in);
        let small = |value: Option<Finite>| figure(value, of.unit, Place::Significant(2), show_in);
        let whose = wording::culprit(step.culprit);
        Row::from([
            step.lot_after.clone().into(),
            format!("{} to {}", lot(step.from), lot(step.to)).into(),
            value(step.before).into(),
            value(step.after).into(),
            small(Some(step.jump)).into(),
            small(Some(step.standard_uncertainty)).into(),
            small(step.reference.map(|of| of.moved)).into(),
            whose.split(':').next().unwrap_or(whose).into(),
        ])
    });
    Table::new("Change points", columns, rows.collect())
}

fn components(of: &TrackRecord, parts: &ComponentFacts, show_in: System) -> Table {
    let columns = vec![
        Column::words("Standard deviation"),
        Column::figures("Value", unit_symbol(of.unit, show_in)),
    ];
    let rows = [
        ("between lots", Some(parts.between)),
        ("within lots", Some(parts.within)),
        ("of these, between springs", parts.springs),
        ("of these, measurement", parts.measurement),
    ]
    .map(|(name, value)| {
        let text = figure(value, of.unit, Place::Significant(3), show_in);
        Row::from([name.into(), text.into()])
    });
    let mut table = Table::new("Variance components over all lots", columns, rows.to_vec());
    table.note = format!(
        "F of the lots {}, p {}.",
        number(parts.f, 3),
        wording::chance(parts.p)
    );
    table
}

fn groups(of: &TrackRecord, show_in: System) -> Table {
    let unit = unit_symbol(of.unit, show_in);
    let by = of.by.as_deref().unwrap_or("");
    let columns = vec![
        Column::words(&wording::sentence(by)),
        Column::figures("Lots", ""),
        Column::figures("Springs", ""),
        Column::figures("Mean", unit),
        Column::figures("s between lots", unit),
        Column::figures("s within lots", unit),
    ];
    let rows = of.groups.iter().map(|group| {
        let small = |value| figure(value, of.unit, Place::Significant(3), show_in);
        Row::from([
            group.value.as_deref().unwrap_or("not stated").into(),
            group.lots.to_string().into(),
            group.springs.to_string().into(),
            figure(Some(group.mean), of.unit, Place::Significant(5), show_in).into(),
            small(group.between).into(),
            small(group.within).into(),
        ])
    });
    Table::new(format!("Side by side, by {by}"), columns, rows.collect())
}

fn capability(of: &TrackRecord) -> Table {
    let columns = vec![
        Column::words("Lots"),
        Column::figures("Pp", ""),
        Column::figures("Ppk", ""),
        Column::figures("95 % from", ""),
        Column::figures("to", ""),
    ];
    let lot = |at: u32| of.lots.get(at as usize).map_or("", |lot| lot.lot.as_str());
    let rows = of.capability.iter().map(|able| {
        Row::from([
            format!("{} to {}", lot(able.from), lot(able.to)).into(),
            number(able.pp, 3).into(),
            number(Some(able.ppk), 3).into(),
            number(Some(able.lower), 3).into(),
            number(Some(able.upper), 3).into(),
        ])
    });
    let table = Table::new("Capability over time", columns, rows.collect());
    let note = "Spread between and within lots together; the interval counts lots, not springs.";
    Table {
        note: note.to_owned(),
        ..table
    }
}

fn lots(of: &TrackRecord, show_in: System) -> Table {
    let unit = unit_symbol(of.unit, show_in);
    let columns = vec![
        Column::words("Lot"),
        Column::words("Date"),
        Column::words("Rig"),
        Column::figures("Springs", ""),
        Column::figures("Mean", unit),
        Column::figures("s", unit),
        Column::figures("EWMA", unit),
        Column::figures("CUSUM up", "σ"),
        Column::figures("down", "σ"),
        Column::words("Fires"),
    ];
    let skipped = of.lots.len().saturating_sub(NEWEST);
    let rows = of.lots.iter().enumerate().skip(skipped);
    let rows = rows.map(|(place, lot)| row(of, place, lot, show_in));
    let mut table = Table::new("", columns, rows.collect());
    if skipped > 0 {
        table.note = format!(
            "The newest {NEWEST} of {}; result.json has all.",
            of.lots.len()
        );
    }
    table
}

fn row(of: &TrackRecord, place: usize, lot: &TrackedLot, show_in: System) -> Row {
    let value = |value: Option<Finite>| figure(value, of.unit, Place::Significant(5), show_in);
    let mut fires: Vec<&str> = of
        .alarms
        .iter()
        .filter(|alarm| alarm.at as usize == place)
        .map(|alarm| wording::chart(alarm.chart))
        .collect();
    fires.dedup();
    let fires = if fires.is_empty() {
        ABSENT.to_owned()
    } else {
        fires.join(", ")
    };
    Row::from([
        lot.lot.clone().into(),
        lot.date.to_string().into(),
        lot.rig.clone().into(),
        lot.springs.to_string().into(),
        value(Some(lot.mean)).into(),
        figure(
            lot.standard_deviation,
            of.unit,
            Place::Significant(3),
            show_in,
        )
        .into(),
        value(lot.ewma).into(),
        number(lot.cusum_high, 3).into(),
        number(lot.cusum_low, 3).into(),
        fires.into(),
    ])
}

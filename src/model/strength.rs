//! Strength, fatigue, stability and motion of the drawn springs, as tables.

use super::table::{Cell, Column, Row, Section, Table};
use crate::quantity::Unit;
use crate::record::{Clearance, Expected, Fatigue, Outlook, SpringBuckling, StrengthLine, Verdict};
use crate::units::System;
use crate::wording::{self, ABSENT, Place, figure, number, percent, unit_symbol, with_unit};

/// What is said before the stresses.
const STRENGTH: &str = "Each line says which stress is held against which limit, for static load. All of it is theory: wire differs from its \
     smallest strength, ends and surfaces are not in it, and relaxation in time is not judged.";
const MOTION: &str = "Buckling by EN 13906-1, 9.14. Natural frequency with both ends held; with one end free it is half of it. The outside \
     diameter grows under load: at solid by the first figure with ends that cannot turn (Wahl, from memory), by the second with ends that turn \
     freely (EN 13906-1, 9.11, from memory). Energy at Ln. Clash allowance: travel left to solid at the shortest test length, or at Ln.";

/// Strength and fatigue.
pub(super) fn strength(of: &Expected, show_in: System) -> Section {
    let mut text = vec![STRENGTH.to_owned()];
    text.extend(rules(&of.strength, show_in));
    text.extend(
        of.strength_gaps
            .iter()
            .map(|gap| format!("{}: not held against any limit; {}.", gap.member, gap.why)),
    );
    text.extend(of.fatigue.iter().map(|line| fatigue(line, show_in)));
    let tables = if of.strength.is_empty() {
        Vec::new()
    } else {
        vec![stresses(&of.strength, show_in)]
    };
    Section {
        title: "Strength, in theory".to_owned(),
        text,
        tables,
    }
}

/// Every rule that is used, and where each spring's Rm comes from.
fn rules(lines: &[StrengthLine], show_in: System) -> Vec<String> {
    let mut said: Vec<String> = Vec::new();
    for line in lines {
        let rule = format!(
            "{}: the {} against {}.",
            wording::stress_rule(line.rule),
            wording::stress_taken(line.rule),
            wording::stress_limit(line.rule)
        );
        let strength = format!(
            "{}: Rm at least {} ({}).",
            line.member,
            with_unit(
                Some(line.strength_mpa),
                Unit::Megapascal,
                Place::Significant(4),
                show_in
            ),
            line.strength_source
        );
        for words in [rule, strength] {
            if !said.contains(&words) {
                said.push(words);
            }
        }
    }
    said
}

fn stresses(lines: &[StrengthLine], show_in: System) -> Table {
    let unit = unit_symbol(Unit::Megapascal, show_in);
    let columns = vec![
        Column::words("Spring"),
        Column::words("Where"),
        Column::words("Held against"),
        Column::figures("Share of Rm", ""),
        Column::figures("Stress", unit),
        Column::figures("Limit", unit),
        Column::figures("Used", ""),
    ];
    let mpa = |value| {
        figure(
            Some(value),
            Unit::Megapascal,
            Place::Significant(4),
            show_in,
        )
    };
    let rows = lines.iter().map(|line| {
        let used = line.stress_mpa.get() / line.limit_mpa.get();
        let shown = percent(Some(used));
        Row::from([
            line.member.clone().into(),
            wording::stress_place(line.place, show_in).into(),
            wording::stress_rule(line.rule).into(),
            number(Some(line.share_of_strength), 3).into(),
            mpa(line.stress_mpa).into(),
            mpa(line.limit_mpa).into(),
            if used > 1.0 {
                Cell::marked(shown, Verdict::Fails)
            } else {
                shown.into()
            },
        ])
    });
    Table::new(
        "Stresses against what the wire bears",
        columns,
        rows.collect(),
    )
}

fn fatigue(line: &Fatigue, show_in: System) -> String {
    let mpa = |value| {
        with_unit(
            Some(value),
            Unit::Megapascal,
            Place::Significant(4),
            show_in,
        )
    };
    match (&line.margin, &line.why_not) {
        (Some(of), _) => format!(
            "{}, service load range, infinite life: margin {} by Goodman’s line. Amplitude {} and mean {} of the stress with the curvature factor, \
             against {} at zero mean (Zimmerli’s data, {}) and 0.67 Rm = {}. Theory.",
            line.member,
            number(Some(of.margin), 3),
            mpa(of.amplitude_mpa),
            mpa(of.mean_mpa),
            mpa(of.endurance_mpa),
            if of.peened { "peened" } else { "not peened" },
            mpa(of.ultimate_mpa)
        ),
        (None, why) => format!(
            "{}, service load range: no fatigue margin; {}.",
            line.member,
            why.as_deref().unwrap_or("no data")
        ),
    }
}

/// Stability and motion.
pub(super) fn motion(of: &Expected, show_in: System) -> Section {
    let mut tables = vec![outlooks(&of.outlooks, show_in)];
    if !of.clearances.is_empty() {
        tables.push(clearances(&of.clearances, show_in));
    }
    let mut text = vec![MOTION.to_owned()];
    if of.solid_order.len() > 1 {
        text.push(format!(
            "Solid in this order: {}.",
            of.solid_order.join(", then ")
        ));
    }
    Section {
        title: "Stability and motion".to_owned(),
        text,
        tables,
    }
}

fn outlooks(of: &[Outlook], show_in: System) -> Table {
    let length = unit_symbol(Unit::Millimetre, show_in);
    let columns = vec![
        Column::words("Spring"),
        Column::figures("L0/D", ""),
        Column::figures("Pitch", length),
        Column::words("Buckles"),
        Column::figures("Frequency", "Hz"),
        Column::figures("Grows held", length),
        Column::figures("turning", length),
        Column::figures("Energy", "J"),
        Column::figures("Mass", "g"),
        Column::figures("Clash allowance", ""),
    ];
    let millimetres = |value| {
        figure(
            Some(value),
            Unit::Millimetre,
            Place::Significant(3),
            show_in,
        )
    };
    let rows = of.iter().map(|one| {
        Row::from([
            one.member.clone().into(),
            number(Some(one.slenderness), 3).into(),
            millimetres(one.pitch_mm).into(),
            buckles(one, show_in).into(),
            number(one.natural_frequency_hz, 4).into(),
            millimetres(one.growth_held_mm).into(),
            millimetres(one.growth_turning_mm).into(),
            number(Some(one.energy_n_mm.get() / 1000.0), 3).into(),
            number(one.mass_g, 3).into(),
            percent(Some(one.clash_allowance)).into(),
        ])
    });
    Table::new("Springs", columns, rows.collect())
}

fn buckles(of: &Outlook, show_in: System) -> String {
    let seated = if of.seating_stated {
        of.seating.clone()
    } else {
        format!("{}, not stated", of.seating)
    };
    match of.buckling {
        SpringBuckling::Guided => "guided".to_owned(),
        SpringBuckling::Unknown => "E not tabled".to_owned(),
        SpringBuckling::Never => format!("never ({seated})"),
        SpringBuckling::From { deflection_mm } => format!(
            "from s = {} ({seated})",
            with_unit(
                Some(deflection_mm),
                Unit::Millimetre,
                Place::Significant(4),
                show_in
            )
        ),
    }
}

fn clearances(of: &[Clearance], show_in: System) -> Table {
    let length = unit_symbol(Unit::Millimetre, show_in);
    let columns = vec![
        Column::words("Inner"),
        Column::words("Outer"),
        Column::figures("At no load", length),
        Column::figures("At solid", length),
        Column::figures("Least", length),
    ];
    let millimetres = |value| {
        figure(
            Some(value),
            Unit::Millimetre,
            Place::Significant(3),
            show_in,
        )
    };
    let rows = of.iter().map(|one| {
        Row::from([
            one.inner.clone().into(),
            one.outer.clone().into(),
            millimetres(one.free_mm).into(),
            millimetres(one.loaded_mm).into(),
            millimetres(one.least_mm).into(),
        ])
    });
    let mut table = Table::new(
        "Radial clearance between neighbours",
        columns,
        rows.collect(),
    );
    "At solid: the inner spring grown, by the larger of both formulas. Least: with the tolerances of both diameters and wires used up."
        .clone_into(&mut table.note);
    table
}

/// A dash where nothing is said.
pub(super) fn or_dash(text: Option<&String>) -> String {
    text.cloned().unwrap_or_else(|| ABSENT.to_owned())
}

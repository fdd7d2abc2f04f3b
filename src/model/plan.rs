//! The plan: its classes, its characteristics by variables, and what would settle an undecided lot.

use super::table::{Column, Row, Section, Table};
use crate::record::{AcceptRecord, Comparison, Decision, SettlingFacts, VariablesFacts};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, number, percent, probability, unit_symbol};

/// Undecided characteristics listed; the table of the springs has them all.
const LISTED: usize = 40;

/// The plan: of each class, or of each characteristic where no class is counted.
pub(crate) fn main(record: &AcceptRecord, show_in: System) -> Table {
    if record.plan.classes.is_empty() && !record.plan.variables.is_empty() {
        variables(record, show_in)
    } else {
        classes(record)
    }
}

/// What stands beside it: the characteristics, where classes are counted too.
pub(crate) fn more(record: &AcceptRecord, show_in: System) -> Vec<Table> {
    if record.plan.classes.is_empty() || record.plan.variables.is_empty() {
        Vec::new()
    } else {
        vec![variables(record, show_in)]
    }
}

/// The plan of each class.
fn classes(record: &AcceptRecord) -> Table {
    let columns = vec![
        Column::words("Class"),
        Column::figures("AQL", "%"),
        Column::words("Letter"),
        Column::figures("Sample", ""),
        Column::figures("Ac", ""),
        Column::figures("Re", ""),
        Column::figures("Failing", ""),
        Column::figures("Undecided", ""),
        Column::figures("Accepted at AQL", ""),
    ];
    let rows = record.plan.classes.iter().map(|class| {
        let letter = match (&class.code_letter, &class.used_letter) {
            (Some(code), Some(used)) if code != used => {
                format!("{code}, by the arrow to {used}")
            }
            (Some(code), _) => code.clone(),
            (None, _) => ABSENT.to_owned(),
        };
        Row::from([
            class.class.word().into(),
            number(class.aql, 4).into(),
            letter.into(),
            class.sample_size.to_string().into(),
            class.accept.to_string().into(),
            class.reject.to_string().into(),
            class.failing.to_string().into(),
            class.undecided.to_string().into(),
            probability(class.accepted_at_aql).into(),
        ])
    });
    let mut table = Table::new("Plan by class", columns, rows.collect());
    "Accepted at AQL: the probability that a lot exactly at the AQL is accepted (binomial)."
        .clone_into(&mut table.note);
    if let Some(zero) = &record.plan.zero_accept {
        table.note = format!(
            "A lot of the limiting quality holds {}; the probability that it is accepted is {} (hypergeometric).",
            wording::count(zero.nonconforming, "nonconforming spring"),
            probability(Some(zero.accepted))
        );
    }
    table
}

/// The characteristics under a plan by variables.
fn variables(record: &AcceptRecord, show_in: System) -> Table {
    let columns = vec![
        Column::words("Characteristic"),
        Column::figures("AQL", "%"),
        Column::words("Letter"),
        Column::figures("n", ""),
        Column::figures("Mean", ""),
        Column::figures("s", ""),
        Column::words("Unit"),
        Column::words("Compared"),
        Column::figures("Found", ""),
        Column::figures("Worse", ""),
        Column::figures("Better", ""),
        Column::figures("Wanted", ""),
        Column::words("Decision"),
    ];
    let rows = record.plan.variables.iter().map(|of| one(of, show_in));
    let caption = format!("Plan by variables: {}", record.plan.source);
    let mut table = Table::new(caption, columns, rows.collect());
    "k: the mean must lie at least k standard deviations inside the limit. M: the share outside both limits, estimated from mean and s, \
     may be M at most. Worse, better: the same with the mean shifted by 1.645 common standard uncertainties either way; the plan \
     decides only where both agree. Values as measured, limits as drawn. n: springs used, of those the plan asks for; where the \
     bench’s own scatter u exceeds 0.1 s, more are used and a rejection needs 1 + (u/σ)² times as many."
        .clone_into(&mut table.note);
    table
}

fn one(of: &VariablesFacts, show_in: System) -> Row {
    let letter = match (&of.code_letter, &of.used_letter) {
        (Some(code), Some(used)) if code != used => format!("{code}, by the arrow to {used}"),
        (Some(code), _) => code.clone(),
        (None, _) => ABSENT.to_owned(),
    };
    let n = if of.measured == of.sample_size {
        of.sample_size.to_string()
    } else {
        format!("{} (plan {})", of.measured, of.sample_size)
    };
    let measured = |value: Option<Finite>| {
        figure(
            value,
            of.unit,
            Place::Uncertainty(of.common_uncertainty),
            show_in,
        )
    };
    let compared = |value| wording::compared(of.compared, value);
    let kind = match of.compared {
        Some(Comparison::Distance) => "distance, k",
        Some(Comparison::Share) => "share, M",
        None => ABSENT,
    };
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    Row::from([
        wording::sentence(&name).into(),
        number(of.aql, 4).into(),
        letter.into(),
        n.into(),
        measured(of.mean).into(),
        measured(of.standard_deviation).into(),
        unit_symbol(of.unit, show_in).into(),
        kind.into(),
        compared(of.found).into(),
        compared(of.worse).into(),
        compared(of.better).into(),
        compared(of.wanted).into(),
        wording::decided(of.decision).into(),
    ])
}

/// What would settle an undecided lot: both readings of the undecided springs, and what each must be measured with.
pub(crate) fn settling(record: &AcceptRecord, show_in: System) -> Option<Section> {
    if record.decision != Decision::Undecided {
        return None;
    }
    let text: Vec<String> = record
        .plan
        .classes
        .iter()
        .filter_map(wording::readings)
        .collect();
    let all = &record.plan.settling;
    if text.is_empty() && all.is_empty() {
        return None;
    }
    let columns = vec![
        Column::words("Spring"),
        Column::words("Characteristic"),
        Column::words("Class"),
        Column::figures("U now", ""),
        Column::figures("U that settles it", ""),
        Column::words("Unit"),
        Column::figures("Of it repeatable", ""),
    ];
    let rows = all.iter().take(LISTED).map(|of| settled(of, show_in));
    let mut table = Table::new(
        "Undecided characteristics, the easiest first",
        columns,
        rows.collect(),
    );
    "U that settles it: twice the distance to the limit over 1.645, if the value stays. Of it repeatable: the share of today’s u² that \
     repeats on this bench reduce; the rest stays."
        .clone_into(&mut table.note);
    if all.len() > LISTED {
        table.note.push_str(" More stand in result.json.");
    }
    let tables = if all.is_empty() {
        Vec::new()
    } else {
        vec![table]
    };
    Some(Section {
        title: "What would settle it".to_owned(),
        text,
        tables,
    })
}

fn settled(of: &SettlingFacts, show_in: System) -> Row {
    let u = |value: Option<Finite>| figure(value, of.unit, Place::Significant(2), show_in);
    Row::from([
        of.spring.clone().into(),
        wording::characteristic(&of.name, of.at_length_mm, show_in).into(),
        of.class.word().into(),
        u(of.expanded_uncertainty).into(),
        u(of.wanted_uncertainty).into(),
        unit_symbol(of.unit, show_in).into(),
        percent(of.own_share).into(),
    ])
}

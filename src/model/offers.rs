//! Plans side by side as finished strings: the page and the terminal say the same.

use serde::Serialize;

use super::table::{Cell, Column, Row, Table};
use crate::record::{OfferFacts, OffersRecord};
use crate::units::Finite;
use crate::wording;
use crate::wording::{ABSENT, count, number, probability};

/// Qualities of the table of chances: every so many points of the curve.
const EVERY: usize = 5;

/// The page of `plan`.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Offers {
    /// What is compared, in one line.
    pub subject: String,
    /// Date.
    pub date: String,
    /// The tool and its version.
    pub tool: String,
    /// What holds for all plans.
    pub text: Vec<String>,
    /// The plans; the chances by quality.
    pub tables: Vec<Table>,
}

impl Offers {
    /// The page of `record`.
    pub fn new(record: &OffersRecord) -> Self {
        let mut tables = vec![
            plans(record),
            chances(record, "Chance of acceptance by quality", |plan, at| {
                probability(plan.curve.get(at).map(|point| point.accepted))
            }),
        ];
        if record.bench.is_some() {
            tables.push(chances(
                record,
                "On this bench: accepted / left undecided",
                |plan, at| {
                    let point = plan.curve.get(at);
                    format!(
                        "{} / {}",
                        probability(point.and_then(|point| point.accepted_on_bench)),
                        probability(point.and_then(|point| point.undecided_on_bench))
                    )
                },
            ));
        }
        Self {
            subject: format!(
                "Sampling plans for a lot of {}",
                count(record.lot_size, "spring")
            ),
            date: record.provenance.date.clone(),
            tool: format!("{} {}", record.provenance.tool, record.provenance.version),
            text: text(record),
            tables,
        }
    }
}

fn text(record: &OffersRecord) -> Vec<String> {
    let mut text = Vec::new();
    if let Some(state) = &record.state {
        text.push(format!("State of inspection: {}.", wording::state(state)));
    }
    if let Some(bench) = &record.bench {
        let share = |value: Finite| number(Some(value), 3);
        text.push(format!(
            "Bench: U is {} % of the half tolerance, the springs’ standard deviation {} % of it, and {} % of u² is common to all springs \
             of a lot. Guarded rule, undecided springs left as they are; one limit, springs normal, the mean where the stated share lies \
             beyond it.",
            share(bench.expanded_percent),
            share(bench.spread_percent),
            share(bench.common_percent)
        ));
    }
    text.push(
        "By attributes and by variables the chances are those of a stream of lots (binomial, non-central t for one limit); a zero-accept plan \
         draws from this one lot (hypergeometric), on the bench from a stream."
            .to_owned(),
    );
    text
}

fn plans(record: &OffersRecord) -> Table {
    let columns = vec![
        Column::words("Plan"),
        Column::words("Letter"),
        Column::figures("n", ""),
        Column::words("Accepts"),
        Column::words("Producer’s risk"),
        Column::words("Consumer’s risk"),
        Column::figures("Accepted 95 in 100 at", "%"),
        Column::figures("50 in 100 at", "%"),
        Column::figures("10 in 100 at", "%"),
    ];
    let rows = record.plans.iter().map(|plan| {
        let letter = match (&plan.code_letter, &plan.used_letter) {
            (Some(code), Some(used)) if code != used => format!("{code}, by the arrow to {used}"),
            (Some(code), _) => code.clone(),
            (None, _) => ABSENT.to_owned(),
        };
        let n = match plan.raised_sample_size {
            Some(raised) if raised != plan.sample_size => {
                format!("{} (bench: {raised})", plan.sample_size)
            }
            _ => plan.sample_size.to_string(),
        };
        let quality = |value: Finite| number(Some(value), 3);
        Row::from([
            plan.name.clone().into(),
            letter.into(),
            n.into(),
            accepts(plan).into(),
            risk(plan.producers_risk, plan.producers_quality_percent).into(),
            risk(plan.consumers_risk, plan.consumers_quality_percent).into(),
            quality(plan.accepted_95_percent).into(),
            quality(plan.accepted_50_percent).into(),
            quality(plan.accepted_10_percent).into(),
        ])
    });
    let mut table = Table::new("Plans side by side", columns, rows.collect());
    "Producer’s risk: the chance that a lot at the AQL (or p1) is not accepted. Consumer’s risk: the chance that a lot at p2, or at the \
     limiting quality, is accepted; where none is stated, read the quality accepted 10 times in 100."
        .clone_into(&mut table.note);
    table
}

fn accepts(plan: &OfferFacts) -> String {
    match (plan.accept, plan.reject, plan.k, plan.most_percent) {
        (Some(accept), Some(reject), ..) => format!("Ac {accept}, Re {reject}"),
        (_, _, Some(k), Some(most)) => {
            format!(
                "k {}, M {}\u{a0}%",
                number(Some(k), 4),
                number(Some(most), 3)
            )
        }
        _ => ABSENT.to_owned(),
    }
}

fn risk(of: Option<Finite>, at: Option<Finite>) -> String {
    match (of, at) {
        (Some(of), Some(at)) => {
            format!(
                "{} at {}\u{a0}%",
                probability(Some(of)),
                number(Some(at), 4)
            )
        }
        _ => ABSENT.to_owned(),
    }
}

fn chances(
    record: &OffersRecord,
    caption: &str,
    of: impl Fn(&OfferFacts, usize) -> String,
) -> Table {
    let mut columns = vec![Column::figures("Nonconforming", "%")];
    columns.extend(
        record
            .plans
            .iter()
            .map(|plan| Column::figures(plan.name.clone(), "")),
    );
    let points = record.plans.first().map_or(0, |plan| plan.curve.len());
    let rows = (0..points).step_by(EVERY).map(|at| {
        let quality = record
            .plans
            .first()
            .and_then(|plan| plan.curve.get(at))
            .map(|point| point.quality_percent);
        let mut cells: Vec<Cell> = vec![number(quality, 3).into()];
        cells.extend(record.plans.iter().map(|plan| Cell::from(of(plan, at))));
        Row { mark: "", cells }
    });
    Table::new(caption, columns, rows.collect())
}

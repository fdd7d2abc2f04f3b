//! A record as finished strings: what the HTML and the PDF are made from, and nothing else.
//! Here: which facts stand where. Elsewhere: how a figure is written (`figure`), the words (`wording`), the page (`templates/`).

mod budget;
mod check;
mod expect;
mod expect_facts;
mod facts;
mod fits;
mod frame;
mod named;
mod offers;
mod page;
mod page_one;
mod plan;
mod process;
mod provenance;
mod springs;
mod strength;
mod study;
mod supplier;
mod table;
mod theory;
mod track;
mod track_tables;

use serde::Serialize;

pub use check::check_page;
pub use expect::expected_page;
pub(crate) use facts::labelled;
pub use facts::{Fact, Facts};
pub use offers::Offers;
pub use page::{Page, PageDecision};
pub use page_one::{Deciding, Note};
pub(crate) use springs::remarks;
pub use study::study_page;
pub use table::{Cell, Column, Holds, Row, Section, Table};
pub use track::track_page;

use crate::record::AcceptRecord;
use crate::units::System;
use crate::wording;

/// Letters of a foreign name that a title or a page's foot shows; page one has it in full.
const SHORT: usize = 40;

/// The report of one lot.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Model {
    /// Lot number.
    pub lot: String,
    /// Lot number, shortened for the foot of a page.
    pub lot_short: String,
    /// Drawing number and revision, shortened.
    pub drawing_short: String,
    /// What was inspected, in one line.
    pub subject: String,
    /// Date of the judgement, YYYY-MM-DD.
    pub date: String,
    /// The tool and its version.
    pub tool: String,
    /// The units the report is written in.
    pub units: String,
    /// The decision and why.
    pub decision: Deciding,
    /// Notes, the concession, what was not inspected.
    pub notes: Vec<Note>,
    /// Lot, drawing, rig, plan.
    pub facts: Vec<Facts>,
    /// The plan of each class, or of each characteristic where none is counted.
    pub plan: Table,
    /// The characteristics by variables, where classes are counted too.
    pub plan_more: Vec<Table>,
    /// What would settle an undecided lot.
    pub settling: Option<Section>,
    /// What the sample says of the lot.
    pub process: Section,
    /// Requirements with limits, counts and what was measured.
    pub requirements: Table,
    /// What page one must say besides.
    pub cautions: Vec<String>,
    /// The cautions every report carries.
    pub standing: Vec<String>,
    /// Every spring with its disposition.
    pub springs: Section,
    /// Uncertainties and probabilities of every spring.
    pub details: Section,
    /// The fits of the rate.
    pub fits: Section,
    /// Uncertainty budgets.
    pub budget: Section,
    /// Theory.
    pub theory: Section,
    /// Inputs and row ledger.
    pub provenance: Section,
    /// The page for the supplier; on a proven rejection only.
    pub supplier: Option<Section>,
    /// Places to sign.
    pub signatures: Vec<String>,
    /// Places to sign on the supplier's page.
    pub supplier_signatures: Vec<String>,
}

impl Model {
    /// The report of `record`, its figures in the units of `show_in`.
    pub fn new(record: &AcceptRecord, show_in: System) -> Self {
        let drawing = &record.drawing;
        Self {
            lot: record.lot.number.clone(),
            lot_short: short(&record.lot.number),
            drawing_short: short(&labelled(&drawing.number, drawing.revision.as_deref())),
            subject: page_one::subject(record),
            date: record.provenance.date.clone(),
            tool: format!("{} {}", record.provenance.tool, record.provenance.version),
            units: units(show_in),
            decision: page_one::deciding(record, show_in),
            notes: page_one::notes(record),
            facts: facts::all(record, show_in),
            plan: plan::main(record, show_in),
            plan_more: plan::more(record, show_in),
            settling: plan::settling(record, show_in),
            process: process::section(record, show_in),
            requirements: page_one::requirements(record, show_in),
            cautions: record
                .cautions
                .iter()
                .map(|caution| wording::caution(caution, show_in))
                .collect(),
            standing: wording::STANDING.map(str::to_owned).to_vec(),
            springs: springs::verdicts(record, show_in),
            details: springs::details(record, show_in),
            fits: fits::section(record, show_in),
            budget: budget::section(record, show_in),
            theory: theory::section(&record.theory, show_in),
            provenance: provenance::section(record),
            supplier: supplier::page(record, show_in),
            signatures: ["Inspected by", "Decision released by"]
                .map(str::to_owned)
                .to_vec(),
            supplier_signatures: ["Issued by", "Received by the supplier"]
                .map(str::to_owned)
                .to_vec(),
        }
    }
}

fn units(show_in: System) -> String {
    match show_in {
        System::MmN => "mm, N, N/mm, MPa".to_owned(),
        System::InLbf => "in, lbf, lbf/in, psi (shown; judged in mm and N)".to_owned(),
    }
}

fn short(text: &str) -> String {
    if text.chars().count() <= SHORT {
        return text.to_owned();
    }
    text.chars().take(SHORT - 1).chain(['…']).collect()
}

//! A report on something else than a lot: title, decision, facts, tables, cautions, places to sign, sections.

use serde::Serialize;

use super::facts::Facts;
use super::page_one::Note;
use super::provenance;
use super::table::{Section, Table};
use crate::record::{Provenance, Serving};
use crate::units::System;
use crate::wording;

/// The decision of a page.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct PageDecision {
    /// How it looks: as `accepted`, `rejected` or `undecided`.
    pub code: &'static str,
    /// The word, large.
    pub word: String,
    /// What it is about, in one line.
    pub about: String,
    /// The grounds.
    pub why: Vec<String>,
}

/// A page as finished strings.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Page {
    /// What it is: `check`, `study`.
    pub page: &'static str,
    /// Title.
    pub title: String,
    /// What it is about, in one line.
    pub subject: String,
    /// The same, shortened for the foot of a page.
    pub short: String,
    /// Date, YYYY-MM-DD.
    pub date: String,
    /// The tool and its version.
    pub tool: String,
    /// The units it is written in.
    pub units: String,
    /// The decision.
    pub decision: PageDecision,
    /// Notes.
    pub notes: Vec<Note>,
    /// Facts.
    pub facts: Vec<Facts>,
    /// Tables of page one.
    pub tables: Vec<Table>,
    /// What page one must say besides.
    pub cautions: Vec<String>,
    /// The cautions every report carries.
    pub standing: Vec<String>,
    /// Places to sign.
    pub signatures: Vec<String>,
    /// What stands behind page one.
    pub sections: Vec<Section>,
}

/// How a decision on a rig looks.
pub(super) const fn look(serving: Serving) -> &'static str {
    match serving {
        Serving::Serves => "accepted",
        Serving::Fails => "rejected",
        Serving::Undecided => "undecided",
    }
}

impl Page {
    /// A page that says nothing yet but what every page says.
    pub(super) fn begun(
        page: &'static str,
        title: &str,
        subject: String,
        provenance: &Provenance,
        show_in: System,
    ) -> Self {
        Self {
            page,
            title: title.to_owned(),
            short: super::short(&subject),
            subject,
            date: provenance.date.clone(),
            tool: format!("{} {}", provenance.tool, provenance.version),
            units: super::units(show_in),
            decision: PageDecision {
                code: "undecided",
                word: String::new(),
                about: String::new(),
                why: Vec::new(),
            },
            notes: Vec::new(),
            facts: Vec::new(),
            tables: Vec::new(),
            cautions: Vec::new(),
            standing: wording::STANDING.map(str::to_owned).to_vec(),
            signatures: ["Checked by", "Released by"].map(str::to_owned).to_vec(),
            sections: vec![provenance::of(provenance)],
        }
    }
}

//! A report that is no lot's: a headline with its grounds, facts, sections. One template makes pages of all of them.

use serde::Serialize;

use super::facts::Facts;
use super::table::Section;

/// What a report says first.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Headline {
    /// `accepted`, `rejected`, `undecided`: the emphasis, beside the word and never in its place.
    pub code: &'static str,
    /// The word, large.
    pub word: String,
    /// What it was said of, in a line.
    pub subject: String,
    /// The grounds.
    pub why: Vec<String>,
    /// What is worth knowing besides.
    pub remarks: Vec<String>,
}

/// A report as finished strings.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Page {
    /// What kind of report.
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
    /// What it says first.
    pub headline: Headline,
    /// Facts.
    pub facts: Vec<Facts>,
    /// The cautions every report carries.
    pub standing: Vec<String>,
    /// Sections before the charts.
    pub before: Vec<Section>,
    /// Sections after the charts.
    pub after: Vec<Section>,
}

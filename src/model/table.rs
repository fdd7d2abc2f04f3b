//! Tables of finished strings.

use serde::Serialize;

use crate::record::Verdict;

/// What a column holds; the page aligns and breaks it accordingly.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Holds {
    /// Words: left, broken at blanks.
    Words,
    /// Figures: right, never broken.
    Figures,
    /// A SHA-256.
    Hash,
}

/// A column's head.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Column {
    /// Title.
    pub title: String,
    /// Unit, or empty.
    pub unit: String,
    /// What it holds.
    pub holds: Holds,
}

impl Column {
    /// A column of words.
    pub(crate) fn words(title: &str) -> Self {
        Self {
            title: title.to_owned(),
            unit: String::new(),
            holds: Holds::Words,
        }
    }

    /// A column of figures in one unit.
    pub(crate) fn figures(title: impl Into<String>, unit: &str) -> Self {
        Self {
            title: title.into(),
            unit: unit.to_owned(),
            holds: Holds::Figures,
        }
    }

    /// A column of hashes.
    pub(crate) fn hash(title: &str) -> Self {
        Self {
            title: title.to_owned(),
            unit: String::new(),
            holds: Holds::Hash,
        }
    }
}

/// A cell.
#[derive(Clone, Debug, Default, PartialEq, Eq, Serialize)]
pub struct Cell {
    /// What it says.
    pub text: String,
    /// A second line, or empty: the verdict where a value does not conform.
    pub below: String,
    /// `conforms`, `fails`, `undecided`, or empty; for emphasis beside the words, never in their place.
    pub mark: &'static str,
}

impl Cell {
    /// The cell with a verdict's emphasis.
    pub(crate) fn marked(text: impl Into<String>, verdict: Verdict) -> Self {
        Self {
            text: text.into(),
            below: String::new(),
            mark: mark(verdict),
        }
    }
}

impl<T: Into<String>> From<T> for Cell {
    fn from(text: T) -> Self {
        Self {
            text: text.into(),
            ..Self::default()
        }
    }
}

/// The name of a verdict's emphasis.
pub(crate) const fn mark(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Conforms => "conforms",
        Verdict::Fails => "fails",
        Verdict::Undecided => "undecided",
    }
}

/// A row.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Row {
    /// The verdict on what the row is about, as a cell's mark; empty where it is about no spring.
    pub mark: &'static str,
    /// Its cells, one per column.
    pub cells: Vec<Cell>,
}

impl Row {
    /// The row as one about a spring of this verdict.
    pub(crate) fn about(self, verdict: Verdict) -> Self {
        Self {
            mark: mark(verdict),
            ..self
        }
    }
}

impl<const N: usize> From<[Cell; N]> for Row {
    fn from(cells: [Cell; N]) -> Self {
        Self {
            mark: "",
            cells: cells.to_vec(),
        }
    }
}

/// A table with its caption.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Table {
    /// Caption, or empty.
    pub caption: String,
    /// Columns.
    pub columns: Vec<Column>,
    /// Rows.
    pub rows: Vec<Row>,
    /// A line under the table, or empty.
    pub note: String,
}

impl Table {
    /// A table without a note.
    pub(crate) fn new(caption: impl Into<String>, columns: Vec<Column>, rows: Vec<Row>) -> Self {
        Self {
            caption: caption.into(),
            columns,
            rows,
            note: String::new(),
        }
    }
}

/// A part of the report: title, paragraphs, tables.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Section {
    /// Title.
    pub title: String,
    /// Paragraphs before the tables.
    pub text: Vec<String>,
    /// Tables.
    pub tables: Vec<Table>,
}

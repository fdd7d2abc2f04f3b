//! Where a fault lies: file, line, column of the table, and the lines shown.

use std::fmt;
use std::ops::Range;

use miette::{Diagnostic, LabeledSpan, SourceCode};

use crate::text::{Alphabet, Place, printable};

/// Characters of a cell repeated in a message.
const SHOWN: usize = 60;

/// The place of a fault in an export: file, line, column of the table.
#[derive(Debug)]
pub struct Spot(Box<Inner>);

#[derive(Debug)]
struct Inner {
    name: String,
    column: Option<String>,
    line: u64,
    place: Place,
}

impl Spot {
    /// The place of `cell` (bytes within `line_text`) on line `line` of the file `name`, in the named column.
    pub(super) fn new(
        name: &str,
        line: u64,
        line_text: &str,
        cell: Range<usize>,
        column: Option<&str>,
    ) -> Self {
        let start = cell.start.min(line_text.len());
        let number = usize::try_from(line).unwrap_or(usize::MAX);
        Self(Box::new(Inner {
            name: printable(name, &Alphabet::Any),
            column: column.map(show),
            line,
            place: Place::in_line(name, line_text, number, start..cell.end.max(start)),
        }))
    }

    /// The line of the file, 1-based.
    pub fn line(&self) -> u64 {
        self.0.line
    }

    /// The name of the table's column, where the fault lies in one.
    pub fn column(&self) -> Option<&str> {
        self.0.column.as_deref()
    }
}

impl fmt::Display for Spot {
    fn fmt(&self, to: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(to, "`{}`, line {}", self.0.name, self.0.line)?;
        match &self.0.column {
            Some(column) => write!(to, ", column `{column}`"),
            None => Ok(()),
        }
    }
}

impl std::error::Error for Spot {}

impl Diagnostic for Spot {
    fn source_code(&self) -> Option<&dyn SourceCode> {
        Some(&*self.0.place.excerpt)
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        let label = format!("line {}, character {}", self.0.line, self.0.place.column);
        Some(Box::new(std::iter::once(LabeledSpan::new_with_span(
            Some(label),
            self.0.place.span,
        ))))
    }
}

/// A piece of a file as a message repeats it: printable, and not endless.
pub(super) fn show(text: &str) -> String {
    let mut shown: String = text.chars().take(SHOWN).collect();
    if shown.len() < text.len() {
        shown.push('…');
    }
    printable(&shown, &Alphabet::Any)
}

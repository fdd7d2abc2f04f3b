//! A fault of meaning in a hand-written file, and all of a file's faults together.

use miette::{Diagnostic, LabeledSpan, SourceCode};

use super::excerpt::Place;

/// Faults shown at once; past that, mending the first ones comes first.
const SHOWN: usize = 20;

/// One thing wrong in a hand-written file: what was found, where, and what to do.
#[derive(Debug, thiserror::Error)]
#[error("{message}")]
pub struct Fault {
    message: String,
    help: String,
    place: Option<Place>,
}

impl Fault {
    /// A fault with its message (what was found, what was wanted) and help (what to do next).
    pub fn new(message: impl Into<String>, help: impl Into<String>, place: Option<Place>) -> Self {
        Self {
            message: message.into(),
            help: help.into(),
            place,
        }
    }
}

impl Diagnostic for Fault {
    fn code<'a>(&'a self) -> Option<Box<dyn std::fmt::Display + 'a>> {
        Some(Box::new("coilassay::file"))
    }

    fn help<'a>(&'a self) -> Option<Box<dyn std::fmt::Display + 'a>> {
        Some(Box::new(&self.help))
    }

    fn source_code(&self) -> Option<&dyn SourceCode> {
        self.place
            .as_ref()
            .map(|place| &*place.excerpt as &dyn SourceCode)
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        let place = self.place.as_ref()?;
        let label = format!("line {}, column {}", place.line, place.column);
        Some(Box::new(std::iter::once(LabeledSpan::new_with_span(
            Some(label),
            place.span,
        ))))
    }
}

/// Every fault of meaning found in one file.
#[derive(Debug, thiserror::Error, Diagnostic)]
#[error("{name}: {count} {}", if *count == 1 { "fault" } else { "faults" })]
#[diagnostic(code(coilassay::file))]
pub struct Faults {
    name: String,
    count: usize,
    #[related]
    shown: Vec<Fault>,
}

impl Faults {
    /// The faults of the file called `name`, in the order of their places; at most 20 are kept.
    pub fn new(name: impl Into<String>, mut faults: Vec<Fault>) -> Self {
        let count = faults.len();
        faults.sort_by_key(|fault| fault.place.as_ref().map(|place| (place.line, place.column)));
        faults.truncate(SHOWN);
        Self {
            name: name.into(),
            count,
            shown: faults,
        }
    }
}

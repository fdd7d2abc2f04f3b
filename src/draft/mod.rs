//! A rig file drafted from an export that nobody has described: every guess with its reason, every doubt on a line of
//! its own. Nothing here judges; the draft is for a person to go through.
//! Here: the guesses and the text. Elsewhere: reading the export with them (`export`), trying the draft (`job`).

mod columns;
mod form;
mod meaning;
mod sheet;
mod write;

pub use columns::{Columns, columns};
pub use form::{Form, form};
pub use meaning::{Meaning, meaning};
pub use write::write;

/// Why nothing can be drafted.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum DraftError {
    #[error("no table was recognised in the first lines of `{name}`")]
    #[diagnostic(
        code(coilassay::draft::no_table),
        help(
            "a table has three rows of two numbers at least, one below the other, parted by one mark; is this an export as text?"
        )
    )]
    NoTable { name: String },
    #[error(
        "the table that begins on line {line} of `{name}` has no line of column names above it"
    )]
    #[diagnostic(
        code(coilassay::draft::no_names),
        help(
            "switch column names on in the tester's export settings; columns without names are read only where nothing stands above the rows"
        )
    )]
    NoNames { name: String, line: u64 },
    #[error("no column of `{name}` looks like a {role}; the columns are {known}")]
    #[diagnostic(
        code(coilassay::draft::no_column),
        help("write the rig file by hand, as the README shows, and name the column there")
    )]
    NoColumn {
        name: String,
        role: &'static str,
        known: String,
    },
}

//! What lines above a table state by the words the rig file names: the spring, and units.

use std::ops::Range;

use super::error::ExportError;
use super::labels::{Units, Wanted};
use super::layout::HeadLine;
use super::lines::Context;
use super::spot::{Spot, show};
use crate::rig::{Dialect, SpringFrom};

/// The lines that begin with words of the rig file, since the last table.
#[derive(Debug, Default)]
pub(super) struct Stated(Vec<HeadLine>);

/// The words of a dialect, and what stands after them.
fn words(dialect: &Dialect) -> impl Iterator<Item = &str> {
    let spring = match &dialect.spring {
        SpringFrom::LineAfter(label) => Some(label.as_str()),
        _ => None,
    };
    let (load, travel) = &dialect.rarer.unit_after;
    [spring, load.as_deref(), travel.as_deref()]
        .into_iter()
        .flatten()
}

impl Stated {
    /// Keeps a line that begins with one of the words.
    pub(super) fn note(&mut self, context: &Context<'_>, number: u64, text: &str) {
        if words(context.dialect).any(|label| begins(text, label)) {
            self.0.push(HeadLine {
                number,
                text: text.to_owned(),
            });
        }
    }

    /// Forgets all lines: they belonged to the table above.
    pub(super) fn forget(&mut self) {
        self.0.clear();
    }

    /// The one line that begins with `label`; its text and the stretch of what is stated.
    fn one(
        &self,
        context: &Context<'_>,
        label: &str,
        what: &'static str,
        header: &HeadLine,
    ) -> Result<(&HeadLine, Range<usize>), ExportError> {
        let mut found = self.0.iter().filter(|line| begins(&line.text, label));
        let spot =
            |line: &HeadLine| context.spot(line.number, &line.text, 0..line.text.len(), None);
        let Some(line) = found.next() else {
            return Err(ExportError::NothingStated {
                at: spot(header),
                label: show(label),
                what,
            });
        };
        match found.next() {
            Some(second) => Err(ExportError::StatedTwice {
                at: spot(second),
                label: show(label),
                what,
            }),
            None => Ok((line, after(&line.text, label, context.dialect))),
        }
    }

    /// The name of the spring whose table begins below `header`, and its place.
    ///
    /// # Errors
    /// Where it is stated not at all, twice or as nothing.
    pub(super) fn spring(
        &self,
        context: &Context<'_>,
        label: &str,
        header: &HeadLine,
    ) -> Result<(String, Spot), ExportError> {
        let (line, cell) = self.one(context, label, "spring's name", header)?;
        let at = context.spot(line.number, &line.text, cell.clone(), None);
        match line.text.get(cell) {
            Some(name) if !name.is_empty() => Ok((name.to_owned(), at)),
            _ => Err(ExportError::NoName { at }),
        }
    }

    /// Holds the units stated above a table against the rig file.
    ///
    /// # Errors
    /// Where one is stated not at all, twice, as something else or as nothing known.
    pub(super) fn check_units(
        &self,
        context: &Context<'_>,
        header: &HeadLine,
    ) -> Result<(), ExportError> {
        let dialect = context.dialect;
        let (load, travel) = &dialect.rarer.unit_after;
        let wanted = [
            (load, Wanted::Force(dialect.load.unit), "unit of loads"),
            (
                travel,
                Wanted::Length(dialect.travel.unit),
                "unit of travels",
            ),
        ];
        for (label, wanted, what) in wanted {
            let Some(label) = label else { continue };
            let (line, cell) = self.one(context, label, what, header)?;
            let written = line.text.get(cell.clone()).unwrap_or_default();
            let at = || context.spot(line.number, &line.text, cell.clone(), None);
            let (found, wanted_symbol) = (show(written), wanted.symbol());
            match wanted.against(written) {
                Units::Agree => {}
                Units::Contradict => {
                    return Err(ExportError::UnitContradicts {
                        at: at(),
                        found,
                        wanted: wanted_symbol,
                    });
                }
                Units::None => {
                    return Err(ExportError::NoUnit {
                        at: at(),
                        found,
                        wanted: wanted_symbol,
                    });
                }
            }
        }
        Ok(())
    }
}

/// Whether a line begins with some words, blanks and quotes before them aside.
pub(super) fn begins(text: &str, label: &str) -> bool {
    text.trim_start_matches([' ', '\t', '"', '#'])
        .starts_with(label)
}

/// The stretch of the first thing after `label`: up to the next delimiter, without marks and blanks around it.
fn after(text: &str, label: &str, dialect: &Dialect) -> Range<usize> {
    let begin = text.find(label).map_or(text.len(), |at| at + label.len());
    let delimiter = char::from(dialect.delimiter.byte());
    let between =
        |letter: char| letter == delimiter || matches!(letter, ' ' | '\t' | ':' | '=' | '"');
    let rest = text.get(begin..).unwrap_or_default();
    let start = begin + (rest.len() - rest.trim_start_matches(between).len());
    let stated = text.get(start..).unwrap_or_default();
    let end = stated.find(delimiter).unwrap_or(stated.len());
    let stated = stated
        .get(..end)
        .unwrap_or_default()
        .trim_end_matches(between);
    start..start + stated.len()
}

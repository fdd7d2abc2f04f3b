//! Files that hold more than one table below its head: several tables, lines between them, a footer, a spring named in a
//! line above. Line by line where a section may end; the rows of a table go the same road as everywhere.

use super::error::ExportError;
use super::head::Head;
use super::layout::{HeadLine, Layout};
use super::ledger::WhyAside;
use super::lines::{Line, is_blank, lines};
use super::spot::show;
use super::stated::begins;
use super::{RawCurve, Reading, table};
use crate::rig::{Dialect, Each, SpringFrom, TableEnd};

/// Where in its file the reading is.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
enum Place {
    /// Above the first table.
    #[default]
    Above,
    /// Among the rows of a table.
    Rows,
    /// Between two tables.
    Between,
    /// Between the names and the units of a later table; so many lines are left.
    Names(u64),
    /// In the footer.
    Footer,
}

/// How far the sections of a file are read.
#[derive(Debug, Default)]
pub(super) struct Sections {
    place: Place,
    tables: u64,
    /// The line of names of the first table.
    names: String,
    /// The file's own name.
    stem: String,
}

/// Whether a dialect needs sections at all.
pub(super) fn needed(dialect: &Dialect) -> bool {
    let rarer = &dialect.rarer;
    let stated = rarer.unit_after.0.is_some() || rarer.unit_after.1.is_some();
    let named = matches!(
        dialect.spring,
        SpringFrom::LineAfter(_) | SpringFrom::TableNumber
    );
    rarer.tables.is_some() || rarer.footer.is_some() || stated || named
}

impl Reading<'_> {
    /// Takes in the next lines of a file of several sections; gives the springs they complete.
    pub(super) fn take_sections(
        &mut self,
        piece: &[u8],
        first_line: u64,
    ) -> Result<Vec<RawCurve>, ExportError> {
        let (mut rest, mut line) = (piece, first_line);
        let mut done = Vec::new();
        while !rest.is_empty() {
            let taken = match self.sections.place {
                Place::Above => match self.take_above(rest, line, &mut done)? {
                    Some(taken) => taken,
                    None => return Ok(done),
                },
                Place::Rows => {
                    let (rows, end) = self.rows_of(rest);
                    let (rows, _) = rest.split_at_checked(rows).unwrap_or((rest, &[]));
                    if !rows.is_empty() {
                        done.extend(self.rows(rows, line)?);
                    }
                    self.sections.place = end.unwrap_or(Place::Rows);
                    rows.len()
                }
                Place::Between | Place::Names(_) | Place::Footer => {
                    let Some(next) = lines(rest, line).next() else {
                        break;
                    };
                    done.extend(self.line_between(&next)?);
                    first_length(rest)
                }
            };
            let (above, below) = rest.split_at_checked(taken).unwrap_or((rest, &[]));
            line += lines(above, 0).count() as u64;
            rest = below;
        }
        Ok(done)
    }

    /// Takes the head's lines; `None` where it goes on beyond these lines.
    fn take_above(
        &mut self,
        rest: &[u8],
        line: u64,
        done: &mut Vec<RawCurve>,
    ) -> Result<Option<usize>, ExportError> {
        let (head, ledger) = (&mut self.head, &mut self.ledger);
        let (taken, layout) = head.take(&self.context, rest, line, ledger)?;
        let Some(layout) = layout else {
            let (above, below) = rest.split_at_checked(taken).unwrap_or((rest, &[]));
            let next = line + lines(above, 0).count() as u64;
            done.extend(self.rows(below, next)?); // blank lines above the rows of a table without names
            return Ok(None);
        };
        done.extend(self.begin_table(layout)?);
        Ok(Some(taken))
    }

    /// A table begins below the head as it is now.
    fn begin_table(&mut self, layout: Layout) -> Result<Option<RawCurve>, ExportError> {
        let dialect = self.context.dialect;
        let none = HeadLine {
            number: 1,
            text: String::new(),
        };
        let header = self.head.header.as_ref().unwrap_or(&none);
        self.head.stated.check_units(&self.context, header)?;
        self.sections.tables += 1;
        let number = self.sections.tables;
        let whole = dialect
            .rarer
            .tables
            .as_ref()
            .is_some_and(|tables| tables.each == Each::Cycle)
            && number > 1;
        let line = header.number;
        let at = || {
            self.context
                .spot(line, &header.text, 0..header.text.len(), None)
        };
        let named = match &dialect.spring {
            _ if whole => None,
            SpringFrom::LineAfter(label) => {
                Some(self.head.stated.spring(&self.context, label, header)?)
            }
            SpringFrom::TableNumber => {
                let stem = self.progress.whole_file().unwrap_or_default();
                if number == 1 {
                    stem.clone_into(&mut self.sections.stem);
                }
                Some((format!("{}-{number}", self.sections.stem), at()))
            }
            SpringFrom::FileName if number > 1 => {
                let began = 1;
                return Err(ExportError::TableTwice {
                    at: at(),
                    id: self.shown_name(),
                    began,
                });
            }
            SpringFrom::FileName | SpringFrom::Column(_) => None,
        };
        self.progress.new_table();
        let before = match named {
            Some((name, at)) => match self.progress.next_spring(&name, line) {
                Ok(before) => before,
                Err(began) => {
                    return Err(ExportError::TableTwice {
                        at,
                        id: show(&name),
                        began,
                    });
                }
            },
            None => None,
        };
        if number == 1 {
            self.sections.names = header.text.trim_end().to_owned();
        }
        self.head.stated.forget();
        let schema = table::schema(&layout);
        self.table = Some((layout, schema));
        self.sections.place = Place::Rows;
        Ok(before)
    }

    /// Bytes of the rows that `rest` begins with, and where the reading is behind them, if the table ends there.
    fn rows_of(&self, rest: &[u8]) -> (usize, Option<Place>) {
        let rarer = &self.context.dialect.rarer;
        let mut length = 0;
        for line in rest.split_inclusive(|byte| *byte == b'\n') {
            let body = line.strip_suffix(b"\n").unwrap_or(line);
            let body = body.strip_suffix(b"\r").unwrap_or(body);
            let is = |words: &str| begins(&String::from_utf8_lossy(body), words);
            if rarer.footer.as_deref().is_some_and(is) {
                return (length, Some(Place::Footer));
            }
            let ends = match rarer.tables.as_ref().map(|tables| &tables.end) {
                None => false,
                Some(TableEnd::BlankLine) => is_blank(body),
                Some(TableEnd::NextNames) => {
                    String::from_utf8_lossy(body).trim_end() == self.sections.names
                }
                Some(TableEnd::Line(words)) => is(words),
            };
            if ends {
                return (length, Some(Place::Between));
            }
            length += line.len();
        }
        (length, None)
    }

    /// One line that is no row: between tables, in the head of a later one, or in the footer.
    fn line_between(&mut self, line: &Line<'_>) -> Result<Option<RawCurve>, ExportError> {
        let text = self.context.text(line)?.into_owned();
        let head_line = || HeadLine {
            number: line.number,
            text: text.clone(),
        };
        match self.sections.place {
            Place::Footer => {
                if let Some(blank) = self.progress.blank_since() {
                    (blank..line.number)
                        .for_each(|blank| self.ledger.set_aside(WhyAside::BlankAtTheEnd, blank));
                    self.progress.forget_blank();
                }
                self.ledger.set_aside(WhyAside::Footer, line.number);
                Ok(None)
            }
            Place::Names(1) => {
                self.head.units = Some(head_line());
                self.ledger.set_aside(WhyAside::Units, line.number);
                self.next_table()
            }
            Place::Names(left) => {
                self.ledger.set_aside(WhyAside::Metadata, line.number);
                self.sections.place = Place::Names(left - 1);
                Ok(None)
            }
            _ if text.trim_end() == self.sections.names => {
                let stated = std::mem::take(&mut self.head.stated);
                self.head = Head {
                    header: Some(head_line()),
                    units: None,
                    stated,
                };
                self.ledger.set_aside(WhyAside::Header, line.number);
                let dialect = self.context.dialect;
                match dialect.units_line {
                    None => self.next_table(),
                    Some(units) => {
                        self.sections.place = Place::Names(units - dialect.header_line);
                        Ok(None)
                    }
                }
            }
            _ => {
                self.refuse_row(line.number, &text)?;
                let footer = self.context.dialect.rarer.footer.as_deref();
                let why = if footer.is_some_and(|footer| begins(&text, footer)) {
                    self.sections.place = Place::Footer;
                    WhyAside::Footer
                } else {
                    self.head.stated.note(&self.context, line.number, &text);
                    WhyAside::BetweenTables
                };
                self.ledger.set_aside(why, line.number);
                Ok(None)
            }
        }
    }

    fn next_table(&mut self) -> Result<Option<RawCurve>, ExportError> {
        let Some(header) = &self.head.header else {
            return Ok(None);
        };
        let layout = Layout::new(&self.context, header, self.head.units.as_ref())?;
        self.begin_table(layout)
    }

    /// Refuses a line between tables that has the cells of a row: the names above it, or rows before it, were lost.
    fn refuse_row(&self, line: u64, text: &str) -> Result<(), ExportError> {
        let Some((layout, _)) = &self.table else {
            return Ok(());
        };
        let cells = self.context.cells(line, text).unwrap_or_default();
        let number = |column: usize| {
            cells.get(column).is_some_and(|cell| {
                let factor = layout.factor(column, self.context.dialect);
                self.context
                    .number(line, text, cell.clone(), "", factor)
                    .is_ok()
            })
        };
        if cells.len() == layout.names.len()
            && number(layout.load)
            && layout.travel.is_none_or(number)
        {
            let at = self.context.spot(line, text, 0..text.len(), None);
            return Err(ExportError::RowOutside { at });
        }
        Ok(())
    }

    /// Refuses a file without the footer that the rig file names.
    pub(super) fn check_sections(&self) -> Result<(), ExportError> {
        match &self.context.dialect.rarer.footer {
            Some(footer) if self.sections.place != Place::Footer => Err(ExportError::NoFooter {
                name: self.shown_name(),
                footer: show(footer),
            }),
            _ => Ok(()),
        }
    }
}

/// Bytes of the first line, its end included.
fn first_length(rest: &[u8]) -> usize {
    rest.iter()
        .position(|byte| *byte == b'\n')
        .map_or(rest.len(), |at| at + 1)
}

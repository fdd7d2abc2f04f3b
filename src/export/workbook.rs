//! A sheet of a workbook (xlsx, ods), by calamine: its cells become lines of text, row n of the sheet line n, and go the
//! road of all exports. Here: what a cell of a number column may be, named as the sheet names it.

use std::collections::{BTreeMap, HashSet};
use std::io::Cursor;
use std::path::Path;

use calamine::{Data, DataRef, Reader, Sheets};

use super::error::ExportError;
use super::spot::show;
use super::stated::begins;
use super::{RawCurve, Read, Reading};
use crate::rig::{Decimal, Delimiter, Dialect, Encoding, Rarer};
use crate::text::{Alphabet, Block, Tail, printable, read_bytes};

/// Bytes of a workbook at most: it is read whole, and unpacked.
const LARGEST: u64 = 64 << 20;
/// Cells of a sheet at most.
const CELLS: u64 = 20_000_000;

type Book = Sheets<Cursor<Vec<u8>>>;
type Place = (u32, u32);

/// Whether some bytes begin as a workbook does (a zip archive).
pub fn is_workbook(head: &[u8]) -> bool {
    head.starts_with(b"PK\x03\x04")
}

/// A sheet's cells by row and column, both from 0.
struct Sheet {
    rows: BTreeMap<u32, BTreeMap<u32, Data>>,
    formulas: HashSet<Place>,
    columns: u32,
}

/// Reads the sheet called `sheet` of the workbook at `path`.
///
/// # Errors
/// [`ExportError`] where there is no such sheet, or a cell is not as the rig file says.
pub(super) fn read(
    path: &Path,
    as_written: &str,
    dialect: &Dialect,
    sheet: &str,
    each: &mut dyn FnMut(Vec<RawCurve>),
) -> Result<Read, ExportError> {
    let (bytes, sha256) = read_bytes(path, as_written, LARGEST)?;
    let name = printable(as_written, &Alphabet::Any);
    let mut book = open(bytes, &name)?;
    let cells = cells(&mut book, &name, sheet)?;
    let plain = Dialect {
        delimiter: Delimiter::Tab,
        decimal: Decimal::Point,
        encoding: Encoding::Utf8,
        quoted: false,
        last_line_open: false,
        rarer: Rarer {
            sheet: None,
            ..dialect.rarer.clone()
        },
        ..dialect.clone()
    };
    cells.check(&name, sheet, dialect)?;
    let mut reading = Reading::begin(as_written, &plain)?;
    let block = Block {
        bytes: cells.text().into_bytes(),
        tail: Tail::Ended,
    };
    let done = reading.take(&block)?;
    if !done.is_empty() {
        each(done);
    }
    let (last, ledger) = reading.finish()?;
    each(vec![last]);
    Ok(Read { ledger, sha256 })
}

/// The sheets of a workbook with their cells as text, for a look at how it is made.
///
/// # Errors
/// [`ExportError`] where it is no workbook.
pub fn sheets(path: &Path, as_written: &str) -> Result<Vec<(String, String)>, ExportError> {
    let (bytes, _) = read_bytes(path, as_written, LARGEST)?;
    let name = printable(as_written, &Alphabet::Any);
    let mut book = open(bytes, &name)?;
    let names = book.sheet_names();
    names
        .into_iter()
        .map(|sheet| {
            let text = cells(&mut book, &name, &sheet)?.text();
            Ok((sheet, text))
        })
        .collect()
}

fn open(bytes: Vec<u8>, name: &str) -> Result<Book, ExportError> {
    calamine::open_workbook_auto_from_rs(Cursor::new(bytes))
        .map_err(|cause| no_workbook(name, &cause))
}

fn no_workbook(name: &str, cause: &calamine::Error) -> ExportError {
    ExportError::NoWorkbook {
        name: name.to_owned(),
        cause: show(&cause.to_string()),
    }
}

/// The cells of one sheet that hold something.
fn cells(book: &mut Book, name: &str, sheet: &str) -> Result<Sheet, ExportError> {
    let names = book.sheet_names();
    if !names.iter().any(|known| known == sheet) {
        let known: Vec<String> = names
            .iter()
            .map(|name| format!("`{}`", show(name)))
            .collect();
        return Err(ExportError::NoSheet {
            name: name.to_owned(),
            sheet: show(sheet),
            known: known.join(", "),
        });
    }
    let mut found = Sheet {
        rows: BTreeMap::new(),
        formulas: HashSet::new(),
        columns: 0,
    };
    let taken = match book {
        Sheets::Xlsx(book) => found.take_xlsx(book, sheet).map_err(calamine::Error::from),
        other => found.take_ranges(other, sheet),
    };
    taken.map_err(|cause| no_workbook(name, &cause))?;
    found.refuse_huge(name, sheet)?;
    Ok(found)
}

fn place(start: Place, row: usize, column: usize) -> Place {
    let far = |from: u32, by: usize| from.saturating_add(u32::try_from(by).unwrap_or(u32::MAX));
    (far(start.0, row), far(start.1, column))
}

impl Sheet {
    /// Takes the cells of an xlsx sheet one by one: a range is made as large as its farthest cell, whatever is between.
    fn take_xlsx(
        &mut self,
        book: &mut calamine::Xlsx<Cursor<Vec<u8>>>,
        sheet: &str,
    ) -> Result<(), calamine::XlsxError> {
        let mut values = book.worksheet_cells_reader(sheet)?;
        while let Some(cell) = values.next_cell()? {
            let value = match cell.get_value().clone() {
                DataRef::SharedString(text) => Data::String(text.to_owned()),
                other => Data::from(other),
            };
            self.put(cell.get_position(), value);
        }
        drop(values);
        let mut formulas = book.worksheet_cells_reader(sheet)?;
        while let Some(cell) = formulas.next_formula()? {
            if !cell.get_value().is_empty() {
                self.formulas.insert(cell.get_position());
            }
        }
        Ok(())
    }

    fn take_ranges(&mut self, book: &mut Book, sheet: &str) -> Result<(), calamine::Error> {
        let range = book.worksheet_range(sheet)?;
        let start = range.start().unwrap_or_default();
        for (row, column, value) in range.used_cells() {
            self.put(place(start, row, column), value.clone());
        }
        let formulas = book.worksheet_formula(sheet)?;
        let start = formulas.start().unwrap_or_default();
        for (row, column, formula) in formulas.used_cells() {
            if !formula.is_empty() {
                self.formulas.insert(place(start, row, column));
            }
        }
        Ok(())
    }

    fn put(&mut self, (row, column): Place, value: Data) {
        if value != Data::Empty {
            self.columns = self.columns.max(column.saturating_add(1));
            self.rows.entry(row).or_default().insert(column, value);
        }
    }

    fn refuse_huge(&self, name: &str, sheet: &str) -> Result<(), ExportError> {
        let rows = self
            .rows
            .keys()
            .next_back()
            .map_or(0, |last| u64::from(*last) + 1);
        let columns = u64::from(self.columns);
        if rows * columns <= CELLS {
            return Ok(());
        }
        Err(ExportError::SheetTooLarge {
            name: name.to_owned(),
            sheet: show(sheet),
            rows,
            columns,
        })
    }

    /// The cells as lines of text with tabs between them; row n of the sheet is line n.
    fn text(&self) -> String {
        let mut text = String::new();
        let mut next = 0;
        for (row, cells) in &self.rows {
            for _ in next..*row {
                text.push('\n');
            }
            for column in 0..self.columns {
                if column > 0 {
                    text.push('\t');
                }
                text.extend(cells.get(&column).map(written));
            }
            text.push('\n');
            next = row + 1;
        }
        text
    }

    /// Refuses cells of number columns that hold no number.
    fn check(&self, name: &str, sheet: &str, dialect: &Dialect) -> Result<(), ExportError> {
        let columns = self.number_columns(dialect);
        let head = dialect.header_line.max(dialect.units_line.unwrap_or(0));
        let footer = dialect.rarer.footer.as_deref();
        for (row, cells) in self.rows.iter().filter(|(row, _)| u64::from(**row) >= head) {
            let first = cells.values().next().map(written).unwrap_or_default();
            if footer.is_some_and(|footer| begins(&first, footer)) {
                break;
            }
            for (column, title) in &columns {
                let value = cells.get(column).unwrap_or(&Data::Empty);
                let Some(found) = no_number(value) else {
                    continue;
                };
                let cell = cell_name(*row, *column);
                let (name, sheet, column_name) = (name.to_owned(), show(sheet), show(title));
                let formula = self.formulas.contains(&(*row, *column));
                return Err(if formula && *value == Data::Empty {
                    ExportError::NoStoredValue {
                        name,
                        sheet,
                        cell,
                        column: column_name,
                    }
                } else {
                    ExportError::NoNumberCell {
                        name,
                        sheet,
                        cell,
                        column: column_name,
                        found,
                    }
                });
            }
        }
        Ok(())
    }

    /// The columns of load, travel and time, by the names in the header's row.
    fn number_columns(&self, dialect: &Dialect) -> Vec<(u32, String)> {
        let wanted = [
            Some(&dialect.load.column),
            Some(&dialect.travel.column),
            dialect.time.as_ref(),
        ];
        let header = u32::try_from(dialect.header_line)
            .ok()
            .and_then(|line| line.checked_sub(1));
        let named = |wanted: &String| {
            let Some(row) = header else {
                let column = wanted.parse::<u32>().ok()?.checked_sub(1)?;
                return Some((column, wanted.clone()));
            };
            let same =
                |value: &Data| written(value).trim().to_lowercase() == wanted.trim().to_lowercase();
            let cells = self.rows.get(&row)?;
            let (column, _) = cells.iter().find(|(_, value)| same(value))?;
            Some((*column, wanted.clone()))
        };
        wanted.into_iter().flatten().filter_map(named).collect()
    }
}

/// What a cell holds that is no number, in words; `None` for a number.
fn no_number(value: &Data) -> Option<String> {
    match value {
        Data::Int(_) | Data::Float(_) => None,
        Data::Empty => Some("nothing".to_owned()),
        Data::Bool(value) => Some(format!("the truth value {value}")),
        Data::Error(error) => Some(format!("the error {error}")),
        Data::String(text) => Some(format!("the text `{}`", show(text))),
        Data::DateTime(_) | Data::DateTimeIso(_) | Data::DurationIso(_) => {
            Some("a date or time".to_owned())
        }
    }
}

/// A cell as text, on one line and without tabs.
fn written(value: &Data) -> String {
    match value {
        Data::Empty => String::new(),
        Data::Int(value) => value.to_string(),
        Data::Float(value) => value.to_string(),
        Data::Bool(value) => value.to_string(),
        Data::Error(error) => error.to_string(),
        Data::DateTime(value) => value.to_string(),
        Data::String(text) | Data::DateTimeIso(text) | Data::DurationIso(text) => {
            text.replace(['\t', '\r', '\n'], " ")
        }
    }
}

/// A cell's name: `B17`.
fn cell_name(row: u32, column: u32) -> String {
    let mut letters = Vec::new();
    let mut left = column + 1;
    while left > 0 {
        letters.push(char::from_u32(u32::from('A') + (left - 1) % 26).unwrap_or('?'));
        left = (left - 1) / 26;
    }
    let letters: String = letters.iter().rev().collect();
    format!("{letters}{}", u64::from(row) + 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cells_are_named_as_sheets_do() {
        for (row, column, name) in [
            (16, 1, "B17"),
            (0, 25, "Z1"),
            (0, 26, "AA1"),
            (9, 701, "ZZ10"),
            (9, 702, "AAA10"),
        ] {
            assert_eq!(cell_name(row, column), name);
        }
    }
}

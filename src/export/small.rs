//! A small table written by hand: comma, decimal point, names on line 1, units on line 2. Caliper findings are one.

use std::path::Path;

use super::error::ExportError;
use super::lines::{Context, Line, content, is_blank, lines};
use super::spot::show;
use crate::rig::{
    Decimal, Delimiter, Dialect, Encoding, LoadColumn, Pushing, SpringFrom, TravelColumn,
};
use crate::text::Source;
use crate::units::{ForceUnit, LengthUnit};

/// A small table, its cells as text without the blanks around them.
#[derive(Clone, Debug)]
pub struct SmallTable {
    /// The path as written, made printable.
    pub name: String,
    /// The names of the columns; no two are alike.
    pub header: Vec<String>,
    /// The units, one for each column.
    pub units: Vec<String>,
    /// The rows: line in the file, and as many cells as the header has.
    pub rows: Vec<(u64, Vec<String>)>,
    /// SHA-256 of the bytes, lower-case hexadecimal.
    pub sha256: String,
    /// Every line as it stands in the file, for the faults.
    texts: Vec<String>,
}

/// Reads the small table at `path`; `as_written` is the path as the user wrote it.
///
/// Cells may stand in double quotes; a cell may be empty. Blank lines may stand at the end only.
///
/// # Errors
/// [`ExportError`] where the file cannot be read as text, lacks a line, or has lines of unequal length.
pub fn read_small(path: &Path, as_written: &str) -> Result<SmallTable, ExportError> {
    let source = Source::open(path, as_written)?;
    let dialect = hand_written();
    let context = Context {
        name: as_written,
        dialect: &dialect,
    };
    let mut table = SmallTable {
        name: source.name.clone(),
        header: Vec::new(),
        units: Vec::new(),
        rows: Vec::new(),
        sha256: source.sha256.clone(),
        texts: Vec::new(),
    };
    let mut blank = None;
    for line in lines(source.text.as_bytes(), 1) {
        if is_blank(line.bytes) {
            blank.get_or_insert(line.number);
            continue;
        }
        if let Some(blank) = blank {
            let at = context.spot(blank, "", 0..0, None);
            return Err(ExportError::BlankLine { at });
        }
        table.line(&context, &line)?;
    }
    if table.rows.is_empty() {
        let (name, lines) = (table.name, table.texts.len() as u64);
        return Err(ExportError::NoData { name, lines });
    }
    Ok(table)
}

/// How a small table is written; the columns named here are never asked for.
fn hand_written() -> Dialect {
    let (load, travel) = (String::new(), String::new());
    Dialect {
        header_line: 1,
        units_line: Some(2),
        delimiter: Delimiter::Comma,
        decimal: Decimal::Point,
        encoding: Encoding::Utf8,
        quoted: true,
        last_line_open: false,
        load: LoadColumn {
            column: load,
            unit: ForceUnit::Newton,
            pushing: Pushing::Positive,
        },
        travel: TravelColumn {
            column: travel,
            unit: LengthUnit::Millimetre,
            pushing: Pushing::Positive,
        },
        time: None,
        spring: SpringFrom::FileName,
    }
}

/// Refuses a header with two columns of one name.
fn refuse_doubled(
    context: &Context<'_>,
    text: &str,
    cells: &[std::ops::Range<usize>],
    names: &[String],
) -> Result<(), ExportError> {
    for (second, (name, cell)) in names.iter().zip(cells).enumerate() {
        if let Some(first) = names.iter().take(second).position(|other| other == name) {
            return Err(ExportError::DoubledColumn {
                at: context.spot(1, text, cell.clone(), Some(name)),
                role: "figure",
                first: first + 1,
                second: second + 1,
            });
        }
    }
    Ok(())
}

impl SmallTable {
    fn line(&mut self, context: &Context<'_>, line: &Line<'_>) -> Result<(), ExportError> {
        let text = context.text(line)?;
        let number = line.number;
        let spot = |cell| context.spot(number, &text, cell, None);
        if !line.ended {
            let at = spot(text.len()..text.len());
            return Err(ExportError::LastLineOpen { at });
        }
        let cells = context.cells(number, &text)?;
        let held = |cell: &std::ops::Range<usize>| {
            let cell = text.get(cell.clone()).unwrap_or_default();
            content(cell, true).trim().to_owned()
        };
        let held: Vec<String> = cells.iter().map(held).collect();
        let (found, wanted) = (held.len(), self.header.len());
        if number == 1 {
            refuse_doubled(context, &text, &cells, &held)?;
            self.header = held;
        } else if found < wanted {
            let at = spot(text.len()..text.len());
            return Err(ExportError::TooFewCells { at, found, wanted });
        } else if let Some(extra) = cells.get(wanted) {
            let at = spot(extra.start..text.len());
            return Err(ExportError::TooManyCells { at, found, wanted });
        } else if number == 2 {
            self.units = held;
        } else {
            self.rows.push((number, held));
        }
        self.texts.push(text.into_owned());
        Ok(())
    }

    /// The number in a cell of `rows`, both counted from 0; `None` where the cell is empty or there is none.
    ///
    /// # Errors
    /// [`ExportError`] at a cell that holds something else.
    pub fn number(&self, row: usize, column: usize) -> Result<Option<f64>, ExportError> {
        let Some((line, cells)) = self.rows.get(row) else {
            return Ok(None);
        };
        if cells.get(column).is_none_or(String::is_empty) {
            return Ok(None);
        }
        let dialect = hand_written();
        let context = Context {
            name: &self.name,
            dialect: &dialect,
        };
        let at = usize::try_from(*line - 1).unwrap_or(usize::MAX);
        let text = self.texts.get(at).map_or("", String::as_str);
        let stretches = context.cells(*line, text)?;
        let Some(cell) = stretches.get(column) else {
            return Ok(None);
        };
        let name = self.header.get(column).map_or("", String::as_str);
        let written = text.get(cell.clone()).unwrap_or_default();
        let end = cell.start + written.trim_end().len(); // blanks after a number are no harm where people write
        context
            .number(*line, text, cell.start..end, name, 1.0)
            .map(Some)
    }

    /// The place of a cell of `rows`, both counted from 0, for faults of meaning that a caller finds.
    pub fn spot(&self, row: usize, column: usize) -> Option<super::Spot> {
        let (line, _) = self.rows.get(row)?;
        let dialect = hand_written();
        let context = Context {
            name: &self.name,
            dialect: &dialect,
        };
        let text = self.texts.get(usize::try_from(*line - 1).ok()?)?;
        let cell = context.cells(*line, text).ok()?.get(column)?.clone();
        let name = self.header.get(column)?;
        Some(context.spot(*line, text, cell, Some(&show(name))))
    }
}

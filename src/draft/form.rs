//! How an export is written, from its first lines: delimiter, decimal mark, names, units, quotes.

use crate::export::{UnitWord, unit_word};
use crate::rig::{Decimal, Delimiter, Encoding};
use crate::text::Head;

use super::DraftError;

/// Lines looked at.
const LOOKED_AT: usize = 2000;
/// Rows a table has at least.
const ROWS: usize = 3;
const DELIMITERS: [Delimiter; 3] = [Delimiter::Tab, Delimiter::Semicolon, Delimiter::Comma];

/// How an export is written, and its rows so far.
#[derive(Clone, Debug)]
pub struct Form {
    /// The export, printable.
    pub name: String,
    /// How characters are bytes.
    pub encoding: Encoding,
    /// What stands between cells.
    pub delimiter: Delimiter,
    /// The decimal mark.
    pub decimal: Decimal,
    /// Whether cells stand in quotes.
    pub quoted: bool,
    /// Line of the names, 1-based; 0 where there is none.
    pub header_line: u64,
    /// Line of the units.
    pub units_line: Option<u64>,
    /// Line of the first row.
    pub first_row: u64,
    /// Names of the columns.
    pub names: Vec<String>,
    /// Units from their own line; empty where there is none.
    pub units: Vec<String>,
    /// The rows among the first lines, as cells.
    pub rows: Vec<Vec<String>>,
    /// What speaks against a guess.
    pub doubts: Vec<String>,
}

/// A table that some marks make of the lines.
struct Found {
    delimiter: Delimiter,
    decimal: Decimal,
    start: usize,
    rows: Vec<Vec<String>>,
    /// Cells that are numbers, over all rows.
    numbers: usize,
}

/// How the export whose first lines are `head` is written.
///
/// # Errors
/// [`DraftError`] where no table is seen, or one without names below other lines.
pub fn form(head: &Head) -> Result<Form, DraftError> {
    let lines: Vec<&str> = head.text.lines().take(LOOKED_AT).collect();
    let mut best: Option<Found> = None;
    for delimiter in DELIMITERS {
        for decimal in [Decimal::Point, Decimal::Comma] {
            if delimiter == Delimiter::Comma
                && decimal == Decimal::Comma
                && !head.text.contains('"')
            {
                continue;
            }
            let found = table(&lines, delimiter, decimal);
            let more = |found: &Found| {
                best.as_ref()
                    .is_none_or(|best| found.numbers > best.numbers)
            };
            best = found.filter(more).or(best);
        }
    }
    let Some(found) = best else {
        return Err(DraftError::NoTable {
            name: head.name.clone(),
        });
    };
    let width = found.rows.first().map_or(0, Vec::len);
    let above = |back: usize| {
        let line = lines.get(found.start.checked_sub(back)?)?;
        Some(cells(line, found.delimiter)).filter(|cells| cells.len() == width)
    };
    let is_units = |cells: &Vec<String>| {
        let known = |cell: &String| unit_word(cell).is_some_and(|unit| unit != UnitWord::Other);
        cells.iter().any(known)
            && cells
                .iter()
                .all(|cell| cell.is_empty() || unit_word(cell).is_some())
    };
    let units = above(1).filter(is_units);
    let back = if units.is_some() { 2 } else { 1 };
    let names = above(back).filter(|cells| cells.iter().any(|cell| !cell.is_empty()));
    if names.is_none() && found.start + 1 > back {
        return Err(DraftError::NoNames {
            name: head.name.clone(),
            line: found.start as u64 + 1,
        });
    }
    let line = |back: usize| (found.start + 1).saturating_sub(back) as u64;
    let doubts = doubts(&found);
    Ok(Form {
        name: head.name.clone(),
        encoding: if head.is_utf8 {
            Encoding::Utf8
        } else {
            Encoding::Windows1252
        },
        delimiter: found.delimiter,
        decimal: found.decimal,
        quoted: lines
            .get(found.start)
            .is_some_and(|line| line.contains('"'))
            || names.is_some()
                && lines
                    .get(found.start - back)
                    .is_some_and(|line| line.contains('"')),
        header_line: if names.is_some() { line(back) } else { 0 },
        units_line: units.as_ref().map(|_| line(1)),
        first_row: line(0),
        names: names.unwrap_or_else(|| (1..=width).map(|place| place.to_string()).collect()),
        units: units.unwrap_or_default(),
        rows: found.rows,
        doubts,
    })
}

/// The longest run of lines with the same number of cells, two of them numbers at least.
fn table(lines: &[&str], delimiter: Delimiter, decimal: Decimal) -> Option<Found> {
    let split: Vec<Vec<String>> = lines.iter().map(|line| cells(line, delimiter)).collect();
    let count = |cells: &[String]| {
        cells
            .iter()
            .filter(|cell| number(cell, decimal).is_some())
            .count()
    };
    let mut best: Option<Found> = None;
    let mut start = 0;
    while start < split.len() {
        let first = split.get(start)?;
        let (width, holds) = (first.len(), count(first));
        let same = |cells: &&Vec<String>| cells.len() == width && count(cells) == holds;
        let rows: Vec<Vec<String>> = split.iter().skip(start).take_while(same).cloned().collect();
        let (length, numbers) = (rows.len().max(1), rows.len() * holds);
        let better = best.as_ref().is_none_or(|best| numbers > best.numbers);
        if holds >= 2 && rows.len() >= ROWS && better {
            best = Some(Found {
                delimiter,
                decimal,
                start,
                rows,
                numbers,
            });
        }
        start += length;
    }
    best
}

fn doubts(found: &Found) -> Vec<String> {
    let mark = match found.decimal {
        Decimal::Point => '.',
        Decimal::Comma => ',',
    };
    let marked: Vec<&str> = found
        .rows
        .iter()
        .flatten()
        .filter(|cell| number(cell, found.decimal).is_some())
        .filter_map(|cell| cell.split_once(mark).map(|(_, behind)| behind))
        .collect();
    let mut doubts = Vec::new();
    if !marked.is_empty()
        && marked.iter().all(|behind| behind.len() == 3)
        && found.decimal == Decimal::Comma
    {
        doubts.push("every comma stands before three digits: if it marks thousands, switch it off in the tester's settings".to_owned());
    }
    doubts
}

/// A line's cells, without blanks and quotes around them.
fn cells(line: &str, delimiter: Delimiter) -> Vec<String> {
    let mark = char::from(delimiter.byte());
    let mut cells = vec![String::new()];
    let mut inside = false;
    for letter in line.chars() {
        if letter == '"' {
            inside = !inside;
        } else if letter == mark && !inside {
            cells.push(String::new());
        } else if let Some(cell) = cells.last_mut() {
            cell.push(letter);
        }
    }
    cells.iter().map(|cell| cell.trim().to_owned()).collect()
}

/// The number a cell holds under a decimal mark.
pub(super) fn number(cell: &str, decimal: Decimal) -> Option<f64> {
    let bare = cell.trim();
    let written = match decimal {
        Decimal::Point => bare.to_owned(),
        Decimal::Comma if bare.contains('.') => return None,
        Decimal::Comma => bare.replace(',', "."),
    };
    let starts = written
        .trim_start_matches(['+', '-'])
        .starts_with(|c: char| c.is_ascii_digit() || c == '.');
    written
        .parse::<f64>()
        .ok()
        .filter(|value| value.is_finite() && starts)
}

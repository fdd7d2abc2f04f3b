//! How an export is written, from its first lines: delimiter, decimal mark, names, units, quotes.

use crate::export::{UnitWord, unit_word};
use crate::rig::{Decimal, Delimiter, Encoding, Rarer};
use crate::text::Head;

use super::DraftError;

/// Lines looked at.
const LOOKED_AT: usize = 2000;
/// Rows a table has at least.
const ROWS: usize = 3;
/// Those tried, and preferred in this order.
const DELIMITERS: [Delimiter; 6] = [
    Delimiter::Tab,
    Delimiter::Semicolon,
    Delimiter::Comma,
    Delimiter::Pipe,
    Delimiter::TwoBlanks,
    Delimiter::Blanks,
];

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
    /// What few testers do.
    pub rarer: Rarer,
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
    /// Whether a line of as many cells, words among them, stands above.
    named: bool,
}

impl Found {
    /// Whether these marks make a better table than others: one with names, more numbers, a mark that can be seen, fewer cells.
    fn beats(&self, other: &Self) -> bool {
        let width = |found: &Self| found.rows.first().map_or(0, Vec::len);
        let rank = |found: &Self| {
            let marked = found.delimiter.blanks().is_none();
            (
                found.named,
                found.numbers,
                marked,
                usize::MAX - width(found),
            )
        };
        rank(self) > rank(other)
    }
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
            best = match (found, best) {
                (Some(found), Some(best)) if !found.beats(&best) => Some(best),
                (None, best) => best,
                (found, _) => found,
            };
        }
    }
    let Some(found) = best else {
        return Err(DraftError::NoTable {
            name: head.name.clone(),
        });
    };
    let mut found = found;
    let trailing = take_off_trailing(&mut found, &lines);
    let width = found.rows.first().map_or(0, Vec::len);
    let above = |back: usize| {
        let line = lines.get(found.start.checked_sub(back)?)?;
        let mut cells = cells(line, found.delimiter);
        if trailing && cells.len() == width + 1 {
            cells.pop();
        }
        Some(cells).filter(|cells| cells.len() == width)
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
    let in_quotes = |at: Option<usize>| {
        at.and_then(|at| lines.get(at))
            .is_some_and(|line| line.contains('"'))
    };
    Ok(Form {
        name: head.name.clone(),
        encoding: match (head.is_utf16, head.is_utf8) {
            (true, _) => Encoding::Utf16,
            (false, true) => Encoding::Utf8,
            (false, false) => Encoding::Windows1252,
        },
        quoted: in_quotes(Some(found.start))
            || names.is_some() && in_quotes(found.start.checked_sub(back)),
        header_line: if names.is_some() { line(back) } else { 0 },
        units_line: units.as_ref().map(|_| line(1)),
        first_row: line(0),
        names: names.unwrap_or_else(|| (1..=width).map(|place| place.to_string()).collect()),
        units: units.unwrap_or_default(),
        rarer: Rarer {
            trailing_delimiter: trailing,
            carriage_returns: head.carriage_returns,
            footer: footer(head, &found, trailing),
            ..Rarer::default()
        },
        doubts: doubts(&found),
        delimiter: found.delimiter,
        decimal: found.decimal,
        rows: found.rows,
    })
}

/// Takes off the empty cell behind a delimiter that ends every row; whether there is one. A name above it makes it a
/// column like others.
fn take_off_trailing(found: &mut Found, lines: &[&str]) -> bool {
    let empty = |cells: &Vec<String>| cells.len() > 2 && cells.last().is_some_and(String::is_empty);
    let width = found.rows.first().map_or(0, Vec::len);
    let above = lines.get(..found.start).unwrap_or_default();
    let named = above
        .iter()
        .rev()
        .map(|line| cells(line, found.delimiter))
        .any(|cells| cells.len() == width && !empty(&cells));
    if named || !found.rows.iter().all(empty) {
        return false;
    }
    for row in &mut found.rows {
        row.pop();
    }
    true
}

/// How the first line below the last row begins, up to what may change from file to file: a colon, a digit.
fn footer(head: &Head, found: &Found, trailing: bool) -> Option<String> {
    let width = found.rows.first().map_or(0, Vec::len) + usize::from(trailing);
    let is_row = |line: &&str| {
        let cells = cells(line, found.delimiter);
        let numbers = cells
            .iter()
            .filter(|cell| number(cell, found.decimal).is_some());
        cells.len() == width && numbers.count() >= 2
    };
    let lines: Vec<&str> = head.tail.lines().collect();
    let last = lines.iter().rposition(is_row)?;
    let mut below = lines.iter().skip(last + 1);
    let first = below.find(|line| !line.trim().is_empty())?;
    let end = first.find(|letter: char| letter == ':' || letter.is_ascii_digit());
    let words = first.get(..end.unwrap_or(first.len()))?.trim();
    (words.len() > 1).then(|| words.to_owned())
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
            let words = |back: usize| {
                let above = start.checked_sub(back).and_then(|at| split.get(at));
                above.is_some_and(|cells| {
                    cells.len().abs_diff(width) <= 1 && cells.len() > 1 && count(cells) == 0
                })
            };
            best = Some(Found {
                named: words(1) || words(2),
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
    let least = delimiter.blanks();
    let is_blank = |letter: char| letter == ' ' || letter == '\t';
    let line = if least.is_some() { line.trim() } else { line };
    let mut cells = vec![String::new()];
    let (mut inside, mut run) = (false, String::new());
    for letter in line.chars() {
        let parts = match least {
            _ if inside => false,
            None => letter == mark,
            Some(least) => {
                if is_blank(letter) {
                    run.push(letter);
                    continue;
                }
                run.chars().count() >= least || run.contains('\t')
            }
        };
        if parts {
            cells.push(String::new());
        }
        if letter == '"' {
            inside = !inside;
        }
        if let Some(cell) = cells.last_mut() {
            if !parts {
                cell.push_str(&run);
            }
            if letter != '"' && !(parts && least.is_none()) {
                cell.push(letter);
            }
        }
        run.clear();
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

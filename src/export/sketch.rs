//! A dialect from two named columns and a look at the first lines, for someone who has only a file.
//! Nothing is guessed silently: what does not follow from the lines is asked for.

use crate::text::Head;
use crate::units::{ForceUnit, LengthUnit};

use crate::rig::{
    Decimal, Delimiter, Dialect, Encoding, LoadColumn, Pushing, SpringFrom, TravelColumn,
};

/// Lines looked at.
const LOOKED_AT: usize = 200;
const DELIMITERS: [Delimiter; 3] = [Delimiter::Tab, Delimiter::Semicolon, Delimiter::Comma];
/// Parts of column names that speak of load, and of travel.
const LOAD_WORDS: [&str; 6] = ["load", "force", "kraft", "last", "carga", "fuerza"];
const TRAVEL_WORDS: [&str; 9] = [
    "travel",
    "deflection",
    "displacement",
    "length",
    "position",
    "weg",
    "länge",
    "extension",
    "height",
];

/// Two columns as someone named them.
#[derive(Clone, Debug, PartialEq)]
pub struct Columns {
    /// Load column and its unit.
    pub load: (String, ForceUnit),
    /// Travel column and its unit.
    pub travel: (String, LengthUnit),
}

/// What the first lines of an export look like.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Look {
    /// The line the names stand on, 1-based.
    pub header_line: Option<u64>,
    /// The names found there.
    pub columns: Vec<String>,
    /// The column that speaks of load.
    pub load: Option<String>,
    /// The column that speaks of travel.
    pub travel: Option<String>,
}

/// The dialect of an export whose first lines are `head`, holding the named `columns`; `None` where no line holds both
/// names. The whole file is one spring.
pub fn sketch(head: &Head, columns: &Columns) -> Option<Dialect> {
    let lines: Vec<&str> = head.text.lines().take(LOOKED_AT).collect();
    for delimiter in DELIMITERS {
        for (place, line) in lines.iter().enumerate() {
            let names = cells(line, delimiter);
            let at = |name: &str| names.iter().position(|cell| *cell == name);
            let (Some(load), Some(travel)) = (at(&columns.load.0), at(&columns.travel.0)) else {
                continue;
            };
            let after =
                |offset: usize| lines.get(place + offset).map(|line| cells(line, delimiter));
            let is_data = |row: &[&str]| {
                [load, travel]
                    .iter()
                    .all(|at| row.get(*at).is_some_and(|cell| is_number(cell)))
            };
            let units = after(1).is_some_and(|row| !is_data(&row));
            let first = after(if units { 2 } else { 1 })?;
            let comma = [load, travel]
                .iter()
                .any(|at| first.get(*at).is_some_and(|cell| cell.contains(',')));
            let header_line = place as u64 + 1;
            return Some(Dialect {
                header_line,
                units_line: units.then_some(header_line + 1),
                delimiter,
                decimal: if comma {
                    Decimal::Comma
                } else {
                    Decimal::Point
                },
                encoding: if head.is_utf8 {
                    Encoding::Utf8
                } else {
                    Encoding::Windows1252
                },
                quoted: line.contains('"'),
                last_line_open: true,
                load: LoadColumn {
                    column: columns.load.0.clone(),
                    unit: columns.load.1,
                    pushing: Pushing::Positive,
                },
                travel: TravelColumn {
                    column: columns.travel.0.clone(),
                    unit: columns.travel.1,
                    pushing: Pushing::Positive,
                },
                time: None,
                spring: SpringFrom::FileName,
            });
        }
    }
    None
}

/// What the first lines look like: the last line of words above the first line of numbers.
pub fn look(head: &Head) -> Look {
    let lines: Vec<&str> = head.text.lines().take(LOOKED_AT).collect();
    let mut best = Look::default();
    for delimiter in DELIMITERS {
        let rows: Vec<Vec<&str>> = lines.iter().map(|line| cells(line, delimiter)).collect();
        let numbers =
            |row: &[&str]| row.len() > 1 && row.iter().filter(|cell| is_number(cell)).count() > 1;
        let Some(first) = rows.iter().position(|row| numbers(row)) else {
            continue;
        };
        let width = rows.get(first).map_or(0, Vec::len);
        let header = rows
            .iter()
            .take(first)
            .rposition(|row| row.len() == width && row.iter().any(|cell| cell.len() > 2));
        let Some((place, names)) = header.and_then(|place| Some((place, rows.get(place)?))) else {
            continue;
        };
        if names.len() <= best.columns.len() {
            continue;
        }
        let speaks = |words: &[&str]| {
            names
                .iter()
                .find(|name| words.iter().any(|word| name.to_lowercase().contains(word)))
                .map(|name| (*name).to_owned())
        };
        best = Look {
            header_line: Some(place as u64 + 1),
            columns: names.iter().map(|name| (*name).to_owned()).collect(),
            load: speaks(&LOAD_WORDS),
            travel: speaks(&TRAVEL_WORDS),
        };
    }
    best
}

fn cells(line: &str, delimiter: Delimiter) -> Vec<&str> {
    line.split(char::from(delimiter.byte()))
        .map(|cell| cell.trim().trim_matches('"').trim())
        .collect()
}

fn is_number(cell: &str) -> bool {
    cell.replace(',', ".")
        .parse::<f64>()
        .is_ok_and(f64::is_finite)
}

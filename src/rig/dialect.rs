//! How a tester writes its exports: the marks between cells, the columns, their units.
//! Here: the types. Elsewhere: reading them from a rig file (`open`), using them on a file (`export`).

use crate::units::{ForceUnit, LengthUnit};

/// How an export is written, as the rig file states it.
#[derive(Clone, Debug, PartialEq)]
pub struct Dialect {
    /// Line of the column names, 1-based; 0 where there is none (columns are then named `1`, `2`, …).
    pub header_line: u64,
    /// Line of the units, 1-based.
    pub units_line: Option<u64>,
    /// What stands between two cells.
    pub delimiter: Delimiter,
    /// The decimal mark of every number.
    pub decimal: Decimal,
    /// How characters are written as bytes.
    pub encoding: Encoding,
    /// Whether cells may stand in double quotes.
    pub quoted: bool,
    /// Whether the last line may lack its line end.
    pub last_line_open: bool,
    /// The load column.
    pub load: LoadColumn,
    /// The travel column.
    pub travel: TravelColumn,
    /// The column of time in seconds, where there is one; it must not run backwards.
    pub time: Option<String>,
    /// Where the name of a spring comes from.
    pub spring: SpringFrom,
}

/// What stands between two cells.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Delimiter {
    /// `,`
    Comma,
    /// `;`
    Semicolon,
    /// A tab.
    Tab,
}

impl Delimiter {
    /// The delimiter as a byte of the file.
    pub const fn byte(self) -> u8 {
        match self {
            Self::Comma => b',',
            Self::Semicolon => b';',
            Self::Tab => b'\t',
        }
    }
}

/// The decimal mark of every number.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Decimal {
    /// `12.5`
    Point,
    /// `12,5`
    Comma,
}

/// How characters are written as bytes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Encoding {
    /// UTF-8, with or without its mark.
    Utf8,
    /// Windows code page 1252 (Western Europe).
    Windows1252,
}

impl Encoding {
    /// The name used in rig files and faults.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Utf8 => "utf-8",
            Self::Windows1252 => "windows-1252",
        }
    }
}

/// The column of loads.
#[derive(Clone, Debug, PartialEq)]
pub struct LoadColumn {
    /// Its name in the header.
    pub column: String,
    /// The unit its numbers are in.
    pub unit: ForceUnit,
    /// The sign of a load that pushes the spring together.
    pub pushing: Pushing,
}

/// The sign of a load or a deflection that pushes the spring together.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Pushing {
    /// Pushing is above zero.
    Positive,
    /// Pushing is below zero.
    Negative,
}

/// The column of travel.
#[derive(Clone, Debug, PartialEq)]
pub struct TravelColumn {
    /// Its name in the header.
    pub column: String,
    /// The unit its numbers are in.
    pub unit: LengthUnit,
    /// The sign of a travel that pushes the spring together, for a deflection; lengths and positions keep theirs.
    pub pushing: Pushing,
}

/// Where the name of a spring comes from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum SpringFrom {
    /// The file's name without folder and extension; the whole file is one spring.
    FileName,
    /// A column, whose cells change where the next spring begins.
    Column(String),
}

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
    /// What few testers do.
    pub rarer: Rarer,
}

/// What few testers do; nothing of it unless the rig file says so.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Rarer {
    /// Every row ends with a delimiter.
    pub trailing_delimiter: bool,
    /// What parts thousands in numbers.
    pub thousands: Option<char>,
    /// How the first line below the table begins; without it the file is cut off.
    pub footer: Option<String>,
    /// Lines end with a carriage return alone.
    pub carriage_returns: bool,
    /// What stands before the unit of loads, and of travels, in a line above the table.
    pub unit_after: (Option<String>, Option<String>),
    /// The file holds several tables.
    pub tables: Option<Tables>,
    /// The file is a workbook, and this sheet holds the table.
    pub sheet: Option<String>,
    /// The rows are no curves but loads at a few lengths.
    pub points: Option<PointTable>,
}

/// How a table of loads at a few lengths is laid out.
#[derive(Clone, Debug, PartialEq)]
pub enum PointTable {
    /// One row for every spring and length.
    Long,
    /// One row for every spring, a column of loads for every length.
    Wide(Vec<LengthColumn>),
}

/// A column of loads at one length.
#[derive(Clone, Debug, PartialEq)]
pub struct LengthColumn {
    /// Its name in the header.
    pub column: String,
    /// The length, mm.
    pub length: f64,
}

impl Rarer {
    /// The columns of loads, where there is one for every length; else none.
    pub fn length_columns(&self) -> &[LengthColumn] {
        match &self.points {
            Some(PointTable::Wide(columns)) => columns,
            Some(PointTable::Long) | None => &[],
        }
    }
}

/// Several tables in one file, each below a line of column names like the first.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Tables {
    /// What one of them is.
    pub each: Each,
    /// What ends one.
    pub end: TableEnd,
}

/// What one of several tables is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Each {
    /// A spring.
    Spring,
    /// A cycle of the one spring, or of the springs that a column names.
    Cycle,
}

/// What ends one of several tables.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum TableEnd {
    /// A blank line.
    BlankLine,
    /// The column names of the next one.
    NextNames,
    /// A line that begins so.
    Line(String),
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
    /// `|`
    Pipe,
    /// Blanks or tabs, however many.
    Blanks,
    /// Two blanks or more, or a tab; names may hold single blanks.
    TwoBlanks,
}

impl Delimiter {
    /// The delimiter as a byte of the file; a tab, where runs of blanks are turned into one.
    pub const fn byte(self) -> u8 {
        match self {
            Self::Comma => b',',
            Self::Semicolon => b';',
            Self::Tab | Self::Blanks | Self::TwoBlanks => b'\t',
            Self::Pipe => b'|',
        }
    }

    /// Whether cells are padded with blanks on both sides.
    pub const fn padded(self) -> bool {
        matches!(self, Self::Pipe)
    }

    /// The least length of a run of blanks that is one delimiter.
    pub const fn blanks(self) -> Option<usize> {
        match self {
            Self::Blanks => Some(1),
            Self::TwoBlanks => Some(2),
            _ => None,
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
    /// UTF-16 with its mark.
    Utf16,
}

impl Encoding {
    /// The name used in rig files and faults.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Utf8 => "utf-8",
            Self::Windows1252 => "windows-1252",
            Self::Utf16 => "utf-16",
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
    /// A line above the table that begins so; the name is what follows.
    LineAfter(String),
    /// The file's name and the number of its table.
    TableNumber,
}

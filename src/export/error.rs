//! Every fault an export can have: what was found and wanted, and what to do.
#![expect(missing_docs, reason = "the messages say it")]

use miette::Diagnostic;

use super::spot::Spot;
use crate::text::TextError;

/// Why an export was not read.
#[rustfmt::skip] // one fault, three lines
#[derive(Debug, thiserror::Error, Diagnostic)]
pub enum ExportError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    Text(#[from] TextError),
    #[error("`{name}` is empty")]
    #[diagnostic(code(coilassay::export::empty), help("export the measurement again"))]
    Empty { name: String },
    #[error("`{name}` begins with the mark of UTF-16 or UTF-32, the rig file says another encoding")]
    #[diagnostic(code(coilassay::export::utf16), help("write encoding = \"utf-16\" in the rig file"))]
    Utf16 { name: String },
    #[error("`{name}` begins with the mark of UTF-8, the rig file says windows-1252")]
    #[diagnostic(code(coilassay::export::mark), help("write encoding = \"utf-8\" in the rig file"))]
    Marked { name: String },
    #[error("the rig file says delimiter and decimal are both a comma, without quotes: `{name}` cannot be told apart into cells")]
    #[diagnostic(code(coilassay::export::commas), help("look into the export; then mend `delimiter`, `decimal` or `quoted` in the rig file"))]
    CommaTwice { name: String },
    #[error("the rig file says units_line = {line}, which is no line of its own")]
    #[diagnostic(code(coilassay::export::units_line), help("write the line of the units, counted from 1, or leave `units_line` out"))]
    UnitsLine { line: u64 },
    #[error("the rig file says {key} = {line}, `{name}` has {lines} lines")]
    #[diagnostic(code(coilassay::export::head), help("count the lines of the export from 1, then mend `{key}` in the rig file"))]
    HeadBeyondEnd { name: String, key: &'static str, line: u64, lines: u64 },
    #[error("`{name}` holds no measurement: {lines} lines, none of them a point")]
    #[diagnostic(code(coilassay::export::no_data), help("measure, or export, again; in an export, see whether `header_line` is right in the rig file"))]
    NoData { name: String, lines: u64 },
    #[error("the spring is to be named by its file, but `{name}` names none")]
    #[diagnostic(code(coilassay::export::name), help("give the file the spring's name"))]
    NoSpringName { name: String },
    #[error("{at}: no column `{wanted}` for the {role}; the columns are {known}")]
    #[diagnostic(code(coilassay::export::column), help("{advice}"), forward(at))]
    UnknownColumn { at: Spot, role: &'static str, wanted: String, known: String, advice: String },
    #[error("{at}: the {role} could be column {first} or column {second}, both have that name")]
    #[diagnostic(code(coilassay::export::doubled), help("give the columns different names in the tester's export settings"), forward(at))]
    DoubledColumn { at: Spot, role: &'static str, first: usize, second: usize },
    #[error("{at}: the rig file names this column twice, for the {first} and for the {second}")]
    #[diagnostic(code(coilassay::export::shared), help("name one column for each in the rig file"), forward(at))]
    SharedColumn { at: Spot, first: &'static str, second: &'static str },
    #[error("{at}: the export states `{found}`, the rig file {wanted}")]
    #[diagnostic(code(coilassay::export::unit), help("find out which is true, then mend `unit` in the rig file or the tester's settings"), forward(at))]
    UnitContradicts { at: Spot, found: String, wanted: &'static str },
    #[error("{at}: found `{found}` in the units line, wanted {wanted}")]
    #[diagnostic(code(coilassay::export::no_unit), help("is `units_line` in the rig file the line that holds the units?"), forward(at))]
    NoUnit { at: Spot, found: String, wanted: &'static str },
    #[error("{at}: a line of more than {longest} bytes, no table has one")]
    #[diagnostic(code(coilassay::export::long_line), help("is this an export as text?"), forward(at))]
    LineTooLong { at: Spot, longest: usize },
    #[error("{at}: a carriage return that ends no line; line ends are LF or CR LF")]
    #[diagnostic(code(coilassay::export::carriage_return), help("save the export with Windows or Unix line ends"), forward(at))]
    LoneCarriageReturn { at: Spot },
    #[error("{at}: a NUL byte, wanted text")]
    #[diagnostic(code(coilassay::export::nul), help("UTF-16 without its mark, a damaged file or no text at all: export it again as UTF-8"), forward(at))]
    NulByte { at: Spot },
    #[error("{at}: the byte 0x{byte:02X} is no {encoding}")]
    #[diagnostic(code(coilassay::export::encoding), help("mend `encoding` in the rig file (utf-8 or windows-1252), or export again"), forward(at))]
    Undecodable { at: Spot, byte: u8, encoding: &'static str },
    #[error("{at}: a blank line, with lines after it that are not")]
    #[diagnostic(code(coilassay::export::blank_line), help("blank lines may stand above the header and at the end only; was part of the file lost?"), forward(at))]
    BlankLine { at: Spot },
    #[error("{at}: the last line has no line end; it may be cut off in the middle of a number")]
    #[diagnostic(code(coilassay::export::open_line), help("end the line, or export again; for a tester that never ends its last line, write last_line_open = true in the rig file"), forward(at))]
    LastLineOpen { at: Spot },
    #[error("{at}: {what}")]
    #[diagnostic(code(coilassay::export::quotes), help("a cell in quotes begins and ends with one, on one line; a quote inside it is doubled"), forward(at))]
    Quotes { at: Spot, what: &'static str },
    #[error("{at}: {found} cells, the header has {wanted}")]
    #[diagnostic(code(coilassay::export::few_cells), help("was the line cut off? Otherwise mend `delimiter` or `header_line` in the rig file"), forward(at))]
    TooFewCells { at: Spot, found: usize, wanted: usize },
    #[error("{at}: {found} cells, the header has {wanted}")]
    #[diagnostic(code(coilassay::export::many_cells), help("are decimal or thousands marks taken for delimiters? Compare `delimiter` and `decimal` in the rig file with the export (caliper findings are always comma and decimal point)"), forward(at))]
    TooManyCells { at: Spot, found: usize, wanted: usize },
    #[error("{at}: an empty cell, wanted a number")]
    #[diagnostic(code(coilassay::export::empty_cell), help("export the measurement again; a missing point is never filled in"), forward(at))]
    EmptyCell { at: Spot },
    #[error("{at}: found `{found}`, wanted a number")]
    #[diagnostic(code(coilassay::export::number), help("mend the cell; in an export, first see whether `header_line`, `units_line` and the column are right in the rig file"), forward(at))]
    NotANumber { at: Spot, found: String },
    #[error("{at}: found `{found}`, wanted a finite number")]
    #[diagnostic(code(coilassay::export::finite), help("the tester lost this point; measure the spring again"), forward(at))]
    NotFinite { at: Spot, found: String },
    #[error("{at}: found `{found}`, no bench measures that")]
    #[diagnostic(code(coilassay::export::size), help("export the measurement again"), forward(at))]
    TooLarge { at: Spot, found: String },
    #[error("{at}: found `{found}`, a point where the decimal mark is a comma")]
    #[diagnostic(code(coilassay::export::point), help("for an export with decimal points, write decimal = \".\" in the rig file; if it marks thousands, switch it off in the tester's settings"), forward(at))]
    PointUnderComma { at: Spot, found: String },
    #[error("{at}: found `{found}`, a comma where the decimal mark is a point")]
    #[diagnostic(code(coilassay::export::comma), help("write a point; for an export with decimal commas, write decimal = \",\" in the rig file; if it marks thousands, switch it off in the tester's settings"), forward(at))]
    CommaUnderPoint { at: Spot, found: String },
    #[error("{at}: found `{found}`, a number with thousands marks")]
    #[diagnostic(code(coilassay::export::thousands), help("write it without them: switch thousands marks off in the tester's settings"), forward(at))]
    ThousandsMarks { at: Spot, found: String },
    #[error("{at}: found `{found}`, a number with blanks after it")]
    #[diagnostic(code(coilassay::export::blank), help("export numbers without trailing blanks (blanks before a number are read)"), forward(at))]
    BlankAfter { at: Spot, found: String },
    #[error("{at}: found `{found}`, a cell in quotes, where the rig file says there are none")]
    #[diagnostic(code(coilassay::export::quoted), help("write quoted = true in the rig file"), forward(at))]
    UnexpectedQuotes { at: Spot, found: String },
    #[error("{at}: time runs backwards, from {before} to {now}")]
    #[diagnostic(code(coilassay::export::time), help("are the lines in the order they were measured, each spring's clock its own? Otherwise export again"), forward(at))]
    TimeBackwards { at: Spot, before: f64, now: f64 },
    #[error("{at}: a spring without a name")]
    #[diagnostic(code(coilassay::export::no_name), help("every line names its spring; export again with the name filled in"), forward(at))]
    NoName { at: Spot },
    #[error("{at}: spring `{id}` returns, after lines of another spring; it began on line {began}")]
    #[diagnostic(code(coilassay::export::returns), help("all lines of a spring stand together; was it measured twice under one name?"), forward(at))]
    SpringReturns { at: Spot, id: String, began: u64 },
    #[error("{at}: a row outside a table: it has the cells and numbers of one, but no line of column names above it since the last table ended")]
    #[diagnostic(code(coilassay::export::row_outside), help("did a blank line or the end's mark come into the rows, or was the line of names lost? Compare `tables` in the rig file with the export"), forward(at))]
    RowOutside { at: Spot },
    #[error("`{name}`: no line begins with `{footer}`, which the rig file names as the footer")]
    #[diagnostic(code(coilassay::export::no_footer), help("the export was cut off: export it again; for a tester that writes no footer, remove `footer` from the rig file"))]
    NoFooter { name: String, footer: String },
    #[error("{at}: no line above this table begins with `{label}`, after which the {what} stands")]
    #[diagnostic(code(coilassay::export::nothing_stated), help("compare the words in the rig file with the lines above the table"), forward(at))]
    NothingStated { at: Spot, label: String, what: &'static str },
    #[error("{at}: a second line begins with `{label}`, after which the {what} stands, above one table")]
    #[diagnostic(code(coilassay::export::stated_twice), help("write more of the line in the rig file, so that one line begins so"), forward(at))]
    StatedTwice { at: Spot, label: String, what: &'static str },
    #[error("{at}: spring `{id}` has a second table; its first began on line {began}")]
    #[diagnostic(code(coilassay::export::table_twice), help("was it measured twice under one name? Otherwise each = \"cycle\" in the rig file"), forward(at))]
    TableTwice { at: Spot, id: String, began: u64 },
    #[error("`{name}` is no workbook that can be read: {cause}")]
    #[diagnostic(code(coilassay::export::workbook), help("xlsx and ods are read; for text remove `sheet` from the rig file"))]
    NoWorkbook { name: String, cause: String },
    #[error("`{name}` has no sheet `{sheet}`; its sheets are {known}")]
    #[diagnostic(code(coilassay::export::sheet), help("write the name on the sheet's tab as `sheet` in the rig file"))]
    NoSheet { name: String, sheet: String, known: String },
    #[error("`{name}`, sheet `{sheet}`: {rows} rows of {columns} columns, more than a table of measurements has")]
    #[diagnostic(code(coilassay::export::sheet_size), help("is there a stray cell far away from the table? Clear it, or export as text"))]
    SheetTooLarge { name: String, sheet: String, rows: u64, columns: u64 },
    #[error("`{name}`, sheet `{sheet}`, cell {cell}, column `{column}`: found {found}, wanted a number")]
    #[diagnostic(code(coilassay::export::cell), help("a cell of a number column holds a number, as one: mend the sheet or export again; a missing point is never filled in"))]
    NoNumberCell { name: String, sheet: String, cell: String, column: String, found: String },
    #[error("`{name}`, sheet `{sheet}`, cell {cell}, column `{column}`: a formula without a stored value")]
    #[diagnostic(code(coilassay::export::formula), help("formulas are not computed here: open the workbook where it was made, let it compute, and save it"))]
    NoStoredValue { name: String, sheet: String, cell: String, column: String },
    #[error("`{name}`: lines {first} to {last} cannot be read as a table, and no single cell is to blame")]
    #[diagnostic(code(coilassay::export::unreadable), help("please report this with the export; split the file to find the line"))]
    Unreadable { name: String, first: u64, last: u64 },
    #[error("`{name}`: {accounted} lines are accounted for, the file has {lines}")]
    #[diagnostic(code(coilassay::export::ledger), help("a defect of this tool, nothing was judged; please report it with the export"))]
    LedgerOpen { name: String, lines: u64, accounted: u64 },
}

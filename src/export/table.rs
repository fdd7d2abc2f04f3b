//! A piece of the table as columns of numbers, by polars; what polars would pass over in silence is counted here.
//! Every refusal is one word, [`Suspect`]: the walk then finds the cell.

use std::borrow::Cow;
use std::io::Cursor;
use std::sync::Arc;

use polars::prelude::{
    Column, CsvParseOptions, CsvReadOptions, DataFrame, DataType, Field, PlSmallStr, Schema,
    SchemaRef, SerReader, StringChunked,
};

use super::cells::ungrouped;
use super::layout::Layout;
use super::lines::{
    Context, LONGEST_LINE, UNDEFINED_1252, cells, cells_of, decode_1252, is_blank, lines,
};
use crate::rig::{Decimal, Dialect, Encoding};
use crate::units::Finite;

/// Something in this piece is not as it must be.
#[derive(Clone, Copy, Debug)]
pub(super) struct Suspect;

/// The columns of a piece that are used, converted to N, mm and s.
#[derive(Debug)]
pub(super) struct Columns {
    pub(super) load: Vec<f64>,
    pub(super) travel: Vec<f64>,
    /// Loads at the further lengths, column by column.
    pub(super) beside: Vec<Vec<f64>>,
    pub(super) time: Option<Vec<f64>>,
    pub(super) springs: Option<StringChunked>,
}

/// Where the lines of `piece` that are not blank end: behind them only blank ones follow.
pub(super) fn filled(piece: &[u8]) -> usize {
    let mut end = piece.len();
    loop {
        let head = piece.get(..end).unwrap_or_default();
        let body = head.strip_suffix(b"\n").unwrap_or(head);
        let start = body
            .iter()
            .rposition(|byte| *byte == b'\n')
            .map_or(0, |at| at + 1);
        let last = lines(head.get(start..).unwrap_or_default(), 0).next();
        match last {
            Some(line) if is_blank(line.bytes) => end = start,
            _ => return end,
        }
    }
}

/// Refuses bytes that no table holds: overlong lines, NUL, carriage returns that end no line.
pub(super) fn check_bytes(piece: &[u8]) -> Result<(), Suspect> {
    let half = LONGEST_LINE / 2; // a longer line covers one such window whole
    let mut windows = piece.chunks(half);
    if windows.any(|window| window.len() == half && !window.contains(&b'\n'))
        && lines(piece, 0).any(|line| line.bytes.len() > LONGEST_LINE)
    {
        return Err(Suspect);
    }
    if piece.contains(&0) {
        return Err(Suspect);
    }
    if piece.contains(&b'\r') {
        let followed = piece.iter().zip(piece.iter().skip(1));
        let pairs = followed.filter(|pair| *pair == (&b'\r', &b'\n')).count();
        if pairs != count(piece, b'\r') {
            return Err(Suspect);
        }
    }
    Ok(())
}

/// How often a byte occurs, counted in groups whose sum fits a byte: seven times as fast as one by one.
fn count(bytes: &[u8], wanted: u8) -> usize {
    let groups = bytes.chunks(usize::from(u8::MAX));
    let of = |group: &[u8]| -> u8 { group.iter().map(|byte| u8::from(*byte == wanted)).sum() };
    groups.map(|group| usize::from(of(group))).sum()
}

/// Lines in some text that ends with a line end.
pub(super) fn count_lines(bytes: &[u8]) -> usize {
    count(bytes, b'\n')
}

/// The text of `body`, ended by a line end.
pub(super) fn decode<'p>(context: &Context<'_>, body: &'p [u8]) -> Result<Cow<'p, str>, Suspect> {
    let text = match context.dialect.encoding {
        Encoding::Utf8 | Encoding::Utf16 => std::str::from_utf8(body)
            .map(Cow::Borrowed)
            .map_err(|_| Suspect)?,
        Encoding::Windows1252 => {
            if !body.is_ascii() && body.iter().any(|byte| UNDEFINED_1252.contains(byte)) {
                return Err(Suspect);
            }
            decode_1252(body)
        }
    };
    if text.ends_with('\n') {
        return Ok(text);
    }
    if context.dialect.last_line_open {
        return Ok(Cow::Owned(text.into_owned() + "\n"));
    }
    Err(Suspect)
}

/// `text` with one delimiter between two cells, none behind the last, and numbers without thousands marks: as polars
/// takes it. Most dialects have it so already.
pub(super) fn plain<'t>(
    dialect: &Dialect,
    layout: &Layout,
    text: Cow<'t, str>,
) -> Result<Cow<'t, str>, Suspect> {
    let rarer = &dialect.rarer;
    let thousands = rarer.thousands;
    let padded = dialect.delimiter.padded();
    if dialect.delimiter.blanks().is_none()
        && !padded
        && !rarer.trailing_delimiter
        && thousands.is_none()
    {
        return Ok(text);
    }
    let mut plain = String::with_capacity(text.len());
    for line in text.lines() {
        let found = cells_of(line, dialect).map_err(|_| Suspect)?;
        for (column, cell) in found.into_iter().enumerate() {
            if column > 0 {
                plain.push(char::from(dialect.delimiter.byte()));
            }
            let written = line.get(cell).unwrap_or_default();
            let written = if padded { written.trim() } else { written };
            match thousands.filter(|_| layout.is_number(column)) {
                Some(mark) => {
                    plain.push_str(&ungrouped(written, mark, dialect.decimal).ok_or(Suspect)?);
                }
                None => plain.push_str(written),
            }
        }
        plain.push('\n');
    }
    Ok(Cow::Owned(plain))
}

/// Refuses what polars reads as something else: missing cells at the end of a line, quotes that do not pair up,
/// points in numbers under a decimal comma.
pub(super) fn check_shape(dialect: &Dialect, layout: &Layout, text: &str) -> Result<(), Suspect> {
    let bytes = text.as_bytes();
    let columns = layout.names.len();
    let points = dialect.decimal == Decimal::Comma && bytes.contains(&b'.');
    if !dialect.quoted {
        let delimiters = count(bytes, dialect.delimiter.byte());
        if delimiters != count_lines(bytes) * (columns - 1) {
            return Err(Suspect);
        }
    }
    if !dialect.quoted && !points {
        return Ok(());
    }
    for line in text.lines() {
        let found = cells(line, dialect.delimiter, dialect.quoted).map_err(|_| Suspect)?;
        let has_point = |(column, cell): (usize, &std::ops::Range<usize>)| {
            let cell = line.get(cell.clone()).unwrap_or_default();
            layout.is_number(column) && cell.contains('.')
        };
        if found.len() != columns || points && found.iter().enumerate().any(has_point) {
            return Err(Suspect);
        }
    }
    Ok(())
}

/// The schema of the table: every column of the file by its position, numbers where numbers are used.
pub(super) fn schema(layout: &Layout) -> SchemaRef {
    let field = |column: usize| {
        let kind = if layout.is_number(column) {
            DataType::Float64
        } else {
            DataType::String
        };
        Field::new(PlSmallStr::from_string(column.to_string()), kind)
    };
    Arc::new((0..layout.names.len()).map(field).collect::<Schema>())
}

/// Parses `text`, the body of the table and nothing else.
pub(super) fn parse(
    dialect: &Dialect,
    layout: &Layout,
    schema: &SchemaRef,
    text: &str,
) -> Result<Columns, Suspect> {
    let frame = frame(dialect, schema, text)?;
    if frame.height() != count_lines(text.as_bytes()) {
        return Err(Suspect);
    }
    let numbers = |column: usize| {
        let factor = layout.factor(column, dialect);
        numbers(frame.columns().get(column).ok_or(Suspect)?, factor)
    };
    let springs = |column: usize| {
        let column = frame.columns().get(column).ok_or(Suspect)?;
        column.str().cloned().map_err(|_| Suspect)
    };
    let load = numbers(layout.load)?;
    let travel = match (layout.travel, dialect.rarer.length_columns()) {
        (Some(column), _) => numbers(column)?,
        (None, [first, ..]) => vec![first.length; load.len()],
        (None, []) => return Err(Suspect),
    };
    Ok(Columns {
        load,
        travel,
        beside: layout
            .beside
            .iter()
            .map(|column| numbers(*column))
            .collect::<Result<_, _>>()?,
        time: layout.time.map(numbers).transpose()?,
        springs: layout.spring.map(springs).transpose()?,
    })
}

fn frame(dialect: &Dialect, schema: &SchemaRef, text: &str) -> Result<DataFrame, Suspect> {
    // A piece that begins like a zlib file would be unpacked, one that begins with the mark of UTF-8 would lose it;
    // a row of zeros in front, taken off again, keeps them from it.
    let shielded = matches!(
        text.as_bytes(),
        [b'x', 0x01 | b'^', ..] | [0xEF, 0xBB, 0xBF, ..]
    );
    let parse = CsvParseOptions::default()
        .with_separator(dialect.delimiter.byte())
        .with_quote_char(dialect.quoted.then_some(b'"'))
        .with_decimal_comma(dialect.decimal == Decimal::Comma);
    let options = CsvReadOptions::default()
        .with_has_header(false)
        .with_schema(Some(schema.clone()))
        .with_infer_schema_length(Some(0))
        .with_rechunk(false)
        .with_parse_options(parse);
    let read = |text: &str| {
        let reader = options
            .clone()
            .into_reader_with_file_handle(Cursor::new(text.as_bytes()));
        reader.finish().map_err(|_| Suspect)
    };
    if !shielded {
        return read(text);
    }
    let delimiter = char::from(dialect.delimiter.byte()).to_string();
    let zeros = vec!["0"; schema.len()].join(&delimiter);
    let frame = read(&format!("{zeros}\n{text}"))?;
    Ok(frame.slice(1, frame.height()))
}

/// The numbers of a column times `factor`; none may be missing, infinite or of no usable size.
fn numbers(column: &Column, factor: f64) -> Result<Vec<f64>, Suspect> {
    let column = column.f64().map_err(|_| Suspect)?;
    if column.null_count() > 0 {
        return Err(Suspect);
    }
    let mut numbers = Vec::with_capacity(column.len());
    for chunk in column.downcast_iter() {
        // Adding zero makes −0 plain 0 and changes nothing else.
        numbers.extend(chunk.values().iter().map(|value| value * factor + 0.0));
    }
    let usable = |value: &f64| Finite::try_from(*value).is_ok();
    if numbers.iter().all(usable) {
        Ok(numbers)
    } else {
        Err(Suspect)
    }
}

//! One line of an export at a time: its bytes, its text, its cells.
//! This is the slow and exact reader; tables are read by polars, and this one names what polars refused.

use std::borrow::Cow;
use std::ops::Range;

use super::error::ExportError;
use super::spot::Spot;
use crate::rig::{Delimiter, Dialect, Encoding};

/// Bytes in a line beyond which a file is no table of measurements: far above any tester's, small beside memory.
pub(super) const LONGEST_LINE: usize = 1 << 20;

/// Bytes that windows-1252 leaves undefined (Microsoft's table of code page 1252); decoders make controls of them.
pub(super) const UNDEFINED_1252: [u8; 5] = [0x81, 0x8D, 0x8F, 0x90, 0x9D];

/// The file at hand, as faults name it, and how it is written.
#[derive(Clone, Copy, Debug)]
pub(super) struct Context<'d> {
    pub(super) name: &'d str,
    pub(super) dialect: &'d Dialect,
}

/// One line without its line end.
#[derive(Clone, Copy, Debug)]
pub(super) struct Line<'p> {
    pub(super) number: u64,
    pub(super) bytes: &'p [u8],
    /// Whether it had a line end.
    pub(super) ended: bool,
}

/// The lines of `piece`, the first of which is line `first` of the file.
pub(super) fn lines(piece: &[u8], first: u64) -> impl Iterator<Item = Line<'_>> {
    let split = piece.split_inclusive(|byte| *byte == b'\n');
    split.zip(first..).map(|(whole, number)| {
        let body = whole.strip_suffix(b"\n");
        let bytes = body.map_or(whole, |body| body.strip_suffix(b"\r").unwrap_or(body));
        Line {
            number,
            bytes,
            ended: body.is_some(),
        }
    })
}

/// Whether a line holds nothing but blanks and tabs.
pub(super) fn is_blank(line: &[u8]) -> bool {
    line.iter().all(|byte| matches!(byte, b' ' | b'\t'))
}

impl Context<'_> {
    /// A place on `line`, whose text is `text`.
    pub(super) fn spot(
        &self,
        line: u64,
        text: &str,
        cell: Range<usize>,
        column: Option<&str>,
    ) -> Spot {
        Spot::new(self.name, line, text, cell, column)
    }

    /// Refuses a line too long to be one of a table.
    pub(super) fn refuse_overlong(&self, line: &Line<'_>) -> Result<(), ExportError> {
        if line.bytes.len() <= LONGEST_LINE {
            return Ok(());
        }
        let head = line.bytes.get(..LONGEST_LINE).unwrap_or_default();
        if let Some(at) = head.iter().position(|byte| *byte == b'\r') {
            return Err(self.lone_return(line, at));
        }
        let text = String::from_utf8_lossy(line.bytes.get(..1000).unwrap_or_default());
        Err(ExportError::LineTooLong {
            at: self.spot(line.number, &text, 0..0, None),
            longest: LONGEST_LINE,
        })
    }

    /// The text of `line`.
    ///
    /// # Errors
    /// A line too long, with NUL bytes, with a carriage return inside, or with bytes that do not decode.
    pub(super) fn text<'p>(&self, line: &Line<'p>) -> Result<Cow<'p, str>, ExportError> {
        self.refuse_overlong(line)?;
        if let Some(at) = line.bytes.iter().position(|byte| *byte == 0) {
            let (text, cell) = self.around(line.bytes, at);
            let at = self.spot(line.number, &text, cell, None);
            return Err(ExportError::NulByte { at });
        }
        if let Some(at) = line.bytes.iter().position(|byte| *byte == b'\r') {
            return Err(self.lone_return(line, at));
        }
        match self.dialect.encoding {
            Encoding::Utf8 | Encoding::Utf16 => std::str::from_utf8(line.bytes)
                .map(Cow::Borrowed)
                .map_err(|fault| self.undecodable(line, fault.valid_up_to())),
            Encoding::Windows1252 => {
                let bad = |byte: &u8| UNDEFINED_1252.contains(byte);
                match line.bytes.iter().position(bad) {
                    Some(at) => Err(self.undecodable(line, at)),
                    None => Ok(decode_1252(line.bytes)),
                }
            }
        }
    }

    /// Some bytes as text for an excerpt, and the stretch of the byte at `at` in it.
    fn around(&self, bytes: &[u8], at: usize) -> (String, Range<usize>) {
        let text = |bytes: Option<&[u8]>| match self.dialect.encoding {
            Encoding::Utf8 | Encoding::Utf16 => {
                String::from_utf8_lossy(bytes.unwrap_or_default()).into_owned()
            }
            Encoding::Windows1252 => decode_1252(bytes.unwrap_or_default()).into_owned(),
        };
        let (before, byte) = (text(bytes.get(..at)), text(bytes.get(at..=at)));
        let cell = before.len()..before.len() + byte.len();
        (before + &byte + &text(bytes.get(at + 1..)), cell)
    }

    fn lone_return(&self, line: &Line<'_>, at: usize) -> ExportError {
        let (text, cell) = self.around(line.bytes, at);
        let at = self.spot(line.number, &text, cell, None);
        ExportError::LoneCarriageReturn { at }
    }

    fn undecodable(&self, line: &Line<'_>, at: usize) -> ExportError {
        let (text, cell) = self.around(line.bytes, at);
        ExportError::Undecodable {
            at: self.spot(line.number, &text, cell, None),
            byte: line.bytes.get(at).copied().unwrap_or_default(),
            encoding: self.dialect.encoding.name(),
        }
    }

    /// The stretches of the cells of a line, quotes included.
    ///
    /// # Errors
    /// Quotes that do not pair up, where the dialect has quotes.
    pub(super) fn cells(&self, line: u64, text: &str) -> Result<Vec<Range<usize>>, ExportError> {
        cells_of(text, self.dialect).map_err(|(at, what)| ExportError::Quotes {
            at: self.spot(line, text, at..at + 1, None),
            what,
        })
    }
}

/// Windows-1252 as text; the undefined bytes are refused before this.
pub(super) fn decode_1252(bytes: &[u8]) -> Cow<'_, str> {
    encoding_rs::WINDOWS_1252
        .decode_without_bom_handling(bytes)
        .0
}

/// The stretches of the cells of `text` as `dialect` parts them; an empty one behind a trailing delimiter is none.
///
/// # Errors
/// As [`cells`].
pub(super) fn cells_of(
    text: &str,
    dialect: &Dialect,
) -> Result<Vec<Range<usize>>, (usize, &'static str)> {
    let mut found = match dialect.delimiter.blanks() {
        Some(least) => parted_by_blanks(text, least, dialect.quoted)?,
        None => cells(text, dialect.delimiter, dialect.quoted)?,
    };
    let trailing = dialect.rarer.trailing_delimiter && found.len() > 1;
    if trailing && found.last().is_some_and(Range::is_empty) {
        found.pop();
    }
    Ok(found)
}

/// The stretches between runs of `least` blanks or more, or of tabs; blanks at both ends part nothing.
fn parted_by_blanks(
    text: &str,
    least: usize,
    quoted: bool,
) -> Result<Vec<Range<usize>>, (usize, &'static str)> {
    let bytes = text.as_bytes();
    let is_blank = |at: usize| matches!(bytes.get(at), Some(b' ' | b'\t'));
    let mut found = Vec::new();
    let mut at = 0;
    while at < bytes.len() {
        if is_blank(at) {
            at += 1;
            continue;
        }
        let start = at;
        if quoted && bytes.get(at) == Some(&b'"') {
            at += quoted_length(bytes.get(at..).unwrap_or_default(), at)?;
        } else {
            while at < bytes.len() {
                let run = (at..bytes.len()).take_while(|at| is_blank(*at)).count();
                if run >= least
                    || bytes.get(at) == Some(&b'\t')
                    || run > 0 && at + run == bytes.len()
                {
                    break;
                }
                at += run.max(1);
            }
        }
        found.push(start..at);
    }
    if found.is_empty() {
        found.push(0..0);
    }
    Ok(found)
}

/// The stretches of the cells of `text`, quotes included; on a fault of quoting its place and what is wrong.
pub(super) fn cells(
    text: &str,
    delimiter: Delimiter,
    quoted: bool,
) -> Result<Vec<Range<usize>>, (usize, &'static str)> {
    let mut found = Vec::new();
    let mut start = 0;
    loop {
        let rest = text.as_bytes().get(start..).unwrap_or_default();
        let plain = || {
            let end = rest.iter().position(|byte| *byte == delimiter.byte());
            end.unwrap_or(rest.len())
        };
        let length = match rest.first() {
            Some(b'"') if quoted => quoted_length(rest, start)?,
            _ => plain(),
        };
        let cell = rest.get(..length).unwrap_or_default();
        if quoted
            && cell.first() != Some(&b'"')
            && let Some(at) = cell.iter().position(|byte| *byte == b'"')
        {
            return Err((start + at, "a quote inside a cell that is not in quotes"));
        }
        found.push(start..start + length);
        match rest.get(length) {
            None => return Ok(found),
            Some(byte) if *byte == delimiter.byte() => start += length + 1,
            Some(_) => {
                return Err((start + length, "text after the closing quote of a cell"));
            }
        }
    }
}

/// The length of the quoted cell that `rest` begins with.
fn quoted_length(rest: &[u8], start: usize) -> Result<usize, (usize, &'static str)> {
    let mut at = 1;
    loop {
        let tail = rest.get(at..).unwrap_or_default();
        match tail.iter().position(|byte| *byte == b'"') {
            None => return Err((start, "a cell whose quote is not closed on this line")),
            Some(quote) if tail.get(quote + 1) == Some(&b'"') => at += quote + 2,
            Some(quote) => return Ok(at + quote + 1),
        }
    }
}

/// What a cell holds, its quotes taken off.
pub(super) fn content(cell: &str, quoted: bool) -> Cow<'_, str> {
    let inner = cell
        .strip_prefix('"')
        .and_then(|cell| cell.strip_suffix('"'));
    match inner {
        Some(inner) if quoted => Cow::Owned(inner.replace("\"\"", "\"")),
        _ => Cow::Borrowed(cell),
    }
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;

    fn split(text: &str, quoted: bool) -> Result<Vec<String>, (usize, &'static str)> {
        let found = cells(text, Delimiter::Comma, quoted)?;
        let one = |cell: Range<usize>| content(text.get(cell).unwrap(), quoted).into_owned();
        Ok(found.into_iter().map(one).collect())
    }

    #[test]
    fn cells_without_quotes() {
        assert_eq!(split("a,b", false).unwrap(), ["a", "b"]);
        assert_eq!(split("", false).unwrap(), [""]);
        assert_eq!(split(",", false).unwrap(), ["", ""]);
        assert_eq!(split("\"a,b\"", false).unwrap(), ["\"a", "b\""]);
    }

    #[test]
    fn cells_with_quotes() {
        let quoted = r#""a,b","","he said ""no""",4"#;
        assert_eq!(
            split(quoted, true).unwrap(),
            ["a,b", "", "he said \"no\"", "4"]
        );
        for (bad, at) in [
            ("1,\"2", 2),
            ("\"1\"2,3", 3),
            ("1,2\"", 3),
            (" \"1\",2", 1),
            ("\"\"\"", 0),
        ] {
            assert_eq!(split(bad, true).unwrap_err().0, at, "{bad}");
        }
    }

    #[test]
    fn line_ends_are_taken_off_once() {
        let found: Vec<_> = lines(b"a\r\nb\n\nc\r\r\nd", 7).collect();
        let bytes: Vec<&[u8]> = found.iter().map(|line| line.bytes).collect();
        assert_eq!(bytes, [&b"a"[..], b"b", b"", b"c\r", b"d"]);
        assert_eq!(
            found.last().map(|line| (line.number, line.ended)),
            Some((11, false))
        );
    }
}

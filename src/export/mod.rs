//! An export as its tester wrote it: blocks of whole lines, parsed by polars, handed on spring by spring.
//! Here: every line accounted for, every fault at its cell. Elsewhere: bytes from disk (`text`), what a curve means (`curve`).

mod cells;
mod curves;
mod error;
mod head;
mod labels;
mod layout;
mod ledger;
mod lines;
mod sketch;
mod small;
mod spot;
mod table;
mod walk;

use std::path::Path;

use polars::prelude::SchemaRef;

use crate::text::{Alphabet, Block, Blocks, Next, Tail, printable};

use crate::rig::{Decimal, Delimiter, Dialect, Encoding, SpringFrom};
use curves::Progress;
use head::Head;
use layout::Layout;
use lines::{Context, LONGEST_LINE};
use table::Suspect;

pub use curves::RawCurve;
pub use error::ExportError;
pub use labels::{UnitWord, unit_in_name, unit_word};
pub use ledger::{Aside, Ledger, WhyAside};
pub use sketch::{Columns, Look, look, sketch};
pub use small::{SmallTable, read_small};
pub use spot::Spot;

/// Bytes read at once unless a test wants otherwise: large enough to keep every core busy, a few fit any memory.
pub const BLOCK_BYTES: usize = 8 << 20;

/// What reading an export leaves, beside its springs.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Read {
    /// Every line accounted for.
    pub ledger: Ledger,
    /// SHA-256 of the bytes, lower-case hexadecimal.
    pub sha256: String,
}

/// Reads the export at `path` (`-`: standard input), written in `dialect`; `as_written` is the path as the user wrote it.
///
/// `each` gets the springs that a block of about `block_bytes` bytes completed, in the order of the file; what it gets
/// over the whole file does not depend on `block_bytes`. After a fault, what it got must not be used.
///
/// # Errors
/// [`ExportError`] at the first line that is not as the dialect and the file's own header say.
pub fn read(
    path: &Path,
    as_written: &str,
    dialect: &Dialect,
    block_bytes: usize,
    each: &mut dyn FnMut(Vec<RawCurve>),
) -> Result<Read, ExportError> {
    let mut reading = Reading::begin(as_written, dialect)?;
    let mut blocks = Blocks::open(path, as_written, block_bytes, LONGEST_LINE + 1)?;
    loop {
        match blocks.next_lines()? {
            Next::Block(block) => {
                let done = reading.take(&block)?;
                if !done.is_empty() {
                    each(done);
                }
            }
            Next::End { sha256 } => {
                let (last, ledger) = reading.finish()?;
                each(vec![last]);
                return Ok(Read { ledger, sha256 });
            }
        }
    }
}

/// An export while it is being read.
struct Reading<'d> {
    context: Context<'d>,
    begun: bool,
    head: Head,
    table: Option<(Layout, SchemaRef)>,
    progress: Progress,
    ledger: Ledger,
}

impl<'d> Reading<'d> {
    fn begin(name: &'d str, dialect: &'d Dialect) -> Result<Self, ExportError> {
        let shown = || printable(name, &Alphabet::Any);
        let commas = dialect.delimiter == Delimiter::Comma && dialect.decimal == Decimal::Comma;
        if commas && !dialect.quoted {
            return Err(ExportError::CommaTwice { name: shown() });
        }
        match dialect.units_line {
            Some(line) if line == 0 || line == dialect.header_line => {
                return Err(ExportError::UnitsLine { line });
            }
            _ => {}
        }
        let whole_file = match dialect.spring {
            SpringFrom::Column(_) => None,
            SpringFrom::FileName => {
                let stem = Path::new(name)
                    .file_stem()
                    .map(std::ffi::OsStr::to_string_lossy);
                let stem = stem.map(|stem| stem.trim().to_owned());
                let stem = stem.filter(|stem| !stem.is_empty());
                Some(stem.ok_or_else(|| ExportError::NoSpringName { name: shown() })?)
            }
        };
        Ok(Self {
            context: Context { name, dialect },
            begun: false,
            head: Head::default(),
            table: None,
            progress: Progress::new(name, whole_file),
            ledger: Ledger::default(),
        })
    }

    fn shown_name(&self) -> String {
        printable(self.context.name, &Alphabet::Any)
    }

    /// Takes in the next lines; gives the springs they complete.
    fn take(&mut self, block: &Block) -> Result<Vec<RawCurve>, ExportError> {
        let mut piece = block.bytes.as_slice();
        if !self.begun {
            piece = self.after_mark(piece)?;
            self.begun = !piece.is_empty();
        }
        let mut first_line = self.ledger.lines + 1;
        let open = u64::from(block.tail != Tail::Ended && !piece.is_empty());
        self.ledger.lines += table::count_lines(piece) as u64 + open;
        if self.table.is_none() {
            let (head, ledger) = (&mut self.head, &mut self.ledger);
            let (taken, layout) = head.take(&self.context, piece, first_line, ledger)?;
            let (above, rest) = piece.split_at_checked(taken).unwrap_or((piece, &[]));
            piece = rest;
            first_line += lines::lines(above, 0).count() as u64;
            self.table = layout.map(|layout| {
                let schema = table::schema(&layout);
                (layout, schema)
            });
        }
        self.rows(piece, first_line)
    }

    /// The first bytes of a file without the mark of UTF-8; other marks are refused.
    fn after_mark<'p>(&self, piece: &'p [u8]) -> Result<&'p [u8], ExportError> {
        let name = || self.shown_name();
        match (piece, self.context.dialect.encoding) {
            ([0xEF, 0xBB, 0xBF, ..], Encoding::Windows1252) => {
                Err(ExportError::Marked { name: name() })
            }
            ([0xEF, 0xBB, 0xBF, rest @ ..], Encoding::Utf8) => Ok(rest),
            ([0xFF, 0xFE, ..] | [0xFE, 0xFF, ..], _) => Err(ExportError::Utf16 { name: name() }),
            _ => Ok(piece),
        }
    }

    /// Reads lines of the table, the first of which is `first_line`.
    fn rows(&mut self, piece: &[u8], first_line: u64) -> Result<Vec<RawCurve>, ExportError> {
        let parsed = table::check_bytes(piece).and_then(|()| self.parse(piece, first_line));
        parsed.map_err(|Suspect| match &self.table {
            Some((layout, _)) => {
                walk::first_fault(&self.context, layout, &self.progress, piece, first_line)
            }
            None => ExportError::Unreadable {
                name: self.shown_name(),
                first: first_line,
                last: self.ledger.lines,
            },
        })
    }

    fn parse(&mut self, piece: &[u8], first_line: u64) -> Result<Vec<RawCurve>, Suspect> {
        let (body, blank) = piece
            .split_at_checked(table::filled(piece))
            .ok_or(Suspect)?;
        let mut done = Vec::new();
        let mut next_line = first_line;
        if !body.is_empty() {
            let (layout, schema) = self.table.as_ref().ok_or(Suspect)?;
            if self.progress.blank_since().is_some() {
                return Err(Suspect);
            }
            let dialect = self.context.dialect;
            let text = table::decode(&self.context, body)?;
            table::check_shape(dialect, layout, &text)?;
            let columns = table::parse(dialect, layout, schema, &text)?;
            done = self.progress.take(&columns, first_line, dialect.quoted)?;
            next_line += columns.load.len() as u64;
        }
        if !blank.is_empty() {
            self.progress.note_blank(next_line);
        }
        Ok(done)
    }

    /// Refuses a file that ends above its own header or units.
    fn check_head(&self) -> Result<(), ExportError> {
        let (dialect, lines) = (self.context.dialect, self.ledger.lines);
        let units_line = dialect.units_line.unwrap_or(0);
        let head = [
            ("header_line", dialect.header_line),
            ("units_line", units_line),
        ];
        match head.into_iter().find(|(_, line)| *line > lines) {
            Some((key, line)) => Err(ExportError::HeadBeyondEnd {
                name: self.shown_name(),
                key,
                line,
                lines,
            }),
            None => Ok(()),
        }
    }

    /// The last spring and the ledger, at the end of the file.
    fn finish(mut self) -> Result<(RawCurve, Ledger), ExportError> {
        let name = self.shown_name();
        let lines = self.ledger.lines;
        if lines == 0 {
            return Err(ExportError::Empty { name });
        }
        self.check_head()?;
        if let Some(blank) = self.progress.blank_since() {
            for line in blank..=lines {
                self.ledger.set_aside(WhyAside::BlankAtTheEnd, line);
            }
        }
        self.ledger.points = self.progress.points();
        let Some(last) = self.progress.finish() else {
            return Err(ExportError::NoData { name, lines });
        };
        let accounted = self.ledger.accounted();
        if accounted == lines {
            Ok((last, self.ledger))
        } else {
            Err(ExportError::LedgerOpen {
                name,
                lines,
                accounted,
            })
        }
    }
}

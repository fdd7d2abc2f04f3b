//! The lines above the table: metadata, header, units; taken off one by one until the table begins.

use super::error::ExportError;
use super::layout::{HeadLine, Layout};
use super::ledger::{Ledger, WhyAside};
use super::lines::{Context, is_blank, lines};
use super::stated::Stated;

/// What is known of a file's head so far.
#[derive(Debug, Default)]
pub(super) struct Head {
    pub(super) header: Option<HeadLine>,
    pub(super) units: Option<HeadLine>,
    /// Lines that state something by the rig file's words.
    pub(super) stated: Stated,
}

impl Head {
    /// Takes the head's lines off `piece`, whose first line is `first`; gives the bytes taken, and the layout
    /// once the table is reached.
    ///
    /// # Errors
    /// Lines that are no text; whatever [`Layout`] refuses.
    pub(super) fn take(
        &mut self,
        context: &Context<'_>,
        piece: &[u8],
        first: u64,
        ledger: &mut Ledger,
    ) -> Result<(usize, Option<Layout>), ExportError> {
        let (header_line, units_line) = (context.dialect.header_line, context.dialect.units_line);
        let last = header_line.max(units_line.unwrap_or(0));
        let (mut taken, mut next) = (0, first);
        for line in lines(piece, first) {
            if line.number > last {
                break;
            }
            let text = context.text(&line)?.into_owned();
            let why = self.keep(context, line.number, text);
            ledger.set_aside(why, line.number);
            taken += line.bytes.len();
            taken += line_end(piece, taken);
            next = line.number + 1;
        }
        if next <= last {
            return Ok((taken, None));
        }
        let table = piece.get(taken..).unwrap_or_default();
        let layout = match &self.header {
            Some(header) => Some(Layout::new(context, header, self.units.as_ref())?),
            None => self.numbered(context, table, next)?,
        };
        Ok((taken, layout))
    }

    fn keep(&mut self, context: &Context<'_>, number: u64, text: String) -> WhyAside {
        if number == context.dialect.header_line {
            self.header = Some(HeadLine { number, text });
            WhyAside::Header
        } else if Some(number) == context.dialect.units_line {
            self.units = Some(HeadLine { number, text });
            WhyAside::Units
        } else {
            self.stated.note(context, number, &text);
            WhyAside::Metadata
        }
    }

    /// The layout of a file without header, from the first line of its table that is not blank.
    fn numbered(
        &self,
        context: &Context<'_>,
        table: &[u8],
        first: u64,
    ) -> Result<Option<Layout>, ExportError> {
        let mut filled = None;
        for line in lines(table, first) {
            context.refuse_overlong(&line)?;
            if !is_blank(line.bytes) {
                filled = Some(line);
                break;
            }
        }
        let Some(line) = filled else { return Ok(None) };
        let first = HeadLine {
            number: line.number,
            text: context.text(&line)?.into_owned(),
        };
        Layout::numbered(context, &first, self.units.as_ref()).map(Some)
    }
}

/// Bytes of the line end that begins at `at`.
fn line_end(piece: &[u8], at: usize) -> usize {
    match piece.get(at..).unwrap_or_default() {
        [b'\r', b'\n', ..] => 2,
        [b'\n', ..] => 1,
        _ => 0,
    }
}

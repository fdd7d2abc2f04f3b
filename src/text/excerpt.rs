//! The few lines of a file that a fault shows, with their true line numbers, made printable.

use std::ops::Range;
use std::sync::Arc;

use miette::{MietteError, MietteSpanContents, SourceCode, SourceSpan, SpanContents};

use super::printable::{Alphabet, printable};

/// Characters of a line shown on either side of the cell at fault.
const REACH: usize = 160;

/// A few lines of a file of any size.
#[derive(Debug)]
pub struct Excerpt {
    name: String,
    text: String,
    first_line: usize,
    column_shift: usize,
}

/// Where a fault lies: an excerpt and the stretch in it.
#[derive(Clone, Debug)]
pub struct Place {
    /// The lines shown.
    pub excerpt: Arc<Excerpt>,
    /// The stretch at fault, in bytes of the excerpt.
    pub span: SourceSpan,
    /// 1-based line in the file.
    pub line: usize,
    /// 1-based column in the line, in characters.
    pub column: usize,
}

impl Place {
    /// The place of `cell` (bytes within `line_text`) on line `line` (1-based) of the file called `name`.
    pub fn in_line(name: &str, line_text: &str, line: usize, cell: Range<usize>) -> Self {
        let cut = |range: Range<usize>| line_text.get(range).unwrap_or("");
        let end = cell.end.clamp(cell.start, line_text.len());
        let (before, inside, after) = (
            cut(0..cell.start),
            cut(cell.start..end),
            cut(end..line_text.len()),
        );
        let column = before.chars().count() + 1;
        let skipped = before.chars().count().saturating_sub(REACH);
        let before: String = before.chars().skip(skipped).collect();
        let inside: String = inside.chars().take(REACH).collect();
        let after: String = after.chars().take(REACH).collect();
        let show = |text: &str| printable(&text.replace('\t', " "), &Alphabet::Any);
        let (before, inside, after) = (show(&before), show(&inside), show(&after));
        let span = SourceSpan::new(before.len().into(), inside.len());
        let excerpt = Excerpt {
            name: printable(name, &Alphabet::Any),
            text: format!("{before}{inside}{after}"),
            first_line: line,
            column_shift: skipped,
        };
        Self {
            excerpt: Arc::new(excerpt),
            span,
            line,
            column,
        }
    }

    /// The place of `span` (bytes) in a whole text.
    pub fn in_text(name: &str, text: &str, span: Range<usize>) -> Self {
        let start = span.start.min(text.len());
        let head = text.get(..start).unwrap_or("");
        let line_start = head.rfind('\n').map_or(0, |at| at + 1);
        let line = head.matches('\n').count() + 1;
        let line_text = text
            .get(line_start..)
            .and_then(|rest| rest.lines().next())
            .unwrap_or("");
        let end = span
            .end
            .saturating_sub(line_start)
            .clamp(start - line_start, line_text.len().max(start - line_start));
        Self::in_line(name, line_text, line, start - line_start..end)
    }
}

impl SourceCode for Excerpt {
    fn read_span<'a>(
        &'a self,
        span: &SourceSpan,
        before: usize,
        after: usize,
    ) -> Result<Box<dyn SpanContents<'a> + 'a>, MietteError> {
        let inner = self.text.read_span(span, before, after)?;
        Ok(Box::new(MietteSpanContents::new_named(
            self.name.clone(),
            inner.data(),
            *inner.span(),
            inner.line() + self.first_line - 1,
            inner.column() + self.column_shift,
            inner.line_count(),
        )))
    }
}

//! The search for the first fault of a piece, line by line and cell by cell, once polars or a count refused it.
//! The order of the checks is fixed, so that a fault is the same for every block size.

use std::collections::HashMap;
use std::ops::Range;

use super::curves::Progress;
use super::error::ExportError;
use super::layout::Layout;
use super::lines::{Context, Line, content, is_blank, lines};
use super::spot::show;

/// What the search knows when it comes to a line.
struct Walk<'w> {
    context: &'w Context<'w>,
    layout: &'w Layout,
    before: &'w Progress,
    first_line: u64,
    blank: Option<u64>,
    current: Option<String>,
    last_time: Option<f64>,
    begun: HashMap<String, u64>,
}

/// The first fault of `piece`, whose first line is `first_line`; `before` is the state it was met in.
pub(super) fn first_fault(
    context: &Context<'_>,
    layout: &Layout,
    before: &Progress,
    piece: &[u8],
    first_line: u64,
) -> ExportError {
    let mut walk = Walk {
        context,
        layout,
        before,
        first_line,
        blank: before.blank_since(),
        current: before.current_name().map(str::to_owned),
        last_time: before.last_time(),
        begun: HashMap::new(),
    };
    let mut last = first_line;
    for line in lines(piece, first_line) {
        last = line.number;
        if let Err(fault) = walk.line(&line) {
            return fault;
        }
    }
    ExportError::Unreadable {
        name: show(context.name),
        first: first_line,
        last,
    }
}

impl Walk<'_> {
    fn line(&mut self, line: &Line<'_>) -> Result<(), ExportError> {
        let context = self.context;
        context.refuse_overlong(line)?;
        if is_blank(line.bytes) {
            self.blank.get_or_insert(line.number);
            return Ok(());
        }
        if let Some(blank) = self.blank {
            let at = context.spot(blank, "", 0..0, None);
            return Err(ExportError::BlankLine { at });
        }
        let text = context.text(line)?;
        if !line.ended && !context.dialect.last_line_open {
            let at = context.spot(line.number, &text, text.len()..text.len(), None);
            return Err(ExportError::LastLineOpen { at });
        }
        let cells = context.cells(line.number, &text)?;
        self.count(line.number, &text, &cells)?;
        let mut time = None;
        for (column, cell) in cells.iter().enumerate() {
            if self.layout.is_number(column) {
                let name = self.layout.name(column);
                let factor = self.layout.factor(column, context.dialect);
                let value = context.number(line.number, &text, cell.clone(), name, factor)?;
                if self.layout.time == Some(column) {
                    time = Some((value, cell.clone()));
                }
            }
        }
        self.spring(line.number, &text, &cells)?;
        self.time(line.number, &text, time)
    }

    fn count(&self, line: u64, text: &str, cells: &[Range<usize>]) -> Result<(), ExportError> {
        let (found, wanted) = (cells.len(), self.layout.names.len());
        let spot = |cell| self.context.spot(line, text, cell, None);
        if found < wanted {
            let at = spot(text.len()..text.len());
            return Err(ExportError::TooFewCells { at, found, wanted });
        }
        match cells.get(wanted) {
            Some(extra) => {
                let at = spot(extra.start..text.len());
                Err(ExportError::TooManyCells { at, found, wanted })
            }
            None => Ok(()),
        }
    }

    fn spring(&mut self, line: u64, text: &str, cells: &[Range<usize>]) -> Result<(), ExportError> {
        let column = self.layout.spring;
        let Some((column, cell)) = column.and_then(|column| Some((column, cells.get(column)?)))
        else {
            return Ok(());
        };
        let quoted = self.context.dialect.quoted;
        let held = content(text.get(cell.clone()).unwrap_or_default(), quoted);
        let name = held.trim();
        let spot = || {
            let column = self.layout.name(column);
            self.context.spot(line, text, cell.clone(), Some(column))
        };
        if name.is_empty() {
            return Err(ExportError::NoName { at: spot() });
        }
        if !quoted && name.starts_with('"') {
            let found = show(name);
            return Err(ExportError::UnexpectedQuotes { at: spot(), found });
        }
        if self.current.as_deref() == Some(name) {
            return Ok(());
        }
        let earlier = self
            .before
            .began(name)
            .filter(|began| *began < self.first_line);
        if let Some(began) = earlier.or_else(|| self.begun.get(name).copied()) {
            let id = show(name);
            return Err(ExportError::SpringReturns {
                at: spot(),
                id,
                began,
            });
        }
        self.begun.insert(name.to_owned(), line);
        self.current = Some(name.to_owned());
        self.last_time = None;
        Ok(())
    }

    fn time(
        &mut self,
        line: u64,
        text: &str,
        time: Option<(f64, Range<usize>)>,
    ) -> Result<(), ExportError> {
        let Some((now, cell)) = time else {
            return Ok(());
        };
        let column = self.layout.time.map(|column| self.layout.name(column));
        match self.last_time.replace(now) {
            Some(before) if now < before => Err(ExportError::TimeBackwards {
                at: self.context.spot(line, text, cell, column),
                before,
                now,
            }),
            _ => Ok(()),
        }
    }
}

//! From columns to springs: a spring is complete when the next begins.

use std::collections::HashMap;
use std::collections::hash_map::Entry;

use polars::prelude::StringChunked;

use super::table::{Columns, Suspect};
use crate::text::{Alphabet, printable};

/// One spring's rows as the tester wrote them, in N and mm.
#[derive(Clone, Debug, PartialEq)]
pub struct RawCurve {
    /// The spring's name, made printable.
    pub id: String,
    /// The spring's name as the file has it, blanks around it aside: two springs are the same where this is.
    pub identity: String,
    /// The export, as written.
    pub export: String,
    /// Line of the first point, 1-based; point i lies on line `first_line + i`, but for `breaks`.
    pub first_line: u64,
    /// Where lines lie between two points (several tables): the point behind them and its line.
    pub breaks: Vec<(usize, u64)>,
    /// Loads in N, pushing positive.
    pub load: Vec<f64>,
    /// Travel in mm, as indicated.
    pub travel: Vec<f64>,
    /// Loads at the further lengths of a table with a column for every length, column by column, N.
    pub beside: Vec<Vec<f64>>,
    /// Time in s, where the rig file names a column of it.
    pub time: Option<Vec<f64>>,
}

/// The springs of an export as far as it is read.
#[derive(Debug, Default)]
pub(super) struct Progress {
    export: String,
    whole_file: Option<String>,
    open: Option<RawCurve>,
    begun: HashMap<String, u64>,
    blank: Option<u64>,
    points: u64,
    /// A table begins: its clock is its own.
    new_clock: bool,
}

/// Rows of one spring within a piece.
struct Segment {
    start: usize,
    end: usize,
    /// The spring that begins here; `None` where the open one goes on.
    begins: Option<String>,
}

impl Progress {
    /// The start of the file called `export`; all of it is one spring where `whole_file` names it.
    pub(super) fn new(export: &str, whole_file: Option<String>) -> Self {
        Self {
            export: printable(export, &Alphabet::Any),
            whole_file,
            ..Self::default()
        }
    }

    /// The first of the blank lines just before, if there are any.
    pub(super) fn blank_since(&self) -> Option<u64> {
        self.blank
    }

    /// Notes blank lines from `line` on.
    pub(super) fn note_blank(&mut self, line: u64) {
        self.blank.get_or_insert(line);
    }

    /// The blank lines noted are accounted for.
    pub(super) fn forget_blank(&mut self) {
        self.blank = None;
    }

    /// The name that the rows of the file go by, unless a column names them.
    pub(super) fn whole_file(&self) -> Option<&str> {
        self.whole_file.as_deref()
    }

    /// A table begins: its clock is its own.
    pub(super) fn new_table(&mut self) {
        self.new_clock = true;
    }

    /// The rows to come are those of the spring called `name`, which begins on `line`; gives the spring before.
    ///
    /// # Errors
    /// The line on which a spring of this name began already.
    pub(super) fn next_spring(&mut self, name: &str, line: u64) -> Result<Option<RawCurve>, u64> {
        if let Some(began) = self.begun.insert(name.to_owned(), line) {
            return Err(began);
        }
        self.whole_file = Some(name.to_owned());
        Ok(self.open.take())
    }

    /// The name of the spring whose rows are being read.
    pub(super) fn current_name(&self) -> Option<&str> {
        self.open.as_ref().map(|open| open.identity.as_str())
    }

    /// The time of its last point.
    pub(super) fn last_time(&self) -> Option<f64> {
        if self.new_clock {
            return None;
        }
        self.open.as_ref()?.time.as_ref()?.last().copied()
    }

    /// The line on which the spring called `name` began.
    pub(super) fn began(&self, name: &str) -> Option<u64> {
        self.begun.get(name).copied()
    }

    /// Points handed on and still held.
    pub(super) fn points(&self) -> u64 {
        self.points
    }

    /// Takes in the rows of a piece, whose first is line `first_line`; gives the springs they complete.
    ///
    /// # Errors
    /// A spring without a name, in quotes or returning; time that runs backwards. Nothing is taken in then but names.
    pub(super) fn take(
        &mut self,
        columns: &Columns,
        first_line: u64,
        quoted: bool,
    ) -> Result<Vec<RawCurve>, Suspect> {
        let segments = self.segments(columns, first_line, quoted)?;
        self.check_time(columns, &segments)?;
        self.new_clock = false;
        let mut done = Vec::new();
        for segment in segments {
            if let Some(identity) = segment.begins {
                let next = RawCurve {
                    id: printable(&identity, &Alphabet::Any),
                    identity,
                    export: self.export.clone(),
                    first_line: first_line + segment.start as u64,
                    breaks: Vec::new(),
                    load: Vec::new(),
                    travel: Vec::new(),
                    beside: vec![Vec::new(); columns.beside.len()],
                    time: columns.time.as_ref().map(|_| Vec::new()),
                };
                done.extend(self.open.replace(next));
            }
            if let Some(open) = &mut self.open {
                open.note_break(first_line + segment.start as u64);
                open.extend(columns, segment.start..segment.end);
                self.points += (segment.end - segment.start) as u64;
            }
        }
        Ok(done)
    }

    /// The rows of a piece, parted by spring.
    fn segments(
        &mut self,
        columns: &Columns,
        first_line: u64,
        quoted: bool,
    ) -> Result<Vec<Segment>, Suspect> {
        let begins = match (&columns.springs, &self.open, &self.whole_file) {
            (Some(springs), ..) => self.begins(springs, first_line, quoted)?,
            (None, None, Some(name)) => vec![(0, name.clone())],
            (None, ..) => Vec::new(),
        };
        let mut segments = vec![Segment {
            start: 0,
            end: columns.load.len(),
            begins: None,
        }];
        for (start, name) in begins {
            let end = columns.load.len();
            if let Some(before) = segments.last_mut() {
                before.end = start;
            }
            segments.push(Segment {
                start,
                end,
                begins: Some(name),
            });
        }
        segments.retain(|segment| segment.start < segment.end);
        Ok(segments)
    }

    /// The rows on which a spring begins, and its name.
    fn begins(
        &mut self,
        springs: &StringChunked,
        first_line: u64,
        quoted: bool,
    ) -> Result<Vec<(usize, String)>, Suspect> {
        if springs.null_count() > 0 {
            return Err(Suspect);
        }
        let mut current = self.current_name().unwrap_or("").to_owned();
        let mut begins = Vec::new();
        let mut last = None;
        let cells = springs
            .downcast_iter()
            .flat_map(|chunk| chunk.values_iter());
        for (row, cell) in cells.enumerate() {
            if last.replace(cell) == Some(cell) {
                continue;
            }
            let name = cell.trim();
            if name.is_empty() || !quoted && name.starts_with('"') {
                return Err(Suspect);
            }
            if name == current {
                continue;
            }
            match self.begun.entry(name.to_owned()) {
                Entry::Occupied(_) => return Err(Suspect),
                Entry::Vacant(place) => place.insert(first_line + row as u64),
            };
            name.clone_into(&mut current);
            begins.push((row, name.to_owned()));
        }
        Ok(begins)
    }

    fn check_time(&self, columns: &Columns, segments: &[Segment]) -> Result<(), Suspect> {
        let Some(time) = &columns.time else {
            return Ok(());
        };
        for segment in segments {
            let mut before = match segment.begins {
                Some(_) => None,
                None => self.last_time(),
            };
            for now in time.get(segment.start..segment.end).unwrap_or_default() {
                if before.replace(*now).is_some_and(|before| *now < before) {
                    return Err(Suspect);
                }
            }
        }
        Ok(())
    }

    /// The last spring, at the end of the file.
    pub(super) fn finish(self) -> Option<RawCurve> {
        self.open
    }
}

impl RawCurve {
    /// The line of the export that row `row` (from 0) stands on.
    pub fn line(&self, row: usize) -> u64 {
        let before = self.breaks.iter().rev().find(|(first, _)| *first <= row);
        let (first, line) = before.copied().unwrap_or((0, self.first_line));
        line + (row - first) as u64
    }

    /// Notes where the next point stands on another line than the one below the last.
    fn note_break(&mut self, line: u64) {
        let next = self.load.len();
        if self.line(next) != line {
            self.breaks.push((next, line));
        }
    }

    fn extend(&mut self, columns: &Columns, rows: std::ops::Range<usize>) {
        let add = |to: &mut Vec<f64>, from: &[f64]| {
            to.extend_from_slice(from.get(rows.clone()).unwrap_or_default());
        };
        add(&mut self.load, &columns.load);
        add(&mut self.travel, &columns.travel);
        for (to, from) in self.beside.iter_mut().zip(&columns.beside) {
            add(to, from);
        }
        if let (Some(time), Some(more)) = (&mut self.time, &columns.time) {
            add(time, more);
        }
    }
}

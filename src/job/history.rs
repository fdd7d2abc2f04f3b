//! `--history FILE.csv`: the past lots that the switching rules look at, one documented column order.

use std::collections::HashSet;
use std::ops::Range;
use std::path::Path;

use jiff::civil::Date;

use crate::sampling::{Outcome, PastLot};
use crate::text::{Alphabet, Fault, Faults, Place, Source, printable};

use super::accept::Past;

/// The header, and with it the order of the columns.
const HEADER: &str = "date,lot,decision,accept,accepted_tighter";

/// Reads past lots from the file at `path`, written as `as_written`, in the order of their decisions.
///
/// Columns: date of the decision (YYYY-MM-DD), lot number, decision (accepted, rejected, undecided, or resumed for a line
/// that is no lot but says that the supplier has acted), Ac of its plan, and whether it would also have been accepted with
/// the AQL one step tighter (yes, no, or empty where nobody noted it).
///
/// # Errors
/// Every fault of the file together, each at its place.
pub fn read_history(path: &Path, as_written: &str) -> miette::Result<Past> {
    let source = Source::open(path, as_written)?;
    let mut reader = Reader {
        source: &source,
        faults: Vec::new(),
    };
    let lots = reader.lots();
    if !reader.faults.is_empty() {
        return Err(Faults::new(&source.name, reader.faults).into());
    }
    Ok(Past {
        from: source.name.clone(),
        lots,
        input: Some(source.input("history")),
    })
}

struct Reader<'a> {
    source: &'a Source,
    faults: Vec<Fault>,
}

/// A cell and where it stands.
type Cell<'a> = (&'a str, Range<usize>);

impl Reader<'_> {
    fn fault(&mut self, place: Range<usize>, what: String, help: &str) {
        let place = Place::in_text(&self.source.name, &self.source.text, place);
        self.faults.push(Fault::new(what, help, Some(place)));
    }

    fn lots(&mut self) -> Vec<PastLot> {
        let text = self.source.text.to_string();
        let mut start = 0;
        let mut lots: Vec<PastLot> = Vec::new();
        let mut seen = HashSet::new();
        for (number, whole) in text.split_inclusive('\n').enumerate() {
            let line = whole.trim_end_matches(['\n', '\r']);
            let at = start..start + line.len();
            start += whole.len();
            if number == 0 {
                if line != HEADER {
                    let found = printable(line, &Alphabet::Any);
                    let what = format!("the first line is `{found}`");
                    self.fault(
                        at,
                        what,
                        "the first line must be: date,lot,decision,accept,accepted_tighter",
                    );
                    return lots;
                }
                continue;
            }
            if line.trim().is_empty() {
                continue;
            }
            let Some(lot) = self.lot(line, at.clone()) else {
                continue;
            };
            if lots.last().is_some_and(|before| before.date > lot.date) {
                let what = format!("{} comes before the date of the line above", lot.date);
                self.fault(at, what, "list the lots in the order of their decisions");
            } else if lot.outcome != Outcome::Resumed && !seen.insert(lot.lot.clone()) {
                let what = format!("lot {} stands twice", printable(&lot.lot, &Alphabet::Any));
                self.fault(
                    at,
                    what,
                    "only the first inspection of a lot counts for switching, not that of a lot brought back",
                );
            } else {
                lots.push(lot);
            }
        }
        lots
    }

    fn lot(&mut self, line: &str, at: Range<usize>) -> Option<PastLot> {
        let mut cells: Vec<Cell<'_>> = Vec::new();
        let mut start = at.start;
        for cell in line.split(',') {
            cells.push((cell.trim(), start..start + cell.len()));
            start += cell.len() + 1;
        }
        let [date, lot, decision, accept, tighter] = cells.as_slice() else {
            let what = format!("this line has {} cells, not 5", cells.len());
            self.fault(
                at,
                what,
                "date,lot,decision,accept,accepted_tighter; a lot number holds no comma",
            );
            return None;
        };
        let date = self.date(date);
        let outcome = self.outcome(decision);
        let accept = self.accept(accept, outcome);
        let accepted_tighter = self.tighter(tighter);
        if lot.0.is_empty() && outcome != Some(Outcome::Resumed) {
            self.fault(
                at,
                "the lot number is missing".to_owned(),
                "write it in the second cell",
            );
            return None;
        }
        Some(PastLot {
            date: date?,
            lot: printable(lot.0, &Alphabet::Any),
            outcome: outcome?,
            accept: accept?,
            accepted_tighter,
        })
    }

    fn date(&mut self, cell: &Cell<'_>) -> Option<Date> {
        let date = cell.0.parse::<Date>().ok();
        if date.is_none() {
            self.wrong(cell, "no date", "write it as 2026-11-30");
        }
        date
    }

    fn outcome(&mut self, cell: &Cell<'_>) -> Option<Outcome> {
        let outcome = match cell.0 {
            "accepted" => Some(Outcome::Accepted),
            "rejected" => Some(Outcome::Rejected),
            "undecided" => Some(Outcome::Undecided),
            "resumed" => Some(Outcome::Resumed),
            _ => None,
        };
        if outcome.is_none() {
            self.wrong(
                cell,
                "no decision",
                "one of: accepted, rejected, undecided, resumed",
            );
        }
        outcome
    }

    fn accept(&mut self, cell: &Cell<'_>, outcome: Option<Outcome>) -> Option<u64> {
        if cell.0.is_empty() && outcome == Some(Outcome::Resumed) {
            return Some(0);
        }
        let accept = cell.0.parse().ok();
        if accept.is_none() {
            self.wrong(
                cell,
                "no acceptance number",
                "write Ac of the lot's plan, a whole number",
            );
        }
        accept
    }

    /// Yes or no; the fault of another word is noted, and nothing is then read of the file.
    fn tighter(&mut self, cell: &Cell<'_>) -> Option<bool> {
        match cell.0 {
            "" => None,
            "yes" => Some(true),
            "no" => Some(false),
            _ => {
                self.wrong(
                    cell,
                    "neither yes nor no",
                    "yes, no, or empty where nobody noted it",
                );
                None
            }
        }
    }

    fn wrong(&mut self, cell: &Cell<'_>, what: &str, help: &str) {
        let found = printable(cell.0, &Alphabet::Any);
        self.fault(cell.1.clone(), format!("`{found}` is {what}"), help);
    }
}

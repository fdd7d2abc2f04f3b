//! What is odd in curves, as the result tells it, and what it moves in the row ledger.

use crate::curve::OddRows;
use crate::oddity::Odd;
use crate::record::{LedgerFacts, OddLines, Oddity, SetAside};

/// The kinds of odd rows, in the order cautions name them.
pub(super) const KINDS: [Odd; 11] = [
    Odd::Saturated,
    Odd::LoadSteps,
    Odd::TravelStuck,
    Odd::RowsMissing,
    Odd::ZeroShifted,
    Odd::LateStart,
    Odd::Stray,
    Odd::Doubled,
    Odd::LoadCoarse,
    Odd::TravelCoarse,
    Odd::Uneven,
];

/// The record's word for a kind.
pub(super) const fn oddity(what: Odd) -> Oddity {
    match what {
        Odd::Saturated => Oddity::Saturated,
        Odd::TravelStuck => Oddity::TravelStuck,
        Odd::Stray => Oddity::StrayReadings,
        Odd::Doubled => Oddity::RowsDoubled,
        Odd::RowsMissing => Oddity::RowsMissing,
        Odd::LoadSteps => Oddity::LoadSteps,
        Odd::ZeroShifted => Oddity::ZeroShifted,
        Odd::LateStart => Oddity::LateStart,
        Odd::LoadCoarse => Oddity::LoadCoarse,
        Odd::TravelCoarse => Oddity::TravelCoarse,
        Odd::Uneven => Oddity::UnevenSampling,
    }
}

/// Odd rows of a measurement of the export called `export`, for the record.
pub(super) fn lines(odd: &[OddRows], export: &str) -> Vec<OddLines> {
    odd.iter()
        .map(|rows| OddLines {
            what: oddity(rows.what),
            export: export.to_owned(),
            first_line: rows.first_line,
            last_line: rows.last_line,
        })
        .collect()
}

/// Why rows are set aside, as ledgers print it; `None` for those that stay points.
const fn reason(what: Odd) -> Option<&'static str> {
    match what {
        Odd::Saturated => Some("load cell at its end"),
        Odd::TravelStuck => Some("travel stuck"),
        Odd::Stray => Some("stray reading"),
        Odd::Doubled => Some("repeats the row before"),
        _ => None,
    }
}

/// Moves the rows that no figure holds from the points of `ledger` to the lines set aside; a row has one reason, the
/// first that was found.
pub(super) fn set_aside<'a>(ledger: &mut LedgerFacts, odd: impl Iterator<Item = &'a OddRows>) {
    let mut rows: Vec<(u64, u64, &str)> = odd
        .filter(|rows| rows.what.sets_aside())
        .filter_map(|rows| Some((rows.first_line, rows.last_line, reason(rows.what)?)))
        .collect();
    rows.sort_unstable();
    let mut free = 0;
    for (first, last_line, why) in rows {
        let first_line = first.max(free);
        if first_line > last_line {
            continue;
        }
        free = last_line + 1;
        ledger.points = ledger.points.saturating_sub(free - first_line);
        ledger.set_aside.push(SetAside {
            reason: why.to_owned(),
            first_line,
            last_line,
        });
    }
    ledger.set_aside.sort_by_key(|aside| aside.first_line);
}

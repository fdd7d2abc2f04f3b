//! What is odd in a spring's rows is recognised before they are corrected: rows that are no readings are set aside.

use crate::export::RawCurve;
use crate::oddity::{Odd, coarser, doubled, saturation, travel_jumps};
use crate::rig::Rig;

/// Lines of an export that are odd for one reason.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct OddRows {
    /// First such line.
    pub first_line: u64,
    /// Last such line.
    pub last_line: u64,
    /// What is odd.
    pub what: Odd,
}

/// A spring's rows, screened.
pub(super) struct Screened {
    /// What was found, in the order of the rows.
    pub(super) odd: Vec<OddRows>,
    /// Whether rows at the end of the load cell were set aside.
    pub(super) saturated: bool,
    /// The rows that are left; `None` where all are.
    pub(super) kept: Option<Vec<usize>>,
    /// The step loads come in, N: as stated, or as they really do.
    pub(super) load_resolution: f64,
    /// The step travel comes in, mm.
    pub(super) travel_resolution: f64,
}

/// Screens the rows of `raw`, whose travel is `u`.
pub(super) fn screen(raw: &RawCurve, u: &[f64], rig: &Rig) -> Screened {
    let stated = (rig.force.resolution.get(), rig.travel.resolution.get());
    let load_step = coarser(&raw.load, stated.0);
    let travel_step = coarser(&raw.travel, stated.1);
    let saturated = saturation(u, &raw.load, stated.0);
    let repeated = doubled(u, &raw.load, raw.time.as_deref());
    let mut aside: Vec<(usize, Odd)> = Vec::new();
    aside.extend(repeated.into_iter().map(|row| (row, Odd::Doubled)));
    aside.extend(travel_jumps(u).into_iter().map(|row| (row, Odd::Stray)));
    if let Some(found) = &saturated {
        aside.extend(found.rows.iter().map(|row| (*row, Odd::Saturated)));
    }
    aside.sort_by_key(|(row, _)| *row);
    aside.dedup_by_key(|(row, _)| *row);
    let mut odd: Vec<OddRows> = Vec::new();
    for (row, what) in &aside {
        note(&mut odd, *what, raw.line(*row));
    }
    let whole = |what| OddRows {
        first_line: raw.first_line,
        last_line: raw.line(raw.load.len().saturating_sub(1)),
        what,
    };
    odd.extend(load_step.map(|_| whole(Odd::LoadCoarse)));
    odd.extend(travel_step.map(|_| whole(Odd::TravelCoarse)));
    let left_out = |row: &usize| aside.binary_search_by_key(row, |(row, _)| *row).is_ok();
    let kept = (!aside.is_empty()).then(|| (0..u.len()).filter(|row| !left_out(row)).collect());
    Screened {
        odd,
        saturated: saturated.is_some(),
        kept,
        load_resolution: load_step.unwrap_or(stated.0),
        travel_resolution: travel_step.unwrap_or(stated.1),
    }
}

/// Notes an odd line; lines come in the order of the file, neighbours of one kind as one stretch.
fn note(odd: &mut Vec<OddRows>, what: Odd, line: u64) {
    match odd.last_mut() {
        Some(last) if last.what == what && last.last_line + 1 == line => last.last_line = line,
        _ => odd.push(OddRows {
            first_line: line,
            last_line: line,
            what,
        }),
    }
}

/// The values of the rows that are left.
pub(super) fn keep(values: Vec<f64>, kept: Option<&[usize]>) -> Vec<f64> {
    match kept {
        None => values,
        Some(rows) => rows
            .iter()
            .filter_map(|row| values.get(*row).copied())
            .collect(),
    }
}

//! The single-sampling tables of ISO 2859-1, as a rule and short tables; no arrows followed.
//! Source: ISO 2859-1:1999 Tables 1, 2-A, 2-B and 2-C; MIL-STD-105E (1989) Tables I, II-A and II-B. The reduced plans of
//! 1999, which have no gap between Ac and Re, from memory.
//! Elsewhere: following the arrows and what a plan lets through (`iso2859`).

use crate::drawing::State;

/// What is printed in one cell.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Cell {
    /// A plan with this acceptance number.
    Plan(u32),
    /// Use the first plan below.
    Down,
    /// Use the first plan above.
    Up,
}

/// Letters and sample sizes, top to bottom; I and O are not used. S exists under tightened inspection alone.
#[rustfmt::skip]
const SIZES: [(char, u32); 17] = [
    ('A', 2), ('B', 3), ('C', 5), ('D', 8), ('E', 13), ('F', 20), ('G', 32), ('H', 50),
    ('J', 80), ('K', 125), ('L', 200), ('M', 315), ('N', 500), ('P', 800), ('Q', 1250), ('R', 2000), ('S', 3150),
];
/// The same under reduced inspection.
#[rustfmt::skip]
const REDUCED: [(char, u32); 16] = [
    ('A', 2), ('B', 2), ('C', 2), ('D', 3), ('E', 5), ('F', 8), ('G', 13), ('H', 20),
    ('J', 32), ('K', 50), ('L', 80), ('M', 125), ('N', 200), ('P', 315), ('Q', 500), ('R', 800),
];
/// Rows A to R.
const ROWS: usize = 16;

/// Letters and sample sizes under `state`.
pub(super) fn sizes(state: State) -> &'static [(char, u32)] {
    match state {
        State::Normal => SIZES.get(..ROWS).unwrap_or(&SIZES),
        State::Tightened => &SIZES,
        State::Reduced => &REDUCED,
    }
}

/// Largest lot of a row and its letters for S-1, S-2, S-3, S-4, I, II, III.
#[rustfmt::skip]
pub(super) const LETTERS: [(u64, [char; 7]); 15] = [
    (8,         ['A', 'A', 'A', 'A', 'A', 'A', 'B']),
    (15,        ['A', 'A', 'A', 'A', 'A', 'B', 'C']),
    (25,        ['A', 'A', 'B', 'B', 'B', 'C', 'D']),
    (50,        ['A', 'B', 'B', 'C', 'C', 'D', 'E']),
    (90,        ['B', 'B', 'C', 'C', 'C', 'E', 'F']),
    (150,       ['B', 'B', 'C', 'D', 'D', 'F', 'G']),
    (280,       ['B', 'C', 'D', 'E', 'E', 'G', 'H']),
    (500,       ['B', 'C', 'D', 'E', 'F', 'H', 'J']),
    (1_200,     ['C', 'C', 'E', 'F', 'G', 'J', 'K']),
    (3_200,     ['C', 'D', 'E', 'G', 'H', 'K', 'L']),
    (10_000,    ['C', 'D', 'F', 'G', 'J', 'L', 'M']),
    (35_000,    ['C', 'D', 'F', 'H', 'K', 'M', 'N']),
    (150_000,   ['D', 'E', 'G', 'J', 'L', 'N', 'P']),
    (500_000,   ['D', 'E', 'G', 'J', 'M', 'P', 'Q']),
    (u64::MAX,  ['D', 'E', 'H', 'K', 'N', 'Q', 'R']),
];

/// The cell in row `row` (A = 0 … R = 15, S = 16) and column `column` (AQL 0.010 = 0 … 10 = 15).
///
/// Each table is the same along every falling diagonal, since sample sizes and AQLs climb by the same steps: only
/// row + column counts. An arrow that leads out of the table is printed the other way round (A at 10, R at 0.015).
pub(super) fn cell(state: State, row: usize, column: usize) -> Cell {
    let diagonal = row + column;
    let last = row == ROWS - 1;
    match state {
        State::Normal | State::Reduced => match diagonal {
            16 if last => Cell::Up,
            15 if row == 0 => Cell::Down,
            14 => Cell::Plan(0),
            17..=24 => Cell::Plan(accept(state, diagonal - 17)),
            ..14 | 16 => Cell::Down,
            15 | 25.. => Cell::Up,
        },
        State::Tightened => match diagonal {
            16 if last => Cell::Up,
            15 => Cell::Plan(0),
            18..=24 => Cell::Plan(accept(state, diagonal - 18)),
            ..15 | 16 | 17 => Cell::Down,
            25.. => Cell::Up,
        },
    }
}

/// Acceptance numbers along the diagonals from 1 up.
fn accept(state: State, place: usize) -> u32 {
    let along: &[u32] = match state {
        State::Normal => &[1, 2, 3, 5, 7, 10, 14, 21],
        State::Tightened => &[1, 2, 3, 5, 8, 12, 18],
        State::Reduced => &[1, 1, 2, 3, 5, 6, 8, 10],
    };
    along.get(place).copied().unwrap_or(0) // never: the caller stays inside
}

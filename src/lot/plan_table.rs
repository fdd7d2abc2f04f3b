//! The single-sampling table for normal inspection, as a rule and two short tables; no arrows followed.
//! Source: ISO 2859-1:1999 Tables 1 and 2-A; MIL-STD-105E (1989) Tables I and II-A.
//! Elsewhere: following the arrows and what a plan lets through (`plan`).

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

/// Letters and sample sizes, top to bottom; I and O are not used.
#[rustfmt::skip]
pub(super) const SIZES: [(char, u32); 16] = [
    ('A', 2), ('B', 3), ('C', 5), ('D', 8), ('E', 13), ('F', 20), ('G', 32), ('H', 50),
    ('J', 80), ('K', 125), ('L', 200), ('M', 315), ('N', 500), ('P', 800), ('Q', 1250), ('R', 2000),
];

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

/// The cell in row `row` (A = 0 … R = 15) and column `column` (AQL 0.010 = 0 … 10 = 15).
///
/// The table is the same along every falling diagonal, since sample sizes and AQLs climb by the same steps: only
/// row + column counts. An arrow that leads out of the table is printed the other way round (A at 10, R at 0.015).
pub(super) fn cell(row: usize, column: usize) -> Cell {
    match row + column {
        16 if row == SIZES.len() - 1 => Cell::Up,
        15 if row == 0 => Cell::Down,
        14 => Cell::Plan(0),
        17 => Cell::Plan(1),
        18 => Cell::Plan(2),
        19 => Cell::Plan(3),
        20 => Cell::Plan(5),
        21 => Cell::Plan(7),
        22 => Cell::Plan(10),
        23 => Cell::Plan(14),
        24 => Cell::Plan(21),
        ..14 | 16 => Cell::Down,
        15 | 25.. => Cell::Up,
    }
}

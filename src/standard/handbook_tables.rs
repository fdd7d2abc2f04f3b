//! Machinery's Handbook, 31st ed., tables 8, 10 and 11: free length, squareness and load of springs coiled cold, closed and ground.

/// One printed row: where it stands, its first printed column (counted from 0), and its cells from there on.
pub(super) struct Row(f64, usize, &'static [f64]);

/// A printed table.
pub(super) struct Printed {
    columns: &'static [f64],
    rows: &'static [Row],
    /// What the cells are straight in between two columns.
    along: fn(f64) -> f64,
}

/// Printed indices C.
const INDICES: [f64; 7] = [4.0, 6.0, 8.0, 10.0, 12.0, 14.0, 16.0];

/// ± inch for each inch of free length, by active coils to the inch and index.
#[rustfmt::skip] // keeps the table a table
pub(super) const TABLE_8: Printed = Printed { columns: &INDICES, along: itself, rows: &[
    Row(0.5, 0, &[0.010, 0.011, 0.012, 0.013, 0.015, 0.016, 0.016]),
    Row(1.0, 0, &[0.011, 0.013, 0.015, 0.016, 0.017, 0.018, 0.019]),
    Row(2.0, 0, &[0.013, 0.015, 0.017, 0.019, 0.020, 0.022, 0.023]),
    Row(4.0, 0, &[0.016, 0.018, 0.021, 0.023, 0.024, 0.026, 0.027]),
    Row(8.0, 0, &[0.019, 0.022, 0.024, 0.026, 0.028, 0.030, 0.032]),
    Row(12.0, 0, &[0.021, 0.024, 0.027, 0.030, 0.032, 0.034, 0.036]),
    Row(16.0, 0, &[0.022, 0.026, 0.029, 0.032, 0.034, 0.036, 0.038]),
    Row(20.0, 0, &[0.023, 0.027, 0.031, 0.034, 0.036, 0.038, 0.040]),
] };

/// Squareness, degrees, by L0/D and index.
#[rustfmt::skip] // keeps the table a table
pub(super) const TABLE_10: Printed = Printed { columns: &INDICES, along: itself, rows: &[
    Row(0.5, 0, &[3.0, 3.0, 3.5, 3.5, 3.5, 3.5, 4.0]),
    Row(1.0, 0, &[2.5, 3.0, 3.0, 3.0, 3.0, 3.5, 3.5]),
    Row(1.5, 0, &[2.5, 2.5, 2.5, 3.0, 3.0, 3.0, 3.0]),
    Row(2.0, 0, &[2.5, 2.5, 2.5, 2.5, 3.0, 3.0, 3.0]),
    Row(3.0, 0, &[2.0, 2.5, 2.5, 2.5, 2.5, 2.5, 3.0]),
    Row(4.0, 0, &[2.0, 2.0, 2.5, 2.5, 2.5, 2.5, 2.5]),
    Row(6.0, 0, &[2.0, 2.0, 2.0, 2.5, 2.5, 2.5, 2.5]),
    Row(8.0, 0, &[2.0, 2.0, 2.0, 2.0, 2.5, 2.5, 2.5]),
    Row(10.0, 0, &[2.0, 2.0, 2.0, 2.0, 2.0, 2.5, 2.5]),
    Row(12.0, 0, &[2.0, 2.0, 2.0, 2.0, 2.0, 2.0, 2.5]),
] };

/// ± % of the load, by the tolerance of the free length (± inch, table 8) and the deflection from the free length (inch).
#[rustfmt::skip] // keeps the table a table
pub(super) const TABLE_11: Printed = Printed {
    columns: &[0.05, 0.10, 0.15, 0.20, 0.25, 0.30, 0.40, 0.50, 0.75, 1.00, 1.50, 2.00, 3.00, 4.00, 6.00],
    along: f64::recip,
    rows: &[
        Row(0.005, 0, &[12.0, 7.0, 6.0, 5.0]),
        Row(0.010, 1, &[12.0, 8.5, 7.0, 6.5, 5.5, 5.0]),
        Row(0.020, 1, &[22.0, 15.5, 12.0, 10.0, 8.5, 7.0, 6.0, 5.0]),
        Row(0.030, 2, &[22.0, 17.0, 14.0, 12.0, 9.5, 8.0, 6.0, 5.0]),
        Row(0.040, 3, &[22.0, 18.0, 15.5, 12.0, 10.0, 7.5, 6.0, 5.0]),
        Row(0.050, 4, &[22.0, 19.0, 14.5, 12.0, 9.0, 7.0, 5.5]),
        Row(0.060, 4, &[25.0, 22.0, 17.0, 14.0, 10.0, 8.0, 6.0, 5.0]),
        Row(0.070, 5, &[25.0, 19.5, 16.0, 11.0, 9.0, 6.5, 5.5]),
        Row(0.080, 6, &[22.0, 18.0, 12.5, 10.0, 7.5, 6.0, 5.0]),
        Row(0.090, 6, &[25.0, 20.0, 14.0, 11.0, 8.0, 6.0, 5.0]),
        Row(0.100, 7, &[22.0, 15.5, 12.0, 8.5, 7.0, 5.5]),
        Row(0.200, 9, &[22.0, 15.5, 12.0, 8.5, 7.0, 5.5]),
        Row(0.300, 10, &[22.0, 17.0, 12.0, 9.5, 7.0]),
        Row(0.400, 11, &[21.0, 15.0, 12.0, 8.5]),
        Row(0.500, 11, &[25.0, 18.5, 14.5, 10.5]),
    ],
};

/// A size converted from millimetres may miss a printed step by rounding.
const ROUNDING: f64 = 1e-9;

const fn itself(value: f64) -> f64 {
    value
}

/// A figure of a table.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Cell {
    pub(super) value: f64,
    /// Whether it lies between printed cells.
    pub(super) between: bool,
}

impl Printed {
    /// The cell at `row` and `column`, or what lies straight between its printed neighbours; `None` where one of them is not
    /// printed.
    pub(super) fn at(&self, row: f64, column: f64) -> Option<Cell> {
        let rows: Vec<f64> = self.rows.iter().map(|Row(at, ..)| *at).collect();
        let (down, across) = (
            weights(&rows, row, itself)?,
            weights(self.columns, column, self.along)?,
        );
        let mut value = 0.0;
        let mut cells = 0_u8;
        for (row, down) in down.into_iter().filter(|(_, weight)| *weight > 0.0) {
            let Row(_, first, printed) = self.rows.get(row)?;
            for (column, across) in across.into_iter().filter(|(_, weight)| *weight > 0.0) {
                value += down * across * printed.get(column.checked_sub(*first)?)?;
                cells += 1;
            }
        }
        Some(Cell {
            value,
            between: cells > 1,
        })
    }
}

/// The two steps about `value` and how much each counts; a step that is met counts alone.
fn weights(steps: &[f64], value: f64, along: fn(f64) -> f64) -> Option<[(usize, f64); 2]> {
    let met = |step: &f64| (value - step).abs() <= ROUNDING * step;
    if let Some(place) = steps.iter().position(met) {
        return Some([(place, 1.0), (place, 0.0)]);
    }
    let upper = steps.iter().position(|step| value < *step)?;
    let lower = upper.checked_sub(1)?;
    let (from, to) = (along(*steps.get(lower)?), along(*steps.get(upper)?));
    let share = (along(value) - from) / (to - from);
    Some([(lower, 1.0 - share), (upper, share)])
}

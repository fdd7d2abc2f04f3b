//! EN 15800: tolerances of the coil diameters De, D and Di.

/// One row: ± mm by grade and by index 4 to 8, 8 to 14, 14 to 20.
struct Row {
    /// Largest mean coil diameter D, mm: "over … to", the upper bound included.
    up_to: f64,
    /// ± mm, by grade, then by index.
    grades: [[f64; 3]; 3],
    /// Cells that are from memory, counted from 0 along the row.
    memory: &'static [usize],
}

#[rustfmt::skip] // keeps the table a table
const ROWS: [Row; 17] = [
    Row { up_to: 1.0, grades: [[0.05, 0.07, 0.10], [0.07, 0.10, 0.15], [0.10, 0.15, 0.20]], memory: &[] },
    Row { up_to: 1.6, grades: [[0.05, 0.07, 0.10], [0.08, 0.10, 0.15], [0.15, 0.20, 0.30]], memory: &[] },
    Row { up_to: 2.5, grades: [[0.07, 0.10, 0.15], [0.10, 0.15, 0.20], [0.20, 0.30, 0.40]], memory: &[] },
    Row { up_to: 4.0, grades: [[0.10, 0.10, 0.15], [0.15, 0.20, 0.25], [0.30, 0.40, 0.50]], memory: &[] },
    Row { up_to: 6.3, grades: [[0.10, 0.15, 0.20], [0.20, 0.25, 0.30], [0.40, 0.50, 0.60]], memory: &[] },
    Row { up_to: 10.0, grades: [[0.15, 0.15, 0.20], [0.25, 0.30, 0.35], [0.50, 0.60, 0.70]], memory: &[] },
    Row { up_to: 16.0, grades: [[0.15, 0.20, 0.25], [0.30, 0.35, 0.40], [0.60, 0.70, 0.80]], memory: &[] },
    Row { up_to: 25.0, grades: [[0.20, 0.25, 0.30], [0.35, 0.45, 0.50], [0.70, 0.90, 1.00]], memory: &[] },
    Row { up_to: 31.5, grades: [[0.25, 0.30, 0.35], [0.40, 0.50, 0.60], [0.80, 1.00, 1.20]], memory: &[] },
    Row { up_to: 40.0, grades: [[0.25, 0.30, 0.35], [0.50, 0.60, 0.70], [1.00, 1.20, 1.50]], memory: &[] },
    Row { up_to: 50.0, grades: [[0.30, 0.40, 0.50], [0.60, 0.80, 0.90], [1.20, 1.50, 1.80]], memory: &[] },
    Row { up_to: 63.0, grades: [[0.40, 0.50, 0.60], [0.80, 1.00, 1.10], [1.50, 2.00, 2.30]], memory: &[] },
    Row { up_to: 80.0, grades: [[0.50, 0.70, 0.80], [1.00, 1.20, 1.40], [1.80, 2.40, 2.80]], memory: &[1, 2, 6, 7, 8] },
    Row { up_to: 100.0, grades: [[0.60, 0.80, 0.90], [1.20, 1.50, 1.70], [2.30, 3.00, 3.50]], memory: &[0, 1, 2, 6, 7, 8] },
    Row { up_to: 125.0, grades: [[0.70, 1.00, 1.10], [1.40, 1.90, 2.20], [2.80, 3.70, 4.40]], memory: &[0, 1, 2, 6, 7, 8] },
    Row { up_to: 160.0, grades: [[0.90, 1.20, 1.40], [1.80, 2.30, 2.70], [3.50, 4.60, 5.40]], memory: &[0, 1, 2, 6, 7, 8] },
    Row { up_to: 200.0, grades: [[1.20, 1.50, 1.70], [2.10, 2.90, 3.30], [4.20, 5.70, 6.60]], memory: &[0, 1, 2, 6, 7, 8] },
];

/// Largest index of each column, included.
const INDICES: [f64; 3] = [8.0, 14.0, 20.0];
/// A size converted from inches may miss a bound by rounding.
const ROUNDING: f64 = 1.0 + 1e-9;

fn cell(coil: f64, index: f64, grade: usize) -> Option<(f64, bool)> {
    let row = ROWS.iter().find(|row| coil <= row.up_to * ROUNDING)?;
    let column = INDICES.iter().position(|up_to| index <= up_to * ROUNDING)?;
    let grade = grade.checked_sub(1)?;
    let value = row.grades.get(grade)?.get(column)?;
    Some((*value, row.memory.contains(&(3 * grade + column))))
}

/// ± mm for a mean coil diameter D (mm, 0.63 to 200), an index (4 to 20) and a grade (1 to 3).
pub(super) fn coil(coil: f64, index: f64, grade: usize) -> Option<f64> {
    cell(coil, index, grade).map(|(value, _)| value)
}

/// Whether that cell is from memory.
pub(super) fn from_memory(coil: f64, index: f64, grade: usize) -> bool {
    cell(coil, index, grade).is_some_and(|(_, memory)| memory)
}

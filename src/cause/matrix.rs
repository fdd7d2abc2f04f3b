//! A covariance taken apart (Cholesky), row by row.

/// Share of a variance that the rows above may leave of it: less is rounding.
const SINGULAR: f64 = 1e-14;

/// The lower factor, each row ending on the diagonal.
pub(super) struct Factor(Vec<Vec<f64>>);

impl Factor {
    /// Of a symmetric matrix given by rows; `None` where it is not positive definite.
    pub(super) fn of(rows: &[Vec<f64>]) -> Option<Self> {
        let mut lower: Vec<Vec<f64>> = Vec::with_capacity(rows.len());
        for (i, row) in rows.iter().enumerate() {
            let mut new: Vec<f64> = Vec::with_capacity(i + 1);
            for (value, above) in row.iter().zip(&lower) {
                let rest = value - dot(&new, above);
                new.push(rest / above.last()?);
            }
            let square = row.get(i)? - dot(&new, &new);
            if square.is_nan() || square <= SINGULAR * row.get(i)? {
                return None;
            }
            new.push(square.sqrt());
            lower.push(new);
        }
        Some(Self(lower))
    }

    /// `L⁻¹·v`.
    pub(super) fn whiten(&self, values: &[f64]) -> Vec<f64> {
        let mut found: Vec<f64> = Vec::with_capacity(values.len());
        for (value, row) in values.iter().zip(&self.0) {
            let rest = value - dot(&found, row);
            found.push(rest / row.last().copied().unwrap_or(f64::NAN));
        }
        found
    }

    /// ln of the determinant of the whole matrix.
    pub(super) fn ln_determinant(&self) -> f64 {
        let diagonal = self.0.iter().filter_map(|row| row.last());
        2.0 * diagonal.map(|value| value.ln()).sum::<f64>()
    }
}

/// Sum of products, as far as the shorter goes.
pub(super) fn dot(a: &[f64], b: &[f64]) -> f64 {
    a.iter().zip(b).map(|(x, y)| x * y).sum()
}

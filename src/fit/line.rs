//! Ordinary least squares of y on x.
//! Here: the line, its standard errors and residuals for independent errors of one size.
//! Elsewhere: errors that hang together (`type_a`), a line that is none (`lack`).

use super::FitError;
use crate::stats::mean;

/// A fitted straight line y = intercept + slope·x. Units: those of x and y, the slope in y per x.
///
/// Standard errors are the textbook ones, for independent errors.
#[derive(Clone, Debug, PartialEq)]
pub struct LineFit {
    /// Slope, y per x.
    pub slope: f64,
    /// Value of the line at x = 0.
    pub intercept: f64,
    /// Number of points.
    pub count: usize,
    /// Standard error of the slope, s/√Sxx.
    pub slope_error: f64,
    /// Standard error of the intercept, s√(1/n + x̄²/Sxx).
    pub intercept_error: f64,
    /// Residual standard deviation s with n − 2 degrees of freedom, in y.
    pub residual_sd: f64,
    /// y minus the line, in the order of the points.
    pub residuals: Vec<f64>,
    /// Mean of the abscissae.
    pub x_mean: f64,
    /// Mean of the ordinates.
    pub y_mean: f64,
    /// Sum of squares of the abscissae about their mean.
    pub sxx: f64,
    /// Share of the variation of y that the line explains; `None` where y does not vary.
    pub r_squared: Option<f64>,
}

impl LineFit {
    /// Fits y on x by least squares, through `linreg`.
    ///
    /// Both are centred first: `linreg` sums as it finds them, and the digits of a small slope far from the origin
    /// would be lost. What it would not refuse is refused here before: it takes three points at one abscissa and
    /// returns a slope made of rounding.
    ///
    /// # Errors
    /// [`FitError::LengthsDiffer`], [`FitError::NotFinite`], [`FitError::TooFewAbscissae`] under three distinct
    /// abscissae, [`FitError::OutOfRange`] where a figure of the line would not be finite, [`FitError::Refused`].
    pub fn through(x: &[f64], y: &[f64]) -> Result<Self, FitError> {
        check(x, y)?;
        let x_mean = mean(x).ok_or(FitError::OutOfRange)?;
        let y_mean = mean(y).ok_or(FitError::OutOfRange)?;
        let across: Vec<f64> = x.iter().map(|x| x - x_mean).collect();
        let up: Vec<f64> = y.iter().map(|y| y - y_mean).collect();
        let slope = centred_slope(&across, &up)?;
        let residuals: Vec<f64> = across.iter().zip(&up).map(|(u, v)| v - slope * u).collect();
        let (sxx, sse) = (squares(&across), squares(&residuals));
        let n = x.len() as f64;
        let residual_sd = (sse / (n - 2.0)).sqrt();
        let line = Self {
            slope,
            intercept: y_mean - slope * x_mean,
            count: x.len(),
            slope_error: residual_sd / sxx.sqrt(),
            intercept_error: residual_sd * (1.0 / n + x_mean * x_mean / sxx).sqrt(),
            residual_sd,
            residuals,
            x_mean,
            y_mean,
            sxx,
            r_squared: Some(1.0 - sse / squares(&up)).filter(|share| share.is_finite()),
        };
        line.is_finite().then_some(line).ok_or(FitError::OutOfRange)
    }

    /// Value of the line at `x`, in y.
    pub fn at(&self, x: f64) -> f64 {
        self.y_mean + self.slope * (x - self.x_mean)
    }

    /// Standard error of the line's value at `x`, in y, s√(1/n + (x − x̄)²/Sxx); a new reading's would add s² under the
    /// root.
    pub fn mean_error_at(&self, x: f64) -> f64 {
        let leverage = 1.0 / self.count as f64 + (x - self.x_mean).powi(2) / self.sxx;
        self.residual_sd * leverage.sqrt()
    }

    fn is_finite(&self) -> bool {
        let figures = [
            self.slope,
            self.intercept,
            self.slope_error,
            self.intercept_error,
            self.residual_sd,
            self.sxx,
        ];
        figures.iter().all(|figure| figure.is_finite())
    }
}

/// `linreg` on centred points; their intercept is 0 but for rounding.
fn centred_slope(across: &[f64], up: &[f64]) -> Result<f64, FitError> {
    match linreg::linear_regression::<f64, f64, f64>(across, up) {
        Ok((slope, _)) => Ok(slope),
        Err(error) => Err(FitError::Refused {
            reason: error.to_string(),
        }),
    }
}

fn squares(values: &[f64]) -> f64 {
    values.iter().map(|value| value * value).sum()
}

/// Finite points, as many x as y, at three or more abscissae.
fn check(x: &[f64], y: &[f64]) -> Result<(), FitError> {
    if x.len() != y.len() {
        return Err(FitError::LengthsDiffer {
            x: x.len(),
            y: y.len(),
        });
    }
    let bad = |(x, y): (&f64, &f64)| !(x.is_finite() && y.is_finite());
    if let Some(index) = x.iter().zip(y).position(bad) {
        return Err(FitError::NotFinite { point: index + 1 });
    }
    let (Some(low), Some(high)) = (
        x.iter().copied().reduce(f64::min),
        x.iter().copied().reduce(f64::max),
    ) else {
        return Err(FitError::TooFewAbscissae { found: 0 });
    };
    let between = x.iter().any(|&x| low < x && x < high);
    match (low < high, between) {
        (true, true) => Ok(()),
        (true, false) => Err(FitError::TooFewAbscissae { found: 2 }),
        (false, _) => Err(FitError::TooFewAbscissae { found: 1 }),
    }
}

//! Distributions, quantiles and estimators with no idea of springs. Imports nothing from this crate.
//! Here: everything that asks `statrs`, sample figures, series with a lag, robust slopes.
//! Elsewhere: the fitted line and its uncertainty (`fit`), coverage factors (`characteristic`).

mod distributions;
mod error;
mod robust;
mod sample;
mod series;

pub use distributions::{
    Dof, binomial_cdf, f_upper_tail, normal_cdf, normal_quantile, student_cdf, student_quantile,
};
pub use error::StatsError;
pub use robust::incomplete_theil_slope;
pub use sample::{mean, median, standard_deviation};
pub use series::{corrected_lag1, effective_n, lag1, mean_inflation, slope_inflation};

//! Distributions, quantiles and estimators with no idea of springs. Imports nothing from this crate.
//! Here: everything that asks `statrs`, sample figures, series with a lag, robust slopes.
//! Elsewhere: the fitted line and its uncertainty (`fit`), coverage factors (`characteristic`).

mod capability;
mod chi_square;
mod distributions;
mod error;
mod noncentral;
mod normality;
mod numeric;
mod proportion;
mod robust;
mod sample;
mod series;
mod tolerance;

pub use capability::{cp_bounds, cpk_bounds, distance_bounds, spread_factors};
pub use chi_square::{chi_square_quantile, chi_square_upper};
pub use distributions::{
    Dof, binomial_cdf, f_upper_tail, normal_cdf, normal_quantile, student_cdf, student_quantile,
};
pub use error::StatsError;
pub use noncentral::{noncentral_cdf, noncentral_quantile, noncentrality};
pub use normality::{FEWEST, Normality, anderson_darling, grubbs_critical, grubbs_outlier};
pub use proportion::{clopper_pearson, none_drawn, share_beyond};
pub use robust::incomplete_theil_slope;
pub use sample::{mean, median, standard_deviation};
pub use series::{corrected_lag1, effective_n, lag1, mean_inflation, slope_inflation};
pub use tolerance::{one_sided_factor, two_sided_factor};

use distributions::finite as proper;

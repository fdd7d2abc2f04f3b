//! A straight line through points, and how far it can be trusted. Imports `stats` only.
//! Here: least squares by `linreg`, type A uncertainty, lack of fit, the two-point slope.
//! Elsewhere: which points (`curve`), what the slope means and its other uncertainties (`characteristic`).

mod error;
mod hinge;
mod lack;
mod line;
mod segmented;
mod two_point;
mod type_a;

pub use error::FitError;
pub use lack::{LackKind, LackOfFit, lack_of_fit};
pub use line::LineFit;
pub use segmented::{Segmented, segmented};
pub use two_point::two_point_slope;
pub use type_a::{TypeA, type_a};

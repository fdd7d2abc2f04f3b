//! One spring's points after correction: contact, empty-platen zero, frame compliance, strokes, the
//! window's bounds, the rise to solid, and the curve thinned for drawing; or, where there is no curve, its readings.
//! Inside this room travel is one coordinate `u` in mm that grows with compression: the deflection, or
//! minus the length. Elsewhere: the fit (`fit`), what is judged (`characteristic`).

mod contact;
mod correct;
mod error;
mod inspect;
mod kept;
mod path;
mod readings;
mod reduced;
mod screen;
mod site;
mod solid;
mod strokes;
mod window;

pub use contact::Contact;
pub use correct::{Curve, Frame, Zero, correct};
pub use error::CurveError;
pub use kept::{Kept, KeptPoint, kept_points};
pub use path::{Node, Path, Side};
pub use readings::{PointReading, Readings, SAME_LENGTH, readings};
pub use reduced::{Axis, MOST_POINTS, Reduced, thin};
pub use screen::OddRows;
pub use solid::Rise;
pub use strokes::{Stroke, Strokes, split};
pub use window::{Bounds, WindowMiss, WindowOf, full_load, nominal_rate, window_of};

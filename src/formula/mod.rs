//! Formulas of helical compression springs of round wire, each with its source. Pure: mm, N, MPa, coils in, figures out.
//! Elsewhere: what the drawing says (`drawing`), what follows from it (`review`), what is tabled of materials (`material`).

mod coils;
mod helical;
mod motion;
mod stability;

pub use coils::{Ends, Forming, pitch, smallest_gaps, solid_length};
pub use helical::{Stress, energy, rate, stress};
pub use motion::{growth_held, growth_turning, mass, natural_frequency};
pub use stability::{Buckling, Seating, buckling};

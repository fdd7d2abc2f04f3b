//! Springs as drawn, alone or together: sizes, material, and what theory expects of them.
//! Here: rate by stages, loads, lengths, uncertainty. Elsewhere: formulas (`formula`), the file that says it (`drawing`).

mod build;
mod member;
mod spread;
mod theory;

pub use build::theory;
pub use member::{Arrangement, Coil, Hand, Member, OtherCoil, Sized};
pub use spread::Spread;
pub use theory::{MemberTheory, Stage, Theory, TheoryError};

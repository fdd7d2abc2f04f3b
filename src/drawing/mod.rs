//! The drawing as opened: geometry, material, limits, its stated terms, and the theory of the drawn spring.
//! Here: what the drawing says and what follows from it before anything is measured.
//! Elsewhere: what the window does to a curve (`curve`), what the rule does to a value (`verdict`),
//! what the plan does to a lot (`lot`).

mod limits;
mod material;
mod member;
mod open;
mod read_plan;
mod read_terms;
mod requirements;
mod terms;
mod theory;

pub use limits::{CLASSES, Limits, Requirement, read_limits};
pub use material::{FAMILIES, Family, Shear, family};
pub use member::{Coil, Ends, Member, Sized};
pub use open::{Arrangement, Drawing, KEYS, open, read_units};
pub use terms::{
    AQLS, AQLS_414, Acceptance, Aqls, Guard, Level, Level414, Method, PlanTerms, Policy, RateTest,
    Rule, State, Stroke, Way, Window,
};
pub use theory::{MemberTheory, Stress, Theory, TheoryError, rate, solid_length, stress, theory};

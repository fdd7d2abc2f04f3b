//! The drawing as opened: springs, limits, its stated terms, and the theory of the drawn springs.
//! Here: what the drawing says. Elsewhere: what theory makes of it (`spring`), whether it agrees with itself (`review`),
//! what the window does to a curve (`curve`), what the rule does to a value (`verdict`), what the plan does to a lot (`lot`).

mod by_standard;
mod limits;
mod open;
mod read_member;
mod read_plan;
mod read_terms;
mod requirements;
mod service;
mod stages;
mod terms;

pub use limits::{CLASSES, Limits, Requirement, read_limits};
pub use open::{Drawing, KEYS, open, read_units};
pub use service::Service;
pub use terms::{
    AQLS, AQLS_414, Acceptance, Aqls, Guard, Level, Level414, Method, PlanTerms, Policy, RateTest,
    Rule, State, Stroke, Way, Window,
};

pub use crate::spring::{
    Arrangement, Coil, Hand, Member, MemberTheory, OtherCoil, Sized, Stage, Theory, TheoryError,
};

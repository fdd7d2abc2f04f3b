//! Whether the drawing agrees with itself, and what its springs will bear, before anything is measured.
//! Here: tests on the drawing with the reading that would fit, strength against permissible stress, fatigue, what a nest
//! and a stack do. Elsewhere: theory (`spring`), formulas (`formula`), the words (`wording`).

mod fatigue;
mod finding;
mod lengths;
mod loads;
mod members;
mod nest;
mod rate;
mod readings;
mod strength;

pub use fatigue::{Fatigue, FatigueMargin};
pub use finding::{Basis, DrawingFinding, Fitting, Needed, ReadAs, Weight};
pub use members::{Outlook, SpringBuckling};
pub use nest::Clearance;
pub use strength::{Permissible, StrengthGap, StrengthLine, StressPlace};

use crate::drawing::Drawing;

/// Everything that the drawing alone says of its springs.
#[derive(Clone, Debug)]
pub struct Review {
    /// What does not agree, contradictions first.
    pub findings: Vec<DrawingFinding>,
    /// Stresses held against what the wire bears.
    pub strength: Vec<StrengthLine>,
    /// Where no stress can be held against anything, and why.
    pub strength_gaps: Vec<StrengthGap>,
    /// Fatigue, for a stated load range.
    pub fatigue: Vec<Fatigue>,
    /// Buckling, frequency, growth, one for each member.
    pub outlooks: Vec<Outlook>,
    /// Radial clearance between neighbours of a nest, from the outside in.
    pub clearances: Vec<Clearance>,
    /// Members in the order in which they would go solid.
    pub solid_order: Vec<String>,
}

/// Reviews a drawing.
pub fn review(drawing: &Drawing) -> Review {
    let (strength, strength_gaps) = strength::all(drawing);
    let fatigue = fatigue::all(drawing);
    let outlooks = members::all(drawing);
    let clearances = nest::clearances(drawing);
    let mut findings = rate::findings(drawing);
    findings.extend(loads::findings(drawing));
    findings.extend(lengths::findings(drawing));
    findings.extend(members::findings(drawing, &outlooks));
    findings.extend(strength::findings(&strength));
    findings.extend(fatigue::findings(&fatigue));
    findings.extend(nest::findings(drawing, &clearances));
    findings.sort_by_key(|one| one.weight() != Weight::Contradicts); // stable: the order of the tests is kept
    Review {
        findings,
        strength,
        strength_gaps,
        fatigue,
        outlooks,
        clearances,
        solid_order: nest::solid_order(drawing),
    }
}

//! What the drawn springs should do together: rate by stages, loads, lengths, and the uncertainty the drawing leaves.
//! Elsewhere: the formulas (`formula`), whether the drawing agrees with itself (`review`).

use crate::units::{Millimetres, NewtonsPerMillimetre};

use super::member::Arrangement;
use super::spread::Spread;

/// Why theory has no answer.
#[derive(Clone, Debug, PartialEq, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum TheoryError {
    #[error("the theory of spring `{member}` gives no finite number")]
    #[diagnostic(
        code(coilassay::drawing::theory),
        help("check wire, coil diameter and coils: one of them is far out")
    )]
    OutOfRange { member: String },
    #[error(
        "the smallest permitted length {smallest:.2} mm is not below the free length {free:.2} mm"
    )]
    #[diagnostic(
        code(coilassay::drawing::no_travel),
        help("this spring has no travel: check total coils, wire diameter and free length")
    )]
    NoTravel { smallest: f64, free: f64 },
    #[error(
        "spring `{member}` with free length {free:.2} mm is never touched: the set may be compressed to {smallest:.2} mm only"
    )]
    #[diagnostic(
        code(coilassay::drawing::never_touched),
        help("check the free lengths of the set, and the coils of its longest member at solid")
    )]
    NeverTouched {
        member: String,
        free: f64,
        smallest: f64,
    },
}

/// The theory of one member.
#[derive(Clone, Debug, PartialEq)]
pub struct MemberTheory {
    /// Rate of this member.
    pub rate: NewtonsPerMillimetre,
    /// Its share of the set's load where all members carry (1 for each of a stack), 0 … 1.
    pub share: f64,
    /// Index w = D/d.
    pub index: f64,
    /// Mean coil diameter D, mm.
    pub coil: Millimetres,
    /// Its own free length L0.
    pub free: Millimetres,
    /// Solid length Lc.
    pub solid: Millimetres,
    /// Smallest permitted test length Ln = Lc + Sa.
    pub smallest: Millimetres,
}

/// A stretch of lengths over which the same members carry.
#[derive(Clone, Debug, PartialEq)]
pub struct Stage {
    /// The length at which it begins: the free length of the set, or the free length of the next member.
    pub from: Millimetres,
    /// Rate.
    pub rate: NewtonsPerMillimetre,
    /// Its uncertainty and worst case.
    pub spread: Spread,
}

/// The theory of the whole drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Theory {
    /// How the members stand together.
    pub arrangement: Arrangement,
    /// Rate of the set where all members carry.
    pub rate: NewtonsPerMillimetre,
    /// Standard uncertainty of that rate, N/mm, from the tolerances as drawn.
    pub standard_uncertainty: f64,
    /// The lowest rate the tolerances allow.
    pub lowest: NewtonsPerMillimetre,
    /// The highest.
    pub highest: NewtonsPerMillimetre,
    /// Free length of the set: its longest member's, or a stack's sum.
    pub free: Millimetres,
    /// Solid length of the set: that of the member that goes solid first, or a stack's sum.
    pub solid: Millimetres,
    /// Smallest permitted test length of the set.
    pub smallest: Millimetres,
    /// The members, in the order of the drawing.
    pub members: Vec<MemberTheory>,
    /// The stages, from the free length on; one for a single spring, a stack, or members of equal free length.
    pub stages: Vec<Stage>,
}

impl Theory {
    /// Load of the set at a length (mm), N; 0 above the free length.
    pub fn load_at(&self, length: f64) -> f64 {
        match self.arrangement {
            Arrangement::Stacked => self.rate.get() * (self.free.get() - length).max(0.0),
            Arrangement::Single | Arrangement::Nested => self
                .members
                .iter()
                .map(|one| one.rate.get() * (one.free.get() - length).max(0.0))
                .sum(),
        }
    }

    /// Deflection (mm) and load (N) of one of `members` where the set has this length (mm).
    pub fn member_at(&self, member: &MemberTheory, length: f64) -> (f64, f64) {
        let rate = member.rate.get();
        if self.arrangement == Arrangement::Stacked {
            let load = self.load_at(length);
            return (load / rate, load);
        }
        let deflection = (member.free.get() - length).max(0.0);
        (deflection, rate * deflection)
    }

    /// Length (mm) at which the set carries this load (N, zero or more), its last rate kept up beyond any solid length.
    pub fn length_at(&self, load: f64) -> f64 {
        let stage = self
            .stages
            .iter()
            .rev()
            .find(|stage| self.load_at(stage.from.get()) <= load)
            .or(self.stages.first());
        stage.map_or(self.free.get(), |stage| {
            let before = self.load_at(stage.from.get());
            stage.from.get() - (load - before) / stage.rate.get()
        })
    }

    /// The stage a length (mm) lies in: a knee itself belongs to the stage before it.
    pub fn stage_at(&self, length: f64) -> Option<&Stage> {
        let inside = |stage: &&Stage| stage.from.get() > length;
        self.stages
            .iter()
            .rev()
            .find(inside)
            .or(self.stages.first())
    }
}

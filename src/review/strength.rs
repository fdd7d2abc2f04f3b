//! Stress at each test length, at the service loads and at solid against what the wire bears under static load. Theory.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drawing::{Drawing, Member, MemberTheory};
use crate::formula::{Forming, Stress, stress};
use crate::material::{Kind, Strength};
use crate::units::{Finite, Megapascals, Millimetres, Newtons};

use super::finding::DrawingFinding;

/// Where a stress is taken.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "at", rename_all = "snake_case")]
pub enum StressPlace {
    /// At a test length.
    TestLength {
        /// Which.
        at_length_mm: Millimetres,
    },
    /// At the upper service load.
    Service {
        /// Load of the set.
        load_n: Newtons,
    },
    /// At the solid length of the set.
    Solid,
}

/// Which stress is held against which limit.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Permissible {
    /// Uncorrected stress against 0.56·Rm: EN 13906-1:2013, 10.1.1 and 10.2 (0.56 from memory), wire coiled cold.
    EnUncorrected,
    /// Stress with the curvature factor against a share of Rm, set not removed: Shigley's, table 10-6.
    TextbookDynamicFactor,
    /// Stress with the direct-shear factor against a share of Rm, set removed: Shigley's, table 10-6 (from memory).
    TextbookSetRemoved,
}

/// One stress against one limit.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StrengthLine {
    /// Which spring.
    pub member: String,
    /// Where.
    pub place: StressPlace,
    /// Which stress against which limit.
    pub rule: Permissible,
    /// The stress.
    pub stress_mpa: Megapascals,
    /// The limit.
    pub limit_mpa: Megapascals,
    /// The limit as a share of Rm.
    pub share_of_strength: Finite,
    /// Rm.
    pub strength_mpa: Megapascals,
    /// Where Rm comes from.
    pub strength_source: String,
}

/// Why a spring's stresses cannot be held against anything.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct StrengthGap {
    /// Which spring.
    pub member: String,
    /// Why.
    pub why: String,
}

/// EN 13906-1:2013, 10.1.1 (share from memory).
const EN_SHARE: f64 = 0.56;

/// All stresses, and what cannot be judged.
pub(super) fn all(drawing: &Drawing) -> (Vec<StrengthLine>, Vec<StrengthGap>) {
    let (mut lines, mut gaps) = (Vec::new(), Vec::new());
    for (member, theory) in drawing.members.iter().zip(&drawing.theory.members) {
        let gap = |why: &str| StrengthGap {
            member: member.name.clone(),
            why: why.to_owned(),
        };
        match &member.material.strength {
            Strength::Unknown(why) => gaps.push(gap(why)),
            Strength::Known { minimum, source } => {
                let rules = rules(drawing, member);
                if rules.is_empty() {
                    gaps.push(gap(
                        "no rule for the permissible stress of this material is known here",
                    ));
                }
                for (rule, share) in rules {
                    let wire = Wire {
                        member,
                        theory,
                        rule,
                        share,
                        minimum: *minimum,
                        source,
                    };
                    lines.extend(
                        places(drawing)
                            .into_iter()
                            .filter_map(|at| wire.line(drawing, at)),
                    );
                }
            }
        }
    }
    (lines, gaps)
}

/// The rules that hold for a member's wire, with their shares of Rm.
fn rules(drawing: &Drawing, member: &Member) -> Vec<(Permissible, f64)> {
    let mut rules = Vec::new();
    let kind = member.material.kind;
    let en = member.material.name.starts_with("EN ") && member.forming == Forming::Cold;
    if en {
        rules.push((Permissible::EnUncorrected, EN_SHARE));
    }
    // Before set removal 0.45 and 0.35 read in the table, 0.50 from memory; after it the lower ends of the ranges.
    let shares = match kind {
        Some(Kind::ColdDrawn) => Some((0.45, 0.60)),
        Some(Kind::Tempered | Kind::HotRolled) => Some((0.50, 0.65)),
        Some(Kind::Austenitic | Kind::NonFerrous) => Some((0.35, 0.55)),
        Some(Kind::Precipitation) | None => None,
    };
    if let Some((as_wound, set_removed)) = shares {
        rules.push(if drawing.service.set_removed {
            (Permissible::TextbookSetRemoved, set_removed)
        } else {
            (Permissible::TextbookDynamicFactor, as_wound)
        });
    }
    rules
}

fn places(drawing: &Drawing) -> Vec<StressPlace> {
    let mut places: Vec<StressPlace> = drawing
        .requirements
        .iter()
        .filter_map(|one| one.quantity.at_length())
        .map(|at_length_mm| StressPlace::TestLength { at_length_mm })
        .collect();
    if let Some((_, upper)) = drawing.service.load
        && let Ok(load_n) = upper.try_into()
    {
        places.push(StressPlace::Service { load_n });
    }
    places.push(StressPlace::Solid);
    places
}

struct Wire<'a> {
    member: &'a Member,
    theory: &'a MemberTheory,
    rule: Permissible,
    share: f64,
    minimum: f64,
    source: &'a str,
}

impl Wire<'_> {
    fn line(&self, drawing: &Drawing, place: StressPlace) -> Option<StrengthLine> {
        let set = &drawing.theory;
        let length = match place {
            StressPlace::TestLength { at_length_mm } => at_length_mm.get(),
            StressPlace::Service { load_n } => set.length_at(load_n.get()),
            StressPlace::Solid => set.solid.get(),
        };
        let (_, load) = match place {
            // A stack goes solid member by member, each with its own load.
            StressPlace::Solid if set.arrangement == crate::drawing::Arrangement::Stacked => {
                let s = self.theory.free.get() - self.theory.solid.get();
                (s, s * self.theory.rate.get())
            }
            _ => set.member_at(self.theory, length),
        };
        let found = stress(
            load.try_into().ok()?,
            self.member.wire.nominal,
            self.theory.coil.get(),
        )?;
        Some(StrengthLine {
            member: self.member.name.clone(),
            place,
            rule: self.rule,
            stress_mpa: taken(&found, self.rule),
            limit_mpa: (self.share * self.minimum).try_into().ok()?,
            share_of_strength: self.share.try_into().ok()?,
            strength_mpa: self.minimum.try_into().ok()?,
            strength_source: self.source.to_owned(),
        })
    }
}

fn taken(stress: &Stress, rule: Permissible) -> Megapascals {
    match rule {
        Permissible::EnUncorrected => stress.uncorrected,
        Permissible::TextbookDynamicFactor => stress.with_dynamic,
        Permissible::TextbookSetRemoved => stress.with_static,
    }
}

/// Stresses above their limit. A test length above the standard's limit contradicts the drawing; a textbook's share is
/// named only where no standard speaks.
pub(super) fn findings(lines: &[StrengthLine]) -> Vec<DrawingFinding> {
    let standard = |line: &StrengthLine| {
        let same = |other: &&StrengthLine| {
            other.member == line.member && other.rule == Permissible::EnUncorrected
        };
        line.rule == Permissible::EnUncorrected || !lines.iter().any(|other| same(&other))
    };
    lines
        .iter()
        .filter(|line| line.stress_mpa > line.limit_mpa && standard(line))
        .map(|line| DrawingFinding::StressAbove {
            member: line.member.clone(),
            place: line.place,
            rule: line.rule,
            stress_mpa: line.stress_mpa,
            limit_mpa: line.limit_mpa,
        })
        .collect()
}

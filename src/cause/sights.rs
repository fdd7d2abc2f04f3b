//! What is seen, not measured: which cause shows what, and how often it is seen.

use super::Cause;

/// Something seen on the returned spring, or looked for and not seen.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Sight {
    /// A break in the wire.
    Broken,
    /// Rust or pitting.
    Rust,
    /// Rubbed or worn places.
    Rubbed,
    /// A member of the set is not there.
    MemberMissing,
    /// Something between the coils, or marks of it.
    Debris,
    /// Temper colours.
    TemperColour,
    /// The spring is bowed sideways.
    Bowed,
}

impl Sight {
    /// All of them.
    pub const ALL: [Self; 7] = [
        Self::Broken,
        Self::Rust,
        Self::Rubbed,
        Self::MemberMissing,
        Self::Debris,
        Self::TemperColour,
        Self::Bowed,
    ];
}

/// How often a sight is seen where the cause shows it; judgement.
pub const SEEN_IF_THERE: f64 = 0.95;
/// How often it is reported where the cause does not show it; judgement.
pub const SEEN_IF_NOT_THERE: f64 = 0.02;
/// How often any sight goes with none of the listed causes; judgement.
const SEEN_WITH_NONE: f64 = 0.1;

/// The sights of a cause: it shows one of these alternatives, each as likely.
fn shown(cause: Cause) -> &'static [Sight] {
    match cause {
        Cause::Overheating => &[Sight::TemperColour],
        Cause::BrokenActiveCoil | Cause::BrokenEndCoil => &[Sight::Broken],
        Cause::UniformWireLoss | Cause::LocalWireLoss => &[Sight::Rust, Sight::Rubbed],
        Cause::MissingMember => &[Sight::MemberMissing],
        Cause::CoilBinding => &[Sight::Debris],
        Cause::GuideFriction => &[Sight::Rubbed],
        Cause::Buckling => &[Sight::Bowed],
        _ => &[],
    }
}

/// Probability that `sight` is seen under `cause`, its alternatives averaged.
pub(super) fn chance(cause: Cause, sight: Sight) -> f64 {
    if cause == Cause::NoneOfThese {
        return SEEN_WITH_NONE;
    }
    let shown = shown(cause);
    if !shown.contains(&sight) {
        return SEEN_IF_NOT_THERE;
    }
    let share = 1.0 / shown.len() as f64;
    share * SEEN_IF_THERE + (1.0 - share) * SEEN_IF_NOT_THERE
}

/// ln of the probability of all sights under `cause`; alternatives are joint, so one seen makes the other unlikely.
pub(super) fn ln_chance(cause: Cause, sights: &[(Sight, bool)]) -> f64 {
    let outcome = |chance: f64, seen: bool| if seen { chance } else { 1.0 - chance };
    if cause == Cause::NoneOfThese {
        let all = sights
            .iter()
            .map(|(_, seen)| outcome(SEEN_WITH_NONE, *seen).ln());
        return all.sum();
    }
    let under = |there: Option<Sight>| -> f64 {
        let chances = sights.iter().map(|(sight, seen)| {
            let chance = if there == Some(*sight) {
                SEEN_IF_THERE
            } else {
                SEEN_IF_NOT_THERE
            };
            outcome(chance, *seen)
        });
        chances.product()
    };
    let alternatives = shown(cause);
    if alternatives.is_empty() {
        return under(None).ln();
    }
    let sum: f64 = alternatives.iter().map(|one| under(Some(*one))).sum();
    (sum / alternatives.len() as f64).ln()
}

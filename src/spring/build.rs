//! The theory of springs from their sizes: alone, in one another, end to end.

use crate::formula::{rate, smallest_gaps, solid_length};
use crate::units::Millimetres;

use super::member::{Arrangement, Member};
use super::spread::{end_to_end, side_by_side};
use super::theory::{MemberTheory, Stage, Theory, TheoryError};

/// Free lengths that differ by less are one, mm.
const SAME: f64 = 1e-9;

/// The theory of `members`.
///
/// # Errors
/// [`TheoryError`] where a figure is not finite, no travel is left, or a member is never touched.
pub fn theory(members: &[Member], arrangement: Arrangement) -> Result<Theory, TheoryError> {
    let mut built = Vec::new();
    for member in members {
        let out = || TheoryError::OutOfRange {
            member: member.name.clone(),
        };
        built.push(member_theory(member).ok_or_else(out)?);
    }
    let found = match arrangement {
        Arrangement::Stacked => stacked(members, built),
        Arrangement::Single | Arrangement::Nested => nested(members, built, arrangement),
    };
    let theory = found.ok_or(TheoryError::OutOfRange {
        member: "the set".to_owned(),
    })?;
    let (smallest, free) = (theory.smallest.get(), theory.free.get());
    if smallest >= free {
        return Err(TheoryError::NoTravel { smallest, free });
    }
    for (member, one) in members.iter().zip(&theory.members) {
        if arrangement == Arrangement::Nested && one.free.get() <= smallest {
            return Err(TheoryError::NeverTouched {
                member: member.name.clone(),
                free: one.free.get(),
                smallest,
            });
        }
    }
    Ok(theory)
}

fn member_theory(member: &Member) -> Option<MemberTheory> {
    let (d, coil, n) = (
        member.wire.nominal,
        member.mean_coil(),
        member.active.nominal,
    );
    let solid = solid_length(member.ends, member.forming, member.total, d);
    let gaps = smallest_gaps(member.forming, d, coil, n);
    Some(MemberTheory {
        rate: rate(d, coil, n, member.material.shear)?,
        share: 1.0,
        index: coil / d,
        coil: coil.try_into().ok()?,
        free: member.free.nominal.try_into().ok()?,
        solid: solid.try_into().ok()?,
        smallest: (solid + gaps).try_into().ok()?,
    })
}

/// One spring, or springs in one another: loads add up, each member from its own free length on.
fn nested(
    members: &[Member],
    mut built: Vec<MemberTheory>,
    arrangement: Arrangement,
) -> Option<Theory> {
    let mut lengths: Vec<f64> = built.iter().map(|one| one.free.get()).collect();
    lengths.sort_by(|a, b| b.total_cmp(a));
    lengths.dedup_by(|a, b| (*a - *b).abs() < SAME);
    let mut stages = Vec::new();
    for from in lengths {
        let carrying: Vec<(&Member, f64)> = members
            .iter()
            .zip(&built)
            .filter(|(_, one)| one.free.get() >= from - SAME)
            .map(|(member, one)| (member, one.rate.get()))
            .collect();
        let sum: f64 = carrying.iter().map(|(_, rate)| rate).sum();
        stages.push(Stage {
            from: from.try_into().ok()?,
            rate: sum.try_into().ok()?,
            spread: side_by_side(&carrying)?,
        });
    }
    let sum: f64 = built.iter().map(|one| one.rate.get()).sum();
    for one in &mut built {
        one.share = one.rate.get() / sum;
    }
    let longest = |of: fn(&MemberTheory) -> Millimetres| {
        let found = built.iter().map(|one| of(one).get()).fold(0.0, f64::max);
        Millimetres::try_from(found).ok()
    };
    let (free, solid, smallest) = (
        longest(|one| one.free)?,
        longest(|one| one.solid)?,
        longest(|one| one.smallest)?,
    );
    whole(arrangement, (free, solid, smallest), built, stages)
}

/// Springs end to end: all carry the same load, their deflections add up. The member that reaches its own smallest
/// length first ends the travel.
fn stacked(members: &[Member], built: Vec<MemberTheory>) -> Option<Theory> {
    let softness: f64 = built.iter().map(|one| 1.0 / one.rate.get()).sum();
    let rate = 1.0 / softness;
    let drawn: Vec<(&Member, f64)> = members
        .iter()
        .zip(&built)
        .map(|(member, one)| (member, one.rate.get()))
        .collect();
    let sum = |of: fn(&MemberTheory) -> Millimetres| -> f64 {
        built.iter().map(|one| of(one).get()).sum()
    };
    let (free, solid) = (sum(|one| one.free), sum(|one| one.solid));
    let most = built
        .iter()
        .map(|one| one.rate.get() * (one.free.get() - one.smallest.get()))
        .fold(f64::INFINITY, f64::min);
    let lengths = (
        free.try_into().ok()?,
        solid.try_into().ok()?,
        (free - most / rate).try_into().ok()?,
    );
    let stage = Stage {
        from: lengths.0,
        rate: rate.try_into().ok()?,
        spread: end_to_end(&drawn, rate)?,
    };
    whole(Arrangement::Stacked, lengths, built, vec![stage])
}

fn whole(
    arrangement: Arrangement,
    (free, solid, smallest): (Millimetres, Millimetres, Millimetres),
    members: Vec<MemberTheory>,
    stages: Vec<Stage>,
) -> Option<Theory> {
    let last = stages.last()?;
    let (rate, spread) = (last.rate, last.spread);
    Some(Theory {
        arrangement,
        rate,
        standard_uncertainty: spread.standard,
        lowest: spread.lowest.try_into().ok()?,
        highest: spread.highest.try_into().ok()?,
        free,
        solid,
        smallest,
        members,
        stages,
    })
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use crate::formula::{Ends, Forming};
    use crate::material;
    use crate::spring::{Coil, Sized};
    use approx::assert_relative_eq;

    fn member(coil: Coil, wire: f64) -> Member {
        let exact = |nominal: f64| Sized {
            nominal,
            tolerance: 0.0,
        };
        Member {
            name: String::new(),
            wire: Sized {
                nominal: wire,
                tolerance: 0.01,
            },
            coil,
            active: exact(7.5),
            total: 9.5,
            ends: Ends::ClosedGround,
            forming: Forming::Cold,
            hand: None,
            free: exact(90.0),
            material: material::stated(81_500.0, Some(0.0), String::new()),
        }
    }

    /// Only the wire is uncertain: u(R) is the numerical derivative of the rate by d, with the drawn diameter held.
    #[test]
    fn the_sensitivity_of_the_wire_follows_the_drawn_diameter() {
        let exact = |nominal: f64| Sized {
            nominal,
            tolerance: 0.0,
        };
        for coil in [
            Coil::Outside(exact(36.0)),
            Coil::Mean(exact(32.0)),
            Coil::Inside(exact(28.0)),
        ] {
            let at = |wire: f64| theory(&[member(coil, wire)], Arrangement::Single).unwrap();
            let step = 1e-5;
            let slope = (at(4.0 + step).rate.get() - at(4.0 - step).rate.get()) / (2.0 * step);
            let wanted = slope * 0.01 / 3.0_f64.sqrt();
            assert_relative_eq!(
                at(4.0).standard_uncertainty,
                wanted,
                epsilon = 0.0,
                max_relative = 1e-6
            );
        }
    }

    /// 1/R = Σ1/R_i and R = ΣR_i; two equal springs have half and twice the rate, and 1/√2 of one spring's relative
    /// uncertainty as far as it is each spring's own.
    #[test]
    fn side_by_side_and_end_to_end() {
        let one = member(
            Coil::Mean(Sized {
                nominal: 32.0,
                tolerance: 0.0,
            }),
            4.0,
        );
        let of = |members: &[Member], arrangement| theory(members, arrangement).unwrap();
        let alone = of(std::slice::from_ref(&one), Arrangement::Single);
        let pair = [one.clone(), one];
        let (beside, stacked) = (
            of(&pair, Arrangement::Nested),
            of(&pair, Arrangement::Stacked),
        );
        let near = |a: f64, b: f64| assert_relative_eq!(a, b, epsilon = 0.0, max_relative = 1e-12);
        near(beside.rate.get(), 2.0 * alone.rate.get());
        near(stacked.rate.get(), alone.rate.get() / 2.0);
        near(stacked.free.get(), 180.0);
        near(stacked.smallest.get(), 2.0 * alone.smallest.get());
        let share = |theory: &Theory| theory.standard_uncertainty / theory.rate.get();
        near(share(&beside), share(&alone) / 2.0_f64.sqrt());
        near(share(&stacked), share(&alone) / 2.0_f64.sqrt());
        near(stacked.lowest.get(), alone.lowest.get() / 2.0);
    }
}

//! How far the drawn quantities leave the rate open: standard uncertainty and worst case.

use crate::formula::rate;
use crate::units::NewtonsPerMillimetre;

use super::member::{Coil, Member};

/// A rate's standard uncertainty and the lowest and highest rate the tolerances allow, N/mm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spread {
    /// Standard uncertainty.
    pub standard: f64,
    /// Every quantity at the end of its tolerance that lowers the rate.
    pub lowest: f64,
    /// The same for the highest.
    pub highest: f64,
}

/// The spread of springs side by side: `members` with their rates in N/mm, which add up.
pub(super) fn side_by_side(members: &[(&Member, f64)]) -> Option<Spread> {
    let weighed: Vec<(&Member, f64)> = members.to_vec();
    let (mut lowest, mut highest) = (0.0, 0.0);
    for (member, _) in members {
        let (low, high) = extremes(member)?;
        lowest += low;
        highest += high;
    }
    Some(Spread {
        standard: combined(&weighed),
        lowest,
        highest,
    })
}

/// The spread of springs end to end: 1/R is the sum of 1/R_i, so that dR = Σ (R/R_i)²·dR_i.
pub(super) fn end_to_end(members: &[(&Member, f64)], whole: f64) -> Option<Spread> {
    let weighed: Vec<(&Member, f64)> = members
        .iter()
        .map(|(member, rate)| (*member, whole * whole / rate))
        .collect();
    let (mut soft, mut stiff) = (0.0, 0.0);
    for (member, _) in members {
        let (low, high) = extremes(member)?;
        soft += 1.0 / low;
        stiff += 1.0 / high;
    }
    Some(Spread {
        standard: combined(&weighed),
        lowest: 1.0 / soft,
        highest: 1.0 / stiff,
    })
}

/// Root sum of squares of `weight · u(R_i)/R_i`. What the tables disagree on is the same for all springs whose G is from
/// one source, and adds up; the rest is each spring's own.
fn combined(weighed: &[(&Member, f64)]) -> f64 {
    let mut variance = 0.0;
    let mut shared: Vec<(&str, f64)> = Vec::new();
    for (member, weight) in weighed {
        variance += (weight * geometry(member)).powi(2);
        let of_shear = weight * member.material.spread / 3.0_f64.sqrt();
        let source = member.material.source.as_str();
        match shared.iter_mut().find(|(known, _)| *known == source) {
            Some((_, sum)) => *sum += of_shear,
            None => shared.push((source, of_shear)),
        }
    }
    let of_shear: f64 = shared.iter().map(|(_, sum)| sum * sum).sum();
    (variance + of_shear).sqrt()
}

/// u(R)/R from wire, coil and coils as drawn, tolerances rectangular.
/// With De drawn the sensitivity of d is 4/d + 3/D (D = De − d), with Di 4/d − 3/D, with D 4/d.
fn geometry(member: &Member) -> f64 {
    let (d, coil) = (member.wire.nominal, member.mean_coil());
    let of_wire = match member.coil {
        Coil::Outside(_) => 4.0 / d + 3.0 / coil,
        Coil::Inside(_) => 4.0 / d - 3.0 / coil,
        Coil::Mean(_) => 4.0 / d,
    };
    let lines = [
        of_wire * member.wire.tolerance,
        3.0 / coil * member.coil.sized().tolerance,
        member.active.tolerance / member.active.nominal,
    ];
    lines
        .iter()
        .map(|line| (line / 3.0_f64.sqrt()).powi(2))
        .sum::<f64>()
        .sqrt()
}

/// The lowest and highest rate with every quantity at the unlucky end of its tolerance, N/mm.
fn extremes(member: &Member) -> Option<(f64, f64)> {
    let at = |sign: f64| {
        let d = member.wire.nominal + sign * member.wire.tolerance;
        let across = member.coil.sized().nominal - sign * member.coil.sized().tolerance;
        let n = member.active.nominal - sign * member.active.tolerance;
        let shear = member.material.shear * (1.0 + sign * member.material.spread);
        let coil = match member.coil {
            Coil::Outside(_) => across - d,
            Coil::Inside(_) => across + d,
            Coil::Mean(_) => across,
        };
        (d > 0.0 && coil > 0.0 && n > 0.0)
            .then(|| rate(d, coil, n, shear))
            .flatten()
            .map(NewtonsPerMillimetre::get)
    };
    Some((at(-1.0)?, at(1.0)?))
}

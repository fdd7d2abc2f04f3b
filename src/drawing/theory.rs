//! What the drawn spring should do: rate, stress, lengths, and the uncertainty the drawing leaves.

use crate::units::{Megapascals, Millimetres, Newtons, NewtonsPerMillimetre};

use super::member::{Coil, Ends, Member};

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
}

/// Rate of a close-coiled round-wire helical spring, `G·d⁴ / (8·D³·n)`, in N/mm.
///
/// `wire` d and `coil` D in mm, `active` coils n, `shear` G in MPa (= N/mm²); all above zero.
/// Source: EN 13906-1:2013, 9.4; torsion of a round bar, curvature and pitch left out.
///
/// # Errors
/// `None` where the quotient is not a finite number.
pub fn rate(wire: f64, coil: f64, active: f64, shear: f64) -> Option<NewtonsPerMillimetre> {
    NewtonsPerMillimetre::try_from(shear * wire.powi(4) / (8.0 * coil.powi(3) * active)).ok()
}

/// Solid length Lc in mm for cold-coiled round wire with `total` coils nt of `wire` diameter d (mm).
///
/// Source: EN 13906-1:2013 for closed ends, ground `nt·d`, not ground `(nt + 1.5)·d` (JIS B 2704-1 and
/// textbooks: `(nt + 1)·d`); Machinery's Handbook, 31st ed., table 3 p. 318, for open ends `(nt + 1)·d`, ground `nt·d`.
pub fn solid_length(ends: Ends, total: f64, wire: f64) -> f64 {
    match ends {
        Ends::ClosedGround | Ends::OpenGround => total * wire,
        Ends::Closed => (total + 1.5) * wire,
        Ends::Open => (total + 1.0) * wire,
    }
}

/// Sum of the smallest gaps between the active coils, `Sa = n·(0.0015·D²/d + 0.1·d)`, in mm.
/// Source: EN 13906-1:2013, cold-coiled springs under static load.
fn smallest_gaps(wire: f64, coil: f64, active: f64) -> f64 {
    active * (0.0015 * coil * coil / wire + 0.1 * wire)
}

/// Shear stresses in the wire at one load, in MPa.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stress {
    /// `8·F·D/(π·d³)`.
    pub uncorrected: Megapascals,
    /// Times `1 + 1/(2w)`, direct shear.
    pub with_static: Megapascals,
    /// Times `(w + 0.5)/(w − 0.75)`, EN 13906-1 (the same number as Bergsträsser's).
    pub with_dynamic: Megapascals,
    /// Times `(4w − 1)/(4w − 4) + 0.615/w`, Wahl.
    pub with_wahl: Megapascals,
}

/// Stresses at load `load` (N) in wire d of coil D (mm).
///
/// Source: EN 13906-1:2013, 9.5 and 7; Shigley's Mechanical Engineering Design, eq. 10-3 and 10-4.
///
/// # Errors
/// `None` where a stress is not finite.
pub fn stress(load: Newtons, wire: f64, coil: f64) -> Option<Stress> {
    let w = coil / wire;
    let plain = 8.0 * load.get() * coil / (std::f64::consts::PI * wire.powi(3));
    let times = |factor: f64| Megapascals::try_from(plain * factor).ok();
    Some(Stress {
        uncorrected: times(1.0)?,
        with_static: times(1.0 + 0.5 / w)?,
        with_dynamic: times((w + 0.5) / (w - 0.75))?,
        with_wahl: times((4.0 * w - 1.0) / (4.0 * w - 4.0) + 0.615 / w)?,
    })
}

/// The theory of one member.
#[derive(Clone, Debug, PartialEq)]
pub struct MemberTheory {
    /// Rate of this member.
    pub rate: NewtonsPerMillimetre,
    /// Its share of the set's rate, 0 … 1.
    pub share: f64,
    /// Index w = D/d.
    pub index: f64,
    /// Mean coil diameter D, mm.
    pub coil: Millimetres,
    /// Solid length Lc.
    pub solid: Millimetres,
    /// Smallest permitted test length Ln = Lc + Sa.
    pub smallest: Millimetres,
}

/// The theory of the whole drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Theory {
    /// Rate of the set: the sum over its members, which all start at the same free length.
    pub rate: NewtonsPerMillimetre,
    /// Standard uncertainty of the rate, N/mm, from the tolerances as drawn.
    pub standard_uncertainty: f64,
    /// The lowest rate the tolerances allow.
    pub lowest: NewtonsPerMillimetre,
    /// The highest.
    pub highest: NewtonsPerMillimetre,
    /// Solid length of the set: its longest member's.
    pub solid: Millimetres,
    /// Smallest permitted test length of the set: its longest member's.
    pub smallest: Millimetres,
    /// The members, in the order of the drawing.
    pub members: Vec<MemberTheory>,
}

/// The theory of `members`, which share the free length `free` (mm).
///
/// # Errors
/// [`TheoryError`] where a figure is not finite or no travel is left.
pub fn theory(members: &[Member], free: f64) -> Result<Theory, TheoryError> {
    let mut built = Vec::new();
    let (mut sum, mut variance, mut lowest, mut highest) = (0.0, 0.0, 0.0, 0.0);
    for member in members {
        let out = || TheoryError::OutOfRange {
            member: member.name.clone(),
        };
        let one = member_theory(member).ok_or_else(out)?;
        sum += one.rate.get();
        variance += (one.rate.get() * relative_uncertainty(member)).powi(2);
        let (low, high) = extremes(member).ok_or_else(out)?;
        lowest += low;
        highest += high;
        built.push(one);
    }
    for one in &mut built {
        one.share = one.rate.get() / sum;
    }
    let out = |_| TheoryError::OutOfRange {
        member: "the set".to_owned(),
    };
    let longest = |of: fn(&MemberTheory) -> f64| {
        Millimetres::try_from(built.iter().map(of).fold(0.0, f64::max)).map_err(out)
    };
    let theory = Theory {
        rate: sum.try_into().map_err(out)?,
        standard_uncertainty: variance.sqrt(),
        lowest: lowest.try_into().map_err(out)?,
        highest: highest.try_into().map_err(out)?,
        solid: longest(|one| one.solid.get())?,
        smallest: longest(|one| one.smallest.get())?,
        members: built,
    };
    if theory.smallest.get() >= free {
        return Err(TheoryError::NoTravel {
            smallest: theory.smallest.get(),
            free,
        });
    }
    Ok(theory)
}

fn member_theory(member: &Member) -> Option<MemberTheory> {
    let (d, coil, n) = (
        member.wire.nominal,
        member.mean_coil(),
        member.active.nominal,
    );
    let solid = solid_length(member.ends, member.total, d);
    Some(MemberTheory {
        rate: rate(d, coil, n, member.shear.modulus)?,
        share: 1.0,
        index: coil / d,
        coil: coil.try_into().ok()?,
        solid: solid.try_into().ok()?,
        smallest: (solid + smallest_gaps(d, coil, n)).try_into().ok()?,
    })
}

/// u(R)/R by root sum of squares over the quantities as drawn, tolerances rectangular.
/// With De drawn the sensitivity of d is 4/d + 3/D (D = De − d), with Di 4/d − 3/D, with D 4/d.
fn relative_uncertainty(member: &Member) -> f64 {
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
        member.shear.spread,
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
        let shear = member.shear.modulus * (1.0 + sign * member.shear.spread);
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

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;
    use crate::drawing::{Shear, Sized};
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
            free: exact(90.0),
            shear: Shear {
                modulus: 81_500.0,
                spread: 0.0,
                material: String::new(),
                source: String::new(),
            },
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
            let at = |wire: f64| theory(&[member(coil, wire)], 90.0).unwrap();
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
}

//! Fatigue for a stated load range, infinite life: Goodman's line with Zimmerli's data. Theory.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::drawing::{Drawing, Member, MemberTheory};
use crate::formula::stress;
use crate::material::{Kind, Strength};
use crate::units::{Finite, Megapascals};

use super::finding::DrawingFinding;

/// Zimmerli's amplitude and mean, MPa, wire not peened and peened: Shigley's, section 10-9 (35 and 55 kpsi, 57.5 and
/// 77.5 kpsi; the book prints 398 MPa for 57.5 kpsi, its own rounding).
const PLAIN: (f64, f64) = (241.0, 379.0);
const PEENED: (f64, f64) = (398.0, 534.0);
/// Ultimate shear strength as a share of Rm: Shigley's.
const SHEAR: f64 = 0.67;
/// Zimmerli's data are for wire thinner than this, mm.
const THICKEST: f64 = 10.0;

/// The margin of one spring.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct FatigueMargin {
    /// Amplitude of the corrected stress.
    pub amplitude_mpa: Megapascals,
    /// Mean of the corrected stress.
    pub mean_mpa: Megapascals,
    /// Strength at zero mean, from Zimmerli's point by Goodman's line.
    pub endurance_mpa: Megapascals,
    /// 0.67·Rm.
    pub ultimate_mpa: Megapascals,
    /// By how much both stresses could grow, as a factor.
    pub margin: Finite,
    /// Whether the data are for shot-peened wire.
    pub peened: bool,
}

/// One spring under the stated load range.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Fatigue {
    /// Which spring.
    pub member: String,
    /// The margin; `null` where the data do not hold for this spring.
    pub margin: Option<FatigueMargin>,
    /// Why there is none.
    pub why_not: Option<String>,
}

/// One line for each member; none without a stated load range.
pub(super) fn all(drawing: &Drawing) -> Vec<Fatigue> {
    let Some(range) = drawing.service.load else {
        return Vec::new();
    };
    let members = drawing.members.iter().zip(&drawing.theory.members);
    members
        .map(|(member, theory)| {
            let found = margin(drawing, member, theory, range);
            Fatigue {
                member: member.name.clone(),
                margin: found.as_ref().ok().copied(),
                why_not: found.err(),
            }
        })
        .collect()
}

fn margin(
    drawing: &Drawing,
    member: &Member,
    theory: &MemberTheory,
    (lower, upper): (f64, f64),
) -> Result<FatigueMargin, String> {
    let spring_steel = matches!(member.material.kind, Some(Kind::ColdDrawn | Kind::Tempered));
    if !spring_steel || member.wire.nominal >= THICKEST {
        return Err("Zimmerli’s data are for spring steel wire under 10 mm".to_owned());
    }
    let minimum = match &member.material.strength {
        Strength::Known { minimum, .. } => *minimum,
        Strength::Unknown(why) => return Err(why.clone()),
    };
    let set = &drawing.theory;
    let at = |load: f64| {
        let (_, own) = set.member_at(theory, set.length_at(load));
        let found = stress(own.try_into().ok()?, member.wire.nominal, theory.coil.get())?;
        Some(found.with_dynamic.get())
    };
    let out = || "a stress is not finite".to_owned();
    let (least, most) = (at(lower).ok_or_else(out)?, at(upper).ok_or_else(out)?);
    let (amplitude, mean) = ((most - least) / 2.0, f64::midpoint(most, least));
    let (of_amplitude, of_mean) = if drawing.service.peened {
        PEENED
    } else {
        PLAIN
    };
    let ultimate = SHEAR * minimum;
    if of_mean >= ultimate {
        return Err("Zimmerli’s mean stress is above the strength of this wire".to_owned());
    }
    let endurance = of_amplitude / (1.0 - of_mean / ultimate);
    let mpa = |value: f64| Megapascals::try_from(value).map_err(|_| out());
    Ok(FatigueMargin {
        amplitude_mpa: mpa(amplitude)?,
        mean_mpa: mpa(mean)?,
        endurance_mpa: mpa(endurance)?,
        ultimate_mpa: mpa(ultimate)?,
        margin: (1.0 / (amplitude / endurance + mean / ultimate))
            .try_into()
            .map_err(|_| out())?,
        peened: drawing.service.peened,
    })
}

/// Margins below one.
pub(super) fn findings(lines: &[Fatigue]) -> Vec<DrawingFinding> {
    lines
        .iter()
        .filter_map(|line| Some((line, line.margin?.margin)))
        .filter(|(_, margin)| margin.get() < 1.0)
        .map(|(line, margin)| DrawingFinding::FatigueBelowOne {
            member: line.member.clone(),
            margin,
        })
        .collect()
}

//! Readings of a drawing under which its rate would follow, and what else would give it.

use crate::drawing::{Member, OtherCoil, Theory};
use crate::formula::rate;
use crate::material::FAMILIES;
use crate::units::NewtonsPerMillimetre;

use super::finding::{Fitting, Needed, ReadAs};

/// How near a reading must come to explain a rate, relative: a stated rate is rounded, not measured.
const EXPLAINS: f64 = 0.03;
/// Readings named at once.
const SHOWN: usize = 3;
/// Units a rate may have been stated in: their name, and N/mm in one of them as against the unit of the file.
const UNITS: [(&str, f64); 5] = [
    ("lbf/in", 0.175_126_8), // NIST SP 811 (2008), appendix B.8
    ("N/mm", 5.710_147),     // its inverse: an inch file with a metric figure
    ("kgf/mm", 9.806_65),
    ("N/cm", 0.1),
    ("N/m", 0.001),
];

/// The readings under which `stated` (N/mm) follows, nearest first.
pub(super) fn fitting(members: &[Member], theory: &Theory, stated: f64) -> Vec<Fitting> {
    let mut found = units(theory.rate.get(), stated);
    if let [member] = members {
        found.extend(of_one(member, stated));
    }
    found.retain(|one| one.off.get().abs() <= EXPLAINS);
    found.sort_by(|a, b| a.off.get().abs().total_cmp(&b.off.get().abs()));
    found.truncate(SHOWN);
    found
}

fn made(reading: ReadAs, rate: Option<NewtonsPerMillimetre>, stated: f64) -> Option<Fitting> {
    let rate_n_per_mm = rate?;
    let off = (stated / rate_n_per_mm.get() - 1.0).try_into().ok()?;
    Some(Fitting {
        reading,
        rate_n_per_mm,
        off,
    })
}

fn units(theory: f64, stated: f64) -> Vec<Fitting> {
    let of = |(unit, factor): (&str, f64)| {
        let reading = ReadAs::Unit {
            unit: unit.to_owned(),
        };
        // The theory as it would stand in the unit of the file.
        made(reading, (theory / factor).try_into().ok(), stated)
    };
    UNITS.into_iter().filter_map(of).collect()
}

fn of_one(member: &Member, stated: f64) -> Vec<Fitting> {
    let (d, coil, n, shear) = (
        member.wire.nominal,
        member.mean_coil(),
        member.active.nominal,
        member.material.shear,
    );
    let mut found = Vec::new();
    for (other, which) in member.other_coils() {
        let reading = match which {
            OtherCoil::OutsideAsMean => ReadAs::OutsideIsMean,
            OtherCoil::InsideAsMean => ReadAs::InsideIsMean,
            OtherCoil::MeanAsOutside => ReadAs::MeanIsOutside,
            OtherCoil::MeanAsInside => ReadAs::MeanIsInside,
        };
        if other > d {
            found.extend(made(reading, rate(d, other, n, shear), stated));
        }
    }
    found.extend(made(
        ReadAs::TotalForActive,
        rate(d, coil, member.total, shear),
        stated,
    ));
    let fewer = n - member.ends.dead_coils(member.forming);
    if fewer > 0.0 && fewer < n {
        found.extend(made(
            ReadAs::ActiveAreTotal,
            rate(d, coil, fewer, shear),
            stated,
        ));
    }
    found.extend(material(member, stated));
    found
}

/// The material of the table that comes nearest.
fn material(member: &Member, stated: f64) -> Option<Fitting> {
    let (d, coil, n) = (
        member.wire.nominal,
        member.mean_coil(),
        member.active.nominal,
    );
    let of = |family: &crate::material::Family| {
        let (shear, _) = family.moduli(d);
        let reading = ReadAs::Material {
            name: family.name.to_owned(),
            shear_modulus_mpa: shear.try_into().ok()?,
        };
        made(reading, rate(d, coil, n, shear), stated)
    };
    let other = |family: &&crate::material::Family| {
        (family.moduli(d).0 / member.material.shear - 1.0).abs() > EXPLAINS
    };
    FAMILIES
        .iter()
        .filter(other)
        .filter_map(of)
        .min_by(|a, b| a.off.get().abs().total_cmp(&b.off.get().abs()))
}

/// What would give `stated`, each alone; `None` for a set.
pub(super) fn needed(members: &[Member], theory: &Theory, stated: f64) -> Option<Needed> {
    let [member] = members else { return None };
    let ratio = stated / theory.rate.get();
    Some(Needed {
        active_coils: (member.active.nominal / ratio).try_into().ok()?,
        coil_mm: (member.mean_coil() / ratio.cbrt()).try_into().ok()?,
        wire_mm: (member.wire.nominal * ratio.powf(0.25)).try_into().ok()?,
        shear_modulus_mpa: (member.material.shear * ratio).try_into().ok()?,
    })
}

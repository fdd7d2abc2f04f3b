//! `expect`: calls and prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::job::{self, Ask, Expected};
use crate::quantity::Unit;
use crate::record::{MemberFacts, StressFacts};
use crate::units::{Millimetres, Newtons, System};
use crate::wording::{Place, figure};

use super::args::ExpectArgs;

pub(super) fn run(args: &ExpectArgs, out: &mut impl Write) -> miette::Result<u8> {
    let ask = match (args.at_load, args.at_length) {
        (Some(load), _) => Ask::Load(Newtons::try_from(load).into_diagnostic()?),
        (None, Some(length)) => Ask::Length(Millimetres::try_from(length).into_diagnostic()?),
        (None, None) => Ask::Drawing,
    };
    let expected = job::expect(&args.drawing, &args.drawing.to_string_lossy(), ask)?;
    if args.json {
        serde_json::to_writer(&mut *out, &expected).into_diagnostic()?;
        writeln!(out).into_diagnostic()?;
    } else {
        print(&expected, out).into_diagnostic()?;
    }
    Ok(u8::from(!expected.agrees))
}

fn n(value: Option<impl Into<f64>>, unit: Unit) -> String {
    figure(value, unit, Place::Significant(5), System::MmN)
}

fn print(expected: &Expected, out: &mut impl Write) -> std::io::Result<()> {
    let theory = &expected.theory;
    let rate = |value| n(Some(value), Unit::NewtonPerMillimetre);
    let length = |value: Millimetres| n(Some(value), Unit::Millimetre);
    writeln!(
        out,
        "drawing {}: R = {} N/mm, u = {} N/mm",
        expected.drawing,
        rate(theory.rate_n_per_mm),
        rate(theory.rate_standard_uncertainty)
    )?;
    writeln!(
        out,
        "  by the tolerances as drawn from {} to {} N/mm",
        rate(theory.rate_lowest),
        rate(theory.rate_highest)
    )?;
    if let Some(stated) = expected.stated_rate_n_per_mm {
        let word = if expected.agrees {
            "agrees with"
        } else {
            "does not follow from"
        };
        writeln!(
            out,
            "  the stated rate {} N/mm {word} the geometry within 2 u",
            rate(stated)
        )?;
    }
    writeln!(
        out,
        "  L0 {} mm, Lc {} mm, Ln {} mm, Fn {} N",
        length(theory.free_length_mm),
        length(theory.solid_length_mm),
        length(theory.smallest_length_mm),
        n(Some(theory.full_load_n), Unit::Newton)
    )?;
    for member in &theory.members {
        member_lines(member, out)?;
    }
    asked_lines(expected, out)?;
    writeln!(
        out,
        "R = G·d⁴/(8·D³·n), EN 13906-1. Stresses are theoretical; a compressed spring stores energy and can be thrown."
    )?;
    writeln!(
        out,
        "Safety-related use is decided by the responsible engineer under the applicable codes, not by this page."
    )
}

/// What holds at the load or length asked for; nothing where none was.
fn asked_lines(expected: &Expected, out: &mut impl Write) -> std::io::Result<()> {
    let Some(deflection) = expected.deflection_mm else {
        return Ok(());
    };
    writeln!(
        out,
        "at a deflection of {} mm:",
        n(Some(deflection), Unit::Millimetre)
    )?;
    for member in &expected.members {
        let stress = |of: fn(&job::StressAnswer) -> f64| {
            n(member.stress_mpa.as_ref().map(of), Unit::Megapascal)
        };
        writeln!(
            out,
            "  {}: F {} N; stress {} MPa, static {}, dynamic {}, Wahl {}",
            member.name,
            n(member.load_n, Unit::Newton),
            stress(|one| one.uncorrected),
            stress(|one| one.r#static),
            stress(|one| one.dynamic),
            stress(|one| one.wahl)
        )?;
    }
    Ok(())
}

fn member_lines(member: &MemberFacts, out: &mut impl Write) -> std::io::Result<()> {
    let share = figure(
        Some(100.0 * member.share.get()),
        Unit::Percent,
        Place::Significant(3),
        System::MmN,
    );
    writeln!(
        out,
        "  {}: R {} N/mm ({share} % of the set), w {}, G {} MPa ({})",
        member.name,
        n(Some(member.rate_n_per_mm), Unit::NewtonPerMillimetre),
        n(Some(member.index), Unit::Percent),
        n(Some(member.shear_modulus_mpa), Unit::Megapascal),
        member.shear_modulus_source
    )?;
    for stress in &member.stress {
        stress_line(stress, out)?;
    }
    Ok(())
}

fn stress_line(stress: &StressFacts, out: &mut impl Write) -> std::io::Result<()> {
    writeln!(
        out,
        "    at L {} mm: s {} mm, F {} N; stress {} MPa, static {}, dynamic {}, Wahl {}",
        n(Some(stress.at_length_mm), Unit::Millimetre),
        n(Some(stress.deflection_mm), Unit::Millimetre),
        n(Some(stress.load_n), Unit::Newton),
        n(Some(stress.uncorrected_mpa), Unit::Megapascal),
        n(Some(stress.static_mpa), Unit::Megapascal),
        n(Some(stress.dynamic_mpa), Unit::Megapascal),
        n(Some(stress.wahl_mpa), Unit::Megapascal)
    )
}

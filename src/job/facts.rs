//! What files and theory say, as results tell it.

use crate::curve::{Bounds, WindowOf};
use crate::drawing::{
    Acceptance, Drawing, Guard, Member, MemberTheory, Method, Rule, Theory, TheoryError, Window,
};
use crate::formula::stress;
use crate::intake::{Lot, NotInspected};
use crate::record::{
    ConditionFacts, DrawingFacts, LastCheck, LotFacts, MemberFacts, RequirementFacts, RigFacts,
    StressFacts, TheoryFacts, WindowFacts,
};
use crate::rig::{Accuracy, Compliance, Give, Known, Means, Rig, Scale};
use crate::units::{Finite, Megapascals, Millimetres, Newtons};
use crate::wording::number;

/// A figure of a result; `None` where it is not finite.
pub(super) fn figure(value: f64) -> Option<Finite> {
    Finite::try_from(value).ok()
}

/// The lot.
pub(super) fn lot(lot: &Lot) -> LotFacts {
    LotFacts {
        number: lot.number.clone(),
        size: lot.size.value,
        supplier: lot.supplier.clone(),
        received: lot.received.map(|date| date.to_string()),
        inspector: lot.inspector.clone(),
        sample_drawn: lot.sample_drawn.clone(),
        tags: lot.tags.clone(),
        note: lot.note.clone(),
        concession: lot.concession.clone(),
        supplier_values: lot.supplier_values.clone(),
        not_inspected: lot.not_inspected.iter().map(not_inspected).collect(),
        conditions: ConditionFacts {
            temperature_c: lot.conditions.temperature.and_then(figure),
            presetting_strokes: lot.conditions.presetting_strokes,
            presetting_recorded: lot.conditions.presetting_recorded,
        },
    }
}

/// A requirement that was not inspected, in words.
pub(super) fn not_inspected(one: &NotInspected) -> String {
    let at = one
        .quantity
        .at_length()
        .map_or(String::new(), |length| format!(" {} mm", length.get()));
    format!("{}{at}: {}", one.quantity.title(), one.reason)
}

/// The drawing.
pub(super) fn drawing(
    drawing: &Drawing,
    terms: &Acceptance,
    requirements: Vec<RequirementFacts>,
) -> DrawingFacts {
    let rule = match terms.rule {
        Rule::Guarded => "guarded",
        Rule::Simple => "simple",
    };
    let guard = match terms.guard {
        Guard::T95 => "t95",
        Guard::U => "U",
    };
    DrawingFacts {
        number: drawing.number.clone(),
        revision: drawing.revision.clone(),
        title: drawing.title.clone(),
        requirements,
        rule: rule.to_owned(),
        guard: guard.to_owned(),
        undecided_springs: terms.undecided,
    }
}

/// Theory, with stresses at the test lengths and at solid.
///
/// # Errors
/// [`TheoryError`] where a figure is not finite.
pub(super) fn theory(drawing: &Drawing, full_load: f64) -> Result<TheoryFacts, TheoryError> {
    let theory = &drawing.theory;
    let mut at: Vec<Millimetres> = drawing
        .requirements
        .iter()
        .filter_map(|one| one.quantity.at_length())
        .collect();
    at.push(theory.solid);
    let members: Option<Vec<MemberFacts>> = drawing
        .members
        .iter()
        .zip(&theory.members)
        .map(|(drawn, one)| member(theory, drawn, one, &at))
        .collect();
    let whole = || TheoryError::OutOfRange {
        member: "the set".to_owned(),
    };
    Ok(TheoryFacts {
        rate_n_per_mm: theory.rate,
        rate_standard_uncertainty: theory
            .standard_uncertainty
            .try_into()
            .map_err(|_| whole())?,
        rate_lowest: theory.lowest,
        rate_highest: theory.highest,
        free_length_mm: theory.free,
        solid_length_mm: theory.solid,
        smallest_length_mm: theory.smallest,
        full_load_n: Newtons::try_from(full_load).map_err(|_| whole())?,
        members: members.ok_or_else(whole)?,
    })
}

/// One member of a drawing with its stresses at the lengths `at`.
fn member(
    set: &Theory,
    drawn: &Member,
    theory: &MemberTheory,
    at: &[Millimetres],
) -> Option<MemberFacts> {
    let stress: Option<Vec<StressFacts>> = at
        .iter()
        .map(|length| stresses(set, drawn, theory, *length))
        .collect();
    Some(MemberFacts {
        name: drawn.name.clone(),
        material: drawn.material.name.clone(),
        shear_modulus_source: drawn.material.source.clone(),
        shear_modulus_mpa: Megapascals::try_from(drawn.material.shear).ok()?,
        wire_mm: drawn.wire.nominal.try_into().ok()?,
        coil_mm: theory.coil,
        active_coils: figure(drawn.active.nominal)?,
        total_coils: figure(drawn.total)?,
        index: figure(theory.index)?,
        rate_n_per_mm: theory.rate,
        share: figure(theory.share)?,
        solid_length_mm: theory.solid,
        smallest_length_mm: theory.smallest,
        stress: stress?,
    })
}

/// Stresses of one member where the set has the length `at_length_mm`.
pub(super) fn stresses(
    set: &Theory,
    drawn: &Member,
    theory: &MemberTheory,
    at_length_mm: Millimetres,
) -> Option<StressFacts> {
    let (deflection, load) = set.member_at(theory, at_length_mm.get());
    let load_n = Newtons::try_from(load).ok()?;
    let found = stress(load_n, drawn.wire.nominal, theory.coil.get())?;
    Some(StressFacts {
        at_length_mm,
        deflection_mm: deflection.try_into().ok()?,
        load_n,
        uncorrected_mpa: found.uncorrected,
        static_mpa: found.with_static,
        dynamic_mpa: found.with_dynamic,
        wahl_mpa: found.with_wahl,
    })
}

/// The window.
pub(super) fn window(drawing: &Drawing, bounds: Bounds) -> WindowFacts {
    let stated = match drawing.rate_test.window {
        _ if bounds.of == WindowOf::Length => "between two lengths".to_owned(),
        Window::FullLoad(from, to) => format!(
            "{:.0} % to {:.0} % of full load Fn",
            100.0 * from,
            100.0 * to
        ),
        Window::Deflection(from, to) => format!(
            "{:.0} % to {:.0} % of the deflection to Ln",
            100.0 * from,
            100.0 * to
        ),
        Window::Lengths(..) => "between two lengths".to_owned(),
    };
    let method = match drawing.rate_test.method {
        Method::Fit => "fit",
        Method::TwoPoint => "two-point",
    };
    let of: WindowOf = bounds.of;
    WindowFacts {
        of,
        from: figure(bounds.from).unwrap_or(Finite::ZERO),
        to: figure(bounds.to).unwrap_or(Finite::ZERO),
        stated,
        stroke: drawing.rate_test.stroke.words(),
        method: method.to_owned(),
    }
}

/// The rig; `checked` is its last passed check, where it holds.
pub(super) fn rig(rig: &Rig, checked: Option<&LastCheck>) -> RigFacts {
    let compliance = match &rig.frame {
        Compliance::Measured { give, standard } => {
            let give = match give {
                Give::Line(per_newton) => format!("{} mm/N", plain(*per_newton)),
                Give::Table(points) => format!("table of {} loads", points.len() - 1),
            };
            format!(
                "{give}, standard uncertainty {} mm/N, corrected",
                plain(*standard)
            )
        }
        Compliance::NotCorrected { allowance } => format!(
            "not known, not corrected; 0 to {} % of the travel allowed for",
            plain(100.0 * allowance)
        ),
        Compliance::DeclaredNegligible => "declared negligible".to_owned(),
    };
    let means = match rig.means {
        Means::Deflection => "deflection",
        Means::Length => "length",
        Means::PlatenPosition { .. } => "platen position",
    };
    RigFacts {
        name: rig.name.clone(),
        force: scale(&rig.force, "ISO 7500-1", "N"),
        force_calibrated: calibrated(&rig.force),
        travel: scale(&rig.travel, "ISO 9513", "mm"),
        travel_calibrated: calibrated(&rig.travel),
        compliance,
        checked: checked.map(|last| format!("{} ({})", last.date, last.id)),
        travel_means: means.to_owned(),
    }
}

fn calibrated(scale: &Scale) -> Option<String> {
    scale
        .calibrated
        .map(|(on, until)| format!("{on} … {until}"))
}

fn scale(scale: &Scale, standard: &str, unit: &str) -> String {
    let accuracy = match &scale.accuracy {
        Accuracy::Class { class, .. } => format!("{standard} class {class}"),
        Accuracy::Certificate { standard, .. } => format!(
            "certificate, relative standard uncertainty {} %",
            plain(100.0 * standard)
        ),
        Accuracy::DeclaredNegligible => "error declared negligible".to_owned(),
    };
    let resolution = match scale.resolution {
        Known::Stated(step) => format!("resolution {} {unit}", plain(step)),
        Known::DeclaredNegligible => "resolution declared negligible".to_owned(),
    };
    format!("{accuracy}, {resolution}")
}

/// A figure of a file as text, conversions' long tails cut.
fn plain(value: f64) -> String {
    number(Some(value), 6)
}

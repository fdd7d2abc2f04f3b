//! `expect`: what the drawn springs should do, and whether the drawing agrees with itself, before anything is measured.

use std::path::Path;

use jiff::civil::Date;

use crate::curve::{full_load, window_of};
use crate::drawing::{self, Drawing, Requirement, Theory};
use crate::formula::stress;
use crate::quantity::Quantity;
use crate::record::{
    Expected, ExpectedRequirement, FORMAT, Kind, MemberAnswer, MemberFacts, Provenance,
    ServiceFacts, StageFacts, StressAnswer,
};
use crate::review::{Weight, review};
use crate::units::{Finite, Millimetres, Newtons, NewtonsPerMillimetre};

use super::facts;

/// Where theory is asked besides the drawing's test lengths.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ask {
    /// The drawing's own test lengths.
    Drawing,
    /// At this load.
    Load(Newtons),
    /// At this length.
    Length(Millimetres),
}

const AT_LOAD: &str = "--at-load ";
const AT_LENGTH: &str = "--at-length ";

impl Ask {
    /// The flag that asks it, with every digit.
    fn flag(self) -> Option<String> {
        match self {
            Self::Drawing => None,
            Self::Load(load) => Some(format!("{AT_LOAD}{}", load.get())),
            Self::Length(length) => Some(format!("{AT_LENGTH}{}", length.get())),
        }
    }

    /// What such a flag asks; `None` where it is another.
    pub(super) fn of_flag(flag: &str) -> Option<Self> {
        if let Some(load) = flag.strip_prefix(AT_LOAD) {
            let load: f64 = load.parse().ok()?;
            return Some(Self::Load(load.try_into().ok()?));
        }
        let length: f64 = flag.strip_prefix(AT_LENGTH)?.parse().ok()?;
        Some(Self::Length(length.try_into().ok()?))
    }
}

/// Computes the theory of the drawing at `path` and reviews it.
///
/// # Errors
/// A report where the drawing cannot be used or a load or length lies outside its travel.
pub fn expect(path: &Path, as_written: &str, ask: Ask, date: Date) -> miette::Result<Expected> {
    let drawing = drawing::open(path, as_written)?;
    let length = asked(&drawing, ask)?;
    let theory = facts::theory(&drawing, full_load(&drawing))?;
    let reviewed = review(&drawing);
    let agrees = |finding: &crate::review::DrawingFinding| finding.weight() == Weight::Remark;
    let set = &drawing.theory;
    Ok(Expected {
        format: FORMAT,
        kind: Kind::Expect,
        drawing: drawing.number.clone(),
        revision: drawing.revision.clone(),
        title: drawing.title.clone(),
        agrees: reviewed.findings.iter().all(agrees),
        findings: reviewed.findings,
        rate_n_per_mm: set.rate,
        deflection_mm: length.and_then(|length| (set.free.get() - length).try_into().ok()),
        members: members(&drawing, length, &theory.members),
        stated_rate_n_per_mm: stated_rate(&drawing),
        requirements: drawing
            .requirements
            .iter()
            .map(|one| requirement(set, one))
            .collect(),
        free_length_tolerance_mm: free_tolerance(&drawing),
        stages: stages(set),
        window: facts::window(&drawing, window_of(&drawing)),
        service: service(&drawing),
        strength: reviewed.strength,
        strength_gaps: reviewed.strength_gaps,
        fatigue: reviewed.fatigue,
        outlooks: reviewed.outlooks,
        clearances: reviewed.clearances,
        solid_order: reviewed.solid_order,
        modulus_notes: modulus_notes(&drawing),
        theory,
        provenance: provenance(&drawing, ask, date),
        files: Vec::new(),
    })
}

/// The length of the set asked for, mm.
fn asked(drawing: &Drawing, ask: Ask) -> miette::Result<Option<f64>> {
    let set = &drawing.theory;
    let (free, solid) = (set.free.get(), set.solid.get());
    let length = match ask {
        Ask::Drawing => return Ok(None),
        Ask::Load(load) => set.length_at(load.get()),
        Ask::Length(length) => length.get(),
    };
    if !(solid..=free).contains(&length) {
        return Err(miette::miette!(
            code = "coilassay::expect::outside",
            help = "ask for a load or a length between free and solid",
            "the deflection there would be {:.3} mm; the drawn spring has 0 to {:.3} mm",
            free - length,
            free - solid
        ));
    }
    Ok(Some(length))
}

fn stated_rate(drawing: &Drawing) -> Option<NewtonsPerMillimetre> {
    let rate = drawing
        .requirements
        .iter()
        .find(|one| one.quantity == Quantity::Rate)?;
    rate.limits.nominal?.try_into().ok()
}

fn members(drawing: &Drawing, length: Option<f64>, facts: &[MemberFacts]) -> Vec<MemberAnswer> {
    let set = &drawing.theory;
    let mut answers = Vec::new();
    for (drawn, (theory, fact)) in drawing.members.iter().zip(set.members.iter().zip(facts)) {
        let load_n: Option<Newtons> =
            length.and_then(|length| set.member_at(theory, length).1.try_into().ok());
        let whole = length.map(|length| set.load_at(length));
        let stress = load_n.and_then(|load| stress(load, drawn.wire.nominal, theory.coil.get()));
        answers.push(MemberAnswer {
            name: fact.name.clone(),
            index: fact.index,
            rate_n_per_mm: theory.rate,
            load_n,
            load_share: load_n
                .zip(whole)
                .and_then(|(load, whole)| Finite::try_from(load.get() / whole).ok()),
            stress_mpa: stress.map(|stress| StressAnswer {
                uncorrected: stress.uncorrected,
                r#static: stress.with_static,
                dynamic: stress.with_dynamic,
                wahl: stress.with_wahl,
            }),
            solid_length_mm: theory.solid,
            smallest_length_mm: theory.smallest,
        });
    }
    answers
}

fn requirement(set: &Theory, of: &Requirement) -> ExpectedRequirement {
    let figure = |value: Option<f64>| value.and_then(facts::figure);
    let theory = match of.quantity {
        Quantity::Rate => Some(set.rate.get()),
        Quantity::RateOf(stage) => set
            .stages
            .get(usize::from(stage) - 1)
            .map(|stage| stage.rate.get()),
        Quantity::Knee(knee) => set
            .stages
            .get(usize::from(knee))
            .map(|stage| stage.from.get()),
        Quantity::LoadAt(length) => Some(set.load_at(length.get())),
        Quantity::FreeLength => Some(set.free.get()),
        Quantity::SolidLength => Some(set.solid.get()),
        _ => None,
    };
    ExpectedRequirement {
        name: of.quantity.name().to_owned(),
        at_length_mm: of.quantity.at_length(),
        unit: of.quantity.unit(),
        nominal: figure(of.limits.nominal),
        lower: figure(of.limits.lower),
        upper: figure(of.limits.upper),
        class: of.class,
        standard: of.standard.clone(),
        theory: figure(theory),
    }
}

/// Half-width of the free length: the longest member's, or a stack's sum.
fn free_tolerance(drawing: &Drawing) -> Millimetres {
    let set = &drawing.theory;
    let of = |member: &drawing::Member| member.free.tolerance;
    let found: f64 = match set.arrangement {
        drawing::Arrangement::Stacked => drawing.members.iter().map(of).sum(),
        drawing::Arrangement::Single | drawing::Arrangement::Nested => drawing
            .members
            .iter()
            .filter(|member| member.free.nominal >= set.free.get())
            .map(of)
            .fold(0.0, f64::max),
    };
    Millimetres::try_from(found).unwrap_or(Millimetres::ZERO)
}

fn stages(set: &Theory) -> Vec<StageFacts> {
    let stage = |stage: &drawing::Stage| {
        Some(StageFacts {
            from_length_mm: stage.from,
            from_load_n: set.load_at(stage.from.get()).try_into().ok()?,
            rate_n_per_mm: stage.rate,
            rate_standard_uncertainty: stage.spread.standard.try_into().ok()?,
            rate_lowest: stage.spread.lowest.try_into().ok()?,
            rate_highest: stage.spread.highest.try_into().ok()?,
        })
    };
    set.stages.iter().filter_map(stage).collect()
}

fn service(drawing: &Drawing) -> ServiceFacts {
    let (service, set) = (&drawing.service, &drawing.theory);
    let pair = |(from, to): (f64, f64)| Some((from.try_into().ok()?, to.try_into().ok()?));
    let lengths = |(from, to): (f64, f64)| {
        let at = |load: f64| Millimetres::try_from(set.length_at(load)).ok();
        Some((at(from)?, at(to)?))
    };
    let warm = |other: bool| -> Option<NewtonsPerMillimetre> {
        let temperature = service.temperature?;
        let warmed: Option<Vec<drawing::Member>> = drawing
            .members
            .iter()
            .map(|member| member.at_temperature(temperature, other))
            .collect();
        Some(crate::spring::theory(&warmed?, set.arrangement).ok()?.rate)
    };
    let (used, other) = (warm(false), warm(true));
    ServiceFacts {
        load_n: service.load.and_then(pair),
        length_mm: service.load.and_then(lengths),
        temperature_c: service.temperature.and_then(facts::figure),
        rate_at_temperature: used,
        rate_at_temperature_other: other.filter(|other| used.is_some_and(|used| used != *other)),
        frequency_hz: service.frequency.and_then(facts::figure),
    }
}

/// What other tables say of G, where they disagree; members of one material in one note.
fn modulus_notes(drawing: &Drawing) -> Vec<String> {
    let mut notes: Vec<(String, Vec<&str>)> = Vec::new();
    for member in &drawing.members {
        let material = &member.material;
        let Some(others) = &material.others else {
            continue;
        };
        let note = format!(
            "G {} MPa is used ({}). Elsewhere for such wire: {others}. The spread, ±{:.1} %, stands in theory’s uncertainty.",
            material.shear,
            material.source,
            100.0 * material.spread
        );
        match notes.iter_mut().find(|(known, _)| *known == note) {
            Some((_, names)) => names.push(&member.name),
            None => notes.push((note, vec![&member.name])),
        }
    }
    notes
        .into_iter()
        .map(|(note, names)| format!("{}: {note}", names.join(", ")))
        .collect()
}

fn provenance(drawing: &Drawing, ask: Ask, date: Date) -> Provenance {
    let mut inputs = vec![drawing.input.clone()];
    inputs.extend(drawing.materials.clone());
    Provenance::new(date, ask.flag().into_iter().collect(), inputs, Vec::new())
}

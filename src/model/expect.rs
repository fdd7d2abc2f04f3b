//! The page of `expect`.

use super::expect_facts::facts;
use super::facts::labelled;
use super::page::{Page, PageDecision};
use super::strength::{self, or_dash};
use super::table::{Column, Row, Table};
use super::{short, theory};
use crate::quantity::Unit;
use crate::record::{Expected, ExpectedRequirement, StageFacts};
use crate::review::Weight;
use crate::units::{Finite, System};
use crate::wording::{self, Place, figure, unit_symbol};

/// The page of what a drawing leads to expect, its figures in the units of `show_in`.
pub fn expected_page(of: &Expected, show_in: System) -> Page {
    let label = labelled(&of.drawing, of.revision.as_deref());
    let subject = of.title.as_ref().map_or_else(
        || format!("Drawing {label}"),
        |title| format!("{title}, drawing {label}"),
    );
    let mut page = Page::begun(
        "expect",
        "What the drawing leads to expect",
        subject.clone(),
        &of.provenance,
        show_in,
    );
    page.short = short(&format!("drawing {label}"));
    page.decision = decision(of, &subject, show_in);
    page.cautions = said(of, Weight::Remark, show_in);
    page.facts = vec![facts(of, show_in)];
    page.tables = required(of, show_in);
    page.signatures = ["Drawn by", "Reviewed by"].map(str::to_owned).to_vec();
    let mut theory = theory::section(&of.theory, show_in);
    theory.text.extend(of.modulus_notes.iter().cloned());
    theory.text.extend(warm(of));
    let mut sections = vec![
        theory,
        strength::strength(of, show_in),
        strength::motion(of, show_in),
    ];
    sections.append(&mut page.sections);
    page.sections = sections;
    page
}

fn said(of: &Expected, weight: Weight, show_in: System) -> Vec<String> {
    of.findings
        .iter()
        .filter(|finding| finding.weight() == weight)
        .map(|finding| wording::drawing_finding(finding, show_in))
        .collect()
}

fn decision(of: &Expected, subject: &str, show_in: System) -> PageDecision {
    let (code, word) = if of.agrees {
        ("accepted", "AGREES WITH ITSELF")
    } else {
        ("rejected", "CONTRADICTS ITSELF")
    };
    PageDecision {
        code,
        word: word.to_owned(),
        about: format!("{subject}: whether it agrees with itself, before anything is measured."),
        why: said(of, Weight::Contradicts, show_in),
    }
}

/// How G was taken at temperature.
fn warm(of: &Expected) -> Option<String> {
    of.service.rate_at_temperature.map(|_| {
        "At temperature G(t) = G·(1 − r·(t − 20 °C)); r is 0.25·10⁻³ per K for EN 10270-1 and -2 and 0.40·10⁻³ for EN 10270-3 (EN 13906-1, \
         coefficients from memory), 0.36·10⁻³ by the SMI handbook."
            .to_owned()
    })
}

/// What is required beside what theory expects.
fn required(of: &Expected, show_in: System) -> Vec<Table> {
    let mut tables = Vec::new();
    if !of.requirements.is_empty() {
        tables.push(requirements(&of.requirements, show_in));
    }
    if of.stages.len() > 1 {
        tables.push(stages(&of.stages, show_in));
    }
    tables
}

fn requirements(of: &[ExpectedRequirement], show_in: System) -> Table {
    let columns = vec![
        Column::words("Requirement"),
        Column::words("Unit"),
        Column::words("Class"),
        Column::figures("Nominal", ""),
        Column::figures("Lower", ""),
        Column::figures("Upper", ""),
        Column::figures("Theory", ""),
        Column::words("Limits from"),
    ];
    let rows = of.iter().map(|one| {
        let stated = |value: Option<Finite>| figure(value, one.unit, Place::Stated, show_in);
        let name = wording::characteristic(&one.name, one.at_length_mm, show_in);
        Row::from([
            wording::sentence(&name).into(),
            unit_symbol(one.unit, show_in).into(),
            one.class.word().into(),
            stated(one.nominal).into(),
            stated(one.lower).into(),
            stated(one.upper).into(),
            figure(one.theory, one.unit, Place::Significant(4), show_in).into(),
            or_dash(one.standard.as_ref()).into(),
        ])
    });
    Table::new("Required and expected", columns, rows.collect())
}

fn stages(of: &[StageFacts], show_in: System) -> Table {
    let rate_unit = unit_symbol(Unit::NewtonPerMillimetre, show_in);
    let columns = vec![
        Column::words("Stage"),
        Column::figures("From length", unit_symbol(Unit::Millimetre, show_in)),
        Column::figures("From load", unit_symbol(Unit::Newton, show_in)),
        Column::figures("R ± U (k = 2)", rate_unit),
        Column::figures("Lowest", rate_unit),
        Column::figures("Highest", rate_unit),
    ];
    let rows = of.iter().enumerate().map(|(place, stage)| {
        let unit = Unit::NewtonPerMillimetre;
        let finite = |value: f64| Finite::try_from(value).ok();
        let expanded = finite(2.0 * stage.rate_standard_uncertainty.get());
        let bound = |value| figure(Some(value), unit, Place::Uncertainty(expanded), show_in);
        Row::from([
            (place + 1).to_string().into(),
            figure(
                Some(stage.from_length_mm),
                Unit::Millimetre,
                Place::Stated,
                show_in,
            )
            .into(),
            figure(
                Some(stage.from_load_n),
                Unit::Newton,
                Place::Significant(4),
                show_in,
            )
            .into(),
            wording::with_uncertainty(finite(stage.rate_n_per_mm.get()), expanded, unit, show_in)
                .into(),
            bound(stage.rate_lowest).into(),
            bound(stage.rate_highest).into(),
        ])
    });
    Table::new("Stages of the set", columns, rows.collect())
}

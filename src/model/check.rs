//! The report of `rig verify`.

use super::budget;
use super::facts::{Facts, fact, of_bench, stated};
use super::frame::{frame_table, give_table};
use super::page::{Page, PageDecision, look};
use super::page_one::Note;
use super::table::{Cell, Column, Row, Section, Table};
use crate::record::{CheckRecord, ComparisonFacts, Finding, Verdict};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{Place, figure, number, percent, unit_symbol, with_uncertainty};

/// The page of a check, its figures in the units of `show_in`.
pub fn check_page(record: &CheckRecord, show_in: System) -> Page {
    let subject = match &record.reference {
        Some(reference) => format!("{} on reference spring {reference}", record.rig),
        None => format!("{}, plate on plate", record.rig),
    };
    let mut page = Page::begun(
        "check",
        "Check of a rig",
        subject.clone(),
        &record.provenance,
        show_in,
    );
    page.decision = PageDecision {
        code: look(record.decision),
        word: wording::serving_word(record.decision).to_owned(),
        about: format!(
            "{subject}: whether what this rig reads can be trusted within its own uncertainty."
        ),
        why: record
            .reasons
            .iter()
            .map(|reason| wording::check_reason(reason, record, show_in))
            .collect(),
    };
    page.notes.extend(record.note.iter().map(|text| Note {
        label: "Note".to_owned(),
        text: text.clone(),
    }));
    page.facts = facts(record);
    if !record.comparisons.is_empty() {
        page.tables.push(comparisons(record, show_in));
    }
    page.tables.extend(
        record
            .frame
            .as_ref()
            .map(|frame| frame_table(frame, show_in)),
    );
    page.cautions = record
        .cautions
        .iter()
        .map(|one| wording::bench_caution(one, show_in))
        .collect();
    let mut sections = vec![budgets(record, show_in)];
    sections.extend(give_table(record, show_in));
    sections.extend(earlier(record, show_in));
    sections.append(&mut page.sections);
    page.sections = sections;
    page
}

fn facts(record: &CheckRecord) -> Vec<Facts> {
    let mut rows = vec![fact("Checked on", record.judged_at.to_string())];
    rows.extend(stated("By", record.inspector.as_ref()));
    rows.extend(stated("Reference spring", record.reference.as_ref()));
    if let Some(reference) = &record.reference_facts {
        rows.extend(stated("Certificate", reference.certificate.as_ref()));
        let dates = reference.calibrated.clone();
        rows.push(fact(
            "Calibrated",
            dates.unwrap_or_else(|| "no dates stated".to_owned()),
        ));
        rows.push(fact(
            "Measured",
            wording::count(reference.measurements, "time"),
        ));
        rows.push(fact("Rate", reference.window.clone()));
        rows.push(fact(
            "Error allowed",
            format!(
                "{} of the tightest half tolerance",
                percent(Some(record.share))
            ),
        ));
        rows.push(fact("Tolerances", record.tolerances.join("; ")));
    }
    let about = Facts {
        title: "Check".to_owned(),
        rows,
    };
    vec![about, of_bench(&record.bench)]
}

fn comparisons(record: &CheckRecord, show_in: System) -> Table {
    let columns = vec![
        Column::words("Quantity"),
        Column::words("Unit"),
        Column::figures("Certified ± U", ""),
        Column::figures("Measured ± U", ""),
        Column::figures("Error", ""),
        Column::figures("Allowed", "±"),
        Column::figures("Shown from", ""),
        Column::figures("E_n", ""),
        Column::words("Finding"),
    ];
    let rows = record.comparisons.iter().map(|of| comparison(of, show_in));
    let mut table = Table::new("Reference spring", columns, rows.collect());
    "U: expanded uncertainty, k = 2. E_n = (measured − certified)/√(U² + U²), ISO 13528; passes at |E_n| ≤ 1. Shown from: the \
     smallest error that scatter and certificate let this check show."
        .clone_into(&mut table.note);
    table
}

/// The mark that goes with a finding.
const fn mark(of: Finding) -> Verdict {
    match of {
        Finding::Serves => Verdict::Conforms,
        Finding::Disagrees | Finding::BeyondShare => Verdict::Fails,
        Finding::CannotTell | Finding::Scattered | Finding::NotMeasured => Verdict::Undecided,
    }
}

fn comparison(of: &ComparisonFacts, show_in: System) -> Row {
    let place = Place::Uncertainty(of.expanded_uncertainty);
    let small = |value: Option<Finite>| figure(value, of.unit, Place::Significant(2), show_in);
    let finding = match &of.reason {
        Some(reason) => format!(
            "{}: {}",
            wording::finding(of.finding),
            wording::absence(reason, show_in)
        ),
        None => wording::finding(of.finding).to_owned(),
    };
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    Row::from([
        wording::sentence(&name).into(),
        unit_symbol(of.unit, show_in).into(),
        with_uncertainty(
            Some(of.reference),
            Some(of.reference_expanded_uncertainty),
            of.unit,
            show_in,
        )
        .into(),
        with_uncertainty(of.value, of.expanded_uncertainty, of.unit, show_in).into(),
        figure(of.error, of.unit, place, show_in).into(),
        small(of.allowed_error).into(),
        small(of.smallest_error_shown).into(),
        number(of.e_n, 3).into(),
        Cell::marked(finding, mark(of.finding)),
    ])
}

/// The standard uncertainty of an expanded one at k = 2.
fn half(expanded: Option<Finite>) -> Option<Finite> {
    Finite::try_from(expanded?.get() / 2.0).ok()
}

fn budgets(record: &CheckRecord, show_in: System) -> Section {
    let mut tables: Vec<Table> = Vec::new();
    for of in record.comparisons.iter().filter(|of| !of.budget.is_empty()) {
        let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
        let shown = |value: Finite| figure(Some(value), of.unit, Place::Significant(2), show_in);
        let unit = unit_symbol(of.unit, show_in);
        tables.push(budget::lines(
            wording::sentence(&name),
            &of.budget,
            unit,
            half(of.expanded_uncertainty),
            &shown,
        ));
    }
    if let Some(frame) = &record.frame {
        let shown = |value: Finite| number(Some(value), 2);
        tables.push(budget::lines(
            "Frame compliance".to_owned(),
            &frame.budget,
            "mm/N",
            frame.standard_uncertainty_mm_per_n,
            &shown,
        ));
    }
    Section {
        title: "Uncertainty budgets".to_owned(),
        text: vec![
            "Own lines are those of this measurement; common ones are the rig's, and what the check is after."
                .to_owned(),
        ],
        tables,
    }
}

fn earlier(record: &CheckRecord, show_in: System) -> Option<Section> {
    if record.earlier.is_empty() {
        return None;
    }
    let columns = vec![
        Column::words("Date"),
        Column::words("Quantity"),
        Column::words("Unit"),
        Column::figures("Error ± U", ""),
        Column::figures("E_n", ""),
        Column::words("Check"),
    ];
    let rows = record.earlier.iter().map(|of| {
        let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
        let passed = if of.passed {
            Cell::from("passed")
        } else {
            Cell::marked("not passed", Verdict::Undecided)
        };
        let expanded = Some(of.expanded_uncertainty);
        Row::from([
            of.date.to_string().into(),
            wording::sentence(&name).into(),
            unit_symbol(of.unit, show_in).into(),
            with_uncertainty(Some(of.error), expanded, of.unit, show_in).into(),
            number(Some(of.e_n), 3).into(),
            passed,
        ])
    });
    Some(Section {
        title: "Earlier checks".to_owned(),
        text: vec![format!(
            "Earlier checks of {} on this reference spring, oldest first.",
            record.rig
        )],
        tables: vec![Table::new("", columns, rows.collect())],
    })
}

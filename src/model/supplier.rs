//! The page for the supplier, on a proven rejection only.

use super::facts::labelled;
use super::table::{Cell, Column, Row, Section, Table};
use crate::record::{
    AcceptRecord, CharacteristicResult, Decision, LotReason, SpringResult, Verdict,
};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, unit_symbol, with_uncertainty};

/// Failures that still fit on one page.
const FITTING: usize = 34;

/// The page, where the rejection is proven.
pub(crate) fn page(record: &AcceptRecord, show_in: System) -> Option<Section> {
    let proven = record
        .reasons
        .iter()
        .any(|reason| matches!(reason, LotReason::ProvenFailures { .. }));
    if record.decision != Decision::Rejected || !proven {
        return None;
    }
    let columns = vec![
        Column::words("Spring"),
        Column::words("Characteristic"),
        Column::figures("Value ± U", ""),
        Column::words("Unit"),
        Column::figures("Lower", ""),
        Column::figures("Upper", ""),
        Column::words("Rule"),
        Column::words("Rows"),
    ];
    let mut rows: Vec<Row> = record
        .springs
        .iter()
        .filter(|spring| spring.in_sample && spring.verdict == Verdict::Fails)
        .flat_map(|spring| failures(spring, record, show_in))
        .collect();
    let left_out = rows.len().saturating_sub(FITTING);
    rows.truncate(FITTING);
    let mut table = Table::new("Springs proven failing", columns, rows);
    if left_out > 0 {
        table.note = format!(
            "{} more in the table of the springs and in springs.csv.",
            wording::count(u64::try_from(left_out).unwrap_or(u64::MAX), "failure")
        );
    }
    Some(Section {
        title: "For the supplier: proven nonconformities".to_owned(),
        text: text(record),
        tables: vec![table],
    })
}

fn text(record: &AcceptRecord) -> Vec<String> {
    let (lot, drawing) = (&record.lot, &record.drawing);
    let addressed = lot
        .supplier
        .as_ref()
        .map_or_else(String::new, |name| format!(" Supplier: {name}."));
    let mut text = vec![format!(
        "Lot {} of {} to drawing {}: rejected on {}.{addressed}",
        lot.number,
        wording::count(lot.size, "spring"),
        labelled(&drawing.number, drawing.revision.as_deref()),
        record.provenance.date
    )];
    text.extend(
        record
            .reasons
            .iter()
            .filter(|reason| matches!(reason, LotReason::ProvenFailures { .. }))
            .map(wording::why),
    );
    text.extend(wording::terms(drawing).into_iter().take(1));
    text.push(format!(
        "Measured on {}; force: {}; travel: {}.",
        record.rig.name, record.rig.force, record.rig.travel
    ));
    text
}

fn failures(spring: &SpringResult, record: &AcceptRecord, show_in: System) -> Vec<Row> {
    let failing = |of: &&CharacteristicResult| of.verdict == Some(Verdict::Fails);
    let measured = spring.characteristics.iter().filter(failing).map(|of| {
        let stated = |value: Option<Finite>| figure(value, of.unit, Place::Stated, show_in);
        Row::from([
            spring.id.clone().into(),
            wording::characteristic(&of.name, of.at_length_mm, show_in).into(),
            Cell::marked(
                with_uncertainty(of.value, of.expanded_uncertainty, of.unit, show_in),
                Verdict::Fails,
            ),
            unit_symbol(of.unit, show_in).into(),
            stated(of.lower).into(),
            stated(of.upper).into(),
            wording::rule_used(of, &record.drawing, show_in).into(),
            rows_used(spring, of, record).into(),
        ])
    });
    let seen = spring.findings.iter().map(|finding| {
        let dash = || Cell::from(ABSENT);
        Row::from([
            spring.id.clone().into(),
            finding.text.clone().into(),
            dash(),
            dash(),
            dash(),
            dash(),
            format!("seen, {}", finding.class.word()).into(),
            dash(),
        ])
    });
    measured.chain(seen).collect()
}

/// The lines of the export a value comes from: the window for a rate, the whole recording for the rest.
fn rows_used(spring: &SpringResult, of: &CharacteristicResult, record: &AcceptRecord) -> String {
    if let (Some(fit), "rate") = (&spring.fit, of.name.as_str()) {
        return format!("{}, {}–{}", fit.export, fit.first_line, fit.last_line);
    }
    let exports: Vec<&str> = spring
        .measurements
        .iter()
        .filter(|repeat| repeat.invalid.is_none())
        .map(|repeat| repeat.export.as_str())
        .collect();
    let ledger = record
        .provenance
        .ledgers
        .iter()
        .find(|ledger| exports.contains(&ledger.export.as_str()));
    match ledger {
        Some(ledger) => format!("{}, {} points", ledger.export, ledger.points),
        None if exports.is_empty() => ABSENT.to_owned(),
        None => exports.join(", "),
    }
}

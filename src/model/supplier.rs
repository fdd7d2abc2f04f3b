//! The page for the supplier, on a proven rejection only.

use super::facts::labelled;
use super::named;
use super::table::{Cell, Column, Row, Section, Table};
use crate::quantity::Class;
use crate::record::{
    AcceptRecord, CharacteristicResult, Decision, LotReason, SpringResult, Verdict,
};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, unit_symbol, with_uncertainty};

/// Failures that still fit on one page.
const FITTING: usize = 28;

/// The page, where the rejection is proven.
pub(crate) fn page(record: &AcceptRecord, show_in: System) -> Option<Section> {
    let proven = record
        .reasons
        .iter()
        .any(|reason| matches!(reason, LotReason::ProvenFailures { .. }) || by_variables(reason));
    if record.decision != Decision::Rejected || !proven {
        return None;
    }
    let mut rows: Vec<Row> = record
        .springs
        .iter()
        .filter(|spring| spring.in_sample && spring.verdict == Verdict::Fails)
        .flat_map(|spring| failures(spring, record, show_in))
        .collect();
    let estimated = record
        .reasons
        .iter()
        .filter(|reason| by_variables(reason))
        .count();
    let fitting = FITTING.saturating_sub(2 * estimated); // each ground takes two lines
    let left_out = rows.len().saturating_sub(fitting);
    rows.truncate(fitting);
    let mut table = Table::new("Springs proven failing", columns(), rows);
    if left_out > 0 {
        table.note = format!(
            "{} more in the table of the springs and in springs.csv.",
            wording::count(u64::try_from(left_out).unwrap_or(u64::MAX), "failure")
        );
    }
    Some(Section {
        title: "For the supplier: proven nonconformities".to_owned(),
        text: text(record, show_in),
        tables: vec![table],
    })
}

/// Whether a plan by variables rejected a characteristic.
const fn by_variables(reason: &LotReason) -> bool {
    matches!(
        reason,
        LotReason::ByVariables {
            decision: Decision::Rejected,
            ..
        }
    )
}

fn columns() -> Vec<Column> {
    vec![
        Column::words("Spring"),
        Column::words("Characteristic"),
        Column::figures("Value ± U", ""),
        Column::words("Unit"),
        Column::figures("Nominal", ""),
        Column::figures("Deviation", ""),
        Column::figures("Lower", ""),
        Column::figures("Upper", ""),
        Column::words("Rule"),
        Column::words("Origin"),
    ]
}

/// What failed first, then the lot, the drawing, the plan, the rule, the rig.
fn text(record: &AcceptRecord, show_in: System) -> Vec<String> {
    let (lot, drawing) = (&record.lot, &record.drawing);
    let addressed = lot
        .supplier
        .as_ref()
        .map_or_else(String::new, |name| format!(" Supplier: {name}."));
    let title = drawing
        .title
        .as_ref()
        .map_or_else(String::new, |title| format!(", {title}"));
    let mut text = named::short(record);
    text.push(format!(
        "Lot {} of {} to drawing {}{title}: rejected on {}.{addressed}",
        lot.number,
        wording::count(lot.size, "spring"),
        labelled(&drawing.number, drawing.revision.as_deref()),
        record.provenance.date
    ));
    text.extend(record.reasons.iter().filter_map(|reason| match reason {
        LotReason::ProvenFailures { class, .. } => plan(record, *class),
        reason if by_variables(reason) => Some(wording::why(reason, show_in)),
        _ => None,
    }));
    text.extend(wording::terms(drawing).into_iter().take(1));
    if drawing.rule != "simple" && drawing.guard != "U" {
        text.push(
            "t(0.95) is the one-sided 95 % factor of Student’s t: with many degrees of freedom t(0.95)·u is about 1.645 u."
                .to_owned(),
        );
    }
    text.push(format!(
        "Measured on {}; force: {}; travel: {}.",
        record.rig.name, record.rig.force, record.rig.travel
    ));
    text
}

/// The sample and the numbers of the plan that rejected, in words.
fn plan(record: &AcceptRecord, class: Class) -> Option<String> {
    let of = record.plan.classes.iter().find(|of| of.class == class)?;
    Some(format!(
        "{} requirements: of a sample of {} the plan accepts at most {} failing (Ac {}) and rejects from {} failing (Re {}); {} proven \
         failing. The rejection is proven by measurement.",
        wording::sentence(class.word()),
        wording::count(of.sample_size, "spring"),
        of.accept,
        of.accept,
        of.reject,
        of.reject,
        wording::count(of.failing, "spring"),
    ))
}

/// What is said of a failure in a class that did not reject the lot.
fn allowed(record: &AcceptRecord, class: Option<Class>) -> String {
    let of = record
        .plan
        .classes
        .iter()
        .find(|of| Some(of.class) == class && of.failing <= of.accept);
    of.map_or_else(String::new, |of| {
        format!(
            ", {}: within the {} the plan allows",
            of.class.word(),
            of.accept
        )
    })
}

fn failures(spring: &SpringResult, record: &AcceptRecord, show_in: System) -> Vec<Row> {
    let failing = |of: &&CharacteristicResult| of.verdict == Some(Verdict::Fails);
    let measured = spring.characteristics.iter().filter(failing).map(|of| {
        let stated = |value: Option<Finite>| figure(value, of.unit, Place::Stated, show_in);
        let rule = wording::rule_used(of, &record.drawing, show_in);
        Row::from([
            spring.id.clone().into(),
            wording::characteristic(&of.name, of.at_length_mm, show_in).into(),
            Cell::marked(
                with_uncertainty(of.value, of.expanded_uncertainty, of.unit, show_in),
                Verdict::Fails,
            ),
            unit_symbol(of.unit, show_in).into(),
            stated(of.nominal).into(),
            deviation(of, show_in).into(),
            stated(of.lower).into(),
            stated(of.upper).into(),
            format!("{rule}{}", allowed(record, of.class)).into(),
            origin(spring, of, record).into(),
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
            dash(),
            dash(),
            seen(record, finding.class).into(),
            "by eye".into(),
        ])
    });
    measured.chain(seen).collect()
}

/// The ground of a finding by eye.
fn seen(record: &AcceptRecord, class: Class) -> String {
    match allowed(record, Some(class)) {
        none if none.is_empty() => format!("seen, {}", class.word()),
        allowed => format!("seen{allowed}"),
    }
}

/// Value less nominal, with its sign.
fn deviation(of: &CharacteristicResult, show_in: System) -> String {
    let off = of
        .value
        .zip(of.nominal)
        .and_then(|(value, nominal)| Finite::try_from(value.get() - nominal.get()).ok());
    let text = figure(
        off,
        of.unit,
        Place::Uncertainty(of.expanded_uncertainty),
        show_in,
    );
    match off {
        Some(off) if off.get() > 0.0 => format!("+{text}"),
        _ => text,
    }
}

/// Whether a value comes from the gauge alone.
fn by_gauge(of: &CharacteristicResult) -> bool {
    !of.budget.is_empty() && of.budget.iter().all(|line| line.source == "gauge")
}

/// Where a value comes from: the findings file, the lines of the window for a rate, the whole recording for the rest.
fn origin(spring: &SpringResult, of: &CharacteristicResult, record: &AcceptRecord) -> String {
    let inputs = &record.provenance.inputs;
    if let (true, Some(file)) = (
        by_gauge(of),
        inputs.iter().find(|input| input.role == "findings"),
    ) {
        return format!("{} (caliper)", file.path);
    }
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

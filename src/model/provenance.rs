//! Every input with its hash and its row ledger.

use super::table::{Column, Row, Section, Table};
use crate::record::{AcceptRecord, LedgerFacts, Provenance, SetAside};
use crate::wording::ABSENT;

/// The section.
pub(crate) fn section(record: &AcceptRecord) -> Section {
    of(&record.provenance)
}

/// The section of any record's provenance.
pub(crate) fn of(provenance: &Provenance) -> Section {
    let flags = if provenance.flags.is_empty() {
        "none".to_owned()
    } else {
        provenance.flags.join(" ")
    };
    let columns = vec![
        Column::words("File"),
        Column::words("Role"),
        Column::figures("Lines", ""),
        Column::figures("Points", ""),
        Column::words("Set aside"),
        Column::hash("SHA-256"),
    ];
    let ledger = |path: &str| {
        provenance
            .ledgers
            .iter()
            .find(|ledger| ledger.export == path)
    };
    let mut rows: Vec<Row> = provenance
        .inputs
        .iter()
        .map(|input| row(&input.path, &input.role, ledger(&input.path), &input.sha256))
        .collect();
    let unlisted = provenance.ledgers.iter().filter(|ledger| {
        !provenance
            .inputs
            .iter()
            .any(|input| input.path == ledger.export)
    });
    rows.extend(unlisted.map(|ledger| row(&ledger.export, "export", Some(ledger), ABSENT)));
    Section {
        title: "Provenance".to_owned(),
        text: vec![
            format!(
                "Made by {} {} on {}; flags: {flags}. result.json in this folder holds every figure and the SHA-256 of every other file.",
                provenance.tool, provenance.version, provenance.date
            ),
            "Row ledger: the lines of an export are its points and the lines set aside, each with the reason.".to_owned(),
        ],
        tables: vec![Table::new("Inputs and row ledger", columns, rows)],
    }
}

fn row(path: &str, role: &str, ledger: Option<&LedgerFacts>, sha256: &str) -> Row {
    let count =
        |number: Option<u64>| number.map_or_else(|| ABSENT.to_owned(), |number| number.to_string());
    let aside = ledger.map_or_else(String::new, |ledger| {
        ledger
            .set_aside
            .iter()
            .map(set_aside)
            .collect::<Vec<_>>()
            .join("; ")
    });
    Row::from([
        path.into(),
        role.into(),
        count(ledger.map(|ledger| ledger.lines)).into(),
        count(ledger.map(|ledger| ledger.points)).into(),
        aside.into(),
        sha256.into(),
    ])
}

fn set_aside(of: &SetAside) -> String {
    if of.first_line == of.last_line {
        format!("{}: {}", of.reason, of.first_line)
    } else {
        format!("{}: {}–{}", of.reason, of.first_line, of.last_line)
    }
}

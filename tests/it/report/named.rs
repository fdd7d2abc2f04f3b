//! What page one and the supplier's page say of springs by name, and where a value is said to come from.

use coilassay::model::{Model, Table};
use coilassay::quantity::Class;
use coilassay::record::{AcceptRecord, FindingResult, Part, Reason, RepeatFacts, Verdict};
use coilassay::report::{self, Templates};
use coilassay::text::InputFile;
use coilassay::units::System;

use super::{lots, springs::curves};

fn model(record: &AcceptRecord) -> Model {
    Model::new(record, System::MmN)
}

/// The cells of a table's column.
fn column(table: &Table, title: &str) -> Vec<String> {
    let place = table.columns.iter().position(|it| it.title == title);
    let place = place.unwrap_or_else(|| panic!("no column {title}"));
    let rows = table.rows.iter();
    rows.map(|row| row.cells[place].text.clone()).collect()
}

/// The record's springs with a characteristic of this name and verdict, as page one lists them.
fn listed(record: &AcceptRecord, verdict: Verdict, reason: &Reason) -> String {
    let ids: Vec<&str> = record
        .springs
        .iter()
        .filter(|spring| {
            spring.characteristics[0].verdict == Some(verdict)
                && spring.characteristics[0].reason.as_ref() == Some(reason)
        })
        .map(|spring| spring.id.as_str())
        .collect();
    assert!(ids.len() > 8, "the list is cut: {ids:?}");
    format!("springs {} and {} more", ids[..8].join(", "), ids.len() - 8)
}

#[test]
fn page_one_names_springs_characteristic_and_limit() {
    let record = {
        let mut record = lots::rejected();
        for (number, spring) in record.springs.iter_mut().enumerate().take(100) {
            if number % 10 == 1 {
                let of = &mut spring.characteristics[0];
                (of.verdict, of.reason) = (Some(Verdict::Fails), Some(Reason::AboveUpper));
                spring.verdict = Verdict::Fails;
                spring.failing_class = Some(Class::Major);
            }
        }
        record
    };
    let lines = model(&record).decision.springs;
    let named = listed(&record, Verdict::Fails, &Reason::AboveUpper);
    let wanted = format!("Failing: {named}: rate R above the upper limit 11.34\u{a0}N/mm.");
    assert!(lines.contains(&wanted), "{wanted}\n{lines:#?}");
    let seen = "Seen: spring 7, end not ground (minor).";
    assert!(lines.iter().any(|line| line == seen), "{lines:#?}");
    assert!(
        lines
            .iter()
            .any(|line| line.starts_with("Undecided: ")
                && line.contains(" lies within the uncertainty")),
        "{lines:#?}"
    );
}

#[test]
fn a_spring_beyond_the_sample_is_not_named() {
    let mut record = lots::undecided();
    assert!(!model(&record).decision.springs.is_empty());
    for spring in &mut record.springs {
        spring.in_sample = false;
    }
    assert_eq!(model(&record).decision.springs, Vec::<String>::new());
}

#[test]
fn what_would_settle_it_needs_an_undecided_spring() {
    let settles = |record: &AcceptRecord| {
        let notes = model(record).notes;
        notes
            .iter()
            .any(|note| note.label == "What would settle it")
    };
    let mut record = lots::undecided();
    assert!(settles(&record));
    for spring in &mut record.springs {
        spring.verdict = Verdict::Conforms;
    }
    assert!(!settles(&record));
}

#[test]
fn the_plan_stands_in_words() {
    let mut record = lots::accepted();
    record.lot.conditions.temperature_c = None;
    let facts = model(&record).facts;
    let value = |name: &str| {
        let mut all = facts.iter().flat_map(|of| &of.rows);
        all.find(|fact| fact.name == name).unwrap().value.clone()
    };
    assert_eq!(
        value("Accept, reject"),
        "critical Ac 0, Re 1; major Ac 1, Re 2; minor Ac 3, Re 4"
    );
    assert_eq!(
        value("Arrow of the table"),
        "letter H leads by the arrow to J: n 32"
    );
    assert_eq!(
        value("Temperature"),
        "not stated; ±5\u{a0}K about 20\u{a0}°C allowed for"
    );
}

#[test]
fn the_supplier_reads_what_failed_first_and_where_it_comes_from() {
    let mut record = lots::rejected();
    record.provenance.inputs.push(InputFile {
        role: "findings".to_owned(),
        path: "caliper.csv".to_owned(),
        sha256: String::new(),
    });
    record.plan.classes[2].failing = 1;
    record.plan.classes[1].failing = 14;
    let spring = record
        .springs
        .iter_mut()
        .find(|spring| spring.verdict == Verdict::Fails)
        .unwrap();
    spring.findings = vec![FindingResult {
        text: "burr".to_owned(),
        class: Class::Minor,
    }];
    let free = &mut spring.characteristics[3];
    (free.verdict, free.reason) = (Some(Verdict::Fails), Some(Reason::BelowLower));
    free.budget.truncate(1);
    free.budget[0].source = "gauge".to_owned();
    free.budget[0].part = Part::Common;
    let page = model(&record).supplier.unwrap();
    assert!(
        page.text[0].contains(" above ") && page.text[0].contains("upper limit"),
        "{:?}",
        page.text
    );
    let text = page.text.join("\n");
    for wanted in [
        "free length below its lower limit.",
        "drawing GV-118 rev. B, Return spring, sluice valve",
        "of a sample of 200 springs the plan accepts at most 1 failing (Ac 1) and rejects from 2 failing (Re 2); 14 springs proven failing",
        "about 1.645 u",
    ] {
        assert!(text.contains(wanted), "{wanted}\n{text}");
    }
    let table = &page.tables[0];
    let place = column(table, "Characteristic")
        .iter()
        .position(|name| name == "free length L0")
        .unwrap();
    assert_eq!(column(table, "Origin")[place], "caliper.csv (caliper)");
    assert_eq!(column(table, "Nominal")[place], "62");
    let seen = column(table, "Characteristic")
        .iter()
        .position(|name| name == "burr")
        .unwrap();
    assert_eq!(
        column(table, "Rule")[seen],
        "seen, minor: within the 3 the plan allows"
    );
    // The deviation is the value less the nominal, by hand from the printed figures.
    let number = |text: &str| {
        let text = text.split(' ').next().unwrap().replace('−', "-");
        text.parse::<f64>().unwrap()
    };
    let measured = (0..table.rows.len()).filter(|row| column(table, "Nominal")[*row] != "–");
    let mut rows = 0;
    for row in measured {
        let of = |title| number(&column(table, title)[row]);
        let off = of("Value ± U") - of("Nominal") - of("Deviation");
        assert!(off.abs() < 0.11, "row {row}: {off}"); // loads print one place after the point
        rows += 1;
    }
    assert!(rows > 10, "{rows}");
}

#[test]
fn a_requirement_that_was_not_inspected_counts_nothing() {
    let mut record = lots::accepted();
    for spring in &mut record.springs {
        let of = &mut spring.characteristics[2];
        (of.value, of.verdict) = (None, None);
        of.reason = Some(Reason::NotInspected);
    }
    let model = model(&record);
    let conform = column(&model.requirements, "Conform");
    assert_eq!(conform[2], "not inspected");
    assert_eq!(column(&model.requirements, "Fail")[2], "–");
    assert!(conform[0].parse::<u32>().is_ok(), "{conform:?}");
}

#[test]
fn a_quantity_nobody_required_has_no_limits_and_no_disposition() {
    let mut record = lots::accepted();
    for spring in &mut record.springs {
        for name in ["hysteresis", "set"] {
            let mut more = spring.characteristics[3].clone();
            more.name = name.to_owned();
            (more.verdict, more.reason, more.class) = (None, None, None);
            (more.lower, more.upper, more.nominal) = (None, None, None);
            spring.characteristics.push(more);
        }
    }
    let model = model(&record);
    let titles = |table: &Table| -> Vec<String> {
        table.columns.iter().map(|it| it.title.clone()).collect()
    };
    assert_eq!(
        titles(&model.springs.tables[0])[..2],
        ["Spring", "Disposition"]
    );
    assert_eq!(titles(&model.springs.tables[1]), ["Spring", "set"]);
    let last = model.details.tables.last().unwrap();
    assert_eq!(titles(last), ["Spring", "u", "own", "common", "k (ν)"]);
    assert_eq!(model.details.tables[0].columns.len(), 8);
}

#[test]
fn charts_say_who_has_no_value_and_the_table_names_every_measurement() {
    let mut record = lots::undecided();
    let all = curves(&record, 60);
    record.springs[1].characteristics[0].value = None;
    let repeated = record
        .springs
        .iter()
        .position(|spring| spring.verdict == Verdict::Undecided)
        .unwrap();
    record.springs[repeated].measurements.push(RepeatFacts {
        export: "again/second-reading.csv".to_owned(),
        reason: Some("undecided".to_owned()),
        invalid: None,
    });
    let files = report::accept(&record, &all, System::MmN, &Templates::built_in()).unwrap();
    let text = |path: &str| {
        let file = files.iter().find(|file| file.path == path).unwrap();
        String::from_utf8(file.bytes.clone()).unwrap()
    };
    assert!(text("report.html").contains(" Without a value: 2."));
    let remarks = column(&model(&record).springs.tables[0], "Remarks");
    let id = &record.springs[repeated].id;
    let wanted =
        format!("2 measurements: springs/{id}.csv, again/second-reading.csv (repeated: undecided)");
    assert!(remarks[repeated].contains(&wanted), "{}", remarks[repeated]);
}

/// A repeat may lie in a file of another name: its curve is drawn under the spring's own id.
#[test]
fn a_repeated_spring_is_drawn_under_its_own_id() {
    let options = coilassay::job::Options {
        date: jiff::civil::date(2026, 12, 1),
        units_confirmed: false,
        strict: false,
        keep: coilassay::job::Keep {
            for_charts: true,
            for_archive: false,
        },
        block_bytes: None,
        flags: Vec::new(),
        memory: coilassay::job::Memory::Nothing,
        past: None,
    };
    let lot = "samples/undecided/lot.toml";
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join(lot);
    let accepted = coilassay::job::accept(&path, lot, &options).unwrap();
    let drawn: Vec<&str> = accepted
        .curves
        .iter()
        .map(|curve| curve.id.as_str())
        .collect();
    let springs: Vec<&str> = accepted
        .record
        .springs
        .iter()
        .map(|spring| spring.id.as_str())
        .collect();
    assert!(
        accepted
            .record
            .springs
            .iter()
            .any(|spring| spring.measurements.len() > 1)
    );
    assert_eq!(drawn, springs);
}

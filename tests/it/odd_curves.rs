//! Odd curves through the whole `accept`: named with the very lines, accounted for in the ledger, judged or not as said.

use serde_json::Value;

use crate::bad_input::{Case, Row};

const FILE: &str = "springs/TG-05.csv";

/// The rows of one export.
fn rows(case: &Case) -> Vec<Row> {
    let text = case.text(FILE);
    let row = |line: &str| {
        let cells: Vec<f64> = line.split(',').map(|cell| cell.parse().unwrap()).collect();
        (cells[0], cells[1], cells[2])
    };
    text.lines().skip(1).map(row).collect()
}

/// The sample with one export changed; its spring's result, its ledger and the kinds of oddities that page one names.
fn judged(change: impl Fn(&mut Vec<Row>)) -> (Value, Value, Vec<String>) {
    let case = Case::of("accepted");
    let mut all = rows(&case);
    change(&mut all);
    let header = "Time [s],Length [mm],Load [N]\n".to_owned();
    let lines = all
        .iter()
        .map(|(time, length, load)| format!("{time:.2},{length:.3},{load:.2}\n"));
    case.set(FILE, header + &lines.collect::<String>());
    let (_, result) = case.judged(&[]);
    let find = |list: &Value, key: &str, wanted: &str| {
        let all = list.as_array().unwrap().clone();
        all.into_iter()
            .find(|one| one[key].as_str().unwrap().contains(wanted))
            .unwrap()
    };
    let spring = find(&result["springs"], "id", "TG-05");
    let ledger = find(&result["provenance"]["ledgers"], "export", "TG-05");
    let aside = ledger["set_aside"].as_array().unwrap().iter();
    let aside: u64 = aside
        .map(|one| one["last_line"].as_u64().unwrap() - one["first_line"].as_u64().unwrap() + 1)
        .sum();
    assert_eq!(
        ledger["lines"].as_u64(),
        Some(ledger["points"].as_u64().unwrap() + aside),
        "{ledger}"
    );
    let named = result["cautions"].as_array().unwrap().iter();
    let named = named.filter(|one| one["springs"] == serde_json::json!(["TG-05"]));
    let named = named
        .filter_map(|one| one["what"].as_str().map(str::to_owned))
        .collect();
    (spring, ledger, named)
}

fn odd(spring: &Value, what: &str) -> Vec<(u64, u64)> {
    let lines = spring["odd"]
        .as_array()
        .unwrap()
        .iter()
        .filter(|one| one["what"] == what);
    lines
        .map(|one| {
            (
                one["first_line"].as_u64().unwrap(),
                one["last_line"].as_u64().unwrap(),
            )
        })
        .collect()
}

fn reason(spring: &Value, name: &str) -> String {
    let all = spring["characteristics"].as_array().unwrap();
    let found = all.iter().find(|one| one["name"] == name).unwrap();
    found["reason"]["code"]
        .as_str()
        .unwrap_or("none")
        .to_owned()
}

/// First row of the last loading stroke below `length`.
fn at(rows: &[Row], length: f64) -> usize {
    let start = rows.len() * 2 / 3 + 20;
    (start..rows.len())
        .find(|row| rows[*row].1 < length)
        .unwrap()
}

#[test]
fn the_clean_sample_has_none() {
    let (spring, _, named) = judged(|_| {});
    assert!(
        spring["odd"].as_array().unwrap().is_empty() && named.is_empty(),
        "{spring}"
    );
}

#[test]
fn a_saturated_cell_costs_what_lies_beyond_it() {
    let (spring, ledger, named) = judged(|rows| {
        for row in rows {
            row.2 = row.2.min(380.0);
        }
    });
    assert_eq!(named, ["saturated"]);
    assert!(!odd(&spring, "saturated").is_empty());
    assert!(
        ledger["set_aside"]
            .to_string()
            .contains("load cell at its end"),
        "{ledger}"
    );
    assert_eq!(
        (reason(&spring, "hysteresis"), spring["verdict"].as_str()),
        ("load_cell_at_its_end".into(), Some("undecided"))
    );
    let rate = spring["characteristics"]
        .as_array()
        .unwrap()
        .iter()
        .find(|one| one["name"] == "rate")
        .unwrap();
    assert_eq!(
        rate["verdict"], "conforms",
        "the window lies below the end of the cell"
    );
    let judged_lines = (
        spring["fit"]["first_line"].as_u64().unwrap(),
        spring["fit"]["last_line"].as_u64().unwrap(),
    );
    let inside = |lines: &(u64, u64)| lines.0 <= judged_lines.1 && lines.1 >= judged_lines.0;
    assert!(
        !odd(&spring, "saturated").iter().any(inside),
        "a saturated row is fitted"
    );
}

#[test]
fn a_slip_is_named_where_it_is() {
    let mut line = 0;
    let slip = std::cell::Cell::new(0);
    let (spring, _, named) = judged(|rows| {
        let from = at(rows, 66.0);
        slip.set(from);
        for row in &mut rows[from..] {
            row.2 -= 12.0;
        }
    });
    line += slip.get() as u64 + 2; // the header, and lines count from 1
    assert!(named.contains(&"load_steps".to_owned()), "{named:?}");
    let (first, last) = odd(&spring, "load_steps")[0];
    assert!(
        first <= line && line <= last && last - first <= 4,
        "{first}–{last}, slipped on {line}"
    );
    assert_eq!(
        (reason(&spring, "rate"), reason(&spring, "load")),
        ("load_steps".into(), "load_steps".into())
    );
}

#[test]
fn stray_doubled_and_missing_rows_are_named_where_they_are() {
    let place = std::cell::Cell::new(0);
    let (spring, ledger, named) = judged(|rows| {
        let from = at(rows, 70.0);
        place.set(from);
        rows[from].2 += 60.0;
    });
    let line = place.get() as u64 + 2;
    assert_eq!(
        (named, odd(&spring, "stray_readings")),
        (vec!["stray_readings".to_owned()], vec![(line, line)])
    );
    assert!(
        ledger["set_aside"].to_string().contains("stray reading")
            && spring["verdict"] == "conforms"
    );

    let (spring, ledger, named) = judged(|rows| {
        let from = at(rows, 70.0);
        rows.insert(from, rows[from]);
    });
    assert_eq!(
        (named, odd(&spring, "rows_doubled")),
        (vec!["rows_doubled".to_owned()], vec![(line + 1, line + 1)])
    );
    assert!(
        ledger["set_aside"]
            .to_string()
            .contains("repeats the row before")
            && spring["verdict"] == "conforms"
    );

    let (spring, _, named) = judged(|rows| {
        let from = at(rows, 72.0);
        rows.drain(from..from + 6);
    });
    assert_eq!(
        (named, reason(&spring, "load")),
        (vec!["rows_missing".to_owned()], "rows_missing".into())
    );
    let (spring, _, named) = judged(|rows| {
        for row in rows {
            row.2 = (row.2 / 0.5).round() * 0.5;
        }
    });
    assert_eq!(
        (named, spring["verdict"].as_str()),
        (vec!["load_coarse".to_owned()], Some("conforms"))
    );
}

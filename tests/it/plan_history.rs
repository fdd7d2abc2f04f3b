//! The state of inspection from past lots, through the whole of `accept`.

use serde_json::Value;

use crate::bad_input::squeezed;
use crate::plan_terms::{good, refused};

const HEAD: &str = "date,lot,decision,accept,accepted_tighter\n";

fn with_history(plan: &str, lines: &str) -> (Option<i32>, Value) {
    let case = good(plan);
    case.set("history.csv", format!("{HEAD}{lines}"));
    let file = case.path("history.csv").to_string_lossy().into_owned();
    case.judged(&["--history", &file])
}

#[test]
fn a_history_switches_the_state_and_says_why() {
    let attributes = "{ by = \"attributes\", aql = 2.5 }";
    let lines = "2026-10-01,0411,accepted,1,yes\n2026-10-08,0412,rejected,1,\n2026-10-15,0413,rejected,1,no\n";
    let (code, record) = with_history(attributes, lines);
    let state = &record["plan"]["state"];
    assert_eq!(
        (code, state["state"].as_str()),
        (Some(3), Some("tightened"))
    ); // 32 wanted, 20 there
    assert_eq!(state["reason"]["code"], "two_of_five");
    assert_eq!(state["reason"]["lots"], serde_json::json!(["0412", "0413"]));
    assert_eq!(state["lots"], 3);
    let inputs = record["provenance"]["inputs"].as_array().unwrap();
    assert!(inputs.iter().any(|one| one["role"] == "history"));
    let (code, record) = with_history(attributes, "");
    assert_eq!(
        (code, record["plan"]["state"]["state"].as_str()),
        (Some(0), Some("normal"))
    );
    let agreed = "{ by = \"attributes\", aql = 2.5, reduced = \"agreed\" }";
    let many: Vec<String> = (1..=15)
        .map(|day| format!("2026-10-{day:02},{day},accepted,1,\n"))
        .collect();
    let many = many.concat();
    let (_, record) = with_history(agreed, &many);
    assert_eq!(
        (
            record["plan"]["state"]["state"].as_str(),
            record["plan"]["sample_size"].as_u64()
        ),
        (Some("reduced"), Some(8))
    );
    let (_, record) = with_history(attributes, &many);
    assert_eq!(record["plan"]["state"]["state"], "normal");
    assert_eq!(record["plan"]["state"]["reason"]["score"], 30);
}

#[test]
fn histories_that_cannot_be_used() {
    let attributes = "{ by = \"attributes\", aql = 2.5 }";
    let seven: Vec<String> = (1..=7)
        .map(|day| format!("2026-10-{day:02},{day},rejected,1,\n"))
        .collect();
    let seven = seven.concat();
    #[rustfmt::skip]
    let rows: [(&str, String, &str); 12] = [
        (attributes, format!("{HEAD}{seven}"), "discontinued"),
        ("{ by = \"every-spring\" }", HEAD.to_owned(), "change nothing"),
        ("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 2.5 }", HEAD.to_owned(), "change nothing"),
        (attributes, "lot,date\n".to_owned(), "the first line is `lot,date`"),
        (attributes, format!("{HEAD}2026-10-32,1,accepted,1,\n"), "`2026-10-32` is no date"),
        (attributes, format!("{HEAD}2026-10-02,1,good,1,\n"), "`good` is no decision"),
        (attributes, format!("{HEAD}2026-10-02,1,accepted,,\n"), "no acceptance number"),
        (attributes, format!("{HEAD}2026-10-02,1,accepted,1,maybe\n"), "`maybe` is neither yes nor no"),
        (attributes, format!("{HEAD}2026-10-02,1,accepted,1\n"), "4 cells, not 5"),
        (attributes, format!("{HEAD}2026-10-02,,accepted,1,\n"), "lot number is missing"),
        (attributes, format!("{HEAD}2026-10-02,1,accepted,1,\n2026-10-01,2,accepted,1,\n"), "comes before"),
        (attributes, format!("{HEAD}2026-10-02,1,rejected,1,\n2026-10-03,1,accepted,1,\n"), "stands twice"),
    ];
    for (plan, text, says) in rows {
        let case = good(plan);
        case.set("history.csv", text);
        let file = case.path("history.csv").to_string_lossy().into_owned();
        let said = refused(&case, &["--history", &file]);
        assert!(said.contains(&squeezed(says)), "want {says}\n{said}");
    }
}

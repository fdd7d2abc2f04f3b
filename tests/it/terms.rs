//! Sample, what is not inspected, and curves too short: what an inspector may leave out, and what not.

use serde_json::Value;

use crate::bad_input::Case;

fn verdicts(record: &Value) -> Vec<(String, String)> {
    let text = |of: &Value| of.as_str().unwrap().to_owned();
    let springs = record["springs"].as_array().unwrap();
    springs
        .iter()
        .map(|one| (text(&one["id"]), text(&one["verdict"])))
        .collect()
}

#[test]
fn a_proven_failure_is_never_left_out_of_the_inspection() {
    let case = Case::of("rejected");
    let left_out = "not_inspected = [\n  { requirement = \"rate\", reason = \"no time\" },\n  { requirement = \"load\", at_length = 65.0, reason = \"no time\" },\n  { requirement = \"load\", at_length = 45.0, reason = \"no time\" },\n  { requirement = \"wire_diameter\", reason = \"no time\" },\n]\n";
    case.top(left_out);
    let (code, record) = case.judged(&[]);
    assert_eq!(code, Some(1), "{}", record["reasons"]);
    let failing = verdicts(&record)
        .into_iter()
        .filter(|(_, verdict)| verdict == "fails")
        .count();
    assert_eq!(failing, 7);
}

#[test]
fn what_is_left_out_and_conforms_is_not_judged() {
    let case = Case::of("accepted");
    case.top("not_inspected = [{ requirement = \"rate\", reason = \"no time\" }]\n");
    let (code, record) = case.judged(&[]);
    assert_eq!(code, Some(0));
    let rate = &record["springs"][0]["characteristics"][0];
    assert_eq!(
        (rate["name"].as_str(), rate["verdict"].as_str()),
        (Some("rate"), None)
    );
    assert_eq!(rate["reason"]["code"], "not_inspected");
}

#[test]
fn a_listed_sample_is_not_filled_up_with_others() {
    let case = Case::of("accepted");
    case.top("sample = [\"TG-03\", \"TG-01\"]\n");
    let (code, record) = case.judged(&[]);
    assert_eq!(code, Some(3), "two of twenty");
    assert_eq!(record["reasons"][0]["code"], "missing");
    let inside = record["springs"]
        .as_array()
        .unwrap()
        .iter()
        .filter(|one| one["in_sample"] == true)
        .count();
    assert_eq!(inside, 2);
}

#[test]
fn a_curve_that_misses_the_window_still_gives_its_loads_and_says_how_far_to_go() {
    let case = Case::of("accepted");
    case.sub(
        "tg-204.toml",
        "[rate_test]",
        "[rate_test]\nfull_load = 1200.0",
    );
    let (code, record) = case.judged(&[]);
    assert_eq!(code, Some(3));
    for spring in record["springs"].as_array().unwrap() {
        for of in spring["characteristics"].as_array().unwrap() {
            match of["name"].as_str().unwrap() {
                "load" => assert_eq!(
                    of["verdict"], "conforms",
                    "{} {}",
                    spring["id"], of["at_length_mm"]
                ),
                "rate" => {
                    assert_eq!(of["reason"]["code"], "window_not_reached");
                    assert!(of["reason"]["reached_n"].as_f64() < of["reason"]["wanted_n"].as_f64());
                }
                _ => {}
            }
        }
    }
}

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

/// A repeat that replaces an invalid measurement stands alone: its value, and no uncertainty shared with the other.
#[test]
fn an_invalid_measurement_does_not_count() {
    let repeat = |invalid: &str| {
        format!(
            "[[repeat]]\nspring = \"TG-07\"\nexport = \"again/TG-07.csv\"\nreason = \"slipped\"\n{invalid}\n"
        )
    };
    let run = |invalid: &str, first_off: f64| {
        let case = Case::of("accepted");
        let good = case.text("springs/TG-07.csv");
        case.set("again/TG-07.csv", &good);
        let mut lines: Vec<String> = good.lines().map(str::to_owned).collect();
        for line in lines.iter_mut().skip(1) {
            let cells: Vec<&str> = line.split(',').collect();
            *line = format!(
                "{},{},{:.4}",
                cells[0],
                cells[1],
                cells[2].parse::<f64>().unwrap() * first_off
            );
        }
        case.set("springs/TG-07.csv", lines.join("\n") + "\n");
        case.end(&repeat(invalid));
        let (_, record) = case.judged(&[]);
        record["springs"]
            .as_array()
            .unwrap()
            .iter()
            .find(|one| one["id"] == "TG-07")
            .unwrap()
            .clone()
    };
    let rate = |spring: &Value| spring["characteristics"][0].clone();
    let alone = rate(&Case::of("accepted").judged(&[]).1["springs"][6]);
    let replaced = run("invalid = \"slipped off the plate\"", 0.7);
    assert_eq!(rate(&replaced)["value"], alone["value"]);
    assert_eq!(rate(&replaced)["own_uncertainty"], alone["own_uncertainty"]);
    assert_eq!(replaced["measurements"].as_array().unwrap().len(), 2);
    let averaged = run("", 0.7);
    assert!(rate(&averaged)["value"].as_f64() < alone["value"].as_f64());
}

/// The window ends beyond the rise to solid: no point past the rise is fitted, so there is no rate.
#[test]
fn a_window_beyond_the_rise_to_solid_gives_no_rate() {
    let case = Case::of("accepted");
    let (_, record) = case.judged(&[]);
    let of = |record: &Value, name: &str| {
        let all = record["springs"][4]["characteristics"]
            .as_array()
            .unwrap()
            .clone();
        all.into_iter().find(|one| one["name"] == name).unwrap()
    };
    let solid = of(&record, "solid_length")["value"].as_f64().unwrap();
    let window = |to: f64| {
        let case = Case::of("accepted");
        let stated = "window = { from = \"30 %\", to = \"70 %\", of = \"full load\" }";
        case.sub(
            "tg-204.toml",
            stated,
            &format!("window = {{ from = 70.0, to = {to:.3}, of = \"length\" }}"),
        );
        case.sub("tg-204.toml", "total_coils = 9.5", "total_coils = 9.2"); // the drawing lets the window end nearer to solid
        of(&case.judged(&[]).1, "rate")
    };
    assert!(window(solid + 1.0)["value"].is_number());
    assert_eq!(window(solid - 0.1)["reason"]["code"], "window_not_reached");
}

//! Every kind of plan through the whole of `accept`: what a drawing may agree, what is refused, what comes out.

use serde_json::Value;

use crate::bad_input::{Case, squeezed};

const PLAN: &str = "{ by = \"attributes\", level = \"II\", aql = 2.5 }";

fn with(sample: &str, drawing: &str, old: &str, plan: &str) -> Case {
    let case = Case::of(sample);
    case.sub(drawing, old, plan);
    case
}

pub(crate) fn good(plan: &str) -> Case {
    with("accepted", "tg-204.toml", PLAN, plan)
}

fn judged(plan: &str) -> (Option<i32>, Value) {
    good(plan).judged(&[])
}

/// What is said where the lot is refused.
pub(crate) fn refused(case: &Case, flags: &[&str]) -> String {
    let ran = case.run(flags);
    assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{}", ran.err);
    squeezed(&ran.err)
}

/// The lot of samples/rejected under another plan.
fn bad(plan: &str) -> (Option<i32>, Value) {
    let case = Case::of("rejected");
    let drawing = std::fs::read_dir(case.path("."))
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .find(|name| {
            std::path::Path::new(name)
                .extension()
                .is_some_and(|end| end == "toml")
                && case.text(name).contains("[acceptance]")
        })
        .unwrap();
    let text = case.text(&drawing);
    let start = text.find("plan = {").unwrap();
    let end = start + text[start..].find('\n').unwrap();
    case.set(
        &drawing,
        format!("{}plan = {plan}{}", &text[..start], &text[end..]),
    );
    case.judged(&[])
}

#[test]
fn states_of_attributes() {
    for (state, n) in [("normal", 20), ("tightened", 32), ("reduced", 8)] {
        let plan = format!("{{ by = \"attributes\", aql = 2.5, state = \"{state}\" }}");
        let (code, record) = judged(&plan);
        // lot 150, letter F: 2-A n 20 Ac 1, 2-B by the arrow to G n 32 Ac 1, 2-C n 8 Ac 1
        let plan = &record["plan"];
        assert_eq!(plan["sample_size"], n, "{state}");
        assert_eq!(plan["state"]["state"], state);
        assert_eq!(
            code,
            Some(if n > 20 { 3 } else { 0 }),
            "{state}: twenty springs are there"
        );
        assert_eq!(
            record["reasons"][0]["code"],
            if n > 20 {
                "missing"
            } else {
                "within_acceptance"
            }
        );
    }
    let (_, record) = judged("{ by = \"attributes\", aql = 2.5, state = \"tightened\" }");
    let major = &record["plan"]["classes"][0];
    assert_eq!(
        (
            major["missing"].as_u64(),
            major["to_accept"].as_u64(),
            major["to_reject"].as_u64()
        ),
        (Some(12), Some(11), Some(2))
    );
}

#[test]
fn zero_accept_and_every_spring() {
    let (code, record) =
        judged("{ by = \"zero-accept\", limiting_quality = \"12 %\", consumer_risk = \"10 %\" }");
    // lot 150: D = 18; C(132, n)/C(150, n) ≤ 0.1: 0.1059 at 16, 0.0922 at 17 (by hand, product of (132 − i)/(150 − i))
    let plan = &record["plan"];
    assert_eq!((code, plan["sample_size"].as_u64()), (Some(0), Some(17)));
    assert_eq!(plan["zero_accept"]["nonconforming"], 18);
    assert_eq!(
        (plan["accept"].as_u64(), plan["reject"].as_u64()),
        (Some(0), Some(1))
    );
    let (code, record) =
        judged("{ by = \"zero-accept\", limiting_quality = \"4 %\", consumer_risk = \"10 %\" }");
    assert_eq!(
        (code, record["reasons"][0]["code"].as_str()),
        (Some(3), Some("missing"))
    );
    let (code, record) =
        bad("{ by = \"zero-accept\", limiting_quality = \"12 %\", consumer_risk = \"10 %\" }");
    assert_eq!(
        (code, record["reasons"][0]["code"].as_str()),
        (Some(1), Some("proven_failures"))
    );
    let (code, record) = judged("{ by = \"every-spring\" }");
    assert_eq!(
        (code, record["plan"]["sample_size"].as_u64()),
        (Some(3), Some(150))
    );
}

#[test]
fn variables_by_table() {
    let (code, record) = judged("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 2.5 }");
    let plan = &record["plan"];
    // lot 150, level IV: letter G, n 15; k 1.47 and M 6.56 % at 2.5
    assert_eq!(code, Some(0), "{}", record["reasons"]);
    assert_eq!(
        (plan["by"].as_str(), plan["code_letter"].as_str()),
        (Some("variables"), Some("G"))
    );
    assert!(plan["accept"].is_null() && plan["classes"].as_array().unwrap().is_empty());
    assert_eq!(plan["source"], "MIL-STD-414 Table B");
    for one in plan["variables"].as_array().unwrap() {
        let two = one["compared"] == "share";
        let wanted = one["wanted"].as_f64().unwrap();
        if one["sample_size"] == one["raised_sample_size"] {
            assert!(
                (wanted - if two { 0.0656 } else { 1.47 }).abs() < 1e-12,
                "{one}"
            );
        }
        assert_eq!(one["decision"], "accepted");
    }
    assert!(plan["variables"].as_array().unwrap().len() >= 4);
    let (code, record) = bad("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 2.5 }");
    assert_eq!(code, Some(1), "{}", record["reasons"]);
    let codes: Vec<&str> = record["reasons"]
        .as_array()
        .unwrap()
        .iter()
        .map(|one| one["code"].as_str().unwrap())
        .collect();
    assert!(
        codes.contains(&"by_variables") && codes.contains(&"proven_beside"),
        "{codes:?}"
    );
}

#[test]
fn variables_by_design_and_too_few_springs() {
    let design = |p2: &str| {
        format!(
            "{{ by = \"variables\", designed = {{ p1 = \"1 %\", alpha = \"5 %\", p2 = \"{p2}\", beta = \"10 %\" }} }}"
        )
    };
    let (code, record) = judged(&design("20 %"));
    assert_eq!(code, Some(0), "{}", record["reasons"]);
    assert_eq!(
        record["plan"]["source"],
        "designed for p1 = 1 %, α = 5 %, p2 = 20 %, β = 10 %"
    );
    let (code, record) = judged(&design("8 %")); // 28 springs, 20 are there
    assert_eq!(
        (code, record["reasons"][0]["code"].as_str()),
        (Some(3), Some("too_few_values"))
    );
    assert_eq!(record["reasons"][0]["plan"], 28);
}

#[test]
fn a_finding_under_variables_leaves_the_lot_undecided() {
    let case = good("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 2.5 }");
    case.end("[[finding]]\nspring = \"TG-03\"\nclass = \"minor\"\ntext = \"burr\"");
    let (code, record) = case.judged(&[]);
    assert_eq!(code, Some(3));
    let reasons = record["reasons"].as_array().unwrap();
    assert!(
        reasons
            .iter()
            .any(|one| one["code"] == "finding_without_number")
    );
    let case = good("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 2.5 }");
    case.end("[[finding]]\nspring = \"TG-03\"\nclass = \"critical\"\ntext = \"crack\"");
    assert_eq!(
        case.judged(&[]).0,
        Some(1),
        "critical is zero-accept under every plan"
    );
}

#[test]
fn absurd_terms_are_faults_with_their_place() {
    #[rustfmt::skip]
    let rows: [(&str, &str); 17] = [
        ("{ by = \"attributes\", aql = 0.9 }", "0.9 % is no AQL of ISO 2859-1"),
        ("{ by = \"attributes\", aql = 0 }", "0 % is no AQL"),
        ("{ by = \"attributes\", aql = 2.5, level = \"IV\" }", "`level` is \"IV\""),
        ("{ by = \"attributes\", aql = 2.5, consumer_risk = \"5 %\" }", "`consumer_risk` means nothing"),
        ("{ by = \"every-spring\", aql = 1.0 }", "`aql` means nothing"),
        ("{ by = \"zero-accept\", limiting_quality = \"4 %\", consumer_risk = \"0 %\" }", "`consumer_risk` is 0 %"),
        ("{ by = \"zero-accept\", limiting_quality = \"100 %\", consumer_risk = \"5 %\" }", "`limiting_quality` is 100 %"),
        ("{ by = \"zero-accept\", limiting_quality = 4, consumer_risk = \"5 %\" }", "text in quotes"),
        ("{ by = \"zero-accept\", limiting_quality = \"4 %\" }", "`consumer_risk` is missing"),
        ("{ by = \"variables\", aql = 1.0 }", "needs a table or the two points"),
        ("{ by = \"variables\", table = \"ISO 3951-1\", aql = 1.0 }", "`table` is \"ISO 3951-1\""),
        ("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 0.01 }", "0.01 % is no AQL of MIL-STD-414"),
        ("{ by = \"variables\", table = \"MIL-STD-414 B\", aql = 1.0, state = \"reduced\" }", "another table of MIL-STD-414"),
        ("{ by = \"variables\", designed = { p1 = \"5 %\", alpha = \"5 %\", p2 = \"1 %\", beta = \"10 %\" } }", "p1 is not below p2"),
        ("{ by = \"variables\", designed = { p1 = \"1 %\", alpha = \"50 %\", p2 = \"5 %\", beta = \"60 %\" } }", "together reach 100 %"),
        ("{ by = \"variables\", designed = { p1 = \"1 %\", alpha = \"5 %\", p2 = \"5 %\" } }", "`beta` is missing"),
        ("{ by = \"attributes\", aql = 2.5, reduced = true }", "text in quotes"),
    ];
    for (plan, says) in rows {
        let case = good(plan);
        let said = refused(&case, &[]);
        let place = said.contains("tg-204.toml:48:");
        assert!(said.contains(&squeezed(says)) && place, "{plan}\n{said}");
    }
}

/// What an undecided lot says of its undecided springs, in the result and on the page.
#[test]
fn undecided_springs_are_carried_through() {
    let (_, record) = Case::of("undecided").judged(&[]);
    let plan = &record["plan"];
    let open: Vec<&Value> = plan["classes"]
        .as_array()
        .unwrap()
        .iter()
        .filter(|one| one["undecided"].as_u64() > Some(0))
        .collect();
    assert!(!open.is_empty());
    for class in open {
        assert!(
            class["if_undecided_conform"].is_string() && class["if_undecided_fail"].is_string()
        );
    }
    let settling = plan["settling"].as_array().unwrap();
    assert!(!settling.is_empty());
    for one in settling {
        if let (Some(now), Some(wanted)) = (
            one["expanded_uncertainty"].as_f64(),
            one["wanted_uncertainty"].as_f64(),
        ) {
            assert!(
                wanted < now * 1.25,
                "an undecided value needs less than today's uncertainty: {one}"
            );
        }
        let share = one["own_share"].as_f64();
        assert!(share.is_none_or(|share| (0.0..=1.0).contains(&share)));
    }
}

//! Lots whose files could give a wrong verdict without a word: a refusal, an undecided lot, or a caution that names it.

use std::fmt::Write;

use crate::bad_input::{Case, not_silent, squeezed};

fn refused(what: &str, case: &Case) {
    let ran = case.run(&[]);
    assert_eq!(
        ran.code,
        Some(2),
        "{what}: {}",
        String::from_utf8_lossy(&ran.out)
    );
}

/// Undecided springs may pass by agreement; springs of which nothing was measured are not undecided in that sense.
#[test]
fn what_was_never_measured_does_not_pass_by_agreement() {
    let case = Case::of("accepted");
    case.rows(|rows| rows.into_iter().filter(|row| row.1 > 72.0).collect());
    case.sub(
        "tg-204.toml",
        "undecided_springs = \"report\"",
        "undecided_springs = \"pass\"",
    );
    assert_ne!(case.run(&[]).code, Some(0));
}

#[test]
fn a_lot_of_which_nothing_is_inspected_is_not_judged() {
    let case = Case::of("accepted");
    let mut all = String::from("not_inspected = [");
    for name in ["rate", "free_length", "solid_length", "hysteresis", "set"] {
        write!(all, "{{ requirement = \"{name}\", reason = \"x\" }}, ").unwrap();
    }
    for length in [70.0, 52.0] {
        write!(
            all,
            "{{ requirement = \"load\", at_length = {length:?}, reason = \"x\" }}, "
        )
        .unwrap();
    }
    case.top(&(all + "]"));
    refused("everything under not_inspected", &case);
}

#[test]
fn not_inspected_names_a_requirement_of_the_drawing_and_a_reason() {
    let case = Case::of("accepted");
    case.top("not_inspected = [{ requirement = \"load\", at_length = 71.0, reason = \"x\" }]");
    refused("no load is required at 71 mm", &case);
    let case = Case::of("accepted");
    case.top("not_inspected = [{ requirement = \"rate\", reason = \"\" }]");
    refused("an empty reason", &case);
}

#[test]
fn a_finding_of_a_class_without_aql_is_refused() {
    let case = Case::of("rejected");
    let text = case
        .text("tg-231.toml")
        .replace("class = \"minor\"", "class = \"major\"");
    case.set(
        "tg-231.toml",
        text.replace("aql = { major = 1.5, minor = 2.5 }", "aql = { major = 10 }"),
    );
    refused("a minor finding where minor has no AQL", &case);
}

#[test]
fn one_measurement_is_not_two_springs() {
    let case = Case::of("accepted");
    case.set("springs/TG-02.csv", case.text("springs/TG-01.csv"));
    not_silent(
        "TG-02 is TG-01 byte for byte",
        &case,
        &["same_bytes", "identical", "copy"],
    )
    .unwrap();
}

#[test]
fn a_repeat_is_another_measurement_of_the_same_spring() {
    let case = Case::of("accepted");
    case.end("[[repeat]]\nspring = \"TG-03\"\nexport = \"./springs/TG-03.csv\"\nreason = \"x\"");
    refused("a repeat that is the first export by another path", &case);
    let case = Case::of("accepted");
    case.set("again/3.csv", case.text("springs/TG-03.csv"));
    case.end("[[repeat]]\nspring = \"TG-03\"\nexport = \"again/3.csv\"\nreason = \"x\"");
    refused("a repeat that is the first export's bytes", &case);
    let case = Case::of("undecided");
    case.sub("again/float-springs-7.txt", "\n7\t", "\n9\t");
    refused("the repeat of 7 holds spring 9", &case);
}

/// A repeat under the pattern of the exports is the natural place for it.
#[test]
fn a_repeat_may_lie_among_the_exports() {
    let case = Case::of("accepted");
    case.rows(|rows| {
        rows.into_iter()
            .map(|row| (row.0, row.1, row.2 * 1.0001))
            .collect()
    });
    let other = Case::of("accepted");
    case.set("springs/TG-03 again.csv", other.text("springs/TG-03.csv"));
    case.end(
        "[[repeat]]\nspring = \"TG-03\"\nexport = \"springs/TG-03 again.csv\"\nreason = \"x\"",
    );
    assert_eq!(case.run(&[]).code, Some(0), "{}", case.run(&[]).err);
}

#[test]
fn caliper_rows_of_unknown_springs_are_refused() {
    for id in ["TG-1", "tg-01", "TG-21"] {
        let case = Case::of("accepted");
        case.set(
            "caliper.csv",
            format!("spring,free_length\n,mm\n{id},80.00\n"),
        );
        let ran = case.run(&[]);
        assert_eq!(
            ran.code,
            Some(2),
            "{id}: {}",
            String::from_utf8_lossy(&ran.out)
        );
    }
}

#[test]
fn ids_that_look_alike_are_named() {
    let mut misses = Vec::new();
    for id in [
        "TG-1",
        "tg-01",
        "TG-01\u{ad}",
        "TG-\u{0660}1",
        "\u{0422}G-01",
    ] {
        let case = Case::of("accepted");
        std::fs::rename(
            case.path("springs/TG-20.csv"),
            case.path(&format!("springs/{id}.csv")),
        )
        .unwrap();
        misses.extend(not_silent(id, &case, &["alike"]).err());
    }
    assert!(misses.is_empty(), "{}", misses.join("\n"));
}

/// The gauge says 90.0 mm, the bench touches the same springs at 85 mm: one of them is wrong.
#[test]
fn a_gauge_that_contradicts_the_bench_is_named() {
    let case = Case::of("accepted");
    case.cut("tg-204.toml", "solid_length", "[rate_test]");
    case.rows(|rows| {
        rows.into_iter()
            .map(|row| (row.0, row.1 - 5.0, row.2))
            .collect()
    });
    let gauge: Vec<String> = (1..=20).map(|n| format!("TG-{n:02},90.00\n")).collect();
    case.set(
        "caliper.csv",
        "spring,free_length\n,mm\n".to_owned() + &gauge.concat(),
    );
    not_silent(
        "gauge 90 mm, bench 85 mm",
        &case,
        &["gauge", "free_length_differs"],
    )
    .unwrap();
}

/// Repeats of one spring that differ by ten times their uncertainty are not two measurements of one thing.
#[test]
fn repeats_that_contradict_each_other_are_named() {
    let case = Case::of("undecided");
    let text = case.text("again/float-springs-7.txt");
    let mut lower = String::new();
    for line in text.lines() {
        let cells: Vec<&str> = line.split('\t').collect();
        match cells.get(2).and_then(|load| load.parse::<f64>().ok()) {
            Some(load) => writeln!(lower, "{}\t{}\t{:.3}", cells[0], cells[1], load * 0.9).unwrap(),
            None => writeln!(lower, "{line}").unwrap(),
        }
    }
    case.set("again/float-springs-7.txt", lower);
    let (_, result) = case.judged(&[]);
    let springs = result["springs"].as_array().unwrap();
    let seven = springs.iter().find(|spring| spring["id"] == "7").unwrap();
    let named = result["cautions"].to_string().contains("repeats_differ");
    assert!(
        named || seven["verdict"] == "undecided",
        "91 N and 82 N averaged to a conforming 86 N"
    );
}

/// Every gauge value 25.4 times where the drawing has it: no spring is rejected on that.
#[test]
fn findings_under_the_wrong_unit_are_not_judged() {
    let case = Case::of("accepted");
    case.sub("caliper.csv", ",mm", ",in");
    let ran = case.run(&[]);
    assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{}", ran.err);
    assert!(
        squeezed(&ran.err).contains("millimetreswerewrittenunderinches"),
        "{}",
        ran.err
    );
}

/// One recording cut off where a stroke turns: whole strokes are left, and another one is the last.
#[test]
fn a_spring_of_fewer_strokes_than_the_others_is_named() {
    let case = Case::of("accepted");
    let (_, whole) = case.judged(&[]);
    assert!(!whole["cautions"].to_string().contains("other_stroke_count"));
    let lines: Vec<String> = case
        .text("springs/TG-01.csv")
        .lines()
        .take(294)
        .map(|line| format!("{line}\n"))
        .collect();
    case.set("springs/TG-01.csv", lines.concat());
    let (_, result) = case.judged(&[]);
    let strokes = |spring: usize| result["springs"][spring]["loading_strokes"].as_u64();
    assert!(strokes(0) < strokes(1));
    let cautions = result["cautions"].as_array().unwrap();
    let named = cautions
        .iter()
        .find(|one| one["what"] == "other_stroke_count");
    assert_eq!(named.unwrap()["springs"], serde_json::json!(["TG-01"]));
}

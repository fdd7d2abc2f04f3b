//! One truth: the figures that speak of the lot, as the result has them, stand rounded in the page and in the PDF, each in
//! the row of its characteristic, with a warning wherever the normal model is not borne out.

use serde_json::Value;

use crate::prints::{html_rows, last, number, prints, stated, text, to_place};

/// To some significant digits, no zeros after them.
fn short(figure: f64, digits: i32) -> String {
    if figure.abs() <= 0.0 {
        return "0".to_owned();
    }
    let written = to_place(figure, last(figure, digits));
    if written.contains('.') {
        written
            .trim_end_matches('0')
            .trim_end_matches('.')
            .to_owned()
    } else {
        written
    }
}

fn share(figure: f64) -> String {
    let percent = 100.0 * figure;
    if percent > 0.0 && percent < 0.001 {
        return "< 0.001 %".to_owned();
    }
    format!("{} %", short(percent, 2))
}

fn name(of: &Value) -> String {
    match number(of, "at_length_mm") {
        Some(length) => format!("Load F at {} mm", stated(length)),
        None => match text(of, "name") {
            "rate" => "Rate R".to_owned(),
            "free_length" => "Free length L0".to_owned(),
            "solid_length" => "Solid length Lc".to_owned(),
            "wire_diameter" => "Wire diameter d".to_owned(),
            other => {
                let mut letters = other.chars();
                let first = letters.next().unwrap().to_uppercase().to_string();
                first + letters.as_str()
            }
        },
    }
}

/// Figure and interval as one cell prints them.
fn estimated(of: &Value, key: &str, mark: &str, show: impl Fn(f64) -> String) -> Option<String> {
    let found = &of[key];
    let value = found["value"].as_f64()?;
    let (lower, upper) = (
        found["interval"]["lower"].as_f64()?,
        found["interval"]["upper"].as_f64()?,
    );
    Some(format!(
        "{}{mark} {} … {}",
        show(value),
        show(lower),
        show(upper)
    ))
}

#[test]
fn process_figures_are_printed_with_their_intervals_and_warnings() {
    let mut seen = 0;
    for sample in ["accepted", "rejected", "undecided", "nested"] {
        let prints = prints(sample);
        let rows = html_rows(&prints.html.replace('\u{a0}', " "));
        let pdf = prints.pdf.map(|text| text.replace('\u{a0}', " "));
        for of in prints.record["process"].as_array().unwrap() {
            let mark = match of["shape"]["code"].as_str().unwrap() {
                "normal" => "",
                "not_normal" => " (!)",
                _ => " (?)",
            };
            let row = |caption: &str| {
                let found = rows
                    .iter()
                    .find(|(title, cells)| title == caption && cells[0] == name(of));
                found.map_or_else(
                    || panic!("{sample}: {caption} has no {}", name(of)),
                    |(_, cells)| cells.clone(),
                )
            };
            let index = |figure| short(figure, 3);
            let wanted = [
                estimated(of, "pp", mark, index),
                estimated(of, "ppk", mark, index),
                estimated(of, "outside_by_model", mark, share),
            ];
            if of["outside_count"].is_u64() {
                let cells = row("Limits and spread");
                for wanted in wanted.into_iter().flatten() {
                    assert!(
                        cells.contains(&wanted),
                        "{sample}, {}: {wanted} is not in {cells:?}",
                        name(of)
                    );
                    if let Some(pdf) = &pdf {
                        let figure = wanted.split(' ').next().unwrap();
                        assert!(pdf.contains(figure), "{sample}: the PDF has no {figure}");
                    }
                    seen += 1;
                }
                let count = format!("{} of {}", of["outside_count"], of["springs"]);
                assert!(
                    cells.iter().any(|cell| cell.starts_with(&count)),
                    "{sample}: {count} in {cells:?}"
                );
            }
            let (low, high) = (
                of["mean_interval"]["lower"].as_f64(),
                of["mean_interval"]["upper"].as_f64(),
            );
            if let (Some(low), Some(high)) = (low, high) {
                let place = last((high - low) / 2.0, 2);
                let interval = format!("{} … {}", to_place(low, place), to_place(high, place));
                assert!(
                    row("Mean, spread and shape").contains(&interval),
                    "{sample}, {}: {interval}",
                    name(of)
                );
                if let Some(pdf) = &pdf {
                    assert!(
                        pdf.contains(&interval),
                        "{sample}: the PDF has no {interval}"
                    );
                }
                let within = &of["tolerance"];
                if let (Some(from), Some(to)) = (within["lower"].as_f64(), within["upper"].as_f64())
                {
                    let within =
                        format!("{} … {}{mark}", to_place(from, place), to_place(to, place));
                    assert!(
                        row("Tolerance intervals, 95 % confidence").contains(&within),
                        "{sample}: {within}"
                    );
                    seen += 1;
                }
            }
        }
    }
    assert!(seen > 40, "{seen} figures were looked at");
}

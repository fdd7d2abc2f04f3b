//! One truth, four prints: every figure of the characteristics in `result.json` stands in `springs.csv` as it is, and
//! rounded as the report rounds it in that spring's row of `report.html` and of the PDF's text.
//!
//! The rounding is written here anew from its rule (U to two significant digits, the value and the limits of proof to
//! the same place, limits of the drawing to six digits, u to two).

use serde_json::Value;

use crate::prints::{csv_rows, html_rows, last, number, prints, stated, text, to_place};

const SAMPLES: [&str; 4] = ["accepted", "rejected", "undecided", "nested"];
/// Column of `springs.csv` and key of `result.json`.
const FIGURES: [&str; 14] = [
    "value",
    "expanded_uncertainty",
    "standard_uncertainty",
    "own_uncertainty",
    "common_uncertainty",
    "coverage_factor",
    "degrees_of_freedom",
    "nominal",
    "lower",
    "upper",
    "accept_lower",
    "accept_upper",
    "reject_lower",
    "reject_upper",
];

/// What the report must print of one characteristic beside its spring's id: in the table of the springs, and behind it.
fn printed(of: &Value) -> (Option<String>, Vec<String>) {
    let Some(value) = number(of, "value") else {
        return (None, Vec::new());
    };
    let Some(expanded) = number(of, "expanded_uncertainty") else {
        return (Some(stated(value)), Vec::new());
    };
    let place = last(expanded, 2);
    let mut behind: Vec<String> = [
        "standard_uncertainty",
        "own_uncertainty",
        "common_uncertainty",
    ]
    .iter()
    .filter_map(|key| number(of, key))
    .map(|figure| to_place(figure, last(figure, 2)))
    .collect();
    behind.extend(number(of, "coverage_factor").map(|k| format!("{k:.2}")));
    let pairs = [
        ("accept_lower", "accept_upper", " … "),
        ("reject_lower", "reject_upper", ", "),
    ];
    for (low, high, between) in pairs {
        let shown = |key| number(of, key).map(|figure| to_place(figure, place));
        behind.extend(match (shown(low), shown(high)) {
            (Some(low), Some(high)) if between == ", " => Some(format!("< {low}, > {high}")),
            (Some(low), Some(high)) => Some(format!("{low}{between}{high}")),
            (low, high) => low.or(high),
        });
    }
    let whole = format!("{} ± {}", to_place(value, place), to_place(expanded, place));
    (Some(whole), behind)
}

fn springs(record: &Value) -> &Vec<Value> {
    record["springs"].as_array().unwrap()
}

fn characteristics(spring: &Value) -> &Vec<Value> {
    spring["characteristics"].as_array().unwrap()
}

#[test]
fn the_table_holds_every_figure_as_it_is() {
    let (mut figures, mut misses) = (0, Vec::new());
    for sample in SAMPLES {
        let prints = prints(sample);
        let (header, rows) = csv_rows(&prints.csv);
        let mut count = 0;
        for spring in springs(&prints.record) {
            for of in characteristics(spring) {
                count += 1;
                let at = number(of, "at_length_mm").map_or(String::new(), |at| at.to_string());
                let key = [
                    text(spring, "id").to_owned(),
                    text(of, "name").to_owned(),
                    at,
                ];
                let row = &rows[&key];
                for name in FIGURES {
                    let cell = row[header.iter().position(|known| *known == name).unwrap()];
                    figures += u32::from(!cell.is_empty());
                    // Bit for bit: an empty cell for an absent figure.
                    if cell.parse::<f64>().ok() != number(of, name) {
                        misses.push(format!("{sample} {key:?} {name}: {cell} for {}", of[name]));
                    }
                }
            }
        }
        assert_eq!(rows.len(), count, "{sample}: rows of springs.csv");
    }
    assert!(figures > 1000, "{figures}");
    assert!(misses.is_empty(), "{misses:#?}");
}

#[test]
fn the_page_prints_every_figure_rounded() {
    let (mut figures, mut misses) = (0, Vec::new());
    for sample in SAMPLES {
        let prints = prints(sample);
        let rows = html_rows(&prints.html);
        for spring in springs(&prints.record) {
            let id = text(spring, "id");
            let own: Vec<&(String, Vec<String>)> = rows
                .iter()
                .filter(|(_, cells)| cells.first().is_some_and(|cell| cell == id))
                .collect();
            for of in characteristics(spring) {
                let (whole, behind) = printed(of);
                let what = format!(
                    "{sample}, spring {id}, {} {}",
                    of["name"], of["at_length_mm"]
                );
                let in_table = |whole: &String| {
                    own.iter().any(|(caption, cells)| {
                        caption.starts_with("Springs")
                            && cells.iter().any(|cell| cell.starts_with(whole.as_str()))
                    })
                };
                if whole.as_ref().is_some_and(|whole| !in_table(whole)) {
                    misses.push(format!("{what}: {whole:?}"));
                }
                figures += u32::from(whole.is_some());
                // All figures behind a value stand in one row.
                let together = own.iter().any(|(_, cells)| {
                    behind
                        .iter()
                        .all(|figure| cells.iter().any(|cell| cell.contains(figure.as_str())))
                });
                if !behind.is_empty() && !together {
                    misses.push(format!("{what}: {behind:?}"));
                }
                figures += u32::try_from(behind.len()).unwrap();
            }
        }
        for of in prints.record["drawing"]["requirements"].as_array().unwrap() {
            for key in ["nominal", "lower", "upper"] {
                let Some(figure) = number(of, key).map(stated) else {
                    continue;
                };
                let found = rows.iter().any(|(caption, cells)| {
                    caption.starts_with("Requirements") && cells.contains(&figure)
                });
                if !found {
                    misses.push(format!(
                        "{sample}, requirement {} {key}: {figure}",
                        of["name"]
                    ));
                }
            }
        }
    }
    assert!(figures > 1000, "{figures}");
    assert!(misses.is_empty(), "{misses:#?}");
}

#[test]
fn the_pdf_prints_every_figure_rounded() {
    let mut misses = Vec::new();
    for sample in SAMPLES {
        let prints = prints(sample);
        let Some(pdf) = &prints.pdf else { continue };
        let pdf = pdf.replace('\u{a0}', " ");
        // The PDF says that of many springs it prints what is behind the figures only for those that do not conform.
        let short =
            pdf.contains("The figures behind the values, and the fits, of springs that conform");
        assert_eq!(short, springs(&prints.record).len() > 12, "{sample}");
        for spring in springs(&prints.record) {
            let id = text(spring, "id");
            let own: Vec<&str> = pdf
                .lines()
                .filter(|line| line.split_whitespace().next() == Some(id))
                .collect();
            for of in characteristics(spring) {
                let (whole, behind) = printed(of);
                let what = format!(
                    "{sample}, spring {id}, {} {}",
                    of["name"], of["at_length_mm"]
                );
                let found = |figure: &String| own.iter().any(|line| line.contains(figure.as_str()));
                let behind = match spring["verdict"].as_str() {
                    Some("conforms") if short => Vec::new(),
                    _ => behind,
                };
                let absent = whole.iter().chain(&behind).filter(|figure| !found(figure));
                misses.extend(absent.map(|figure| format!("{what}: {figure}")));
            }
        }
    }
    assert!(misses.is_empty(), "{} of them: {misses:#?}", misses.len());
}

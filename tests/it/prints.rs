//! The four prints of a sample's result, read back: `result.json`, `springs.csv`, `report.html`, the PDF's text; and the
//! report's rounding, written anew.

use std::collections::HashMap;
use std::path::Path;
use std::process::Command;

use serde_json::Value;

/// The outputs of one sample.
pub(crate) struct Prints {
    pub(crate) record: Value,
    pub(crate) csv: String,
    pub(crate) html: String,
    /// The PDF's text, where there is a tool to take it.
    pub(crate) pdf: Option<String>,
}

pub(crate) fn prints(sample: &str) -> Prints {
    let folder = tempfile::tempdir().unwrap();
    let out = folder.path().join("out");
    let lot = Path::new(env!("CARGO_MANIFEST_DIR")).join(format!("samples/{sample}/lot.toml"));
    let run = Command::new(env!("CARGO_BIN_EXE_coilassay"))
        .args(["accept", "--date", "2026-12-01", "--out"])
        .args([&out, &lot])
        .output()
        .unwrap();
    assert_ne!(run.status.code(), Some(2), "{sample}: {run:?}");
    let read = |name: &str| std::fs::read_to_string(out.join(name)).unwrap();
    let pdf = Command::new("pdftotext")
        .args([
            "-layout".as_ref(),
            out.join("report.pdf").as_os_str(),
            "-".as_ref(),
        ])
        .output();
    if pdf.is_err() {
        println!("skipped: no pdftotext here, the PDF of {sample} is not read");
    }
    Prints {
        record: serde_json::from_str(&read("result.json")).unwrap(),
        csv: read("springs.csv"),
        html: read("report.html"),
        pdf: pdf.ok().map(|pdf| {
            assert!(pdf.status.success(), "{pdf:?}");
            String::from_utf8(pdf.stdout).unwrap()
        }),
    }
}

/// The power of ten of the last of `digits` significant digits, asked after rounding.
pub(crate) fn last(figure: f64, digits: i32) -> i32 {
    let places = usize::try_from(digits - 1).unwrap();
    let written = format!("{:.*e}", places, figure.abs());
    written.split_once('e').unwrap().1.parse::<i32>().unwrap() - (digits - 1)
}

pub(crate) fn to_place(figure: f64, place: i32) -> String {
    let text = if place < 0 {
        format!("{figure:.*}", usize::try_from(-place).unwrap())
    } else {
        let step = 10_f64.powi(place);
        format!("{:.0}", (figure / step).round() * step)
    };
    let nothing = text.chars().all(|c| "-0.".contains(c));
    match text.strip_prefix('-') {
        Some(rest) if nothing => rest.to_owned(),
        Some(rest) => format!("−{rest}"),
        None => text,
    }
}

/// To six significant digits, no zeros after them.
pub(crate) fn stated(figure: f64) -> String {
    let text = to_place(figure, last(figure, 6));
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

pub(crate) fn number(of: &Value, key: &str) -> Option<f64> {
    of[key].as_f64()
}

pub(crate) fn text<'a>(of: &'a Value, key: &str) -> &'a str {
    of[key].as_str().unwrap()
}

/// The cells of every body row of the report's tables, with the caption of the table.
pub(crate) fn html_rows(html: &str) -> Vec<(String, Vec<String>)> {
    let mut rows = Vec::new();
    for table in html.split("<table>").skip(1) {
        let table = table.split("</table>").next().unwrap();
        let caption = table
            .split("<caption>")
            .nth(1)
            .unwrap()
            .split("</caption>")
            .next()
            .unwrap();
        for row in table.split("<tr>").skip(2) {
            let cells = row.split("<td").skip(1).map(|cell| {
                let inner = cell
                    .split_once('>')
                    .unwrap()
                    .1
                    .split("</td>")
                    .next()
                    .unwrap();
                inner
                    .replace("<br>", " ")
                    .replace("&lt;", "<")
                    .replace("&gt;", ">")
            });
            rows.push((caption.to_owned(), cells.collect()));
        }
    }
    rows
}

/// The rows of a CSV table by spring, characteristic and length; the samples quote nothing before the figures.
pub(crate) fn csv_rows(csv: &str) -> (Vec<&str>, HashMap<[String; 3], Vec<&str>>) {
    let mut lines = csv.split("\r\n").filter(|line| !line.is_empty());
    let header: Vec<&str> = lines.next().unwrap().split(',').collect();
    let place = |name: &str| header.iter().position(|known| *known == name).unwrap();
    let keys = ["spring", "characteristic", "at_length_mm"].map(place);
    let rows = lines.map(|line| {
        let cells: Vec<&str> = line.split(',').collect();
        (keys.map(|at| cells[at].to_owned()), cells)
    });
    let rows = rows.collect();
    (header, rows)
}

//! Plans side by side: the page, its charts, and the same as text.

use super::{OutFile, ReportError, Template, html};
use crate::charts::operating;
use crate::model::{Holds, Offers, Table};
use crate::record::OffersRecord;
use crate::text::{Alphabet, printable};

/// `plan.html` and `charts/*.svg`; byte-identical for equal arguments.
///
/// # Errors
/// [`ReportError`] where the page or a chart cannot be made.
pub fn offers(record: &OffersRecord) -> Result<Vec<OutFile>, ReportError> {
    let template = Template {
        name: "templates/plan.html".to_owned(),
        text: include_str!("../../templates/plan.html").to_owned(),
    };
    let charts = operating::all(record)?;
    let model = serde_json::to_value(Offers::new(record)).map_err(ReportError::Model)?;
    let mut files = vec![OutFile {
        path: "plan.html".to_owned(),
        bytes: html::page(model, &charts, &template)?.into_bytes(),
    }];
    files.extend(charts.into_iter().map(|chart| OutFile {
        path: chart.file,
        bytes: chart.svg.into_bytes(),
    }));
    files.sort_by(|a, b| a.path.cmp(&b.path));
    Ok(files)
}

/// The same for the terminal: each plan under its own name, then the chances in columns.
pub fn offers_summary(record: &OffersRecord) -> String {
    let page = Offers::new(record);
    let mut lines = vec![page.subject.clone()];
    lines.extend(page.text.iter().map(|text| format!("  {text}")));
    if let Some((plans, rest)) = page.tables.split_first() {
        lines.extend(listed(plans));
        lines.extend(rest.iter().flat_map(columns));
    }
    lines
        .into_iter()
        .map(|line| printable(line.trim_end(), &Alphabet::Any) + "\n")
        .collect()
}

/// A table row by row, each cell behind its column's title.
fn listed(table: &Table) -> Vec<String> {
    let mut lines = Vec::new();
    for row in &table.rows {
        for (place, (cell, column)) in row.cells.iter().zip(&table.columns).enumerate() {
            if place == 0 {
                lines.push(cell.text.clone());
            } else {
                lines.push(format!("  {}: {} {}", column.title, cell.text, column.unit));
            }
        }
    }
    lines.push(table.note.clone());
    lines
}

/// A table in columns as wide as their widest cell, heads numbered where they are long.
fn columns(table: &Table) -> Vec<String> {
    let head = |place: usize, title: &str| {
        if place == 0 {
            format!("{title} %")
        } else {
            format!("plan {place}")
        }
    };
    let heads: Vec<String> = table
        .columns
        .iter()
        .enumerate()
        .map(|(place, column)| head(place, &column.title))
        .collect();
    let wide = |place: usize| {
        let cells = table.rows.iter().filter_map(|row| row.cells.get(place));
        let cells = cells.map(|cell| cell.text.chars().count());
        let head = heads.get(place).map_or(0, |head| head.chars().count());
        cells.max().unwrap_or(0).max(head)
    };
    let line = |texts: Vec<&str>| {
        let padded: Vec<String> = texts
            .into_iter()
            .enumerate()
            .map(
                |(place, text)| match table.columns.get(place).map(|one| one.holds) {
                    Some(Holds::Words) => format!("{text:<width$}", width = wide(place)),
                    _ => format!("{text:>width$}", width = wide(place)),
                },
            )
            .collect();
        format!("  {}", padded.join("  "))
    };
    let mut lines = vec![
        format!("{}; plans in the order above", table.caption),
        line(heads.iter().map(String::as_str).collect()),
    ];
    lines.extend(
        table
            .rows
            .iter()
            .map(|row| line(row.cells.iter().map(|cell| cell.text.as_str()).collect())),
    );
    lines
}

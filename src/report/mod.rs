//! A record as files: HTML, PDF, charts, CSV, and the terminal's summary.
//! Elsewhere: what stands where (`model`), charts (`charts`), figures and words (`wording`), writing files (`cli`).

mod csv;
mod error;
mod gate;
mod html;
mod offers;
mod pdf;
mod plain;
mod summary;

pub use csv::springs_csv;
pub use error::ReportError;
pub use summary::{page_summary, summary};

pub use offers::{offers, offers_summary};
use serde::Serialize;

use crate::charts;
use crate::charts::Chart;
use crate::curve::Reduced;
use crate::model::{Model, Page};
use crate::record::{AcceptRecord, CheckRecord, Expected, RepeatRecord, TrackRecord};
use crate::units::System;

/// A template and the name of its file, for faults.
#[derive(Clone, Debug)]
pub struct Template {
    /// The file's name as written.
    pub name: String,
    /// Its text.
    pub text: String,
}

/// The templates of the report's pages.
#[derive(Clone, Debug)]
pub struct Templates {
    /// Of `report.html`, for minijinja.
    pub html: Template,
    /// Of `report.pdf`, for typst.
    pub typst: Template,
}

impl Templates {
    /// The file name of the HTML template in a user's folder.
    pub const HTML: &'static str = "report.html";
    /// The file name of the PDF template in a user's folder.
    pub const TYPST: &'static str = "report.typ";

    /// The templates that come with the tool.
    pub fn built_in() -> Self {
        let template = |name: &str, text: &str| Template {
            name: format!("templates/{name}"),
            text: text.to_owned(),
        };
        Self {
            html: template(Self::HTML, include_str!("../../templates/report.html")),
            typst: template(Self::TYPST, include_str!("../../templates/report.typ")),
        }
    }
}

/// A file of the output folder.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct OutFile {
    /// Path inside the folder, with `/`.
    pub path: String,
    /// Contents.
    pub bytes: Vec<u8>,
}

/// `report.html`, `report.pdf` and `charts/*.svg` of one lot, figures in the units of `show_in`; byte-identical for equal arguments.
///
/// # Errors
/// [`ReportError`] where a template does not fit the model, or a page cannot be made.
pub fn accept(
    record: &AcceptRecord,
    curves: &[Reduced],
    show_in: System,
    templates: &Templates,
) -> Result<Vec<OutFile>, ReportError> {
    let (model, charts) = rayon::join(
        || Model::new(record, show_in),
        || charts::all(record, curves, show_in),
    );
    files(&model, charts?, templates)
}

/// The files of a check: its page, and its charts with `readings` of the plates' run (N, mm).
///
/// # Errors
/// [`ReportError`] as in [`accept`].
pub fn check(
    record: &CheckRecord,
    page: &Page,
    readings: &[(f64, f64)],
    show_in: System,
    templates: &Templates,
) -> Result<Vec<OutFile>, ReportError> {
    files(page, charts::check(record, readings, show_in)?, templates)
}

/// The files of a study: its page and its charts.
///
/// # Errors
/// [`ReportError`] as in [`accept`].
pub fn study(
    record: &RepeatRecord,
    page: &Page,
    show_in: System,
    templates: &Templates,
) -> Result<Vec<OutFile>, ReportError> {
    files(page, charts::study(record, show_in)?, templates)
}

fn files(
    model: &(impl Serialize + Sync),
    charts: Vec<Chart>,
    templates: &Templates,
) -> Result<Vec<OutFile>, ReportError> {
    let data = || serde_json::to_value(model).map_err(ReportError::Model);
    let (html, pdf) = rayon::join(
        || html::page(data()?, &charts, &templates.html),
        || pdf::document(data()?, &charts, &templates.typst),
    );
    let mut files = vec![
        OutFile {
            path: "report.html".to_owned(),
            bytes: html?.into_bytes(),
        },
        OutFile {
            path: "report.pdf".to_owned(),
            bytes: pdf?,
        },
    ];
    files.extend(charts.into_iter().map(|chart| OutFile {
        path: chart.file,
        bytes: chart.svg.into_bytes(),
    }));
    Ok(files)
}

/// The files of what a drawing leads to expect: its page and its chart.
///
/// # Errors
/// [`ReportError`] as in [`accept`].
pub fn expected(
    record: &Expected,
    page: &Page,
    show_in: System,
    templates: &Templates,
) -> Result<Vec<OutFile>, ReportError> {
    files(page, charts::expected(record, show_in)?, templates)
}

/// The files of a characteristic over lots: its page and its charts.
///
/// # Errors
/// [`ReportError`] as in [`accept`].
pub fn tracked(
    record: &TrackRecord,
    page: &Page,
    show_in: System,
    templates: &Templates,
) -> Result<Vec<OutFile>, ReportError> {
    files(page, charts::tracked(record, show_in)?, templates)
}

/// A whole page for the terminal; it ends with a line end.
pub fn page_text(page: &Page) -> String {
    plain::text(page)
}

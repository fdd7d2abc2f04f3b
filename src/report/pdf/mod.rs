//! `report.pdf`: the model through typst, PDF/A-2b.

mod columns;

use serde_json::{Map, Value, json};
use typst::diag::SourceDiagnostic;
use typst::foundations::{Dict, IntoValue};
use typst::syntax::{DiagSpanKind, Source};
use typst_as_lib::{TypstAsLibError, TypstEngine};
use typst_layout::PagedDocument;
use typst_pdf::{PdfOptions, PdfStandard, PdfStandards};

use crate::charts::Chart;
use crate::report::{ReportError, Template, gate};
use crate::wording::font;

/// The document. Its date is the record's; data goes in as JSON, never as markup.
///
/// # Errors
/// [`ReportError::Template`] where the template does not compile or names what the model does not have.
pub(super) fn document(
    model: Value,
    charts: &[Chart],
    template: &Template,
) -> Result<Vec<u8>, ReportError> {
    let source = Source::detached(template.text.as_str());
    let engine = TypstEngine::builder()
        .main_file(source.clone())
        .fonts([font::REGULAR, font::BOLD])
        .comemo_evict_max_age(None)
        .build();
    let mut inputs = Dict::new();
    inputs.insert("data".into(), data(model, charts).into_value());
    let compiled = engine.compile_with_input::<_, PagedDocument>(inputs).output;
    let document = compiled.map_err(|error| fault(template, &source, &error))?;
    let standards = PdfStandards::new(&[PdfStandard::A_2b])
        .map_err(|error| whole(template, error.message().as_str()))?;
    let options = PdfOptions {
        standards,
        tagged: false,
        ..PdfOptions::default()
    };
    typst_pdf::pdf(&document, &options).map_err(|errors| match errors.first() {
        Some(first) => pointed(template, &source, first),
        None => whole(template, "no PDF was made"),
    })
}

fn data(mut report: Value, charts: &[Chart]) -> String {
    gate::for_print(&mut report);
    columns::fit(&mut report);
    let charts = charts.iter().map(|chart| {
        json!({"file": chart.file, "title": font::fitting(&chart.title), "caption": font::fitting(&chart.caption), "svg": chart.svg})
    });
    let mut data = Map::new();
    data.insert("charts".to_owned(), charts.collect());
    data.insert("report".to_owned(), report);
    Value::Object(data).to_string()
}

fn fault(template: &Template, source: &Source, error: &TypstAsLibError) -> ReportError {
    match error {
        TypstAsLibError::TypstSource(errors) => match errors.first() {
            Some(first) => pointed(template, source, first),
            None => whole(template, "it does not compile"),
        },
        other => whole(template, &other.to_string()),
    }
}

fn whole(template: &Template, message: &str) -> ReportError {
    ReportError::in_template(template, None, message.to_owned())
}

fn pointed(template: &Template, source: &Source, error: &SourceDiagnostic) -> ReportError {
    let span = match error.span.get() {
        DiagSpanKind::Number { num, sub_range, .. } => source.range(num, sub_range),
        DiagSpanKind::Range { range, .. } => Some(range),
        DiagSpanKind::Detached => None,
    };
    ReportError::in_template(template, span, error.message.to_string())
}

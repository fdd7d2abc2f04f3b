//! Why a report could not be made.
#![expect(missing_docs, reason = "the messages say it")]

use std::ops::Range;
use std::sync::Arc;

use miette::SourceSpan;

use super::Template;
use crate::sheet::ChartError;
use crate::text::{Excerpt, Place};

/// Why a report could not be made.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub enum ReportError {
    #[error("template `{name}`, line {line}, column {column}: {message}")]
    #[diagnostic(
        code(coilassay::report::template),
        help("compare it with the built-in template, or leave out --templates")
    )]
    Template {
        name: String,
        message: String,
        line: usize,
        column: usize,
        #[source_code]
        file: Arc<Excerpt>,
        #[label("here")]
        cell: SourceSpan,
    },
    #[error("template `{name}`: {message}")]
    #[diagnostic(
        code(coilassay::report::template),
        help("compare it with the built-in template, or leave out --templates")
    )]
    TemplateWhole { name: String, message: String },
    #[error(transparent)]
    #[diagnostic(transparent)]
    Chart(#[from] ChartError),
    #[error("cannot write the report's data")]
    #[diagnostic(code(coilassay::report::model))]
    Model(#[source] serde_json::Error),
}

impl ReportError {
    /// A fault in a template, at `span` (bytes of its text) where that is known.
    pub(super) fn in_template(
        template: &Template,
        span: Option<Range<usize>>,
        message: String,
    ) -> Self {
        let Some(span) = span else {
            return Self::TemplateWhole {
                name: template.name.clone(),
                message,
            };
        };
        let place = Place::in_text(&template.name, &template.text, span);
        Self::Template {
            name: template.name.clone(),
            message,
            line: place.line,
            column: place.column,
            file: place.excerpt,
            cell: place.span,
        }
    }
}

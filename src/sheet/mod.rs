//! What charts are drawn on: a canvas of whole tenths (plotters' coordinates are whole pixels), axes, scales, legends.
//! Elsewhere: what is drawn (`charts`), figures and words (`wording`).

pub(crate) mod canvas;
pub(crate) mod plot;

/// Why a chart could not be drawn.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[error("cannot draw `{chart}`: {message}")]
#[diagnostic(code(coilassay::charts::draw))]
#[expect(missing_docs, reason = "the message says it")]
pub struct ChartError {
    pub chart: String,
    pub message: String,
}

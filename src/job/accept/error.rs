//! Why a lot is not judged.

use crate::characteristic::MeasureError;

/// Why a lot is not judged.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub(super) enum AcceptError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    Measure(Box<MeasureError>),
    #[error("the drawing `{drawing}` states no acceptance terms")]
    #[diagnostic(
        code(coilassay::accept::terms),
        help("agree them and write [acceptance] with rule and plan into the drawing")
    )]
    NoTerms { drawing: String },
    #[error("the drawing `{drawing}` requires nothing that could be judged")]
    #[diagnostic(
        code(coilassay::accept::requirements),
        help("write [requirements] into the drawing: rate, loads at lengths …")
    )]
    NoRequirements { drawing: String },
    #[error("spring `{spring}` is measured twice: in `{first}` (lines {}–{}) and in `{second}` (lines {}–{})", first_lines.0, first_lines.1, second_lines.0, second_lines.1)]
    #[diagnostic(
        code(coilassay::accept::twice),
        help(
            "if it was measured again, name the second export in a [[repeat]] with its reason; if these are two springs, give them two names"
        )
    )]
    Twice {
        spring: String,
        first: String,
        first_lines: (u64, u64),
        second: String,
        second_lines: (u64, u64),
    },
    #[error(
        "the repeat of spring `{spring}` in `{export}` holds {found} springs where one is wanted"
    )]
    #[diagnostic(
        code(coilassay::accept::repeat),
        help("a repeat names an export of that one spring")
    )]
    RepeatOfMany {
        spring: String,
        export: String,
        found: usize,
    },
    #[error("the lot file names spring `{spring}` under `{key}`, but no export holds it")]
    #[diagnostic(code(coilassay::accept::unknown_spring), help("springs here: {known}"))]
    UnknownSpring {
        spring: String,
        key: &'static str,
        known: String,
    },
    #[error("{what}")]
    #[diagnostic(
        code(coilassay::accept::strict),
        help("without --strict this is a caution on page one")
    )]
    Strict { what: String },
}

//! Why a lot is not judged.

use crate::characteristic::MeasureError;
use crate::export::ExportError;

/// A report of another room, shown beside others.
#[derive(Debug)]
pub(super) struct Forwarded(pub(super) miette::Report);

impl std::fmt::Display for Forwarded {
    fn fmt(&self, out: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        std::fmt::Display::fmt(&self.0, out)
    }
}

impl std::error::Error for Forwarded {
    fn source(&self) -> Option<&(dyn std::error::Error + 'static)> {
        self.0.source()
    }
}

impl miette::Diagnostic for Forwarded {
    fn code<'a>(&'a self) -> Option<Box<dyn std::fmt::Display + 'a>> {
        self.0.code()
    }

    fn help<'a>(&'a self) -> Option<Box<dyn std::fmt::Display + 'a>> {
        self.0.help()
    }

    fn source_code(&self) -> Option<&dyn miette::SourceCode> {
        self.0.source_code()
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = miette::LabeledSpan> + '_>> {
        self.0.labels()
    }

    fn related<'a>(&'a self) -> Option<Box<dyn Iterator<Item = &'a dyn miette::Diagnostic> + 'a>> {
        self.0.related()
    }
}

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
    #[error(
        "inspection is discontinued: `{history}` shows that lot {lot} was the fifth not accepted while tightened"
    )]
    #[diagnostic(
        code(coilassay::accept::discontinued),
        help(
            "once the supplier has acted, add a line with the decision resumed to the history; until then measure every spring (by = \"every-spring\")"
        )
    )]
    Discontinued { history: String, lot: String },
    #[error("past lots (`{history}`) change nothing under this plan")]
    #[diagnostic(
        code(coilassay::accept::history),
        help(
            "only by = \"attributes\" (ISO 2859-1) switches between normal, tightened and reduced; leave the history out"
        )
    )]
    HistoryUnused { history: String },
    #[error("the process figures cannot be computed")]
    #[diagnostic(
        code(coilassay::accept::process),
        help("a figure in the rig file or the export is far out of any usable size")
    )]
    Process {
        #[source]
        cause: crate::stats::StatsError,
    },
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
    #[error(
        "spring `{second}` in `{second_export}` has the very points of spring `{first}` in `{first_export}`, digit for digit"
    )]
    #[diagnostic(
        code(coilassay::accept::same_points),
        help(
            "no two measurements agree in every digit: was a file copied? Export the measurement again"
        )
    )]
    SamePoints {
        first: String,
        first_export: String,
        second: String,
        second_export: String,
    },
    #[error("the repeat of spring `{spring}` in `{export}` holds spring `{found}`")]
    #[diagnostic(
        code(coilassay::accept::repeat_of_other),
        help("name the export that holds spring `{spring}`, or the spring that was repeated")
    )]
    RepeatOfOther {
        spring: String,
        export: String,
        found: String,
    },
    #[error("the caliper findings name spring `{spring}`, but no export holds it")]
    #[diagnostic(
        code(coilassay::accept::unknown_finding),
        help("write ids as the exports do; springs here: {known}")
    )]
    UnknownFinding { spring: String, known: String },
    #[error(
        "the caliper findings of {column} lie {ratio:.3} times where the drawing has them: {finding}"
    )]
    #[diagnostic(
        code(coilassay::accept::finding_units),
        help(
            "check the units in the second line of the findings, and `units` at the top of the drawing"
        )
    )]
    FindingUnits {
        column: &'static str,
        ratio: f64,
        finding: &'static str,
    },
    #[error("nothing that the drawing requires was inspected")]
    #[diagnostic(
        code(coilassay::accept::nothing),
        help("a lot is decided on at least one requirement: shorten `not_inspected`")
    )]
    NothingInspected,
    #[error("{count} exports cannot be used")]
    #[diagnostic(code(coilassay::accept::exports))]
    Exports {
        count: usize,
        #[related]
        shown: Vec<ExportError>,
    },
    #[error("the lot's files have faults")]
    #[diagnostic(code(coilassay::accept::files))]
    Files {
        #[related]
        faults: Vec<Forwarded>,
    },
    #[error("{what}")]
    #[diagnostic(
        code(coilassay::accept::strict),
        help("without --strict this is a caution on page one")
    )]
    Strict { what: String },
}

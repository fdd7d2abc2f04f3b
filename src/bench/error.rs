//! What `bench` refuses.
#![expect(missing_docs, reason = "the messages say it")]

use crate::fit::FitError;
use crate::stats::StatsError;

/// Why nothing can be said of the bench.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub enum BenchError {
    #[error(
        "part `{part}`, operator `{operator}` has {found} trials where the others have {wanted}"
    )]
    #[diagnostic(
        code(coilassay::bench::unbalanced),
        help("a crossed study measures every part by every operator equally often")
    )]
    Unbalanced {
        part: String,
        operator: String,
        found: usize,
        wanted: usize,
    },
    #[error("trial `{trial}` of part `{part}` by operator `{operator}` stands twice")]
    #[diagnostic(
        code(coilassay::bench::twice),
        help("give every measurement a trial of its own")
    )]
    Twice {
        part: String,
        operator: String,
        trial: String,
    },
    #[error("the study has {found} {what} where at least two are wanted")]
    #[diagnostic(
        code(coilassay::bench::too_few),
        help("measure at least two springs, each at least twice")
    )]
    TooFew { what: &'static str, found: usize },
    #[error("the plates' run has {found} readings under load in one pass, and ten are wanted")]
    #[diagnostic(
        code(coilassay::bench::plates),
        help(
            "record the platens pressed on each other, from no load to the largest load in use, in small steps"
        )
    )]
    FewReadings { found: usize },
    #[error("the load never rises by more than the contact load in the plates' run")]
    #[diagnostic(
        code(coilassay::bench::no_load),
        help("press the platens on each other up to the largest load in use, without a spring")
    )]
    NoLoad,
    #[error(
        "the platens give {give:.4} mm under {load:.0} N, which is a spring and no frame: more than 2 mm"
    )]
    #[diagnostic(
        code(coilassay::bench::no_frame),
        help("is a spring between the platens? Record them on each other, or on a hard block")
    )]
    NoFrame { give: f64, load: f64 },
    #[error("the travel falls back while the load rises in the plates' run")]
    #[diagnostic(
        code(coilassay::bench::wrong_way),
        help(
            "is this the run of plate on plate, and does the rig file say what its travel means?"
        )
    )]
    WrongWay,
    #[error("the plates' run cannot be fitted")]
    #[diagnostic(code(coilassay::bench::fit))]
    Fit(#[from] FitError),
    #[error("an uncertainty of the bench cannot be computed")]
    #[diagnostic(
        code(coilassay::bench::statistics),
        help("a figure in the rig file or the export is far out of any usable size")
    )]
    Statistics(#[from] StatsError),
}

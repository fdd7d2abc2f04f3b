//! What keeps `track` from charting.
#![expect(missing_docs, reason = "the messages say it")]

use crate::archive::{ArchiveError, TableError};

/// Why nothing can be charted.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub enum TrackError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    Archive(#[from] ArchiveError),
    #[error(transparent)]
    #[diagnostic(transparent)]
    Table(#[from] TableError),
    #[error(transparent)]
    #[diagnostic(transparent)]
    Text(#[from] crate::text::TextError),
    #[error("no lot answers to what was asked")]
    #[diagnostic(
        code(coilassay::track::none),
        help("`coilassay lots` shows what there is")
    )]
    NoLot,
    #[error("{count} files of the archive cannot be read, the first is {first}")]
    #[diagnostic(
        code(coilassay::track::broken),
        help(
            "restore them or move them out of the archive: a series with a hole may hide the lot that moved"
        )
    )]
    Broken { count: usize, first: String },
    #[error("the lots are of {} drawings: {}", .found.len(), .found.join(", "))]
    #[diagnostic(code(coilassay::track::drawings), help("name one with --drawing"))]
    Drawings { found: Vec<String> },
    #[error("there is no `{wanted}` in the lots; there is {}", .found.join(", "))]
    #[diagnostic(
        code(coilassay::track::characteristic),
        help("name one with --characteristic, a load with its length as in load@40")
    )]
    Characteristic { wanted: String, found: Vec<String> },
    #[error("lot `{lot}` is in the sources twice")]
    #[diagnostic(
        code(coilassay::track::twice),
        help("name each source once, and of a lot judged again only the result that counts")
    )]
    Twice { lot: String },
    #[error("the characteristic is in {one} in lot `{lot}`, in {other} in others")]
    #[diagnostic(code(coilassay::track::units), help("track one drawing at a time"))]
    Units {
        lot: String,
        one: &'static str,
        other: &'static str,
    },
    #[error(
        "the means of the {lots} lots of the baseline do not differ at all, so that no limits follow"
    )]
    #[diagnostic(
        code(coilassay::track::no_scatter),
        help(
            "name another baseline with --baseline, or look whether the lots are copies of each other"
        )
    )]
    NoScatter { lots: usize },
    #[error("no lot has the tag `{tag}`")]
    #[diagnostic(
        code(coilassay::track::tag),
        help("compare by supplier, rig or a tag of the lot files")
    )]
    NoTag { tag: String },
    #[error("{what} is no finite number")]
    #[diagnostic(
        code(coilassay::track::finite),
        help("look for a figure of absurd size in the lots")
    )]
    NotFinite { what: &'static str },
}

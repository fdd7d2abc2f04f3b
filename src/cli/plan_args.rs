//! The flags of `plan`.

use std::path::PathBuf;

use clap::Args;
use jiff::civil::Date;

#[derive(Debug, Args)]
pub(super) struct PlanArgs {
    /// Springs in the lot
    #[arg(long, value_name = "N")]
    pub(super) lot_size: u64,
    /// AQL of ISO 2859-1 in percent (may be given again)
    #[arg(long, value_name = "PERCENT")]
    pub(super) aql: Vec<f64>,
    /// Inspection level: S-1 to S-4, I, II, III (may be given again; else II)
    #[arg(long, value_name = "LEVEL", requires = "aql")]
    pub(super) level: Vec<String>,
    /// normal, tightened or reduced (may be given again; else normal, or what the history says)
    #[arg(long, value_name = "STATE")]
    pub(super) state: Vec<String>,
    /// AQL of MIL-STD-414 Table B, by variables (may be given again)
    #[arg(long, value_name = "PERCENT")]
    pub(super) mil_std_414: Vec<f64>,
    /// Inspection level of MIL-STD-414: I to V
    #[arg(long, value_name = "LEVEL", default_value = "IV")]
    pub(super) level_414: String,
    /// A plan by variables designed from two points, as in 1%:5%:5%:10% (may be given again)
    #[arg(long, value_name = "P1:ALPHA:P2:BETA")]
    pub(super) designed: Vec<String>,
    /// A zero-accept plan for a limiting quality and a consumer's risk, as in 4%:10% (may be given again)
    #[arg(long, value_name = "LQ:RISK")]
    pub(super) zero_accept: Vec<String>,
    /// The bench: U and the springs' standard deviation over the half tolerance, and the common share of u², as in 25%:33%:80%
    #[arg(long, value_name = "U:SPREAD:COMMON")]
    pub(super) bench: Option<String>,
    /// Past lots for the switching rules of ISO 2859-1: date,lot,decision,accept,accepted_tighter
    #[arg(
        long,
        value_name = "FILE.csv",
        conflicts_with = "state",
        requires = "aql"
    )]
    pub(super) history: Option<PathBuf>,
    /// Reduced inspection is agreed, should the history earn it
    #[arg(long, requires = "history")]
    pub(super) reduced_agreed: bool,
    /// Folder for plan.html, charts and result.json; nothing is written without it
    #[arg(long, value_name = "DIR")]
    pub(super) out: Option<PathBuf>,
    /// As JSON on stdout, and nothing else there
    #[arg(long)]
    pub(super) json: bool,
    /// Date on the page; else SOURCE_DATE_EPOCH, else today (UTC)
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) date: Option<Date>,
}

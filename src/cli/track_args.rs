//! The flags of `track`.

use std::path::PathBuf;

use clap::{Args, ValueEnum};
use jiff::civil::Date;

use super::args::ShowIn;
use crate::record::LotOrder;

#[derive(Debug, Args)]
pub(super) struct TrackArgs {
    /// An archive's folder, a folder of results, or a table of per-lot figures (.csv or .parquet)
    #[arg(required = true, value_name = "SOURCE")]
    pub(super) sources: Vec<PathBuf>,
    /// What is charted, as in rate, free_length, load@40; else rate
    #[arg(long, value_name = "NAME[@MM]")]
    pub(super) characteristic: Option<String>,
    /// Only lots of this drawing number
    #[arg(long, value_name = "NUMBER")]
    pub(super) drawing: Option<String>,
    /// Received on this day or later; judged, where no date received is stated
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) since: Option<Date>,
    /// Lots that the limits come from, by their dates; else the first half of the lots, at most 20
    #[arg(long, value_name = "FROM..TO", value_parser = period)]
    pub(super) baseline: Option<(Date, Date)>,
    /// How many lots count as the newest: a rule that fires on one of them is exit 1
    #[arg(long, value_name = "LOTS", default_value_t = 5, value_parser = clap::value_parser!(u32).range(1..))]
    pub(super) newest: u32,
    /// What the lots are ordered by
    #[arg(long, value_enum, default_value_t = Order::Date)]
    pub(super) order: Order,
    /// All eight run rules on the chart of means
    #[arg(long)]
    pub(super) all_rules: bool,
    /// Lots side by side: supplier, rig or a tag of the lot files
    #[arg(long, value_name = "supplier|rig|TAG")]
    pub(super) by: Option<String>,
    /// Folder for report.html, report.pdf, charts and result.json; nothing is written without it
    #[arg(long, value_name = "DIR")]
    pub(super) out: Option<PathBuf>,
    /// Only result.json, no report and no charts
    #[arg(long, requires = "out")]
    pub(super) no_report: bool,
    /// The result as JSON on stdout, and nothing else there
    #[arg(long)]
    pub(super) json: bool,
    /// A folder with templates of your own: report.html, report.typ
    #[arg(long, value_name = "DIR")]
    pub(super) templates: Option<PathBuf>,
    /// Units that people read; JSON is always mm and N
    #[arg(long, value_enum, default_value_t = ShowIn::MmN, value_name = "UNITS")]
    pub(super) show_in: ShowIn,
    /// Date on the report; else SOURCE_DATE_EPOCH, else today (UTC)
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) date: Option<Date>,
}

/// What lots are ordered by.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(super) enum Order {
    /// Date received, else judged
    Date,
    /// Lot number
    Lot,
}

impl From<Order> for LotOrder {
    fn from(order: Order) -> Self {
        match order {
            Order::Date => Self::Date,
            Order::Lot => Self::Lot,
        }
    }
}

fn period(text: &str) -> Result<(Date, Date), String> {
    let wrong = || "write it as 2026-01-01..2026-06-30".to_owned();
    let (from, to) = text.split_once("..").ok_or_else(wrong)?;
    let day = |text: &str| text.parse::<Date>().map_err(|_| wrong());
    let (from, to) = (day(from)?, day(to)?);
    if from > to {
        return Err("it ends before it begins".to_owned());
    }
    Ok((from, to))
}

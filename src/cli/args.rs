//! The command line.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand, ValueEnum};
use jiff::civil::Date;

use crate::units::System;

use super::plan_args::PlanArgs;
use super::track_args::TrackArgs;

/// Judges coil springs from what a bench tester measured.
#[derive(Debug, Parser)]
#[command(name = "coilassay", version, about, long_about = None, disable_help_subcommand = true)]
pub(super) struct Arguments {
    #[command(subcommand)]
    pub(super) command: Command,
    /// When faults are shown in colour
    #[arg(long, global = true, value_enum, default_value_t = Colour::Auto, value_name = "WHEN")]
    pub(super) color: Colour,
    /// No notices on stderr
    #[arg(long, global = true)]
    pub(super) quiet: bool,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
/// When to use colour.
pub enum Colour {
    /// On a terminal, unless `NO_COLOR` is set
    Auto,
    /// Always
    Always,
    /// Never
    Never,
}

#[derive(Debug, Subcommand)]
pub(super) enum Command {
    /// Judges a lot and writes the report (exit 0 accepted, 1 rejected, 3 undecided, 2 could not judge)
    Accept(AcceptArgs),
    /// Rate with its uncertainty, and loads, of one or more curves; no drawing needed
    Rate(RateArgs),
    /// What the drawn spring should do, before anything is measured (exit 1 if the drawing contradicts itself)
    Expect(ExpectArgs),
    /// Finds lots in an archive, or in a table of per-lot figures
    Lots(LotsArgs),
    /// Charts a characteristic over lots: what moved, when, how fast, springs or rig (exit 0 no rule fires, 1 one does on the newest lots, 3 too few lots, 2 could not)
    Track(TrackArgs),
    /// Recomputes sealed results from their inputs (exit 0 same, 1 different, 2 could not or an input changed)
    Recheck(RecheckArgs),
    /// What a rig is worth: a check on a reference spring, a repeatability study
    Rig {
        #[command(subcommand)]
        command: RigCommand,
    },
    /// A commented starter file, on stdout or as a file that is not there yet
    Draft {
        #[command(subcommand)]
        kind: Draft,
    },
    /// Sampling plans side by side: what each takes, and what it lets through
    Plan(PlanArgs),
    /// Completions for a shell, on stdout
    Completions {
        /// The shell
        shell: clap_complete::Shell,
    },
    /// Writes the manual pages into a folder
    Manual {
        /// The folder
        dir: PathBuf,
    },
}

#[derive(Debug, Subcommand)]
pub(super) enum Draft {
    /// A rig file that reads this export, with the reason for each guess and a line for each doubt
    Rig {
        /// An export as the tester wrote it
        #[arg(value_name = "EXPORT")]
        export: String,
    },
    /// A drawing with every key explained
    Drawing {
        /// The new file; without it the text goes to stdout
        #[arg(value_name = "FILE")]
        file: Option<PathBuf>,
    },
    /// A lot file with every key explained
    Lot {
        /// The new file; without it the text goes to stdout
        #[arg(value_name = "FILE")]
        file: Option<PathBuf>,
    },
}

#[derive(Debug, Args)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a flag of the command line"
)]
pub(super) struct AcceptArgs {
    /// The lot file
    #[arg(value_name = "LOT.toml")]
    pub(super) lot: PathBuf,
    /// Folder for report.html, report.pdf, springs.csv, charts and result.json; nothing is written without it
    #[arg(long, value_name = "DIR")]
    pub(super) out: Option<PathBuf>,
    /// Archive that keeps this judgement, begun where the folder is empty or not there
    #[arg(long, value_name = "DIR")]
    pub(super) archive: Option<PathBuf>,
    /// Only result.json and springs.csv, no report and no charts
    #[arg(long, requires = "out")]
    pub(super) no_report: bool,
    /// The result as JSON on stdout, and nothing else there
    #[arg(long)]
    pub(super) json: bool,
    /// A warning on the rig is a refusal (exit 2)
    #[arg(long)]
    pub(super) strict: bool,
    /// Units that people read; result.json is always mm and N
    #[arg(long, value_enum, default_value_t = ShowIn::MmN, value_name = "UNITS")]
    pub(super) show_in: ShowIn,
    /// A folder with templates of your own: report.html, report.typ
    #[arg(long, value_name = "DIR")]
    pub(super) templates: Option<PathBuf>,
    /// Date of the judgement; else SOURCE_DATE_EPOCH, else today (UTC)
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) date: Option<Date>,
    /// Past lots for the switching rules of ISO 2859-1: date,lot,decision,accept,accepted_tighter
    #[arg(long, value_name = "FILE.csv")]
    pub(super) history: Option<PathBuf>,
    /// You stand for the units although they look mixed up; the report says so
    #[arg(long)]
    pub(super) units_confirmed: bool,
}

#[derive(Debug, Subcommand)]
pub(super) enum RigCommand {
    /// Checks a rig on a reference spring, and its frame plate on plate (exit 0 serves, 1 does not, 3 undecided, 2 could not)
    Verify(VerifyArgs),
    /// Studies the repeatability of a rig (exit 0 serves, 1 does not, 3 undecided, 2 could not)
    Repeat(RigArgs),
}

#[derive(Debug, Args)]
pub(super) struct VerifyArgs {
    #[command(flatten)]
    pub(super) rig: RigArgs,
    /// Archive that keeps this check and knows the earlier ones
    #[arg(long, value_name = "DIR")]
    pub(super) archive: Option<PathBuf>,
}

#[derive(Debug, Args)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a flag of the command line"
)]
pub(super) struct RigArgs {
    /// The check file, or the study file
    #[arg(value_name = "FILE.toml")]
    pub(super) file: PathBuf,
    /// Writes what was found into the rig file, its comments kept; shows the change
    #[arg(long)]
    pub(super) write: bool,
    /// Folder for report.html, report.pdf, charts and result.json; nothing is written without it
    #[arg(long, value_name = "DIR")]
    pub(super) out: Option<PathBuf>,
    /// Only result.json, no report and no charts
    #[arg(long, requires = "out")]
    pub(super) no_report: bool,
    /// The result as JSON on stdout, and nothing else there
    #[arg(long)]
    pub(super) json: bool,
    /// A warning on the rig is a refusal (exit 2)
    #[arg(long)]
    pub(super) strict: bool,
    /// Units that people read; result.json is always mm and N
    #[arg(long, value_enum, default_value_t = ShowIn::MmN, value_name = "UNITS")]
    pub(super) show_in: ShowIn,
    /// A folder with templates of your own: report.html, report.typ
    #[arg(long, value_name = "DIR")]
    pub(super) templates: Option<PathBuf>,
    /// Date of the judgement; else SOURCE_DATE_EPOCH, else today (UTC)
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) date: Option<Date>,
}

/// Units that people read.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(super) enum ShowIn {
    /// Millimetres and newtons
    #[value(name = "mm-N")]
    MmN,
    /// Inches and pounds-force
    #[value(name = "in-lbf")]
    InLbf,
}

impl From<ShowIn> for System {
    fn from(shown: ShowIn) -> Self {
        match shown {
            ShowIn::MmN => Self::MmN,
            ShowIn::InLbf => Self::InLbf,
        }
    }
}

#[derive(Debug, Args)]
pub(super) struct RateArgs {
    /// Exports as the tester wrote them
    #[arg(required = true, value_name = "EXPORT")]
    pub(super) exports: Vec<String>,
    /// Rig file that says how the exports are written and what the bench is worth
    #[arg(long, value_name = "RIG.toml", conflicts_with_all = ["load", "travel"])]
    pub(super) rig: Option<String>,
    /// Load column and its unit, as in "Force:N"
    #[arg(long, value_name = "COLUMN:UNIT", requires = "travel")]
    pub(super) load: Option<String>,
    /// Travel column, its unit, and what it means
    #[arg(long, value_name = "COLUMN:UNIT:deflection|length", requires = "load")]
    pub(super) travel: Option<String>,
    /// Also the load at this length in mm (may be given again)
    #[arg(long, value_name = "MM")]
    pub(super) at_length: Vec<f64>,
    /// As JSON
    #[arg(long)]
    pub(super) json: bool,
}

#[derive(Debug, Args)]
pub(super) struct ExpectArgs {
    /// The drawing
    #[arg(value_name = "DRAWING.toml")]
    pub(super) drawing: PathBuf,
    /// Deflection and stress at this load in N
    #[arg(long, value_name = "N", conflicts_with = "at_length")]
    pub(super) at_load: Option<f64>,
    /// Load and stress at this length in mm
    #[arg(long, value_name = "MM")]
    pub(super) at_length: Option<f64>,
    /// Folder for report.html, report.pdf, the chart and result.json; nothing is written without it
    #[arg(long, value_name = "DIR")]
    pub(super) out: Option<PathBuf>,
    /// Only result.json, no report and no chart
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

#[derive(Debug, Args)]
pub(super) struct LotsArgs {
    /// An archive's folder, or a table of per-lot figures (.csv or .parquet)
    #[arg(value_name = "ARCHIVE|TABLE")]
    pub(super) source: PathBuf,
    /// Only lots of this drawing number
    #[arg(long, value_name = "NUMBER")]
    pub(super) drawing: Option<String>,
    /// Only this lot number
    #[arg(long, value_name = "NUMBER")]
    pub(super) lot: Option<String>,
    /// Only lots of this supplier
    #[arg(long, value_name = "NAME")]
    pub(super) supplier: Option<String>,
    /// Received on this day or later; judged, where no date received is stated
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) since: Option<Date>,
    /// Received on this day or earlier; judged, where no date received is stated
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub(super) until: Option<Date>,
    /// Only lots with this tag (may be given again)
    #[arg(long, value_name = "TAG=VALUE", value_parser = tag)]
    pub(super) tag: Vec<(String, String)>,
    /// Also judgements that a later one takes the place of
    #[arg(long)]
    pub(super) superseded: bool,
    /// Mean and spread of every characteristic as CSV, in the columns of a table of per-lot figures
    #[arg(long, conflicts_with = "json")]
    pub(super) figures: bool,
    /// As JSON
    #[arg(long)]
    pub(super) json: bool,
}

fn tag(text: &str) -> Result<(String, String), String> {
    match text.split_once('=') {
        Some((tag, value)) if !tag.is_empty() => Ok((tag.to_owned(), value.to_owned())),
        _ => Err("write it as TAG=VALUE".to_owned()),
    }
}

#[derive(Debug, Args)]
pub(super) struct RecheckArgs {
    /// A result.json, a folder that holds one, or an archive
    #[arg(value_name = "RESULT.json|DIR")]
    pub(super) result: PathBuf,
    /// Folder from which the lot file's path in a result is meant
    #[arg(long, value_name = "DIR", default_value = ".")]
    pub(super) from: PathBuf,
    /// As JSON, one line for each result
    #[arg(long)]
    pub(super) json: bool,
}

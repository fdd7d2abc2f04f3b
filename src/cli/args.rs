//! The command line.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand, ValueEnum};
use jiff::civil::Date;

use crate::units::System;

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
    /// A commented starter file on stdout
    Draft {
        #[command(subcommand)]
        kind: Draft,
    },
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
    /// You stand for the units although they look mixed up; the report says so
    #[arg(long)]
    pub(super) units_confirmed: bool,
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
    /// As JSON
    #[arg(long)]
    pub(super) json: bool,
}

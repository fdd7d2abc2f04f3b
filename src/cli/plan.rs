//! `plan`: reads flags, calls, writes, prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::job::{self, PlanFlags};
use crate::report;

use super::accept::{date, history, listed};
use super::folder::{self, Target};
use super::plan_args::PlanArgs;

pub(super) fn run(args: &PlanArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let options = written(args).options(history(args.history.as_deref())?, date(args.date)?)?;
    let mut record = job::plan(&options)?;
    if let Some(target) = &target {
        let files = report::offers(&record)?;
        record.files = files.iter().map(listed).collect();
        target.write(&files, &record)?;
    }
    if let (Some(dir), false) = (&args.out, quiet) {
        // A notice; where stderr is gone there is nobody to read it.
        let _ = writeln!(std::io::stderr(), "written: {}", dir.display());
    }
    if args.json {
        folder::json(&record, out).into_diagnostic()?;
    } else {
        write!(out, "{}", report::offers_summary(&record)).into_diagnostic()?;
    }
    Ok(0)
}

fn written(args: &PlanArgs) -> PlanFlags {
    PlanFlags {
        lot_size: args.lot_size,
        aql: args.aql.clone(),
        level: args.level.clone(),
        state: args.state.clone(),
        mil_std_414: args.mil_std_414.clone(),
        level_414: args.level_414.clone(),
        designed: args.designed.clone(),
        zero_accept: args.zero_accept.clone(),
        bench: args.bench.clone(),
        reduced_agreed: args.reduced_agreed,
    }
}

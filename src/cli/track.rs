//! `track`: calls, writes, prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::job::{self, TrackOptions};
use crate::model::track_page;
use crate::record::Tracked;
use crate::report;

use super::accept::{date, templates};
use super::folder::{self, Target};
use super::rig::listed;
use super::track_args::TrackArgs;

/// Exit status where there are too few lots.
const TOO_FEW: u8 = 3;

pub(super) fn run(args: &TrackArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let templates = templates(args.templates.as_deref())?;
    let sources: Vec<_> = args
        .sources
        .iter()
        .map(|path| (path.clone(), path.to_string_lossy().into_owned()))
        .collect();
    let mut record = job::track(&sources, &options(args)?)?;
    let show_in = args.show_in.into();
    let page = track_page(&record, show_in);
    if let Some(target) = &target {
        let files = if args.no_report {
            Vec::new()
        } else {
            report::tracked(&record, &page, show_in, &templates)?
        };
        record.files = listed(&files);
        target.write(&files, &record)?;
    }
    if let (Some(dir), false) = (&args.out, quiet) {
        // A notice; where stderr is gone there is nobody to read it.
        let _ = writeln!(std::io::stderr(), "written: {}", dir.display());
    }
    if args.json {
        folder::json(&record, out).into_diagnostic()?;
    } else {
        write!(out, "{}", report::page_summary(&page)).into_diagnostic()?;
    }
    Ok(match record.decision {
        Tracked::Quiet => 0,
        Tracked::Fires => 1,
        Tracked::TooFewLots => TOO_FEW,
    })
}

fn options(args: &TrackArgs) -> miette::Result<TrackOptions> {
    let mut flags = Vec::new();
    let mut flag = |name: &str, value: Option<String>| {
        flags.extend(value.map(|value| format!("--{name} {value}")));
    };
    flag("characteristic", args.characteristic.clone());
    flag("drawing", args.drawing.clone());
    flag("since", args.since.map(|since| since.to_string()));
    let baseline = args.baseline.map(|(from, to)| format!("{from}..{to}"));
    flag("baseline", baseline);
    flag("by", args.by.clone());
    if args.all_rules {
        flags.push("--all-rules".to_owned());
    }
    Ok(TrackOptions {
        drawing: args.drawing.clone(),
        characteristic: args.characteristic.clone(),
        since: args.since,
        baseline: args.baseline,
        newest: args.newest,
        order: args.order.into(),
        all_rules: args.all_rules,
        by: args.by.clone(),
        date: date(args.date)?,
        flags,
    })
}

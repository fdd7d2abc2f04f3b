//! `accept`: calls, writes, prints.

use std::io::Write;
use std::path::Path;

use jiff::civil::Date;
use miette::IntoDiagnostic;
use sha2::{Digest, Sha256};

use crate::archive::Archive;
use crate::job::{self, Accepted, Memory, Past};
use crate::record::{Decision, OutputFile};
use crate::report::{self, OutFile, Template, Templates};
use crate::text::{Source, hex};

use super::args::AcceptArgs;
use super::folder::{self, Target};

pub(super) fn run(args: &AcceptArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let archive = args
        .archive
        .as_deref()
        .map(Archive::open_or_begin)
        .transpose()?;
    let templates = templates(args.templates.as_deref())?;
    let options = job::Options {
        date: date(args.date)?,
        units_confirmed: args.units_confirmed,
        strict: args.strict,
        keep: job::Keep {
            for_charts: args.out.is_some() && !args.no_report,
            for_archive: args.archive.is_some(),
        },
        block_bytes: None,
        flags: flags(args),
        memory: archive.clone().map_or(Memory::Nothing, Memory::Archive),
        past: history(args.history.as_deref())?,
    };
    let mut accepted = job::accept(&args.lot, &args.lot.to_string_lossy(), &options)?;
    let files = if args.out.is_some() {
        files(args, &mut accepted, &templates)?
    } else {
        Vec::new()
    };
    let run = archive
        .map(|archive| archive.keep(&accepted.record, &accepted.kept, jiff::Timestamp::now()))
        .transpose()?;
    if let Some(target) = &target {
        target.write(&files, &accepted.record)?;
    }
    if !quiet {
        // Notices; where stderr is gone there is nobody to read them.
        if let (Some(dir), Some(run)) = (&args.archive, &run) {
            let _ = writeln!(std::io::stderr(), "archived in {}: {run}", dir.display());
        }
        if let Some(dir) = &args.out {
            let _ = writeln!(std::io::stderr(), "written: {}", dir.display());
        }
    }
    let record = &accepted.record;
    if args.json {
        folder::json(record, out).into_diagnostic()?;
    } else {
        write!(out, "{}", report::summary(record, args.show_in.into())).into_diagnostic()?;
    }
    Ok(status(record.decision))
}

/// The past lots of a history file.
pub(super) fn history(file: Option<&Path>) -> miette::Result<Option<Past>> {
    file.map(|file| job::read_history(file, &file.to_string_lossy()))
        .transpose()
}

const fn status(decision: Decision) -> u8 {
    match decision {
        Decision::Accepted => 0,
        Decision::Rejected => 1,
        Decision::Undecided => 3,
    }
}

/// The flags that bear on the result.
fn flags(args: &AcceptArgs) -> Vec<String> {
    let given = [
        (args.strict, "--strict"),
        (args.units_confirmed, "--units-confirmed"),
    ];
    given
        .into_iter()
        .filter(|(given, _)| *given)
        .map(|(_, flag)| flag.to_owned())
        .collect()
}

/// The files of the output folder, listed in the record.
fn files(
    args: &AcceptArgs,
    accepted: &mut Accepted,
    templates: &Templates,
) -> miette::Result<Vec<OutFile>> {
    let record = &accepted.record;
    let mut files = if args.no_report {
        Vec::new()
    } else {
        report::accept(record, &accepted.curves, args.show_in.into(), templates)?
    };
    files.push(OutFile {
        path: "springs.csv".to_owned(),
        bytes: report::springs_csv(record),
    });
    files.sort_by(|a, b| a.path.cmp(&b.path));
    accepted.record.files = files.iter().map(listed).collect();
    Ok(files)
}

/// A file as a result lists it.
pub(super) fn listed(file: &OutFile) -> OutputFile {
    OutputFile {
        path: file.path.clone(),
        sha256: hex(&Sha256::digest(&file.bytes)),
    }
}

/// The date of the judgement: as given, else SOURCE_DATE_EPOCH, else today, in UTC.
pub(super) fn date(given: Option<Date>) -> miette::Result<Date> {
    if let Some(date) = given {
        return Ok(date);
    }
    let stamp = match std::env::var("SOURCE_DATE_EPOCH") {
        Ok(seconds) => {
            let stamp = seconds
                .parse()
                .ok()
                .and_then(|seconds| jiff::Timestamp::from_second(seconds).ok());
            stamp.ok_or_else(|| {
                miette::miette!(
                    help = "write seconds since 1970, or use --date",
                    "SOURCE_DATE_EPOCH is `{seconds}`, which is no time"
                )
            })?
        }
        Err(_) => jiff::Timestamp::now(),
    };
    Ok(stamp.to_zoned_datetime(jiff::tz::TimeZone::UTC).date())
}

/// The built-in templates, each replaced where the user's folder holds one of its name.
pub(super) fn templates(folder: Option<&Path>) -> miette::Result<Templates> {
    let mut templates = Templates::built_in();
    let Some(folder) = folder else {
        return Ok(templates);
    };
    let mut found = false;
    for (name, template) in [
        (Templates::HTML, &mut templates.html),
        (Templates::TYPST, &mut templates.typst),
    ] {
        let path = folder.join(name);
        if path.exists() {
            let source = Source::open(&path, &path.to_string_lossy())?;
            *template = Template {
                name: source.name.clone(),
                text: source.text.to_string(),
            };
            found = true;
        }
    }
    if found {
        return Ok(templates);
    }
    Err(miette::miette!(
        help = "put report.html or report.typ there, starting from the built-in ones",
        "`{}` holds no template",
        folder.display()
    ))
}

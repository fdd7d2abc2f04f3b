//! `rig verify`, `rig repeat`: calls, writes, prints.

use std::io::Write;

use miette::IntoDiagnostic;
use serde::Serialize;
use sha2::{Digest, Sha256};

use crate::archive::{Archive, KeptCheck};
use crate::job::{self, Proposal, RigOptions};
use crate::model::{check_page, study_page};
use crate::record::{EarlierCheck, OutputFile, Serving};
use crate::report::{self, OutFile};
use crate::text::hex;

use super::accept::{date, templates};
use super::args::{RigArgs, RigCommand, VerifyArgs};
use super::folder::{self, Target};
use super::rig_file;

pub(super) fn run(command: &RigCommand, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    match command {
        RigCommand::Verify(args) => verify(args, quiet, out),
        RigCommand::Repeat(args) => repeat(args, quiet, out),
    }
}

const fn status(serving: Serving) -> u8 {
    match serving {
        Serving::Serves => 0,
        Serving::Fails => 1,
        Serving::Undecided => 3,
    }
}

fn options(args: &RigArgs) -> miette::Result<RigOptions> {
    let strict = args.strict.then(|| "--strict".to_owned());
    Ok(RigOptions {
        date: date(args.date)?,
        strict: args.strict,
        flags: strict.into_iter().collect(),
    })
}

fn verify(of: &VerifyArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let args = &of.rig;
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let archive = of.archive.as_deref();
    let archive = archive.map(Archive::open_or_begin).transpose()?;
    let templates = templates(args.templates.as_deref())?;
    let written = args.file.to_string_lossy();
    let earlier = match &archive {
        Some(archive) => earlier(archive)?,
        None => Vec::new(),
    };
    let mut verified = job::rig_verify(&args.file, &written, &options(args)?, earlier)?;
    let page = check_page(&verified.record, args.show_in.into());
    let files = if target.is_none() || args.no_report {
        Vec::new()
    } else {
        let show_in = args.show_in.into();
        report::check(
            &verified.record,
            &page,
            &verified.readings,
            show_in,
            &templates,
        )?
    };
    verified.record.files = listed(&files);
    let now = jiff::Timestamp::now();
    let kept = archive.map(|archive| archive.keep_check(&verified.record, now));
    if let Some(run) = kept.transpose()?
        && !quiet
    {
        let _ = writeln!(std::io::stderr(), "archived: {run}"); // a notice
    }
    if let Some(target) = &target {
        target.write(&files, &verified.record)?;
    }
    let proposal = verified.proposal.as_ref();
    finish(
        args,
        quiet,
        &verified.record,
        &report::page_summary(&page),
        proposal,
        out,
    )?;
    Ok(status(verified.record.decision))
}

/// What the archive knows of earlier checks, of every rig.
fn earlier(archive: &Archive) -> miette::Result<Vec<EarlierCheck>> {
    let checks = archive.checks()?.into_iter();
    Ok(checks.flat_map(KeptCheck::into_earlier).collect())
}

fn repeat(args: &RigArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let templates = templates(args.templates.as_deref())?;
    let written = args.file.to_string_lossy();
    let mut repeated = job::rig_repeat(&args.file, &written, &options(args)?)?;
    let page = study_page(&repeated.record, args.show_in.into());
    if let Some(target) = &target {
        let files = if args.no_report {
            Vec::new()
        } else {
            report::study(&repeated.record, &page, args.show_in.into(), &templates)?
        };
        repeated.record.files = listed(&files);
        target.write(&files, &repeated.record)?;
    }
    let proposal = repeated.proposal.as_ref();
    finish(
        args,
        quiet,
        &repeated.record,
        &report::page_summary(&page),
        proposal,
        out,
    )?;
    Ok(status(repeated.record.decision))
}

pub(super) fn listed(files: &[OutFile]) -> Vec<OutputFile> {
    let one = |file: &OutFile| OutputFile {
        path: file.path.clone(),
        sha256: hex(&Sha256::digest(&file.bytes)),
    };
    files.iter().map(one).collect()
}

/// Writes the rig file where that is asked for, and prints.
fn finish(
    args: &RigArgs,
    quiet: bool,
    record: &impl Serialize,
    summary: &str,
    proposal: Option<&Proposal>,
    out: &mut impl Write,
) -> miette::Result<()> {
    let changes = match proposal {
        Some(proposal) if args.write => rig_file::write(proposal)?,
        Some(proposal) => rig_file::shown(proposal, false),
        None if args.write => {
            return Err(miette::miette!(
                help =
                    "look at the cautions; a run of plate on plate, or a study, must give a figure",
                "there is nothing to write into the rig file"
            ));
        }
        None => String::new(),
    };
    if let (Some(dir), false) = (&args.out, quiet) {
        // A notice; where stderr is gone there is nobody to read it.
        let _ = writeln!(std::io::stderr(), "written: {}", dir.display());
    }
    if args.json {
        folder::json(record, out).into_diagnostic()?;
        if !quiet {
            let _ = write!(std::io::stderr(), "{changes}"); // a notice too
        }
        return Ok(());
    }
    write!(out, "{summary}{changes}").into_diagnostic()
}

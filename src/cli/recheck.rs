//! `recheck`: calls and prints.

use std::io::Write;
use std::path::Path;

use miette::IntoDiagnostic;

use crate::job::{self, ChangedInput, Outcome, Rechecked};

use super::args::RecheckArgs;
use super::show::passed_over;

/// Exit status of results that differ.
const DIFFERENT: u8 = 1;

pub(super) fn run(args: &RecheckArgs, out: &mut impl Write) -> miette::Result<u8> {
    let inside = args.result.join("result.json");
    if args.result.is_dir() && !inside.is_file() {
        return archive(args, out);
    }
    let file = if inside.is_file() {
        &inside
    } else {
        &args.result
    };
    let rechecked = job::recheck(file, &args.from)?;
    show(&rechecked, args.json, out)
}

/// Every run of an archive; one that cannot be recomputed does not keep the others from it.
fn archive(args: &RecheckArgs, out: &mut impl Write) -> miette::Result<u8> {
    let stored = job::stored_runs(&args.result)?;
    let mut counts = [0_u64; 3];
    for run in &stored.runs {
        let status = match job::recheck_run(run, &args.from) {
            Ok(rechecked) => show(&rechecked, args.json, out)?,
            Err(fault) => {
                could_not(&run.record, &fault);
                super::COULD_NOT
            }
        };
        if let Some(count) = counts.get_mut(usize::from(status)) {
            *count += 1;
        }
    }
    passed_over(&stored.unreadable);
    let [same, different, could_not] = counts;
    if !args.json {
        writeln!(
            out,
            "{same} same, {different} different, {could_not} could not be recomputed"
        )
        .into_diagnostic()?;
    }
    Ok(if different > 0 {
        DIFFERENT
    } else if could_not > 0 || !stored.unreadable.is_empty() {
        super::COULD_NOT
    } else {
        0
    })
}

fn could_not(record: &Path, fault: &miette::Report) {
    // A notice beside the other runs; where stderr is gone there is nobody to read it.
    let _ = writeln!(
        std::io::stderr(),
        "could not: {}: {fault}",
        record.display()
    );
}

/// Prints what came out of one result; its exit status.
fn show(rechecked: &Rechecked, json: bool, out: &mut impl Write) -> miette::Result<u8> {
    if json {
        serde_json::to_writer(&mut *out, rechecked).into_diagnostic()?;
        writeln!(out).into_diagnostic()?;
    } else {
        print(rechecked, out).into_diagnostic()?;
    }
    Ok(match rechecked.outcome {
        Outcome::Same { .. } => 0,
        Outcome::Different { .. } => DIFFERENT,
        Outcome::InputsChanged { .. } => super::COULD_NOT,
    })
}

fn print(rechecked: &Rechecked, out: &mut impl Write) -> std::io::Result<()> {
    let Rechecked {
        result,
        version,
        recomputed_by,
        outcome,
    } = rechecked;
    let versions = if version == recomputed_by {
        format!("version {version}, bit for bit")
    } else {
        format!(
            "stored by version {version}, recomputed by version {recomputed_by}, to 1e-9 relative"
        )
    };
    match outcome {
        Outcome::Same { compared } => {
            writeln!(out, "same: {result} ({compared} entries; {versions})")
        }
        Outcome::Different { differences } => {
            writeln!(out, "different: {result} ({versions})")?;
            for one in differences {
                writeln!(
                    out,
                    "    {}: stored {}, recomputed {}",
                    one.place, one.stored, one.recomputed
                )?;
            }
            Ok(())
        }
        Outcome::InputsChanged { inputs } => {
            writeln!(
                out,
                "not recomputed: {result}: its inputs are not what they were"
            )?;
            inputs.iter().try_for_each(|input| changed(input, out))
        }
    }
}

fn changed(input: &ChangedInput, out: &mut impl Write) -> std::io::Result<()> {
    let ChangedInput {
        role,
        path,
        stored_sha256,
        sha256,
    } = input;
    match sha256 {
        Some(now) => writeln!(
            out,
            "    {role} {path}: SHA-256 was {stored_sha256}, is {now}"
        ),
        None => writeln!(
            out,
            "    {role} {path}: cannot be read; its SHA-256 was {stored_sha256}"
        ),
    }
}

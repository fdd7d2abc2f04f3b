//! Flags, calls, printing, writing. No arithmetic, no rounding, no judgement.

mod accept;
mod args;
mod bar;
mod draft;
mod expect;
mod folder;
mod lots;
mod plan;
mod plan_args;
mod rate;
mod recheck;
mod rig;
mod rig_file;
mod shell;
mod show;
mod track;
mod track_args;

use std::ffi::OsString;
use std::io::{ErrorKind, Write};
use std::process::ExitCode;

use clap::Parser;

use args::{Arguments, Command};

pub use show::show;

/// Exit status of a run that reached no judgement.
const COULD_NOT: u8 = 2;

/// Runs the command line `arguments`, the program's name first. Faults are shown here; the status says what came out.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(fault) => {
            let status = if fault.use_stderr() { COULD_NOT } else { 0 };
            return match fault.print() {
                Ok(()) => ExitCode::from(status),
                Err(closed) => after_closed(closed.kind(), status),
            };
        }
    };
    let mut out = Vec::new();
    let status = match dispatch(&arguments, &mut out) {
        Ok(status) => status,
        Err(fault) => {
            show(&fault, arguments.color);
            return ExitCode::from(COULD_NOT);
        }
    };
    let mut stdout = std::io::stdout().lock();
    match stdout.write_all(&out).and_then(|()| stdout.flush()) {
        Ok(()) => ExitCode::from(status),
        Err(closed) => after_closed(closed.kind(), status),
    }
}

/// A closed stdout is no fault.
fn after_closed(kind: ErrorKind, status: u8) -> ExitCode {
    ExitCode::from(if kind == ErrorKind::BrokenPipe {
        status
    } else {
        COULD_NOT
    })
}

fn dispatch(arguments: &Arguments, out: &mut impl Write) -> miette::Result<u8> {
    match &arguments.command {
        Command::Accept(args) => accept::run(args, arguments.quiet, out),
        Command::Rate(args) => rate::run(args, out),
        Command::Rig { command } => rig::run(command, arguments.quiet, out),
        Command::Expect(args) => expect::run(args, arguments.quiet, out),
        Command::Lots(args) => lots::run(args, out),
        Command::Track(args) => track::run(args, arguments.quiet, out),
        Command::Recheck(args) => recheck::run(args, out),
        Command::Draft { kind } => draft::run(kind, out),
        Command::Plan(args) => plan::run(args, arguments.quiet, out),
        Command::Completions { shell } => Ok(shell::completions(*shell, out)),
        Command::Manual { dir } => shell::manual(dir),
    }
}

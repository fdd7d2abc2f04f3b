//! The `coilassay` command.

use std::process::ExitCode;

fn main() -> ExitCode {
    coilassay::cli::run(std::env::args_os())
}

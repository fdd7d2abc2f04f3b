//! `rig verify` and `rig repeat`: what a rig is worth, and what goes into its file.

mod assigned;
mod compare;
mod error;
mod exports;
mod plates;
mod repeat;
mod repeat_outcome;
mod shares;
mod tolerances;
mod verify;
mod verify_outcome;

use jiff::civil::Date;

use crate::record::Provenance;
use crate::rig::Edited;
use crate::text::InputFile;

use exports::Sources;

pub use repeat::{Repeated, rig_repeat};
pub use verify::{Verified, rig_verify};

/// What the command line adds to the files.
#[derive(Clone, Debug)]
pub struct RigOptions {
    /// Date of the judgement.
    pub date: Date,
    /// A warning on the rig ends the run.
    pub strict: bool,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
}

/// A rig file that may be written.
#[derive(Clone, Debug)]
pub struct Proposal {
    /// The file with the new figures in it.
    pub edited: Edited,
}

fn provenance(inputs: Vec<InputFile>, sources: Sources, options: &RigOptions) -> Provenance {
    let mut inputs = inputs;
    inputs.extend(sources.inputs);
    Provenance::new(options.date, options.flags.clone(), inputs, sources.ledgers)
}

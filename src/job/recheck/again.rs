//! A judgement made again from what its result says it was made from.

use std::path::Path;

use jiff::civil::Date;
use serde_json::Value;

use crate::archive::{ArchiveError, StoredRun};
use crate::curve::Kept;
use crate::record::{
    AcceptRecord, CheckRecord, Closeness, Difference, EarlierCheck, Expected, OffersRecord,
    Provenance, RepeatRecord,
};

use super::super::accept::{Accepted, Memory, Options, Past, accept};
use super::super::expect::{Ask, expect};
use super::super::history::read_history;
use super::super::plan::{PlanFlags, plan};
use super::super::read::Keep;
use super::super::rig::{RigOptions, rig_repeat, rig_verify};

/// The jobs whose results can be made again.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Kind {
    Accept,
    RigVerify,
    RigRepeat,
    Expect,
    Plan,
}

impl Kind {
    /// By the word in a result.
    pub(super) fn of(word: &str) -> Option<Self> {
        match word {
            "accept" => Some(Self::Accept),
            "rig-verify" => Some(Self::RigVerify),
            "rig-repeat" => Some(Self::RigRepeat),
            "expect" => Some(Self::Expect),
            "plan" => Some(Self::Plan),
            _ => None,
        }
    }

    /// The role of the file on the command line; `None` where there is none.
    pub(super) const fn role(self) -> Option<&'static str> {
        match self {
            Self::Accept => Some("lot"),
            Self::RigVerify => Some("check"),
            Self::RigRepeat => Some("study"),
            Self::Expect => Some("drawing"),
            Self::Plan => None,
        }
    }
}

/// What came out this time.
pub(super) enum Again {
    Lot(Box<AcceptRecord>, Vec<Vec<Kept>>),
    Check(Box<CheckRecord>),
    Study(Box<RepeatRecord>),
    Drawing(Box<Expected>),
    Plans(Box<OffersRecord>),
}

impl Again {
    /// The result as JSON.
    pub(super) fn value(&self) -> serde_json::Result<Value> {
        match self {
            Self::Lot(record, _) => serde_json::to_value(record),
            Self::Check(record) => serde_json::to_value(record),
            Self::Study(record) => serde_json::to_value(record),
            Self::Drawing(record) => serde_json::to_value(record),
            Self::Plans(record) => serde_json::to_value(record),
        }
    }

    /// Where the tables of a stored run are not those of this result.
    pub(super) fn tables_differ(
        &self,
        run: &StoredRun,
        closeness: Closeness,
    ) -> miette::Result<Vec<Difference>> {
        let differ: Result<_, ArchiveError> = match self {
            Self::Lot(record, kept) => run.lot_differences(record, kept, closeness),
            Self::Check(record) => run.check_differences(record, closeness),
            Self::Study(_) | Self::Drawing(_) | Self::Plans(_) => Ok(Vec::new()), // no archive keeps them
        };
        Ok(differ?)
    }
}

/// What a result was made from, besides its inputs.
pub(super) struct Given<'a> {
    pub(super) kind: Kind,
    pub(super) provenance: &'a Provenance,
    pub(super) date: Date,
    pub(super) strict: bool,
    pub(super) units_confirmed: bool,
    /// The checks that a check looked back at.
    pub(super) earlier: Vec<EarlierCheck>,
    /// What `expect` was asked.
    pub(super) ask: Ask,
    /// What `plan` was asked.
    pub(super) plan: PlanFlags,
}

impl Given<'_> {
    /// Takes up a flag; whether it is one of this job's.
    pub(super) fn take(&mut self, flag: &str) -> bool {
        match (self.kind, flag) {
            (Kind::Expect, _) => match Ask::of_flag(flag) {
                Some(ask) => {
                    self.ask = ask;
                    true
                }
                None => false,
            },
            (_, "--strict") => {
                self.strict = true;
                true
            }
            (Kind::Accept, "--units-confirmed") => {
                self.units_confirmed = true;
                true
            }
            _ => false,
        }
    }

    /// Makes the judgement again; `file` lies at `path` and was written so, other paths of the call are meant from `from`.
    ///
    /// # Errors
    /// As the job itself.
    pub(super) fn again(
        self,
        (path, written): (&Path, &str),
        from: &Path,
        keep: Keep,
    ) -> miette::Result<Again> {
        match self.kind {
            Kind::Accept => self.lot(path, written, from, keep),
            Kind::RigVerify => {
                let options = self.rig_options();
                let again = rig_verify(path, written, &options, self.earlier)?;
                Ok(Again::Check(Box::new(again.record)))
            }
            Kind::RigRepeat => {
                let again = rig_repeat(path, written, &self.rig_options())?;
                Ok(Again::Study(Box::new(again.record)))
            }
            Kind::Expect => {
                let again = expect(path, written, self.ask, self.date)?;
                Ok(Again::Drawing(Box::new(again)))
            }
            Kind::Plan => {
                let options = self.plan.options(self.past(from)?, self.date)?;
                Ok(Again::Plans(Box::new(plan(&options)?)))
            }
        }
    }

    fn rig_options(&self) -> RigOptions {
        RigOptions {
            date: self.date,
            strict: self.strict,
            flags: self.provenance.flags.clone(),
        }
    }

    /// The past lots it was made from.
    fn past(&self, from: &Path) -> miette::Result<Option<Past>> {
        let mut inputs = self.provenance.inputs.iter();
        let history = inputs.find(|input| input.role == "history");
        history
            .map(|history| read_history(&from.join(&history.path), &history.path))
            .transpose()
    }

    fn lot(self, path: &Path, written: &str, from: &Path, keep: Keep) -> miette::Result<Again> {
        let past = self.past(from)?;
        let told = self.provenance.archive.clone();
        let options = Options {
            date: self.date,
            units_confirmed: self.units_confirmed,
            strict: self.strict,
            keep,
            memory: told.map_or(Memory::Nothing, Memory::Told),
            past,
            block_bytes: None,
            flags: self.provenance.flags.clone(),
        };
        let Accepted { record, kept, .. } = accept(path, written, &options)?;
        Ok(Again::Lot(Box::new(record), kept))
    }
}

//! `recheck`: recomputes a sealed result from its inputs and names every figure that differs.

use std::path::{Path, PathBuf};

use jiff::civil::Date;
use serde::Serialize;
use serde_json::Value;

use crate::archive::{Archive, StoredRun, Unreadable};
use crate::record::{
    AcceptRecord, Closeness, Difference, FORMAT, OutputFile, Provenance, TOOL, differences,
};
use crate::text::{InputFile, beside, read_bytes, sha256_of};

use super::accept::{Accepted, Options, accept};
use super::read::Keep;

/// An input that is not what the result was made from.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct ChangedInput {
    /// What the file is for.
    pub role: String,
    /// The path as written.
    pub path: String,
    /// SHA-256 as stored.
    pub stored_sha256: String,
    /// SHA-256 today; `null` where the file cannot be read.
    pub sha256: Option<String>,
}

/// What came out.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
#[serde(tag = "outcome", rename_all = "snake_case")]
pub enum Outcome {
    /// Every figure is as it was.
    Same {
        /// Figures, words and nulls held against each other.
        compared: u64,
    },
    /// Some are not.
    Different {
        /// Which.
        differences: Vec<Difference>,
    },
    /// Nothing was recomputed, because inputs are missing or changed.
    InputsChanged {
        /// Which.
        inputs: Vec<ChangedInput>,
    },
}

/// One result rechecked.
#[derive(Clone, Debug, Serialize)]
pub struct Rechecked {
    /// The result's file.
    pub result: String,
    /// The version that wrote it.
    pub version: String,
    /// The version that recomputed it.
    pub recomputed_by: String,
    /// What came out.
    #[serde(flatten)]
    pub outcome: Outcome,
}

/// Why a result cannot be rechecked.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum RecheckError {
    #[error("`{file}` is no result of coilassay: {why}")]
    #[diagnostic(
        code(coilassay::recheck::no_result),
        help("name a result.json, a folder that holds one, or an archive")
    )]
    NoResult { file: String, why: String },
    #[error("`{file}` is of format {found}, this version reads up to format {FORMAT}")]
    #[diagnostic(
        code(coilassay::recheck::newer),
        help("use the version of coilassay that wrote it, or a later one")
    )]
    Newer { file: String, found: u64 },
    #[error("`{file}` was made with {what}, which this version does not know")]
    #[diagnostic(
        code(coilassay::recheck::unknown),
        help("use the version of coilassay that wrote it, or a later one")
    )]
    Unknown { file: String, what: String },
}

/// The results below an archive, and what in it is no run.
pub struct Stored {
    /// The runs.
    pub runs: Vec<StoredRun>,
    /// Files that were passed over.
    pub unreadable: Vec<Unreadable>,
}

/// The runs of the archive at `dir`.
///
/// # Errors
/// A report where there is no archive.
pub fn stored_runs(dir: &Path) -> miette::Result<Stored> {
    let (runs, unreadable) = Archive::open(dir)?.stored_runs()?;
    Ok(Stored { runs, unreadable })
}

/// Recomputes the result in `file`. Paths in it are meant from the folder `from`. The files it lists are held against their
/// hashes where they lie beside it.
///
/// # Errors
/// A report where the file is no result, or its inputs cannot be judged any more.
pub fn recheck(file: &Path, from: &Path) -> miette::Result<Rechecked> {
    let sealed = Sealed::read(file)?;
    let beside_it = || sealed.altered_files(file);
    sealed.recheck(from, Keep::default(), |_| Ok(beside_it()))
}

/// Rechecks a run of an archive: its files against their checksums, and, recomputed, its record and the tables of its springs
/// and curves.
///
/// # Errors
/// As [`recheck`], and where a table cannot be read.
pub fn recheck_run(run: &StoredRun, from: &Path) -> miette::Result<Rechecked> {
    let altered = run.altered()?;
    let sealed = Sealed::read(&run.record)?;
    if !altered.is_empty() {
        return Ok(sealed.rechecked(Outcome::Different {
            differences: altered,
        }));
    }
    let keep = Keep {
        for_charts: false,
        for_archive: true,
    };
    sealed.recheck(from, keep, |now| {
        Ok(run.differences(&now.record, &now.kept, sealed.closeness())?)
    })
}

/// A result as it was stored.
struct Sealed {
    name: String,
    value: Value,
    provenance: Provenance,
    files: Vec<OutputFile>,
}

impl Sealed {
    fn read(file: &Path) -> miette::Result<Self> {
        let name = crate::text::printable(&file.to_string_lossy(), &crate::text::Alphabet::Any);
        let bytes = read_bytes(file, &name)?;
        let no_result = |why: String| RecheckError::NoResult {
            file: name.clone(),
            why,
        };
        let value: Value =
            serde_json::from_slice(&bytes).map_err(|fault| no_result(fault.to_string()))?;
        let part = |key: &str| value.get(key).cloned().unwrap_or_default();
        let found = part("format").as_u64();
        match found {
            Some(found) if found > u64::from(FORMAT) => {
                return Err(RecheckError::Newer { file: name, found }.into());
            }
            Some(_) => {}
            None => return Err(no_result("it states no `format`".to_owned()).into()),
        }
        if part("kind") != "accept" {
            let what = format!("kind {}", part("kind"));
            return Err(RecheckError::Unknown { file: name, what }.into());
        }
        let provenance: Provenance = serde_json::from_value(part("provenance"))
            .map_err(|fault| no_result(format!("`provenance`: {fault}")))?;
        if provenance.tool != TOOL {
            return Err(no_result("another tool signed it".to_owned()).into());
        }
        let files = serde_json::from_value(part("files"))
            .map_err(|fault| no_result(format!("`files`: {fault}")))?;
        Ok(Self {
            name,
            value,
            provenance,
            files,
        })
    }

    fn closeness(&self) -> Closeness {
        if self.provenance.version == env!("CARGO_PKG_VERSION") {
            Closeness::Exact
        } else {
            Closeness::AcrossVersions
        }
    }

    /// Recomputes, and compares; `besides` adds what else differs.
    fn recheck(
        &self,
        from: &Path,
        keep: Keep,
        besides: impl FnOnce(&Accepted) -> miette::Result<Vec<Difference>>,
    ) -> miette::Result<Rechecked> {
        let lot = self.lot_file(from)?;
        let changed = self.changed_inputs(&lot.0);
        if !changed.is_empty() {
            return Ok(self.rechecked(Outcome::InputsChanged { inputs: changed }));
        }
        let now = accept(&lot.0, &lot.1, &self.options(keep)?)?;
        let (mut found, compared) = self.compare(&now.record)?;
        found.extend(besides(&now)?);
        Ok(self.rechecked(if found.is_empty() {
            Outcome::Same { compared }
        } else {
            Outcome::Different { differences: found }
        }))
    }

    fn rechecked(&self, outcome: Outcome) -> Rechecked {
        Rechecked {
            result: self.name.clone(),
            version: self.provenance.version.clone(),
            recomputed_by: env!("CARGO_PKG_VERSION").to_owned(),
            outcome,
        }
    }

    /// Where the lot file lies, and its path as written.
    fn lot_file(&self, from: &Path) -> Result<(PathBuf, String), RecheckError> {
        let lot = self
            .provenance
            .inputs
            .iter()
            .find(|input| input.role == "lot");
        let missing = || RecheckError::NoResult {
            file: self.name.clone(),
            why: "its provenance names no lot file".to_owned(),
        };
        let written = lot.ok_or_else(missing)?.path.clone();
        Ok((from.join(&written), written))
    }

    /// The lot file's path is meant from the folder of the call, every other one from the lot file's own folder.
    fn changed_inputs(&self, lot: &Path) -> Vec<ChangedInput> {
        let check = |input: &InputFile| {
            let path = match input.role.as_str() {
                "lot" => lot.to_owned(),
                _ => beside(lot, &input.path),
            };
            let sha256 = sha256_of(&path, &input.path).ok();
            (sha256.as_ref() != Some(&input.sha256)).then(|| ChangedInput {
                role: input.role.clone(),
                path: input.path.clone(),
                stored_sha256: input.sha256.clone(),
                sha256,
            })
        };
        self.provenance.inputs.iter().filter_map(check).collect()
    }

    fn options(&self, keep: Keep) -> Result<Options, RecheckError> {
        let unknown = |what: String| RecheckError::Unknown {
            file: self.name.clone(),
            what,
        };
        let mut options = Options {
            date: self
                .provenance
                .date
                .parse::<Date>()
                .map_err(|_| unknown(format!("the date `{}`", self.provenance.date)))?,
            units_confirmed: false,
            strict: false,
            keep,
            last_check: None,
            past: None,
            block_bytes: None,
            flags: self.provenance.flags.clone(),
        };
        for flag in &self.provenance.flags {
            match flag.as_str() {
                "--strict" => options.strict = true,
                "--units-confirmed" => options.units_confirmed = true,
                other => return Err(unknown(format!("the flag `{other}`"))),
            }
        }
        Ok(options)
    }

    fn compare(&self, now: &AcceptRecord) -> Result<(Vec<Difference>, u64), RecheckError> {
        let now = serde_json::to_value(now).map_err(|fault| RecheckError::NoResult {
            file: self.name.clone(),
            why: fault.to_string(),
        })?;
        let (mut stored, mut now) = (self.value.clone(), now);
        // What a run writes beside its conclusions, and its own version, are no conclusions.
        for value in [&mut stored, &mut now] {
            if let Some(result) = value.as_object_mut() {
                result.remove("files");
                if let Some(provenance) =
                    result.get_mut("provenance").and_then(Value::as_object_mut)
                {
                    provenance.remove("version");
                }
            }
        }
        Ok(differences(&stored, &now, self.closeness()))
    }

    /// The files beside a result that are not those it lists; one that is not there was taken elsewhere.
    fn altered_files(&self, file: &Path) -> Vec<Difference> {
        let altered = |listed: &OutputFile| {
            let path = beside(file, &listed.path);
            if !path.exists() {
                return None;
            }
            let now = sha256_of(&path, &listed.path).ok();
            (now.as_ref() != Some(&listed.sha256)).then(|| Difference {
                place: format!("files \"{}\" / sha256", listed.path),
                stored: listed.sha256.clone(),
                recomputed: now.unwrap_or_else(|| "cannot be read".to_owned()),
            })
        };
        self.files.iter().filter_map(altered).collect()
    }
}

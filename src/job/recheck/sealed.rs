//! A result as it was stored, and what it says it was made from.

use std::path::{Path, PathBuf};

use serde_json::Value;

use crate::record::{Closeness, Difference, FORMAT, OutputFile, Provenance, TOOL, differences};
use crate::text::{InputFile, beside, read_bytes, sha256_of};

use super::super::expect::Ask;
use super::super::plan::PlanFlags;
use super::super::read::Keep;
use super::again::{Again, Given, Kind};
use super::{ChangedInput, Outcome, RecheckError, Rechecked};

/// A result as it was stored.
pub(super) struct Sealed {
    name: String,
    value: Value,
    kind: Kind,
    provenance: Provenance,
    files: Vec<OutputFile>,
}

impl Sealed {
    pub(super) fn read(file: &Path) -> miette::Result<Self> {
        let name = crate::text::printable(&file.to_string_lossy(), &crate::text::Alphabet::Any);
        let (bytes, _) = read_bytes(file, &name, u64::MAX)?;
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
        let Some(kind) = part("kind").as_str().and_then(Kind::of) else {
            let what = format!("kind {}", part("kind"));
            return Err(RecheckError::Unknown { file: name, what }.into());
        };
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
            kind,
            provenance,
            files,
        })
    }

    pub(super) fn closeness(&self) -> Closeness {
        if self.provenance.version == env!("CARGO_PKG_VERSION") {
            Closeness::Exact
        } else {
            Closeness::AcrossVersions
        }
    }

    /// Recomputes, and compares; `besides` adds what else differs.
    pub(super) fn recheck(
        &self,
        from: &Path,
        keep: Keep,
        besides: impl FnOnce(&Again) -> miette::Result<Vec<Difference>>,
    ) -> miette::Result<Rechecked> {
        let (path, written) = self.file(from)?;
        if let Some(what) = self.unstated() {
            let file = self.name.clone();
            return Err(RecheckError::Unstated { file, what }.into());
        }
        let changed = self.changed_inputs(&path, from);
        if !changed.is_empty() {
            return Ok(self.rechecked(Outcome::InputsChanged { inputs: changed }));
        }
        let again = self.given()?.again((&path, &written), from, keep)?;
        let (mut found, compared) = self.compare(&again)?;
        found.extend(besides(&again)?);
        Ok(self.rechecked(if found.is_empty() {
            Outcome::Same { compared }
        } else {
            Outcome::Different { differences: found }
        }))
    }

    pub(super) fn rechecked(&self, outcome: Outcome) -> Rechecked {
        Rechecked {
            result: self.name.clone(),
            version: self.provenance.version.clone(),
            recomputed_by: env!("CARGO_PKG_VERSION").to_owned(),
            outcome,
        }
    }

    /// Where the file of the command line lies, and its path as written; both empty where the job has none.
    fn file(&self, from: &Path) -> Result<(PathBuf, String), RecheckError> {
        let Some(role) = self.kind.role() else {
            return Ok((PathBuf::new(), String::new()));
        };
        let file = self
            .provenance
            .inputs
            .iter()
            .find(|input| input.role == role);
        let written = file.map(|input| input.path.clone());
        let written = written.ok_or_else(|| RecheckError::NoResult {
            file: self.name.clone(),
            why: format!("its provenance names no {role} file"),
        })?;
        Ok((from.join(&written), written))
    }

    /// Paths of the command line are meant from the folder of the call, all others from the folder of its file.
    fn changed_inputs(&self, file: &Path, from: &Path) -> Vec<ChangedInput> {
        let check = |input: &InputFile| {
            let of_call = Some(input.role.as_str()) == self.kind.role();
            let path = if of_call || input.role == "history" {
                from.join(&input.path)
            } else {
                beside(file, &input.path)
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

    /// What earlier versions did not write into a result although it was made with it.
    fn unstated(&self) -> Option<&'static str> {
        let no_flags = self.provenance.flags.is_empty();
        let answers = self
            .value
            .get("deflection_mm")
            .is_some_and(Value::is_number);
        match self.kind {
            Kind::Plan if no_flags => Some("the flags that asked for its plans"),
            Kind::Expect if no_flags && answers => Some("the load or length it was asked at"),
            _ => None,
        }
    }

    fn given(&self) -> Result<Given<'_>, RecheckError> {
        let unknown = |what: String| RecheckError::Unknown {
            file: self.name.clone(),
            what,
        };
        let date = &self.provenance.date;
        let earlier = self.value.get("earlier").cloned();
        let mut given = Given {
            kind: self.kind,
            provenance: &self.provenance,
            date: date
                .parse()
                .map_err(|_| unknown(format!("the date `{date}`")))?,
            strict: false,
            units_confirmed: false,
            ask: Ask::Drawing,
            plan: PlanFlags::default(),
            earlier: earlier
                .map_or(Ok(Vec::new()), serde_json::from_value)
                .map_err(|fault| unknown(format!("earlier checks: {fault}")))?,
        };
        if self.kind == Kind::Plan {
            given.plan = PlanFlags::of_kept(&self.provenance.flags).map_err(unknown)?;
            return Ok(given);
        }
        for flag in &self.provenance.flags {
            if !given.take(flag) {
                return Err(unknown(format!("the flag `{flag}`")));
            }
        }
        Ok(given)
    }

    fn compare(&self, again: &Again) -> Result<(Vec<Difference>, u64), RecheckError> {
        let now = again.value().map_err(|fault| RecheckError::NoResult {
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
    pub(super) fn altered_files(&self, file: &Path) -> Vec<Difference> {
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

//! What is known of earlier days: an archive to ask, or what one told when the lot was judged.

use crate::archive::{Archive, ArchiveError};
use crate::drawing::PlanTerms;
use crate::record::Told;

use super::Options;
use super::deciding::Past;
use super::files::Files;

/// Where a judgement looks for earlier checks and lots.
#[derive(Clone, Debug, Default)]
pub enum Memory {
    /// Nowhere.
    #[default]
    Nothing,
    /// In an archive.
    Archive(Archive),
    /// In what an archive told before.
    Told(Told),
}

impl Memory {
    /// What was told.
    pub(super) const fn told(&self) -> Option<&Told> {
        match self {
            Self::Told(told) => Some(told),
            Self::Nothing | Self::Archive(_) => None,
        }
    }
}

impl Options {
    /// These options, an archive among them asked about this lot.
    ///
    /// # Errors
    /// [`ArchiveError`] where a run that matters cannot be read: a history with a gap may give another state of inspection.
    pub(super) fn asked(&self, files: &Files) -> Result<Self, ArchiveError> {
        let mut options = self.clone();
        if let Memory::Archive(archive) = &self.memory {
            let (lot, drawing) = (&files.lot, &files.drawing);
            let (last_check, failed_check) = archive.last_check(&files.rig.name, self.date)?;
            let terms = drawing.acceptance.as_ref().map(|terms| &terms.plan);
            let by_attributes = matches!(terms, Some(PlanTerms::Attributes { .. }));
            let past_lots = if by_attributes {
                archive.past_lots(&drawing.number, lot.supplier.as_deref(), &lot.number)?
            } else {
                Vec::new()
            };
            options.memory = Memory::Told(Told {
                last_check,
                failed_check,
                past_lots,
            });
        }
        Ok(options)
    }

    /// The lots before this one: a history file before an archive, which is asked only where the plan looks at past lots.
    pub(super) fn past(&self) -> Option<Past> {
        let told = self.memory.told().filter(|told| !told.past_lots.is_empty());
        self.past.clone().or_else(|| {
            told.map(|told| Past {
                from: "the archive".to_owned(),
                lots: told.past_lots.clone(),
                input: None,
            })
        })
    }
}

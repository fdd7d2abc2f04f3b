//! `lots`: finds lots in an archive, or in a table of per-lot figures.

use std::path::Path;

use jiff::civil::Date;

use crate::archive::{
    Archive, ArchiveError, LotFigures, LotHead, TableError, Unreadable, latest, read_table,
};

/// Which lots are wanted; what is not given is not asked.
#[derive(Clone, Debug, Default)]
pub struct Query {
    /// Drawing number.
    pub drawing: Option<String>,
    /// Lot number.
    pub lot: Option<String>,
    /// Supplier.
    pub supplier: Option<String>,
    /// Received, or judged where the lot file states no date received, on this day or later.
    pub since: Option<Date>,
    /// … or earlier.
    pub until: Option<Date>,
    /// Tags that must have these values.
    pub tags: Vec<(String, String)>,
    /// Whether runs that a later one takes the place of are wanted too.
    pub superseded: bool,
}

/// What was found, by date; lots of one day by drawing, lot and supplier.
#[derive(Clone, Debug)]
pub struct Listing {
    /// The lots.
    pub lots: Vec<LotFigures>,
    /// Files of the archive that were passed over.
    pub unreadable: Vec<Unreadable>,
}

/// Why lots cannot be listed.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub enum LotsError {
    /// The archive.
    #[error(transparent)]
    #[diagnostic(transparent)]
    Archive(#[from] ArchiveError),
    /// The table.
    #[error(transparent)]
    #[diagnostic(transparent)]
    Table(#[from] TableError),
}

/// The lots of `source`, an archive's folder or a table of per-lot figures, that answer `query`.
///
/// # Errors
/// [`LotsError`] where it is neither.
pub fn lots(source: &Path, query: &Query) -> Result<Listing, LotsError> {
    let (mut lots, unreadable) = if source.is_file() {
        (read_table(source)?, Vec::new())
    } else {
        let found = Archive::open(source)?.runs(query.drawing.as_deref())?;
        let (runs, unreadable) = found.passed_over();
        let runs = if query.superseded { runs } else { latest(runs) };
        let wanted = runs.into_iter().filter(|run| query.wants(&run.head));
        (wanted.map(LotFigures::from).collect(), unreadable)
    };
    lots.retain(|lot| query.wants(&lot.head));
    lots.sort_by_key(|lot| lot.head.when()); // stable: the order within a day stays
    Ok(Listing { lots, unreadable })
}

impl Query {
    fn wants(&self, lot: &LotHead) -> bool {
        let equal = |wanted: &Option<String>, found: Option<&str>| {
            wanted.is_none() || wanted.as_deref() == found
        };
        equal(&self.drawing, Some(&lot.drawing))
            && equal(&self.lot, Some(&lot.lot))
            && equal(&self.supplier, lot.supplier.as_deref())
            && self.since.is_none_or(|since| lot.when() >= since)
            && self.until.is_none_or(|until| lot.when() <= until)
            && self
                .tags
                .iter()
                .all(|(tag, value)| lot.tags.get(tag) == Some(value))
    }
}

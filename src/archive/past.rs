//! The lots before one: what the switching rules look back at.

use std::collections::HashMap;

use super::error::ArchiveError;
use super::place::Archive;
use super::read::LotRun;
use crate::record::Decision;
use crate::sampling::{Outcome, PastLot};

impl Archive {
    /// The lots of `drawing` from `supplier` before `lot`, in the order of their decisions: all that are there, whatever the
    /// date of this judgement, so that an early date escapes no history; for a lot that was judged before, those before its
    /// first run, so that waiting changes nothing.
    ///
    /// Of a lot judged several times the first decision other than undecided counts: that of a lot brought back after sorting
    /// does not (ISO 2859-1, original inspection).
    ///
    /// # Errors
    /// [`ArchiveError`] where a run of the drawing cannot be read: a history with a gap may give another state.
    pub fn past_lots(
        &self,
        drawing: &str,
        supplier: Option<&str>,
        lot: &str,
    ) -> Result<Vec<PastLot>, ArchiveError> {
        let mut found = self.runs(Some(drawing))?;
        if let Some(fault) = found.broken.pop() {
            return Err(fault);
        }
        let order = |run: &LotRun| (run.head.date, run.run.judged_at.clone());
        found.runs.retain(|run| {
            (run.head.drawing.as_str(), run.head.supplier.as_deref()) == (drawing, supplier)
        });
        let own = found.runs.iter().filter(|run| run.head.lot == lot);
        let begun = own.min_by_key(|run| run.run.number).map(order);
        found.runs.retain(|run| run.head.lot != lot);
        let mut counting: Vec<LotRun> = Vec::new();
        let mut places: HashMap<String, usize> = HashMap::new();
        for run in found.runs {
            let place = *places.entry(run.head.lot.clone()).or_insert(counting.len());
            match counting.get_mut(place) {
                None => counting.push(run),
                Some(first) if first.head.decision == Decision::Undecided => *first = run,
                Some(_) => {}
            }
        }
        counting.retain(|run| begun.as_ref().is_none_or(|begun| order(run) < *begun));
        counting.sort_by_key(order);
        Ok(counting.iter().map(past).collect())
    }
}

fn past(run: &LotRun) -> PastLot {
    PastLot {
        date: run.head.date,
        lot: run.head.lot.clone(),
        outcome: match run.head.decision {
            Decision::Accepted => Outcome::Accepted,
            Decision::Rejected => Outcome::Rejected,
            Decision::Undecided => Outcome::Undecided,
        },
        accept: run
            .plan_accept
            .and_then(|accept| u64::try_from(accept).ok())
            .unwrap_or(u64::MAX),
        accepted_tighter: run.accepted_tighter,
    }
}

//! The lots before one: what the switching rules look back at.

use std::collections::HashMap;

use jiff::civil::Date;

use super::error::ArchiveError;
use super::place::Archive;
use super::read::LotRun;
use crate::record::Decision;
use crate::sampling::{Outcome, PastLot};

impl Archive {
    /// The lots of `drawing` from `supplier` decided up to `day`, but for `lot` itself, in the order of their decisions.
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
        day: Date,
    ) -> Result<Vec<PastLot>, ArchiveError> {
        let mut found = self.runs(Some(drawing))?;
        if let Some(fault) = found.broken.pop() {
            return Err(fault);
        }
        found.runs.retain(|run| {
            let head = &run.head;
            (head.drawing.as_str(), head.supplier.as_deref()) == (drawing, supplier)
                && head.lot != lot
                && head.date <= day
        });
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
        counting
            .sort_by(|a, b| (a.head.date, &a.run.judged_at).cmp(&(b.head.date, &b.run.judged_at)));
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

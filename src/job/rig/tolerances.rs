//! The tightest half tolerances that are judged on a rig.

use std::path::PathBuf;

use crate::drawing::{self, Drawing, Requirement};
use crate::intake::{CertifiedValue, Judged, Tolerance};
use crate::quantity::Quantity;
use crate::text::InputFile;

use super::error::RigJobError;

/// The tightest half tolerances. Those of rate and loads are shares, because what is wrong with a scale is a share of
/// what it reads, and the reference spring is another spring than those judged.
pub(super) struct Tightest {
    rate: Option<Tolerance>,
    load: Option<Tolerance>,
    free_length: Option<Tolerance>,
    /// Where each comes from, in words.
    pub(super) words: Vec<String>,
}

impl Tightest {
    /// Half tolerance for a certified value, in its unit; `None` where nothing judged limits it on both sides.
    pub(super) fn half(&self, of: &CertifiedValue) -> Option<f64> {
        let tolerance = match of.quantity {
            Quantity::Rate => self.rate,
            Quantity::LoadAt(_) => self.load,
            _ => self.free_length,
        }?;
        Some(match tolerance {
            Tolerance::Relative(share) => share * of.value,
            Tolerance::Absolute(half) => half,
        })
    }
}

/// Opens the drawings, or takes what is stated.
///
/// # Errors
/// A report of a drawing's faults, or [`RigJobError::NoTolerance`].
pub(super) fn tightest(judged: &Judged, inputs: &mut Vec<InputFile>) -> miette::Result<Tightest> {
    let drawings = match judged {
        Judged::Stated([rate, load, free]) => {
            return Ok(Tightest {
                rate: Some(*rate),
                load: Some(*load),
                free_length: Some(*free),
                words: vec!["as the check file states them".to_owned()],
            });
        }
        Judged::Drawings(named) => {
            let open = |(written, path): &(String, PathBuf)| drawing::open(path, written);
            named
                .iter()
                .map(open)
                .collect::<Result<Vec<Drawing>, _>>()?
        }
    };
    inputs.extend(drawings.iter().map(|drawing| drawing.input.clone()));
    let found = Tightest {
        rate: of(&drawings, |one| one == Quantity::Rate, relative),
        load: of(
            &drawings,
            |one| matches!(one, Quantity::LoadAt(_)),
            relative,
        ),
        free_length: of(&drawings, |one| one == Quantity::FreeLength, absolute),
        words: drawings.iter().map(words).collect(),
    };
    if found.rate.is_none() && found.load.is_none() {
        return Err(RigJobError::NoTolerance.into());
    }
    Ok(found)
}

fn words(drawing: &Drawing) -> String {
    let revision = drawing.revision.as_deref();
    let revision = revision.map_or(String::new(), |revision| format!(" rev. {revision}"));
    format!("drawing {}{revision}", drawing.number)
}

fn of(
    drawings: &[Drawing],
    wanted: impl Fn(Quantity) -> bool,
    half: fn(&Requirement) -> Option<f64>,
) -> Option<Tolerance> {
    let all = drawings.iter().flat_map(|drawing| &drawing.requirements);
    let halves = all.filter(|one| wanted(one.quantity)).filter_map(half);
    let tightest = halves.reduce(f64::min)?;
    Some(if wanted(Quantity::FreeLength) {
        Tolerance::Absolute(tightest)
    } else {
        Tolerance::Relative(tightest)
    })
}

fn absolute(one: &Requirement) -> Option<f64> {
    one.limits.half_width()
}

/// Half tolerance over the middle of the limits.
fn relative(one: &Requirement) -> Option<f64> {
    let middle = f64::midpoint(one.limits.lower?, one.limits.upper?);
    Some(one.limits.half_width()? / middle).filter(|share| share.is_finite() && *share > 0.0)
}

//! The words of a verdict and its grounds.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::characteristic::Absence;
use crate::units::{Millimetres, Newtons};

/// The verdict on a spring or on one of its characteristics.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Verdict {
    /// Proven inside the limits.
    Conforms,
    /// Proven outside a limit.
    Fails,
    /// Neither is proven.
    Undecided,
}

/// Why a characteristic has the verdict it has, or no value.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum Reason {
    /// The value lies below the lower limit by more than the guard band.
    BelowLower,
    /// The value lies above the upper limit by more than the guard band.
    AboveUpper,
    /// The lower limit lies inside the guard band of the value.
    LowerWithinUncertainty,
    /// The upper limit lies inside the guard band of the value.
    UpperWithinUncertainty,
    /// The guard bands leave no room between the limits: this bench cannot prove the requirement.
    GuardBandsMeet,
    /// The export gives deflections only and this spring has no measured free length.
    NoAbsoluteLength,
    /// The curve does not span the window of the rate.
    WindowNotReached {
        /// The stroke's largest load, where the window is one of loads.
        reached_n: Option<Newtons>,
        /// The window's upper load.
        wanted_n: Option<Newtons>,
    },
    /// The curve does not reach the test length.
    LengthNotReached,
    /// The stroke starts on a loaded spring: contact was not recorded.
    ContactNotRecorded,
    /// The drawing's stroke is not in the export.
    StrokeNotRecorded,
    /// There is no full cycle of loading and unloading.
    NoFullCycle,
    /// There is only one loading stroke.
    OneLoadingStroke,
    /// The rise to solid was not reached; the shortest length reached is given.
    SolidNotReached {
        /// The shortest length the curve reached.
        shortest_mm: Millimetres,
    },
    /// The solid length is below the shortest length reached, which is inside the limit.
    SolidBelowShortest {
        /// The shortest length the curve reached.
        shortest_mm: Millimetres,
    },
    /// Too few independent points to give an uncertainty, and the rig file states no repeatability.
    UncertaintyUnknown,
    /// The two stages do not differ enough for a knee: is a member missing?
    NoKnee,
    /// The spring was not measured for this.
    NotMeasured,
    /// Listed under `not_inspected` in the lot file.
    NotInspected,
    /// The load cell was at its end before the curve came there.
    LoadCellAtItsEnd,
    /// The load steps, or the travel leaps back, on its stroke or before it: the spring, the grip or the scale slipped.
    LoadSteps,
    /// Rows are missing where it is taken from.
    RowsMissing,
    /// The empty platens show another load on its stroke than before the first contact.
    ZeroShifted,
    /// Two strokes of the same travel differ in rate as no spring does from one stroke to the next.
    StrokesDiffer,
    /// It needs a curve, and the bench read loads at a few lengths.
    PointReadings,
    /// No load was read at this length.
    LengthNotRead,
    /// Fewer than two loads were read within the window of the rate.
    WindowNotRead,
}

impl From<&Absence> for Reason {
    fn from(why: &Absence) -> Self {
        match why {
            Absence::NoAbsoluteLength => Self::NoAbsoluteLength,
            Absence::WindowNotReached { loads } => {
                let load = |value: f64| Newtons::try_from(value).ok();
                Self::WindowNotReached {
                    reached_n: loads.and_then(|(reached, _)| load(reached)),
                    wanted_n: loads.and_then(|(_, wanted)| load(wanted)),
                }
            }
            Absence::LengthNotReached => Self::LengthNotReached,
            Absence::ContactNotRecorded => Self::ContactNotRecorded,
            Absence::StrokeNotRecorded => Self::StrokeNotRecorded,
            Absence::NoFullCycle => Self::NoFullCycle,
            Absence::OneLoadingStroke => Self::OneLoadingStroke,
            Absence::NoKnee => Self::NoKnee,
            Absence::NotMeasured => Self::NotMeasured,
            Absence::LoadCellAtItsEnd => Self::LoadCellAtItsEnd,
            Absence::LoadSteps => Self::LoadSteps,
            Absence::RowsMissing => Self::RowsMissing,
            Absence::ZeroShifted => Self::ZeroShifted,
            Absence::StrokesDiffer => Self::StrokesDiffer,
            Absence::PointReadings => Self::PointReadings,
            Absence::LengthNotRead => Self::LengthNotRead,
            Absence::WindowNotRead => Self::WindowNotRead,
        }
    }
}

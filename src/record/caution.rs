//! What the reader of page one must know besides the decision.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::review::DrawingFinding;
use crate::units::{Finite, Millimetres};

/// Something the reader of page one must know.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum Caution {
    /// The drawing does not agree with itself.
    Drawing {
        /// What does not agree.
        finding: DrawingFinding,
    },
    /// Springs whose rate is far from what is stated, and what would give such a rate.
    OddRatio {
        /// The springs.
        springs: Vec<String>,
        /// Median of measured over expected rate.
        ratio: Finite,
        /// What would give such a ratio, in words; `null` where nothing known does.
        reading: Option<String>,
    },
    /// No frame compliance in the rig file.
    ComplianceNotCorrected,
    /// A budget input was declared negligible.
    DeclaredNegligible {
        /// Which.
        what: String,
    },
    /// Calibration is past its date, or was made after the measurement.
    CalibrationExpired {
        /// `force` or `travel`.
        scale: String,
        /// Valid until.
        until: String,
    },
    /// The rig file gives no calibration dates.
    CalibrationUnknown {
        /// `force` or `travel`.
        scale: String,
    },
    /// The last check of the rig on record failed.
    CheckFailed {
        /// When, and on what.
        last: String,
    },
    /// The rig file wants checks and no passed check is on record that is recent enough.
    NoCheckOnRecord {
        /// How often the rig file wants one.
        every: String,
        /// Date and name of the last passed one, where there is any.
        last: Option<String>,
    },
    /// Judged loads beyond the largest that the table of the frame's give knows.
    FrameBeyondTable {
        /// The springs.
        springs: Vec<String>,
    },
    /// Loads outside the usable range of the force scale: as stated, or by its class and resolution.
    LoadOutsideRange {
        /// The springs.
        springs: Vec<String>,
    },
    /// U exceeds a third of the half tolerance (a quarter under simple acceptance).
    UncertaintyLarge {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// Largest U over the half tolerance.
        share: Finite,
    },
    /// The bench cannot prove this requirement.
    CannotProve {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
    },
    /// The robust rate differs from the fitted one.
    RobustDiffers {
        /// The springs.
        springs: Vec<String>,
    },
    /// The curve bends within the window.
    LackOfFit {
        /// The springs.
        springs: Vec<String>,
    },
    /// No readings before contact.
    NoZeroReading {
        /// The springs.
        springs: Vec<String>,
    },
    /// Measurements set aside as invalid.
    SetAsideInvalid {
        /// Spring.
        spring: String,
        /// Export.
        export: String,
        /// Why.
        why: String,
    },
    /// Springs measured more than once.
    Repeated {
        /// The springs.
        springs: Vec<String>,
    },
    /// Requirements that were not inspected.
    NotInspected {
        /// Which.
        what: Vec<String>,
    },
    /// The units were confirmed by hand over a plausibility finding.
    UnitsConfirmed {
        /// What had been found.
        finding: String,
    },
    /// Springs measured beyond the sample.
    BeyondSample {
        /// How many.
        springs: u32,
    },
    /// A requirement on the geometry that is stated but not listed under the requirements.
    GeometryNotJudged {
        /// Which quantity.
        what: String,
    },
    /// Something odd in the curves of some springs, which are judged all the same.
    OddCurves {
        /// The springs.
        springs: Vec<String>,
        /// What is odd.
        what: Oddity,
    },
    /// Ids that differ only in case or leading zeros.
    IdsAlike {
        /// The springs.
        springs: Vec<String>,
    },
    /// Limits so wide that a tolerance may have been meant as a share.
    LimitsWide {
        /// The characteristic.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
    },
    /// The free lengths of the whole lot lie off the drawn one by much the same.
    LengthsShifted {
        /// Median of measured less drawn.
        shift_mm: Millimetres,
    },
    /// Loads were read at a few lengths only: there is no curve behind the figures.
    PointReadings {
        /// The springs.
        springs: Vec<String>,
        /// The longer of the two lengths the rate is drawn from; `null` where there is no rate.
        from_mm: Option<Millimetres>,
        /// The shorter one.
        to_mm: Option<Millimetres>,
    },
    /// The frame is said to take up a large share of the travel.
    ComplianceLarge {
        /// Compliance times the expected rate, 0 … 1.
        share: Finite,
    },
}

/// What is odd in a curve.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Oddity {
    /// Strokes much shorter than the others were left out: a jog, or a stroke cut off.
    StrokesLeftOut,
    /// The recording holds fewer or more loading strokes than those of most springs.
    OtherStrokeCount,
    /// The rate differs from stroke to stroke by more than 1 %.
    StrokesDiffer,
    /// Loads scatter about the fitted line by more than 0.5 % of Fn.
    Scatter,
    /// The free length by gauge differs from the bench's by more than both uncertainties.
    GaugeDiffers,
    /// Repeats differ by more than their own uncertainty says.
    RepeatsDiffer,
    /// The load cell stands at its end while the platen goes on; those rows are in no figure.
    Saturated,
    /// The travel stands still while the load changes; those rows are in no figure.
    TravelStuck,
    /// Single readings far off their neighbours; they are in no figure.
    StrayReadings,
    /// Rows that repeat the one before digit for digit; they count once.
    RowsDoubled,
    /// Rows are missing: the travel leaps.
    RowsMissing,
    /// The load steps, or the travel leaps back: the spring, the grip or the scale slipped.
    LoadSteps,
    /// The empty platens show another load than before the first contact.
    ZeroShifted,
    /// The recording starts on a loaded spring.
    LateStart,
    /// Loads come in steps coarser than the rig file states.
    LoadCoarse,
    /// Travel comes in steps coarser than the rig file states.
    TravelCoarse,
    /// Some stretches of the stroke are sampled much more densely than others.
    UnevenSampling,
}

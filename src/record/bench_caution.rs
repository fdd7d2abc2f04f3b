//! What the reader of a check or a study must know besides the decision.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::caution::Caution;
use crate::units::{Finite, Millimetres};

/// Something the reader of page one must know.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum BenchCaution {
    /// What the rig file makes necessary to say, as on every report.
    Rig {
        /// Which.
        caution: Caution,
    },
    /// The certificate of the reference spring does not cover the day.
    ReferenceExpired {
        /// The reference spring.
        reference: String,
        /// Valid until.
        until: String,
    },
    /// The check file states no validity of the certificate.
    ReferenceUndated {
        /// The reference spring.
        reference: String,
    },
    /// The give of the frame differs from the rig file's by more than both uncertainties.
    FrameDiffers {
        /// E_n.
        e_n: Finite,
    },
    /// The plates' run is too short to tell how well it knows the compliance.
    FrameUncertaintyUnknown,
    /// Nothing that is judged limits this quantity, so that E_n alone decides on it.
    NoTolerance {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
    },
    /// The export gives deflections: free lengths cannot be checked and are not judged on this bench.
    FreeLengthNotChecked,
    /// The reference spring was measured only once: its scatter is not seen.
    MeasuredOnce,
    /// The measurements of the reference spring differ by more than their own uncertainty says.
    MeasurementsDiffer,
    /// The check file does not say when it was measured.
    DayNotStated,
    /// The study file says nothing of presetting strokes before the study.
    PresettingNotStated,
    /// One operator: what operators add is not seen.
    OneOperator,
    /// A component of the variance came out below zero and is set to 0.
    NegativeComponent {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// `operator`, `interaction`, `part`.
        component: String,
    },
    /// So few repeats that the standard deviation is itself uncertain.
    FewRepeats {
        /// Degrees of freedom of the repeats.
        degrees_of_freedom: Finite,
        /// Relative standard uncertainty of the standard deviation, 0 … 1.
        relative: Finite,
    },
    /// A quantity that some measurements give no value of, so that it is not analysed.
    NotAnalysed {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// The measurements without a value.
        measurements: Vec<String>,
    },
    /// Repeats take up more than a tenth of the tolerance.
    LargeShare {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// 6 s over the tolerance, 0 … 1.
        share: Finite,
    },
    /// The parts differ too little for the study to tell groups of them apart.
    FewCategories {
        /// The quantity.
        name: String,
        /// Length of a load.
        at_length_mm: Option<Millimetres>,
        /// Distinct categories.
        categories: u32,
    },
}

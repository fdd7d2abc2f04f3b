//! The result of `accept`.

use std::collections::BTreeMap;

use serde::{Deserialize, Serialize};

use super::spring::{LedgerFacts, SpringResult};
use crate::curve::WindowOf;
use crate::drawing::Policy;
use crate::lot::{Decision, LotReason};
use crate::quantity::{Class, Unit};
use crate::text::InputFile;
use crate::units::{Finite, Megapascals, Millimetres, Newtons, NewtonsPerMillimetre};

/// Which job wrote a result.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Kind {
    /// `accept`.
    Accept,
}

/// What simple acceptance would have said, and whose risk it is.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct SimpleAcceptance {
    /// Its decision.
    pub decision: Decision,
    /// Springs of the sample it would call failing.
    pub failing: u64,
}

/// The lot, as its file states it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct LotFacts {
    /// Lot number, as written.
    pub number: String,
    /// Springs in the lot.
    pub size: u64,
    /// Supplier.
    pub supplier: Option<String>,
    /// Date received, YYYY-MM-DD.
    pub received: Option<String>,
    /// Inspector.
    pub inspector: Option<String>,
    /// How the sample was drawn.
    pub sample_drawn: Option<String>,
    /// Free tags.
    pub tags: BTreeMap<String, String>,
    /// A note the lot file asks to print, e.g. that a sample is invented.
    pub note: Option<String>,
    /// Concession, printed beside the decision and never changing it.
    pub concession: Option<String>,
    /// The supplier's own statement of values.
    pub supplier_values: Option<String>,
    /// Requirements that are not inspected, and why.
    pub not_inspected: Vec<String>,
    /// Conditions of the test.
    pub conditions: ConditionFacts,
}

/// Conditions of the test.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct ConditionFacts {
    /// Temperature, °C.
    pub temperature_c: Option<Finite>,
    /// Presetting strokes made before the recording.
    pub presetting_strokes: Option<u64>,
    /// Loading strokes at the start of each export that are presetting.
    pub presetting_recorded: u64,
}

/// One requirement of the drawing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct RequirementFacts {
    /// The quantity's name.
    pub name: String,
    /// The length a load is asked at.
    pub at_length_mm: Option<Millimetres>,
    /// Unit of the figures.
    pub unit: Unit,
    /// Nominal value.
    pub nominal: Option<Finite>,
    /// Lower limit.
    pub lower: Option<Finite>,
    /// Upper limit.
    pub upper: Option<Finite>,
    /// Class.
    pub class: Class,
    /// Mean of the measured values.
    pub mean: Option<Finite>,
    /// Standard deviation of the measured values.
    pub standard_deviation: Option<Finite>,
    /// Smallest and largest measured value.
    pub smallest: Option<Finite>,
    /// Largest measured value.
    pub largest: Option<Finite>,
    /// Largest expanded uncertainty among the springs.
    pub largest_expanded_uncertainty: Option<Finite>,
    /// Springs of each verdict: conforming.
    pub conforming: u32,
    /// Springs proven failing.
    pub failing: u32,
    /// Springs undecided.
    pub undecided: u32,
}

/// The drawing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct DrawingFacts {
    /// Drawing number.
    pub number: String,
    /// Revision.
    pub revision: Option<String>,
    /// Title.
    pub title: Option<String>,
    /// Requirements in the order of the drawing.
    pub requirements: Vec<RequirementFacts>,
    /// `guarded` or `simple`.
    pub rule: String,
    /// `t95` (95 % conformance probability) or `U`.
    pub guard: String,
    /// How undecided springs count.
    pub undecided_springs: Policy,
}

/// Stresses at a load or length; theory, see the formulas in the report.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct StressFacts {
    /// Where: a test length, or the solid length.
    pub at_length_mm: Millimetres,
    /// Deflection from the nominal free length.
    pub deflection_mm: Millimetres,
    /// Load of this member there.
    pub load_n: Newtons,
    /// 8FD/(πd³).
    pub uncorrected_mpa: Megapascals,
    /// With the direct-shear factor 1 + 1/(2w).
    pub static_mpa: Megapascals,
    /// With the factor (w + 0.5)/(w − 0.75) of EN 13906-1.
    pub dynamic_mpa: Megapascals,
    /// With Wahl's factor.
    pub wahl_mpa: Megapascals,
}

/// One spring of the set, in theory.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct MemberFacts {
    /// Its name.
    pub name: String,
    /// Material as written, or `stated G`.
    pub material: String,
    /// Source of G.
    pub shear_modulus_source: String,
    /// G.
    pub shear_modulus_mpa: Megapascals,
    /// Wire diameter d.
    pub wire_mm: Millimetres,
    /// Mean coil diameter D.
    pub coil_mm: Millimetres,
    /// Active coils n.
    pub active_coils: Finite,
    /// Total coils nt.
    pub total_coils: Finite,
    /// Index w = D/d.
    pub index: Finite,
    /// G·d⁴/(8·D³·n).
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Its share of the set's rate, 0 … 1.
    pub share: Finite,
    /// Solid length Lc.
    pub solid_length_mm: Millimetres,
    /// Smallest permitted test length Ln.
    pub smallest_length_mm: Millimetres,
    /// Stress at each test length and at solid.
    pub stress: Vec<StressFacts>,
}

/// What the drawn spring should do.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct TheoryFacts {
    /// Rate of the whole set.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// Standard uncertainty of it from the drawing's tolerances.
    pub rate_standard_uncertainty: NewtonsPerMillimetre,
    /// The worst case of the drawing's tolerances: lowest rate.
    pub rate_lowest: NewtonsPerMillimetre,
    /// Highest rate.
    pub rate_highest: NewtonsPerMillimetre,
    /// Nominal free length L0.
    pub free_length_mm: Millimetres,
    /// Solid length of the set (its longest member's).
    pub solid_length_mm: Millimetres,
    /// Smallest permitted test length of the set.
    pub smallest_length_mm: Millimetres,
    /// Fn, the load at Ln.
    pub full_load_n: Newtons,
    /// The members.
    pub members: Vec<MemberFacts>,
}

/// The window of the rate, one for the whole lot.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct WindowFacts {
    /// What the bounds are.
    pub of: WindowOf,
    /// Start, in N or mm.
    pub from: Finite,
    /// End, in N or mm.
    pub to: Finite,
    /// How the drawing says it, in words.
    pub stated: String,
    /// The stroke that is judged, in words.
    pub stroke: String,
    /// `fit` or `two-point`.
    pub method: String,
}

/// The rig, as its file states it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct RigFacts {
    /// Name.
    pub name: String,
    /// What is known of the force scale, in words.
    pub force: String,
    /// Its calibration, `YYYY-MM-DD … YYYY-MM-DD`.
    pub force_calibrated: Option<String>,
    /// What is known of the travel scale.
    pub travel: String,
    /// Its calibration.
    pub travel_calibrated: Option<String>,
    /// Frame compliance, in words.
    pub compliance: String,
    /// What the export's travel means: `deflection`, `length`, `platen position`.
    pub travel_means: String,
}

/// The plan of one class.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct ClassPlan {
    /// Class.
    pub class: Class,
    /// AQL in percent nonconforming; `null` where every spring is measured or a class is zero-accept.
    pub aql: Option<Finite>,
    /// Code letter from lot size and level.
    pub code_letter: Option<String>,
    /// Letter of the plan an arrow led to.
    pub used_letter: Option<String>,
    /// Springs to measure.
    pub sample_size: u64,
    /// Acceptance number Ac.
    pub accept: u64,
    /// Rejection number Re.
    pub reject: u64,
    /// Springs proven failing in this class.
    pub failing: u64,
    /// Springs undecided for a requirement of this class.
    pub undecided: u64,
    /// Probability that a lot exactly at the AQL is accepted, 0 … 1 (binomial).
    pub accepted_at_aql: Option<Finite>,
}

/// The sampling plan, in the terms of its source.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct PlanFacts {
    /// `attributes` or `every-spring`.
    pub by: String,
    /// Inspection level.
    pub level: Option<String>,
    /// Code letter of the first class.
    pub code_letter: Option<String>,
    /// Sample size (the largest over the classes).
    pub sample_size: u64,
    /// Ac of the major class, or of the first one there is.
    pub accept: u64,
    /// Re of the same class.
    pub reject: u64,
    /// The plan of each class.
    pub classes: Vec<ClassPlan>,
}

/// Something the reader of page one must know.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum Caution {
    /// The stated rate is not what the geometry gives.
    RateNotFromGeometry {
        /// Stated nominal rate.
        stated: NewtonsPerMillimetre,
        /// Rate from the geometry.
        theory: NewtonsPerMillimetre,
        /// Expanded uncertainty (k = 2) of the theory.
        expanded_uncertainty: NewtonsPerMillimetre,
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
    /// The rig file wants checks and no check is on record.
    NoCheckOnRecord {
        /// How often the rig file wants one.
        every: String,
    },
    /// Loads outside the range the rig file states.
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
    /// A test length below the smallest permitted length.
    LengthBelowSmallest {
        /// The test length.
        at_length_mm: Millimetres,
        /// Ln.
        smallest_mm: Millimetres,
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
}

/// A file of the output folder.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct OutputFile {
    /// Path inside the folder.
    pub path: String,
    /// SHA-256 of its bytes.
    pub sha256: String,
}

/// Where the result comes from.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct Provenance {
    /// `coilassay`.
    pub tool: String,
    /// Version.
    pub version: String,
    /// Date of the judgement, YYYY-MM-DD.
    pub date: String,
    /// Flags that bear on the result, as given.
    pub flags: Vec<String>,
    /// Every file read, with its hash.
    pub inputs: Vec<InputFile>,
    /// The row ledger of every export.
    pub ledgers: Vec<LedgerFacts>,
}

/// `result.json` of `accept`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct AcceptRecord {
    /// Version of this layout.
    pub format: u32,
    /// `accept`.
    pub kind: Kind,
    /// The decision.
    pub decision: Decision,
    /// Why.
    pub reasons: Vec<LotReason>,
    /// What simple acceptance would have said.
    pub simple: SimpleAcceptance,
    /// What page one must say besides.
    pub cautions: Vec<Caution>,
    /// The lot.
    pub lot: LotFacts,
    /// The drawing.
    pub drawing: DrawingFacts,
    /// Theory.
    pub theory: TheoryFacts,
    /// The window of the rate.
    pub window: WindowFacts,
    /// The rig.
    pub rig: RigFacts,
    /// The plan.
    pub plan: PlanFacts,
    /// The springs, by id.
    pub springs: Vec<SpringResult>,
    /// Provenance.
    pub provenance: Provenance,
    /// The other files of the output folder.
    pub files: Vec<OutputFile>,
}

//! Each cause as a physical model: what one severity changes, between which bounds it is expected, and its prior weight.
//! Rates follow `G·d⁴/(8·D³·n)` whole, not its differential. What is judgement rather than physics is marked so.

use super::{Change, Form, Measure as M};

/// What may have happened.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
#[expect(missing_docs, reason = "the names say it")]
pub enum Cause {
    PermanentSet,
    Overheating,
    LengthZero,
    BrokenActiveCoil,
    BrokenEndCoil,
    UniformWireLoss,
    LocalWireLoss,
    WrongWire,
    WrongCoilCount,
    WrongCoilDiameter,
    WrongMaterial,
    WrongSpring,
    MissingMember,
    CoilBinding,
    GuideFriction,
    Buckling,
    OutOfSquare,
    NoChange,
    NoneOfThese,
}

/// Causes with one signature on the bench; each group has the same prior weight.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
#[expect(missing_docs, reason = "the names say it")]
pub enum Group {
    Shorter,
    Softer,
    Alone(Cause),
}

impl Cause {
    /// The continuous causes of a single spring, in the order they are shown.
    const OF_ONE_SPRING: [Self; 15] = [
        Self::PermanentSet,
        Self::Overheating,
        Self::LengthZero,
        Self::BrokenActiveCoil,
        Self::BrokenEndCoil,
        Self::UniformWireLoss,
        Self::LocalWireLoss,
        Self::WrongWire,
        Self::WrongCoilCount,
        Self::WrongCoilDiameter,
        Self::WrongMaterial,
        Self::CoilBinding,
        Self::GuideFriction,
        Self::Buckling,
        Self::OutOfSquare,
    ];

    /// Its group on the bench.
    pub fn group(self) -> Group {
        match self {
            Self::PermanentSet | Self::Overheating | Self::LengthZero => Group::Shorter,
            Self::UniformWireLoss
            | Self::LocalWireLoss
            | Self::WrongWire
            | Self::WrongCoilCount
            | Self::WrongCoilDiameter
            | Self::WrongMaterial => Group::Softer,
            alone => Group::Alone(alone),
        }
    }

    /// Whether permanent set may come on top of it as a second cause.
    pub(super) fn pairs_with_set(self) -> bool {
        !matches!(
            self.group(),
            Group::Shorter | Group::Alone(Self::NoChange | Self::NoneOfThese)
        )
    }
}

/// Unit of a severity.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[expect(missing_docs, reason = "the names say it")]
pub enum SeverityUnit {
    Millimetres,
    Turns,
    LnRatio,
    Share,
}

/// How large a cause may be: every severity between the bounds is as likely.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Severity {
    /// Smallest.
    pub from: f64,
    /// Largest.
    pub to: f64,
    /// Their unit.
    pub unit: SeverityUnit,
}

/// One cause as it is weighed.
#[derive(Clone, Debug, PartialEq)]
pub struct Suspect {
    /// Which.
    pub cause: Cause,
    /// Prior weight; all sum to one.
    pub weight: f64,
    /// Its size, where it has one.
    pub severity: Option<Severity>,
    /// What it changes where it has no size: each of these as likely.
    pub fixed: Vec<Change>,
}

/// Prior weight of "none of these"; judgement.
const NONE_OF_THESE: f64 = 0.05;
/// Prior weight of "no change beyond ordinary spread", outside the groups of causes: a dozen findings have a dozen chances to
/// stray, and with one group's weight every eighth unchanged spring was accused of something.
const NO_CHANGE: f64 = 0.35;

/// The causes to weigh for `form`: `members` and `others` are the changes that a lost member of the set or another
/// drawing of the archive would show; without any these causes are not weighed.
pub fn suspects(form: &Form, members: Vec<Change>, others: Vec<Change>) -> Vec<Suspect> {
    let one = |cause, severity, fixed| Suspect {
        cause,
        weight: 0.0,
        severity,
        fixed,
    };
    let sized = Cause::OF_ONE_SPRING
        .into_iter()
        .map(|cause| one(cause, severity(cause, form), Vec::new()));
    let mut found: Vec<Suspect> = sized.collect();
    let lists = [
        (Cause::WrongSpring, others),
        (Cause::MissingMember, members),
    ];
    let listed = lists.into_iter().filter(|(_, changes)| !changes.is_empty());
    found.extend(listed.map(|(cause, changes)| one(cause, None, changes)));
    let all: Vec<Group> = found.iter().map(|suspect| suspect.cause.group()).collect();
    let mut groups = all.clone();
    groups.sort_unstable();
    groups.dedup();
    let share = (1.0 - NONE_OF_THESE - NO_CHANGE) / groups.len() as f64;
    for suspect in &mut found {
        let group = suspect.cause.group();
        suspect.weight = share / all.iter().filter(|other| **other == group).count() as f64;
    }
    let mut unchanged = one(Cause::NoChange, None, vec![Change::default()]);
    unchanged.weight = NO_CHANGE;
    found.push(unchanged);
    let mut none = one(Cause::NoneOfThese, None, Vec::new());
    none.weight = NONE_OF_THESE;
    found.push(none);
    found
}

/// Bounds of the severity of `cause`; judgement throughout, by trade experience of how far each goes.
fn severity(cause: Cause, form: &Form) -> Option<Severity> {
    let (d, n, free) = (form.wire(), form.active(), form.free());
    let of = |from, to, unit| Some(Severity { from, to, unit });
    match cause {
        Cause::PermanentSet | Cause::Overheating => of(0.0, 0.15 * free, SeverityUnit::Millimetres),
        Cause::LengthZero => of(-0.05 * free, 0.05 * free, SeverityUnit::Millimetres),
        Cause::BrokenActiveCoil => of(0.0, (0.5 * n).min(3.0), SeverityUnit::Turns),
        Cause::BrokenEndCoil => of(0.0, 1.0, SeverityUnit::Turns),
        Cause::UniformWireLoss => of(0.0, 0.25 * d, SeverityUnit::Millimetres),
        Cause::LocalWireLoss => of(0.0, 0.5 * d, SeverityUnit::Millimetres),
        Cause::WrongWire => of(-0.25 * d, 0.25 * d, SeverityUnit::Millimetres),
        Cause::WrongCoilCount => of(-(0.4 * n).min(3.0), (0.4 * n).min(3.0), SeverityUnit::Turns),
        Cause::WrongCoilDiameter => of(
            -0.25 * form.coil(),
            0.25 * form.coil(),
            SeverityUnit::Millimetres,
        ),
        // CuSn6 against spring steel is ln 0.515, the softest wire of the tables.
        Cause::WrongMaterial => of(-0.7, 0.2, SeverityUnit::LnRatio),
        Cause::CoilBinding => of(0.0, 0.5 * n, SeverityUnit::Turns),
        Cause::GuideFriction => of(0.0, 0.4, SeverityUnit::Share),
        Cause::Buckling => of(0.0, 0.7, SeverityUnit::LnRatio),
        Cause::OutOfSquare => of(0.0, 0.05 * free, SeverityUnit::Millimetres),
        Cause::WrongSpring | Cause::MissingMember | Cause::NoChange | Cause::NoneOfThese => None,
    }
}

/// Turns over which a local loss goes; judgement.
const LOCAL_TURNS: f64 = 1.0;
/// Share of a lost end coil that was active; judgement.
const END_ACTIVE: f64 = 0.3;

/// What `cause` of severity `x` (in its unit) changes on `form`; nothing for a cause without a size.
pub fn change(cause: Cause, form: &Form, x: f64) -> Change {
    let (d, big_d, n, nt) = (form.wire(), form.coil(), form.active(), form.total());
    let parts = match cause {
        // Only the pitch is lost: length down, rate, wire and solid length stay.
        Cause::PermanentSet | Cause::Overheating => vec![(M::FreeLength, -x), (M::GaugeLength, -x)],
        // The bench alone reads wrong, at contact and at solid alike.
        Cause::LengthZero => vec![(M::FreeLength, x), (M::SolidLength, x)],
        // The parts screw into each other: fewer active coils, a pitch lost per turn, all material still there.
        Cause::BrokenActiveCoil => vec![
            (M::FreeLength, -x * form.pitch()),
            (M::GaugeLength, -x * form.pitch()),
            (M::Rate, -(1.0 - x / n).ln()),
        ],
        // The lost part is gone; the stump seats badly. How badly is judgement.
        Cause::BrokenEndCoil => vec![
            (M::FreeLength, -x * d),
            (M::GaugeLength, -x * d),
            (M::Rate, -(1.0 - END_ACTIVE * x / n).ln()),
            (M::Toe, 0.5 * x * d),
            (M::SolidLength, -x * d),
            (M::Coils, -x),
            (M::Mass, (1.0 - x / nt).ln()),
            (M::Squareness, 0.5 * x * d),
        ],
        Cause::UniformWireLoss => thinner(form, -x),
        // Compliances add along the wire; the mean diameter stays.
        Cause::LocalWireLoss => {
            let rest = 1.0 - x / d;
            let turns = LOCAL_TURNS.min(n);
            vec![
                (M::Rate, -(1.0 + turns / n * (rest.powi(-4) - 1.0)).ln()),
                (M::WireSpread, x),
                (M::Mass, (1.0 - turns / nt * (1.0 - rest * rest)).ln()),
            ]
        }
        Cause::WrongWire => thinner(form, x),
        Cause::WrongCoilCount => vec![
            (M::Rate, -(1.0 + x / n).ln()),
            (M::SolidLength, x * d),
            (M::Coils, x),
            (M::Mass, (1.0 + x / nt).ln()),
        ],
        Cause::WrongCoilDiameter => vec![
            (M::Rate, -3.0 * (1.0 + x / big_d).ln()),
            (M::OutsideDiameter, x),
            (M::Mass, (1.0 + x / big_d).ln()),
        ],
        Cause::WrongMaterial => vec![(M::Rate, x)],
        // The blocked turns work until they touch: stiffer above, solid where the lost gaps are missing.
        Cause::CoilBinding => vec![
            (M::Bend, -(1.0 - x / n).ln()),
            (M::SolidLength, x * (form.pitch() - d)),
        ],
        // Half the loop lies above the spring's own line at full load; judgement.
        Cause::GuideFriction => vec![(M::Hysteresis, x), (M::Rate, (1.0 + x / 2.0).ln())],
        Cause::Buckling => vec![(M::Bend, -x)],
        // A soft start, the rate right beyond it; how long is judgement.
        Cause::OutOfSquare => vec![(M::Squareness, x), (M::Toe, 0.3 * x)],
        Cause::WrongSpring | Cause::MissingMember | Cause::NoChange | Cause::NoneOfThese => {
            Vec::new()
        }
    };
    Change::of(parts)
}

/// The wire thicker by `x` mm (thinner below zero) about the same mean coil.
fn thinner(form: &Form, x: f64) -> Vec<(M, f64)> {
    let ln = (1.0 + x / form.wire()).ln();
    vec![
        (M::Rate, 4.0 * ln),
        (M::Wire, x),
        (M::OutsideDiameter, x),
        (M::SolidLength, x * form.total()),
        (M::Mass, 2.0 * ln),
    ]
}

/// How far the change `predicted` of one measure may be off, one standard deviation in its unit; judgement.
pub(super) fn model_error(cause: Cause, measure: M, predicted: f64) -> f64 {
    let share = match (cause, measure) {
        (Cause::PermanentSet | Cause::Overheating | Cause::LengthZero, _) => 0.0,
        // Densities of spring materials: copper alloys 12 % above steel, stainless 1 %.
        (Cause::WrongMaterial, M::Mass) => return 0.06,
        (Cause::BrokenEndCoil, M::Rate | M::Toe | M::Squareness)
        | (Cause::CoilBinding, M::SolidLength)
        | (Cause::GuideFriction, M::Rate)
        | (Cause::OutOfSquare, M::Toe)
        // Whether coiled on one arbor or to one outside diameter is not known.
        | (Cause::WrongWire, M::OutsideDiameter) => 0.5,
        (Cause::BrokenActiveCoil, M::FreeLength | M::GaugeLength) => 0.2,
        (Cause::LocalWireLoss, M::Rate | M::Mass) => 0.4,
        (Cause::WrongWire, M::Rate) => 0.06,
        (Cause::WrongSpring | Cause::MissingMember, _) => 0.05,
        _ => 0.02,
    };
    (share * predicted).abs()
}

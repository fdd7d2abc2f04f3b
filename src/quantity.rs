//! The names of what can be judged: symbol, unit, JSON name. Holds no values.
//! Symbols follow ISO 26909 / ISO 2162 and EN 13906-1.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::units::Millimetres;

/// One judged or reported quantity of a spring.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Quantity {
    /// Rate R in the drawing's window.
    Rate,
    /// Rate of a stage of a set whose members engage one after the other, from 1.
    RateOf(u8),
    /// Length at which the next member of a set engages: 1 between the first stage and the second.
    Knee(u8),
    /// Load F at a stated length.
    LoadAt(Millimetres),
    /// Free length L0.
    FreeLength,
    /// Solid length Lc.
    SolidLength,
    /// Share of the loading work not given back.
    Hysteresis,
    /// Length lost between the first and the last loading stroke.
    Set,
    /// Largest departure from the fitted line in the window, as a share of Fn.
    Straightness,
    /// Outside coil diameter De, by caliper.
    OutsideDiameter,
    /// Inside coil diameter Di, by caliper.
    InsideDiameter,
    /// Wire diameter d, by caliper.
    WireDiameter,
    /// Squareness e1: how far the free spring leans, by square and gauge.
    Squareness,
    /// Parallelism e2 of the ground ends, by gauge.
    Parallelism,
}

/// The unit a quantity is reported in.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub enum Unit {
    /// Newton.
    #[serde(rename = "N")]
    Newton,
    /// Millimetre.
    #[serde(rename = "mm")]
    Millimetre,
    /// Newton per millimetre.
    #[serde(rename = "N/mm")]
    NewtonPerMillimetre,
    /// Megapascal.
    #[serde(rename = "MPa")]
    Megapascal,
    /// Percent.
    #[serde(rename = "%")]
    Percent,
}

/// The most stages a set may have.
pub const MOST_STAGES: u8 = 4;

/// Name, symbol and title, by number.
type Numbered = [(&'static str, &'static str, &'static str); 4];

const STAGES: Numbered = [
    ("rate_stage_1", "R1", "rate of stage 1"),
    ("rate_stage_2", "R2", "rate of stage 2"),
    ("rate_stage_3", "R3", "rate of stage 3"),
    ("rate_stage_4", "R4", "rate of stage 4"),
];
const KNEES: Numbered = [
    ("knee", "LK", "length at the knee"),
    ("knee_2", "LK2", "length at the second knee"),
    ("knee_3", "LK3", "length at the third knee"),
    ("knee_4", "LK4", "length at the fourth knee"),
];

/// The entry of a number counted from 1; the last one beyond the table.
const fn numbered(of: &Numbered, number: u8) -> (&'static str, &'static str, &'static str) {
    match number {
        0 | 1 => of[0],
        2 => of[1],
        3 => of[2],
        _ => of[3],
    }
}

impl Quantity {
    /// The key used in `result.json`, in `springs.csv` and under `[requirements]`.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Rate => "rate",
            Self::RateOf(stage) => numbered(&STAGES, stage).0,
            Self::Knee(knee) => numbered(&KNEES, knee).0,
            Self::LoadAt(_) => "load",
            Self::FreeLength => "free_length",
            Self::SolidLength => "solid_length",
            Self::Hysteresis => "hysteresis",
            Self::Set => "set",
            Self::Straightness => "straightness",
            Self::OutsideDiameter => "outside_diameter",
            Self::InsideDiameter => "inside_diameter",
            Self::WireDiameter => "wire_diameter",
            Self::Squareness => "squareness",
            Self::Parallelism => "parallelism",
        }
    }

    /// The quantity with this name; `at` is the length a load is asked at.
    pub fn from_name(name: &str, at: Option<Millimetres>) -> Option<Self> {
        if let Some(length) = at {
            return (name == "load").then_some(Self::LoadAt(length));
        }
        for number in 1..=MOST_STAGES {
            if name == Self::RateOf(number).name() {
                return Some(Self::RateOf(number));
            }
            if name == Self::Knee(number).name() {
                return Some(Self::Knee(number));
            }
        }
        let plain = [
            Self::Rate,
            Self::FreeLength,
            Self::SolidLength,
            Self::Hysteresis,
            Self::Set,
            Self::Straightness,
            Self::OutsideDiameter,
            Self::InsideDiameter,
            Self::WireDiameter,
            Self::Squareness,
            Self::Parallelism,
        ];
        plain.into_iter().find(|quantity| quantity.name() == name)
    }

    /// The symbol printed in tables and charts.
    pub const fn symbol(self) -> &'static str {
        match self {
            Self::Rate => "R",
            Self::RateOf(stage) => numbered(&STAGES, stage).1,
            Self::Knee(knee) => numbered(&KNEES, knee).1,
            Self::LoadAt(_) => "F",
            Self::FreeLength => "L0",
            Self::SolidLength => "Lc",
            Self::Hysteresis => "hysteresis",
            Self::Set => "set",
            Self::Straightness => "straightness",
            Self::OutsideDiameter => "De",
            Self::InsideDiameter => "Di",
            Self::WireDiameter => "d",
            Self::Squareness => "e1",
            Self::Parallelism => "e2",
        }
    }

    /// The words for it.
    pub const fn title(self) -> &'static str {
        match self {
            Self::Rate => "rate",
            Self::RateOf(stage) => numbered(&STAGES, stage).2,
            Self::Knee(knee) => numbered(&KNEES, knee).2,
            Self::LoadAt(_) => "load at length",
            Self::FreeLength => "free length",
            Self::SolidLength => "solid length",
            Self::Hysteresis => "hysteresis",
            Self::Set => "set",
            Self::Straightness => "straightness",
            Self::OutsideDiameter => "outside diameter",
            Self::InsideDiameter => "inside diameter",
            Self::WireDiameter => "wire diameter",
            Self::Squareness => "squareness",
            Self::Parallelism => "parallelism",
        }
    }

    /// The unit its values are in.
    pub const fn unit(self) -> Unit {
        match self {
            Self::Rate | Self::RateOf(_) => Unit::NewtonPerMillimetre,
            Self::LoadAt(_) => Unit::Newton,
            Self::Hysteresis | Self::Straightness => Unit::Percent,
            _ => Unit::Millimetre,
        }
    }

    /// The length a load is taken at.
    pub const fn at_length(self) -> Option<Millimetres> {
        match self {
            Self::LoadAt(length) => Some(length),
            _ => None,
        }
    }

    /// Whether a true value of zero is possible: a perfect end has no error of squareness or parallelism.
    pub const fn may_be_zero(self) -> bool {
        matches!(self, Self::Squareness | Self::Parallelism)
    }

    /// Whether a caliper measures it, and not the bench.
    pub const fn by_caliper(self) -> bool {
        matches!(
            self,
            Self::OutsideDiameter
                | Self::InsideDiameter
                | Self::WireDiameter
                | Self::Squareness
                | Self::Parallelism
        )
    }
}

impl Unit {
    /// The symbol of the unit.
    pub const fn symbol(self) -> &'static str {
        match self {
            Self::Newton => "N",
            Self::Millimetre => "mm",
            Self::NewtonPerMillimetre => "N/mm",
            Self::Megapascal => "MPa",
            Self::Percent => "%",
        }
    }
}

/// How grave a departure from a requirement is; the order is from least to gravest.
#[derive(
    Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize, JsonSchema,
)]
#[serde(rename_all = "lowercase")]
pub enum Class {
    /// Minor.
    Minor,
    /// Major; what a requirement is where nothing is stated.
    Major,
    /// Critical.
    Critical,
}

impl Class {
    /// Every class, gravest first.
    pub const ALL: [Self; 3] = [Self::Critical, Self::Major, Self::Minor];

    /// The word for it.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Minor => "minor",
            Self::Major => "major",
            Self::Critical => "critical",
        }
    }
}

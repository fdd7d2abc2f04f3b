//! What a drawing gets wrong, or leaves open, as data.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use crate::units::{Finite, Megapascals, Millimetres, Newtons, NewtonsPerMillimetre};

use super::strength::{Permissible, StressPlace};

/// Whether a finding is a contradiction or something to know.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Weight {
    /// The drawing cannot be met as it stands, or not tested as it asks.
    Contradicts,
    /// Worth knowing; the drawing may be right.
    Remark,
}

/// Where a rate that is held against the geometry comes from.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Basis {
    /// The drawing states it.
    Stated,
    /// Two of its loads give it.
    TwoLoads,
    /// One load and the free length give it.
    LoadAndFreeLength,
}

/// What may have been read for something else.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "as", rename_all = "snake_case")]
pub enum ReadAs {
    /// The drawn outside diameter is the mean one.
    OutsideIsMean,
    /// The drawn inside diameter is the mean one.
    InsideIsMean,
    /// The drawn mean diameter is the outside one.
    MeanIsOutside,
    /// The drawn mean diameter is the inside one.
    MeanIsInside,
    /// The rate was worked out with the total coils.
    TotalForActive,
    /// What is drawn as active coils are all coils.
    ActiveAreTotal,
    /// Another material.
    Material {
        /// Its name in the table.
        name: String,
        /// Its G.
        shear_modulus_mpa: Megapascals,
    },
    /// The stated figure is in another unit.
    Unit {
        /// Which.
        unit: String,
    },
}

/// A reading under which a rate would follow.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Fitting {
    /// What is read for what.
    pub reading: ReadAs,
    /// The rate of theory under this reading.
    pub rate_n_per_mm: NewtonsPerMillimetre,
    /// How far the stated rate is from it, as a share of it.
    pub off: Finite,
}

/// What would give the stated rate, each alone, the others as drawn.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Needed {
    /// Active coils.
    pub active_coils: Finite,
    /// Mean coil diameter.
    pub coil_mm: Millimetres,
    /// Wire diameter, the mean coil diameter kept.
    pub wire_mm: Millimetres,
    /// Shear modulus.
    pub shear_modulus_mpa: Megapascals,
}

/// Something that does not agree in a drawing, or that its reader must know.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "code", rename_all = "snake_case")]
pub enum DrawingFinding {
    /// The rate is not what the geometry gives.
    RateNotFromGeometry {
        /// Where the rate comes from.
        basis: Basis,
        /// The stage of a set, from 1.
        stage: u32,
        /// The rate: as stated, or the nearest of the stated limits.
        stated: NewtonsPerMillimetre,
        /// Rate from the geometry.
        theory: NewtonsPerMillimetre,
        /// Expanded uncertainty (k = 2) of the theory.
        expanded_uncertainty: NewtonsPerMillimetre,
        /// Readings that would fit, nearest first.
        readings: Vec<Fitting>,
        /// What else would give it; `null` for a set.
        needed: Option<Needed>,
    },
    /// Two loads ask for another rate than the one stated.
    LoadsNotFromRate {
        /// Longer test length.
        first_mm: Millimetres,
        /// Shorter test length.
        second_mm: Millimetres,
        /// Rate the two nominal loads give.
        implied: NewtonsPerMillimetre,
        /// Lower limit of the stated rate.
        lower: Option<NewtonsPerMillimetre>,
        /// Upper limit.
        upper: Option<NewtonsPerMillimetre>,
    },
    /// A spring of nominal rate and free length would miss a required load.
    LoadNotFromRate {
        /// The test length.
        at_length_mm: Millimetres,
        /// Rate times the deflection there.
        expected: Newtons,
        /// Lower limit of the load.
        lower: Option<Newtons>,
        /// Upper limit.
        upper: Option<Newtons>,
        /// The free length with which the middle of the limits would follow from the rate.
        fitting_free_length_mm: Millimetres,
    },
    /// Two loads meet zero load far from the drawn free length.
    FreeLengthNotFromLoads {
        /// As drawn.
        drawn: Millimetres,
        /// Where the two loads point.
        implied: Millimetres,
    },
    /// A drawn size lies outside the limits required of it.
    SizeNotAsDrawn {
        /// Which: `free_length`, `outside_diameter` …
        name: String,
        /// As drawn.
        drawn: Millimetres,
    },
    /// A test length below the smallest permitted length.
    LengthBelowSmallest {
        /// The test length.
        at_length_mm: Millimetres,
        /// Ln.
        smallest_mm: Millimetres,
    },
    /// The upper service load is reached below the smallest length that dynamic load permits.
    ServiceBelowSmallest {
        /// Length at the upper service load.
        at_length_mm: Millimetres,
        /// Smallest length under dynamic load.
        smallest_mm: Millimetres,
    },
    /// The window of the rate reaches beyond 20 to 80 % of the deflection to Ln.
    WindowOutside {
        /// Where it starts, as a share of the deflection.
        from: Finite,
        /// Where it ends.
        to: Finite,
    },
    /// The largest permitted solid length is shorter than the coils are high.
    SolidLengthTooShort {
        /// As required.
        maximum: Millimetres,
        /// From the coils and the thinnest wire.
        least: Millimetres,
    },
    /// Active, total and dead coils do not add up.
    CoilsNotFromEnds {
        /// Which spring.
        member: String,
        /// Total less active coils, as drawn.
        drawn: Finite,
        /// Dead coils such ends have.
        usual: Finite,
    },
    /// The index is outside 4 to 20.
    IndexUnusual {
        /// Which spring.
        member: String,
        /// w.
        index: Finite,
    },
    /// The spring buckles on its way.
    Buckles {
        /// Which spring.
        member: String,
        /// Its deflection where it buckles.
        deflection_mm: Millimetres,
        /// The deflection it has to bear.
        wanted_mm: Millimetres,
        /// The seating that was taken.
        seating: String,
        /// Whether the drawing states it.
        stated: bool,
    },
    /// The natural frequency is near the one the spring is driven at.
    FrequencyNear {
        /// Which spring.
        member: String,
        /// Natural frequency, Hz.
        natural_hz: Finite,
        /// Stated frequency, Hz.
        driven_hz: Finite,
    },
    /// A stress is above what the wire bears.
    StressAbove {
        /// Which spring.
        member: String,
        /// Where.
        place: StressPlace,
        /// Which stress is held against which limit.
        rule: Permissible,
        /// The stress.
        stress_mpa: Megapascals,
        /// The limit.
        limit_mpa: Megapascals,
    },
    /// The fatigue margin for infinite life is below one.
    FatigueBelowOne {
        /// Which spring.
        member: String,
        /// Margin by Goodman.
        margin: Finite,
    },
    /// Members of a nest touch.
    NestTouches {
        /// Outer member.
        outer: String,
        /// Inner member.
        inner: String,
        /// Radial clearance with the inner one grown under load, nominal sizes.
        clearance_mm: Millimetres,
        /// The same with all tolerances used up.
        least_mm: Millimetres,
    },
    /// Neighbours of a nest are wound the same way.
    SameHand {
        /// Outer member.
        outer: String,
        /// Inner member.
        inner: String,
    },
    /// The drawing does not say which way neighbours of a nest are wound.
    HandNotStated {
        /// Outer member.
        outer: String,
        /// Inner member.
        inner: String,
    },
}

impl DrawingFinding {
    /// How grave it is.
    pub fn weight(&self) -> Weight {
        match self {
            Self::CoilsNotFromEnds { .. }
            | Self::IndexUnusual { .. }
            | Self::FrequencyNear { .. }
            | Self::FatigueBelowOne { .. }
            | Self::HandNotStated { .. }
            | Self::Buckles { stated: false, .. }
            | Self::StressAbove {
                place: StressPlace::Solid,
                ..
            } => Weight::Remark,
            Self::NestTouches { clearance_mm, .. } if clearance_mm.get() > 0.0 => Weight::Remark,
            _ => Weight::Contradicts,
        }
    }
}

//! What is compared between a returned spring and what it was, and by how much a cause changes it.

use super::CauseError;

/// One compared quantity; a change is returned minus baseline, in the unit named here.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Measure {
    /// Free length on the bench, mm.
    FreeLength,
    /// Free length by height gauge, mm: no zero of the bench in it.
    GaugeLength,
    /// Rate of the lower stretch while loading, ln of the ratio.
    Rate,
    /// ln(rate of the upper stretch / rate of the lower one), change of it: stages, bending over, stiffening.
    Bend,
    /// Travel lost in a soft start, mm.
    Toe,
    /// Solid length, mm.
    SolidLength,
    /// Hysteresis, share of the loading work.
    Hysteresis,
    /// Wire diameter, median of its places, mm.
    Wire,
    /// Thickest minus thinnest place of the wire, mm.
    WireSpread,
    /// Outside diameter, mm.
    OutsideDiameter,
    /// Total coils counted, turns.
    Coils,
    /// Mass, ln of the ratio.
    Mass,
    /// Deviation of an end from square, mm.
    Squareness,
}

impl Measure {
    /// All of them, in the order findings are shown.
    pub const ALL: [Self; 13] = [
        Self::FreeLength,
        Self::GaugeLength,
        Self::Rate,
        Self::Bend,
        Self::Toe,
        Self::SolidLength,
        Self::Hysteresis,
        Self::Wire,
        Self::WireSpread,
        Self::OutsideDiameter,
        Self::Coils,
        Self::Mass,
        Self::Squareness,
    ];
}

/// Predicted changes; what is not named does not change.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Change(Vec<(Measure, f64)>);

impl Change {
    /// From pairs; a measure named twice is the sum.
    pub fn of(parts: impl IntoIterator<Item = (Measure, f64)>) -> Self {
        Self(parts.into_iter().collect())
    }

    /// The change of one measure, in its own unit.
    pub fn get(&self, measure: Measure) -> f64 {
        let parts = self.0.iter().filter(|(named, _)| *named == measure);
        parts.map(|(_, value)| value).sum()
    }
}

/// The spring as it was: lengths in mm, coils in turns.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Form {
    wire: f64,
    coil: f64,
    active: f64,
    total: f64,
    free: f64,
    solid: f64,
}

impl Form {
    /// Wire d, mean coil D, free length L0 and solid length Lc in mm; active and total coils in turns.
    ///
    /// # Errors
    /// [`CauseError`] where a figure is not above zero or two of them exclude each other.
    pub fn new(
        (wire, coil): (f64, f64),
        (active, total): (f64, f64),
        (free, solid): (f64, f64),
    ) -> Result<Self, CauseError> {
        let figures = [
            ("wire diameter", wire),
            ("mean coil diameter", coil),
            ("number of active coils", active),
            ("number of coils", total),
            ("free length", free),
            ("solid length", solid),
        ];
        let odd = figures
            .into_iter()
            .find(|(_, found)| !(found.is_finite() && *found > 0.0));
        if let Some((what, found)) = odd {
            return Err(CauseError::NotAboveZero { what, found });
        }
        if coil <= wire {
            return Err(CauseError::Coil { coil, wire });
        }
        if total < active {
            return Err(CauseError::Coils { total, active });
        }
        if free <= solid {
            return Err(CauseError::Lengths { free, solid });
        }
        Ok(Self {
            wire,
            coil,
            active,
            total,
            free,
            solid,
        })
    }

    /// Wire diameter d, mm.
    pub fn wire(&self) -> f64 {
        self.wire
    }

    /// Mean coil diameter D, mm.
    pub fn coil(&self) -> f64 {
        self.coil
    }

    /// Active coils n.
    pub fn active(&self) -> f64 {
        self.active
    }

    /// Total coils nt.
    pub fn total(&self) -> f64 {
        self.total
    }

    /// Free length L0, mm.
    pub fn free(&self) -> f64 {
        self.free
    }

    /// Pitch of the active coils at free length, mm: wire plus its share of the way to solid.
    pub fn pitch(&self) -> f64 {
        self.wire + (self.free - self.solid) / self.active
    }
}

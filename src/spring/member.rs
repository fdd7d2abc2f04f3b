//! One spring as drawn: sizes with their tolerances, ends, material.

use crate::formula::{Ends, Forming};
use crate::material::Material;

/// One spring or a set of springs that share the load.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Arrangement {
    /// One spring.
    Single,
    /// Springs one inside the other; their loads add up.
    Nested,
    /// Springs end to end; their deflections add up.
    Stacked,
}

/// A drawn size with its symmetric tolerance (0 where none is stated), in mm or coils.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sized {
    /// Nominal value.
    pub nominal: f64,
    /// Half-width of the tolerance.
    pub tolerance: f64,
}

/// Which coil diameter the drawing gives, in mm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Coil {
    /// De.
    Outside(Sized),
    /// D.
    Mean(Sized),
    /// Di.
    Inside(Sized),
}

impl Coil {
    /// The diameter as drawn.
    pub const fn sized(self) -> Sized {
        match self {
            Self::Outside(sized) | Self::Mean(sized) | Self::Inside(sized) => sized,
        }
    }
}

/// Which way the coils turn.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Hand {
    /// Right-hand.
    Right,
    /// Left-hand.
    Left,
}

/// A drawn coil diameter taken for another one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum OtherCoil {
    /// The drawn outside diameter taken for the mean.
    OutsideAsMean,
    /// The drawn inside diameter taken for the mean.
    InsideAsMean,
    /// The drawn mean diameter taken for the outside.
    MeanAsOutside,
    /// The drawn mean diameter taken for the inside.
    MeanAsInside,
}

/// One spring of the drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Member {
    /// Its name.
    pub name: String,
    /// Wire diameter d.
    pub wire: Sized,
    /// Coil diameter as drawn.
    pub coil: Coil,
    /// Active coils n.
    pub active: Sized,
    /// Total coils nt.
    pub total: f64,
    /// Ends.
    pub ends: Ends,
    /// Coiled cold or hot.
    pub forming: Forming,
    /// Which way it is wound, where the drawing says so.
    pub hand: Option<Hand>,
    /// Free length L0.
    pub free: Sized,
    /// Material.
    pub material: Material,
}

impl Member {
    /// Mean coil diameter D in mm.
    pub const fn mean_coil(&self) -> f64 {
        match self.coil {
            Coil::Outside(outside) => outside.nominal - self.wire.nominal,
            Coil::Mean(mean) => mean.nominal,
            Coil::Inside(inside) => inside.nominal + self.wire.nominal,
        }
    }

    /// The same spring with G at a temperature (°C), by the coefficient used or by the other source's; `None` where no
    /// coefficient is known.
    pub fn at_temperature(&self, temperature: f64, other: bool) -> Option<Self> {
        let (used, others) = self.material.shear_at(temperature)?;
        let mut warm = self.clone();
        warm.material.shear = if other { others } else { used };
        (warm.material.shear > 0.0).then_some(warm)
    }

    /// The mean coil diameters in mm that the drawn diameter gives when it is taken for another one.
    pub fn other_coils(&self) -> Vec<(f64, OtherCoil)> {
        let (d, coil) = (self.wire.nominal, self.mean_coil());
        match self.coil {
            Coil::Outside(_) => vec![(coil + d, OtherCoil::OutsideAsMean)],
            Coil::Inside(_) => vec![(coil - d, OtherCoil::InsideAsMean)],
            Coil::Mean(_) => vec![
                (coil - d, OtherCoil::MeanAsOutside),
                (coil + d, OtherCoil::MeanAsInside),
            ],
        }
    }
}

//! Returned springs from a generator that shares nothing with the weighing: a spring is a wire, its load is added up
//! point by point, a bench with errors of its own reads it, and slopes are fitted to what was read.

use crate::random::Random;

/// What was done to the spring; the numbers are the generator's own.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Deed {
    Set,
    Heat,
    Zero,
    ActiveBreak,
    EndBreak,
    Corrosion,
    Notch,
    Wire,
    Count,
    Diameter,
    Material,
    Other,
    Member,
    Blocked,
    Guide,
    Bowing,
    Askew,
    Nothing,
}

/// Prior weight of no change beside the causes that can be drawn.
pub(crate) const NOTHING: f64 = 0.35 / 0.95;
/// The groups of the table of priors, written out by hand; each as likely, its members too.
pub(crate) const GROUPS: [&[Deed]; 10] = [
    &[Deed::Set, Deed::Heat, Deed::Zero],
    &[
        Deed::Corrosion,
        Deed::Notch,
        Deed::Wire,
        Deed::Count,
        Deed::Diameter,
        Deed::Material,
    ],
    &[Deed::ActiveBreak],
    &[Deed::EndBreak],
    &[Deed::Other],
    &[Deed::Member],
    &[Deed::Blocked],
    &[Deed::Guide],
    &[Deed::Bowing],
    &[Deed::Askew],
];

/// One of several, each as likely.
pub(crate) fn one_of<'a, T>(all: &'a [T], random: &mut Random) -> &'a T {
    let at = random.unit() * all.len() as f64;
    let up_to = all.iter().zip(1_u32..);
    up_to
        .into_iter()
        .find(|(_, next)| at < f64::from(*next))
        .unwrap()
        .0
}

/// A spring as it lies on the bench.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Body {
    pub(crate) wire: f64,
    pub(crate) coil: f64,
    pub(crate) active: f64,
    pub(crate) total: f64,
    pub(crate) free: f64,
    pub(crate) shear: f64,
    density: f64,
    /// Wire lost over some turns.
    notch: (f64, f64),
    /// Rate of a second member over this one's, from half travel on, and its mass likewise.
    inner: (f64, f64),
    /// ln of the stiffness that comes or goes beyond half travel.
    bend: f64,
    soft_start: f64,
    drag: f64,
    askew: f64,
    solid_shift: f64,
    /// What the bench's zero adds.
    zero: f64,
}

impl Body {
    pub(crate) fn drawn(random: &mut Random) -> Self {
        let wire = random.between(1.0, 6.0);
        let active = random.between(4.0, 12.0);
        let total = active + 2.0;
        let solid = total * wire;
        Self {
            wire,
            coil: wire * random.between(5.0, 11.0),
            active,
            total,
            free: solid + active * wire * random.between(0.6, 1.4),
            shear: 81_500.0,
            density: 1.0,
            notch: (0.0, 0.0),
            inner: (0.0, 0.0),
            bend: 0.0,
            soft_start: 0.0,
            drag: 0.01,
            askew: 0.0,
            solid_shift: 0.0,
            zero: 0.0,
        }
    }

    pub(crate) fn with_inner(mut self, inner: (f64, f64)) -> Self {
        self.inner = inner;
        self
    }

    pub(crate) fn solid(&self) -> f64 {
        self.total * self.wire + self.solid_shift
    }

    /// Another drawing of the archive: a neighbour in every size.
    pub(crate) fn neighbour(&self, random: &mut Random) -> Self {
        let mut other = *self;
        other.wire *= random.between(0.92, 1.08);
        other.coil *= random.between(0.92, 1.08);
        let turns = random.between(-1.5, 1.5);
        other.active += turns;
        other.total += turns;
        let way = (self.free - self.solid()) * random.between(0.85, 1.15);
        other.free = other.solid() + way;
        other
    }

    /// One spring of a lot.
    pub(crate) fn of_lot(&self, random: &mut Random) -> Self {
        let mut one = *self;
        one.wire *= 1.0 + random.normal(0.001);
        one.coil *= 1.0 + random.normal(0.002);
        let turns = random.normal(0.02);
        one.active += turns;
        one.total += turns;
        one.free *= 1.0 + random.normal(0.004);
        one.shear *= 1.0 + random.normal(0.003);
        one.bend += random.normal(0.008);
        one.soft_start += random.normal(0.05).abs();
        one.drag += random.normal(0.002).abs();
        one.askew += random.normal(0.15).abs();
        one
    }

    /// What the deed makes of it.
    pub(crate) fn after(&self, deed: Deed, others: &[Self], random: &mut Random) -> Self {
        let mut it = *self;
        let (d, n) = (self.wire, self.active);
        match deed {
            Deed::Set => it.free -= random.between(0.0, 0.15) * self.free,
            Deed::Heat => {
                it.free -= random.between(0.0, 0.15) * self.free;
                it.shear *= 1.0 - random.between(0.0, 0.005);
            }
            Deed::Zero => it.zero = random.between(-0.05, 0.05) * self.free,
            Deed::ActiveBreak => {
                let lost = random.between(0.0, (0.5 * n).min(3.0));
                let pitch = d + (self.free - self.solid()) / n;
                it.active -= lost;
                it.free -= lost * pitch * random.between(0.75, 1.25);
            }
            Deed::EndBreak => {
                let lost = random.between(0.0, 1.0);
                it.total -= lost;
                it.active -= lost * random.between(0.0, 0.6);
                it.free -= lost * d;
                it.soft_start += lost * d * random.between(0.1, 0.9);
                it.askew += lost * d * random.between(0.1, 0.9);
            }
            Deed::Corrosion => it.wire -= random.between(0.0, 0.25) * d,
            Deed::Notch => it.notch = (random.between(0.0, 0.5) * d, random.between(0.5, 1.5)),
            Deed::Wire => {
                let thicker = random.between(-0.25, 0.25) * d;
                it.wire += thicker;
                it.coil += thicker * random.between(-0.8, 0.8);
            }
            Deed::Count => {
                let more = random.between(-1.0, 1.0) * (0.4 * n).min(3.0);
                it.active += more;
                it.total += more;
            }
            Deed::Diameter => it.coil *= 1.0 + random.between(-0.25, 0.25),
            Deed::Material => {
                it.shear *= random.between(-0.7, 0.2).exp();
                it.density *= 1.0 + random.between(-0.02, 0.13);
            }
            Deed::Other => {
                it = *one_of(others, random);
            }
            Deed::Member => it.inner = (0.0, 0.0),
            Deed::Blocked => {
                let turns = random.between(0.0, 0.5) * n;
                it.bend -= (1.0 - turns / n).ln();
                it.solid_shift += turns * (self.free - self.solid()) / n * random.between(0.2, 1.8);
            }
            Deed::Guide => it.drag += random.between(0.0, 0.4),
            Deed::Bowing => it.bend -= random.between(0.0, 0.7),
            Deed::Askew => {
                let off = random.between(0.0, 0.05) * self.free;
                it.askew += off;
                it.soft_start += off * random.between(0.1, 0.5);
            }
            Deed::Nothing => {}
        }
        it
    }

    /// Load at deflection `s`, N, without drag: compliances of the wire added up, then what sets in at half travel.
    pub(crate) fn load(&self, s: f64, half: f64) -> f64 {
        let turn = |wire: f64| 8.0 * self.coil.powi(3) / (self.shear * wire.powi(4));
        let (lost, turns) = self.notch;
        let give = turn(self.wire) * (self.active - turns) + turn(self.wire - lost) * turns;
        let rate = 1.0 / give;
        let s = if s < 2.0 * self.soft_start {
            s * s / (4.0 * self.soft_start)
        } else {
            s - self.soft_start
        };
        let beyond = (s - half).max(0.0);
        rate * (s.min(half) + beyond * (self.bend.exp() + self.inner.0))
    }

    /// Relative mass.
    pub(crate) fn mass(&self) -> f64 {
        let (lost, turns) = self.notch;
        let section = |wire: f64| wire * wire;
        let wire = section(self.wire) * (self.total - turns) + section(self.wire - lost) * turns;
        self.density * self.coil * wire * (1.0 + self.inner.1)
    }

    /// Wire over its places: the median, and the largest less the smallest.
    pub(crate) fn places(&self) -> (f64, f64) {
        (self.wire, self.notch.0)
    }

    pub(crate) fn zero(&self) -> f64 {
        self.zero
    }

    pub(crate) fn drag(&self) -> f64 {
        self.drag
    }

    pub(crate) fn askew(&self) -> f64 {
        self.askew
    }
}

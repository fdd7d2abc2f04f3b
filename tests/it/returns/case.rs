//! One simulated return: a lot measured, one spring of it changed and measured again, and what the weighing is told.

use coilassay::cause::{
    Cause, Change, Compared, Findings, Form, Measure, Shared, Sight, Suspect, suspects,
};

use super::bench::{Reading, Setup, Tools, read};
use super::springs::{Body, Deed, GROUPS, NOTHING, one_of};
use crate::random::Random;

/// Springs of the lot that were measured when new.
const LOT: u32 = 40;

pub(crate) struct Case {
    pub(crate) form: Form,
    pub(crate) suspects: Vec<Suspect>,
    pub(crate) full: Findings,
    pub(crate) curve: Findings,
}

pub(crate) fn deed(random: &mut Random) -> Deed {
    if random.unit() < NOTHING {
        return Deed::Nothing;
    }
    some_deed(random)
}

/// What happened, something having happened.
pub(crate) fn some_deed(random: &mut Random) -> Deed {
    let group = one_of(&GROUPS, random);
    *one_of(group, random)
}

fn cause_shows(deed: Deed, random: &mut Random) -> Option<Sight> {
    match deed {
        Deed::Heat => Some(Sight::TemperColour),
        Deed::ActiveBreak | Deed::EndBreak => Some(Sight::Broken),
        Deed::Corrosion | Deed::Notch => Some(if random.unit() < 0.5 {
            Sight::Rust
        } else {
            Sight::Rubbed
        }),
        Deed::Member => Some(Sight::MemberMissing),
        Deed::Blocked => Some(Sight::Debris),
        Deed::Guide => Some(Sight::Rubbed),
        Deed::Bowing => Some(Sight::Bowed),
        _ => None,
    }
}

fn sights(deed: Deed, random: &mut Random) -> Vec<(Sight, bool)> {
    let there = cause_shows(deed, random);
    let mut look = |sight| {
        (
            sight,
            random.unit() < if there == Some(sight) { 0.95 } else { 0.02 },
        )
    };
    Sight::ALL.into_iter().map(&mut look).collect()
}

fn differences(after: &[Reading], before: &[Reading]) -> Vec<Reading> {
    after
        .iter()
        .zip(before)
        .map(|((measure, a), (_, b))| (*measure, a - b))
        .collect()
}

/// Mean and standard deviation of every reading over the lot.
fn lot(body: &Body, way: f64, tools: &Tools, random: &mut Random) -> Vec<(Measure, f64, f64)> {
    let setup = Setup {
        zero: random.normal(tools.zero),
        force: random.normal(tools.force),
    };
    let all: Vec<Vec<Reading>> = (0..LOT)
        .map(|_| read(&body.of_lot(random), way, tools, setup, Some(random)))
        .collect();
    let n = f64::from(LOT);
    let column = |place: usize| {
        let mean = all.iter().map(|one| one[place].1).sum::<f64>() / n;
        let square = all
            .iter()
            .map(|one| (one[place].1 - mean).powi(2))
            .sum::<f64>();
        (all[0][place].0, mean, (square / (n - 1.0)).sqrt())
    };
    (0..all[0].len()).map(column).collect()
}

impl Case {
    /// A return by `deed`, its severity drawn until `wanted` takes the true change of the most
    /// sensitive finding over its U.
    pub(crate) fn drawn(deed: Deed, random: &mut Random, wanted: impl Fn(f64) -> bool) -> Self {
        let inner = (random.between(0.3, 1.2), random.between(0.25, 0.8));
        let plain = Body::drawn(random);
        let body = if deed == Deed::Member {
            plain.with_inner(inner)
        } else {
            plain
        };
        let tools = Tools::drawn(random);
        let way = body.free - body.solid();
        let ideal = |body: &Body| read(body, way, &tools, Setup::default(), None);
        let before = lot(&body, way, &tools, random);
        let others: Vec<Body> = (0..3).map(|_| body.neighbour(random)).collect();
        let new = body.of_lot(random);
        let returned = loop {
            let returned = new.after(deed, &others.map_lot(random), random);
            let change = differences(&ideal(&returned), &ideal(&new));
            let ratios = change
                .iter()
                .zip(&before)
                .map(|((_, change), (_, _, sd))| change.abs() / (2.0 * sd));
            let strength = ratios.fold(0.0, f64::max);
            if wanted(strength) {
                break returned;
            }
        };
        let setup = Setup {
            zero: random.normal(tools.zero),
            force: random.normal(tools.force),
        };
        let read = read(&returned, way, &tools, setup, Some(random));
        // The spread of the lot holds the reading's own errors, stated for the two lengths; mean and spread are of 40.
        let spread = (1.0 + 1.0 / f64::from(LOT)).sqrt();
        let compared = read
            .iter()
            .zip(&before)
            .map(|((measure, value), (_, mean, sd))| {
                let own = match measure {
                    Measure::FreeLength => tools.length,
                    Measure::GaugeLength => tools.gauge,
                    _ => 0.0,
                };
                Compared {
                    measure: *measure,
                    change: value - mean,
                    lot_spread: (sd * sd - own * own).max(0.0).sqrt() * spread,
                    own,
                }
            });
        let reaches_solid = random.unit() < 0.5;
        let compared: Vec<Compared> = compared
            .filter(|one| reaches_solid || one.measure != Measure::SolidLength)
            .collect();
        let shared = || {
            let (zero, force) = (2.0_f64.sqrt() * tools.zero, 2.0_f64.sqrt() * tools.force);
            vec![
                Shared(vec![
                    (Measure::FreeLength, zero),
                    (Measure::SolidLength, zero),
                ]),
                Shared(vec![(Measure::Rate, force)]),
            ]
        };
        let on_bench = [
            Measure::FreeLength,
            Measure::Rate,
            Measure::Bend,
            Measure::Toe,
            Measure::SolidLength,
            Measure::Hysteresis,
        ];
        let curve = compared
            .iter()
            .filter(|one| on_bench.contains(&one.measure))
            .copied()
            .collect();
        let nominal = ideal(&plain);
        let others = others
            .iter()
            .map(|other| Change::of(differences(&ideal(other), &nominal)))
            .collect();
        let with = plain.with_inner(inner);
        let member = Change::of(differences(&ideal(&plain), &ideal(&with)));
        let form = Form::new(
            (plain.wire, plain.coil),
            (plain.active, plain.total),
            (plain.free, plain.solid()),
        )
        .unwrap();
        Self {
            suspects: suspects(&form, vec![member], others),
            form,
            full: Findings::new(compared, shared(), sights(deed, random)).unwrap(),
            curve: Findings::new(curve, shared(), Vec::new()).unwrap(),
        }
    }
}

trait OfLot {
    fn map_lot(&self, random: &mut Random) -> Vec<Body>;
}

impl OfLot for Vec<Body> {
    fn map_lot(&self, random: &mut Random) -> Vec<Body> {
        self.iter().map(|body| body.of_lot(random)).collect()
    }
}

/// The cause that a deed is.
pub(crate) fn cause(deed: Deed) -> Cause {
    match deed {
        Deed::Set => Cause::PermanentSet,
        Deed::Heat => Cause::Overheating,
        Deed::Zero => Cause::LengthZero,
        Deed::ActiveBreak => Cause::BrokenActiveCoil,
        Deed::EndBreak => Cause::BrokenEndCoil,
        Deed::Corrosion => Cause::UniformWireLoss,
        Deed::Notch => Cause::LocalWireLoss,
        Deed::Wire => Cause::WrongWire,
        Deed::Count => Cause::WrongCoilCount,
        Deed::Diameter => Cause::WrongCoilDiameter,
        Deed::Material => Cause::WrongMaterial,
        Deed::Other => Cause::WrongSpring,
        Deed::Member => Cause::MissingMember,
        Deed::Blocked => Cause::CoilBinding,
        Deed::Guide => Cause::GuideFriction,
        Deed::Bowing => Cause::Buckling,
        Deed::Askew => Cause::OutOfSquare,
        Deed::Nothing => Cause::NoChange,
    }
}

//! The bench: moves the platens through a programme and reads force and travel with its errors.

use crate::random::Random;
use crate::spring::Specimen;

/// What the travel column says.
#[derive(Clone, Copy)]
pub(crate) enum Travel {
    /// Distance between the platens.
    Length,
    /// Travel since the start of the recording, from zero.
    Deflection,
    /// Reading of the moving platen; it shows `at_zero_gap` mm with the platens touching.
    Position { at_zero_gap: f64 },
}

/// A bench with the errors it really has. Lengths in mm, forces in N until `unit`.
#[derive(Clone)]
pub(crate) struct Bench {
    pub(crate) travel: Travel,
    /// Relative error of the force scale: it reads `F·(1 + e)`.
    pub(crate) force_scale: f64,
    /// Relative error of the travel scale, over the distance from where it was set.
    pub(crate) travel_scale: f64,
    /// What the length scale reads too much, mm.
    pub(crate) length_zero: f64,
    /// Length at which the length scale was set, mm.
    pub(crate) set_at_length: f64,
    /// Load at which it was set, N.
    pub(crate) zeroed_at_load: f64,
    /// True frame compliance, mm/N.
    pub(crate) compliance: f64,
    /// Mean load the empty platens show, N.
    pub(crate) empty: f64,
    /// Standard deviation of the force reading, N.
    pub(crate) noise: f64,
    /// N per unit of the load column; negative where pushing reads negative.
    pub(crate) force_unit: f64,
    /// mm per unit of the travel column.
    pub(crate) travel_unit: f64,
}

impl Bench {
    /// A bench without errors that reads N and mm of length.
    pub(crate) fn perfect() -> Self {
        Self {
            travel: Travel::Length,
            force_scale: 0.0,
            travel_scale: 0.0,
            length_zero: 0.0,
            set_at_length: 0.0,
            zeroed_at_load: 0.0,
            compliance: 0.0,
            empty: 0.0,
            noise: 0.0,
            force_unit: 1.0,
            travel_unit: 1.0,
        }
    }

    /// Reads one pose. `start` is the platen distance at the start of the recording.
    ///
    /// The frame gives way by `C·F`, so the true distance is larger than the scale knows:
    /// indicated length = true length − C·(F − F_z); indicated deflection = true + C·F.
    pub(crate) fn read(
        &self,
        length: f64,
        force: f64,
        start: f64,
        random: &mut Random,
    ) -> (f64, f64) {
        let apparent = length - self.compliance * (force - self.zeroed_at_load);
        let indicated = self.set_at_length
            + (apparent - self.set_at_length) * (1.0 + self.travel_scale)
            + self.length_zero;
        let travel = match self.travel {
            Travel::Length => indicated,
            Travel::Position { at_zero_gap } => at_zero_gap - indicated,
            Travel::Deflection => {
                (start - length + self.compliance * force) * (1.0 + self.travel_scale)
            }
        };
        let shown = force * (1.0 + self.force_scale) + self.empty + random.normal(self.noise);
        (travel / self.travel_unit, shown / self.force_unit)
    }
}

/// How a spring is taken through its cycles.
#[derive(Clone)]
pub(crate) struct Programme {
    /// mm of air above the spring at the start.
    pub(crate) air: f64,
    /// Shortest length in mm.
    pub(crate) bottom: f64,
    pub(crate) cycles: usize,
    /// Readings between toe and bottom (or solid) in a loading stroke.
    pub(crate) loading: usize,
    /// The same in an unloading stroke.
    pub(crate) unloading: usize,
    /// Readings with the platens held still at the bottom.
    pub(crate) dwell: usize,
    /// Length in mm below which the bench slows down to see the coils meet.
    pub(crate) slow_below: f64,
}

/// One row of an export in the bench's own units.
pub(crate) struct Reading {
    /// Seconds since the start.
    pub(crate) time: f64,
    pub(crate) travel: f64,
    pub(crate) force: f64,
}

/// Platens' speed in mm/s: sets the time column.
const SPEED: f64 = 2.0;

/// A stretch of a stroke: from and to in mm, and how many readings.
type Stretch = (f64, f64, usize);

/// Takes a specimen through its programme and hands every reading to `row`.
pub(crate) fn run(
    specimen: &Specimen,
    bench: &Bench,
    programme: &Programme,
    random: &mut Random,
    mut row: impl FnMut(&Reading),
) {
    let start = specimen.free() + specimen.set + programme.air;
    let (mut time, mut last) = (0.0, start);
    for cycle in 0..programme.cycles {
        let to_come = programme.cycles - 1 - cycle;
        let steps = programme.cycles.saturating_sub(1).max(1);
        let longer = specimen.set * to_come as f64 / steps as f64;
        for (loading, (from, to, count)) in strokes(specimen, programme, start, cycle == 0) {
            for i in 0..count {
                let share = (i as f64 + random.between(0.2, 0.8)) / count as f64;
                let length = from + (to - from) * share;
                time += (length - last).abs() / SPEED + 0.05;
                last = length;
                let force = if loading {
                    specimen.load(length - longer)
                } else {
                    specimen.unload(length - longer, programme.bottom)
                };
                let (travel, force) = bench.read(length, force, start, random);
                row(&Reading {
                    time,
                    travel,
                    force,
                });
            }
        }
    }
}

/// The stretches of one cycle, each with whether it is loading; the readings are closer together
/// in the air, in the toe and where the coils meet.
fn strokes(
    specimen: &Specimen,
    programme: &Programme,
    start: f64,
    first: bool,
) -> [(bool, Stretch); 9] {
    let touch = specimen.free() + specimen.set;
    let seated = specimen.free() - specimen.toe();
    let bottom = programme.bottom;
    let slow = programme.slow_below.max(bottom);
    let solid = if programme.slow_below > bottom { 14 } else { 0 };
    let air = if first { 10 } else { 4 };
    [
        (true, (start, touch, air)),
        (true, (touch, seated, 9)),
        (true, (seated, slow, programme.loading)),
        (true, (slow, bottom, solid)),
        (true, (bottom, bottom, programme.dwell)),
        (false, (bottom, slow, solid / 2)),
        (false, (slow, seated, programme.unloading)),
        (false, (seated, touch, 4)),
        (false, (touch, start, 3)),
    ]
}

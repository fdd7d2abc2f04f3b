//! From what the tester wrote to one spring's curve: empty-platen zero, frame compliance, strokes.

use crate::drawing::Way;
use crate::export::RawCurve;
use crate::oddity::Odd;
use crate::rig::{Compliance, Means, Rig};

use super::error::CurveError;
use super::path::{Path, Points};
use super::screen::{OddRows, keep, screen};
use super::site::Site;
use super::strokes::split;

/// What travel is measured from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Frame {
    /// `u` is minus the length: lengths are absolute.
    Absolute,
    /// `u` is a deflection from wherever the tester set zero.
    Relative,
}

/// The load of the empty platen.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Zero {
    /// Read before contact and taken off every load.
    Read {
        /// Mean reading, N.
        mean: f64,
        /// Standard deviation of the mean, N.
        standard: f64,
        /// Readings.
        count: usize,
    },
    /// The export starts in contact.
    NotRead,
}

/// One spring's curve, corrected.
#[derive(Clone, Debug)]
pub struct Curve {
    /// The spring.
    pub id: String,
    /// The export, as written.
    pub export: String,
    /// First and last line of the spring in the export.
    pub lines: (u64, u64),
    /// What travel is measured from.
    pub frame: Frame,
    /// Empty-platen load.
    pub zero: Zero,
    /// The loading strokes, in order.
    pub loading: Vec<Path>,
    /// The unloading strokes, in order.
    pub unloading: Vec<Path>,
    /// Smallest and largest load, N.
    pub loads: (f64, f64),
    /// Strokes too short to be strokes of the test, left out.
    pub short_strokes: usize,
    /// Whether the export starts above the contact load without an empty reading: then no load has a known zero.
    pub starts_loaded: bool,
    /// What is odd, by kind and line; rows of some kinds are in no figure.
    pub odd: Vec<OddRows>,
    /// Whether the load cell was at its end; the rows there are set aside.
    pub saturated: bool,
    /// The step loads come in, N: as the rig file states, or as they really do where that is coarser.
    pub load_resolution: f64,
    /// The step travel comes in, mm.
    pub travel_resolution: f64,
}

/// Corrects one spring's raw curve by what the rig file says.
///
/// # Errors
/// [`CurveError`] where the points are no spring's: no contact, wrong sign, wrong direction.
pub fn correct(raw: &RawCurve, rig: &Rig) -> Result<Curve, CurveError> {
    let site = Site {
        raw,
        last: raw.first_line + raw.load.len().saturating_sub(1) as u64,
    };
    let contact_load = rig.contact_load.get();
    let indicated = site.travel(rig.means)?;
    let screened = screen(raw, &indicated, rig);
    let kept = screened.kept.as_deref();
    let mut u = keep(indicated, kept);
    let readings = keep(raw.load.clone(), kept);
    site.check_direction(&u, &readings, contact_load, rig.means)?;
    let zero = empty_readings(&u, &readings, contact_load);
    let offset = match zero {
        Zero::Read { mean, .. } => mean,
        Zero::NotRead => 0.0,
    };
    let load: Vec<f64> = readings.iter().map(|f| f - offset).collect();
    take_off_frame(&mut u, &load, rig);
    let points = Points {
        u: &u,
        load: &load,
        raw,
        kept,
        resolution: screened.travel_resolution,
        contact_load,
    };
    let strokes = split(&u, points.resolution);
    let leaps: Vec<OddRows> = strokes
        .leaps
        .iter()
        .map(|(first, last)| OddRows {
            first_line: points.line(*first),
            last_line: points.line(*last),
            what: Odd::LoadSteps,
        })
        .collect();
    let paths = strokes
        .full
        .into_iter()
        .map(|stroke| Path::new(points, stroke.points, stroke.way));
    let (loading, unloading): (Vec<Path>, Vec<Path>) =
        paths.partition(|path| path.side == Way::Loading);
    let widen = |(low, high): (f64, f64), f: &f64| (low.min(*f), high.max(*f));
    let loads = load.iter().fold((f64::INFINITY, f64::NEG_INFINITY), widen);
    if loading.is_empty() {
        return Err(site.no_contact(loads.1 - loads.0, contact_load));
    }
    let first = readings.first().copied().unwrap_or(0.0);
    let starts_loaded = zero == Zero::NotRead && first > contact_load;
    let mut odd = screened.odd;
    odd.extend(starts_loaded.then_some(OddRows {
        first_line: raw.first_line,
        last_line: raw.first_line,
        what: Odd::LateStart,
    }));
    odd.extend(&leaps);
    odd.extend(loading.iter().chain(&unloading).flat_map(|path| &path.odd));
    odd.sort();
    let curve = Curve {
        id: raw.id.clone(),
        export: raw.export.clone(),
        lines: (raw.first_line, site.last),
        frame: if rig.means == Means::Deflection {
            Frame::Relative
        } else {
            Frame::Absolute
        },
        zero,
        loading,
        unloading,
        loads,
        short_strokes: strokes.short,
        starts_loaded,
        odd,
        saturated: screened.saturated,
        load_resolution: screened.load_resolution,
        travel_resolution: screened.travel_resolution,
    };
    site.check_rising(&curve)?;
    Ok(curve)
}

/// Takes off the travel what the frame gave: s = s_ind − C·F, and L = L_ind + C·(F − F_z), where the give may
/// be a table instead of C·F.
fn take_off_frame(u: &mut [f64], load: &[f64], rig: &Rig) {
    let Compliance::Measured { give, .. } = &rig.frame else {
        return;
    };
    let zeroed_at = if rig.means == Means::Deflection {
        0.0
    } else {
        rig.zeroed_at_load
    };
    let at_zero = give.at(zeroed_at);
    for (x, f) in u.iter_mut().zip(load) {
        *x -= give.at(*f) - at_zero;
    }
}

/// The empty-platen readings before first contact: points that lie more than one contact load's travel
/// before the place where the first rise, taken back, starts. Fewer than three are none.
fn empty_readings(u: &[f64], load: &[f64], contact: f64) -> Zero {
    let Some(place) = rise_of(u, load, contact) else {
        return Zero::NotRead;
    };
    let before: Vec<f64> = u
        .iter()
        .zip(load)
        .take_while(|(_, f)| **f - place.base <= contact)
        .filter(|(x, _)| **x < place.clear_of)
        .map(|(_, f)| *f)
        .collect();
    let count = before.len();
    match (
        count >= 3,
        crate::stats::mean(&before),
        crate::stats::standard_deviation(&before),
    ) {
        (true, Some(mean), Some(sd)) => Zero::Read {
            mean,
            standard: sd / (count as f64).sqrt(),
            count,
        },
        _ => Zero::NotRead,
    }
}

struct FirstRise {
    base: f64,
    clear_of: f64,
}

fn rise_of(u: &[f64], load: &[f64], contact: f64) -> Option<FirstRise> {
    let base = *load.first()?;
    let place = load.iter().position(|f| f - base > contact)?;
    let beyond = load
        .iter()
        .skip(place)
        .position(|f| f - base > 6.0 * contact)
        .map_or(load.len() - 1, |more| place + more.max(2))
        .min(load.len() - 1);
    let (f0, f1) = (load.get(place)?, load.get(beyond)?);
    let (u0, u1) = (u.get(place)?, u.get(beyond)?);
    let slope = (f1 - f0) / (u1 - u0);
    if !(slope > 0.0 && slope.is_finite()) {
        return None;
    }
    Some(FirstRise {
        base,
        clear_of: u0 - (f0 - base) / slope - contact / slope,
    })
}

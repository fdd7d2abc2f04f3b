//! The cases of the proof by simulation: what each bench's rig file states, and one curve of a bench whose errors are
//! drawn from exactly that.

use coilassay::drawing::Drawing;
use coilassay::export::RawCurve;
use coilassay::rig::Rig;

use crate::bench::{Bench, Programme, Travel, run};
use crate::random::Random;
use crate::rigs;
use crate::spring::Specimen;

/// Temperature coefficient of G as the definitions state it, per kelvin.
const PER_KELVIN: f64 = 0.0003;

/// What a rig file says of a scale.
#[derive(Clone, Copy)]
pub(crate) enum Scale {
    /// Name and limit of a class, relative.
    Class(&'static str, f64),
    /// Relative standard uncertainty of a certificate.
    Certificate(f64),
}

impl Scale {
    fn toml(self) -> String {
        match self {
            Self::Class(name, _) => format!("class = \"{name}\""),
            Self::Certificate(standard) => {
                format!(
                    "certificate = {{ relative = \"{} %\", k = 2 }}",
                    200.0 * standard
                )
            }
        }
    }

    fn draw(self, random: &mut Random) -> f64 {
        match self {
            Self::Class(_, limit) => random.rectangular(limit),
            Self::Certificate(standard) => random.normal(standard),
        }
    }
}

/// What is known of the frame.
#[derive(Clone, Copy)]
pub(crate) enum Frame {
    /// Value and standard uncertainty, mm/N.
    Known(f64, f64),
    /// Nothing: up to 1 % of the travel.
    Unknown,
}

/// One case.
#[derive(Clone, Copy)]
pub(crate) struct Case {
    pub(crate) name: &'static str,
    pub(crate) travel: Travel,
    pub(crate) force: Scale,
    pub(crate) scale: Scale,
    /// Standard uncertainty of the length zero, or of the caliper for a deflection scale, mm.
    pub(crate) zero: f64,
    pub(crate) set_at: f64,
    pub(crate) zeroed_at: f64,
    pub(crate) frame: Frame,
    /// Standard deviation of a force reading, N.
    pub(crate) noise: f64,
    /// Travel in air before the spring, mm; without it the load's zero is not read.
    pub(crate) air: f64,
    /// Readings of a loading stroke.
    pub(crate) points: usize,
    pub(crate) cycles: usize,
    /// Contact load, N.
    pub(crate) contact: f64,
    /// Largest set over the cycles, mm.
    pub(crate) set: f64,
    /// Stated temperature; else drawn within ± 5 K of 20 °C.
    pub(crate) temperature: Option<f64>,
}

const HALF: Scale = Scale::Class("0.5", 0.005);
const ONE: Scale = Scale::Class("1", 0.01);
const SHOP: Case = Case {
    name: "length, class 0.5",
    travel: Travel::Length,
    force: HALF,
    scale: HALF,
    zero: 0.02,
    set_at: 80.0,
    zeroed_at: 0.0,
    frame: Frame::Known(0.000_12, 0.000_005),
    noise: 0.05,
    air: 2.0,
    points: 100,
    cycles: 1,
    contact: 1.0,
    set: 0.0,
    temperature: Some(20.0),
};
const FINE: Scale = Scale::Certificate(0.001);
const POSITION: Travel = Travel::Position { at_zero_gap: 250.0 };

#[rustfmt::skip] // one case a line
pub(crate) const MIXED: [Case; 12] = [
    SHOP,
    Case { name: "length, class 1, poor zero", force: ONE, scale: ONE, zero: 0.15, frame: Frame::Known(0.000_5, 0.000_1), noise: 0.2, ..SHOP },
    Case { name: "deflection, class 0.5, caliper", travel: Travel::Deflection, zero: 0.05, ..SHOP },
    Case { name: "position, set under load", travel: POSITION, set_at: 0.0, zeroed_at: 10.0, frame: Frame::Known(0.000_2, 0.000_025), ..SHOP },
    Case { name: "frame unknown, zero set at 60", set_at: 60.0, frame: Frame::Unknown, ..SHOP },
    Case { name: "temperature unknown", temperature: None, ..SHOP },
    Case { name: "starts in contact", air: 0.0, ..SHOP },
    Case { name: "dense, noisy", points: 1500, noise: 0.5, contact: 5.0, ..SHOP },
    Case { name: "deflection, fine caliper", travel: Travel::Deflection, force: FINE, scale: FINE, zero: 0.02, ..SHOP },
    Case { name: "noise leads, certificates", force: Scale::Certificate(0.000_2), scale: Scale::Certificate(0.000_2), zero: 0.15, noise: 1.0, contact: 10.0, points: 400, ..SHOP },
    Case { name: "contact below one step", contact: 0.5, ..SHOP },
    Case { name: "three cycles with set", cycles: 3, set: 0.3, ..SHOP },
];
#[rustfmt::skip] // one case a line
pub(crate) const NORMAL: [Case; 3] = [
    Case { name: "length, certificates", force: FINE, scale: FINE, zero: 0.15, ..SHOP },
    Case { name: "position, certificates", travel: POSITION, force: Scale::Certificate(0.004), scale: Scale::Certificate(0.003), zero: 0.1, set_at: 0.0, ..SHOP },
    Case { name: "deflection, certificates", travel: Travel::Deflection, force: FINE, scale: FINE, zero: 0.1, frame: Frame::Known(0.000_3, 0.000_05), ..SHOP },
];

pub(crate) fn rig(case: &Case) -> Rig {
    let means = match case.travel {
        Travel::Length => "\"length\"",
        Travel::Deflection => "\"deflection\"",
        Travel::Position { .. } => "\"platen position\", at_zero_gap = 250.0",
    };
    let zero = match case.travel {
        Travel::Deflection => String::new(),
        _ => format!(
            "zero = {{ uncertainty = {}, k = 2 }}\nset_at_length = {:.1}\nzeroed_at_load = {:.1}\n",
            2.0 * case.zero,
            case.set_at,
            case.zeroed_at
        ),
    };
    let frame = match case.frame {
        Frame::Known(value, standard) => {
            format!(
                "[frame]\ncompliance = {{ value = {value}, uncertainty = {standard}, k = 1 }}\n"
            )
        }
        Frame::Unknown => String::new(),
    };
    let text = format!(
        r#"[rig]
name = "bench"
[export]
header_line = 1
delimiter = ","
decimal = "."
load = {{ column = "Load", unit = "N", pushing = "positive" }}
travel = {{ column = "Travel", unit = "mm", means = {means} }}
spring = {{ from = "file name" }}
[force]
{}
resolution = 0.01
range = {{ from = 4.0, to = 1000.0 }}
[travel]
{}
resolution = 0.001
{zero}{frame}[contact]
load = {:.1}
"#,
        case.force.toml(),
        case.scale.toml(),
        case.contact
    );
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("rig.toml");
    std::fs::write(&path, text).unwrap();
    coilassay::rig::open(&path, "rig.toml").unwrap()
}

pub(crate) fn drawing() -> Drawing {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("drawing.toml");
    let more = "[requirements]\nsolid_length = { maximum = 38.4 }\nset = { maximum = 0.3 }";
    let requirements = crate::known_text::REQUIREMENTS.replace("[requirements]", more);
    let text = rigs::drawing(&requirements, rigs::EVERY_SPRING);
    std::fs::write(&path, text).unwrap();
    coilassay::drawing::open(&path, "drawing.toml").unwrap()
}

/// A spring as it is at 20 °C, the export of a bench with errors of its own, and the caliper's reading.
pub(crate) fn draw(case: &Case, random: &mut Random) -> (Specimen, RawCurve, f64) {
    let mut specimen = rigs::good_spring(random);
    specimen.set = random.between(0.1, 1.0) * case.set;
    let kelvin = case
        .temperature
        .map_or_else(|| random.rectangular(5.0), |stated| stated - 20.0);
    let mut warm = specimen.clone();
    warm.members[0].rate *= 1.0 - PER_KELVIN * kelvin;
    let compliance = match case.frame {
        Frame::Known(value, standard) => value + random.normal(standard),
        Frame::Unknown => random.between(0.0, 0.01) / specimen.rate(),
    };
    // Where nothing reads the load's zero it is drawn within what the class allows: a tenth of its share of the range.
    let empty = if case.air > 0.0 {
        random.normal(0.3)
    } else {
        random.rectangular(0.5)
    };
    let bench = Bench {
        travel: case.travel,
        force_scale: case.force.draw(random),
        travel_scale: case.scale.draw(random),
        length_zero: random.normal(case.zero),
        set_at_length: case.set_at,
        zeroed_at_load: case.zeroed_at,
        compliance,
        empty,
        noise: case.noise,
        ..Bench::perfect()
    };
    let programme = Programme {
        air: case.air,
        bottom: if case.cycles > 1 { 37.3 } else { 46.0 },
        cycles: case.cycles,
        loading: case.points,
        unloading: case.points / 3,
        dwell: 0,
        slow_below: 38.5,
    };
    let mut raw = RawCurve {
        id: "1".to_owned(),
        identity: "1".to_owned(),
        export: "1.csv".to_owned(),
        breaks: Vec::new(),
        first_line: 2,
        load: Vec::new(),
        travel: Vec::new(),
        beside: Vec::new(),
        time: None,
    };
    run(&warm, &bench, &programme, random, |reading| {
        raw.load.push((reading.force * 100.0).round() / 100.0);
        raw.travel.push((reading.travel * 1000.0).round() / 1000.0);
    });
    let gauge = specimen.free() + specimen.set + random.normal(case.zero);
    (specimen, raw, gauge)
}

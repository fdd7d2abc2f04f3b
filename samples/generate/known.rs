//! Lots whose truth is known: many springs near their limits, and a bench whose errors are drawn
//! anew for every lot from exactly the distributions its rig file states.
//!
//! Drawn once a lot: force and travel scale (a class is rectangular over its limits, a
//! certificate normal with U/k), length zero and frame compliance (normal with U/k).
//! Drawn for every spring: the caliper's error on the free length (normal with U/k), the load of
//! the empty platens, noise and rounding. The springs are at 20 °C, as the lot files say.

use crate::Outcome;
use crate::bench::{Bench, Programme, Travel, run};
use crate::known_text::{REQUIREMENTS, lot_file, rig};
use crate::random::Random;
use crate::rigs::{EVERY_SPRING, drawing, spring};
use crate::spring::Specimen;
use crate::text;
use std::io::Write;
use std::path::Path;

/// Springs in a lot.
pub(crate) const SPRINGS: u64 = 4;
const KILOGRAM: f64 = 9.806_65;

/// A limited figure: name in `truth.csv`, lower and upper limit as the drawing states them.
const LIMITS: [(&str, f64, f64); 4] = [
    ("rate_n_per_mm", 10.6 - 0.32, 10.6 + 0.32),
    ("load_at_70_n", 212.0 - 10.0, 212.0 + 10.0),
    ("load_at_52_n", 403.0 - 18.0, 403.0 + 18.0),
    ("free_length_mm", 90.2 - 0.9, 90.2 + 0.9),
];

/// A scale as the rig file states it.
#[derive(Clone, Copy)]
pub(crate) enum Scale {
    /// Class limits in percent.
    Class(&'static str, f64),
    /// Certificate with a relative expanded uncertainty in percent, k = 2.
    Certificate(f64),
}

impl Scale {
    fn draw(self, random: &mut Random) -> f64 {
        match self {
            Self::Class(_, percent) => random.rectangular(percent / 100.0),
            Self::Certificate(percent) => random.normal(percent / 200.0),
        }
    }

    /// Its line in the rig file.
    pub(crate) fn toml(self) -> String {
        match self {
            Self::Class(name, _) => format!("class = \"{name}\""),
            Self::Certificate(percent) => {
                format!("certificate = {{ relative = \"{percent} %\", k = 2 }}")
            }
        }
    }
}

/// One kind of bench; the lots take them in turn.
pub(crate) struct Setting {
    pub(crate) travel: Travel,
    /// The `travel` line of `[export]`, from the unit on.
    pub(crate) means: &'static str,
    pub(crate) force: Scale,
    pub(crate) travel_scale: Scale,
    /// Expanded uncertainty of the length scale's zero, k = 2, mm; of the caliper for deflection.
    pub(crate) zero: f64,
    pub(crate) set_at_length: f64,
    pub(crate) zeroed_at_load: f64,
    /// Stated compliance and its expanded uncertainty, k = 2, mm/N.
    pub(crate) compliance: (f64, f64),
    /// Load unit and N per unit.
    pub(crate) load: (&'static str, f64),
}

const HALF: Scale = Scale::Class("0.5", 0.5);
const ONE: Scale = Scale::Class("1", 1.0);

#[rustfmt::skip] // one bench a line
const SETTINGS: [Setting; 4] = [
    Setting { travel: Travel::Length, means: "\"length\"", force: HALF, travel_scale: HALF, zero: 0.04, set_at_length: 70.0, zeroed_at_load: 0.0, compliance: (0.000_12, 0.000_01), load: ("N", 1.0) },
    Setting { travel: Travel::Length, means: "\"length\"", force: ONE, travel_scale: ONE, zero: 0.30, set_at_length: 80.0, zeroed_at_load: 0.0, compliance: (0.000_5, 0.000_2), load: ("N", 1.0) },
    Setting { travel: Travel::Deflection, means: "\"deflection\"", force: ONE, travel_scale: ONE, zero: 0.10, set_at_length: 0.0, zeroed_at_load: 0.0, compliance: (0.000_3, 0.000_1), load: ("N", 1.0) },
    Setting { travel: Travel::Position { at_zero_gap: 250.0 }, means: "\"platen position\", at_zero_gap = 250.0", force: Scale::Certificate(0.8), travel_scale: HALF, zero: 0.06, set_at_length: 0.0, zeroed_at_load: 10.0, compliance: (0.000_2, 0.000_05), load: ("kgf", KILOGRAM) },
];

/// Writes `lots` lots and `truth.csv`.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path, lots: u64, seed: u64) -> Outcome {
    text::file(
        &folder.join("drawing.toml"),
        drawing(REQUIREMENTS, EVERY_SPRING),
    )?;
    for (number, setting) in SETTINGS.iter().enumerate() {
        text::file(&folder.join(format!("rig-{number}.toml")), rig(setting))?;
    }
    let mut truth = b"lot,setting,spring".to_vec();
    for (name, _, _) in LIMITS {
        write!(truth, ",{name},{name}_conforms")?;
    }
    writeln!(
        truth,
        ",conforms,force_scale,travel_scale,length_zero_mm,compliance_mm_per_n"
    )?;
    for (lot, (number, setting)) in (1..=lots).zip(SETTINGS.iter().enumerate().cycle()) {
        let mut random = Random::new(seed, lot);
        let place = folder.join(format!("lot-{lot:05}"));
        one_lot(
            &place,
            &format!("{lot:05},{number}"),
            setting,
            &mut random,
            &mut truth,
        )?;
        text::file(&place.join("lot.toml"), lot_file(lot, number, setting))?;
    }
    text::file(&folder.join("truth.csv"), truth)?;
    Ok(())
}

/// Draws the bench's errors, then the springs; writes their exports and what is true of them.
fn one_lot(
    place: &Path,
    label: &str,
    setting: &Setting,
    random: &mut Random,
    truth: &mut Vec<u8>,
) -> Outcome {
    let bench = Bench {
        travel: setting.travel,
        force_scale: setting.force.draw(random),
        travel_scale: setting.travel_scale.draw(random),
        length_zero: random.normal(setting.zero / 2.0),
        set_at_length: setting.set_at_length,
        zeroed_at_load: setting.zeroed_at_load,
        compliance: setting.compliance.0 + random.normal(setting.compliance.1 / 2.0),
        empty: 0.0,
        noise: 0.05,
        force_unit: setting.load.1,
        travel_unit: 1.0,
    };
    let mut findings = b"spring,free_length\n,mm\n".to_vec();
    for id in 1..=SPRINGS {
        let line = 89.9 + random.normal(0.45);
        let specimen = spring(random.normal(0.018), line, random);
        let gauge = specimen.free() + random.normal(setting.zero / 2.0);
        writeln!(findings, "{id},{gauge:.3}")?;
        truth_line(truth, label, id, &specimen, &bench)?;
        let bench = Bench {
            empty: random.normal(0.05),
            ..bench.clone()
        };
        let bytes = export(&specimen, &bench, random)?;
        text::file(&place.join(format!("springs/{id}.csv")), bytes)?;
    }
    if matches!(setting.travel, Travel::Deflection) {
        text::file(&place.join("caliper.csv"), findings)?;
    }
    Ok(())
}

/// What is true of one spring and of the bench that measured it.
fn truth_line(
    out: &mut Vec<u8>,
    label: &str,
    id: u64,
    specimen: &Specimen,
    bench: &Bench,
) -> std::io::Result<()> {
    let true_values = [
        specimen.rate(),
        specimen.load(70.0),
        specimen.load(52.0),
        specimen.free(),
    ];
    write!(out, "{label},{id}")?;
    let mut all = true;
    for ((_, low, high), value) in LIMITS.iter().zip(true_values) {
        let conforms = (*low..=*high).contains(&value);
        all &= conforms;
        write!(out, ",{value:.6},{conforms}")?;
    }
    writeln!(
        out,
        ",{all},{:.8},{:.8},{:.6},{:.9}",
        bench.force_scale, bench.travel_scale, bench.length_zero, bench.compliance
    )
}

/// One export of 120 rows.
fn export(specimen: &Specimen, bench: &Bench, random: &mut Random) -> std::io::Result<Vec<u8>> {
    let programme = Programme {
        air: random.between(1.5, 2.5),
        bottom: 46.0,
        cycles: 1,
        loading: 74,
        unloading: 20,
        dwell: 0,
        slow_below: 0.0,
    };
    let mut out = Vec::new();
    writeln!(out, "Travel,Load")?;
    run(specimen, bench, &programme, random, |reading| {
        text::number(&mut out, reading.travel, 3, b'.');
        out.push(b',');
        text::number(&mut out, reading.force, 3, b'.');
        out.push(b'\n');
    });
    Ok(out)
}

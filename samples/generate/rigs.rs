//! The tide-gate spring TG-204 and its bench, used by more than one set of files.

use crate::random::Random;
use crate::spring::{Member, Specimen, Wound};

/// Wire 4.0, mean coil 32.0, 7.5 active coils, G 81 500 MPa: R = 10.6120 N/mm.
const WOUND: Wound = Wound {
    wire: 4.0,
    coil: 32.0,
    active: 7.5,
    shear: 81_500.0,
};

/// A TG-204 as it should be: the straight part drawn out to 89.85 mm, free length near 90.17 mm.
pub(crate) fn good_spring(random: &mut Random) -> Specimen {
    spring(
        random.bounded(0.006, 0.015),
        89.85 + random.bounded(0.12, 0.30),
        random,
    )
}

/// A TG-204 with its rate off by a share and its straight part drawn out to `line` mm.
pub(crate) fn spring(rate_off: f64, line: f64, random: &mut Random) -> Specimen {
    Specimen::single(Member {
        rate: WOUND.rate() * (1.0 + rate_off),
        line,
        toe: random.between(1.4, 1.8),
        toe_start: random.between(0.55, 0.65),
        solid: 37.5 + random.bounded(0.08, 0.2),
    })
}

/// The drawing: geometry as given, then what it requires and how it accepts.
pub(crate) fn drawing(requirements: &str, acceptance: &str) -> String {
    format!("{GEOMETRY}\n{requirements}\n{acceptance}")
}

const GEOMETRY: &str = r#"# Invented drawing.
units = "mm-N"

[drawing]
number = "TG-204"
revision = "C"
title = "Flap return spring, tide gate"
arrangement = "single"

[[spring]]
name = "return"
wire_diameter = { nominal = 4.00, tolerance = 0.03 }
outside_diameter = { nominal = 36.0, tolerance = 0.4 }
active_coils = { nominal = 7.5, tolerance = 0.25 }
total_coils = 9.5
ends = "closed ground"
free_length = { nominal = 90.0, tolerance = 1.8 }
material = "EN 10270-1 SH"
"#;

/// Rate and two loads, ±5 % and ±8 %.
pub(crate) const RATE_AND_LOADS: &str = r#"[requirements]
rate = { nominal = 10.6, tolerance = "5 %", class = "major" }

[[requirements.load]]
at_length = 70.0
nominal = 212.0
tolerance = "8 %"
class = "major"

[[requirements.load]]
at_length = 52.0
nominal = 403.0
tolerance = "8 %"
class = "major"

[rate_test]
window = { from = "30 %", to = "70 %", of = "full load" }
stroke = "last loading"
method = "fit"
"#;

/// Every spring is inspected, none may be proven failing.
pub(crate) const EVERY_SPRING: &str = r#"[acceptance]
rule = "guarded"
guard = "t95"
undecided_springs = "report"
plan = { by = "every-spring" }
"#;

/// What every bench for TG-204 has in common, after `[export]`.
pub(crate) const FORCE_TRAVEL_FRAME: &str = r#"[force]
class = "0.5"
resolution = 0.01
range = { from = 4.0, to = 1000.0 }
calibrated = { on = 2026-03-02, until = 2027-03-02 }

[travel]
class = "0.5"
resolution = 0.001
zero = { uncertainty = 0.02, k = 2 }
set_at_length = 70.0
zeroed_at_load = 0.0
calibrated = { on = 2026-03-02, until = 2027-03-02 }

[frame]
compliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }

[contact]
load = 1.0
"#;

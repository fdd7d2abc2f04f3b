//! The drawing, rig and lot files of the lots whose truth is known.

use crate::bench::Travel;
use crate::known::{SPRINGS, Setting};

/// The rig file of one bench.
pub(crate) fn rig(setting: &Setting) -> String {
    let (unit, newtons) = setting.load;
    let (compliance, uncertainty) = setting.compliance;
    format!(
        r#"{HEAD}load = {{ column = "Load", unit = "{unit}", pushing = "positive" }}
travel = {{ column = "Travel", unit = "mm", means = {means} }}
spring = {{ from = "file name" }}

[force]
{force}
resolution = {resolution}
range = {{ from = 4.0, to = 1000.0 }}
{CALIBRATED}
[travel]
{scale}
resolution = 0.001
{zero}{CALIBRATED}
[frame]
compliance = {{ value = {compliance}, uncertainty = {uncertainty}, k = 2 }}

[contact]
load = 1.0
"#,
        means = setting.means,
        force = setting.force.toml(),
        scale = setting.travel_scale.toml(),
        resolution = 0.001 * newtons,
        zero = zero(setting),
    )
}

const HEAD: &str = r#"# Invented bench.
units = "mm-N"

[rig]
name = "Bench of known errors"

[export]
header_line = 1
delimiter = ","
decimal = "."
"#;

const CALIBRATED: &str = "calibrated = { on = 2026-03-02, until = 2027-03-02 }\n";

/// What the rig file says of the length scale's zero; a deflection scale has none.
fn zero(setting: &Setting) -> String {
    match setting.travel {
        Travel::Deflection => String::new(),
        _ => format!(
            "zero = {{ uncertainty = {}, k = 2 }}\nset_at_length = {:.1}\nzeroed_at_load = {:.1}\n",
            setting.zero, setting.set_at_length, setting.zeroed_at_load
        ),
    }
}

/// The lot file of one lot, measured on bench `number`.
pub(crate) fn lot_file(lot: u64, number: usize, setting: &Setting) -> String {
    let (findings, caliper) = match setting.travel {
        Travel::Deflection => (
            "findings = \"caliper.csv\"\n",
            format!(
                "\n[caliper]\nfree_length = {{ uncertainty = {}, k = 2 }}\n",
                setting.zero
            ),
        ),
        _ => ("", String::new()),
    };
    format!(
        r#"drawing = "../drawing.toml"
rig = "../rig-{number}.toml"
exports = ["springs/*.csv"]
{findings}
[lot]
number = "{lot:05}"
size = {SPRINGS}
note = "Invented sample: a lot whose truth is known"

[conditions]
temperature = 20.0
presetting_strokes = 3
{caliper}"#
    )
}

/// The limits of `known::LIMITS` as the drawing states them.
pub(crate) const REQUIREMENTS: &str = r#"[requirements]
rate = { nominal = 10.6, tolerance = 0.32 }
free_length = { minimum = 89.3, maximum = 91.1 }

[[requirements.load]]
at_length = 70.0
nominal = 212.0
tolerance = 10.0

[[requirements.load]]
at_length = 52.0
nominal = 403.0
tolerance = 18.0

[rate_test]
window = { from = "30 %", to = "70 %", of = "full load" }
stroke = "last loading"
method = "fit"
"#;

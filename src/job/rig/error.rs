//! Why nothing is said of a rig.

use jiff::civil::Date;

use crate::bench::BenchError;
use crate::characteristic::MeasureError;
use crate::export::ExportError;
use crate::stats::StatsError;
use crate::text::TextError;

/// Why nothing is said of a rig.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
pub(super) enum RigJobError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    Measure(Box<MeasureError>),
    #[error(transparent)]
    #[diagnostic(transparent)]
    Export(Box<ExportError>),
    #[error(transparent)]
    #[diagnostic(transparent)]
    Bench(#[from] BenchError),
    #[error(transparent)]
    #[diagnostic(transparent)]
    Text(#[from] TextError),
    #[error(
        "`{export}` would be read as loads at a few lengths; the platens on each other are a recorded run"
    )]
    #[diagnostic(
        code(coilassay::rig::plates_points),
        help("leave `plates` out, or name a rig file without `points` for this run")
    )]
    PlatesAsPoints { export: String },
    #[error("{count} exports cannot be used")]
    #[diagnostic(code(coilassay::rig::exports))]
    Exports {
        count: usize,
        #[related]
        shown: Vec<ExportError>,
    },
    #[error(
        "measurement `{second}` in `{second_export}` has the very points of `{first}` in `{first_export}`, digit for digit"
    )]
    #[diagnostic(
        code(coilassay::rig::same_points),
        help(
            "no two measurements agree in every digit: was a file copied? Export the measurement again"
        )
    )]
    SamePoints {
        first: String,
        first_export: String,
        second: String,
        second_export: String,
    },
    #[error("the plates' run in `{export}` holds {found} specimens where one is wanted")]
    #[diagnostic(
        code(coilassay::rig::plates),
        help("export the run of plate on plate by itself")
    )]
    PlatesOfMany { export: String, found: usize },
    #[error("measurement `{measurement}` is not named as `names` says")]
    #[diagnostic(
        code(coilassay::rig::names),
        help(
            "write names = \"…\" as the exports are named (without extension), or assign the measurements in a table; a name may hold no more marks than the pattern"
        )
    )]
    Name { measurement: String },
    #[error("measurement `{measurement}` stands in two exports")]
    #[diagnostic(
        code(coilassay::rig::twice),
        help("give every measurement a name of its own")
    )]
    Twice { measurement: String },
    #[error("the study's table says nothing of measurement `{measurement}`")]
    #[diagnostic(
        code(coilassay::rig::unassigned),
        help("write a row for it: measurement, part, operator, trial")
    )]
    Unassigned { measurement: String },
    #[error("the study's table names measurement `{measurement}`, but no export holds it")]
    #[diagnostic(
        code(coilassay::rig::no_measurement),
        help(
            "write measurements as the exports name them: by file name without extension, or as the column has it"
        )
    )]
    NoMeasurement { measurement: String },
    #[error(
        "the study's table `{name}` has the columns {found} where measurement, part, operator and trial are wanted"
    )]
    #[diagnostic(
        code(coilassay::rig::columns),
        help(
            "write measurement,part,operator,trial on the first line, commas alone on the second; operator may be left out"
        )
    )]
    Columns { name: String, found: String },
    #[error(
        "the drawings limit neither rate nor loads on both sides, so that no tolerance follows for the check"
    )]
    #[diagnostic(
        code(coilassay::rig::tolerances),
        help("state the tightest tolerances to be judged under [tolerances]")
    )]
    NoTolerance,
    #[error("`{name}` is no result of `rig verify`")]
    #[diagnostic(
        code(coilassay::rig::earlier),
        help("name the result.json of an earlier check under `earlier`")
    )]
    Earlier {
        name: String,
        #[source]
        cause: serde_json::Error,
    },
    #[error("the check was measured on {on}, but is judged on {date}, before that")]
    #[diagnostic(
        code(coilassay::rig::day),
        help("write the day of the measuring: on = 2026-12-01 under [check]")
    )]
    Measured { on: Date, date: Date },
    #[error("{what}")]
    #[diagnostic(
        code(coilassay::rig::strict),
        help("without --strict this is a caution on page one")
    )]
    Strict { what: String },
    #[error("an uncertainty of the reference spring cannot be computed")]
    #[diagnostic(
        code(coilassay::rig::statistics),
        help("a figure in the rig file or the export is far out of any usable size")
    )]
    Statistics(#[from] StatsError),
    #[error("a figure of the {of} is not finite")]
    #[diagnostic(
        code(coilassay::rig::figure),
        help("a figure in a file or an export is far out of any usable size")
    )]
    NotFinite { of: &'static str },
}

//! Why an export's points are no spring curve.
#![expect(missing_docs, reason = "the messages say it")]

/// Why an export's points are no spring curve.
#[derive(Clone, Debug, PartialEq, thiserror::Error, miette::Diagnostic)]
pub enum CurveError {
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}) never makes contact: the load rises by {rise:.3} N, less than the contact load {contact} N"
    )]
    #[diagnostic(
        code(coilassay::curve::no_contact),
        help("check the load column and its unit in the rig file, and [contact] load")
    )]
    NoContact {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        rise: f64,
        contact: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}): the load falls by {fall:.3} N as the platen advances"
    )]
    #[diagnostic(
        code(coilassay::curve::sign),
        help(
            "if the tester writes compression as negative loads, write pushing = \"negative\" in the rig file; an export that starts on a loaded spring is not yet read by this version"
        )
    )]
    LoadFalls {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        fall: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}): the load rises while the travel, read as {means}, says that the spring is released"
    )]
    #[diagnostic(
        code(coilassay::curve::direction),
        help(
            "check `means` of the travel column in the rig file: a length falls as the spring is compressed, a deflection grows"
        )
    )]
    WrongWay {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        means: &'static str,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}): platen positions lie on both sides of the zero gap {gap} mm"
    )]
    #[diagnostic(
        code(coilassay::curve::gap),
        help("check at_zero_gap in the rig file: it is the reading with the platens touching")
    )]
    GapCrossed {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        gap: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}) holds a length of {length:.3} mm: no length is below zero"
    )]
    #[diagnostic(
        code(coilassay::curve::length),
        help("check `means` and the unit of the travel column in the rig file")
    )]
    NegativeLength {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        length: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}) has {points} points in the window of the rate; three are the least"
    )]
    #[diagnostic(
        code(coilassay::curve::few_points),
        help("sample more densely, or agree a wider window on the drawing")
    )]
    FewPoints {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        points: usize,
    },
    #[error(
        "spring `{spring}` in `{export}`: the window of the rate is {window:.4} mm wide, less than 20 steps of the travel's resolution {resolution} mm"
    )]
    #[diagnostic(
        code(coilassay::curve::narrow),
        help("measure with a finer travel scale, or agree a wider window on the drawing")
    )]
    NarrowWindow {
        spring: String,
        export: String,
        window: f64,
        resolution: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}): the load stands at {load:.2} N while the platen goes on by {travel:.3} mm"
    )]
    #[diagnostic(
        code(coilassay::curve::standstill),
        help(
            "a load cell at its end, a slipping grip or a buckling spring: mend the set-up and measure again"
        )
    )]
    StandsStill {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        load: f64,
        travel: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (line {line}) has one reading; a rate needs loads at two lengths"
    )]
    #[diagnostic(
        code(coilassay::curve::one_reading),
        help("are the rows sorted by length? the rows of a spring must follow each other")
    )]
    OneReading {
        spring: String,
        export: String,
        line: u64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}) has two loads at {length:.3} mm"
    )]
    #[diagnostic(
        code(coilassay::curve::length_twice),
        help(
            "write a second measurement of a spring into an export of its own and list it under [[repeat]]; loads on the way back belong to a curve"
        )
    )]
    LengthTwice {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        length: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}): at {length:.3} mm the load is {fall:.3} N lower than at a longer length"
    )]
    #[diagnostic(
        code(coilassay::curve::reading_falls),
        help(
            "check the columns, their lengths and `pushing` in the rig file: a shorter spring pushes harder"
        )
    )]
    ReadingFalls {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        length: f64,
        fall: f64,
    },
    #[error(
        "spring `{spring}` in `{export}` (lines {first}–{last}): the unloading work is larger than the loading work by {percent:.2} %, more than the uncertainty of the difference"
    )]
    #[diagnostic(
        code(coilassay::curve::reversed),
        help("a spring gives back less than it takes: are the rows in reverse order, or sorted?")
    )]
    Reversed {
        spring: String,
        export: String,
        first: u64,
        last: u64,
        percent: f64,
    },
}

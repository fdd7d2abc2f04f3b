//! Bad input through the binary: the files people write.

use crate::bad_input::{Spoilt, all_refused, squeezed};

const RATE: &str = "nominal = 10.6, tolerance = \"5 %\", class";

#[test]
#[rustfmt::skip] // keeps the table a table
fn toml_keys_and_types() {
    all_refused(
        "accepted",
        &[
            ("grammar", |c| c.sub("lot.toml", "size = 150", "size = = 150"), &["lot.toml", "lot.toml:8:", "help:"]),
            ("unknown key", |c| c.sub("lot.toml", "supplier =", "suplier ="), &["lot.toml:9:1", "unknown key `suplier`", "did you mean `supplier`?"]),
            ("misplaced key", |c| { c.sub("tg-204.toml", "[requirements]", "[requirements]\nfull_load = 500.0") }, &["tg-204.toml:21:1", "`full_load` belongs under `rate_test`"]),
            ("two faults together", |c| { c.sub("tg-204.toml", "rule =", "rul ="); c.sub("tg-204.toml", "ends =", "endz ="); }, &["unknown key `rul`", "unknown key `endz`", "did you mean `rule`?", "did you mean `ends`?"]),
            ("several faults of meaning", |c| { c.sub("tg-204.toml", "aql = 2.5", "aql = 2.0"); c.sub("tg-204.toml", "\"closed ground\"", "\"round\""); c.sub("tg-204.toml", RATE, "nominal = 10.6, tolerance = -1, class"); }, &["no AQL", "`ends` is \"round\"", "`tolerance` is -1"]),
            ("wrong type", |c| c.sub("lot.toml", "size = 150", "size = \"150\""), &["lot.toml:8:8", "`size`", "whole number"]),
            ("number for a lot number", |c| c.sub("lot.toml", "number = \"0417\"", "number = 417"), &["lot.toml:7:", "`number`", "text in quotes"]),
            ("negative size", |c| c.sub("lot.toml", "size = 150", "size = -1"), &["lot.toml:8:8", "`size`"]),
            ("nan", |c| c.sub("tg-204.toml", "nominal = 10.6", "nominal = nan"), &["tg-204.toml:21:", "`nominal` is not a finite number"]),
            ("inf", |c| c.sub("bench-1.toml", "resolution = 0.001", "resolution = inf"), &["bench-1.toml:25:14", "`resolution` is not a finite number"]),
            ("unit that is none", |c| c.sub("bench-1.toml", "unit = \"mm\"", "unit = \"furlong\""), &["bench-1.toml:13:", "\"furlong\" is not a unit", "mm, in"]),
            ("word with a typo", |c| c.sub("tg-204.toml", "\"guarded\"", "\"garded\""), &["tg-204.toml:45:8", "did you mean \"guarded\"?"]),
            ("doubled key", |c| c.sub("lot.toml", "size = 150", "size = 150\nsize = 140"), &["lot.toml:9:", "size"]),
            ("list of tables written as a table", |c| c.end("[finding]\nspring = \"TG-03\"\nclass = \"critical\"\ntext = \"broken\""), &["lot.toml", "`finding`", "a list of tables"]),
            ("finding without class", |c| c.end("[[finding]]\nspring = \"TG-03\"\ntext = \"broken\""), &["`class` is missing"]),
            ("resolution as a table", |c| { c.sub("bench-1.toml", "resolution = 0.01\n", "resolution = { value = 0.01 }\n") }, &["bench-1.toml:19:", "resolution", "help:"]),
            ("scale keys of travel under force", |c| c.sub("bench-1.toml", "[force]", "[force]\nzeroed_at_load = 20.0"), &["bench-1.toml:18:1", "`zeroed_at_load`", "travel"]),
            ("ESC in a key", |c| c.sub("lot.toml", "supplier =", "\"\\u001b[31m\\u202e\" ="), &["lot.toml:9:1", "unknown key"]),
            ("missing lot file key", |c| c.sub("lot.toml", "size = 150\n", ""), &["lot.toml", "`size` is missing", "size = 1200"]),
            ("missing drawing", |c| c.sub("lot.toml", "tg-204.toml", "nope.toml"), &["nope.toml", "help:"]),
            ("no pattern match", |c| c.sub("lot.toml", "springs/*", "spings/*"), &["lot.toml:3:12", "\"spings/*.csv\" matches no file"]),
        ],
    );
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn what_a_drawing_may_not_say() {
    all_refused(
        "accepted",
        &[
            ("two coil diameters", |c| { c.sub("tg-204.toml", "active_coils", "mean_diameter = 32.0\nactive_coils") }, &["tg-204.toml", "coil diameter", "two ways", "exactly one"]),
            ("no coil diameter", |c| c.cut("tg-204.toml", "outside_diameter", "active_coils"), &["coil diameter", "no way"]),
            ("tolerance two ways", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, tolerance = \"5 %\", plus = 0.5, minus = 0.5, class") }, &["tg-204.toml:21:8", "two ways"]),
            ("tolerance and minimum", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, tolerance = \"5 %\", minimum = 10, class") }, &["tg-204.toml:21:8", "two ways"]),
            ("no tolerance", |c| c.sub("tg-204.toml", RATE, "nominal = 10.6, class"), &["tg-204.toml:21:8", "no way"]),
            ("limits the wrong way round", |c| c.sub("tg-204.toml", RATE, "minimum = 11.0, maximum = 10.0, class"), &["tg-204.toml:21:8", "lower limit 11 is not below the upper limit 10", "right way round"]),
            ("plus and minus zero", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, plus = 0, minus = 0, class") }, &["tg-204.toml:21:8", "is not below"]),
            ("negative tolerance", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, tolerance = -0.5, class") }, &["tg-204.toml:21:", "`tolerance` is -0.5"]),
            ("negative minus", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, plus = 0.5, minus = -0.5, class") }, &["tg-204.toml:21:", "`minus` is -0.5"]),
            ("percent without its sign", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, tolerance = \"5\", class") }, &["tg-204.toml:21:", "not a share"]),
            ("nominal outside", |c| { c.sub("tg-204.toml", RATE, "nominal = 12, minimum = 10, maximum = 11, class") }, &["tg-204.toml:21:", "outside its own limits"]),
            ("AQL not in the table", |c| c.sub("tg-204.toml", "aql = 2.5", "aql = 2.0"), &["tg-204.toml:48:", "2 % is no AQL", "1.5, 2.5"]),
            ("class without AQL", |c| c.sub("tg-204.toml", "aql = 2.5", "aql = { major = 2.5 }"), &["tg-204.toml", "class minor have no AQL", "add minor"]),
            ("length never reached by the drawing", |c| c.sub("tg-204.toml", "at_length = 52.0", "at_length = 92.0"), &["tg-204.toml", "no load can be measured at 92"]),
            ("window the wrong way", |c| { c.sub("tg-204.toml", "from = \"30 %\", to = \"70 %\"", "from = \"70 %\", to = \"30 %\"") }, &["tg-204.toml", "window"]),
            ("no acceptance terms", |c| c.cut("tg-204.toml", "[acceptance]", "plan ="), &["tg-204.toml"]),
            ("nothing required", |c| c.cut("tg-204.toml", "[requirements]", "[rate_test]"), &["tg-204.toml", "requires nothing"]),
        ],
    );
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn sets_and_standards() {
    let single: &[Spoilt] = &[
        ("stack of one", |c| c.sub("tg-204.toml", "\"single\"", "\"stacked\""), &["tg-204.toml:10:", "do not fit", "a stack one for each"]),
        ("by standard", |c| { c.sub("tg-204.toml", RATE, "nominal = 10.6, standard = \"EN 15800 grade 2\", class") }, &["tg-204.toml:21:", "EN 15800", "two loads imply it"]),
    ];
    all_refused("accepted", single);
    all_refused(
        "nested",
        &[
            ("unequal members", |c| { let text = c.text("tg-350.toml"); c.set("tg-350.toml", text.replacen("nominal = 100.0", "nominal = 90.0", 1)); }, &["tg-350.toml", "engage one after the other"]),
            ("diameter of a set", |c| { c.sub("tg-350.toml", "hysteresis = {", "outside_diameter = { maximum = 51.0 }\nhysteresis = {") }, &["tg-350.toml", "outside diameter", "one spring"]),
        ],
    );
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn lots_and_their_springs() {
    all_refused(
        "accepted",
        &[
            ("lot smaller than its sample", |c| c.sub("lot.toml", "size = 150", "size = 19"), &["lot.toml:8:8", "19 springs", "20 were measured", "help:"]),
            ("lot of none", |c| c.sub("lot.toml", "size = 150", "size = 0"), &["lot.toml:8:8", "no springs"]),
            ("lot of one under a sampling plan", |c| { c.sub("lot.toml", "size = 150", "size = 1"); c.sub("lot.toml", "springs/*.csv", "springs/TG-01.csv"); c.set("caliper.csv", "spring,free_length\n,mm\nTG-01,90.0\n"); }, &["lot of 1", "every-spring", "help:"]),
            ("two springs with one id", |c| { c.set("more/TG-01.csv", c.text("springs/TG-02.csv")); c.sub("lot.toml", "[\"springs/*.csv\"]", "[\"springs/*.csv\", \"more/*.csv\"]"); }, &["spring `TG-01` is measured twice", "springs/TG-01.csv", "more/TG-01.csv", "[[repeat]]"]),
            ("unknown in finding", |c| c.end("[[finding]]\nspring = \"TG-3\"\nclass = \"minor\"\ntext = \"x\""), &["lot.toml", "`TG-3`", "finding", "TG-03"]),
            ("unknown in sample", |c| c.top("sample = [\"TG-99\"]"), &["lot.toml", "`TG-99`", "sample"]),
            ("unknown in repeat", |c| { c.set("again/x.csv", c.text("springs/TG-01.csv")); c.end("[[repeat]]\nspring = \"TG-99\"\nexport = \"again/x.csv\"\nreason = \"x\""); }, &["lot.toml", "`TG-99`", "repeat"]),
            ("doubled in sample", |c| c.top("sample = [\"TG-01\", \"TG-01\"]"), &["lot.toml:1:", "`TG-01` stands twice"]),
            ("repeat without reason", |c| c.end("[[repeat]]\nspring = \"TG-01\"\nexport = \"springs/TG-01.csv\""), &["`reason` is missing"]),
            ("not inspected: no such requirement", |c| c.top("not_inspected = [{ requirement = \"rates\", reason = \"x\" }]"), &["lot.toml:1:", "\"rates\" names no requirement"]),
            ("absurd temperature", |c| c.sub("lot.toml", "temperature = 20.5", "temperature = 2050"), &["lot.toml", "2050 °C"]),
        ],
    );
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn what_the_bench_must_say() {
    all_refused(
        "accepted",
        &[
            ("caliper column without uncertainty", |c| c.cut("lot.toml", "free_length = {", "outside_diameter"), &["caliper.csv", "free length", "[caliper] free_length"]),
            ("length export without zero", |c| c.cut("bench-1.toml", "zero = {", "set_at_length"), &["bench-1.toml", "`zero` is missing", "zero = { uncertainty = 0.02, k = 2 }"]),
            ("no contact load", |c| c.sub("bench-1.toml", "load = 1.0\n", ""), &["bench-1.toml", "`load` is missing"]),
            ("no resolution", |c| c.sub("bench-1.toml", "resolution = 0.01\n", ""), &["bench-1.toml", "`resolution` is missing", "declared negligible"]),
            ("class and certificate", |c| { c.sub("bench-1.toml", "class = \"0.5\"\nresolution = 0.01\n", "class = \"0.5\"\ncertificate = { relative = \"0.4 %\", k = 2 }\nresolution = 0.01\n") }, &["bench-1.toml", "two ways"]),
            ("certificate without k", |c| { c.sub("bench-1.toml", "class = \"0.5\"\nresolution = 0.01\n", "certificate = { relative = \"0.4 %\" }\nresolution = 0.01\n") }, &["bench-1.toml", "`k` is missing"]),
            ("class that is none", |c| c.sub("bench-1.toml", "class = \"0.5\"", "class = \"7\""), &["bench-1.toml:18:", "`class` is \"7\""]),
            ("range the wrong way", |c| { c.sub("bench-1.toml", "from = 4.0, to = 1000.0", "from = 1000.0, to = 4.0") }, &["bench-1.toml:20:", "range"]),
            ("calibration the wrong way", |c| { c.sub("bench-1.toml", "on = 2026-03-02, until = 2027-03-02", "on = 2027-03-02, until = 2026-03-02") }, &["bench-1.toml:21:", "calibration"]),
            ("gap of a length", |c| { c.sub("bench-1.toml", "means = \"length\"", "means = \"length\", at_zero_gap = 3.0") }, &["bench-1.toml:13:", "at_zero_gap"]),
            ("findings: no number", |c| c.sub("caliper.csv", "90.38", "9O.38"), &["caliper.csv", "line 3", "free_length"]),
            ("findings: twice", |c| c.sub("caliper.csv", "TG-02", "TG-01"), &["caliper.csv", "line 4", "`TG-01` stands twice"]),
            ("findings: unit", |c| c.sub("caliper.csv", ",mm,mm,mm,mm", ",cm,mm,mm,mm"), &["caliper.csv", "free_length", "`cm`"]),
            ("findings: no units line", |c| c.sub("caliper.csv", ",mm,mm,mm,mm\n", ""), &["caliper.csv", "unit"]),
            ("findings: column", |c| c.sub("caliper.csv", "wire_diameter", "wire"), &["caliper.csv", "`wire`"]),
            ("findings: below zero", |c| c.sub("caliper.csv", "90.38", "-90.38"), &["caliper.csv", "line 3", "not above zero"]),
        ],
    );
}

/// Style section 6: faults of several files are one error with the files' faults below it.
#[test]
fn faults_of_two_files_are_shown_together() {
    let case = crate::bad_input::Case::of("accepted");
    case.sub("tg-204.toml", "ends =", "endz =");
    case.sub("bench-1.toml", "check_every", "chek_every");
    let ran = case.run(&[]);
    assert_eq!(ran.code, Some(2));
    let said = squeezed(&ran.err);
    assert!(
        said.contains("`endz`") && said.contains("`chek_every`"),
        "{}",
        ran.err
    );
}

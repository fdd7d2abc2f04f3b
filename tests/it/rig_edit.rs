//! A rig file changed in every layout it may have: only what is found on the bench changes, and it opens again.

use coilassay::rig::{self, Change, Compliance, Give, edit};
use coilassay::text::Source;

use crate::rigs::FORCE_TRAVEL_FRAME;

const HEAD: &str = "# a rig of ours\n[rig]\nname = \"B\"  # the one by the door\n[export]\nheader_line = 1\ndelimiter = \",\"\ndecimal = \".\"\nload = { column = \"F\", unit = \"N\" }\ntravel = { column = \"L\", unit = \"mm\", means = \"length\" }\nspring = { from = \"file name\" }\n";
const FRAME: &str = "[frame]\ncompliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }\n";

fn source(text: &str) -> Source {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("rig.toml");
    std::fs::write(&path, text).unwrap();
    Source::open(&path, "rig.toml").unwrap()
}

fn with_frame(frame: &str) -> String {
    assert!(FORCE_TRAVEL_FRAME.contains(FRAME));
    HEAD.to_owned() + &FORCE_TRAVEL_FRAME.replace(FRAME, frame)
}

fn changes() -> [Change; 3] {
    [
        Change::Compliance {
            give: Give::Line(0.000_213_46),
            standard: 0.000_004_1,
        },
        Change::Repeatability {
            of: "rate",
            standard_deviation: 0.012_344,
        },
        Change::Repeatability {
            of: "load",
            standard_deviation: 0.25,
        },
    ]
}

#[test]
fn every_layout_of_a_rig_file_can_be_changed() {
    let frames = [
        FRAME,
        "frame = { compliance = { value = 0.1, uncertainty = 0.2, k = 2 } } # inline\n",
        "frame.compliance.value = 0.1 # dotted\nframe.compliance.uncertainty = 0.2\nframe.compliance.k = 1\n",
        "[frame.compliance] # a table\nvalue = 0.1\nuncertainty = 0.01\nk = 3\n",
        "[frame.compliance]\nuncertainty = 0.01\nk = 3\n[[frame.compliance.table]]\nload = 1.0\ngive = 1.0\n[[frame.compliance.table]]\nload = 2.0\ngive = 2.0\n",
        "[frame]\nallowance = \"2 %\" # a guess\n",
        "[frame]\ncompliance = { unknown = \"declared negligible\" }\n",
        "",
    ];
    let repeats = [
        "",
        "[[repeatability]]\nof = \"rate\"\nstandard_deviation = 0.5 # old\n",
        "[[repeatability]]\nof = \"set\"\nstandard_deviation = 0.5 # stays\n",
    ];
    for frame in frames {
        for repeat in repeats {
            for line_end in ["\n", "\r\n"] {
                // Inline and dotted keys of `frame` belong to the root, above every table.
                let text = if frame.starts_with("frame") {
                    format!("{frame}{}", with_frame(""))
                } else {
                    with_frame(frame)
                };
                let text = (text + repeat).replace('\n', line_end);
                let before = source(&text);
                rig::from_source(&before).unwrap_or_else(|fault| panic!("{text}\n{fault:?}"));
                let edited = edit(&before, &changes()).unwrap();
                let after = edited.source.text.to_string();
                let ends = after.replace(line_end, "");
                assert!(
                    !ends.contains(['\n', '\r']),
                    "line ends are kept: {after:?}"
                );
                let rig = rig::from_source(&edited.source)
                    .unwrap_or_else(|fault| panic!("{after}\n{fault:?}"));
                let wanted = Compliance::Measured {
                    give: Give::Line(0.000_213_46),
                    standard: 0.000_008_2 / 2.0,
                };
                assert_eq!(rig.frame, wanted, "{after}");
                let stated = |of: &str| {
                    rig.repeatability
                        .iter()
                        .find(|(name, _)| *name == of)
                        .map(|one| one.1)
                };
                assert_eq!(
                    (stated("rate"), stated("load")),
                    (Some(0.0123), Some(0.25)),
                    "{after}"
                );
                for kept in text
                    .split('#')
                    .skip(1)
                    .map(|rest| rest.lines().next().unwrap().trim_end())
                {
                    let gone = ["dotted"].contains(&kept.trim());
                    assert!(gone || after.contains(kept), "{kept}\n{after}");
                }
                assert_eq!(after.matches("of = \"rate\"").count(), 1, "{after}");
            }
        }
    }
}

/// A table is written to a tenth of its uncertainty, opens as itself, and is found unchanged the second time.
#[test]
fn a_table_is_written_and_read() {
    let points = vec![
        (0.0, 0.0),
        (50.0, 0.012_345_6),
        (100.0, 0.019_876_5),
        (400.0, 0.043_21),
    ];
    let change = [Change::Compliance {
        give: Give::Table(points.clone()),
        standard: 0.000_002,
    }];
    for units in ["", "units = \"in-lbf\"\n"] {
        let edited = edit(&source(&(units.to_owned() + &with_frame(FRAME))), &change).unwrap();
        let rig = rig::from_source(&edited.source).unwrap_or_else(|fault| panic!("{fault:?}"));
        let Compliance::Measured { give, standard } = &rig.frame else {
            panic!("{}", edited.source.text)
        };
        for (load, wanted) in &points {
            let off = (give.at(*load) - wanted).abs();
            assert!(
                off <= 0.1 * 0.000_004 * load.max(1.0) + 1e-5,
                "{load}: {off}\n{}",
                edited.source.text
            );
        }
        assert!((standard / 0.000_002 - 1.0).abs() < 0.06, "{standard}");
        assert!(edit(&edited.source, &change).unwrap().lines.is_empty());
    }
}

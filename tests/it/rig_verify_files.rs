//! `rig verify`: the rig file it changes, the files it refuses, the trend.

use coilassay::record::{CheckRecord, Serving};

use crate::lots::edit;
use crate::rig_verify::{bend, bend_reference, command, copy, fault, verify};

/// The rig file takes the frame's give, and keeps its comments, its other figures and its units.
#[test]
fn the_rig_file_is_changed_and_keeps_its_comments() {
    for (units, compliance) in [
        (
            "mm-N",
            "compliance = { value = 0.00030, uncertainty = 0.00001, k = 2 } # plates, spring",
        ),
        (
            "in-lbf",
            "compliance = { unknown = \"declared negligible\" } # plates, spring",
        ),
        ("mm-N", "allowance = \"2 %\" # plates, spring"),
    ] {
        let folder = copy("check");
        let rig = folder.path().join("bench-5.toml");
        let old = "compliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }";
        edit(&rig, &[(old, compliance)]);
        if units == "in-lbf" {
            edit(
                &rig,
                &[
                    ("units = \"mm-N\"", "units = \"in-lbf\""),
                    ("resolution = 0.01", "resolution = 0.00225"),
                    ("from = 4.0, to = 1000.0", "from = 0.9, to = 225.0"),
                    ("resolution = 0.001", "resolution = 0.00004"),
                    (
                        "zero = { uncertainty = 0.02",
                        "zero = { uncertainty = 0.0008",
                    ),
                    ("set_at_length = 70.0", "set_at_length = 2.75591"),
                    ("[contact]\nload = 1.0", "[contact]\nload = 0.225"),
                ],
            );
        }
        let before = std::fs::read_to_string(&rig).unwrap();
        let contradicted = compliance.contains("0.00030");
        let (status, stdout, _) = command(&folder, &[]);
        assert_eq!(status, i32::from(contradicted), "{stdout}");
        assert!(
            stdout.contains("--write would change bench-5.toml:"),
            "{stdout}"
        );
        assert_eq!(
            std::fs::read_to_string(&rig).unwrap(),
            before,
            "nothing is written unasked"
        );
        let (_, stdout, _) = command(&folder, &["--write"]);
        assert!(stdout.contains("changed in bench-5.toml:\n"), "{stdout}");
        let after = std::fs::read_to_string(&rig).unwrap();
        let kept = |text: &str| {
            text.lines()
                .filter(|line| !line.contains("compliance"))
                .count()
        };
        assert_eq!(kept(&before), kept(&after), "{after}");
        assert!(
            after.contains("# plates, spring") && after.contains("# Invented bench."),
            "{after}"
        );
        let opened = coilassay::rig::open(&rig, "bench-5.toml").unwrap();
        let coilassay::rig::Compliance::Measured { give, standard } = opened.frame else {
            panic!("{after}")
        };
        assert!(
            (give.at(1.0) - 0.000_122).abs() < 2e-6 && standard > 1e-6 && standard < 3e-6,
            "{after}"
        );
        let (status, stdout, _) = command(&folder, &["--write"]);
        assert_eq!(status, 0, "{stdout}");
        assert!(stdout.contains("holds these figures already"), "{stdout}");
    }
}

/// A frame that bends goes in as a table, which is then what corrects the curves.
#[test]
fn a_table_goes_into_the_rig_file() {
    let folder = copy("check");
    let soft = |load: f64| 0.03 * (1.0 - (-load.max(0.0) / 100.0).exp());
    bend(&folder.path().join("plates.csv"), |length, load| {
        (length - soft(load), load)
    });
    bend_reference(&folder, |length, load| (length - soft(load), load));
    let record = verify(&folder).record;
    assert!(record.frame.unwrap().table.is_some());
    let (status, stdout, _) = command(&folder, &["--write"]);
    assert_eq!(status, 1, "the rig file was contradicted: {stdout}");
    let record = verify(&folder).record;
    assert_eq!(record.decision, Serving::Serves, "{:?}", record.reasons);
    assert!(record.bench.compliance.starts_with("table of "));
    for one in &record.comparisons {
        assert!(one.e_n.unwrap().get().abs() < 0.6, "{one:?}");
    }
}

#[test]
fn files_with_faults_are_refused() {
    let changes: [(&str, &str, &str); 7] = [
        (
            "[[reference.load]]\nat_length = 50.0\nvalue = 337.68\nuncertainty = 0.60\nk = 2\n",
            "",
            "1 certified loads",
        ),
        (
            "at_length = 50.0",
            "at_length = 70.0",
            "two certified loads at one length",
        ),
        (
            "at_length = 50.0",
            "at_length = 85.0",
            "at or beyond the certified free length",
        ),
        (
            "from = 75.0, to = 50.0",
            "from = 50.0, to = 75.0",
            "not the longer length",
        ),
        (
            "drawings = [\"tg-204.toml\"]",
            "",
            "`tolerances` is missing",
        ),
        ("name = \"RS-3\"", "nmae = \"RS-3\"", "did you mean `name`"),
        ("k = 2, from = 75.0", "from = 75.0", "`k` is missing"),
    ];
    for (from, to, wanted) in changes {
        let folder = copy("check");
        edit(&folder.path().join("check.toml"), &[(from, to)]);
        let said = fault(&folder, false);
        assert!(said.contains(wanted), "{wanted}: {said}");
    }
    let folder = copy("check");
    let reference = |number: u32| folder.path().join(format!("reference/rs-3-{number}.csv"));
    std::fs::copy(reference(1), reference(2)).unwrap();
    assert!(fault(&folder, false).contains("digit for digit"));
    let folder = copy("check");
    std::fs::copy(
        folder.path().join("reference/rs-3-1.csv"),
        folder.path().join("plates.csv"),
    )
    .unwrap();
    assert!(fault(&folder, false).contains("a spring and no frame"));
}

/// Earlier results make the trend: of this rig on this reference, in order, none twice.
#[test]
fn earlier_checks_make_the_trend() {
    let folder = copy("check");
    edit(
        &folder.path().join("check.toml"),
        &[("on = 2026-11-30", "")],
    );
    std::fs::create_dir(folder.path().join("earlier")).unwrap();
    for (number, date) in ["2026-11-10", "2026-11-03", "2026-11-17"]
        .iter()
        .enumerate()
    {
        let (status, stdout, _) = command(&folder, &["--json", "--date", date]);
        assert_eq!(status, 0);
        let path = folder.path().join(format!("earlier/{number}.json"));
        std::fs::write(path, stdout).unwrap();
    }
    let mut foreign: CheckRecord = serde_json::from_str(
        &std::fs::read_to_string(folder.path().join("earlier/0.json")).unwrap(),
    )
    .unwrap();
    assert_eq!(foreign.as_earlier().len(), 4);
    assert_eq!(foreign.as_last().unwrap().id, "RS-3");
    foreign.rig = "another".to_owned();
    std::fs::write(
        folder.path().join("earlier/9.json"),
        serde_json::to_string(&foreign).unwrap(),
    )
    .unwrap();
    std::fs::copy(
        folder.path().join("earlier/0.json"),
        folder.path().join("earlier/8.json"),
    )
    .unwrap();
    edit(
        &folder.path().join("check.toml"),
        &[(
            "plates = \"plates.csv\"",
            "plates = \"plates.csv\"\nearlier = [\"earlier/*.json\"]",
        )],
    );
    let record = verify(&folder).record;
    let dates: Vec<String> = record
        .earlier
        .iter()
        .map(|one| one.date.to_string())
        .collect();
    assert_eq!(dates.len(), 12, "{dates:?}");
    assert!(dates.is_sorted());
    let out = folder.path().join("out");
    let (status, ..) = command(&folder, &["--out", out.to_str().unwrap()]);
    assert_eq!(status, 0);
    for chart in [
        "trend-rate",
        "trend-load-at-70-mm",
        "trend-free_length",
        "e-n",
        "frame",
    ] {
        assert!(out.join(format!("charts/{chart}.svg")).exists(), "{chart}");
    }
    let html = std::fs::read_to_string(out.join("report.html")).unwrap();
    assert!(html.contains("Earlier checks") && html.contains("2026-11-03"));
    let written: CheckRecord =
        serde_json::from_str(&std::fs::read_to_string(out.join("result.json")).unwrap()).unwrap();
    assert_eq!(written.earlier, record.earlier);
    // The same inputs give the same bytes.
    let again = folder.path().join("again");
    command(&folder, &["--out", again.to_str().unwrap()]);
    for file in [
        "report.html",
        "report.pdf",
        "result.json",
        "charts/trend-rate.svg",
    ] {
        assert_eq!(
            std::fs::read(out.join(file)).unwrap(),
            std::fs::read(again.join(file)).unwrap(),
            "{file}"
        );
    }
}

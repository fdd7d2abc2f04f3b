//! The files the README shows can be opened as they stand there.

use std::path::Path;

use coilassay::{drawing, intake, rig};

/// The fenced TOML block of the README that holds `mark`.
fn block(mark: &str) -> String {
    let readme =
        std::fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("README.md")).unwrap();
    let mut blocks = readme
        .split("```toml\n")
        .skip(1)
        .map(|rest| rest.split("```").next().unwrap().to_owned());
    blocks.find(|block| block.contains(mark)).unwrap()
}

#[test]
fn the_files_of_the_readme_open() {
    let folder = tempfile::tempdir().unwrap();
    let file = |name: &str, mark: &str| {
        let path = folder.path().join(name);
        std::fs::write(&path, block(mark)).unwrap();
        path
    };
    let drawn = drawing::open(&file("drawing.toml", "[rate_test]"), "drawing.toml")
        .unwrap_or_else(|fault| panic!("{fault:?}"));
    assert_eq!(drawn.number, "TG-204");
    let bench = rig::open(&file("rig.toml", "[export]"), "rig.toml")
        .unwrap_or_else(|fault| panic!("{fault:?}"));
    assert_eq!(bench.name, "Bench 1");
    for exports in ["reference", "study"] {
        std::fs::create_dir(folder.path().join(exports)).unwrap();
        std::fs::write(folder.path().join(exports).join("1.csv"), "").unwrap();
    }
    let check = intake::open_check(&file("check.toml", "[[reference.load]]"), "check.toml")
        .unwrap_or_else(|fault| panic!("{fault:?}"));
    assert_eq!(check.reference.unwrap().spring.values.len(), 4);
    let study = intake::open_study(&file("study.toml", "[study]"), "study.toml")
        .unwrap_or_else(|fault| panic!("{fault:?}"));
    assert_eq!(study.exports.len(), 1);
    let table = block("[rig]").replace(
        "compliance = { value = 0.00012, uncertainty = 0.00001, k = 2 }",
        "",
    );
    let frame = block("[frame.compliance]");
    std::fs::write(folder.path().join("rig-2.toml"), table + &frame).unwrap();
    let bench = rig::open(&folder.path().join("rig-2.toml"), "rig-2.toml")
        .unwrap_or_else(|fault| panic!("{fault:?}"));
    assert!(matches!(
        bench.frame,
        rig::Compliance::Measured {
            give: rig::Give::Table(_),
            ..
        }
    ));
    std::fs::create_dir(folder.path().join("springs")).unwrap();
    std::fs::write(folder.path().join("springs/TG-01.csv"), "").unwrap();
    let lot = intake::open(&file("lot.toml", "[[repeat]]"), "lot.toml")
        .unwrap_or_else(|fault| panic!("{fault:?}"));
    assert_eq!(
        (lot.number.as_str(), lot.repeats.len(), lot.findings.len()),
        ("0417", 1, 1)
    );
}

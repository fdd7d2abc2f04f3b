//! Archives that are none, and archives with something wrong in them: named, and the rest read.

use std::fs;

use polars::prelude::{Column, DataFrame, ParquetWriter};

use super::{files, keep, read, root, sum_anew, text, tool};
use crate::bad_input::{Case, squeezed};

fn two_lots() -> Case {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    case.sub("lot.toml", "number = \"0425\"", "number = \"0426\"");
    assert_eq!(keep(&case).code, Some(3));
    case
}

#[test]
fn a_folder_that_is_no_archive_is_left_alone() {
    let case = Case::of("undecided");
    for words in [["lots", "lot"], ["recheck", "lot"]] {
        let ran = tool(&case, &words);
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{words:?}");
        assert!(
            ran.err.contains("`lot` is no archive: it holds `"),
            "{}",
            ran.err
        );
    }
    let ran = case.run(&["--archive", "lot"]);
    assert_eq!(ran.code, Some(2));
    assert!(
        ran.err.contains("`lot` is no archive") && !case.path("staging").exists(),
        "{}",
        ran.err
    );
    let missing = tool(&case, &["lots", "nowhere"]);
    assert_eq!(missing.code, Some(2));
    assert!(
        missing.err.contains("there is no archive `nowhere`"),
        "{}",
        missing.err
    );
    fs::create_dir(case.path("../empty")).unwrap();
    assert!(
        tool(&case, &["lots", "empty"])
            .err
            .contains("there is no archive `empty`")
    );
}

#[test]
fn a_newer_layout_is_refused_by_name() {
    let case = two_lots();
    let mark = root(&case).join("archive.json");
    let old = fs::read_to_string(&mark).unwrap();
    fs::write(&mark, old.replace("\"layout\":1", "\"layout\":2")).unwrap();
    for ran in [
        tool(&case, &["lots", "archive"]),
        keep(&case),
        tool(&case, &["recheck", "archive"]),
    ] {
        assert_eq!(ran.code, Some(2));
        assert!(
            ran.err.contains("archive.json` is of layout 2"),
            "{}",
            ran.err
        );
    }
    fs::write(&mark, old).unwrap();
    // One file of it: as if a later version had written here, with other columns.
    let file = files(&root(&case), "springs").remove(0);
    let mut frame =
        DataFrame::new_infer_height(vec![Column::new("layout".into(), [2_i64])]).unwrap();
    ParquetWriter::new(fs::File::create(&file).unwrap())
        .finish(&mut frame)
        .unwrap();
    sum_anew(&root(&case), &files(&root(&case), "records").remove(0));
    let ran = tool(&case, &["lots", "archive"]);
    assert_eq!(ran.code, Some(2));
    assert!(
        ran.err
            .contains("is of layout 2, this version reads up to layout 1"),
        "{}",
        ran.err
    );
    assert!(text(&ran).contains("lot 0426") && !text(&ran).contains("lot 0425"));
}

#[test]
fn a_foreign_file_is_named_and_the_rest_is_read() {
    let case = two_lots();
    let archive = root(&case);
    let lot = files(&archive, "springs")
        .remove(0)
        .parent()
        .unwrap()
        .to_owned();
    let mut stray = DataFrame::new_infer_height(vec![Column::new("x".into(), [1.0])]).unwrap();
    ParquetWriter::new(fs::File::create(lot.join("stray.parquet")).unwrap())
        .finish(&mut stray)
        .unwrap();
    fs::write(lot.join("notes.txt"), "x").unwrap();
    fs::write(archive.join("springs/list.xls"), "x").unwrap();
    fs::create_dir(archive.join("springs/other")).unwrap();
    let ran = tool(&case, &["lots", "archive"]);
    assert_eq!(ran.code, Some(2), "something was passed over");
    for name in ["stray.parquet", "notes.txt", "list.xls", "springs/other"] {
        assert!(ran.err.contains(name), "{name}: {}", ran.err);
    }
    assert!(text(&ran).contains("lot 0425") && text(&ran).contains("lot 0426"));
}

#[test]
fn a_run_under_another_runs_name_is_not_taken() {
    let case = two_lots();
    let archive = root(&case);
    let file = files(&archive, "springs").remove(0);
    let other = file.with_file_name("20300101T000000.000000Z-00000000.parquet");
    fs::copy(&file, &other).unwrap();
    let unreadable = || {
        let found = read(&archive);
        assert_eq!((found.runs.len(), found.unreadable.len()), (2, 1));
        found.unreadable[0].why.clone()
    };
    assert!(unreadable().contains("there are no checksums of it"));
    // With checksums of its own it is still another run.
    let record = files(&archive, "records").remove(0);
    let below = other.strip_prefix(&archive).unwrap().to_string_lossy();
    let sums = record.with_file_name("20300101T000000.000000Z-00000000.sha256");
    fs::write(&sums, format!("-  {below}\n")).unwrap();
    sum_anew(&archive, &sums);
    assert!(unreadable().contains("it holds the run `"));
}

/// Cut off anywhere, a springs file is named, nothing panics, and the other lot is read.
#[test]
fn a_truncated_file_is_named_wherever_it_ends() {
    let case = two_lots();
    let file = files(&root(&case), "springs").remove(0);
    let whole = fs::read(&file).unwrap();
    let name = file.file_name().unwrap().to_string_lossy().into_owned();
    let step = whole.len() / 150;
    for end in (0..whole.len())
        .step_by(step)
        .chain(whole.len() - 12..whole.len())
    {
        fs::write(&file, &whole[..end]).unwrap();
        let found = read(&root(&case));
        assert_eq!(
            (found.runs.len(), found.unreadable.len()),
            (1, 1),
            "{end} bytes"
        );
        assert!(found.unreadable[0].file.contains(&name));
    }
    // Into that lot nothing is written while nobody knows its latest run.
    case.sub("lot.toml", "number = \"0426\"", "number = \"0425\"");
    let ran = keep(&case);
    assert_eq!(ran.code, Some(2));
    assert!(
        squeezed(&ran.err).contains(&name) && ran.err.contains("help:"),
        "{}",
        ran.err
    );
    let checked = tool(&case, &["recheck", "archive"]);
    assert!(checked.err.contains(&name), "{}", checked.err);
}

/// polars takes some flipped bytes for other figures and panics on others; the checksum stands before it.
#[test]
fn a_flipped_byte_is_never_a_figure_without_a_word() {
    let case = two_lots();
    let archive = root(&case);
    let file = files(&archive, "springs").remove(0);
    let whole = fs::read(&file).unwrap();
    for place in (0..whole.len()).step_by(whole.len() / 400) {
        let mut bytes = whole.clone();
        bytes[place] ^= 0x5A;
        fs::write(&file, &bytes).unwrap();
        let found = read(&archive);
        assert_eq!(
            (found.runs.len(), found.unreadable.len()),
            (1, 1),
            "byte {place}"
        );
        assert!(
            found.unreadable[0].why.contains("its SHA-256 is not"),
            "{:?}",
            found.unreadable
        );
    }
}

/// A table of another engine has no checksum; where polars panics on one, that is a fault as any other.
#[test]
fn a_damaged_table_of_another_engine_is_a_fault() {
    let case = two_lots();
    let file = files(&root(&case), "springs").remove(0);
    let whole = fs::read(file).unwrap();
    for place in (0..whole.len()).step_by(whole.len() / 60) {
        let mut bytes = whole.clone();
        bytes[place] ^= 0x5A;
        case.set("table.parquet", &bytes);
        let ran = tool(&case, &["lots", "lot/table.parquet"]);
        assert_eq!(
            (ran.code, ran.out.len()),
            (Some(2), 0),
            "byte {place}: {}",
            ran.err
        );
    }
}

/// A rejected lot must not vanish from a history in silence.
#[test]
fn a_run_whose_springs_file_was_taken_away_is_named() {
    let case = two_lots();
    let file = files(&root(&case), "springs").remove(0);
    fs::remove_file(&file).unwrap();
    for words in [["lots", "archive"], ["recheck", "archive"]] {
        let ran = tool(&case, &words);
        assert_eq!(ran.code, Some(2), "{words:?}");
        assert!(
            ran.err.contains("its record is there and this file is not"),
            "{}",
            ran.err
        );
    }
    case.sub("lot.toml", "number = \"0426\"", "number = \"0427\"");
    let ran = keep(&case);
    assert_eq!((ran.code, ran.out.len()), (Some(2), 0));
    assert!(squeezed(&ran.err).contains("itsrecordisthereandthisfileisnot"));
    // The staging folder of a run that was killed on its way says that it never was one.
    let run = file.file_stem().unwrap();
    let staging = root(&case).join("staging").join(run);
    fs::create_dir(&staging).unwrap();
    assert_eq!(tool(&case, &["lots", "archive"]).code, Some(0));
    assert_eq!(keep(&case).code, Some(3));
    // After a day what it had moved in goes with it.
    let day = std::time::SystemTime::now() - std::time::Duration::from_hours(25);
    fs::File::open(&staging).unwrap().set_modified(day).unwrap();
    assert_eq!(keep(&case).code, Some(3));
    let left: Vec<_> = files(&root(&case), "records");
    assert!(!staging.exists() && left.iter().all(|path| path.file_stem() != Some(run)));
    assert_eq!(tool(&case, &["lots", "archive"]).code, Some(0));
}

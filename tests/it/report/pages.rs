//! Model, HTML, PDF, CSV, summary.

use coilassay::model::Model;
use coilassay::record::AcceptRecord;
use coilassay::report::{self, ReportError, Template, Templates, springs_csv, summary};
use coilassay::units::System;

use super::{lots, springs::curves};

pub(super) fn file(record: &AcceptRecord, show_in: System, path: &str) -> Vec<u8> {
    let files =
        report::accept(record, &curves(record, 60), show_in, &Templates::built_in()).unwrap();
    files
        .into_iter()
        .find(|file| file.path == path)
        .unwrap()
        .bytes
}

/// The text a reader sees: tags out, entities back.
pub(super) fn read(html: &[u8]) -> String {
    let html = std::str::from_utf8(html).unwrap();
    let body = html.split_once("<body>").unwrap().1;
    let mut text = String::new();
    let mut inside = false;
    for letter in body.chars() {
        match letter {
            '<' => inside = true,
            '>' => {
                inside = false;
                text.push(' ');
            }
            _ if !inside => text.push(letter),
            _ => {}
        }
    }
    text.replace("&lt;", "<")
        .replace("&gt;", ">")
        .replace("&quot;", "\"")
        .replace("&#x27;", "'")
        .replace("&#x2f;", "/")
        .replace("&amp;", "&")
}

#[test]
fn a_csv_is_harmless_and_whole_under_hostile_names() {
    let csv = String::from_utf8(springs_csv(&lots::hostile())).unwrap();
    assert!(
        csv.contains("\r\n\"'=HYPERLINK(\"\"x\"\")\","),
        "a formula is disarmed and quoted"
    );
    assert!(csv.contains("\"two\nlines\","));
    assert!(
        csv.starts_with("spring,spring_verdict,")
            && csv.contains("at_length_mm,unit,value,expanded_uncertainty")
    );
}

#[test]
fn the_same_record_gives_the_same_bytes() {
    let record = lots::nested();
    let make = || {
        report::accept(
            &record,
            &curves(&record, 60),
            System::MmN,
            &Templates::built_in(),
        )
        .unwrap()
    };
    let (first, second) = (make(), make());
    assert_eq!(
        first.iter().map(|file| &file.path).collect::<Vec<_>>(),
        [
            "report.html",
            "report.pdf",
            "charts/curves.svg",
            "charts/residuals.svg",
            "charts/shares.svg",
            "charts/rate.svg",
            "charts/load-at-48-mm.svg",
            "charts/load-at-38.5-mm.svg",
            "charts/free_length.svg",
        ]
    );
    assert!(first == second, "bytes differ");
}

#[test]
fn hostile_names_still_give_pages() {
    let record = lots::hostile();
    let pdf = file(&record, System::MmN, "report.pdf");
    assert!(pdf.starts_with(b"%PDF-1.7"));
    let archival = b"<pdfaid:part>2</pdfaid:part><pdfaid:conformance>B</pdfaid:conformance>";
    assert!(
        pdf.windows(archival.len()).any(|window| window == archival),
        "not marked PDF/A-2b"
    );
    let html = file(&record, System::MmN, "report.html");
    let page = std::str::from_utf8(&html).unwrap();
    for raw in ["<script>", "<b>&", "\u{1b}", "\u{202e}", "{{", "{%"] {
        let seen = page.split_once("<body>").unwrap().1.contains(raw);
        assert_eq!(seen, raw.starts_with('{'), "{raw:?}"); // braces are text to a browser
    }
    let text = read(&html);
    for name in [
        "弹簧-17",
        "🙂 spring",
        "قياس ٣",
        "Пружина Ω-4 žluťoučký",
        "=HYPERLINK(\"x\")",
        "{{ report.lot }} {% raw %}",
        &"W".repeat(400),
    ] {
        assert!(text.contains(name), "{name}");
    }
}

#[test]
fn page_one_says_what_it_must() {
    let text = read(&file(&lots::rejected(), System::MmN, "report.html"));
    for wanted in [
        "REJECTED",
        "Of 200 springs measured 179 conform, 14 fail, 7 undecided.",
        "14 springs proven failing, and the plan rejects from 2.",
        "Simple acceptance",
        "Invented sample: these springs were never made.",
        "Concession (does not change the decision): ",
        "solid length: no bench load high enough",
        "Bench 2",
        "2026-03-02 … 2027-03-02",
        "For the supplier: proven nonconformities",
        "guard them",
        "theoretical",
        "not by this page",
        "EN 13906-1",
        "8·F·D / (π·d³)",
    ] {
        assert!(text.contains(wanted), "{wanted}");
    }
    assert!(
        !read(&file(&lots::accepted(), System::MmN, "report.html")).contains("For the supplier")
    );
}

#[test]
fn the_model_of_one_spring() {
    insta::assert_json_snapshot!(Model::new(&lots::one(), System::MmN));
}

#[test]
fn page_one_of_an_undecided_lot() {
    let model = Model::new(&lots::undecided(), System::InLbf);
    insta::assert_json_snapshot!((&model.decision, &model.notes, &model.facts, &model.cautions));
}

#[test]
fn summaries() {
    for (name, record) in [
        ("accepted", lots::accepted()),
        ("undecided", lots::undecided()),
        ("rejected", lots::rejected()),
        ("hostile", lots::hostile()),
    ] {
        let text = summary(&record, System::MmN);
        assert!(
            text.lines().count() <= 30,
            "{name}: {} lines",
            text.lines().count()
        );
        assert!(
            !text
                .chars()
                .any(|letter| letter.is_control() && letter != '\n'),
            "{name}"
        );
        insta::assert_snapshot!(name, text);
    }
}

#[test]
fn a_template_that_names_what_is_not_there_is_a_fault_with_its_place() {
    let record = lots::one();
    let mut templates = Templates::built_in();
    templates.typst = Template {
        name: "own/report.typ".to_owned(),
        text: "#let d = json(bytes(sys.inputs.data))\n#d.report.lott\n".to_owned(),
    };
    let fault = report::accept(&record, &[], System::MmN, &templates).unwrap_err();
    let ReportError::Template {
        name, line, column, ..
    } = &fault
    else {
        panic!("{fault}")
    };
    assert_eq!(
        (name.as_str(), *line, *column),
        ("own/report.typ", 2, 11),
        "{fault}"
    );
    let mut templates = Templates::built_in();
    templates.html = Template {
        name: "own/report.html".to_owned(),
        text: "{{ report.decision.words }}".to_owned(),
    };
    let fault = report::accept(&record, &[], System::MmN, &templates).unwrap_err();
    assert!(
        matches!(
            &fault,
            ReportError::Template {
                line: 1,
                column: 4,
                ..
            }
        ),
        "{fault}"
    );
}

#[test]
fn nothing_measured_still_gives_a_report() {
    let mut record = lots::one();
    for of in &mut record.springs[0].characteristics {
        (of.value, of.expanded_uncertainty, of.budget) = (None, None, Vec::new());
    }
    record.springs[0].fit = None;
    record.theory.members.clear();
    record.plan.classes.clear();
    record.cautions.clear();
    let files = report::accept(&record, &[], System::MmN, &Templates::built_in()).unwrap();
    assert_eq!(files.len(), 2);
    record.springs.clear();
    record.drawing.requirements.clear();
    assert!(report::accept(&record, &[], System::MmN, &Templates::built_in()).is_ok());
}

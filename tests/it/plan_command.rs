//! `plan`: plans side by side as text, JSON and a page; every figure against published ones or the other ways to it.

use assert_cmd::Command;
use serde_json::Value;

use crate::published::Misses;

pub(crate) struct Ran {
    pub(crate) code: Option<i32>,
    pub(crate) out: String,
    pub(crate) err: String,
}

pub(crate) fn run(flags: &[&str]) -> Ran {
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .args(["plan", "--date", "2026-12-01"])
        .args(flags)
        .output()
        .unwrap();
    Ran {
        code: output.status.code(),
        out: String::from_utf8(output.stdout).unwrap(),
        err: String::from_utf8(output.stderr).unwrap(),
    }
}

pub(crate) fn compared(flags: &[&str]) -> Value {
    let ran = run(&[flags, &["--json"]].concat());
    assert_eq!(ran.code, Some(0), "{}", ran.err);
    serde_json::from_str(&ran.out).unwrap()
}

#[test]
fn the_usual_plan() {
    let ran = run(&["--lot-size", "1200", "--level", "II", "--aql", "1.0"]);
    assert_eq!(ran.code, Some(0), "{}", ran.err);
    for says in [
        "Letter: J",
        "n: 80",
        "Ac 2, Re 3",
        "Producer’s risk: 4.7 % at 1 %",
    ] {
        assert!(
            ran.out.replace('\u{a0}', " ").contains(says),
            "{says}\n{}",
            ran.out
        );
    }
    let found = compared(&["--lot-size", "1200", "--level", "II", "--aql", "1.0"]);
    let plan = &found["plans"][0];
    assert_eq!(
        (
            plan["sample_size"].as_u64(),
            plan["accept"].as_u64(),
            plan["reject"].as_u64()
        ),
        (Some(80), Some(2), Some(3))
    );
    // by hand: Σ C(80, d)·0.01^d·0.99^(80−d), d = 0, 1, 2
    let (q, p) = (0.99_f64, 0.01_f64);
    let accepted = q.powi(80) + 80.0 * p * q.powi(79) + 3160.0 * p * p * q.powi(78);
    approx::assert_relative_eq!(
        plan["producers_risk"].as_f64().unwrap(),
        1.0 - accepted,
        epsilon = 0.0,
        max_relative = 1e-9
    );
    assert_eq!(found["kind"], "plan");
    assert!(found["bench"].is_null() && plan["curve"][1]["undecided_on_bench"].is_null());
}

#[test]
fn several_side_by_side() {
    let found = compared(&[
        "--lot-size",
        "1200",
        "--level",
        "I",
        "--level",
        "II",
        "--aql",
        "1.0",
        "--aql",
        "2.5",
        "--state",
        "normal",
        "--state",
        "tightened",
        "--mil-std-414",
        "1.0",
        "--designed",
        "1%:5%:5%:10%",
        "--zero-accept",
        "4%:10%",
    ]);
    let plans = found["plans"].as_array().unwrap();
    assert_eq!(plans.len(), 2 * 2 * 2 + 2 + 1 + 1);
    let mut misses = Misses::default();
    for plan in plans {
        let name = plan["name"].as_str().unwrap();
        let curve = plan["curve"].as_array().unwrap();
        let chance = |place: usize| curve[place]["accepted"].as_f64().unwrap();
        assert!((chance(0) - 1.0).abs() < 1e-12, "{name}");
        assert!(
            (1..curve.len()).all(|place| chance(place) <= chance(place - 1) + 1e-12),
            "{name} rises"
        );
        let quality = |key: &str| plan[key].as_f64().unwrap();
        assert!(
            quality("accepted_95_percent") < quality("accepted_50_percent"),
            "{name}"
        );
        assert!(
            quality("accepted_50_percent") < quality("accepted_10_percent"),
            "{name}"
        );
    }
    let designed = plans
        .iter()
        .find(|plan| plan["source"] == "designed")
        .unwrap();
    // own, scipy: n 55, Pa(p2) 0.097155
    assert_eq!(designed["sample_size"], 55);
    misses.absolute(
        "producer",
        designed["producers_risk"].as_f64().unwrap(),
        0.05,
        1e-9,
    );
    misses.absolute(
        "consumer",
        designed["consumers_risk"].as_f64().unwrap(),
        0.097_155,
        6e-7,
    );
    let zero = plans
        .iter()
        .find(|plan| plan["source"] == "zero-accept")
        .unwrap();
    assert_eq!(
        (zero["sample_size"].as_u64(), zero["accept"].as_u64()),
        (Some(56), Some(0))
    );
    misses.absolute(
        "zero-accept",
        zero["consumers_risk"].as_f64().unwrap(),
        0.096_207_406_3,
        1e-9,
    );
    misses.none();
    let table = plans
        .iter()
        .find(|plan| plan["source"] == "MIL-STD-414 Table B")
        .unwrap();
    assert_eq!(
        (
            table["code_letter"].as_str(),
            table["sample_size"].as_u64(),
            table["k"].as_f64()
        ),
        (Some("K"), Some(35), Some(1.89))
    );
}

#[test]
fn the_bench_leaves_lots_undecided_and_accepts_none_more() {
    let flags = [
        "--lot-size",
        "1200",
        "--aql",
        "1.0",
        "--mil-std-414",
        "1.0",
        "--zero-accept",
        "4%:10%",
    ];
    let widths = ["5%:33%:50%", "15%:33%:50%", "30%:33%:50%"];
    let mut before: Option<Vec<f64>> = None;
    for bench in widths {
        let found = compared(&[&flags[..], &["--bench", bench]].concat());
        let mut undecided = Vec::new();
        for plan in found["plans"].as_array().unwrap() {
            for point in plan["curve"].as_array().unwrap() {
                let of = |key: &str| point[key].as_f64().unwrap();
                let sum =
                    of("accepted_on_bench") + of("rejected_on_bench") + of("undecided_on_bench");
                assert!((sum - 1.0).abs() < 1e-9);
            }
            let some = plan["curve"].as_array().unwrap()[10]["undecided_on_bench"]
                .as_f64()
                .unwrap();
            undecided.push(some);
        }
        if let Some(before) = &before {
            assert!(
                before
                    .iter()
                    .zip(&undecided)
                    .all(|(less, more)| less < more),
                "{bench}"
            );
        }
        before = Some(undecided);
    }
    let tiny = compared(&[&flags[..2], &["--aql", "1.0", "--bench", "0.001%:33%:50%"]].concat());
    for point in tiny["plans"][0]["curve"].as_array().unwrap() {
        let off =
            point["accepted"].as_f64().unwrap() - point["accepted_on_bench"].as_f64().unwrap();
        assert!(off.abs() < 1e-3, "a perfect bench changes nothing: {point}");
    }
}

#[test]
fn the_page_and_its_folder() {
    let folder = tempfile::tempdir().unwrap();
    let out = folder.path().join("out");
    let write = |extra: &[&str]| {
        let out = out.to_string_lossy().into_owned();
        run(&[
            &[
                "--lot-size",
                "1200",
                "--aql",
                "1.0",
                "--zero-accept",
                "4%:10%",
                "--bench",
                "25%:33%:80%",
                "--out",
                &out,
            ],
            extra,
        ]
        .concat())
    };
    assert_eq!(write(&[]).code, Some(0));
    let read = |name: &str| std::fs::read_to_string(out.join(name)).unwrap();
    let page = read("plan.html");
    let result: Value = serde_json::from_str(&read("result.json")).unwrap();
    for file in result["files"].as_array().unwrap() {
        assert!(out.join(file["path"].as_str().unwrap()).exists());
    }
    for chart in [
        "operating-characteristic",
        "accepted-on-bench",
        "undecided-on-bench",
    ] {
        let svg = read(&format!("charts/{chart}.svg"));
        assert!(
            svg.contains("<title>") && page.contains(svg.trim()),
            "{chart}"
        );
    }
    let said = run(&[
        "--lot-size",
        "1200",
        "--aql",
        "1.0",
        "--zero-accept",
        "4%:10%",
        "--bench",
        "25%:33%:80%",
    ])
    .out;
    for figure in ["4.7\u{a0}%", "9.6\u{a0}%", "3.33", "6.52"] {
        assert!(page.contains(figure) && said.contains(figure), "{figure}");
    }
    let first = read("result.json");
    assert_eq!(
        write(&["--quiet"]).code,
        Some(0),
        "our own folder is replaced"
    );
    assert_eq!(first, read("result.json"));
    std::fs::write(out.join("notes.txt"), "mine").unwrap();
    let refused = write(&[]);
    assert_eq!(refused.code, Some(2));
    assert!(refused.err.contains("notes.txt") && out.join("notes.txt").exists());
}

//! The published schema of `result.json`: it is what the types say, every sample keeps to it, and every key of it is met.

use std::collections::BTreeSet;
use std::path::Path;

use assert_cmd::Command;
use serde_json::Value;

fn root(path: &str) -> std::path::PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}

fn published() -> Value {
    serde_json::from_str(&std::fs::read_to_string(root("templates/result.schema.json")).unwrap())
        .unwrap()
}

/// Folder and lot file of every sample.
const SAMPLES: [&str; 7] = [
    "accepted/lot",
    "rejected/lot",
    "undecided/lot",
    "nested/lot",
    "plans/variables",
    "plans/zero-accept",
    "plans/state",
];

fn sample(name: &str) -> Value {
    let mut command = Command::cargo_bin("coilassay").unwrap();
    command.args(["accept", "--json", "--date", "2026-12-01"]);
    command.arg(root(&format!("samples/{name}.toml")));
    if name == "plans/state" {
        let history = root("samples/plans/history.csv");
        command.arg("--history").arg(history);
    }
    let output = command.output().unwrap();
    serde_json::from_slice(&output.stdout).unwrap()
}

/// Where the types changed, `UPDATE_SCHEMA=1` writes the schema anew; then `record::FORMAT` is to be thought of.
#[test]
fn the_schema_is_what_the_types_say() {
    let made =
        serde_json::to_value(schemars::schema_for!(coilassay::record::AcceptRecord)).unwrap();
    if std::env::var_os("UPDATE_SCHEMA").is_some() {
        let text = serde_json::to_string_pretty(&made).unwrap();
        std::fs::write(root("templates/result.schema.json"), text + "\n").unwrap();
    }
    assert!(
        published() == made,
        "templates/result.schema.json is not what the types say"
    );
}

/// The result of `track`: its schema as the types say, the sample keeps to it, every key is met.
#[test]
fn the_schema_of_track() {
    let path = root("templates/track.schema.json");
    let made = serde_json::to_value(schemars::schema_for!(coilassay::record::TrackRecord)).unwrap();
    if std::env::var_os("UPDATE_SCHEMA").is_some() {
        let text = serde_json::to_string_pretty(&made).unwrap();
        std::fs::write(&path, text + "\n").unwrap();
    }
    let published: Value = serde_json::from_str(&std::fs::read_to_string(&path).unwrap()).unwrap();
    assert!(published == made, "{path:?} is not what the types say");
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .args([
            "track",
            "--json",
            "--by",
            "wire_heat",
            "--date",
            "2026-11-30",
        ])
        .arg(root("samples/archive"))
        .output()
        .unwrap();
    let mut record: Value = serde_json::from_slice(&output.stdout).unwrap();
    let schema = jsonschema::validator_for(&published).unwrap();
    let faults: Vec<String> = schema
        .iter_errors(&record)
        .map(|fault| fault.to_string())
        .collect();
    assert!(faults.is_empty(), "{faults:#?}");
    let (mut wanted, mut met) = (BTreeSet::new(), BTreeSet::new());
    keys(&published["properties"], &mut wanted);
    for name in [
        "TrackedLot",
        "StepFacts",
        "ReferenceMoved",
        "TrendFacts",
        "CrossingFacts",
        "AbleFacts",
        "GroupFacts",
    ] {
        keys(&published["$defs"][name]["properties"], &mut wanted);
    }
    all_keys(&record, &mut met);
    let never: Vec<&String> = wanted.difference(&met).collect();
    assert!(never.is_empty(), "never met: {never:?}");
    record["decision"] = Value::from("fine");
    assert!(!schema.is_valid(&record), "a word that is none passes");
}

/// The results of `rig verify` and `rig repeat`: schemas as the types say, the samples keep to them, every key is met.
#[test]
fn the_schemas_of_the_rig() {
    let schemas = [
        (
            "rig-verify.schema.json",
            serde_json::to_value(schemars::schema_for!(coilassay::record::CheckRecord)).unwrap(),
            ["verify", "samples/check/check.toml"],
            [
                "ComparisonFacts",
                "FrameFacts",
                "ReferenceFacts",
                "RigFacts",
            ]
            .as_slice(),
        ),
        (
            "rig-repeat.schema.json",
            serde_json::to_value(schemars::schema_for!(coilassay::record::RepeatRecord)).unwrap(),
            ["repeat", "samples/study/study.toml"],
            [
                "StudyFacts",
                "VarianceRow",
                "VariationShare",
                "RangeFacts",
                "ProposedFigure",
                "StudyValue",
            ]
            .as_slice(),
        ),
    ];
    for (file, made, [command, input], objects) in schemas {
        let path = root(&format!("templates/{file}"));
        if std::env::var_os("UPDATE_SCHEMA").is_some() {
            let text = serde_json::to_string_pretty(&made).unwrap();
            std::fs::write(&path, text + "\n").unwrap();
        }
        let published: Value =
            serde_json::from_str(&std::fs::read_to_string(&path).unwrap()).unwrap();
        assert!(
            published == made,
            "templates/{file} is not what the types say"
        );
        let output = Command::cargo_bin("coilassay")
            .unwrap()
            .args(["rig", command, "--json", "--date", "2026-12-01"])
            .arg(root(input))
            .output()
            .unwrap();
        let mut record: Value = serde_json::from_slice(&output.stdout).unwrap();
        let schema = jsonschema::validator_for(&published).unwrap();
        let faults: Vec<String> = schema
            .iter_errors(&record)
            .map(|fault| fault.to_string())
            .collect();
        assert!(faults.is_empty(), "{file}: {faults:#?}");
        let (mut wanted, mut met) = (BTreeSet::new(), BTreeSet::new());
        keys(&published["properties"], &mut wanted);
        for name in objects {
            keys(&published["$defs"][name]["properties"], &mut wanted);
        }
        all_keys(&record, &mut met);
        let never: Vec<&String> = wanted.difference(&met).collect();
        assert!(never.is_empty(), "{file}: never met: {never:?}");
        record["decision"] = Value::from("fine");
        assert!(!schema.is_valid(&record), "a word that is none passes");
    }
}

/// The result of `expect`: its schema as the types say, the samples keep to it, every key of its own objects is met.
#[test]
fn the_schema_of_expect() {
    let path = root("templates/expect.schema.json");
    let made = serde_json::to_value(schemars::schema_for!(coilassay::record::Expected)).unwrap();
    if std::env::var_os("UPDATE_SCHEMA").is_some() {
        let text = serde_json::to_string_pretty(&made).unwrap();
        std::fs::write(&path, text + "\n").unwrap();
    }
    let published: Value = serde_json::from_str(&std::fs::read_to_string(&path).unwrap()).unwrap();
    assert!(
        published == made,
        "templates/expect.schema.json is not what the types say"
    );
    let schema = jsonschema::validator_for(&published).unwrap();
    let (mut wanted, mut met) = (BTreeSet::new(), BTreeSet::new());
    keys(&published["properties"], &mut wanted);
    for name in [
        "MemberAnswer",
        "StressAnswer",
        "StageFacts",
        "ServiceFacts",
        "ExpectedRequirement",
        "StrengthLine",
    ] {
        keys(&published["$defs"][name]["properties"], &mut wanted);
    }
    for drawing in ["accepted/tg-204", "nested/tg-350", "rejected/tg-231"] {
        let output = Command::cargo_bin("coilassay")
            .unwrap()
            .args([
                "expect",
                "--json",
                "--date",
                "2026-12-01",
                "--at-load",
                "100",
            ])
            .arg(root(&format!("samples/{drawing}.toml")))
            .output()
            .unwrap();
        let mut record: Value = serde_json::from_slice(&output.stdout).unwrap();
        let faults: Vec<String> = schema
            .iter_errors(&record)
            .map(|fault| fault.to_string())
            .collect();
        assert!(faults.is_empty(), "{drawing}: {faults:#?}");
        all_keys(&record, &mut met);
        record["rate_n_per_mm"] = Value::from("10.6");
        assert!(!schema.is_valid(&record), "a text for a figure passes");
    }
    let never: Vec<&String> = wanted.difference(&met).collect();
    assert!(never.is_empty(), "never met: {never:?}");
}

#[test]
fn every_sample_keeps_to_the_schema() {
    let schema = jsonschema::validator_for(&published()).unwrap();
    for name in SAMPLES {
        let record = sample(name);
        let faults: Vec<String> = schema
            .iter_errors(&record)
            .map(|fault| fault.to_string())
            .collect();
        assert!(faults.is_empty(), "{name}: {faults:#?}");
        let mut spoilt = record.clone();
        spoilt["springs"][0]["characteristics"][0]["value"] = Value::from("10.6");
        assert!(!schema.is_valid(&spoilt), "a text for a figure passes");
    }
}

/// The keys of the record's fixed objects (not of the words that depend on what was found) all occur in a sample.
#[test]
fn every_key_of_the_schema_is_met() {
    let schema = published();
    let mut wanted = BTreeSet::new();
    keys(&schema["properties"], &mut wanted);
    for name in [
        "SpringResult",
        "CharacteristicResult",
        "FitFacts",
        "BudgetFigure",
        "PlanFacts",
        "ClassPlan",
        "StateFacts",
        "VariablesFacts",
        "ZeroAcceptFacts",
        "SettlingFacts",
        "ProcessFacts",
        "LotFacts",
        "DrawingFacts",
        "TheoryFacts",
        "MemberFacts",
        "RigFacts",
        "Provenance",
        "LedgerFacts",
    ] {
        keys(&schema["$defs"][name]["properties"], &mut wanted);
    }
    let mut met = BTreeSet::new();
    for name in SAMPLES {
        all_keys(&sample(name), &mut met);
    }
    let never: Vec<&String> = wanted.difference(&met).collect();
    assert!(
        wanted.len() > 90 && never.is_empty(),
        "{} keys, never met: {never:?}",
        wanted.len()
    );
}

fn keys(properties: &Value, into: &mut BTreeSet<String>) {
    into.extend(properties.as_object().unwrap().keys().cloned());
}

fn all_keys(value: &Value, into: &mut BTreeSet<String>) {
    match value {
        Value::Object(map) => {
            for (key, inner) in map {
                into.insert(key.clone());
                all_keys(inner, into);
            }
        }
        Value::Array(items) => items.iter().for_each(|item| all_keys(item, into)),
        _ => {}
    }
}

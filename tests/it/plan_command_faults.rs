//! `plan`: what is refused, the published schema, the state from past lots.

use serde_json::Value;

use crate::bad_input::squeezed;
use crate::plan_command::{compared, run};

#[test]
fn a_history_gives_the_state() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("history.csv");
    let text = "date,lot,decision,accept,accepted_tighter\n2026-10-08,0412,rejected,2,\n2026-10-15,0413,rejected,2,no\n";
    std::fs::write(&path, text).unwrap();
    let file = path.to_string_lossy().into_owned();
    let found = compared(&["--lot-size", "1200", "--aql", "1.0", "--history", &file]);
    assert_eq!(found["state"]["state"], "tightened");
    assert_eq!(found["plans"][0]["accept"], 1);
    assert_eq!(found["provenance"]["inputs"][0]["role"], "history");
    let said = run(&["--lot-size", "1200", "--aql", "1.0", "--history", &file]).out;
    assert!(
        said.contains("lots 0412 and 0413, two of five or fewer in a row, were not accepted"),
        "{said}"
    );
}

#[test]
fn what_makes_no_plan_is_refused() {
    #[rustfmt::skip]
    let rows: [(&[&str], &str); 17] = [
        (&["--lot-size", "1200"], "no plan is asked for"),
        (&["--lot-size", "1", "--aql", "1.0"], "a lot of 1 cannot be sampled"),
        (&["--lot-size", "0", "--zero-accept", "4%:10%"], "a lot of 0 cannot be sampled"),
        (&["--lot-size", "-5", "--aql", "1.0"], "--lot-size"),
        (&["--lot-size", "1200", "--aql", "0.9"], "0.9 % is not in ISO 2859-1"),
        (&["--lot-size", "1200", "--aql", "nan"], "NaN % is not in ISO 2859-1"),
        (&["--lot-size", "1200", "--aql", "1.0", "--level", "IV"], "--level is `IV`"),
        (&["--lot-size", "1200", "--aql", "1.0", "--state", "strict"], "--state is `strict`"),
        (&["--lot-size", "1200", "--zero-accept", "4%:0%"], "consumer's risk is 0 %"),
        (&["--lot-size", "1200", "--zero-accept", "4:10"], "--zero-accept is `4:10`"),
        (&["--lot-size", "1200", "--designed", "5%:5%:1%:10%"], "p1 = 5 % is not below p2 = 1 %"),
        (&["--lot-size", "30", "--designed", "1%:5%:5%:10%"], "takes 55 springs and the lot holds 30"),
        (&["--lot-size", "1200", "--mil-std-414", "1.0", "--state", "reduced"], "no plan for letter K at AQL 1 % under reduced"),
        (&["--lot-size", "1200", "--aql", "1.0", "--bench", "25%:0%:80%"], "spread is 0 %"),
        (&["--lot-size", "1200", "--aql", "1.0", "--bench", "25%:33%:120%"], "common share is 120 %"),
        (&["--lot-size", "1200", "--aql", "1.0", "--bench", "25%"], "--bench is `25%`"),
        (&["--lot-size", "1200", "--aql", "1.0", "--history", "nowhere.csv"], "cannot read `nowhere.csv`"),
    ];
    for (flags, says) in rows {
        let ran = run(flags);
        assert_eq!(ran.code, Some(2), "{flags:?}\n{}", ran.out);
        assert!(ran.out.is_empty());
        assert!(
            squeezed(&ran.err).contains(&squeezed(says)),
            "{flags:?}: want {says}\n{}",
            ran.err
        );
    }
}

/// Where the types changed, `UPDATE_SCHEMA=1` writes the schema anew; then `record::FORMAT` is to be thought of.
#[test]
fn the_published_schema_is_what_the_types_say_and_holds() {
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("templates/plan.schema.json");
    let made =
        serde_json::to_value(schemars::schema_for!(coilassay::record::OffersRecord)).unwrap();
    if std::env::var_os("UPDATE_SCHEMA").is_some() {
        let text = serde_json::to_string_pretty(&made).unwrap();
        std::fs::write(&path, text + "\n").unwrap();
    }
    let published: Value = serde_json::from_str(&std::fs::read_to_string(&path).unwrap()).unwrap();
    assert!(
        published == made,
        "templates/plan.schema.json is not what the types say"
    );
    let schema = jsonschema::validator_for(&published).unwrap();
    let mut found = compared(&[
        "--lot-size",
        "1200",
        "--aql",
        "1.0",
        "--bench",
        "25%:33%:80%",
    ]);
    assert!(schema.is_valid(&found));
    found["plans"][0]["sample_size"] = Value::from("80");
    assert!(!schema.is_valid(&found), "a text for a number passes");
}

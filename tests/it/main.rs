//! The one test binary.
#![expect(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::panic,
    clippy::print_stdout,
    clippy::indexing_slicing,
    reason = "tests"
)]

/// What the sample generator's modules return; they look for it at the root.
type Outcome = Result<(), Box<dyn std::error::Error>>;

#[path = "../../samples/generate/bench.rs"]
mod bench;
#[path = "../../samples/generate/known.rs"]
mod known;
#[path = "../../samples/generate/known_text.rs"]
mod known_text;
#[path = "../../samples/generate/random.rs"]
mod random;
#[path = "../../samples/generate/rigs.rs"]
mod rigs;
#[path = "../../samples/generate/speed.rs"]
#[expect(dead_code, reason = "the generator uses all of it")]
mod speed;
#[path = "../../samples/generate/spring.rs"]
mod spring;
#[path = "../../samples/generate/text.rs"]
#[expect(dead_code, reason = "the generator uses all of it")]
mod text;

mod archive;
mod bad_input;
mod bad_input_attacks;
mod bad_input_curves;
mod bad_input_exports;
mod bad_input_files;
mod bad_input_units;
mod bench_check;
mod bench_study;
mod cause_models;
mod corruptions;
mod counter_suite;
mod coverage;
mod coverage_cases;
mod dialects;
mod draft_files;
mod drafts;
mod drawing_tests;
mod drawn;
mod drift_published;
mod expect_pages;
mod export;
mod fit_published;
mod folder;
mod folder_interrupted;
mod handbook_drawn;
mod handbook_published;
mod independent;
mod jis_published;
mod knee_coverage;
mod known_lots;
mod lots;
mod many_exports;
mod materials_published;
mod mutants;
mod odd_curves;
mod one_truth;
mod one_truth_lot;
mod own_materials;
mod plan_command;
mod plan_command_faults;
mod plan_decisions;
mod plan_history;
mod plan_published;
mod plan_switching;
mod plan_terms;
mod plan_variables;
mod points;
mod prints;
mod process_coverage;
mod published;
mod rate_expect;
mod readme;
mod relations;
mod relations_units;
mod report;
mod returns;
mod rig_cautions;
mod rig_edit;
mod rig_repeat;
mod rig_verify;
mod rig_verify_files;
mod rig_verify_terms;
mod rooms;
mod schema;
mod springs_end_to_end;
mod springs_published;
mod springs_sets;
mod stages;
mod stages_refused;
mod standards_drawn;
mod standards_published;
mod stats_published;
mod stats_sampling;
mod stats_shape;
mod terms;
mod track_command;
mod type_a_coverage;

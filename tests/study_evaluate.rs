//! One run of a study gives what a run of the changed file gives.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use std::path::Path;
use underfoot::estimate::estimate;
use underfoot::margin::{Verdict, margins};
use underfoot::quantity::UnitSystem;
use underfoot::scenario::{Scenario, load, with_value};
use underfoot::study::{Evaluator, Failure, StudyError};

fn shipped(name: &str) -> Scenario {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name);
    load(&path).unwrap().scenario
}

#[test]
fn a_replaced_mass_gives_the_numbers_and_margins_of_the_changed_scenario() {
    let scenario = shipped("roof-foot-level.toml");
    let evaluator = Evaluator::new(&scenario).unwrap();
    let mass = evaluator.index_of("subject.mass").unwrap();
    let run = evaluator.at(&[(mass, 111.0)]).unwrap();
    let changed = with_value(&scenario, "subject.mass", 111.0).unwrap();
    let whole = estimate(&changed).unwrap();
    assert_eq!(run.numbers, whole.numbers);
    let mut worded: Vec<_> = run.checks.iter().map(|c| evaluator.margin(&run, c, UnitSystem::Metric)).collect();
    let mut expected = margins(&changed, &whole).unwrap();
    worded.sort_by(|a, b| a.id.cmp(&b.id));
    expected.sort_by(|a, b| a.id.cmp(&b.id));
    assert_eq!(worded, expected);
    assert_ne!(run.numbers, evaluator.typical().numbers);
}

#[test]
fn two_values_that_only_fit_together_are_judged_together() {
    let evaluator = Evaluator::new(&shipped("roof-foot-level.toml")).unwrap();
    let deploy = evaluator.index_of("absorber.deploy_force").unwrap();
    let onset = evaluator.index_of("absorber.onset_force").unwrap();
    assert_eq!(evaluator.at(&[(deploy, 6e3)]).unwrap().failure, Some(Failure::Clash));
    assert_eq!(evaluator.at(&[(deploy, 6e3), (onset, 6.5e3)]).unwrap().failure, None);
}

#[test]
fn a_failed_run_has_every_check_open() {
    let evaluator = Evaluator::new(&shipped("roof-foot-level.toml")).unwrap();
    let mass = evaluator.index_of("subject.mass").unwrap();
    let run = evaluator.at(&[(mass, -1.0)]).unwrap();
    assert_eq!(run.failure, Some(Failure::Clash));
    assert_eq!(run.checks.len(), evaluator.typical().checks.len());
    assert!(run.checks.iter().all(|c| c.verdict == Verdict::Open && c.margin.is_none()));
}

#[test]
fn an_unknown_input_or_a_value_that_is_no_number_is_an_error() {
    let evaluator = Evaluator::new(&shipped("roof-foot-level.toml")).unwrap();
    let count = evaluator.inputs().len();
    assert_eq!(evaluator.at(&[(count, 1.0)]), Err(StudyError::NoInput { index: count, count }));
    assert!(matches!(evaluator.at(&[(0, f64::NAN)]), Err(StudyError::NotFinite { .. })));
    assert!(matches!(evaluator.index_of("line.colour"), Err(StudyError::NoPath { .. })));
}

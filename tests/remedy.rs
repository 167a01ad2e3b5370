//! Remedies put back into the file make every check hold, and a step short of them does not.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use assert_cmd::cargo::cargo_bin_cmd;
use predicates::prelude::*;
use proptest::prelude::*;
use std::fs;
use std::path::Path;
use underfoot::margin::{Verdict, worst};
use underfoot::scenario::{Document, Scenario};
use underfoot::study::{Evaluator, Run, remedies};

const SHORT: &str = "scenarios/low-scaffold-short.toml";

fn word(run: &Run) -> Verdict {
    worst(run.checks.iter().map(|check| check.verdict))
}

fn verdict(scenario: &Scenario) -> Verdict {
    word(&Evaluator::new(scenario).unwrap().typical())
}

fn shipped() -> Document {
    Document::of_text(Path::new(SHORT), fs::read_to_string(SHORT).unwrap()).unwrap()
}

/// How many remedies were put back.
fn put_back(document: &Document) -> usize {
    let evaluator = Evaluator::new(document.scenario()).unwrap();
    let found = remedies(&evaluator).unwrap();
    let mut count = 0;
    for remedy in &found.list {
        let Some(way) = &remedy.way else { continue };
        let path = &remedy.input.path;
        let mended = document.with_value(path, &way.written).unwrap();
        assert_eq!(verdict(mended.scenario()), Verdict::Holds, "{path} {}", way.written);
        let today = remedy.input.measure.si();
        let step = 1e-4 * way.value.abs() * (today - way.value).signum();
        let index = evaluator.index_of(path).unwrap();
        let back = way.value + if step.abs() < (today - way.value).abs() { step } else { today - way.value };
        assert_ne!(word(&evaluator.at(&[(index, back)]).unwrap()), Verdict::Holds, "{path} at {back} already holds");
        assert!(way.ways >= 1);
        count += 1;
    }
    let changes: Vec<f64> = found.list.iter().filter_map(|r| r.way.as_ref()).map(|w| w.relative).collect();
    assert!(changes.is_sorted());
    count
}

#[test]
fn the_shipped_short_scenario_has_remedies_that_hold_when_put_back() {
    assert!(put_back(&shipped()) >= 2);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]
    #[test]
    fn remedies_hold_when_put_back_and_a_step_short_does_not(
        mass in 60.0..115.0_f64, length in 1.0..2.0_f64, standing in 3.0..7.0_f64, force in 2.5..5.5_f64,
    ) {
        let mut document = shipped();
        for (path, value) in [
            ("subject.mass", format!("{mass:.2} kg")),
            ("line.length", format!("{length:.3} m")),
            ("place.standing", format!("{standing:.2} m")),
            ("place.anchor", format!("{standing:.2} m")),
            ("absorber.deploy_force", format!("{force:.2} kN")),
        ] {
            document = document.with_value(path, &value).unwrap();
        }
        put_back(&document);
    }
}

#[test]
fn what_already_holds_gets_no_remedy() {
    let deep = shipped().with_value("obstacle.1.top", "-5 m").unwrap();
    let found = remedies(&Evaluator::new(deep.scenario()).unwrap()).unwrap();
    assert_eq!((found.today, found.list.len()), (Verdict::Holds, 0));
}

#[test]
fn an_input_that_cannot_mend_it_is_told_as_none() {
    cargo_bin_cmd!("underfoot").args(["remedy", SHORT]).assert().code(1).stdout(
        predicate::str::contains("none within its range")
            .and(predicate::str::contains("confirmed by the competent person"))
            .and(predicate::str::contains("FIRST-PASS ESTIMATE"))
            .and(predicate::str::contains("place.anchor"))
            .and(predicate::str::contains("anchor.capacity").not())
            .and(predicate::str::is_match(r"(?i)\bsafe\b").unwrap().not()),
    );
}

#[test]
fn json_carries_values_units_and_the_caution() {
    let run = cargo_bin_cmd!("underfoot").args(["remedy", SHORT, "--json"]).assert().code(1);
    let object: serde_json::Value = serde_json::from_slice(&run.get_output().stdout).unwrap();
    assert!(object["cautions"][0].as_str().unwrap().contains("competent person"));
    let anchor = object["remedies"].as_array().unwrap().iter().find(|r| r["path"] == "place.anchor").unwrap();
    assert!(anchor["value"].as_f64().unwrap() > 5.0 && anchor["unit"] == "m", "{anchor}");
}

#[test]
fn the_number_of_ways_is_that_of_an_even_scan() {
    let evaluator = Evaluator::new(shipped().scenario()).unwrap();
    for remedy in remedies(&evaluator).unwrap().list {
        let index = evaluator.index_of(&remedy.input.path).unwrap();
        let (low, high) = remedy.range;
        let holds: Vec<bool> = (0..=3000)
            .map(|i| low + (high - low) * f64::from(i) / 3000.0)
            .map(|value| word(&evaluator.at(&[(index, value)]).unwrap()) == Verdict::Holds)
            .collect();
        let stretches = usize::from(holds[0]) + holds.windows(2).filter(|pair| !pair[0] && pair[1]).count();
        assert_eq!(remedy.way.map_or(0, |way| way.ways), stretches, "{}", remedy.input.path);
    }
}

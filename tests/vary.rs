//! One input across a range: crossings against closed forms, and the command.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use assert_cmd::cargo::cargo_bin_cmd;
use predicates::prelude::*;
use std::fs;
use underfoot::margin::{CheckKind, Verdict};
use underfoot::scenario::read;
use underfoot::study::{Evaluator, vary};

const SHORT: &str = "scenarios/low-scaffold-short.toml";

fn evaluator() -> Evaluator {
    Evaluator::new(&read(SHORT, &fs::read_to_string(SHORT).unwrap()).unwrap()).unwrap()
}

#[test]
fn a_crossing_of_the_clearance_lies_where_the_linear_margin_is_zero() {
    let evaluator = evaluator();
    let top = evaluator.index_of("obstacle.1.top").unwrap();
    let check = *evaluator.typical().check(CheckKind::Clearance(0)).unwrap();
    // Raising the ground takes as much from the margin as it is raised.
    let expected = check.margin.unwrap();
    for rows in [2, 7, 500] {
        let found = vary(&evaluator, top, -4.0..=1.0, rows).unwrap();
        assert_eq!(found.rows.len(), rows);
        let at = found.crossings.iter().find(|c| c.kind == CheckKind::Clearance(0)).unwrap();
        assert!((at.value - expected).abs() < 1e-8, "{} is not {expected}", at.value);
        assert!(at.through_zero && at.below == Verdict::Holds && at.above == Verdict::Short);
    }
}

#[test]
fn every_crossing_holds_on_its_side_and_not_on_the_other() {
    let evaluator = evaluator();
    for path in ["line.length", "place.anchor", "absorber.deploy_force", "subject.mass"] {
        let input = evaluator.index_of(path).unwrap();
        let today = evaluator.inputs()[input].measure.si();
        let found = vary(&evaluator, input, today / 4.0..=today * 4.0, 5).unwrap();
        assert!(!found.crossings.is_empty(), "{path}");
        for at in &found.crossings {
            let verdict =
                |value| evaluator.at(&[(input, value)]).unwrap().check(at.kind).map_or(Verdict::Holds, |c| c.verdict);
            assert_eq!(verdict(at.value), Verdict::Holds, "{path} {at:?}");
            assert_ne!(verdict(at.beyond), Verdict::Holds, "{path} {at:?}");
            assert!((at.value - at.beyond).abs() <= 1e-12 * today.abs().max(1.0), "{path} {at:?}");
        }
    }
}

#[test]
fn the_table_is_printed_with_caution_and_crossings() {
    cargo_bin_cmd!("underfoot")
        .args(["vary", SHORT, "--over", "line.length", "--from", "0.5 m", "--to", "2.5 m", "--steps", "5"])
        .assert()
        .code(1)
        .stdout(
            predicate::str::contains("FIRST-PASS ESTIMATE")
                .and(predicate::str::contains("through zero margin"))
                .and(predicate::str::contains("clearance ground"))
                .and(predicate::str::is_match(r"(?i)\bsafe\b").unwrap().not()),
        );
}

#[test]
fn csv_holds_every_row_and_the_caution_once() {
    let run = cargo_bin_cmd!("underfoot")
        .args(["vary", SHORT, "--over", "line.length", "--steps", "4", "--csv"])
        .output()
        .unwrap();
    let text = String::from_utf8(run.stdout).unwrap();
    assert_eq!(text.matches("FIRST-PASS ESTIMATE").count(), 1);
    // At 1 m the line does not reach from the anchor to the attachment; that row is told and not left out.
    assert_eq!(text.matches(",arrest_force_peak,").count(), 3);
    assert_eq!(text.matches("\nfailed,line.length,1,the line of ").count(), 1, "{text}");
    assert!(text.contains("\ncrossing,line.length,"), "{text}");
}

#[test]
fn a_wrong_path_range_or_unit_ends_with_2() {
    let wrong = [
        vec!["--over", "line.nothing"],
        vec!["--over", "line.length", "--from", "2 kN"],
        vec!["--over", "line.length", "--from", "3 m", "--to", "2 m"],
        vec!["--over", "line.length", "--steps", "1"],
        vec!["--over", "obstacle.1.top"],
    ];
    for more in wrong {
        cargo_bin_cmd!("underfoot").args(["vary", SHORT]).args(&more).assert().code(2);
    }
}

//! Every scenario that is shipped: read without a fault, its numbers and its verdicts.
//!
//! The numbers were not taken from this program. They come from an integration of the equations of motion with a fixed
//! step (fourth order, 10 us, events by bisection inside the step), written apart from the solver in another language
//! and checked against closed forms: m 100 kg, k 10 kN/m, h 4 m, ratio 0.1 gives 0.8498893152 m and 8651.802438 N;
//! 50 kN/m with a 4 kN absorber from 2 m gives a total of 0.7025818599 m. Halving the step moved no value by more
//! than 1e-9 of itself, settle times by 1e-5. The instant of the rope's largest force is the first zero of the third
//! derivative of the closed form (its force agrees with the integration). By hand: free fall from the elevations noted in each file; hang
//! position m g / k; lowest point = standing surface - free fall - arrest distance - stretch allowance.

#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use std::path::{Path, PathBuf};
use underfoot::estimate::estimate;
use underfoot::margin::{Verdict, margins, worst};
use underfoot::scenario::{doubts, load};

#[path = "shipped/rigging.rs"]
mod rigging;
#[path = "shipped/straight.rs"]
mod straight;

/// A file and what it must give, by id.
type Expected = (&'static str, &'static [(&'static str, f64)]);

/// Scenarios that are short on purpose; every other one holds.
const SHORT: &[&str] = &["low-scaffold-short", "swing-strikes-column"];

/// Doubts that a scenario raises on purpose, by a piece of the message.
const DOUBTS: &[(&str, &str)] = &[("overdamped-buffer", "is above critical")];

/// Every scenario with its numbers.
fn every() -> impl Iterator<Item = &'static Expected> {
    straight::EXPECTED.iter().chain(rigging::EXACT).chain(rigging::SPANS)
}

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios")
}

fn file(name: &str) -> PathBuf {
    folder().join(format!("{name}.toml"))
}

#[test]
fn every_scenario_is_in_the_table_and_the_table_in_the_folder() {
    let mut found: Vec<String> = std::fs::read_dir(folder())
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .map(|path| path.file_stem().unwrap().to_string_lossy().into_owned())
        .collect();
    found.sort();
    let mut listed: Vec<&str> = every().map(|(name, _)| *name).collect();
    listed.sort_unstable();
    assert_eq!(found, listed);
}

#[test]
fn every_scenario_raises_no_doubt_but_the_one_it_is_about() {
    for (name, _) in every() {
        let loaded = load(&file(name)).unwrap();
        let raised = doubts(name, &loaded.text, &loaded.scenario);
        let meant: Vec<&str> = DOUBTS.iter().filter(|(file, _)| file == name).map(|(_, piece)| *piece).collect();
        assert_eq!(raised.faults.len(), meant.len(), "{name}: {}", raised.render(false));
        for (fault, piece) in raised.faults.iter().zip(meant) {
            assert!(fault.message.contains(piece), "{name}: {}", fault.message);
        }
    }
}

/// Every number of the table that the program does not give within its share.
fn wrong(table: &[Expected], share: impl Fn(&str) -> f64) -> Vec<String> {
    let mut wrong = Vec::new();
    for (name, numbers) in table {
        let loaded = load(&file(name)).unwrap();
        let run = estimate(&loaded.scenario).unwrap_or_else(|error| panic!("{name}: {error}"));
        for (id, expected) in *numbers {
            let Some(found) = run.numbers.get(id) else {
                wrong.push(format!("{name} {id}: absent, {expected} expected"));
                continue;
            };
            let room = (share(id) * expected.abs()).max(1e-9);
            if found.is_nan() || (found - expected).abs() > room {
                wrong.push(format!("{name} {id}: {found} is not {expected}"));
            }
        }
    }
    wrong
}

#[test]
fn the_numbers_are_those_of_the_independent_integration() {
    let share = |id: &str| match id {
        "settle_time" => 2e-5,
        id if id.starts_with("time_above") => 1e-6,
        _ => 2e-9,
    };
    let wrong = [wrong(straight::EXPECTED, share), wrong(rigging::EXACT, share)].concat();
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn lifelines_stay_within_a_tenth_of_the_share_that_their_tables_promise() {
    let wrong = wrong(rigging::SPANS, |id| if id.starts_with("span_tension") { 1e-9 } else { 1e-4 });
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn a_motion_that_never_turns_has_no_lowest_instant_and_no_rebound() {
    let run = estimate(&load(&file("overdamped-buffer")).unwrap().scenario).unwrap();
    for id in ["time_lowest", "deceleration_mean", "rebound_rise", "time_first_slack"] {
        assert_eq!(run.numbers.get(id), None, "{id}");
    }
}

#[test]
fn every_scenario_holds_but_the_one_that_is_short_on_purpose() {
    for (name, _) in every() {
        let scenario = load(&file(name)).unwrap().scenario;
        let list = margins(&scenario, &estimate(&scenario).unwrap()).unwrap();
        let shown: Vec<String> = list.iter().map(|m| format!("{} {:?}", m.id, m.verdict)).collect();
        assert!(list.iter().all(|m| m.verdict != Verdict::Open), "{name}: {shown:?}");
        let expected = if SHORT.contains(name) { Verdict::Short } else { Verdict::Holds };
        assert_eq!(worst(list.iter().map(|m| m.verdict)), expected, "{name}: {shown:?}");
    }
}

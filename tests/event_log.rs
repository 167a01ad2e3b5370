//! What counts by itself is in the log of every run, however often the line comes taut before.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use proptest::prelude::*;
use std::fs;
use std::path::Path;
use underfoot::estimate::{Estimate, Event, EventKind, estimate};
use underfoot::quantity::UnitSystem;
use underfoot::scenario::Document;

const SWING: &str = "scenarios/swing-strikes-column.toml";
const PLUMB: &str = "scenarios/roof-foot-level.toml";

fn with(file: &str, changes: &[(&str, &str)]) -> Estimate {
    let text = fs::read_to_string(file).unwrap();
    let start = Document::of_text(Path::new(file), text).unwrap();
    let changed = changes.iter().fold(start, |document, (path, value)| document.with_value(path, value).unwrap());
    estimate(changed.scenario()).unwrap()
}

/// An undamped, stiff line whose absorber gives at little: it comes taut and goes slack many times.
fn restless(mass: &str, modulus: &str, deploy_force: &str) -> Estimate {
    let changes = [
        ("subject.mass", mass),
        ("line.damping_ratio", "0"),
        ("line.modulus", modulus),
        ("absorber.deploy_force", deploy_force),
    ];
    with(SWING, &changes)
}

fn of_kind(run: &Estimate, kind: EventKind) -> Vec<&Event> {
    run.events.iter().filter(|event| event.kind == kind).collect()
}

fn repeats(event: &Event) -> bool {
    use EventKind::{DeploymentEnd, DeploymentStart, Slack, SpanStarts, SpanStops, Taut};
    matches!(event.kind, Taut | Slack | DeploymentStart | DeploymentEnd | SpanStarts | SpanStops)
}

fn left_out(run: &Estimate) -> usize {
    run.events.iter().map(|event| if let EventKind::NotListed(more) = event.kind { more } else { 0 }).sum()
}

fn tells_what_counts(run: &Estimate) {
    let plane = run.plane.as_ref().unwrap();
    assert!(!plane.strikes.is_empty());
    for strike in &plane.strikes {
        let kind = if strike.is_face { EventKind::StrikeFace } else { EventKind::StrikeLevel };
        let told = |event: &&Event| event.time_s == strike.time_s && event.name.as_ref() == Some(&strike.name);
        assert!(of_kind(run, kind).iter().any(told), "{} in {:?}", strike.name, run.events);
    }
    for (kind, number) in [
        (EventKind::Lowest, "time_lowest"),
        (EventKind::PeakForce, "time_peak_force"),
        (EventKind::Taut, "time_taut"),
        (EventKind::Start, ""),
    ] {
        let time = run.numbers.get(number).unwrap_or(0.0);
        assert_eq!(of_kind(run, kind).first().unwrap().time_s, time, "{kind:?}");
    }
    assert!(run.events.is_sorted_by(|a, b| a.time_s <= b.time_s), "{:?}", run.events);
    let ended = run.events.last().unwrap().kind;
    assert!(matches!(ended, EventKind::TurnsBack | EventKind::TimeLimit), "{ended:?}");
}

#[test]
fn a_swing_that_comes_taut_often_still_tells_its_strike_and_its_lowest_point() {
    let run = restless("95 kg", "600 kN", "3 kN");
    tells_what_counts(&run);
    let more = left_out(&run);
    assert!(more > 1, "{:?}", run.events);
    let words = run.events[run.events.len() - 2].words(UnitSystem::Metric);
    assert!(words.starts_with(&format!("{more} more times taut")) && words.ends_with("not listed"), "{words}");
}

#[test]
fn a_dozen_events_are_listed_the_repeated_ones_the_earliest_of_their_kind() {
    let run = restless("95 kg", "600 kN", "3 kN");
    assert_eq!(run.events.len(), 14, "a dozen, how many more, the end: {:?}", run.events);
    let last_repeat = run.events.iter().rposition(repeats).unwrap();
    assert!(run.events[last_repeat..].iter().any(|event| event.kind == EventKind::Lowest), "{:?}", run.events);
}

#[test]
fn a_log_that_lists_everything_says_nothing_of_more() {
    assert_eq!(left_out(&with(SWING, &[])), 0);
    assert_eq!(left_out(&with(PLUMB, &[])), 0);
}

#[test]
fn a_plumb_fall_without_damping_ends_its_log_with_peak_lowest_and_end() {
    let run = with("scenarios/near-critical.toml", &[("line.damping_ratio", "0.001")]);
    for kind in [EventKind::Start, EventKind::PeakForce, EventKind::Lowest] {
        assert_eq!(of_kind(&run, kind).len(), 1, "{kind:?} in {:?}", run.events);
    }
    assert!(matches!(run.events.last().unwrap().kind, EventKind::Settled | EventKind::TimeLimit));
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]
    #[test]
    fn every_strike_and_the_lowest_point_are_told(
        mass in 80.0..110.0_f64, modulus in 150.0..800.0_f64, force in 2.5..4.0_f64,
    ) {
        let run = restless(&format!("{mass} kg"), &format!("{modulus} kN"), &format!("{force} kN"));
        tells_what_counts(&run);
    }
}

//! A study ends a run on a lifeline early; what the checks ask for is the same as of the whole run.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use proptest::prelude::*;
use std::path::Path;
use underfoot::scenario::load;
use underfoot::study::Evaluator;

fn evaluator(name: &str) -> Evaluator {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name);
    Evaluator::new(&load(&path).unwrap().scenario).unwrap()
}

/// Every number that is there, and every check, of the short run is that of the whole one.
fn same(evaluator: &Evaluator, values: &[(usize, f64)]) {
    let (short, whole) = (evaluator.peaks_at(values).unwrap(), evaluator.at(values).unwrap());
    assert_eq!(short.failure, whole.failure);
    for number in short.numbers.iter().filter(|number| number.id != "hang_travel") {
        let (Some(a), Some(b)) = (short.numbers.get(&number.id), whole.numbers.get(&number.id)) else { continue };
        assert!((a - b).abs() <= 1e-9 * b.abs(), "{}: {a} is not {b} at {values:?}", number.id);
    }
    let lost: Vec<_> = whole.numbers.iter().filter(|n| !short.numbers.iter().any(|s| s.id == n.id)).collect();
    assert!(
        lost.iter().all(|n| n.id.contains("time_")
            || n.id.contains("settle")
            || n.id.contains("envelope")
            || ["rebound_rise", "slack_episodes", "energy_residual"].contains(&n.id.as_str())),
        "{lost:?}"
    );
    assert_eq!(short.checks.len(), whole.checks.len());
    for (a, b) in short.checks.iter().zip(&whole.checks) {
        assert_eq!((a.kind, a.verdict), (b.kind, b.verdict));
    }
}

#[test]
fn the_shipped_lifelines_give_the_same_checks_at_both_ends_of_their_bands() {
    for name in ["lifeline-with-sag.toml", "lifeline-two-workers.toml", "lifeline-inline-absorber.toml"] {
        let evaluator = evaluator(name);
        for input in evaluator.wide() {
            let band = evaluator.inputs()[input].measure.band;
            for value in [band.low, band.typical, band.high] {
                same(&evaluator, &[(input, value)]);
            }
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(16))]
    #[test]
    fn a_lifeline_gives_the_same_peaks_when_it_is_not_followed_to_rest(
        mass in 60.0..140.0_f64,
        stiffness in 1e4..3e5_f64,
        ratio in 0.001..1.5_f64,
        force in 2.2e3..2e4_f64,
        modulus in 2e5..5e6_f64,
        sag in 0.02..1.0_f64,
    ) {
        let evaluator = evaluator("lifeline-with-sag.toml");
        let of = |path: &str| evaluator.index_of(path).unwrap();
        same(&evaluator, &[
            (of("subject.mass"), mass),
            (of("line.stiffness"), stiffness),
            (of("line.damping_ratio"), ratio),
            (of("absorber.deploy_force"), force),
            (of("anchor.span.modulus"), modulus),
            (of("anchor.span.sag"), sag),
        ]);
    }
}

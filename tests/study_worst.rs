//! The worst found in a band box against brute force, and the word `thin`.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use proptest::prelude::*;
use underfoot::margin::{CheckKind, Verdict};
use underfoot::scenario::{Scenario, read};
use underfoot::study::{Evaluator, Place, Worst, unwatched, worst_found};

fn scenario(mass: &str, stiffness: &str, ratio: &str, force: &str) -> Scenario {
    let text = format!(
        r#"
[subject]
kind = "person"
mass = "{mass}"
attachment_above_feet = "1.5 m"
stretch_allowance = "0.3 m"
[place]
standing = "9.4 m"
anchor = "9.5 m"
[line]
kind = "lanyard"
length = "1.8 m"
stiffness = "{stiffness}"
damping_ratio = "{ratio}"
[absorber]
deploy_force = "{force}"
stroke = "1.75 m"
[anchor]
capacity = "13.5 kN"
[[obstacle]]
name = "canopy"
top = "4 m"
reserve = "0.2 m"
[limits]
basis = "own"
arrest_force = "6 kN"
"#
    );
    read("test.toml", &text).unwrap_or_else(|faults| panic!("{faults:?}"))
}

fn of(checks: &[Worst], kind: CheckKind) -> &Worst {
    checks.iter().find(|worst| worst.kind == kind).unwrap()
}

#[test]
fn a_heavy_person_on_a_weak_absorber_comes_lowest() {
    let scenario = scenario("80..100..120 kg", "60 kN/m", "0.08", "3.6..4.2..5 kN");
    let found = worst_found(&Evaluator::new(&scenario).unwrap(), &unwatched).unwrap();
    let clearance = of(&found.checks, CheckKind::Clearance(0));
    let places: Vec<_> = clearance.stands.iter().map(|stand| stand.place).collect();
    assert_eq!(places, [Place::High, Place::Low]);
    assert!(clearance.is_corner() && found.all_corners);
    assert_eq!(clearance.stands[0].value, 120.0);
    assert!(clearance.worst.unwrap().margin < clearance.typical.unwrap().margin);
}

#[test]
fn a_check_that_holds_at_typical_and_falls_short_in_the_band_is_thin() {
    let scenario = scenario("100 kg", "60 kN/m", "0.08", "4..5..6.5 kN");
    let found = worst_found(&Evaluator::new(&scenario).unwrap(), &unwatched).unwrap();
    let force = of(&found.checks, CheckKind::ArrestForce);
    assert_eq!(force.typical.unwrap().verdict, Verdict::Holds);
    assert_eq!(force.worst.unwrap().verdict, Verdict::Short);
    assert_eq!(force.verdict, Verdict::Thin);
}

#[test]
fn without_bands_the_worst_is_the_typical() {
    let scenario = scenario("100 kg", "60 kN/m", "0.08", "4.2 kN");
    let found = worst_found(&Evaluator::new(&scenario).unwrap(), &unwatched).unwrap();
    for worst in &found.checks {
        assert_eq!(worst.worst, worst.typical.filter(|check| check.verdict != Verdict::Open));
        assert!(worst.stands.is_empty());
    }
}

#[test]
fn an_input_that_does_not_matter_to_a_check_stands_anywhere() {
    let scenario = scenario("80..100..120 kg", "40..60..80 kN/m", "0.08", "4.2 kN");
    let found = worst_found(&Evaluator::new(&scenario).unwrap(), &unwatched).unwrap();
    let free_fall = of(&found.checks, CheckKind::Stroke);
    assert_eq!(free_fall.stands[0].place, Place::High);
    assert!(found.checks.iter().any(|worst| worst.stands.iter().any(|stand| stand.place == Place::Anywhere)));
}

#[test]
fn a_band_with_impossible_values_leaves_its_checks_open_and_says_how_many_runs() {
    // The weak end of the onset band is below the deployment force.
    let mut scenario = scenario("100 kg", "60 kN/m", "0.08", "4.2 kN");
    let absorber = scenario.absorber.as_mut().unwrap();
    let mut onset = absorber.deploy_force.unwrap();
    onset.band.low = 4e3;
    onset.band.typical = 4.5e3;
    onset.band.high = 5e3;
    absorber.onset_force = Some(onset);
    let found = worst_found(&Evaluator::new(&scenario).unwrap(), &unwatched).unwrap();
    assert!(found.failed > 0);
    assert!(found.checks.iter().all(|worst| worst.open_runs > 0 && worst.verdict == Verdict::Open));
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]
    /// Damping first lowers the force and then raises it, so that the worst is not always at a corner.
    #[test]
    fn no_point_of_a_grid_is_worse_than_the_worst_found(
        mass in 70.0..110.0_f64,
        stiffness in 10.0..80.0_f64,
        ratio in 0.02..0.6_f64,
        force in 3.0..6.0_f64,
    ) {
        let band = |low: f64, unit: &str| format!("{low}..{} {unit}", low * 1.5);
        let scenario = scenario(&band(mass, "kg"), &band(stiffness, "kN/m"), band(ratio, "").trim(), &band(force, "kN"));
        let evaluator = Evaluator::new(&scenario).unwrap();
        let found = worst_found(&evaluator, &unwatched).unwrap();
        let wide = evaluator.wide();
        prop_assert_eq!(wide.len(), 4);
        for number in 0..7_usize.pow(4) {
            let values: Vec<_> = wide.iter().enumerate().map(|(d, &input)| {
                let band = evaluator.inputs()[input].measure.band;
                let step = u32::try_from(number / 7_usize.pow(u32::try_from(d).unwrap()) % 7).unwrap();
                (input, (band.low + f64::from(step) / 6.0 * (band.high - band.low)).min(band.high))
            }).collect();
            let run = evaluator.at(&values).unwrap();
            for check in run.checks.iter().filter(|check| check.verdict != Verdict::Open) {
                let worst = of(&found.checks, check.kind).worst.unwrap();
                if check.verdict == Verdict::Short {
                    prop_assert_eq!(worst.verdict, Verdict::Short);
                }
                if let (Some(margin), Some(least)) = (check.margin, worst.margin) {
                    let slack = 1e-6 * check.limit.unwrap_or(1.0).abs();
                    prop_assert!(least <= margin + slack, "{:?}: {margin} below {least} at {values:?}", check.kind);
                }
            }
        }
    }
}

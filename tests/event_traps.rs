//! Places where a naive event search goes wrong, one test each.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use support::{Case, Event, Fineness, Part, Slider, numbers};
use underfoot::arrest::{Ended, Happening, Outcome, Settings, solve};

fn arrest(case: &Case) -> Outcome {
    solve(&case.fall(), &Settings::default()).expect("a solved arrest")
}

fn times(outcome: &Outcome, what: Happening) -> Vec<f64> {
    outcome.happenings.iter().filter(|happening| happening.1 == what).map(|happening| happening.0).collect()
}

#[track_caller]
fn assert_close(actual: f64, expected: f64, relative: f64) {
    let off = (actual - expected).abs() / expected.abs();
    assert!(off <= relative, "{actual:.14} against {expected:.14}, off by {off:.2e}");
}

/// Root of a function that rises through zero once.
fn rising_root(mut low: f64, mut high: f64, f: impl Fn(f64) -> f64) -> f64 {
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if f(middle) < 0.0 { low = middle } else { high = middle }
    }
    low
}

#[test]
fn a_line_that_has_just_let_go_is_not_taut_again_at_the_double_root() {
    let (k, c, g) = (1e4, 200.0, 9.80665);
    let outcome = arrest(&Case::on(100.0, 4.0, Part::damped(k, c)));
    let slack = outcome.time_first_slack_s.expect("a slack line");
    let catch = times(&outcome, Happening::Taut)[1];
    let start = outcome.motion.at(slack);
    let gap = |t: f64| {
        let travel = start.travel_m + start.speed_m_per_s * t + 0.5 * g * t * t;
        travel - start.travel_m * (-k / c * t).exp()
    };
    assert!(gap(0.01) < 0.0 && gap(1e-3) < 0.0);
    assert_close(catch - slack, rising_root(0.1, 5.0, gap), 1e-11);
    assert_eq!(outcome.slack_episodes, 5);
}

#[test]
fn the_onset_is_judged_at_the_damper_jump_when_the_line_comes_taut() {
    let (force, onset) = (6000.0, 6500.0);
    let case = Case::on(100.0, 4.0, Part::damped(2e4, 3000.0)).with_slider(Slider::constant(force, onset, 2.0));
    let outcome = arrest(&case);
    let jump = 3000.0 * outcome.speed_at_taut_m_per_s;
    assert!(jump > 4.0 * onset);
    assert_eq!(times(&outcome, Happening::DeploymentStart)[0], outcome.time_taut_s);
    assert_eq!((outcome.peak_force_n, outcome.time_peak_force_s), (onset, outcome.time_taut_s));
    assert_close(outcome.motion.at(outcome.time_taut_s + 1e-9).force_n, force, 1e-12);
}

#[test]
fn an_undamped_catch_after_a_rebound_just_reaches_the_deployment_force_and_deploys_no_more() {
    for (mass, free_fall, stiffness, force) in
        [(100.0, 2.0, 5e4, 4e3), (140.0, 4.0, 5e4, 6e3), (83.7, 3.1, 1.234e5, 5.1e3), (61.3, 1.7, 2.1e4, 3.3e3)]
    {
        let slider = Slider::constant(force, force, 3.0);
        let outcome = arrest(&Case::on(mass, free_fall, Part::spring(stiffness)).with_slider(slider));
        let stretch = force / stiffness;
        let weight = mass * 9.80665;
        let deployed = (weight * (free_fall + stretch) - 0.5 * force * stretch) / (force - weight);
        assert_close(outcome.deployed_m, deployed, 1e-12);
        assert_eq!(times(&outcome, Happening::DeploymentStart).len(), 1, "mass {mass}");
        assert_eq!(times(&outcome, Happening::DeploymentEnd).len(), 1, "mass {mass}");
        assert!(times(&outcome, Happening::Taut).len() > 50);
        assert_eq!(outcome.ended, Ended::TimeLimit);
    }
}

#[test]
fn with_damping_deployment_ends_before_the_mass_stops() {
    // The damped stretch still grows when the slider stops: relaxation time c/k of the order of the deployment.
    let case = Case::on(100.0, 2.0, Part::damped(2e4, 8000.0)).with_slider(Slider::constant(4e3, 4e3, 2.0));
    let outcome = arrest(&case);
    let end = times(&outcome, Happening::DeploymentEnd)[0];
    let low = outcome.lowest.expect("a lowest point");
    assert!(end < low.time_s - 1e-3, "ends at {end}, lowest at {}", low.time_s);
    let at_end = outcome.motion.at(end);
    assert!(at_end.speed_m_per_s > 0.01, "{}", at_end.speed_m_per_s);
    let reference = numbers(&case, Fineness::default(), [4e3, 6e3]);
    assert_close(outcome.deployed_m, reference.deployed, 1e-9);
    assert_close(low.travel_m, reference.arrest_distance, 1e-9);
}

#[test]
fn an_onset_reached_by_a_damped_line_alone_is_not_lost_although_the_slider_starts_at_rest() {
    for index in 0..200_u32 {
        let mass = 60.0 + f64::from(index);
        let force = 4000.0 + 7.0 * f64::from(index);
        let line = Part::damped(5e4, 200.0 + f64::from(index));
        let case = Case::on(mass, 1.5, line).with_slider(Slider::constant(force, force, 3.0));
        assert!(case.line.damping * case.speed_at_taut() < force, "the jump alone must not start it");
        let outcome = arrest(&case);
        let starts = times(&outcome, Happening::DeploymentStart);
        assert!(starts[0] > outcome.time_taut_s);
        assert!(outcome.deployed_m > 0.1, "case {index}: {}", outcome.deployed_m);
        assert_close(outcome.peak_force_n, force, 1e-9);
    }
}

#[test]
fn the_lowest_point_right_after_the_end_of_deployment_is_not_passed_over() {
    for index in 0..100_u32 {
        let mass = 200.0 + f64::from(index);
        let line = Part::damped(2.5e5, 1600.0 + f64::from(index));
        let case = Case::on(mass, 0.25, line).with_slider(Slider::constant(4040.0, 4040.0, 3.0));
        let outcome = arrest(&case);
        let low = outcome.lowest.expect("a lowest point");
        let end = times(&outcome, Happening::DeploymentEnd)[0];
        assert!((low.time_s - end).abs() < 1e-6, "case {index}: ends at {end}, lowest at {}", low.time_s);
        let bounces = (1..2000_u32).map(|step| outcome.motion.at(end + f64::from(step) * 1e-3).travel_m);
        assert!(bounces.fold(0.0, f64::max) <= low.travel_m * (1.0 + 1e-15));
        assert_close(low.travel_m, outcome.arrest_distance_m, 1e-15);
    }
}

fn used_up(case: &Case, stroke: f64) -> (bool, Outcome) {
    let mut case = case.clone();
    if let Some(slider) = &mut case.slider {
        *slider = Slider::constant(slider.force[0].1, slider.onset, stroke);
    }
    let outcome = arrest(&case);
    (outcome.stroke_used_up, outcome)
}

#[test]
fn a_stroke_used_up_by_a_hair_is_noticed_and_its_neighbour_just_fits() {
    let slider = Slider::constant(4e3, 4e3, 5.0);
    for line in [Part::spring(5e4), Part::damped(5e4, 400.0), Part::damped(2e4, 4000.0)] {
        let case = Case::on(100.0, 2.0, line).with_slider(slider.clone());
        let needed = arrest(&case).deployed_m;
        for hair in [1e-6, 1e-9, 1e-11] {
            let (too_short, outcome) = used_up(&case, needed * (1.0 - hair));
            assert!(too_short, "hair {hair}: {case:?}");
            assert_eq!(times(&outcome, Happening::StrokeUsedUp).len(), 1);
            let (just_fits, outcome) = used_up(&case, needed * (1.0 + hair));
            assert!(!just_fits, "hair {hair}: {case:?}");
            assert_close(outcome.deployed_m, needed, 1e-11);
        }
    }
}

#[test]
fn light_damping_in_a_stiff_line_on_a_soft_spring_does_not_settle_in_two_minutes() {
    let (mass, soft, stiff, damping) = (80.0, 1e3, 5e5, 250.0);
    let case = Case::on(mass, 4.0, Part::damped(stiff, damping)).with_other(Part::spring(soft));
    let outcome = arrest(&case);
    assert_eq!(outcome.ended, Ended::TimeLimit);
    // The damper shares the motion in the ratio of the stiffnesses: its decay takes far longer than the limit.
    let decay = damping * (soft / (soft + stiff)).powi(2) / mass;
    assert!(decay * 120.0 < 0.01);
    assert!(outcome.energy_residual < 1e-9);
    let reference = numbers(&case, Fineness { time_limit: 10.0, ..Fineness::default() }, [4e3, 6e3]);
    let catches = reference.record.events.iter().filter(|event| event.1 == Event::Taut);
    for (ours, theirs) in times(&outcome, Happening::Taut).iter().zip(catches) {
        assert_close(*ours, theirs.0 + outcome.time_taut_s, 1e-8);
    }
}

/// Numbers of a run that depend smoothly on the damping ratio.
fn smooth(ratio: f64, free_fall: f64) -> [f64; 4] {
    let (mass, k): (f64, f64) = (100.0, 1e4);
    let outcome = arrest(&Case::on(mass, free_fall, Part::damped(k, 2.0 * ratio * (k * mass).sqrt())));
    let low = outcome.lowest.expect("a lowest point");
    let later = outcome.motion.at(outcome.time_taut_s + 0.3);
    [outcome.arrest_distance_m, low.time_s, later.travel_m, later.force_n]
}

#[test]
fn near_critical_ratios_agree_with_each_other_across_the_boundary() {
    for free_fall in [1.0, 4.0] {
        let at = smooth(1.0, free_fall);
        for (off, tolerance) in [(1e-4, 1e-7), (1e-8, 1e-13), (1e-12, 1e-13)] {
            let below = smooth(1.0 - off, free_fall);
            let above = smooth(1.0 + off, free_fall);
            for i in 0..4 {
                // The mean of both sides differs from the middle by a second-order term only.
                assert_close(0.5 * (below[i] + above[i]), at[i], tolerance);
                // Each side differs in first order.
                assert_close(below[i], at[i], 20.0 * off + 1e-13);
                assert_close(above[i], at[i], 20.0 * off + 1e-13);
            }
        }
    }
}

#[test]
fn two_equal_damped_parts_in_series_act_as_one_of_half_the_stiffness_at_any_ratio() {
    for ratio in [0.05, 0.4999, 0.5, 0.7, 1.0 - 1e-8, 1.0, 1.0 + 1e-8, 1.5, 2.0] {
        let (mass, k): (f64, f64) = (90.0, 1.2e4);
        let c = 2.0 * ratio * (k * mass).sqrt();
        let one = arrest(&Case::on(mass, 3.0, Part::damped(k, c)));
        let half = Part::damped(2.0 * k, 2.0 * c);
        let two = arrest(&Case::on(mass, 3.0, half.clone()).with_other(half));
        assert_close(two.arrest_distance_m, one.arrest_distance_m, 1e-11);
        assert_close(two.peak_force_n, one.peak_force_n, 1e-11);
        assert_eq!(two.slack_episodes, one.slack_episodes, "ratio {ratio}");
        assert_close(2.0 * two.line_elongation_peak_m, one.line_elongation_peak_m, 1e-10);
    }
}

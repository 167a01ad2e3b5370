//! Places where a planar run goes wrong with a naive event search, and what is refused.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;
mod swing_support;

use support::{Case, Law, Part, Slider};
use swing_support::{Setup, run};
use underfoot::arrest::{ArrestError, Happening, Mode};
use underfoot::physics::Elastic;
use underfoot::swing::{Ended, Plane, PlaneOutcome, Point, Settings, SwingError, solve};

const G: f64 = 9.80665;

fn setup(case: Case, offset: f64, length: f64) -> Setup {
    Setup { case, offset, length }
}

fn swing(setup: &Setup) -> PlaneOutcome {
    solve(&setup.plane(), &Settings::default()).expect("a solved swing")
}

fn times(outcome: &PlaneOutcome, what: Happening) -> Vec<f64> {
    outcome.happenings.iter().filter(|happening| happening.1 == what).map(|happening| happening.0).collect()
}

#[track_caller]
fn close(actual: f64, expected: f64, relative: f64) {
    let off = (actual - expected).abs() / expected.abs();
    assert!(off <= relative, "{actual:.14} against {expected:.14}, off by {off:.2e}");
}

#[test]
fn a_horizontal_line_let_go_touches_no_force_and_is_not_slack() {
    for line in [Part::rigid(), Part::spring(1e5), Part::damped(1e5, 500.0)] {
        let outcome = swing(&setup(Case::on(80.0, 0.0, line), 4.0, 4.0));
        assert_eq!(outcome.free_fall_m, 0.0);
        let before_lowest = outcome.happenings.iter().filter(|happening| happening.0 < outcome.lowest.time_s);
        assert_eq!(before_lowest.map(|happening| happening.1).collect::<Vec<_>>(), [Happening::Taut]);
    }
}

#[test]
fn a_rigid_line_let_go_above_its_anchor_falls_straight_to_the_mirror_point() {
    let outcome = swing(&Setup { case: Case::on(80.0, 4.8, Part::rigid()), offset: 1.8, length: 3.0 });
    close(outcome.free_fall_m, 4.8, 1e-12);
    close(outcome.taut_at.elevation_m, -2.4, 1e-12);
    assert_eq!(outcome.impulses.len(), 1);
}

#[test]
fn a_damped_line_that_has_just_let_go_is_not_taut_again_at_the_double_root() {
    let outcome = swing(&setup(Case::on(114.8, 2.335, Part::damped(2543.0, 273.0)), 1.9577, 15.188));
    let slack = outcome.time_first_slack_s.expect("a slack line");
    let just_after = outcome.trajectory.at(slack + 1e-3);
    assert_eq!((just_after.mode, just_after.force_n), (Some(Mode::Slack), 0.0));
    let catch = times(&outcome, Happening::Taut).into_iter().find(|time| *time > slack);
    assert!(catch.is_none_or(|time| time - slack > 0.05), "{catch:?}");
}

#[test]
fn the_onset_is_judged_at_the_damper_jump_when_the_line_comes_taut() {
    let (force, onset) = (6000.0, 6500.0);
    let case = Case::on(100.0, 4.0, Part::damped(2e4, 3000.0)).with_slider(Slider::constant(force, onset, 2.0));
    let outcome = swing(&setup(case, 1.0, 6.0));
    let peak = outcome.peak_force.expect("a bounded force");
    assert_eq!(times(&outcome, Happening::DeploymentStart)[0], outcome.time_taut_s);
    assert_eq!((peak.value, peak.time_s), (onset, outcome.time_taut_s));
    close(outcome.trajectory.at(outcome.time_taut_s + 1e-9).force_n, force, 1e-12);
}

#[test]
fn the_onset_counts_once() {
    let line = Part::damped(5e4, 200.0);
    let case = Case::on(120.0, 2.0, line).with_slider(Slider::constant(4000.0, 6000.0, 3.0));
    let outcome = swing(&setup(case, 4.0, 5.0));
    let starts = times(&outcome, Happening::DeploymentStart);
    assert_eq!(outcome.peak_force.expect("a bounded force").time_s, starts[0]);
    let after = |time: f64| outcome.trajectory.at(time + 1e-6).force_n;
    for start in starts {
        close(after(start), 4000.0, 1e-9);
    }
}

#[test]
fn a_damped_line_alone_starts_its_absorber_at_no_speed_and_the_deployment_is_not_lost() {
    for index in 0..100_u32 {
        let force = 4000.0 + 7.0 * f64::from(index);
        let case = Case::on(60.0 + f64::from(index), 1.5, Part::damped(5e4, 200.0 + f64::from(index)));
        let outcome = swing(&setup(case.with_slider(Slider::constant(force, force, 3.0)), 0.5, 3.0));
        assert!(outcome.deployed_m > 0.1, "{index}: {}", outcome.deployed_m);
        close(outcome.peak_force.expect("a bounded force").value, force, 1e-9);
    }
}

#[test]
fn a_stroke_used_up_by_a_hair_and_its_neighbour_that_just_fits() {
    let with_stroke = |stroke| {
        let slider = Slider::constant(4000.0, 4000.0, stroke);
        swing(&setup(Case::on(100.0, 2.0, Part::damped(5e4, 500.0)).with_slider(slider), 1.0, 4.0))
    };
    let deployed = with_stroke(3.0).deployed_m;
    let fits = with_stroke(deployed * (1.0 + 1e-9));
    let short = with_stroke(deployed * (1.0 - 1e-9));
    assert!(!fits.stroke_used_up && short.stroke_used_up);
    close(fits.deployed_m, deployed, 1e-12);
    assert!(times(&short, Happening::StrokeUsedUp).len() == 1);
}

#[test]
fn a_rigid_line_on_an_absorber_is_held_at_the_deployment_force() {
    let case = Case::on(100.0, 2.0, Part::rigid()).with_slider(Slider::constant(4000.0, 4500.0, 3.0));
    let outcome = swing(&setup(case, 1.0, 4.0));
    let peak = outcome.peak_force.expect("a bounded force");
    assert_eq!((peak.value, peak.time_s), (4500.0, outcome.time_taut_s));
    assert!(outcome.impulses.is_empty());
    let weight = 100.0 * G;
    let work = 4000.0 * outcome.deployed_m;
    close(outcome.energy.absorber_j, work, 1e-9);
    let height = 2.0 + outcome.swing_drop_m;
    close(outcome.energy.kinetic_j + work, weight * height, 1e-9);
}

#[test]
fn a_rigid_line_whose_stroke_is_used_up_has_no_bound_on_its_force() {
    let case = Case::on(100.0, 3.0, Part::rigid()).with_slider(Slider::constant(4000.0, 4000.0, 0.2));
    let outcome = swing(&setup(case, 1.0, 4.0));
    assert!(outcome.stroke_used_up && outcome.peak_force.is_none());
    assert_eq!(outcome.impulses.len(), 1);
}

#[test]
fn an_absorber_with_two_damped_groups_and_a_rising_force_is_solved_too() {
    let mut slider = Slider::constant(3000.0, 3500.0, 2.0);
    slider.force = vec![(0.0, 3000.0), (0.5, 4000.0), (2.0, 6000.0)];
    let case = Case::on(100.0, 3.0, Part::damped(6e4, 800.0)).with_other(Part::damped(3e4, 500.0)).with_slider(slider);
    let setup = setup(case, 2.0, 5.0);
    let (outcome, record) = (swing(&setup), run(&setup, 1e-12, 0.25, 60.0));
    close(outcome.peak_force.expect("a bounded force").value, record.peak.1, 1e-8);
    close(outcome.deployed_m, record.end.expect("a reversal").1[6], 1e-8);
}

#[test]
fn a_line_of_many_knots_equals_the_line_it_is_cut_from() {
    let straight = swing(&setup(Case::on(100.0, 2.0, Part::spring(2e4)), 2.0, 4.0));
    let knots = (0..64).map(|i| (0.01 * f64::from(i), 200.0 * f64::from(i))).collect();
    let cut = swing(&setup(Case::on(100.0, 2.0, Part { law: Law::Curve(knots), damping: 0.0 }), 2.0, 4.0));
    close(cut.peak_force.expect("a force").value, straight.peak_force.expect("a force").value, 1e-10);
    close(cut.lowest.at.elevation_m, straight.lowest.at.elevation_m, 1e-10);
    close(cut.end_s, straight.end_s, 1e-9);
    assert!(cut.work.modes > straight.work.modes + 60, "every knot is an event");
}

#[test]
fn the_trajectory_has_no_gaps_and_no_jumps_of_place_or_speed() {
    let case = Case::on(100.0, 3.0, Part::damped(6e4, 800.0)).with_slider(Slider::constant(4e3, 4.4e3, 1.75));
    let outcome = swing(&setup(case, 2.0, 5.0));
    for (time, _) in &outcome.happenings {
        let (before, after) = (outcome.trajectory.at(time - 1e-9), outcome.trajectory.at(time + 1e-9));
        assert!((before.at.offset_m - after.at.offset_m).abs() < 1e-7);
        assert!((before.at.elevation_m - after.at.elevation_m).abs() < 1e-7);
        assert!((before.velocity_m_per_s[1] - after.velocity_m_per_s[1]).abs() < 1e-6);
    }
    let start = outcome.trajectory.at(0.0);
    assert_eq!((start.mode, start.velocity_m_per_s), (None, [0.0, 0.0]));
    close(outcome.trajectory.at(f64::INFINITY).time_s, outcome.end_s, 1e-15);
    assert!(outcome.trajectory.at(outcome.end_s).velocity_m_per_s[0].abs() < 1e-9);
}

#[test]
fn the_two_sides_of_the_fall_line_are_mirror_images() {
    let case = Case::on(90.0, 2.5, Part::damped(4e4, 600.0)).with_slider(Slider::constant(4e3, 4.4e3, 1.75));
    let (right, left) = (swing(&setup(case.clone(), 1.5, 3.0)), swing(&setup(case, -1.5, 3.0)));
    assert_eq!(right.peak_force, left.peak_force);
    assert_eq!(right.lowest.at.offset_m, -left.lowest.at.offset_m);
    assert_eq!((right.angle_at_taut_rad, right.angle_at_end_rad), (left.angle_at_taut_rad, left.angle_at_end_rad));
    assert_eq!(right.work, left.work);
}

#[test]
fn a_small_swing_takes_half_the_period_of_the_pendulum_and_a_straight_fall_ends_at_its_rebound() {
    let outcome = swing(&setup(Case::on(80.0, 0.0, Part::rigid()), 1e-4, 9.80665));
    close(outcome.end_s, std::f64::consts::PI, 1e-9);
    assert_eq!(swing(&setup(Case::on(80.0, 1.0, Part::spring(1e4)), 0.0, 3.0)).ended, Ended::Rebound);
}

#[test]
fn a_start_out_of_reach_is_refused_with_both_numbers() {
    let plane = Plane { start: Point::new(3.0, -4.1), ..setup(Case::on(80.0, 0.0, Part::rigid()), 3.0, 5.0).plane() };
    let Err(SwingError::LineTooShort { distance_m, length_m }) = solve(&plane, &Settings::default()) else {
        panic!("a line too short is solved");
    };
    close(distance_m, 3.0_f64.hypot(4.1), 1e-15);
    assert_eq!(length_m, 5.0);
}

#[test]
fn numbers_out_of_range_are_refused_by_name() {
    let good = setup(Case::on(80.0, 1.0, Part::spring(1e4)), 1.0, 5.0).plane();
    let refused = |plane: Plane| match solve(&plane, &Settings::default()) {
        Err(SwingError::Input { what, .. } | SwingError::Path(ArrestError::Input { what, .. })) => what,
        other => panic!("{other:?}"),
    };
    assert_eq!(refused(Plane { mass_kg: 0.0, ..good.clone() }), "mass");
    assert_eq!(refused(Plane { free_length_m: f64::NAN, ..good.clone() }), "free length");
    assert_eq!(refused(Plane { half_width_m: -1.0, ..good.clone() }), "half width");
    let mut soft = good;
    soft.path.line.elastic = Elastic::Linear { stiffness_n_per_m: -1.0 };
    assert_eq!(refused(soft), "stiffness");
}

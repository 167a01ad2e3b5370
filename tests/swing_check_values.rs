//! Planar arrests against values from outside the project, each with its source and mark as in `check_values.rs`.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use support::printed::assert_printed;
use underfoot::physics::{Group, SeriesPath};
use underfoot::swing::{Ended, Plane, PlaneOutcome, Point, Settings, solve};

fn path(line: Group) -> SeriesPath {
    SeriesPath { line, other: Group::rigid(), absorber: None }
}

/// A mass on a line of length `length` from a pivot at the origin.
fn plane(mass_kg: f64, length: f64, start: (f64, f64), line: Group) -> Plane {
    Plane {
        mass_kg,
        gravity_m_per_s2: 9.80665,
        path: path(line),
        pivot: Point::new(0.0, 0.0),
        start: Point::new(start.0, start.1),
        free_length_m: length,
        body_below_m: 0.0,
        half_width_m: 0.0,
        levels: Vec::new(),
        faces: Vec::new(),
    }
}

fn swing(plane: &Plane) -> PlaneOutcome {
    solve(plane, &Settings::default()).expect("a solved swing")
}

// George Mason Univ. page on large-angle pendulum periods [P]: L 1 m, g 9.81.
#[test]
fn a_rigid_line_swings_with_the_published_pendulum_periods() {
    for (degrees, printed) in
        [(10.0_f64, "2.009892627298600"), (40.0, "2.068937851893589"), (80.0, "2.281885924019639")]
    {
        let (sin, cos) = degrees.to_radians().sin_cos();
        let outcome = swing(&Plane { gravity_m_per_s2: 9.81, ..plane(80.0, 1.0, (sin, -cos), Group::rigid()) });
        assert_eq!(outcome.ended, Ended::Reversal);
        assert!((outcome.angle_at_end_rad.to_degrees() + degrees).abs() < 1e-9);
        assert!(
            (outcome.end_s * 2.0 - printed.parse::<f64>().expect("a number")).abs() < 1e-12,
            "{}",
            outcome.end_s * 2.0
        );
    }
}

// The same page [P]: the period from 90 deg over that of a small swing.
#[test]
fn a_swing_from_the_level_of_the_anchor_takes_the_published_ratio_longer() {
    let outcome = swing(&plane(80.0, 1.0, (1.0, 0.0), Group::rigid()));
    let small = 0.5 * std::f64::consts::PI * (1.0_f64 / 9.80665).sqrt();
    // A quarter: at the far turn the horizontal velocity has a threefold zero, which no arithmetic places well.
    assert_printed("1.1803405990", outcome.lowest.time_s / small);
}

// Swing of a taut line [D].
#[test]
fn a_taut_line_at_an_offset_swings_down_to_the_value_of_the_energy_balance() {
    let outcome = swing(&plane(100.0, 5.0, (3.0, -4.0), Group::rigid()));
    assert_eq!(outcome.free_fall_m, 0.0);
    assert_printed("1", outcome.swing_drop_m);
    assert!((outcome.swing_drop_m - 1.0).abs() < 1e-12);
    assert_printed("4.428690551", outcome.lowest.speed_m_per_s);
    assert_printed("1.15135324905", outcome.lowest.time_s);
    let peak = outcome.peak_force.expect("a bounded force");
    assert!((peak.value / (100.0 * 9.80665) - 1.4).abs() < 1e-12);
    assert!((peak.time_s - outcome.lowest.time_s).abs() < 1e-6);
}

// Inextensible line [D].
#[test]
fn an_inextensible_line_takes_the_speed_along_it_when_it_comes_taut() {
    let outcome = swing(&plane(100.0, 2.0, (1.0, 0.0), Group::rigid()));
    assert_printed("1.732050808", outcome.free_fall_m);
    assert_printed("5.828484546", outcome.speed_at_taut_m_per_s);
    assert_printed("2.914242273", outcome.tangential_speed_at_taut_m_per_s);
    assert_printed("3.707853277", outcome.lowest.speed_m_per_s);
    assert!(outcome.peak_force.is_none(), "the force of the impulse has no bound");
    assert_eq!(outcome.impulses.len(), 1);
    assert_printed("5.0476157", outcome.impulses[0].speed_m_per_s);
}

// Planar elastic pendulum [D].
#[test]
fn an_elastic_line_beside_the_fall_line_gives_the_independent_values() {
    let outcome = swing(&plane(100.0, 2.0, (1.5, 0.0), Group::spring(1e4)));
    assert_printed("0.5194146231", outcome.time_taut_s);
    assert_printed("1.32287566", -outcome.taut_at.elevation_m);
    let peak = outcome.peak_force.expect("a bounded force");
    assert_printed("5058.627114", peak.value);
    assert_printed("0.7174436893", peak.time_s);
    assert_printed("0.9402862101", outcome.time_first_slack_s.expect("a slack line"));
    assert_printed("2.2455486964", -outcome.lowest.at.elevation_m);
    // 0.7779623521 in the list, read off a flat maximum; this is the zero of the vertical velocity to 25 digits [D].
    assert_printed("0.7779626602272", outcome.lowest.time_s);
}

// Quebec swing limit of 22 deg and 3 m [P]; radius, drop and speed [D from P].
#[test]
fn the_published_swing_limit_gives_its_drop_and_speed() {
    let (sin, cos) = 22_f64.to_radians().sin_cos();
    let radius = 3.0 / sin;
    assert_printed("8.008", radius);
    let outcome = swing(&plane(100.0, radius, (3.0, -radius * cos), Group::rigid()));
    assert_printed("0.583", outcome.swing_drop_m);
    assert_printed("3.382", outcome.lowest.speed_m_per_s);
    assert!((outcome.angle_at_taut_rad.to_degrees() - 22.0).abs() < 1e-9);
    assert!((outcome.reach_m - 6.0).abs() < 1e-9);
}

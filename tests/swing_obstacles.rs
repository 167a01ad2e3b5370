//! Strikes and closest approaches of a pendulum whose motion is known in closed form.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use underfoot::physics::{Group, SeriesPath};
use underfoot::swing::{Face, Level, Plane, PlaneOutcome, Point, Settings, Strike, solve};

const G: f64 = 9.80665;

/// A taut rigid line of 5 m from (2, 10), 3 m beside its fall line: it swings from offset 5 through (2, 5) to -1.
fn pendulum() -> Plane {
    Plane {
        mass_kg: 100.0,
        gravity_m_per_s2: G,
        path: SeriesPath { line: Group::rigid(), other: Group::rigid(), absorber: None },
        pivot: Point::new(2.0, 10.0),
        start: Point::new(5.0, 6.0),
        free_length_m: 5.0,
        body_below_m: 1.5,
        half_width_m: 0.3,
        levels: Vec::new(),
        faces: Vec::new(),
    }
}

fn with_level(level: Level) -> PlaneOutcome {
    solve(&Plane { levels: vec![level], ..pendulum() }, &Settings::default()).expect("a solved swing")
}

fn with_face(face: Face) -> PlaneOutcome {
    solve(&Plane { faces: vec![face], ..pendulum() }, &Settings::default()).expect("a solved swing")
}

#[track_caller]
fn close(actual: f64, expected: f64) {
    assert!((actual - expected).abs() < 1e-9, "{actual:.12} against {expected:.12}");
}

/// Checks where a strike is and that its speed is that of the height lost.
#[track_caller]
fn struck_at(strike: Option<Strike>, offset: f64, elevation: f64) {
    let strike = strike.expect("a strike");
    close(strike.at.offset_m, offset);
    close(strike.at.elevation_m, elevation);
    close(strike.speed_m_per_s, (2.0 * G * (6.0 - elevation)).sqrt());
    close(strike.drop_equivalent_m, 6.0 - elevation);
}

fn unbounded(top_m: f64) -> Level {
    Level { top_m, from_m: f64::NEG_INFINITY, to_m: f64::INFINITY }
}

#[test]
fn a_level_below_the_swing_is_missed_by_the_height_of_the_lowest_point_over_it() {
    let outcome = with_level(unbounded(3.0));
    close(outcome.levels[0].gap_m.expect("a gap"), 0.5);
    assert!((outcome.levels[0].time_s.expect("a time") - outcome.lowest.time_s).abs() < 1e-7);
    assert!(outcome.levels[0].strike.is_none());
}

#[test]
fn a_level_above_the_lowest_point_is_struck_where_the_swing_reaches_it() {
    let outcome = with_level(unbounded(4.0));
    // The lowest point of the body is at 4 when the attachment is at 5.5: 4.5 below the pivot.
    struck_at(outcome.levels[0].strike, 2.0 + (25.0_f64 - 20.25).sqrt(), 5.5);
    close(outcome.levels[0].gap_m.expect("a gap"), -0.5);
}

#[test]
fn a_level_of_limited_extent_counts_only_while_the_body_is_above_it() {
    // From -1 to 0: reached by the body's near side at offset 0.3, on the way up.
    let outcome = with_level(Level { top_m: 3.0, from_m: -1.0, to_m: 0.0 });
    let elevation = 10.0 - (25.0_f64 - 1.7 * 1.7).sqrt();
    close(outcome.levels[0].gap_m.expect("a gap"), elevation - 1.5 - 3.0);
    assert!(outcome.levels[0].strike.is_none());
    // Beyond the reach of the swing it never counts.
    let far = with_level(Level { top_m: 9.0, from_m: -5.0, to_m: -1.4 });
    assert_eq!((far.levels[0].gap_m, far.levels[0].strike), (None, None));
}

#[test]
fn the_end_of_a_level_is_struck_sideways() {
    let outcome = with_level(Level { top_m: 4.0, from_m: -1.0, to_m: 0.0 });
    struck_at(outcome.levels[0].strike, 0.3, 10.0 - (25.0_f64 - 1.7 * 1.7).sqrt());
}

#[test]
fn a_face_beyond_the_reach_is_missed_by_the_gap_at_the_turn() {
    let outcome = with_face(Face { offset_m: -2.0, bottom_m: 0.0, top_m: 10.0 });
    close(outcome.faces[0].gap_m.expect("a gap"), 1.0 - 0.3);
    assert!(outcome.faces[0].strike.is_none());
    close(outcome.reach_m, 6.0);
}

#[test]
fn a_face_is_struck_when_the_near_side_of_the_body_reaches_it() {
    let outcome = with_face(Face { offset_m: 1.0, bottom_m: 0.0, top_m: 10.0 });
    struck_at(outcome.faces[0].strike, 1.3, 10.0 - (25.0_f64 - 0.49).sqrt());
}

#[test]
fn a_face_above_or_below_the_path_of_the_attachment_never_counts() {
    for (bottom_m, top_m) in [(6.5, 9.0), (0.0, 4.9)] {
        let face = with_face(Face { offset_m: 1.0, bottom_m, top_m }).faces[0];
        assert_eq!((face.gap_m, face.strike), (None, None));
    }
}

#[test]
fn a_face_that_ends_below_the_path_is_struck_only_where_the_path_reaches_down_to_it() {
    // The attachment dips below 5.2 only within sqrt(25 - 4.8^2) = 1.4 of the plumb line: from offset 3.4 on.
    let outcome = with_face(Face { offset_m: 2.9, bottom_m: 0.0, top_m: 5.2 });
    struck_at(outcome.faces[0].strike, 3.2, 10.0 - (25.0_f64 - 1.44).sqrt());
    // With its offset already passed when the path comes down to it, it is struck there.
    let outcome = with_face(Face { offset_m: 3.3, bottom_m: 0.0, top_m: 5.2 });
    struck_at(outcome.faces[0].strike, 3.4, 5.2);
}

#[test]
fn the_straight_fall_before_taut_counts_too() {
    let mut plane = pendulum();
    plane.start = Point::new(5.0, 8.0);
    plane.levels = vec![Level { top_m: 5.5, from_m: 4.0, to_m: 6.0 }];
    let outcome = solve(&plane, &Settings::default()).expect("a solved swing");
    let strike = outcome.levels[0].strike.expect("a strike");
    close(strike.at.elevation_m, 7.0);
    close(strike.time_s, (2.0 / G).sqrt());
    close(strike.drop_equivalent_m, 1.0);
    assert!(strike.time_s < outcome.time_taut_s);
}

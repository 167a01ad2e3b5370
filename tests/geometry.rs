//! Where a fall starts, against triangles worked by hand and sums from outside the program.
#![allow(clippy::expect_used, clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use proptest::prelude::*;
use underfoot::physics::clearance::{Datum, Need, below_anchor, below_standing_surface, both};
use underfoot::physics::geometry::{
    Course, Geometry, GeometryError, Point, Positions, hanging, retractable, secondary, stated, vertical_lifeline,
};

fn at(offset_m: f64, elevation_m: f64) -> Point {
    Point { offset_m, elevation_m }
}

fn from(attachment_m: f64, anchor: Point) -> Positions {
    Positions { attachment_m, anchor, edge: None }
}

fn over(attachment_m: f64, anchor: Point, edge: Point) -> Positions {
    Positions { attachment_m, anchor, edge: Some(edge) }
}

fn near(a: f64, b: f64) {
    assert!((a - b).abs() < 1e-12, "{a} is not {b}");
}

fn taut(geometry: &Geometry) -> f64 {
    geometry.layout.expect("positions").attachment_taut_m
}

#[test]
fn an_anchor_overhead_lets_the_subject_fall_by_the_slack_of_the_line() {
    let fall = hanging(&from(11.5, at(0.0, 12.0)), 2.0).unwrap();
    near(fall.free_fall_m, 1.5);
    near(taut(&fall), 10.0);
    assert_eq!(fall.course(), Course::Vertical);
    assert_eq!(fall.elastic_length_m, Some(2.0));
}

#[test]
fn an_anchor_at_the_feet_lets_the_subject_fall_twice_the_height_more() {
    let fall = hanging(&from(11.5, at(0.0, 10.0)), 1.5).unwrap();
    near(fall.free_fall_m, 3.0);
}

// Triangle 3, 4, 5.
#[test]
fn an_anchor_beside_the_fall_line_makes_a_right_triangle() {
    let fall = hanging(&from(10.0, at(-3.0, 10.0)), 5.0).unwrap();
    near(fall.free_fall_m, 4.0);
    near(taut(&fall), 6.0);
    assert_eq!(fall.course(), Course::Planar);
    let mirrored = hanging(&from(10.0, at(3.0, 10.0)), 5.0).unwrap();
    assert_eq!(mirrored.free_fall_m, fall.free_fall_m);
}

// Derived row [D]: inextensible line L 2, offset 1, start level with the anchor: drop to taut 1.732050808.
#[test]
fn a_line_of_two_metres_one_metre_aside_drops_to_taut_as_calculated() {
    let fall = hanging(&from(5.0, at(1.0, 5.0)), 2.0).unwrap();
    assert!((fall.free_fall_m - 1.732_050_808).abs() < 5e-10);
}

// Derived row [D]: planar elastic, L 2, start (1.5, 0): taut at depth 1.32287566.
#[test]
fn a_start_level_with_the_anchor_comes_taut_at_the_calculated_depth() {
    let fall = hanging(&from(0.0, at(-1.5, 0.0)), 2.0).unwrap();
    assert!((taut(&fall) + 1.322_875_66).abs() < 5e-9);
}

#[test]
fn a_line_taut_at_the_start_gives_no_free_fall() {
    for spare in [0.0, 1e-10, -9e-10] {
        let fall = hanging(&from(6.0, at(3.0, 10.0)), 5.0 + spare).unwrap();
        assert_eq!(fall.free_fall_m, 0.0, "{spare}");
        near(taut(&fall), 6.0);
    }
    assert_eq!(hanging(&from(10.0, at(3.0, 10.0)), 3.0).unwrap().free_fall_m, 0.0);
}

#[test]
fn a_line_taut_upwards_at_the_start_still_falls_past_its_anchor() {
    let fall = hanging(&from(11.0, at(0.0, 10.0)), 1.0).unwrap();
    near(fall.free_fall_m, 2.0);
}

#[test]
fn a_line_shorter_than_the_distance_is_refused_with_both_lengths() {
    let refused = hanging(&from(6.0, at(3.0, 10.0)), 4.9).unwrap_err();
    assert_eq!(refused, GeometryError::LineTooShort { length_m: 4.9, distance_m: 5.0 });
    assert!(refused.to_string().contains("`4.900` m") && refused.to_string().contains("`5.000` m"));
}

// Anchor 4 m behind the edge, edge 0.6 m before the fall line: 6 m - 4 m = 2 m past the edge.
#[test]
fn an_edge_is_the_pivot_and_takes_the_length_behind_it() {
    let fall = hanging(&over(11.5, at(-4.6, 10.0), at(-0.6, 10.0)), 6.0).unwrap();
    let depth = (2.0_f64 * 2.0 - 0.6 * 0.6).sqrt();
    near(fall.free_fall_m, 1.5 + depth);
    let layout = fall.layout.unwrap();
    assert_eq!(layout.pivot, at(-0.6, 10.0));
    near(layout.free_length_m, 2.0);
    near(layout.taut_below_anchor_m(), depth);
    assert_eq!(fall.elastic_length_m, Some(6.0));
    assert_eq!(fall.course(), Course::Planar);
}

#[test]
fn an_edge_on_the_fall_line_is_a_vertical_arrest() {
    let fall = hanging(&over(11.5, at(4.0, 10.0), at(0.0, 10.0)), 6.0).unwrap();
    near(fall.free_fall_m, 3.5);
    assert_eq!(fall.course(), Course::Vertical);
}

#[test]
fn an_edge_out_of_place_is_refused_with_both_numbers() {
    let refused = |edge, length| hanging(&over(11.5, at(-4.0, 10.0), edge), length).unwrap_err();
    assert_eq!(
        refused(at(-0.5, 10.0), 3.0),
        GeometryError::LineTooShort { length_m: 3.0, distance_m: 1.5_f64.hypot(4.0) }
    );
    assert_eq!(
        refused(at(-0.5, 2.0), 6.0),
        GeometryError::EdgeOutOfReach { length_m: 6.0, distance_m: 8.0_f64.hypot(3.5) }
    );
    assert_eq!(refused(at(0.5, 10.0), 6.0), GeometryError::EdgeNotBetween { edge_m: 0.5, anchor_m: -4.0 });
    assert_eq!(refused(at(-5.0, 10.0), 6.0), GeometryError::EdgeNotBetween { edge_m: -5.0, anchor_m: -4.0 });
    assert_eq!(refused(at(-2.0, 11.0), 6.0), GeometryError::EdgeAbovePath { edge_m: 11.0, path_m: 10.75 });
}

#[test]
fn an_edge_the_taut_line_passes_above_is_refused() {
    // Straight and taut, triangle 3, 4, 5: from (-4, 14) to (0, 11), at offset -2 at 12.5.
    let refused = hanging(&over(11.5, at(-4.0, 14.0), at(-2.0, 10.0)), 5.0).unwrap_err();
    assert_eq!(refused, GeometryError::EdgeNotTouched { edge_m: 10.0, path_m: 12.5 });
    let refused = hanging(&over(11.5, at(-4.0, 14.0), at(-1.0, 11.4)), 5.0).unwrap_err();
    assert_eq!(refused, GeometryError::EdgeNotTouched { edge_m: 11.4, path_m: 11.75 });
}

#[test]
fn a_retractable_line_overhead_falls_its_slack_and_its_lock_travel() {
    let fall = retractable(&from(11.5, at(0.0, 14.0)), 0.1, 0.6).unwrap();
    near(fall.free_fall_m, 0.7);
    near(fall.elastic_length_m.unwrap(), 3.2);
}

#[test]
fn a_retractable_line_beside_the_fall_line_locks_when_as_much_line_has_come_out() {
    let fall = retractable(&from(6.0, at(-3.0, 10.0)), 0.2, 0.6).unwrap();
    let out = at(-3.0, 10.0).distance_m(at(0.0, taut(&fall)));
    near(out - 5.0, 0.8);
    near(fall.elastic_length_m.unwrap(), 5.8);
    assert!(fall.free_fall_m > 0.8);
    assert_eq!(fall.course(), Course::Planar);
}

#[test]
fn a_retractable_line_anchored_below_the_attachment_says_what_it_leaves_out() {
    let fall = retractable(&from(11.5, at(0.0, 10.0)), 0.0, 0.6).unwrap();
    near(fall.free_fall_m, 3.6);
    assert_eq!(fall.notes.len(), 1);
}

#[test]
fn a_grab_adds_its_slide_to_the_free_fall() {
    let fall = vertical_lifeline(8.0, 0.9, 0.35).unwrap();
    near(fall.free_fall_m, 1.25);
    assert_eq!(fall.elastic_length_m, Some(8.0));
    assert_eq!(fall.course(), Course::Vertical);
}

#[test]
fn a_second_line_drops_its_load_by_its_slack() {
    near(secondary(&from(3.0, at(0.0, 9.0)), 0.25).unwrap().free_fall_m, 0.25);
    assert_eq!(secondary(&from(3.0, at(0.0, 9.0)), 0.0).unwrap().free_fall_m, 0.0);
}

#[test]
fn lengths_that_are_none_are_refused() {
    for bad in [-1.0, f64::NAN, f64::INFINITY] {
        assert!(stated(bad, None).is_err());
        assert!(stated(1.0, Some(bad)).is_err());
        assert!(vertical_lifeline(1.0, 1.0, bad).is_err());
        assert!(secondary(&from(3.0, at(0.0, 9.0)), bad).is_err());
        assert!(retractable(&from(3.0, at(0.0, 9.0)), 0.0, bad).is_err());
    }
    assert!(hanging(&from(f64::NAN, at(0.0, 9.0)), 10.0).is_err());
}

#[test]
fn the_working_of_an_edge_is_told_in_order() {
    let fall = hanging(&over(11.5, at(-4.6, 10.0), at(-0.6, 10.0)), 6.0).unwrap();
    let told: Vec<(&str, f64)> =
        fall.steps.iter().map(|step| (step.what, (step.value_m * 1e4).round() / 1e4)).collect();
    assert_eq!(
        told,
        [
            ("elevation of the anchor, as stated", 10.0),
            ("elevation of the attachment at the start", 11.5),
            ("anchor above the attachment", -1.5),
            ("anchor beside the fall line, as stated", -4.6),
            (
                "distance from the anchor to the attachment: third side of the right triangle over the anchor's height and its offset",
                4.8384
            ),
            ("line from the anchor to the attachment, as stated", 6.0),
            ("elevation of the edge, as stated", 10.0),
            ("edge beside the fall line, as stated", -0.6),
            (
                "line behind the edge: third side of the right triangle over height and offset between anchor and edge",
                4.0
            ),
            ("line past the edge: the whole line less the part behind the edge", 2.0),
            (
                "depth below the edge when taut: second side of the right triangle with the line past the edge as its longest side and the edge's offset as the other",
                1.9079
            ),
            ("elevation of the attachment when the line comes taut", 8.0921),
            ("free fall: from the start down to where the line comes taut", 3.4079),
        ]
    );
}

// Row 11 [S]: clearance sums below the anchor.
#[test]
fn clearance_below_the_anchor_adds_up_as_in_the_guides() {
    let sum = |line, arrest_m, stretch_allowance_m, attachment_height_m, reserve_m| {
        let need = Need { arrest_m, stretch_allowance_m, attachment_height_m, reserve_m };
        let sum = below_anchor(line, &need);
        assert_eq!(sum.datum, Datum::Anchor);
        sum.total_m
    };
    near(sum(2.0, 1.75, 0.0, 1.5, 1.0), 6.25);
    near(sum(2.0, 1.75, 0.30, 1.8, 1.0), 6.85);
    let foot = 0.3048;
    near(sum(6.0 * foot, 3.5 * foot, 0.0, 6.0 * foot, 3.0 * foot), 18.5 * foot);
}

// Row 11 [P], DGUV Regel 112-198 s.7.3: free fall + tear-out + 1 m.
#[test]
fn clearance_below_the_standing_surface_adds_up_as_in_the_rule() {
    let need = Need { arrest_m: 1.75, reserve_m: 1.0, ..Need::default() };
    let sum = below_standing_surface(4.0, &need);
    near(sum.total_m, 6.75);
    assert_eq!(sum.datum.words(), "below the standing surface");
}

fn needs() -> impl Strategy<Value = Need> {
    (0.0..4.0, 0.0..0.5, 0.0..2.0, 0.0..2.0).prop_map(
        |(arrest_m, stretch_allowance_m, attachment_height_m, reserve_m)| Need {
            arrest_m,
            stretch_allowance_m,
            attachment_height_m,
            reserve_m,
        },
    )
}

fn check_identity(fall: &Geometry, need: &Need) -> Result<(), TestCaseError> {
    let layout = fall.layout.expect("positions");
    let [anchor, standing] = both(&layout, fall.free_fall_m, need);
    let other = standing.total_m + layout.anchor_above_attachment_m() + need.attachment_height_m;
    prop_assert!((anchor.total_m - other).abs() < 1e-9);
    Ok(())
}

proptest! {
    // Row 11: the identity between the datums.
    #[test]
    fn the_datums_of_clearance_differ_by_the_height_of_the_anchor(
        attachment in -5.0..20.0, above in -3.0..6.0, offset in -4.0..4.0, spare in 0.0..5.0, need in needs(),
    ) {
        let anchor = at(offset, attachment + above);
        let length = anchor.distance_m(at(0.0, attachment)) + spare;
        check_identity(&hanging(&from(attachment, anchor), length).unwrap(), &need)?;
        check_identity(&retractable(&from(attachment, anchor), 0.5 * spare, 0.5 * spare).unwrap(), &need)?;
    }

    #[test]
    fn the_taut_line_is_as_long_as_stated(
        above in -3.0..6.0, offset in -4.0..4.0, spare in 1e-6..5.0,
    ) {
        let anchor = at(offset, above);
        let length = anchor.distance_m(at(0.0, 0.0)) + spare;
        let fall = hanging(&from(0.0, anchor), length).unwrap();
        prop_assert!((anchor.distance_m(at(0.0, taut(&fall))) - length).abs() < 1e-9);
        prop_assert!(fall.free_fall_m > 0.0);
        prop_assert_eq!(fall.steps.last().unwrap().value_m, fall.free_fall_m);
    }

    #[test]
    fn a_line_over_an_edge_is_as_long_as_stated_along_both_parts(
        behind in 0.5..5.0, before in 0.0..1.0, attachment in 0.8..2.0, spare in 0.0..4.0,
    ) {
        let (anchor, edge) = (at(behind + before, 0.0), at(before, 0.0));
        let length = anchor.distance_m(at(0.0, attachment)).max(behind + before) + spare;
        let fall = hanging(&over(attachment, anchor, edge), length).unwrap();
        let along = anchor.distance_m(edge) + edge.distance_m(at(0.0, taut(&fall)));
        prop_assert!((along - length).abs() < 1e-9);
    }

    #[test]
    fn no_edge_at_the_anchor_s_own_place_changes_the_fall(
        above in 0.0..3.0, offset in 0.1..4.0, spare in 0.01..5.0,
    ) {
        let anchor = at(offset, above);
        let length = anchor.distance_m(at(0.0, 0.0)) + spare;
        let plain = hanging(&from(0.0, anchor), length).unwrap();
        let edged = hanging(&over(0.0, anchor, anchor), length).unwrap();
        prop_assert!((plain.free_fall_m - edged.free_fall_m).abs() < 1e-9);
    }
}

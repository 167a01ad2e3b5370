//! The horizontal lifeline against figures from outside the program.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
mod support;

use support::printed::assert_printed;
use underfoot::arrest::{Fall, Outcome, Settings, solve};
use underfoot::physics::knots::Fit;
use underfoot::physics::span::{InlineAbsorber, Span, SpanCurve, SpanError, Tightness};
use underfoot::physics::{Elastic, Group, SeriesPath};

const G: f64 = 9.80665;

fn curve(span: Span) -> SpanCurve {
    SpanCurve::new(&span).expect("a span")
}

fn pretensioned(modulus: f64, force_n: f64) -> SpanCurve {
    curve(Span { tightness: Tightness::Pretension { force_n }, ..Span::level(10.0, modulus) })
}

fn falls_on(fit: Fit, mass_kg: f64, free_fall_m: f64, line: Group) -> Outcome {
    let other = Group { elastic: Elastic::Table(fit.table), damping_n_s_per_m: 0.0 };
    let path = SeriesPath { line, other, absorber: None };
    let fall = Fall { mass_kg, gravity_m_per_s2: G, free_fall_m, speed_at_taut_m_per_s: None, path };
    solve(&fall, &Settings { time_limit_s: 3.0, ..Settings::default() }).expect("an arrest")
}

// Row 1: 29 CFR 1926 Subpart M App. C guidance [P] gives about 2 at 15 deg and about 6 at 5 deg; exact values [D].
#[test]
fn the_cable_carries_a_multiple_of_the_load_at_a_flat_angle() {
    let span = curve(Span::level(2.0, 4.5e6));
    for (angle, printed) in [(15.0_f64, "1.931851653"), (5.0, "5.736856623"), (30.0, "1.000000000")] {
        let deflection = angle.to_radians().tan();
        assert_printed(printed, span.amplification(deflection));
        for end in span.end_loads(deflection) {
            assert!((end.below_horizontal_deg - angle).abs() < 1e-12);
        }
    }
    assert_printed("2", span.amplification(15.0_f64.to_radians().tan()));
    assert_printed("6", span.amplification(5.0_f64.to_radians().tan()));
}

// Row 2: engineering design sheet [S]; exact values [D].
#[test]
fn a_short_span_under_a_hundred_kilograms_follows_the_design_sheet() {
    let span = curve(Span::level(3.6, 4.5e6));
    assert_printed("15.5241", span.end_loads(0.5)[0].below_horizontal_deg);
    assert_printed("3.7363", span.path_m(0.5));
    assert_printed("186.815", 100.0 * span.amplification(0.5));
    assert_printed("3.74", span.path_m(0.5));
    assert_printed("15.52", span.end_loads(0.5)[1].below_horizontal_deg);
}

// Row 14: Quebec Safety Code 2.10.15(2)(a) geometry 1:12 [P]; tensions [D from P].
#[test]
fn one_or_two_arrests_of_six_kilonewtons_on_a_slack_of_one_in_twelve() {
    let span = curve(Span::level(12.0, 4.5e6));
    let amplification = span.amplification(6.0 / 12.0);
    assert_printed("36.12", 6.0 * amplification);
    assert_printed("72.25", 12.0 * amplification);
    assert!(12.0 * amplification < 90.0);
}

// Derived span rows [D].
#[test]
fn a_span_under_a_load_of_six_kilonewtons_sags_as_calculated() {
    let rows = [
        (4.5e6, 0.0, "0.5519912398", "27339.44015"),
        (4.5e6, 2000.0, "0.5383749652", "28022.66946"),
        (3.0e5, 0.0, "1.382515759", "11256.90252"),
    ];
    for (modulus, pretension, sag, tension) in rows {
        let span = pretensioned(modulus, pretension);
        let deflection = span.deflection_m(6000.0);
        assert_printed(sag, deflection);
        assert_printed(tension, span.tension_n(deflection));
    }
}

// Derived: span as the only spring [D].
#[test]
fn a_fall_onto_the_bare_span_reaches_the_calculated_depth() {
    let span = pretensioned(4.5e6, 0.0);
    let deflection = span.rigid_line_deflection_m(100.0, G, 2.0);
    assert_printed("0.7412967687", deflection);
    assert_printed("49188.05156", span.tension_n(deflection));
    assert_printed("14427.47538", span.load_n(deflection));
}

#[test]
fn the_solver_on_the_table_of_the_span_agrees_with_the_energy_of_the_exact_curve() {
    let span = pretensioned(4.5e6, 0.0);
    let fit = span.table(14427.475_38, 1e-3).unwrap();
    println!("{} knots, error {}", fit.table.knots().len(), fit.error / 14427.475_38);
    assert!(fit.error <= 14.427_475_38);
    let outcome = falls_on(fit, 100.0, 2.0, Group::rigid());
    println!("{} {}", outcome.peak_force_n / 14427.475_38 - 1.0, outcome.arrest_distance_m / 0.741_296_768_7 - 1.0);
    assert!((outcome.peak_force_n / 14427.475_38 - 1.0).abs() < 1e-6);
    assert!((outcome.arrest_distance_m / 0.741_296_768_7 - 1.0).abs() < 1e-6);
    // A table made for a larger force than comes: the peak lies inside a piece.
    let wide = span.table(17_000.0, 1e-3).unwrap();
    println!("{} knots", wide.table.knots().len());
    let outcome = falls_on(wide, 100.0, 2.0, Group::rigid());
    println!("{} {}", outcome.peak_force_n / 14427.475_38 - 1.0, outcome.arrest_distance_m / 0.741_296_768_7 - 1.0);
    assert!((outcome.arrest_distance_m / 0.741_296_768_7 - 1.0).abs() < 1e-4);
    assert!((outcome.peak_force_n / 14427.475_38 - 1.0).abs() < 1e-3);
}

#[test]
fn an_absorber_in_line_keeps_the_tension_at_its_force() {
    let absorber = InlineAbsorber { force_n: 10_000.0, stroke_m: 0.5 };
    let span = curve(Span { absorber: Some(absorber), ..Span::level(10.0, 4.5e6) });
    let _ = (span, SpanError::SagTooLarge { sag_m: 1.0, length_m: 1.0 });
}

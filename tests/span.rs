//! The horizontal lifeline against figures from outside the program.
#![allow(clippy::expect_used, clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
mod support;

use proptest::prelude::*;
use support::printed::assert_printed;
use underfoot::arrest::{Fall, Outcome, Settings, solve};
use underfoot::physics::cable::{CABLES, Source};
use underfoot::physics::knots::{Fit, with_spring};
use underfoot::physics::span::{InlineAbsorber, Span, SpanCurve, SpanError, Tightness};
use underfoot::physics::{Elastic, Group, SeriesPath};

const G: f64 = 9.80665;
/// Derived row [D]: force on the mass of a 2 m fall onto the bare span.
const PEAK_N: f64 = 14_427.475_38;

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
    let fit = span.table(PEAK_N, 1e-3).unwrap();
    assert_eq!(fit.table.knots().len(), 19);
    assert!(fit.error <= 1e-3 * PEAK_N);
    let outcome = falls_on(fit, 100.0, 2.0, Group::rigid());
    assert!((outcome.peak_force_n / PEAK_N - 1.0).abs() < 1e-6);
    assert!((outcome.arrest_distance_m / 0.741_296_768_7 - 1.0).abs() < 1e-6);
    // A table made for a larger force than comes: the peak lies inside a piece.
    let wide = span.table(17_000.0, 1e-3).unwrap();
    let outcome = falls_on(wide, 100.0, 2.0, Group::rigid());
    assert!((outcome.arrest_distance_m / 0.741_296_768_7 - 1.0).abs() < 1e-4);
    assert!((outcome.peak_force_n / PEAK_N - 1.0).abs() < 1e-3);
}

fn with_absorber(span: Span, force_n: f64, stroke_m: f64) -> SpanCurve {
    curve(Span { absorber: Some(InlineAbsorber { force_n, stroke_m }), ..span })
}

// Statics by hand: T0 is the tension of the straight cable, T at the length of the triangle, Hooke's law over S0 and two
// supports of 2 MN/m in series.
#[test]
fn supports_that_give_add_their_length_to_the_cable() {
    let tightness = Tightness::Pretension { force_n: 2000.0 };
    let span = Span { support_stiffness_n_per_m: Some(2e6), tightness, ..Span::level(8.0, 1e6) };
    let stretch = 2.0 * (4.0_f64.hypot(0.3) - 4.0);
    let unstretched = 8.0 * 1e6 / 1.002e6;
    let tension = 2000.0 + stretch / (unstretched / 1e6 + 2.0 / 2e6);
    let span = curve(span);
    assert!((span.unstretched_m() - unstretched).abs() < 1e-12);
    assert!((span.tension_n(0.3) / tension - 1.0).abs() < 1e-12);
    assert!((span.load_n(0.3) / (2.0 * tension * 0.3 / 4.0_f64.hypot(0.3)) - 1.0).abs() < 1e-12);
}

// The arc of a level parabola: W/2 sqrt(1 + r^2) + W/(2 r) asinh r with r = 4 sag / W (calculus). In the middle the slack
// cable comes taut where the triangle's sides are half of it.
#[test]
fn a_sagging_cable_comes_taut_where_the_triangle_is_as_long_as_the_parabola() {
    for sag in [0.05, 0.2, 0.3, 1.0, 4.0] {
        let span = curve(Span { tightness: Tightness::Sag { mid_m: sag }, ..Span::level(10.0, 4.5e6) });
        let r: f64 = 0.4 * sag;
        let arc = 5.0 * r.hypot(1.0) + 5.0 / r * r.asinh();
        assert!((span.unstretched_m() - arc).abs() < 1e-12, "{sag}");
        let slack = (0.25 * arc * arc - 25.0).sqrt();
        assert!((span.slack_m() / slack - 1.0).abs() < 1e-10, "{sag}: {} {slack}", span.slack_m());
        assert_eq!(span.load_n(0.999 * slack), 0.0);
        assert!(span.load_n(1.001 * slack) > 0.0);
    }
}

// Series of the same parabola: arc - W = 8/3 sag^2 / W to first order, so the slack is 2/sqrt(3) of the sag.
#[test]
fn a_cable_that_hardly_sags_keeps_its_digits() {
    for sag in [1e-3, 1e-5, 1e-7] {
        let span = curve(Span { tightness: Tightness::Sag { mid_m: sag }, ..Span::level(10.0, 4.5e6) });
        assert!((span.slack_m() / sag * 0.75_f64.sqrt() - 1.0).abs() < 1e-7, "{sag}");
    }
    let bare = pretensioned(4.5e6, 0.0);
    for deflection in [1e-3, 1e-6, 1e-9] {
        // P = EA delta^3 / a^3 for a level cable without tension, a half the span.
        let first = 4.5e6 * (deflection / 5.0_f64).powi(3);
        assert!((bare.load_n(deflection) / first - 1.0).abs() < 1e-7, "{deflection}");
        assert!((bare.deflection_m(first) / deflection - 1.0).abs() < 1e-7, "{deflection}");
    }
}

#[test]
fn a_cable_on_two_levels_leaves_its_supports_at_the_angles_of_the_triangle() {
    let span = curve(Span { level_difference_m: 2.0, at_m: 2.0, ..Span::level(8.0, 4.5e6) });
    // Chord point 0.5 m above the left support: 1.5 m below it makes 1 m below the left and 3 m below the right one.
    let [left, right] = span.end_loads(1.5);
    assert!((left.below_horizontal_deg - (1.0_f64 / 2.0).atan().to_degrees()).abs() < 1e-12);
    assert!((right.below_horizontal_deg - (3.0_f64 / 6.0).atan().to_degrees()).abs() < 1e-12);
    let length = 1.0_f64.hypot(2.0) + 3.0_f64.hypot(6.0);
    assert!((span.path_m(1.5) - length).abs() < 1e-12);
    let vertical =
        left.force_n * (left.below_horizontal_deg.to_radians().sin() + right.below_horizontal_deg.to_radians().sin());
    assert!((span.load_n(1.5) / vertical - 1.0).abs() < 1e-12);
}

#[test]
fn three_spans_stretch_as_one_cable() {
    let tightness = Tightness::Pretension { force_n: 1500.0 };
    let one = curve(Span { tightness, ..Span::level(10.0, 4.5e6) });
    let three = curve(Span { tightness, spans: 3, ..Span::level(10.0, 4.5e6) });
    let gained = |span: SpanCurve| span.tension_n(0.5) - 1500.0;
    assert!((gained(one) / gained(three) - 3.0).abs() < 1e-9);
    let sagging = |spans| curve(Span { tightness: Tightness::Sag { mid_m: 0.1 }, spans, ..Span::level(10.0, 4.5e6) });
    // The slack of all spans runs to the loaded one: three times the spare length is the root of three deeper.
    assert!((sagging(3).slack_m() / sagging(1).slack_m() - 3.0_f64.sqrt()).abs() < 1e-3);
}

#[test]
fn each_of_three_workers_feels_a_third_of_the_load() {
    let span = curve(Span { workers: 3, ..Span::level(10.0, 4.5e6) });
    assert!((3.0 * span.line_force_n(0.5) - span.load_n(0.5)).abs() < 1e-9);
    // Three of 100 kg on the span are one of 300 kg.
    let one = pretensioned(4.5e6, 0.0);
    let (a, b) = (span.rigid_line_deflection_m(100.0, G, 2.0), one.rigid_line_deflection_m(300.0, G, 2.0));
    assert!((a / b - 1.0).abs() < 1e-12);
    let fit = span.table(span.line_force_n(a), 1e-3).unwrap();
    let outcome = falls_on(fit, 100.0, 2.0, Group::rigid());
    assert!((outcome.arrest_distance_m / a - 1.0).abs() < 1e-6);
}

#[test]
fn an_absorber_in_line_holds_the_tension_at_its_force_until_its_stroke_is_used_up() {
    let span = with_absorber(Span::level(10.0, 4.5e6), 10_000.0, 0.5);
    let compliance = 10.0 / 4.5e6;
    let length = |deflection: f64| 2.0 * deflection.hypot(5.0) - 10.0;
    let mut last = 0.0;
    for step in 1..=400_u32 {
        let deflection = f64::from(step) * 0.006;
        let state = span.loading(deflection);
        let elastic = length(deflection) / compliance;
        let wanted = (length(deflection) - 10_000.0 * compliance).clamp(0.0, 0.5);
        assert!((state.deployed_m - wanted).abs() < 1e-12);
        let tension = if wanted < 0.5 { elastic.min(10_000.0) } else { (length(deflection) - 0.5) / compliance };
        assert!((state.tension_n - tension).abs() < 1e-6 * tension.max(1.0));
        assert!(state.load_n > last, "{deflection}");
        last = state.load_n;
        assert!((span.loading_deflection_m(state.load_n) / deflection - 1.0).abs() < 1e-9, "{deflection}");
        let back = span.with_deployed(state.deployed_m).loading(0.9 * deflection);
        assert_eq!(back.deployed_m, state.deployed_m, "what was deployed stays");
        assert!(back.load_n <= span.loading(0.9 * deflection).load_n + 1e-6);
    }
    assert_eq!(span.loading(2.4).deployed_m, 0.5);
}

// Energy by hand: m g (h + delta) = F^2 C / 2 + F s, with s = l - chord - F C while the stroke lasts.
#[test]
fn an_arrest_with_an_absorber_in_line_stops_where_the_energy_is_spent() {
    let (mass, height, force, compliance) = (100.0, 2.0, 10_000.0, 10.0 / 4.5e6);
    let span = with_absorber(Span::level(10.0, 4.5e6), force, 1.0);
    let spare = |deflection: f64| {
        let deployed = 2.0 * deflection.hypot(5.0) - 10.0 - force * compliance;
        0.5 * force * force * compliance + force * deployed - mass * G * (height + deflection)
    };
    let (mut low, mut high) = (0.5, 3.0);
    for _ in 0..100 {
        let middle = 0.5 * (low + high);
        if spare(middle) < 0.0 { low = middle } else { high = middle }
    }
    let load = span.loading(low).load_n;
    assert!((span.loading_work_j(low) / (mass * G * (height + low)) - 1.0).abs() < 1e-12);
    let outcome = falls_on(span.envelope_table(load, 1e-3).unwrap(), mass, height, Group::rigid());
    assert!((outcome.arrest_distance_m / low - 1.0).abs() < 1e-5, "{} {low}", outcome.arrest_distance_m);
    assert!((outcome.peak_force_n / load - 1.0).abs() < 1e-5);
}

// Nearly flat while the absorber deploys, steep on both sides: knots moved off the curve once fell there.
#[test]
fn a_law_that_is_flat_between_two_steep_stretches_has_a_table_that_rises() {
    let tightness = Tightness::Pretension { force_n: 0.0 };
    let span = Span { at_m: 0.15, tightness, spans: 4, ..Span::level(3.0, 20_000.0) };
    let fit = with_absorber(span, 2100.0, 0.03).envelope_table(27_387.0, 1e-3).unwrap();
    assert!(fit.error <= 1e-3 * 27_387.0, "{}", fit.error);
}

#[test]
fn a_span_that_cannot_be_is_refused_with_its_numbers() {
    let level = Span::level(10.0, 4.5e6);
    let refused = |span| SpanCurve::new(&span).unwrap_err();
    let outside = |at_m| refused(Span { at_m, ..level });
    for at_m in [0.0, 10.0, -1.0, 12.0] {
        assert_eq!(outside(at_m), SpanError::LoadOutside { at_m, length_m: 10.0 });
    }
    let sag = |mid_m| refused(Span { tightness: Tightness::Sag { mid_m }, ..level });
    assert_eq!(sag(11.0), SpanError::SagTooLarge { sag_m: 11.0, length_m: 10.0 });
    assert_eq!(sag(-1.0), SpanError::Input { what: "sag", value: -1.0 });
    let tightness = Tightness::Pretension { force_n: 2000.0 };
    let absorber = Some(InlineAbsorber { force_n: 1500.0, stroke_m: 0.5 });
    let weak = refused(Span { tightness, absorber, ..level });
    assert_eq!(weak, SpanError::AbsorberBelowPretension { force_n: 1500.0, pretension_n: 2000.0 });
    assert!(weak.to_string().contains("`1500` N") && weak.to_string().contains("`2000` N"));
    for span in [
        Span { length_m: 0.0, ..level },
        Span { modulus_n: -1.0, ..level },
        Span { support_stiffness_n_per_m: Some(0.0), ..level },
        Span { workers: 0, ..level },
        Span { spans: 0, ..level },
        Span { level_difference_m: f64::NAN, ..level },
    ] {
        assert!(matches!(refused(span), SpanError::Input { .. }), "{span:?}");
    }
}

#[test]
fn a_table_in_series_with_a_spring_adds_the_elongations() {
    let fit = pretensioned(4.5e6, 0.0).table(10_000.0, 1e-3).unwrap();
    let both = with_spring(&fit.table, 30_000.0).unwrap();
    for force in [10.0, 500.0, 4000.0, 9999.0] {
        let sum = fit.table.inverse(force) + force / 30_000.0;
        assert!((both.inverse(force) / sum - 1.0).abs() < 1e-12);
    }
}

#[test]
fn every_cable_of_the_list_states_ordered_figures_and_its_source() {
    for cable in &CABLES {
        let [low, typical, high] = cable.axial_stiffness_n(0.012);
        assert!(0.0 < low && low < typical && typical < high, "{}", cable.name);
        assert!(!cable.note.is_empty());
        if let Source::Published(source) = cable.source {
            assert!(source.contains("EN 892"));
        }
    }
    // Row 3 [D]: the standard test fall gives these moduli.
    let rope = CABLES.iter().find(|cable| cable.is_published()).unwrap();
    assert_printed("18.533", rope.values[0] / 1e3);
    assert_printed("24.091", rope.values[1] / 1e3);
    assert_printed("45.090", rope.values[2] / 1e3);
}

fn spans() -> impl Strategy<Value = Span> {
    let tightness = prop_oneof![
        Just(Tightness::Pretension { force_n: 0.0 }),
        (10.0..20_000.0).prop_map(|force_n| Tightness::Pretension { force_n }),
        (1e-4..0.08).prop_map(|mid_m| Tightness::Sag { mid_m }),
    ];
    let supports = prop_oneof![Just(None), (1e5..1e8).prop_map(Some)];
    (3.0..60.0, -0.3..0.3, 0.05..0.95, tightness, 2e4_f64.ln()..3e7_f64.ln(), supports, 1..4_u32, 1..5_u32).prop_map(
        |(length_m, slope, at, tightness, modulus, support_stiffness_n_per_m, workers, spans)| Span {
            length_m,
            level_difference_m: slope * length_m,
            at_m: at * length_m,
            tightness: match tightness {
                Tightness::Sag { mid_m } => Tightness::Sag { mid_m: mid_m * length_m },
                given @ Tightness::Pretension { .. } => given,
            },
            modulus_n: modulus.exp(),
            support_stiffness_n_per_m,
            absorber: None,
            workers,
            spans,
        },
    )
}

proptest! {
    #[test]
    fn load_and_tension_rise_with_the_deflection(span in spans(), depth in 1e-4..0.5, more in 1e-6..0.1) {
        let curve = curve(span);
        let low = curve.slack_m() + depth * span.length_m;
        let high = low * (1.0 + more);
        prop_assert!(curve.load_n(high) > curve.load_n(low));
        prop_assert!(curve.tension_n(high) > curve.tension_n(low));
    }

    #[test]
    fn the_inverse_gives_the_deflection_back(span in spans(), depth in 1e-4..0.5) {
        let curve = curve(span);
        let deflection = curve.slack_m() + depth * span.length_m;
        let found = curve.deflection_m(curve.load_n(deflection));
        prop_assert!((found / deflection - 1.0).abs() < 1e-11);
    }

    // P = dU / d delta, by a central difference.
    #[test]
    fn the_load_is_the_slope_of_the_energy(span in spans(), depth in 1e-2..0.5) {
        let curve = curve(span);
        let deflection = curve.slack_m() + depth * span.length_m;
        let step = 1e-5 * depth * span.length_m;
        let slope: f64 = (curve.energy_j(deflection + step) - curve.energy_j(deflection - step)) / (2.0 * step);
        prop_assert!((slope / curve.load_n(deflection) - 1.0).abs() < 1e-6);
    }

    // Against the lengths as they stand in the model, where they do not cancel.
    #[test]
    fn the_path_is_the_sum_of_two_straight_parts(span in spans(), depth in 0.0..0.5) {
        let deflection = depth * span.length_m;
        let (a, b) = (span.at_m, span.length_m - span.at_m);
        let slope = span.level_difference_m / span.length_m;
        let length = a.hypot(deflection - slope * a) + b.hypot(deflection + slope * b);
        prop_assert!((curve(span).path_m(deflection) / length - 1.0).abs() < 1e-14);
    }

    #[test]
    fn a_level_span_does_not_know_left_from_right(span in spans(), depth in 1e-3..0.5) {
        let level = Span { level_difference_m: 0.0, ..span };
        let mirrored = Span { at_m: level.length_m - level.at_m, ..level };
        let (one, other) = (curve(level), curve(mirrored));
        let deflection = one.slack_m() + depth * span.length_m;
        prop_assert!((one.load_n(deflection) / other.load_n(deflection) - 1.0).abs() < 1e-9);
        let mirrored = Span { level_difference_m: -span.level_difference_m, at_m: span.length_m - span.at_m, ..span };
        prop_assert!((curve(span).load_n(deflection) - curve(mirrored).load_n(deflection)).abs() <= 1e-9 * curve(span).load_n(deflection).max(1.0));
    }

    // The bound is checked on a grid that does not fall on the places the fit itself looks at.
    #[test]
    fn the_table_stays_within_a_thousandth_of_its_largest_force(span in spans(), largest in 500.0..30_000.0) {
        let curve = curve(span);
        let fit = curve.table(largest, 1e-3).unwrap();
        let end = curve.deflection_m(largest * f64::from(span.workers)) - curve.slack_m();
        for step in 0..=997_u32 {
            let x = end * f64::from(step) / 997.0;
            let off = (fit.table.value(x) - curve.line_force_n(curve.slack_m() + x)).abs();
            prop_assert!(off <= 1.01e-3 * largest, "{} at {} of {}", off / largest, x, end);
        }
        prop_assert!(fit.table.knots().len() <= 32, "{} knots", fit.table.knots().len());
        let work = (curve.energy_j(curve.slack_m() + end)) / f64::from(span.workers);
        prop_assert!((fit.table.integral(end) / work - 1.0).abs() < 1e-9);
    }

    #[test]
    fn the_table_with_an_absorber_in_line_stays_within_a_thousandth(
        span in spans(), largest in 500.0..30_000.0, force in 1.05..5.0, stroke in 0.01..0.3,
    ) {
        let pretension = match span.tightness {
            Tightness::Pretension { force_n } => force_n,
            Tightness::Sag { .. } => 0.0,
        };
        let curve = with_absorber(span, force * pretension.max(2000.0), stroke * span.length_m);
        let fit = curve.envelope_table(largest, 1e-3).unwrap();
        let end = curve.loading_deflection_m(largest * f64::from(span.workers)) - curve.slack_m();
        for step in 0..=997_u32 {
            let x = end * f64::from(step) / 997.0;
            let off = (fit.table.value(x) - curve.loading(curve.slack_m() + x).load_n / f64::from(span.workers)).abs();
            prop_assert!(off <= 1.01e-3 * largest, "{} at {} of {}", off / largest, x, end);
        }
    }
}

//! A lifeline with an absorber in line, followed until settled: against a fixed-step integration of the exact cable that
//! knows no tables, no modes and no events, and by its energy account.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test fails by panicking")]
use proptest::prelude::*;
use underfoot::arrest::{Fall, Happening, Outcome, Settings, solve_on_span};
use underfoot::physics::{Absorber, Group, InlineAbsorber, SeriesPath, Span, SpanCurve, Tightness, YieldingSpan};

const GRAVITY: f64 = 9.80665;
const LENGTH: f64 = 12.0;
const MODULUS: f64 = 2.5e6;
const PRETENSION: f64 = 900.0;
const FORCE: f64 = 7000.0;

fn span(stroke_m: f64) -> SpanCurve {
    SpanCurve::new(&Span {
        tightness: Tightness::Pretension { force_n: PRETENSION },
        absorber: Some(InlineAbsorber { force_n: FORCE, stroke_m }),
        ..Span::level(LENGTH, MODULUS)
    })
    .unwrap()
}

fn fall(mass_kg: f64, free_fall_m: f64, line: Group) -> Fall {
    let path = SeriesPath { line, other: Group::rigid(), absorber: None };
    Fall { mass_kg, gravity_m_per_s2: GRAVITY, free_fall_m, speed_at_taut_m_per_s: None, path }
}

/// Solved with the law fitted to the largest force of the run.
fn solved(fall: &Fall, curve: SpanCurve, spring: Option<f64>, share: f64) -> Outcome {
    let run = |largest_n| {
        let law = YieldingSpan::new(curve, spring, largest_n, share).unwrap();
        solve_on_span(fall, law, &Settings { time_limit_s: 10.0, ..Settings::default() }).unwrap()
    };
    let mut largest_n = 2e4;
    for _ in 0..12 {
        let outcome = run(largest_n);
        if outcome.peak_force_n <= largest_n && outcome.peak_force_n > 0.9 * largest_n {
            return outcome;
        }
        largest_n = outcome.peak_force_n * if outcome.peak_force_n <= largest_n { 1.001 } else { 1.25 };
    }
    panic!("the law does not settle on the largest force");
}

/// Load in the middle of the cable and the length given, from the lengths as they stand in the model.
fn cable(deflection: f64, given: f64, stroke: f64) -> (f64, f64) {
    let unstretched = LENGTH * MODULUS / (MODULUS + PRETENSION);
    let compliance = unstretched / MODULUS;
    let length = 2.0 * (0.5 * LENGTH).hypot(deflection);
    let wanted = length - LENGTH - (FORCE - PRETENSION) * compliance;
    let given = wanted.min(stroke).max(given);
    let tension = (PRETENSION + (length - LENGTH - given) / compliance).max(0.0);
    (tension * 4.0 * deflection.max(0.0) / length, given)
}

/// What the reference sees up to the first highest point after the lowest.
#[derive(Debug, Default)]
struct Seen {
    peak: f64,
    time_peak: f64,
    lowest: f64,
    time_lowest: f64,
    highest: f64,
    time_highest: f64,
    given: f64,
    /// Travel at later times.
    later: Vec<(f64, f64)>,
}

/// Runge's and Kutta's fourth-order rule with a damped line: travel, speed and stretch of the line. The cable's stretch
/// is what is left, so that slack needs no event.
fn integrated(fall: &Fall, (k, c): (f64, f64), stroke: f64, until: f64) -> Seen {
    let step = 1e-5;
    let (mass, weight) = (fall.mass_kg, fall.mass_kg * GRAVITY);
    let start = (2.0 * fall.free_fall_m / GRAVITY).sqrt();
    let mut y = [0.0, GRAVITY * start, 0.0];
    let mut seen = Seen::default();
    let rates = |y: [f64; 3], given: f64| {
        let (force, _) = cable(y[0] - y[2], given, stroke);
        [y[1], (weight - force) / mass, (force - k * y[2]) / c]
    };
    let plus = |y: [f64; 3], d: [f64; 3], h: f64| [y[0] + h * d[0], y[1] + h * d[1], y[2] + h * d[2]];
    let (mut time, mut look) = (start, start + 0.25);
    while time < until {
        let a = rates(y, seen.given);
        let b = rates(plus(y, a, 0.5 * step), seen.given);
        let c = rates(plus(y, b, 0.5 * step), seen.given);
        let d = rates(plus(y, c, step), seen.given);
        let before = y;
        for i in 0..3 {
            y[i] += step / 6.0 * (a[i] + 2.0 * b[i] + 2.0 * c[i] + d[i]);
        }
        let force;
        (force, seen.given) = cable(y[0] - y[2], seen.given, stroke);
        if force > seen.peak {
            (seen.peak, seen.time_peak) = (force, time + step);
        }
        // Between two steps the speed is as good as straight.
        let turn = before[1] / (before[1] - y[1]);
        let at = before[0] + 0.5 * before[1] * turn * step;
        if before[1] > 0.0 && y[1] <= 0.0 && seen.lowest == 0.0 {
            (seen.lowest, seen.time_lowest) = (at, time + turn * step);
        }
        if before[1] <= 0.0 && y[1] > 0.0 && seen.highest == 0.0 {
            (seen.highest, seen.time_highest) = (at, time + turn * step);
        }
        time += step;
        if time >= look {
            look += 0.25;
            seen.later.push((time, y[0]));
        }
    }
    seen
}

fn close(what: &str, ours: f64, theirs: f64, tolerance: f64) {
    let off = (ours - theirs).abs() / theirs.abs().max(0.1);
    assert!(off <= tolerance, "{what}: {ours} against {theirs}, off by {off:e}");
}

fn held_against_the_integration(share: f64, tolerance: f64, stroke: f64) {
    for (mass, free_fall, k, c) in [(90.0, 1.5, 6e4, 700.0), (110.0, 0.6, 3e4, 2500.0), (70.0, 3.0, 9e4, 900.0)] {
        let fall = fall(mass, free_fall, Group::damped(k, c));
        let ours = solved(&fall, span(stroke), None, share);
        let until = ours.motion.end_s().min(4.0);
        let theirs = integrated(&fall, (k, c), stroke, until);
        let given = ours.span.unwrap();
        assert!(theirs.given > 0.05, "the absorber gives: {theirs:?}");
        close("peak force", ours.peak_force_n, theirs.peak, tolerance);
        close("time of the peak", ours.time_peak_force_s, theirs.time_peak, tolerance.max(2e-5));
        close("deployed", given.deployed_m, theirs.given, tolerance);
        assert_eq!(given.used_up, theirs.given >= stroke);
        close("lowest", ours.arrest_distance_m, theirs.lowest, tolerance);
        close("time of the lowest", ours.lowest.unwrap().time_s, theirs.time_lowest, tolerance);
        let highest = ours.arrest_distance_m - ours.rebound_rise_m.unwrap();
        close("highest", highest, theirs.highest, tolerance);
        close("time of the highest", ours.time_highest_s.unwrap(), theirs.time_highest, tolerance);
        for &(time, travel) in &theirs.later {
            close(&format!("travel at {time}"), ours.motion.at(time).travel_m, travel, tolerance);
        }
        assert!(ours.energy_residual < 1e-9);
    }
}

#[test]
fn a_fine_law_gives_what_an_integration_of_the_exact_cable_gives() {
    held_against_the_integration(1e-7, 1e-6, 2.0);
}

#[test]
fn so_it_does_where_the_stroke_is_used_up() {
    held_against_the_integration(1e-7, 1e-6, 0.06);
}

#[test]
fn a_coarse_law_stays_near() {
    held_against_the_integration(2e-4, 1e-3, 2.0);
}

/// Undamped: what is lost is the absorber's work, `F s`, and the rest of the fall energy swings on.
#[test]
fn the_energy_the_absorber_has_taken_is_its_force_times_its_length() {
    for stroke in [2.0, 0.05] {
        let ours = solved(&fall(90.0, 1.5, Group::spring(6e4)), span(stroke), None, 1e-7);
        let given = ours.span.unwrap();
        close("work", ours.energy.span_absorber_j, FORCE * given.deployed_m, 1e-6);
        let put_in = 90.0 * GRAVITY * (1.5 + ours.arrest_distance_m);
        close("account", ours.energy.total_j(), put_in, 1e-9);
        close("nothing moves at the lowest point", ours.energy.kinetic_j / put_in, 0.0, 1e-9);
    }
}

#[test]
fn the_absorber_starts_once_and_stops_where_the_line_force_is_largest() {
    let ours = solved(&fall(90.0, 1.5, Group::damped(6e4, 700.0)), span(2.0), None, 1e-4);
    let of = |what| ours.happenings.iter().filter(|h| h.1 == what).map(|h| h.0).collect::<Vec<_>>();
    assert_eq!(of(Happening::SpanStarts).len(), 1);
    // Two searches for one instant: times are good to 1e-12.
    let [stops_s] = of(Happening::SpanStops)[..] else { panic!("stops more or less than once") };
    assert!((stops_s / ours.time_peak_force_s - 1.0).abs() < 1e-12, "{stops_s} and {}", ours.time_peak_force_s);
    assert!(of(Happening::SpanUsedUp).is_empty());
    let short = solved(&fall(90.0, 1.5, Group::damped(6e4, 700.0)), span(0.06), None, 1e-4);
    assert_eq!(short.happenings.iter().filter(|h| h.1 == Happening::SpanUsedUp).count(), 1);
    assert!(short.span.unwrap().used_up);
    assert!(short.peak_force_n > 1.2 * ours.peak_force_n, "{} {}", short.peak_force_n, ours.peak_force_n);
}

#[test]
fn a_stroke_that_just_does_is_not_used_up() {
    let needed = solved(&fall(90.0, 1.5, Group::spring(6e4)), span(2.0), None, 1e-5).span.unwrap().deployed_m;
    for (share, used_up) in [(1.001, false), (0.999, true)] {
        let given = solved(&fall(90.0, 1.5, Group::spring(6e4)), span(needed * share), None, 1e-5).span.unwrap();
        assert_eq!(given.used_up, used_up, "stroke {share} of what is needed");
    }
}

/// While the lanyard's absorber slides at one force the lifeline stands still at its turning point, a knot of its law.
#[test]
fn a_lifeline_that_stands_on_its_turning_point_leaves_it_downward() {
    let mut fall = fall(100.0, 1.3, Group::damped(6e4, 392.0));
    fall.path.absorber = Some(Absorber::constant(2600.0, 2600.0, 1.1));
    for step in 0..150 {
        let law = YieldingSpan::new(span(0.6), None, 2500.0 + 10.0 * f64::from(step), 2e-4).unwrap();
        let ours = solve_on_span(&fall, law, &Settings::default()).unwrap();
        assert!(ours.energy_residual < 1e-9 && ours.span.unwrap().deployed_m > 0.1 && ours.deployed_m > 0.01);
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]

    // Any path beside the span: the account closes, what is given stays given, and rest is that of the longer cable.
    #[test]
    fn every_run_balances_and_rests_on_the_longer_cable(
        mass in 50.0..140.0, free_fall in 0.0..4.0, k in 2e4..2e5, c in 0.0..3000.0, spring in 2e4..2e5,
        stroke in 0.02..1.0, lanyard in prop::option::of((2500.0..5000.0, 1.0..1.3)),
    ) {
        let mut fall = fall(mass, free_fall, Group::damped(k, c));
        fall.path.absorber = lanyard.map(|(force, onset)| Absorber::constant(force, force * onset, 1.75));
        let curve = span(stroke);
        let ours = solved(&fall, curve, Some(spring), 1e-4);
        let given = ours.span.unwrap();
        prop_assert!(ours.energy_residual < 1e-9);
        prop_assert!(given.deployed_m >= 0.0 && given.deployed_m <= stroke);
        prop_assert_eq!(given.used_up, given.deployed_m == stroke);
        let weight = mass * GRAVITY;
        let sag = curve.with_deployed(given.deployed_m).deflection_m(weight) - curve.slack_m();
        let rest = weight / k + weight / spring + sag + ours.deployed_m;
        prop_assert!((ours.hang_travel_m - rest).abs() < 2e-3, "{} {}", ours.hang_travel_m, rest);
        let end = ours.motion.end_s();
        for i in 0..=400 {
            let now = ours.motion.at(end * f64::from(i) / 400.0);
            let parts = now.elongation_m[0] + now.elongation_m[1] + now.deployed_m;
            prop_assert!(now.mode.is_none() || now.force_n <= 0.0 || (now.travel_m - parts).abs() < 1e-8);
        }
    }
}

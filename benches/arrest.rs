//! Cost of the vertical arrest, as ratios measured in one run: against a general-purpose integrator on the same case
//! and against the closed form of a single taut phase.
#![allow(clippy::expect_used, reason = "a bench fails by panicking")]
#[path = "../tests/support/mod.rs"]
mod support;

use std::hint::black_box;
use std::time::Instant;
use support::case::Law;
use support::reference::run;
use support::{Case, Event, Fineness, Part, Slider};
use underfoot::arrest::{Ended, Happening, Outcome, Settings, solve};

/// At least so many times faster than the integrator.
const FASTER_THAN_INTEGRATOR: f64 = 50.0;
/// At most so many times the closed form of one phase.
const TIMES_CLOSED_FORM: f64 = 40.0;

/// Seconds a call: the best of several batches.
fn seconds<T>(calls: u32, mut call: impl FnMut() -> T) -> f64 {
    let batch = |call: &mut dyn FnMut() -> T| {
        let start = Instant::now();
        for _ in 0..calls {
            black_box(call());
        }
        start.elapsed().as_secs_f64() / f64::from(calls)
    };
    (0..25).map(|_| batch(&mut call)).fold(f64::INFINITY, f64::min)
}

/// Lowest point and largest force of an underdamped taut phase: times and values.
fn closed_form(mass: f64, k: f64, c: f64, gravity: f64, speed: f64) -> [f64; 4] {
    let alpha = c / (2.0 * mass);
    let natural = k / mass;
    let omega = (natural - alpha * alpha).sqrt();
    let rest = mass * gravity / k;
    // u = exp(-alpha t) (p cos + q sin); T/m = natural u + 2 alpha u' + g.
    let (p, q) = (-rest, (speed - alpha * rest) / omega);
    let first_turn = |a: f64, b: f64| (omega * b - alpha * a).atan2(omega * a + alpha * b) / omega;
    let at = |a: f64, b: f64, t: f64| (-alpha * t).exp() * (a * (omega * t).cos() + b * (omega * t).sin());
    let low = first_turn(p, q);
    let (f, h) =
        (natural * p + 2.0 * alpha * (omega * q - alpha * p), natural * q - 2.0 * alpha * (omega * p + alpha * q));
    let peak = first_turn(f, h);
    [low, rest + at(p, q, low), peak, mass * (gravity + at(f, h, peak))]
}

fn settled(outcome: &Outcome) -> f64 {
    match outcome.ended {
        Ended::Settled { time_s } => time_s - outcome.time_taut_s,
        Ended::TimeLimit => Settings::default().time_limit_s,
    }
}

fn report(name: &str, case: &Case, closed: f64) -> bool {
    let fall = case.fall();
    let settings = Settings::default();
    let outcome = solve(&fall, &settings).expect("a solved arrest");
    let fineness = Fineness {
        relative_tolerance: 1e-9,
        look: 1.0,
        first_look: 1e-2,
        time_limit: settled(&outcome),
        most_looks: 1_000_000,
    };
    let record = run(case, fineness);
    let lets_go = record.events.iter().filter(|event| event.1 == Event::Slack).count();
    let ours = outcome.happenings.iter().filter(|happening| happening.1 == Happening::Slack).count();
    let apart = (record.peak.1 / outcome.peak_force_n - 1.0).abs();
    assert!(apart < 1e-6 && lets_go.abs_diff(ours) <= 1, "both must solve the same case: {apart:e}, {lets_go}, {ours}");
    let solver = seconds(2000, || solve(black_box(&fall), &settings));
    let integrator = seconds(20, || run(black_box(case), fineness));
    let (faster, times) = (integrator / solver, solver / closed);
    println!(
        "{name:<34} solver {:>8.2} us   integrator {:>9.1} us, {faster:>6.0} times   closed form {:>6.1} ns, {times:>5.1} times",
        solver * 1e6,
        integrator * 1e6,
        closed * 1e9
    );
    faster >= FASTER_THAN_INTEGRATOR && times <= TIMES_CLOSED_FORM
}

/// A damped line as a stiffening table of 64 knots against the straight line through its last knot.
fn knots() {
    let rows: Vec<(f64, f64)> =
        (0..64).map(|i| f64::from(i) / 63.0).map(|x| (1.2 * x, 1.2e4 * x * (0.5 + 0.5 * x))).collect();
    let table =
        Case { line: Part { law: Law::Curve(rows), damping: 200.0 }, ..Case::on(100.0, 4.0, Part::spring(1e4)) };
    let straight = Case::on(100.0, 4.0, Part::damped(1e4, 200.0));
    let settings = Settings::default();
    let time = |case: &Case| {
        let fall = case.fall();
        let modes = solve(&fall, &settings).expect("a solved arrest").work.modes;
        (seconds(500, || solve(black_box(&fall), &settings)), modes)
    };
    let ((with, modes), (without, few)) = (time(&table), time(&straight));
    println!(
        "table of 64 knots: {:.1} us through {modes} modes, straight line {:.1} us through {few}: {:.1} times (goal: 5)",
        with * 1e6,
        without * 1e6,
        with / without
    );
}

fn main() {
    let (mass, k, c) = (100.0, 1e4, 200.0);
    let speed = Case::on(mass, 4.0, Part::damped(k, c)).speed_at_taut();
    let [_, travel, _, force] = closed_form(mass, k, c, 9.80665, speed);
    assert!((travel - 0.849_889_315_2).abs() < 1e-9 && (force - 8_651.802_438).abs() < 1e-5);
    let closed =
        seconds(100_000, || closed_form(black_box(mass), black_box(k), black_box(c), 9.80665, black_box(speed)));
    let absorber = Slider::constant(4e3, 4.4e3, 1.75);
    let lanyard = Case::on(100.0, 2.0, Part::damped(6e4, 800.0)).with_slider(absorber.clone());
    let harness = Case::on(100.0, 2.0, Part::damped(6e4, 1200.0)).with_other(Part::spring(4e4)).with_slider(absorber);
    let met = [
        report("absorber on a damped line", &lanyard, closed),
        report("absorber, damped line, harness", &harness, closed),
        report("damped line with rebounds", &Case::on(mass, 4.0, Part::damped(k, c)), closed),
    ];
    println!(
        "goals: at least {FASTER_THAN_INTEGRATOR} times the integrator's speed, at most {TIMES_CLOSED_FORM} times the closed form"
    );
    knots();
    println!("first case meets them: {}", if met[0] { "yes" } else { "no" });
}

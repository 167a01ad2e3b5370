//! Cost of the planar arrest: absolute, and as ratios measured in one run against a general-purpose integrator of order
//! eight, once with its looks for events and once, on a swing without events, in one go.
#![allow(clippy::expect_used, reason = "a bench fails by panicking")]
#[path = "../tests/support/mod.rs"]
mod support;
#[path = "../tests/swing_support/mod.rs"]
mod swing_support;

use std::hint::black_box;
use std::time::Instant;
use support::{Case, Part, Slider};
use swing_support::Setup;
use swing_support::reference::{one_go, run};
use underfoot::swing::{Settings, solve};

/// Longest time for a swing up to its reversal, s.
const GOAL_S: f64 = 2e-3;

/// Seconds a call: the best of several batches.
fn seconds<T>(calls: u32, mut call: impl FnMut() -> T) -> f64 {
    let batch = |call: &mut dyn FnMut() -> T| {
        let start = Instant::now();
        for _ in 0..calls {
            black_box(call());
        }
        start.elapsed().as_secs_f64() / f64::from(calls)
    };
    (0..10).map(|_| batch(&mut call)).fold(f64::INFINITY, f64::min)
}

fn report(name: &str, setup: &Setup) -> bool {
    let plane = setup.plane();
    let settings = Settings::default();
    let outcome = solve(&plane, &settings).expect("a solved swing");
    let record = run(setup, 1e-9, 1.0, 120.0);
    let (end, _) = record.end.expect("a reversal");
    let peak = outcome.peak_force.expect("a bounded force").value;
    let apart = (record.peak.1 / peak - 1.0).abs();
    assert!(apart < 1e-4, "both must solve the same swing: {apart:e}");
    assert!((end / (outcome.end_s - outcome.time_taut_s) - 1.0).abs() < 1e-4, "both must end together");
    let solver = seconds(50, || solve(black_box(&plane), &settings));
    let integrator = seconds(3, || run(black_box(setup), 1e-9, 1.0, 120.0));
    println!(
        "{name:<38} {:>8.3} ms  {:>5} steps  integrator with looks at 1e-9 {:>8.3} ms, {:>6.1} times as long",
        solver * 1e3,
        outcome.work.steps,
        integrator * 1e3,
        integrator / solver
    );
    solver < GOAL_S
}

/// A taut elastic swing without any event, which the integrator may take in one go to the same accuracy.
fn report_without_events() {
    let setup = Setup { case: Case::on(100.0, 0.0, Part::spring(2e4)), offset: 3.0, length: 5.0 };
    let plane = setup.plane();
    let settings = Settings::default();
    let outcome = solve(&plane, &settings).expect("a solved swing");
    assert!(outcome.time_first_slack_s.is_none(), "no event was wanted");
    let end = outcome.trajectory.at(outcome.end_s).at;
    let go = || one_go(black_box(&setup), 1e-12, outcome.end_s);
    let off = (go()[0] - end.offset_m).abs().max((go()[1] - end.elevation_m).abs());
    let (solver, integrator) = (seconds(50, || solve(black_box(&plane), &settings)), seconds(20, go));
    println!(
        "taut swing, no events: {:.3} ms against {:.3} ms in one go at 1e-12, {:.1} times as long, {off:.1e} m apart",
        solver * 1e3,
        integrator * 1e3,
        integrator / solver
    );
}

fn main() {
    report_without_events();
    let on = |case: Case, offset: f64, length: f64| Setup { case, offset, length };
    let absorber = Slider::constant(4e3, 4.4e3, 1.75);
    let lanyard = Case::on(100.0, 2.0, Part::damped(6e4, 800.0));
    let met = [
        report("undamped line", &on(Case::on(100.0, 1.32, Part::spring(1e4)), 1.5, 2.0)),
        report("damped line", &on(lanyard.clone(), 3.0, 5.0)),
        report("damped line, absorber", &on(lanyard.clone().with_slider(absorber.clone()), 3.0, 5.0)),
        report(
            "damped line, harness, absorber",
            &on(lanyard.with_other(Part::spring(4e4)).with_slider(absorber), 3.0, 5.0),
        ),
        report("60 m line, 500 kN/m, 60 kg, undamped", &on(Case::on(60.0, 1.0, Part::spring(5e5)), 20.0, 60.0)),
        report("60 m line, 500 kN/m, 60 kg, damped", &on(Case::on(60.0, 1.0, Part::damped(5e5, 1e3)), 20.0, 60.0)),
    ];
    println!("goal: less than {:.0} ms each; met by all: {}", GOAL_S * 1e3, met.iter().all(|met| *met));
}

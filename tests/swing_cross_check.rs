//! The planar solver against a general-purpose integrator with event location of its own.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;
mod swing_support;

use std::fmt::Write as _;
use swing_support::{Record, Setup, physical_plane, run};
use underfoot::swing::{Ended, PlaneOutcome, Settings, solve};

const SEED: u64 = 2027;
const AGREEMENT: f64 = 1e-6;
const INTEGRATOR_TOLERANCE: f64 = 1e-12;

/// Identifier, solver, reference, and the size below which a difference does not matter more.
type Row = (&'static str, f64, f64, f64);

fn rows(setup: &Setup, outcome: &PlaneOutcome, record: &Record) -> Vec<Row> {
    let taut = outcome.time_taut_s;
    let size = setup.length;
    let (low_time, low) = record.lowest.expect("a lowest point");
    let (end_time, end) = record.end.expect("a reversal");
    let peak = outcome.peak_force.expect("a bounded force");
    let last = outcome.trajectory.at(outcome.end_s);
    let slack = |time: Option<f64>| time.unwrap_or(-1.0);
    vec![
        ("peak_force", peak.value, record.peak.1, 0.0),
        ("time_peak_force", peak.time_s - taut, record.peak.0, 1.0),
        ("lowest", outcome.lowest.at.elevation_m, low[1], 0.1 * size),
        ("lowest_offset", outcome.lowest.at.offset_m, low[0], size),
        ("time_lowest", outcome.lowest.time_s - taut, low_time, 1.0),
        ("speed_lowest", outcome.lowest.speed_m_per_s, low[2].hypot(low[3]), 1.0),
        ("end", outcome.end_s - taut, end_time, 1.0),
        ("end_offset", last.at.offset_m, end[0], size),
        ("end_elevation", last.at.elevation_m, end[1], size),
        ("end_climb", last.velocity_m_per_s[1], end[3], 10.0),
        ("deployed", outcome.deployed_m, end[6], 0.1),
        ("used_up", outcome.stroke_used_up.into(), record.used_up.into(), 1.0),
        ("first_slack", slack(outcome.time_first_slack_s.map(|t| t - taut)), slack(record.first_slack), 1.0),
        ("line_elongation", outcome.line_elongation_peak_m, record.stretch[0], 1e-2),
        ("other_elongation", outcome.other_elongation_peak_m, record.stretch[1], 1e-2),
    ]
}

fn check(count: u64, curves: bool) {
    let mut table = String::new();
    let (mut compared, mut worst, mut residual) = (0, 0.0_f64, 0.0_f64);
    for index in 0..count {
        let setup = physical_plane(SEED + u64::from(curves), index, curves);
        let outcome = match solve(&setup.plane(), &Settings::default()) {
            Ok(outcome) => outcome,
            Err(error) => {
                writeln!(table, "{index:>4} refused: {error} {setup:?}").expect("writing to a string");
                continue;
            }
        };
        assert_eq!(outcome.ended, Ended::Reversal, "{setup:?}");
        residual = residual.max(outcome.energy_residual);
        let record = run(&setup, INTEGRATOR_TOLERANCE, 0.25, 120.0);
        let before = table.len();
        for (id, solver, reference, scale) in rows(&setup, &outcome, &record) {
            let off = (solver - reference).abs() / reference.abs().max(scale);
            compared += 1;
            worst = worst.max(off);
            if off.is_nan() || off > AGREEMENT {
                writeln!(table, "{index:>4} {id:<17} {solver:>20.12} {reference:>20.12} {off:>9.1e}")
                    .expect("writing to a string");
            }
        }
        if table.len() > before {
            writeln!(table, "     {setup:?}").expect("writing to a string");
        }
    }
    println!("{compared} numbers, worst difference {worst:.1e}, worst energy residual {residual:.1e}");
    assert!(table.is_empty(), "\n{table}");
    assert!(compared > 14 * count);
}

#[test]
fn solver_and_integrator_agree_on_linear_parts_with_and_without_absorber() {
    check(300, false);
}

#[test]
fn solver_and_integrator_agree_on_curved_lines() {
    check(100, true);
}

//! Straight below its pivot the planar solver is the vertical core.
mod support;
mod swing_support;

use support::random::physical;
use swing_support::Setup;
use underfoot::arrest::{ArrestError, Happening, solve as solve_vertical, Settings as VerticalSettings};
use underfoot::swing::{Ended, Settings, solve};

const AGREEMENT: f64 = 1e-6;

#[test]
fn with_no_offset_the_planar_solver_equals_the_vertical_core() {
    let mut table = String::new();
    let (mut worst, mut compared, mut rebounds) = (0.0_f64, 0, 0);
    for index in 0..400_u64 {
        #[expect(clippy::cast_precision_loss, reason = "a small number")]
        let length = 0.8 + 0.15 * index as f64;
        let mut case = physical(77, index, index % 4 == 0);
        case.free_fall = case.free_fall.min(2.0 * length);
        let free_fall = case.free_fall;
        let vertical = match solve_vertical(&case.fall(), &VerticalSettings::default()) {
            Err(ArrestError::FourthOrder) => continue,
            solved => solved.expect("a solved arrest"),
        };
        let plane = Setup { case, offset: 0.0, length }.plane();
        let planar = solve(&plane, &Settings { time_limit_s: 20.0, ..Settings::default() }).expect("a solved swing");
        let slack_in_time = vertical.time_first_slack_s.filter(|t| *t < planar.end_s * (1.0 - 1e-9));
        let peak = planar.peak_force.expect("a bounded force");
        let mut rows = vec![
            ("free_fall", planar.free_fall_m, free_fall, length),
            ("time_taut", planar.time_taut_s, vertical.time_taut_s, 1.0),
            ("speed", planar.speed_at_taut_m_per_s, vertical.speed_at_taut_m_per_s, 1.0),
            ("peak_force", peak.value, vertical.peak_force_n, 0.0),
            ("line", planar.line_elongation_peak_m, vertical.line_elongation_peak_m, 1e-3),
            ("other", planar.other_elongation_peak_m, vertical.other_elongation_peak_m, 1e-3),
            ("drop", planar.swing_drop_m, vertical.arrest_distance_m, 1e-2),
            ("used_up", planar.stroke_used_up.into(), vertical.stroke_used_up.into(), 1.0),
            ("slack", planar.time_first_slack_s.unwrap_or(0.0), slack_in_time.unwrap_or(0.0), 1.0),
        ];
        if let Some(low) = vertical.lowest {
            rows.push(("time_lowest", planar.lowest.time_s, low.time_s, 1.0));
            rows.push(("time_peak", peak.time_s, vertical.time_peak_force_s, 1.0));
            rows.push(("line_work", planar.energy.line_j, vertical.energy.line_j, 1.0));
            rows.push(("absorber_work", planar.energy.absorber_j, vertical.energy.absorber_j, 1.0));
            rows.push(("damper_work", planar.energy.damper_j, vertical.energy.damper_j, 1.0));
        }
        if let (Some(high), Ended::Rebound) = (vertical.time_highest_s, planar.ended) {
            rebounds += 1;
            let top = planar.trajectory.at(planar.end_s).at.elevation_m - planar.lowest.at.elevation_m;
            rows.push(("rebound", top, vertical.rebound_rise_m.expect("a rise"), 1e-2));
            rows.push(("time_highest", planar.end_s, high, 1.0));
            let count = |events: &[(f64, Happening)]| {
                events.iter().filter(|event| event.0 < high * (1.0 - 1e-9)).map(|event| event.1).collect::<Vec<_>>()
            };
            assert_eq!(count(&planar.happenings), count(&vertical.happenings), "{plane:?}");
        }
        for (id, planar, vertical, scale) in rows {
            compared += 1;
            let off = (planar - vertical).abs() / vertical.abs().max(scale);
            worst = worst.max(off);
            if off.is_nan() || off > AGREEMENT {
                table += &format!("{index:>4} {id:<14} {planar:>20.12} {vertical:>20.12} {off:>9.1e}\n");
            }
        }
    }
    println!("{compared} numbers, worst difference {worst:.1e}, {rebounds} rebounds");
    assert!(table.is_empty(), "\n{table}");
    assert!(rebounds > 200);
}

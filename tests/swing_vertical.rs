//! Straight below its pivot the planar solver is the vertical core.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;
mod swing_support;

use std::fmt::Write as _;
use support::random::physical;
use swing_support::Setup;
use underfoot::arrest::{Happening, Outcome, Settings as VerticalSettings, solve as solve_vertical};
use underfoot::swing::{Ended, PlaneOutcome, Settings, solve};

const AGREEMENT: f64 = 1e-6;
/// Neither side may stop because it has settled.
const VERTICAL: VerticalSettings =
    VerticalSettings { time_limit_s: 20.0, settled_share: 1e-14, levels_n: [4000.0, 6000.0] };
const PLANAR: Settings =
    Settings { time_limit_s: 20.0, tolerance: 1e-14, most_steps: 50_000, levels_n: [4000.0, 6000.0] };

/// Name, planar, vertical, and the size below which a difference does not matter more.
type Row = (&'static str, f64, f64, f64);

/// The whole motion at 40 instants, those at a jump of the force left out.
fn motions(planar: &PlaneOutcome, vertical: &Outcome) -> Vec<Row> {
    let peak = vertical.peak_force_n;
    let mut rows = Vec::new();
    let end = planar.end_s.min(vertical.motion.end_s());
    for i in 0..=40 {
        let time = planar.time_taut_s + (end - planar.time_taut_s) * f64::from(i) / 40.0;
        if planar.happenings.iter().any(|happening| (happening.0 - time).abs() < 1e-7) {
            continue;
        }
        let (a, b) = (planar.trajectory.at(time), vertical.motion.at(time));
        rows.push(("travel", planar.taut_at.elevation_m - a.at.elevation_m, b.travel_m, 1.0));
        rows.push(("speed", -a.velocity_m_per_s[1], b.speed_m_per_s, 1.0));
        rows.push(("force", a.force_n, b.force_n, peak));
        rows.push(("line", a.elongation_m[0], b.elongation_m[0], 1e-2));
        rows.push(("other", a.elongation_m[1], b.elongation_m[1], 1e-2));
        rows.push(("deployed", a.deployed_m, b.deployed_m, 1e-2));
    }
    rows
}

fn numbers(planar: &PlaneOutcome, vertical: &Outcome, weight: f64) -> Vec<Row> {
    let peak = planar.peak_force.expect("a bounded force");
    let mut rows = vec![
        ("time_taut", planar.time_taut_s, vertical.time_taut_s, 1.0),
        ("speed_at_taut", planar.speed_at_taut_m_per_s, vertical.speed_at_taut_m_per_s, 1.0),
        ("peak_force", peak.value, vertical.peak_force_n, 0.0),
    ];
    let Some(low) = vertical.lowest.filter(|low| low.time_s <= planar.end_s) else { return rows };
    rows.extend([
        ("time_peak", peak.time_s, vertical.time_peak_force_s, 1.0),
        ("time_lowest", planar.lowest.time_s, low.time_s, 1.0),
        ("drop", planar.swing_drop_m, vertical.arrest_distance_m, 1e-2),
        ("line_work", planar.energy.line_j, vertical.energy.line_j, 1.0),
        ("other_work", planar.energy.other_j, vertical.energy.other_j, 1.0),
        ("absorber_work", planar.energy.absorber_j, vertical.energy.absorber_j, 1.0),
        ("damper_work", planar.energy.damper_j, vertical.energy.damper_j, 1.0),
    ]);
    if let (Some(high), Some(rise), Ended::Rebound) = (vertical.time_highest_s, vertical.rebound_rise_m, planar.ended) {
        let last = planar.trajectory.at(planar.end_s);
        let top = last.at.elevation_m - planar.lowest.at.elevation_m;
        rows.push(("rebound", top, rise, 1e-2));
        // What creeps to rest turns by rounding alone, at no time worth comparing.
        if (last.force_n - weight).abs() > 1e-6 * weight {
            rows.push(("time_highest", planar.end_s, high, 1.0));
        }
    }
    rows
}

fn happenings(events: &[(f64, Happening)], until: f64) -> Vec<Happening> {
    events.iter().filter(|event| event.0 < until * (1.0 - 1e-9)).map(|event| event.1).collect()
}

#[test]
fn with_no_offset_the_planar_solver_equals_the_vertical_core() {
    let mut table = String::new();
    let (mut worst, mut compared, mut rebounds) = (0.0_f64, 0, 0);
    for index in 0..400_u32 {
        let length = 0.8 + 0.15 * f64::from(index);
        let mut case = physical(77, index.into(), index % 4 == 0);
        case.free_fall = case.free_fall.min(2.0 * length);
        let vertical = solve_vertical(&case.fall(), &VERTICAL).expect("a solved arrest");
        let weight = case.mass * case.gravity;
        let plane = Setup { case, offset: 0.0, length }.plane();
        let planar = solve(&plane, &PLANAR).expect("a solved swing");
        rebounds += u32::from(planar.ended == Ended::Rebound);
        let end = planar.end_s.min(vertical.motion.end_s());
        assert_eq!(happenings(&planar.happenings, end), happenings(&vertical.happenings, end), "{plane:?}");
        let rows = motions(&planar, &vertical).into_iter().chain(numbers(&planar, &vertical, weight));
        for (id, planar, vertical, scale) in rows {
            compared += 1;
            let off = (planar - vertical).abs() / vertical.abs().max(scale);
            worst = worst.max(off);
            if off.is_nan() || off > AGREEMENT {
                writeln!(table, "{index:>4} {id:<14} {planar:>20.12} {vertical:>20.12} {off:>9.1e}")
                    .expect("writing to a string");
            }
        }
    }
    println!("{compared} numbers, worst difference {worst:.1e}, {rebounds} rebounds");
    assert!(table.is_empty(), "\n{table}");
    assert!(rebounds > 200);
}

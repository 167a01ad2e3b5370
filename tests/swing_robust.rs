//! The planar solver over a thousand planes at and beyond the edges, and its energy account.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;
mod swing_support;

use swing_support::{physical_plane, wild_plane};
use underfoot::swing::{Approach, PlaneOutcome, Settings, SwingError, solve};

fn numbers(outcome: &PlaneOutcome) -> Vec<f64> {
    let mut all = vec![
        outcome.time_taut_s,
        outcome.speed_at_taut_m_per_s,
        outcome.tangential_speed_at_taut_m_per_s,
        outcome.line_elongation_peak_m,
        outcome.other_elongation_peak_m,
        outcome.deployed_m,
        outcome.lowest.time_s,
        outcome.lowest.speed_m_per_s,
        outcome.lowest.at.offset_m,
        outcome.lowest.at.elevation_m,
        outcome.swing_drop_m,
        outcome.end_s,
        outcome.angle_at_taut_rad,
        outcome.angle_at_end_rad,
        outcome.reach_m,
        outcome.energy.total_j(),
        outcome.energy_residual,
        outcome.time_above_s[0],
        outcome.time_above_s[1],
    ];
    all.extend(outcome.peak_force.iter().flat_map(|peak| [peak.value, peak.time_s]));
    all.extend(outcome.levels.iter().chain(&outcome.faces).flat_map(approach));
    for instant in outcome.trajectory.instants(50) {
        all.extend([instant.at.offset_m, instant.at.elevation_m, instant.force_n, instant.deployed_m]);
        all.extend(instant.velocity_m_per_s);
    }
    all
}

fn approach(approach: &Approach) -> Vec<f64> {
    let strike = approach.strike.iter().flat_map(|s| [s.time_s, s.speed_m_per_s, s.drop_equivalent_m]);
    approach.gap_m.into_iter().chain(strike).collect()
}

#[test]
fn a_thousand_random_planes_give_finite_numbers_or_a_named_refusal() {
    // The edges reach far beyond practice: parts a million times as stiff as others. Those are refused early.
    let settings = Settings { time_limit_s: 5.0, most_steps: 4000, ..Settings::default() };
    let (mut solved, mut too_fast, mut worst, mut most) = (0, 0, 0.0_f64, 0);
    for index in 0..1000 {
        let plane = wild_plane(11, index);
        match solve(&plane, &settings) {
            Ok(outcome) => {
                solved += 1;
                worst = worst.max(outcome.energy_residual);
                most = most.max(outcome.work.steps);
                let bad = numbers(&outcome).into_iter().find(|number| !number.is_finite());
                assert!(bad.is_none(), "{index}: {bad:?} {plane:?}");
            }
            Err(SwingError::TooManySteps { .. }) => too_fast += 1,
            Err(error) => panic!("{index}: {error} {plane:?}"),
        }
    }
    println!("{solved} solved, {too_fast} too fast, worst residual {worst:.1e}, at most {most} steps");
    assert!(solved > 800, "{solved} solved");
}

#[test]
fn the_energy_account_closes_on_every_swing_of_practical_size() {
    let (mut worst, mut most) = (0.0_f64, 0);
    for index in 0..400 {
        let setup = physical_plane(5, index, index % 3 == 0);
        let outcome = solve(&setup.plane(), &Settings::default()).expect("a solved swing");
        worst = worst.max(outcome.energy_residual);
        most = most.max(outcome.work.steps);
        let low = outcome.energy;
        let weight = setup.case.mass * setup.case.gravity;
        let height = setup.case.free_fall + outcome.swing_drop_m;
        let off = (low.total_j() - weight * height).abs() / (weight * height);
        assert!(off < 1e-10, "{index}: account at the lowest point off by {off:e}");
    }
    println!("worst residual {worst:.1e}, at most {most} steps");
    assert!(worst < 1e-10, "{worst:e}");
}

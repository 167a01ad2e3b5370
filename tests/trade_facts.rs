//! Facts of the trade as properties of every run.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use proptest::prelude::*;
use support::random::physical;
use support::{Case, Part, Slider};
use underfoot::arrest::oscillator::{Oscillator, Regime};
use underfoot::arrest::{Ended, Mode, Outcome, Settings, solve};

const GRAVITY: f64 = 9.80665;

fn arrest(case: &Case) -> Outcome {
    solve(&case.fall(), &Settings::default()).expect("a solved arrest")
}

fn damped(mass: f64, stiffness: f64, ratio: f64, free_fall: f64) -> Case {
    Case::on(mass, free_fall, Part::damped(stiffness, 2.0 * ratio * (stiffness * mass).sqrt()))
}

/// Instants of the first taut phase, at most eight periods of it.
fn first_phase(case: &Case, outcome: &Outcome, stiffness: f64) -> impl Iterator<Item = f64> + use<> {
    let natural = (stiffness / case.mass).sqrt();
    let end = outcome.time_first_slack_s.unwrap_or(f64::INFINITY).min(outcome.motion.end_s());
    let taut = outcome.time_taut_s;
    let span = (end - taut).min(50.0 / natural);
    (0..=2000_u32).map(move |step| taut + span * f64::from(step) / 2000.0)
}

fn few() -> ProptestConfig {
    ProptestConfig { cases: 200, failure_persistence: None, ..ProptestConfig::default() }
}

proptest! {
    #![proptest_config(few())]

    #[test]
    fn an_overdamped_arrest_crosses_rest_at_most_once(
        mass in 40.0..300.0, k in 500.0..5e5, ratio in 1.000_001..8.0, h in 0.0..6.0,
    ) {
        let case = damped(mass, k, ratio, h);
        let outcome = arrest(&case);
        let noise = 1e-13 * outcome.arrest_distance_m;
        let sides = first_phase(&case, &outcome, k)
            .map(|time| outcome.motion.at(time).travel_m - outcome.hang_travel_m)
            .filter(|off| off.abs() > noise)
            .map(f64::is_sign_positive)
            .collect::<Vec<_>>();
        let crossings = sides.windows(2).filter(|pair| pair[0] != pair[1]).count();
        prop_assert!(crossings <= 1, "{crossings} crossings");
        prop_assert!(!sides[0], "starts above the hang position");
    }

    #[test]
    fn the_critical_arrest_is_the_limit_of_both_sides(
        mass in 40.0..300.0, k in 500.0..5e5, h in 0.5..6.0, part in 0.05..1.0,
    ) {
        let natural = f64::sqrt(k / mass);
        let at = |ratio: f64| {
            let outcome = arrest(&damped(mass, k, ratio, h));
            outcome.motion.at(outcome.time_taut_s + part / natural).travel_m
        };
        let critical = at(1.0);
        let mut last = f64::INFINITY;
        for off in [1e-1, 1e-2, 1e-3, 1e-5] {
            let (under, over) = (at(1.0 - off), at(1.0 + off));
            prop_assert!(under > critical && critical > over, "less damping travels further");
            let apart = (under - critical).max(critical - over) / critical;
            prop_assert!(apart < 0.2 * last && apart < off);
            last = apart;
        }
    }

    #[test]
    fn an_underdamped_arrest_never_crosses_its_envelope(
        mass in 40.0..300.0, k in 500.0..5e5, ratio in 0.0..0.999, h in 0.0..6.0,
    ) {
        let case = damped(mass, k, ratio, h);
        let outcome = arrest(&case);
        let alpha: f64 = case.line.damping / (2.0 * mass);
        let omega = f64::sqrt(k / mass - alpha * alpha);
        let (u0, v0) = (-outcome.hang_travel_m, outcome.speed_at_taut_m_per_s);
        let amplitude = f64::hypot(u0, (v0 + alpha * u0) / omega);
        for time in first_phase(&case, &outcome, k) {
            let off = outcome.motion.at(time).travel_m - outcome.hang_travel_m;
            let bound = amplitude * (-alpha * (time - outcome.time_taut_s)).exp();
            prop_assert!(off.abs() <= bound * (1.0 + 1e-9) + 1e-13 * outcome.arrest_distance_m);
        }
        let offered = Oscillator::new(mass, case.line.damping, k).envelope_amplitude(u0, v0);
        prop_assert!((offered.expect("underdamped") / amplitude - 1.0).abs() < 1e-10);
    }

    #[test]
    fn both_envelope_bounds_lie_at_or_below_the_exact_lowest_point(
        mass in 40.0..300.0, k in 500.0..5e5, ratio in 0.0..0.99, h in 0.0..6.0,
    ) {
        let case = damped(mass, k, ratio, h);
        let outcome = arrest(&case);
        let low = outcome.lowest.expect("underdamped motion turns");
        let of = Oscillator::new(mass, case.line.damping, k);
        let amplitude = of.envelope_amplitude(-outcome.hang_travel_m, outcome.speed_at_taut_m_per_s).expect("swings");
        let coarse = outcome.hang_travel_m + amplitude;
        let tight = outcome.hang_travel_m + amplitude * (-of.decay * (low.time_s - outcome.time_taut_s)).exp();
        prop_assert!(tight >= low.travel_m * (1.0 - 1e-14), "tight {tight} above {}", low.travel_m);
        prop_assert!(coarse >= tight);
    }

    #[test]
    fn the_discriminant_names_the_regime(mass in 1.0..2000.0, k in 100.0..1e6, ratio in 0.0..4.0) {
        let c: f64 = 2.0 * ratio * f64::sqrt(k * mass);
        let regime = Oscillator::new(mass, c, k).regime();
        prop_assume!(f64::abs(ratio - 1.0) > 1e-6);
        let expected = if c * c - 4.0 * mass * k > 0.0 { Regime::Overdamped } else { Regime::Underdamped };
        prop_assert_eq!(regime, expected);
        let critical = Oscillator::new(mass, 2.0 * f64::sqrt(k * mass), k).regime();
        prop_assert_eq!(critical, Regime::Critical);
    }

    #[test]
    fn a_line_never_pushes_and_parts_add_up_to_the_travel(index in 0_u64..100_000) {
        let case = physical(77, index, false);
        let outcome = arrest(&case);
        let end = outcome.motion.end_s().min(outcome.time_taut_s + 6.0);
        let stroke = case.slider.as_ref().map_or(0.0, |slider| slider.stroke);
        let mut deployed = 0.0;
        for step in 0..=3000_u32 {
            let time = outcome.time_taut_s + (end - outcome.time_taut_s) * f64::from(step) / 3000.0;
            let now = outcome.motion.at(time);
            prop_assert!(now.force_n >= -1e-9 * outcome.peak_force_n, "pushes {} at {time}", now.force_n);
            prop_assert!(now.force_n <= outcome.peak_force_n * (1.0 + 2e-9), "{} above the peak at {time}", now.force_n);
            prop_assert!(now.travel_m <= outcome.arrest_distance_m * (1.0 + 1e-12));
            prop_assert!(now.deployed_m >= deployed - 1e-14 && now.deployed_m <= stroke * (1.0 + 1e-12));
            deployed = now.deployed_m;
            let parts = now.elongation_m[0] + now.elongation_m[1] + now.deployed_m;
            let apart = parts - now.travel_m;
            let noise = 1e-11 * (outcome.arrest_distance_m + case.free_fall);
            match now.mode {
                Some(Mode::Slack) => prop_assert!(apart >= -noise, "slack but stretched by {apart:e}"),
                _ => prop_assert!(apart.abs() <= noise, "parts miss the travel by {apart:e} at {time}"),
            }
        }
        prop_assert!((outcome.deployed_m - deployed).abs() <= 1e-12 || end < outcome.motion.end_s());
    }

    #[test]
    fn a_moving_slider_holds_the_force_at_its_own(index in 0_u64..100_000) {
        let mut case = physical(78, index, false);
        let slider = Slider::constant(3e3, 3.3e3, 1.0);
        case = case.with_slider(slider);
        let outcome = arrest(&case);
        for step in 0..=2000_u32 {
            let now = outcome.motion.at(outcome.time_taut_s + f64::from(step) * 1e-3);
            if now.mode == Some(Mode::Sliding) {
                prop_assert!((now.force_n - 3e3).abs() < 1e-6);
            }
            if now.deployed_m > 0.0 && now.deployed_m < 1.0 - 1e-12 {
                prop_assert!(now.force_n <= 3e3 * (1.0 + 1e-9), "{} while stroke is left", now.force_n);
            }
        }
    }

    #[test]
    fn more_mass_or_more_free_fall_never_stops_shorter_on_a_spring(
        mass in 40.0..300.0, k in 500.0..5e5, h in 0.0..6.0, more in 1e-6..0.5,
    ) {
        let at = |mass: f64, h: f64| arrest(&Case::on(mass, h, Part::spring(k)));
        let base = at(mass, h);
        let hang = mass * GRAVITY / k;
        let exact = hang + f64::sqrt(hang * hang + 2.0 * hang * h);
        prop_assert!((base.arrest_distance_m / exact - 1.0).abs() < 1e-12);
        prop_assert!((base.peak_force_n / (k * exact) - 1.0).abs() < 1e-12);
        for next in [at(mass * (1.0 + more), h), at(mass, h + more)] {
            prop_assert!(next.arrest_distance_m > base.arrest_distance_m);
            prop_assert!(next.peak_force_n > base.peak_force_n);
        }
    }

    #[test]
    fn the_force_factor_of_a_rope_depends_on_fall_factor_alone(
        mass in 40.0..300.0, modulus in 5e3..6e4, factor in 0.0..2.0, length in 0.5..30.0,
    ) {
        let at = |length: f64| arrest(&Case::on(mass, factor * length, Part::spring(modulus / length))).peak_force_n;
        prop_assert!((at(length) / at(1.0) - 1.0).abs() < 1e-11);
    }

    #[test]
    fn scaling_mass_stiffness_and_damping_together_scales_the_force_alone(index in 0_u64..100_000, by in 0.2..5.0) {
        let case = physical(79, index, false);
        let mut scaled = case.clone();
        scaled.mass *= by;
        for part in [&mut scaled.line, &mut scaled.other] {
            if let support::Law::Linear(k) = &mut part.law {
                *k *= by;
            }
            part.damping *= by;
        }
        if let Some(slider) = &mut scaled.slider {
            slider.onset *= by;
            slider.force.iter_mut().for_each(|knot| knot.1 *= by);
        }
        let (one, other) = (arrest(&case), arrest(&scaled));
        prop_assert!((other.arrest_distance_m / one.arrest_distance_m - 1.0).abs() < 1e-9);
        prop_assert!(f64::abs(other.peak_force_n / one.peak_force_n / by - 1.0) < 1e-9);
        prop_assert_eq!(other.slack_episodes, one.slack_episodes);
    }
}

#[test]
fn an_overdamped_load_put_on_without_free_fall_never_turns() {
    for (mass, k, ratio) in [(42.0, 7.6e4, 1.13), (100.0, 1e4, 1.5), (80.0, 2e3, 1.01), (1500.0, 3e5, 3.0)] {
        let outcome = arrest(&damped(mass, k, ratio, 0.0));
        assert_eq!(outcome.lowest, None, "ratio {ratio}");
        assert_eq!(outcome.rebound_rise_m, None);
        assert!((outcome.arrest_distance_m / outcome.hang_travel_m - 1.0).abs() < 1e-14);
    }
}

#[test]
fn a_rebound_that_tops_out_after_the_run_has_settled_is_not_told() {
    let (mass, k) = (141.0, 2218.0);
    let outcome = arrest(&damped(mass, k, 0.571_5, 0.345));
    let Ended::Settled { time_s } = outcome.ended else { panic!("must settle") };
    let low = outcome.lowest.expect("underdamped motion turns");
    let half_period = std::f64::consts::PI / f64::sqrt(k / mass * (1.0 - 0.571_5 * 0.571_5));
    assert!(time_s < low.time_s + half_period, "the next highest comes after settling");
    assert_eq!(outcome.rebound_rise_m, None);
}

#[test]
fn a_load_put_on_without_free_fall_stretches_a_spring_twice_as_far_as_at_rest() {
    let outcome = arrest(&Case::on(250.0, 0.0, Part::spring(8e3)));
    assert!((outcome.arrest_distance_m / outcome.hang_travel_m - 2.0).abs() < 1e-12);
    assert!((outcome.peak_force_n / (250.0 * GRAVITY) - 2.0).abs() < 1e-12);
    assert_eq!(outcome.time_first_slack_s, None, "touching no force is not slack");
}

//! Joining several damped parts into one spring and one damper is right to first order in the damping: held against a
//! full integration that keeps every part's own stretch.
#![allow(clippy::unwrap_used, reason = "tests fail by panicking")]
use underfoot::arrest::{Fall, Settings, solve};
use underfoot::physics::{Group, SeriesPath};

const MASS: f64 = 100.0;
const GRAVITY: f64 = 9.80665;
const FREE_FALL: f64 = 1.0;

/// Stiffness and damping of line, harness and anchor; `share` scales the damping of all.
fn parts(share: f64) -> [(f64, f64); 3] {
    [(30e3, 300.0 * share), (80e3, 500.0 * share), (120e3, 900.0 * share)]
}

/// Rates of travel, speed and the three stretches. One force runs through all parts and their stretches add up to the
/// travel: `T = (v + sum k_i e_i / c_i) / sum 1/c_i`.
fn rates(parts: &[(f64, f64); 3], y: &[f64; 5]) -> [f64; 5] {
    let [_, v, e @ ..] = *y;
    let flow: f64 = parts.iter().zip(e).map(|(&(k, c), e)| k * e / c).sum();
    let force = (v + flow) / parts.iter().map(|&(_, c)| 1.0 / c).sum::<f64>();
    let stretch = |i: usize| (force - parts[i].0 * e[i]) / parts[i].1;
    [v, GRAVITY - force / MASS, stretch(0), stretch(1), stretch(2)]
}

/// Travel at the first lowest point by the classical fourth-order method (Runge and Kutta), steps of 2 microseconds.
fn lowest_with_every_part(parts: &[(f64, f64); 3]) -> f64 {
    let h = 2e-6;
    let add = |y: &[f64; 5], k: &[f64; 5], t: f64| std::array::from_fn(|i| y[i] + t * k[i]);
    let mut y = [0.0, (2.0 * GRAVITY * FREE_FALL).sqrt(), 0.0, 0.0, 0.0];
    loop {
        let k1 = rates(parts, &y);
        let k2 = rates(parts, &add(&y, &k1, 0.5 * h));
        let k3 = rates(parts, &add(&y, &k2, 0.5 * h));
        let k4 = rates(parts, &add(&y, &k3, h));
        let next: [f64; 5] = std::array::from_fn(|i| y[i] + h / 6.0 * (k1[i] + 2.0 * k2[i] + 2.0 * k3[i] + k4[i]));
        if next[1] <= 0.0 {
            return y[0] + 0.5 * y[1] * h;
        }
        y = next;
    }
}

/// The same with the harness and the anchor joined, as an estimate joins them.
fn lowest_joined(parts: &[(f64, f64); 3]) -> f64 {
    let path = SeriesPath {
        line: Group::damped(parts[0].0, parts[0].1),
        other: Group::in_series(&parts[1..]),
        absorber: None,
    };
    let fall =
        Fall { mass_kg: MASS, gravity_m_per_s2: GRAVITY, free_fall_m: FREE_FALL, speed_at_taut_m_per_s: None, path };
    solve(&fall, &Settings::default()).unwrap().arrest_distance_m
}

fn difference(share: f64) -> f64 {
    let parts = parts(share);
    let exact = lowest_with_every_part(&parts);
    ((lowest_joined(&parts) - exact) / exact).abs()
}

#[test]
fn joining_damped_parts_is_within_a_tenth_of_a_percent_at_usual_damping() {
    assert!(difference(1.0) < 1e-3, "{}", difference(1.0));
}

#[test]
fn the_error_of_joining_falls_faster_than_the_damping() {
    let (whole, half) = (difference(1.0), difference(0.5));
    assert!(half < 0.35 * whole, "{whole:e} at full damping, {half:e} at half");
}

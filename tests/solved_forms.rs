//! The form that is given for each mode of a run is its motion: from the state at its start it leads to that at its end.
#![allow(clippy::panic, clippy::unwrap_used, reason = "a test fails by panicking")]
use std::fs;
use underfoot::estimate::{Form, ModeView, estimate};
use underfoot::scenario::load;

/// `cos` and `sin/omega`, or `cosh` and `sinh` over the half distance of real roots.
fn pair(square: f64, tau: f64) -> (f64, f64) {
    let w = square.abs().sqrt();
    if w == 0.0 {
        (1.0, tau)
    } else if square > 0.0 {
        ((w * tau).cos(), (w * tau).sin() / w)
    } else {
        ((w * tau).cosh(), (w * tau).sinh() / w)
    }
}

/// Travel at the end of a mode by its form; none where the form has no constants of its own.
fn travel(mode: &ModeView) -> Option<f64> {
    let (start, tau) = (&mode.start, mode.end.time_s - mode.start.time_s);
    Some(match mode.form {
        Form::Oscillation { rest_m, decay_per_s, square_per_s2, from_rest_m } => {
            let (c, s) = pair(square_per_s2, tau);
            let slope = start.speed_m_per_s + decay_per_s * from_rest_m;
            rest_m + (-decay_per_s * tau).exp() * (from_rest_m * c + slope * s)
        }
        Form::Constant { acceleration_m_per_s2: a } => start.travel_m + start.speed_m_per_s * tau + 0.5 * a * tau * tau,
        Form::Third { rest_m, real_per_s, decay_per_s, square_per_s2, coefficients } => {
            let [p, q, r] = coefficients?;
            let (c, s) = pair(square_per_s2, tau);
            rest_m + (-decay_per_s * tau).exp() * (p * c + q * s) + r * (real_per_s * tau).exp()
        }
        Form::Fourth => return None,
    })
}

#[test]
fn every_mode_of_every_shipped_run_ends_where_its_form_says() {
    let mut seen = [0; 3];
    for entry in fs::read_dir("scenarios").unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let Ok(run) = estimate(&load(&path).unwrap().scenario) else { panic!("{path:?} has no estimate") };
        for mode in &run.solved.modes {
            let Some(by_form) = travel(mode) else { continue };
            let scale = run.solved.free_fall_m + mode.end.travel_m.abs();
            assert!((by_form - mode.end.travel_m).abs() <= 1e-9 * scale, "{path:?}: {mode:?} {by_form}");
            seen[match mode.form {
                Form::Oscillation { .. } => 0,
                Form::Constant { .. } => 1,
                _ => 2,
            }] += 1;
        }
    }
    assert!(seen.iter().all(|count| *count > 10), "{seen:?}");
}

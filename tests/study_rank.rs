//! The shares of variance against functions whose shares are known.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use approx::assert_abs_diff_eq;
use std::f64::consts::PI;
use std::path::Path;
use underfoot::margin::CheckKind;
use underfoot::scenario::load;
use underfoot::study::{Evaluator, Target, bars, importance, importance_of};

/// Saltelli et al. (2008), Global Sensitivity Analysis, ch. 4: a 7, b 0.1.
#[test]
fn the_ishigami_function_has_its_published_shares() {
    let value = |u: &[f64]| {
        let x: Vec<f64> = u.iter().map(|u| (2.0 * u - 1.0) * PI).collect();
        Some(x[0].sin() + 7.0 * x[1].sin().powi(2) + 0.1 * x[2].powi(4) * x[0].sin())
    };
    let first = [0.313_905_191_1, 0.442_411_144_8, 0.0];
    let total = [0.557_588_855_2, 0.442_411_144_8, 0.243_683_664_1];
    for seed in [1, 2, 3] {
        let ranking = importance_of(3, 4096, seed, &value).unwrap();
        assert_eq!(ranking.without_value, 0);
        for input in &ranking.inputs {
            assert_abs_diff_eq!(input.first.value, first[input.input], epsilon = 1e-2);
            assert_abs_diff_eq!(input.total.value, total[input.input], epsilon = 1e-2);
            assert!(input.total.low <= total[input.input] && total[input.input] <= input.total.high);
            assert!(input.first.low <= first[input.input] && first[input.input] <= input.first.high);
        }
    }
}

// g = prod (|4u - 2| + a)/(1 + a): V_i = 1/(3 (1 + a)^2), V = prod(1 + V_i) - 1, S_i = V_i/V, S_Ti = V_i prod of the
// other (1 + V_j) / V (Saltelli and Sobol' 1995).
#[test]
fn the_g_function_has_its_closed_form_shares() {
    let a = [0.0, 1.0, 4.5, 9.0];
    let value = |u: &[f64]| Some(u.iter().zip(a).map(|(u, a)| ((4.0 * u - 2.0).abs() + a) / (1.0 + a)).product());
    let parts = a.map(|a| 1.0 / (3.0 * (1.0 + a) * (1.0 + a)));
    let product: f64 = parts.iter().map(|v| 1.0 + v).product();
    let ranking = importance_of(4, 4096, 1, &value).unwrap();
    assert_eq!(ranking.inputs.len(), 4);
    for input in &ranking.inputs {
        let own = parts[input.input];
        assert_abs_diff_eq!(input.first.value, own / (product - 1.0), epsilon = 1e-2);
        assert_abs_diff_eq!(input.total.value, own * product / (1.0 + own) / (product - 1.0), epsilon = 1e-2);
    }
}

#[test]
fn points_without_a_value_are_counted() {
    let value = |u: &[f64]| (u[0] > 0.25).then_some(u[0] + u[1]);
    let ranking = importance_of(2, 1024, 1, &value).unwrap();
    // Both A and B need their first coordinate above 0.25.
    let expected = 1024.0 * (1.0 - 0.75 * 0.75);
    assert_abs_diff_eq!(f64::from(u32::try_from(ranking.without_value).unwrap()), expected, epsilon = 10.0);
}

#[test]
fn a_function_that_does_not_vary_has_no_shares() {
    assert!(importance_of(2, 64, 1, &|_| Some(3.7)).unwrap().inputs.is_empty());
}

#[test]
fn the_only_band_has_the_whole_variance_and_the_only_bar() {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios/roof-foot-level.toml");
    let evaluator = Evaluator::new(&load(&path).unwrap().scenario).unwrap();
    let target = Target::Margin(CheckKind::Clearance(0));
    let ranking = importance(&evaluator, &target, 512, 1).unwrap();
    assert_eq!(evaluator.inputs()[ranking.inputs[0].input].path, "subject.mass");
    assert_abs_diff_eq!(ranking.inputs[0].first.value, 1.0, epsilon = 1e-2);
    assert_abs_diff_eq!(ranking.inputs[0].total.value, 1.0, epsilon = 1e-2);
    let bars = bars(&evaluator, &target).unwrap();
    assert_eq!(bars.len(), 1);
    assert!(bars[0].low > bars[0].typical && bars[0].typical > bars[0].high);
}

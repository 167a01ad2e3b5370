//! Two damped parts in series with an absorber whose force rises: against the general-purpose integrator, to rest.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use support::compare::rows;
use support::{Case, Fineness, Part, Slider, numbers};
use underfoot::arrest::{Happening, Settings, solve};

fn case(mass: f64, free_fall: f64, line: Part, other: Part, force: &[(f64, f64)], onset: f64) -> Case {
    let stroke = force.last().expect("a knot").0;
    let slider = Slider { force: force.to_vec(), onset, stroke };
    Case::on(mass, free_fall, line).with_other(other).with_slider(slider)
}

fn cases() -> Vec<Case> {
    let rising = [(0.0, 2500.0), (0.4, 3500.0), (1.5, 4500.0)];
    let short = [(0.0, 2500.0), (0.25, 3500.0)];
    let curve = support::Law::Curve(vec![(0.0, 0.0), (0.03, 1200.0), (0.1, 6000.0)]);
    vec![
        case(100.0, 2.0, Part::damped(6e4, 400.0), Part::damped(4e4, 900.0), &rising, 2500.0),
        case(80.0, 1.0, Part::damped(2e5, 300.0), Part::damped(3e4, 2500.0), &rising, 3100.0),
        case(100.0, 2.0, Part::damped(6e4, 400.0), Part::damped(4e4, 900.0), &short, 2500.0),
        case(90.0, 1.8, Part { law: curve, damping: 250.0 }, Part::damped(5e4, 600.0), &rising, 2600.0),
        case(70.0, 0.0, Part::damped(2e4, 150.0), Part::damped(2e4, 150.0), &[(0.0, 900.0), (1.0, 1500.0)], 900.0),
    ]
}

#[test]
fn a_rising_absorber_between_two_dampers_agrees_with_the_integrator() {
    for case in cases() {
        let outcome = solve(&case.fall(), &Settings::default()).expect("a solved arrest");
        let starts = outcome.happenings.iter().filter(|happening| happening.1 == Happening::DeploymentStart);
        assert!(starts.count() >= 1 && outcome.deployed_m > 0.05, "{case:?} deploys");
        assert!(outcome.energy_residual < 1e-9);
        let settings = Settings::default();
        let reference = numbers(&case, Fineness::default(), settings.levels_n);
        let rows = rows(&case, &outcome, &reference);
        assert!(rows.len() > 20);
        let off: Vec<_> = rows.iter().filter(|row| row.difference.is_nan() || row.difference > 1e-6).collect();
        assert!(off.is_empty(), "{case:?}\n{off:#?}");
    }
}

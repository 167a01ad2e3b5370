//! The work three canonical swings take: a change that costs work shows here.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;
mod swing_support;

use support::{Case, Part, Slider};
use swing_support::Setup;
use underfoot::swing::{Settings, solve};

fn counts(case: Case, offset: f64, length: f64) -> String {
    let plane = Setup { case, offset, length }.plane();
    format!("{:?}", solve(&plane, &Settings::default()).expect("a solved swing").work)
}

#[test]
fn a_rigid_pendulum() {
    insta::assert_snapshot!(counts(Case::on(100.0, 0.0, Part::rigid()), 3.0, 5.0), @"WorkCount { modes: 2, steps: 9 }");
}

#[test]
fn an_absorber_on_a_damped_line_with_a_harness() {
    let slider = Slider::constant(4e3, 4.4e3, 1.75);
    let case = Case::on(100.0, 2.0, Part::damped(6e4, 800.0)).with_other(Part::spring(4e4)).with_slider(slider);
    insta::assert_snapshot!(counts(case, 3.0, 5.0), @"WorkCount { modes: 11, steps: 111 }");
}

#[test]
fn a_long_stiff_undamped_line() {
    insta::assert_snapshot!(counts(Case::on(60.0, 1.0, Part::spring(5e5)), 20.0, 60.0), @"WorkCount { modes: 17, steps: 35 }");
}

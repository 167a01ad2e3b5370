//! The work three canonical arrests take: a change that costs work shows here.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use support::{Case, Part, Slider};
use underfoot::arrest::{Settings, solve};

fn counts(case: &Case) -> String {
    let work = solve(&case.fall(), &Settings::default()).expect("a solved arrest").work;
    format!("{work:?}")
}

#[test]
fn a_damped_line_that_settles_after_a_few_rebounds() {
    insta::assert_snapshot!(counts(&Case::on(100.0, 4.0, Part::damped(1e4, 200.0))), @"WorkCount { modes: 11, evaluations: 159 }");
}

#[test]
fn an_absorber_on_a_damped_line_with_a_harness() {
    let slider = Slider::constant(4e3, 4.4e3, 1.75);
    let case = Case::on(100.0, 2.0, Part::damped(6e4, 400.0)).with_other(Part::spring(4e4)).with_slider(slider);
    insta::assert_snapshot!(counts(&case), @"WorkCount { modes: 25, evaluations: 890 }");
}

#[test]
fn an_undamped_line_that_bounces_until_the_time_limit() {
    insta::assert_snapshot!(counts(&Case::on(80.0, 1.0, Part::spring(2e4))), @"WorkCount { modes: 215, evaluations: 2188 }");
}

//! No instant of a run lies above the peaks it reports.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use support::Case;
use support::random::{harsh, physical};
use underfoot::arrest::{Outcome, Settings, solve};

/// Instants looked at in each stretch.
const LOOKS: u32 = 40;

/// The first figure that an instant of the run exceeds: its name, the figure, and the larger one.
fn exceeded(outcome: &Outcome) -> Option<(&'static str, f64, f64)> {
    // Spread over all of a long run.
    let every = outcome.motion.stretches().len().div_ceil(200);
    for stretch in outcome.motion.stretches().iter().step_by(every) {
        for look in 0..=LOOKS {
            let time_s = stretch.start_s + stretch.length_s * f64::from(look) / f64::from(LOOKS);
            let now = underfoot::arrest::Motion::within(stretch, time_s);
            let [line, other] = now.elongation_m;
            for (name, peak, value) in [
                ("force", outcome.peak_force_n, now.force_n),
                ("line stretch", outcome.line_elongation_peak_m, line),
                ("other stretch", outcome.other_elongation_peak_m, other),
            ] {
                if value > peak * (1.0 + 1e-8) + 1e-12 {
                    return Some((name, peak, value));
                }
            }
        }
    }
    None
}

fn check(count: u64, make: impl Fn(u64) -> Case) {
    for index in 0..count {
        let case = make(index);
        let outcome = solve(&case.fall(), &Settings::default()).expect("a solved arrest");
        let found = exceeded(&outcome);
        assert!(found.is_none(), "{index}: {found:?}\n{case:?}");
    }
}

#[test]
fn no_instant_of_a_physical_case_lies_above_its_peaks() {
    check(600, |index| physical(12, index, false));
}

#[test]
fn no_instant_of_a_curved_case_lies_above_its_peaks() {
    check(300, |index| physical(13, index, true));
}

#[test]
fn no_instant_of_a_harsh_case_lies_above_its_peaks() {
    check(600, |index| harsh(11, index));
}

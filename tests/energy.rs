//! The energy account, and plain good behaviour, over ten thousand cases at and beyond the edges.
mod support;

use support::Case;
use support::random::{harsh, physical};
use underfoot::arrest::{Ended, Outcome, Settings, solve};

const RESIDUAL: f64 = 1e-9;

fn figures(outcome: &Outcome) -> Vec<f64> {
    let mut all = vec![
        outcome.time_taut_s,
        outcome.speed_at_taut_m_per_s,
        outcome.peak_force_n,
        outcome.time_peak_force_s,
        outcome.arrest_distance_m,
        outcome.hang_travel_m,
        outcome.rebound_rise_m.unwrap_or(0.0),
        outcome.time_first_slack_s.unwrap_or(0.0),
        outcome.deployed_m,
        outcome.line_elongation_peak_m,
        outcome.other_elongation_peak_m,
        outcome.time_above_s[0],
        outcome.time_above_s[1],
        outcome.energy.kinetic_j,
        outcome.energy.line_j,
        outcome.energy.other_j,
        outcome.energy.absorber_j,
        outcome.energy.damper_j,
        outcome.energy_residual,
    ];
    all.extend(outcome.lowest.into_iter().flat_map(|low| [low.time_s, low.travel_m]));
    all.extend(outcome.happenings.iter().map(|happening| happening.0));
    if let Ended::Settled { time_s } = outcome.ended {
        all.push(time_s);
    }
    all
}

/// What is wrong with a run, if anything.
fn fault(case: &Case) -> Option<String> {
    let outcome = match solve(&case.fall(), &Settings::default()) {
        Ok(outcome) => outcome,
        Err(error) => return Some(format!("refused: {error}")),
    };
    let bad = figures(&outcome).into_iter().find(|figure| !figure.is_finite() || *figure < 0.0);
    if let Some(figure) = bad {
        return Some(format!("a figure is {figure}"));
    }
    if outcome.energy_residual >= RESIDUAL {
        return Some(format!("the account is off by {:e}", outcome.energy_residual));
    }
    if !outcome.happenings.is_sorted_by(|a, b| a.0 <= b.0) {
        return Some("happenings out of order".to_owned());
    }
    account_at_lowest(case, &outcome).or_else(|| jump(case, &outcome))
}

/// The account, added up from outside.
fn account_at_lowest(case: &Case, outcome: &Outcome) -> Option<String> {
    let account = outcome.energy;
    let sum = account.kinetic_j + account.line_j + account.other_j + account.absorber_j + account.damper_j;
    let fallen = case.mass * case.gravity * (case.free_fall + outcome.arrest_distance_m);
    let off = (sum - fallen).abs() / fallen;
    (off >= RESIDUAL).then(|| format!("the account at the lowest point is off by {off:e}"))
}

/// Travel and speed must run on across every change of mode; only the force may jump.
fn jump(case: &Case, outcome: &Outcome) -> Option<String> {
    let top = outcome.speed_at_taut_m_per_s + (2.0 * case.gravity * outcome.arrest_distance_m).sqrt();
    for (time, what) in outcome.happenings.iter().take(40) {
        let step = 1e-12 * time.max(1e-3);
        let before = outcome.motion.at(time - step);
        let after = outcome.motion.at(time + step);
        let span = after.time_s - before.time_s;
        let most = before.force_n.max(after.force_n).max(outcome.peak_force_n) / case.mass + case.gravity;
        let far = (after.travel_m - before.travel_m).abs();
        if far > 2.0 * top * span + 1e-11 * (outcome.arrest_distance_m + case.free_fall) {
            return Some(format!("travel jumps by {far:e} at {what:?}, {time} s"));
        }
        let fast = (after.speed_m_per_s - before.speed_m_per_s).abs();
        if fast > 2.0 * most * span + 1e-10 * top {
            return Some(format!("speed jumps by {fast:e} at {what:?}, {time} s"));
        }
    }
    None
}

fn check(count: u64, make: impl Fn(u64) -> Case) {
    let faults: Vec<String> = (0..count)
        .filter_map(|index| {
            let case = make(index);
            fault(&case).map(|fault| format!("{index}: {fault}\n    {case:?}"))
        })
        .collect();
    assert!(faults.is_empty(), "{} of {count}:\n{}", faults.len(), faults[..faults.len().min(25)].join("\n"));
}

#[test]
fn the_account_balances_on_seven_thousand_harsh_cases() {
    check(7000, |index| harsh(11, index));
}

#[test]
fn the_account_balances_on_three_thousand_physical_cases() {
    check(3000, |index| physical(12, index, false));
}

#[test]
fn equal_input_gives_equal_bits() {
    for index in 0..200 {
        let case = harsh(13, index);
        let run = || solve(&case.fall(), &Settings::default()).map(|outcome| (figures(&outcome), outcome.work)).ok();
        assert_eq!(run(), run(), "case {index}");
    }
}

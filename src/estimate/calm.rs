//! When a run may end before it has settled: once nothing that it has reached can be reached again.
use crate::arrest::{Fall, Outcome, Settings};
use crate::physics::Elastic;

/// How far a run is followed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Reach {
    /// Until it has settled.
    Settled,
    /// Until no later peak can be higher; what only the settling tells is left out.
    Peaks,
}

/// The run ends a little below the energy that would be enough.
const BELOW: f64 = 0.9;
/// A first look at the peaks: to half of the fall energy, and no longer than a fall takes.
const FIRST_LOOK: Settings = Settings { time_limit_s: 10.0, settled_share: 0.5, levels_n: [4000.0, 6000.0] };

/// Settings of a first look, whose peaks are mostly those of the whole run.
pub const fn first_look() -> Settings {
    FIRST_LOOK
}

/// Settings that end a run like this one when it is calm; none where its peaks do not tell.
pub fn calm_settings(outcome: &Outcome) -> Option<Settings> {
    let share = BELOW * enough_j(outcome)? / fall_j(outcome);
    let usual = Settings::default();
    (share > usual.settled_share).then_some(Settings { settled_share: share, ..usual })
}

/// Whether a run that ended with these settings was calm by its own peaks.
pub fn was_calm(outcome: &Outcome, settings: &Settings) -> bool {
    enough_j(outcome).is_some_and(|enough| settings.settled_share * fall_j(outcome) < enough)
}

/// Drops what only the settling tells.
pub fn forget_settling(outcome: &mut Outcome) {
    outcome.ended = crate::arrest::Ended::TimeLimit;
    outcome.rebound_rise_m = None;
    outcome.time_highest_s = None;
    outcome.time_first_slack_s = None;
    outcome.slack_episodes = 0;
}

/// `m g (h + x)`, J.
fn fall_j(outcome: &Outcome) -> f64 {
    let fall = &outcome.fall;
    let start = 0.5 * fall.mass_kg * outcome.speed_at_taut_m_per_s * outcome.speed_at_taut_m_per_s;
    start + fall.weight_n() * outcome.arrest_distance_m
}

/// Least energy above the hang position, J, with which the run could reach its largest force, move the slider, stretch a
/// group as far or come as low again; none where that cannot be said.
///
/// With `V_i(e) = U_i(e) - U_i(e_hang) - m g (e - e_hang) >= 0` the energy above the hang position is `m v^2 / 2 + V_1 +
/// V_2`. It never rises while the slider rests, and group 2 has no damper, so that its stretch is the force: a force
/// above T needs `V_2(e_2(T))`, a travel needs the least `V_1 + V_2` of all splits, which has equal forces.
fn enough_j(outcome: &Outcome) -> Option<f64> {
    let fall = &outcome.fall;
    let (line, other) = (&fall.path.line.elastic, &fall.path.other.elastic);
    let lowest = outcome.lowest?;
    if fall.path.other.is_damped() || matches!(other, Elastic::Rigid) {
        return None;
    }
    let moving = fall.path.absorber.as_ref().filter(|_| !outcome.stroke_used_up).map_or(f64::INFINITY, |absorber| {
        if outcome.deployed_m > 0.0 { absorber.force.value(outcome.deployed_m) } else { absorber.onset_n }
    });
    let force_n = outcome.peak_force_n.min(moving);
    let force = above_hang_j(fall, other, other.elongation_m(force_n))?;
    let stretch = above_hang_j(fall, line, outcome.line_elongation_peak_m).unwrap_or(f64::INFINITY);
    let elongation = |n: f64| line.elongation_m(n) + other.elongation_m(n);
    let wanted = lowest.travel_m - outcome.deployed_m;
    let static_n = bisect(fall.weight_n(), 10.0 * outcome.peak_force_n, |n| elongation(n) < wanted);
    let travel = above_hang_j(fall, other, other.elongation_m(static_n))?
        + above_hang_j(fall, line, line.elongation_m(static_n)).unwrap_or(0.0);
    Some(force.min(stretch).min(travel))
}

/// `V` of one group at a stretch beyond that of the hang position, J; none below it, and for a rigid group.
fn above_hang_j(fall: &Fall, law: &Elastic, elongation_m: f64) -> Option<f64> {
    let hang = law.elongation_m(fall.weight_n());
    let above = law.energy_j(elongation_m) - law.energy_j(hang) - fall.weight_n() * (elongation_m - hang);
    (elongation_m > hang && above > 0.0).then_some(above)
}

/// The last value at which a condition that holds at first still holds.
fn bisect(mut low: f64, mut high: f64, holds: impl Fn(f64) -> bool) -> f64 {
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if holds(middle) { low = middle } else { high = middle }
    }
    low
}

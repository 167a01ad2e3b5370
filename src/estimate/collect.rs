//! The numbers of one run under their ids.
use super::setup::Setup;
use super::{Elevations, Envelope, Numbers, Value};
use crate::arrest::oscillator::{Regime, Swing};
use crate::arrest::signal::Signal;
use crate::arrest::{Ended, EnergyAccount, Fall, Mode, Outcome, Stretch};
use crate::scenario::{Scenario, SubjectKind};

/// Every number that applies, in the order of the definitions.
pub fn numbers(scenario: &Scenario, setup: &Setup, outcome: &Outcome, elevations: Option<&Elevations>) -> Numbers {
    let mut n = Numbers::default();
    let fall = &setup.fall;
    start(&mut n, scenario, fall, outcome);
    forces(&mut n, setup, outcome);
    lengths(&mut n, fall, outcome);
    if let Some(elevations) = elevations {
        heights(&mut n, scenario, elevations);
    }
    afterwards(&mut n, outcome);
    span(&mut n, setup, outcome);
    oscillation(&mut n, outcome);
    put_energy(&mut n, &outcome.energy, outcome.energy_residual);
    n
}

/// The energy account at the lowest point.
pub fn put_energy(n: &mut Numbers, energy: &EnergyAccount, residual: f64) {
    n.put("line_work", energy.line_j);
    n.put("other_work", energy.other_j);
    n.put("absorber_work", energy.absorber_j);
    n.put("damper_work", energy.damper_j);
    n.put("energy_residual", residual);
}

fn span(n: &mut Numbers, setup: &Setup, outcome: &Outcome) {
    let Some(span) = &setup.span else { return };
    let peak = span.peak(outcome);
    n.put("span_tension_peak", peak.tension_n);
    n.put("span_sag_peak", peak.deflection_m);
    n.put("span_end_force", peak.tension_n);
    if let (Some(given), Some(stroke_m)) = (outcome.span, span.stroke_m()) {
        n.put("span_deployed_length", given.deployed_m);
        n.put("span_stroke_left", stroke_m - given.deployed_m);
        n.put("span_stroke_used_up", f64::from(u8::from(given.used_up)));
        n.put("span_absorber_work", outcome.energy.span_absorber_j);
    }
}

/// What the absorber has done, where there is one.
pub fn absorber(n: &mut Numbers, fall: &Fall, deployed_m: f64, stroke_used_up: bool) {
    if let Some(absorber) = &fall.path.absorber {
        n.put("deployed_length", deployed_m);
        n.put("stroke_left", absorber.stroke_m - deployed_m);
        n.put("stroke_used_up", f64::from(u8::from(stroke_used_up)));
    }
}

fn start(n: &mut Numbers, scenario: &Scenario, fall: &Fall, outcome: &Outcome) {
    n.put("free_fall_distance", fall.free_fall_m);
    n.put_some("fall_factor", scenario.line.length.map(|l| fall.free_fall_m / l.si()));
    n.put("fall_energy", fall.weight_n() * fall.free_fall_m);
    n.put("speed_at_taut", outcome.speed_at_taut_m_per_s);
    n.put("time_taut", outcome.time_taut_s);
}

fn forces(n: &mut Numbers, setup: &Setup, outcome: &Outcome) {
    let fall = &setup.fall;
    let weight = fall.weight_n();
    n.put("arrest_force_peak", outcome.peak_force_n);
    n.put("time_peak_force", outcome.time_peak_force_s);
    let tension = setup.span.as_ref().map(|span| span.peak(outcome).tension_n);
    n.put("anchor_force_peak", tension.unwrap_or(outcome.peak_force_n));
    n.put("deceleration_peak", (outcome.peak_force_n - weight) / weight);
    let mean = |time_s: f64| outcome.speed_at_taut_m_per_s / (time_s - outcome.time_taut_s) / fall.gravity_m_per_s2;
    n.put_some("deceleration_mean", outcome.lowest.map(|l| mean(l.time_s)));
    n.put("time_above_4kn", outcome.time_above_s[0]);
    n.put("time_above_6kn", outcome.time_above_s[1]);
}

fn lengths(n: &mut Numbers, fall: &Fall, outcome: &Outcome) {
    n.put("line_elongation_peak", outcome.line_elongation_peak_m);
    n.put("other_elongation_peak", outcome.other_elongation_peak_m);
    absorber(n, fall, outcome.deployed_m, outcome.stroke_used_up);
    n.put("arrest_distance", outcome.arrest_distance_m);
    n.put("total_fall_distance", fall.free_fall_m + outcome.arrest_distance_m);
    n.put("hang_travel", outcome.hang_travel_m);
    n.put_some("time_lowest", outcome.lowest.map(|l| l.time_s));
}

fn heights(n: &mut Numbers, scenario: &Scenario, elevations: &Elevations) {
    n.put("lowest_attachment", elevations.attachment_lowest_m);
    let lowest = elevations.lowest_point_m();
    match scenario.subject.kind {
        SubjectKind::Person => n.put("lowest_foot", lowest),
        SubjectKind::Load => n.put("lowest_underside", lowest),
    }
    for obstacle in scenario.obstacles.iter().filter(|o| o.is_below(&scenario.subject)) {
        let clearance = lowest - obstacle.top.si();
        n.put(&format!("clearance.{}", obstacle.id()), clearance);
        n.put(&format!("margin.{}", obstacle.id()), clearance - obstacle.reserve.map_or(0.0, |r| r.si()));
    }
}

fn afterwards(n: &mut Numbers, outcome: &Outcome) {
    n.put_some("rebound_rise", outcome.rebound_rise_m);
    n.put_some("time_first_slack", outcome.time_first_slack_s);
    if let Ended::Settled { time_s } = outcome.ended {
        n.put("slack_episodes", f64::from(outcome.slack_episodes));
        n.put("settle_time", time_s);
    }
}

fn oscillation(n: &mut Numbers, outcome: &Outcome) {
    let fall = &outcome.fall;
    let Some(hang) = fall.about_hang() else { return };
    let word = match hang.regime {
        Regime::Overdamped => "overdamped",
        Regime::Critical => "critical",
        Regime::Underdamped => "underdamped",
    };
    n.push("damping_regime", Value::Text(word.to_owned()));
    n.put_some("damping_ratio", hang.pair.map(|(_, ratio)| ratio));
    n.put_some("natural_frequency", hang.pair.map(|(frequency, _)| frequency));
    n.put_some("damped_frequency", hang.damped_frequency);
    let first = outcome.motion.stretches().first().and_then(enveloped);
    // Only while the slider has not moved: then the first taut phase is the only kind of taut phase.
    if let Some((swing, amplitude)) =
        first.filter(|_| fall.path.is_linear() && outcome.deployed_m == 0.0 && hang.damped_frequency.is_some())
    {
        let decay = swing.of.decay;
        n.put("envelope_amplitude", amplitude);
        n.put("envelope_decay", decay);
        n.put("envelope_bound_coarse", outcome.hang_travel_m + amplitude);
        let shrunk = |time_s: f64| amplitude * (-decay * (time_s - outcome.time_taut_s)).exp();
        n.put_some("envelope_bound_tight", outcome.lowest.map(|l| outcome.hang_travel_m + shrunk(l.time_s)));
    }
}

/// The travel of an underdamped taut stretch, and the amplitude of its envelope.
fn enveloped(stretch: &Stretch) -> Option<(Swing, f64)> {
    let Signal::Swing(x) = stretch.x else { return None };
    let from_rest = x.p;
    let speed = stretch.v.value(0.0);
    let amplitude = x.of.envelope_amplitude(from_rest, speed).filter(|_| stretch.mode == Mode::Stuck)?;
    Some((x, amplitude))
}

/// The envelope to draw: of the first taut phase, or after a deployment of the last.
pub fn envelope(outcome: &Outcome) -> Option<Envelope> {
    let stretches = outcome.motion.stretches();
    let stretch = if outcome.deployed_m == 0.0 {
        stretches.first()
    } else {
        stretches.iter().rev().find(|s| s.mode == Mode::Stuck)
    }?;
    let (swing, amplitude_m) = enveloped(stretch)?;
    let hang_m = outcome.hang_travel_m;
    Some(Envelope {
        hang_m,
        amplitude_m,
        decay_per_s: swing.of.decay,
        from_s: stretch.start_s,
        to_s: stretch.start_s + stretch.length_s,
    })
}

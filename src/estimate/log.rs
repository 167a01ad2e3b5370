//! The event log of one run.
use super::setup::Setup;
use super::{Event, EventKind};
use crate::arrest::{Ended, Happening, Instant, Outcome};

/// Events kept from the start of the log; the end of the motion is always kept.
const KEPT: usize = 12;

/// What the fall does, in order of time.
pub fn events(setup: &Setup, outcome: &Outcome) -> Vec<Event> {
    let mut events = vec![event(EventKind::Start, &outcome.motion.at(0.0))];
    if setup.fall.free_fall_m > 0.0 {
        events[0] = event(EventKind::Start, &outcome.motion.falling(0.0));
    }
    events.extend(happenings(setup, outcome));
    let at = |kind, time_s: f64| event(kind, &outcome.motion.at(time_s));
    events.push(Event { force_n: outcome.peak_force_n, ..at(EventKind::PeakForce, outcome.time_peak_force_s) });
    events.extend(outcome.lowest.map(|l| at(EventKind::Lowest, l.time_s)));
    events.extend(outcome.time_highest_s.map(|t| at(EventKind::Highest, t)));
    events.sort_by(|a, b| a.time_s.total_cmp(&b.time_s));
    events.truncate(KEPT);
    events.push(match outcome.ended {
        Ended::Settled { time_s } => at(EventKind::Settled, time_s),
        Ended::TimeLimit => at(EventKind::TimeLimit, outcome.motion.end_s()),
    });
    events
}

fn happenings(setup: &Setup, outcome: &Outcome) -> impl Iterator<Item = Event> {
    let onset_n = setup.fall.path.absorber.as_ref().map(|a| a.onset_n);
    let mut started = false;
    outcome.happenings.iter().map(move |&(time_s, what)| {
        let now = event(kind(what), &outcome.motion.at(time_s));
        let first = what == Happening::DeploymentStart && !std::mem::replace(&mut started, true);
        match onset_n.filter(|_| first) {
            Some(force_n) => Event { force_n, ..now },
            None => now,
        }
    })
}

const fn kind(what: Happening) -> EventKind {
    match what {
        Happening::Taut => EventKind::Taut,
        Happening::DeploymentStart => EventKind::DeploymentStart,
        Happening::DeploymentEnd => EventKind::DeploymentEnd,
        Happening::StrokeUsedUp => EventKind::StrokeUsedUp,
        Happening::Slack => EventKind::Slack,
    }
}

const fn event(kind: EventKind, instant: &Instant) -> Event {
    Event {
        time_s: instant.time_s,
        kind,
        travel_m: instant.travel_m,
        speed_m_per_s: instant.speed_m_per_s,
        force_n: instant.force_n,
        deployed_m: instant.deployed_m,
    }
}

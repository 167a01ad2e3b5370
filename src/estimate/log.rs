//! The event log of one run.
use super::setup::Setup;
use super::{Event, EventKind};
use crate::arrest::{Ended, Happening, Instant, Outcome};

/// Events listed before the end, where those that are always listed leave room for others.
const LISTED: usize = 12;

/// What the fall does, in order of time.
pub fn events(setup: &Setup, outcome: &Outcome) -> Vec<Event> {
    let at = |kind, time_s: f64| event(kind, &outcome.motion.at(time_s));
    let start = if setup.fall.free_fall_m > 0.0 {
        event(EventKind::Start, &outcome.motion.falling(0.0))
    } else {
        at(EventKind::Start, 0.0)
    };
    let mut events = vec![start];
    events.extend(happenings(setup, &outcome.happenings, &at));
    events.retain(|event| event.time_s <= outcome.motion.end_s());
    events.push(Event { force_n: outcome.peak_force_n, ..at(EventKind::PeakForce, outcome.time_peak_force_s) });
    events.extend(outcome.lowest.map(|l| at(EventKind::Lowest, l.time_s)));
    events.extend(outcome.time_highest_s.map(|t| at(EventKind::Highest, t)));
    let end = match outcome.ended {
        Ended::Settled { time_s } => at(EventKind::Settled, time_s),
        Ended::TimeLimit => at(EventKind::TimeLimit, outcome.motion.end_s()),
    };
    in_order(events, end)
}

/// The events in order of time and the end of the motion: every one that counts by itself, then the earliest others up to
/// a dozen; how many more there are stands before the end, unless the one that is left would take no more room.
pub fn in_order(mut events: Vec<Event>, end: Event) -> Vec<Event> {
    events.sort_by(|a, b| a.time_s.total_cmp(&b.time_s));
    let always: Vec<bool> = (0..events.len()).map(|place| is_always_listed(&events, place)).collect();
    let others = always.iter().filter(|always| !**always).count();
    let room = LISTED.saturating_sub(events.len() - others);
    let left_out = if others > room + 1 { others - room } else { 0 };
    let mut still = others - left_out;
    let mut listed = Vec::new();
    for (event, always) in events.into_iter().zip(always) {
        if always || still > 0 {
            still -= usize::from(!always);
            listed.push(event);
        }
    }
    if left_out > 0 {
        listed.push(Event { kind: EventKind::NotListed(left_out), ..end.clone() });
    }
    listed.push(end);
    listed
}

/// Whether the event at `place` stands for itself: all but the repeated changes of mode do.
fn is_always_listed(events: &[Event], place: usize) -> bool {
    let Some(event) = events.get(place) else { return false };
    match event.kind {
        EventKind::Taut | EventKind::DeploymentStart | EventKind::SpanStarts => {
            !events.iter().take(place).any(|earlier| earlier.kind == event.kind)
        }
        EventKind::Slack | EventKind::DeploymentEnd | EventKind::SpanStops => false,
        _ => true,
    }
}

/// The changes of mode as events; the first deployment starts at the onset force.
pub fn happenings(setup: &Setup, happenings: &[(f64, Happening)], at: &impl Fn(EventKind, f64) -> Event) -> Vec<Event> {
    let onset_n = setup.fall.path.absorber.as_ref().map(|a| a.onset_n);
    let mut started = false;
    happenings
        .iter()
        .map(|&(time_s, what)| {
            let now = at(kind(what), time_s);
            let first = what == Happening::DeploymentStart && !std::mem::replace(&mut started, true);
            match onset_n.filter(|_| first) {
                Some(force_n) => Event { force_n, ..now },
                None => now,
            }
        })
        .collect()
}

const fn kind(what: Happening) -> EventKind {
    match what {
        Happening::Taut => EventKind::Taut,
        Happening::DeploymentStart => EventKind::DeploymentStart,
        Happening::DeploymentEnd => EventKind::DeploymentEnd,
        Happening::StrokeUsedUp => EventKind::StrokeUsedUp,
        Happening::Slack => EventKind::Slack,
        Happening::SpanStarts => EventKind::SpanStarts,
        Happening::SpanStops => EventKind::SpanStops,
        Happening::SpanUsedUp => EventKind::SpanUsedUp,
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
        name: None,
    }
}

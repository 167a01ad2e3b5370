//! The event log: what the fall does, in words.
use crate::quantity::{Dimension, UnitSystem, format_si};

/// What happened.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum EventKind {
    /// The fall starts.
    Start,
    /// The line comes taut (first or again).
    Taut,
    /// The absorber starts to deploy.
    DeploymentStart,
    /// Deployment ends.
    DeploymentEnd,
    /// The absorber is locked at its stroke.
    StrokeUsedUp,
    /// Largest line force of the run.
    PeakForce,
    /// Lowest point of the run.
    Lowest,
    /// The line goes slack.
    Slack,
    /// Highest point of a rebound.
    Highest,
    /// Energy above the hang position is below the settled level.
    Settled,
    /// The time limit was hit first.
    TimeLimit,
    /// The swing meets a vertical face.
    StrikeFace,
    /// The swing meets a level obstacle.
    StrikeLevel,
    /// The swing turns back: the end of a planar run.
    TurnsBack,
    /// The absorber in line with a lifeline starts to deploy.
    SpanStarts,
    /// The lifeline turns back: its in-line absorber stops.
    SpanStops,
    /// The absorber in line with a lifeline is locked at its stroke.
    SpanUsedUp,
    /// So many more times, two or more, the line comes taut or goes slack or an absorber starts or stops, which are not listed one by
    /// one; at the time of the end.
    NotListed(usize),
}

/// One line of the log. Values SI; the words are the same in text, JSON and on the screen.
#[derive(Clone, Debug, PartialEq)]
pub struct Event {
    /// Time from the start of the fall, s.
    pub time_s: f64,
    /// What happened.
    pub kind: EventKind,
    /// Travel past taut then, m.
    pub travel_m: f64,
    /// Downward speed then, m/s.
    pub speed_m_per_s: f64,
    /// Line force then, N.
    pub force_n: f64,
    /// Deployed length then, m.
    pub deployed_m: f64,
    /// The face or level that is struck, by its name in the file.
    pub name: Option<String>,
}

impl Event {
    /// `taut at 5.94 m/s`, in the units of the system.
    #[must_use]
    pub fn words(&self, system: UnitSystem) -> String {
        let length = |m: f64| format_si(m, Dimension::Length, system);
        let speed = format_si(self.speed_m_per_s.abs(), Dimension::Speed, system);
        let force = format_si(self.force_n, Dimension::Force, system);
        match self.kind {
            EventKind::Start if self.travel_m < 0.0 => format!("falls {}", length(-self.travel_m)),
            EventKind::Start => "let go with the line just taut".to_owned(),
            EventKind::Taut => format!("taut at {speed}"),
            EventKind::DeploymentStart => format!("absorber starts at {force}"),
            EventKind::DeploymentEnd => format!("absorber stops, {} deployed", length(self.deployed_m)),
            EventKind::StrokeUsedUp => format!("stroke used up at {}", length(self.deployed_m)),
            EventKind::PeakForce => format!("largest line force, {force}"),
            EventKind::Lowest => format!("lowest, {} below taut", length(self.travel_m)),
            EventKind::Slack => {
                format!("slack, {} at {speed}", if self.speed_m_per_s < 0.0 { "rises" } else { "falls" })
            }
            EventKind::Highest => format!("highest, {}", beside_taut(self.travel_m, length)),
            EventKind::Settled => format!("settled, {}", beside_taut(self.travel_m, length)),
            EventKind::StrikeFace => format!("strikes {} at {speed}", self.struck("a face")),
            EventKind::StrikeLevel => format!("strikes {} at {speed}", self.struck("a level")),
            EventKind::TurnsBack => "swing turns back".to_owned(),
            EventKind::SpanStarts => format!("lifeline absorber starts, line force {force}"),
            EventKind::SpanStops => format!("lifeline absorber stops, {} below taut", length(self.travel_m)),
            EventKind::SpanUsedUp => format!("lifeline absorber's stroke used up, line force {force}"),
            EventKind::NotListed(more) => format!("{more} more times taut, slack or giving, not listed"),
            EventKind::TimeLimit => "still moving at the time limit".to_owned(),
        }
    }

    fn struck<'a>(&'a self, unnamed: &'a str) -> &'a str {
        self.name.as_deref().map_or(unnamed, str::trim)
    }
}

fn beside_taut(travel_m: f64, length: impl Fn(f64) -> String) -> String {
    if travel_m < 0.0 {
        format!("{} above taut", length(-travel_m))
    } else {
        format!("{} below taut", length(travel_m))
    }
}

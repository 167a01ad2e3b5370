//! The event log: what the fall does, in words.

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
}

impl Event {
    /// `taut at 5.94 m/s`, in the units of the system.
    #[must_use]
    pub fn words(&self, _system: crate::quantity::UnitSystem) -> String {
        todo!()
    }
}

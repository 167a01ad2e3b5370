//! The motion over time, exact at any instant.

/// What the line is doing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mode {
    /// Free fall before the line is taut.
    Falling,
    /// Taut, absorber (if any) not moving.
    Taut,
    /// Taut, absorber deploying.
    Deploying,
    /// Slack after having been taut.
    Slack,
}

impl Mode {
    /// `falling`, `taut`, `deploying`, `slack`.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Falling => "falling",
            Self::Taut => "taut",
            Self::Deploying => "deploying",
            Self::Slack => "slack",
        }
    }
}

/// A stretch of time in one mode.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Phase {
    /// Start, s from the start of the fall.
    pub from_s: f64,
    /// End, s.
    pub to_s: f64,
    /// Mode.
    pub mode: Mode,
}

/// The state at one instant.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sample {
    /// Time from the start of the fall, s.
    pub time_s: f64,
    /// Travel past taut, m (negative before taut: `-free_fall` at the start).
    pub travel_m: f64,
    /// Downward speed, m/s.
    pub speed_m_per_s: f64,
    /// Line force, N.
    pub force_n: f64,
    /// Stretch of the line, m.
    pub line_elongation_m: f64,
    /// Stretch of everything else, m.
    pub other_elongation_m: f64,
    /// Deployed length of the absorber, m.
    pub deployed_m: f64,
    /// Mode.
    pub mode: Mode,
}

/// The whole motion from the start of the fall until settled or the time limit.
#[derive(Clone, Debug)]
pub struct Trace {}

impl Trace {
    /// Phases in order; they touch each other.
    #[must_use]
    pub fn phases(&self) -> &[Phase] {
        todo!()
    }
    /// End of the motion, s from the start of the fall.
    #[must_use]
    pub fn end_s(&self) -> f64 {
        todo!()
    }
    /// The exact state at a time, clamped to `0..=end_s`.
    #[must_use]
    pub fn at(&self, _time_s: f64) -> Sample {
        todo!()
    }
    /// Samples with at most `step_s` between them and every phase boundary on both sides.
    #[must_use]
    pub fn samples(&self, _from_s: f64, _to_s: f64, _step_s: f64) -> Vec<Sample> {
        todo!()
    }
}

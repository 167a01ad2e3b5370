//! The motion over time, exact at any instant.
use crate::arrest::{self, Instant, Motion};
use std::sync::Arc;

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

    const fn of(mode: Option<arrest::Mode>) -> Self {
        match mode {
            None => Self::Falling,
            Some(arrest::Mode::Stuck) => Self::Taut,
            Some(arrest::Mode::Sliding) => Self::Deploying,
            Some(arrest::Mode::Slack) => Self::Slack,
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

impl From<Instant> for Sample {
    fn from(i: Instant) -> Self {
        Self {
            time_s: i.time_s,
            travel_m: i.travel_m,
            speed_m_per_s: i.speed_m_per_s,
            force_n: i.force_n,
            line_elongation_m: i.elongation_m[0],
            other_elongation_m: i.elongation_m[1],
            deployed_m: i.deployed_m,
            mode: Mode::of(i.mode),
        }
    }
}

/// The whole motion from the start of the fall until settled or the time limit. Cheap to clone.
#[derive(Clone, Debug)]
pub struct Trace {
    motion: Arc<Motion>,
    phases: Arc<[Phase]>,
}

impl Trace {
    pub(super) fn new(motion: Motion) -> Self {
        let taut_s = motion.taut_s();
        let falling = (taut_s > 0.0).then_some(Phase { from_s: 0.0, to_s: taut_s, mode: Mode::Falling });
        let rest = motion.stretches().iter().map(|stretch| Phase {
            from_s: stretch.start_s,
            to_s: stretch.start_s + stretch.length_s,
            mode: Mode::of(Some(stretch.mode)),
        });
        let phases = falling.into_iter().chain(rest).collect();
        Self { motion: Arc::new(motion), phases }
    }

    /// Phases in order; they touch each other.
    #[must_use]
    pub fn phases(&self) -> &[Phase] {
        &self.phases
    }

    /// End of the motion, s from the start of the fall.
    #[must_use]
    pub fn end_s(&self) -> f64 {
        self.motion.end_s()
    }

    /// The exact state at a time, clamped to `0..=end_s`.
    #[must_use]
    pub fn at(&self, time_s: f64) -> Sample {
        self.motion.at(time_s).into()
    }

    /// Samples with at most `step_s` between them and every phase boundary on both sides.
    #[must_use]
    pub fn samples(&self, from_s: f64, to_s: f64, step_s: f64) -> Vec<Sample> {
        let mut samples = Vec::new();
        let offset = usize::from(self.phases.len() > self.motion.stretches().len());
        for (index, phase) in self.phases.iter().enumerate() {
            let (from, to) = (phase.from_s.max(from_s), phase.to_s.min(to_s));
            if from > to {
                continue;
            }
            for time in steps(from, to, step_s) {
                samples.push(match index.checked_sub(offset).map(|n| &self.motion.stretches()[n]) {
                    Some(stretch) => Motion::within(stretch, time).into(),
                    None => Sample { mode: Mode::Falling, force_n: 0.0, ..self.before_taut(time) },
                });
            }
        }
        samples
    }

    /// The state in the free fall, up to and including the moment of taut.
    fn before_taut(&self, time_s: f64) -> Sample {
        self.motion.falling(time_s).into()
    }
}

/// `from`, `to`, and evenly spaced times between them, at most `step` apart.
fn steps(from: f64, to: f64, step: f64) -> impl Iterator<Item = f64> {
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to what a screen or file can hold"
    )]
    let count = ((to - from) / step).ceil().clamp(1.0, 1e6) as u32;
    (0..=count).map(move |n| if n == count { to } else { from + (to - from) * f64::from(n) / f64::from(count) })
}

//! The motion over time, exact at any instant.
use crate::arrest::{self, Happening, Instant, Motion};
use crate::swing::{self, Trajectory};
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
    /// Where it is beside the fall line; planar runs only.
    pub plane: Option<PlanePoint>,
}

/// The place of the attachment in a planar run.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PlanePoint {
    /// Horizontal offset from the fall line, m, right positive.
    pub offset_m: f64,
    /// Elevation above the file's datum, m.
    pub elevation_m: f64,
    /// Speed along its path, m/s.
    pub speed_m_per_s: f64,
    /// Angle of the line from the plumb line through the pivot, rad, positive to the right.
    pub angle_rad: f64,
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
            plane: None,
        }
    }
}

/// The whole motion from the start of the fall until its end. Cheap to clone.
#[derive(Clone, Debug)]
pub struct Trace {
    source: Source,
    phases: Arc<[Phase]>,
}

#[derive(Clone, Debug)]
enum Source {
    Vertical(Arc<Motion>),
    /// With the elevation at taut, m.
    Planar(Arc<Trajectory>, f64),
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
        let mut phases: Vec<Phase> = Vec::new();
        for phase in falling.into_iter().chain(rest) {
            // A knot of a table ends a stretch of the solution, not what the line is doing.
            match phases.last_mut().filter(|last| last.mode == phase.mode) {
                Some(last) => last.to_s = phase.to_s,
                None => phases.push(phase),
            }
        }
        Self { source: Source::Vertical(Arc::new(motion)), phases: phases.into() }
    }

    pub(super) fn planar(trajectory: Trajectory, taut_elevation_m: f64, happenings: &[(f64, Happening)]) -> Self {
        let end_s = trajectory.end_s();
        let mut phases = Vec::new();
        let mut from = (0.0, Mode::Falling);
        let ends = happenings.iter().map(|&(time_s, what)| (time_s, mode_after(what)));
        for (time_s, mode) in ends.chain([(end_s, Mode::Falling)]) {
            if time_s > from.0 {
                phases.push(Phase { from_s: from.0, to_s: time_s, mode: from.1 });
            }
            from = (time_s, mode);
        }
        Self { source: Source::Planar(Arc::new(trajectory), taut_elevation_m), phases: phases.into() }
    }

    /// Phases in order; they touch each other.
    #[must_use]
    pub fn phases(&self) -> &[Phase] {
        &self.phases
    }

    /// End of the motion, s from the start of the fall.
    #[must_use]
    pub fn end_s(&self) -> f64 {
        match &self.source {
            Source::Vertical(motion) => motion.end_s(),
            Source::Planar(trajectory, _) => trajectory.end_s(),
        }
    }

    /// The exact state at a time, clamped to `0..=end_s`.
    #[must_use]
    pub fn at(&self, time_s: f64) -> Sample {
        match &self.source {
            Source::Vertical(motion) => motion.at(time_s).into(),
            Source::Planar(trajectory, taut_m) => planar_sample(&trajectory.at(time_s), *taut_m),
        }
    }

    /// Samples with at most `step_s` between them and every phase boundary on both sides.
    #[must_use]
    pub fn samples(&self, from_s: f64, to_s: f64, step_s: f64) -> Vec<Sample> {
        let mut samples = Vec::new();
        for (index, phase) in self.phases.iter().enumerate() {
            let (from, to) = (phase.from_s.max(from_s), phase.to_s.min(to_s));
            if from <= to {
                samples.extend(steps(from, to, step_s).map(|time_s| self.within(index, time_s)));
            }
        }
        samples
    }

    /// The state at a time of one phase, also at its very end.
    fn within(&self, index: usize, time_s: f64) -> Sample {
        let phase = self.phases[index];
        let motion = match &self.source {
            Source::Vertical(motion) => motion,
            Source::Planar(..) => {
                // Just inside the phase: the trajectory counts a boundary to the phase after it.
                let inside = time_s.min(phase.to_s.next_down()).max(phase.from_s);
                return Sample { time_s, mode: phase.mode, ..self.at(inside) };
            }
        };
        if phase.mode == Mode::Falling {
            return motion.falling(time_s).into();
        }
        if time_s < phase.to_s { motion.at(time_s).into() } else { motion.just_before(time_s).into() }
    }
}

const fn mode_after(what: Happening) -> Mode {
    match what {
        Happening::Taut
        | Happening::DeploymentEnd
        | Happening::StrokeUsedUp
        | Happening::SpanStarts
        | Happening::SpanStops
        | Happening::SpanUsedUp => Mode::Taut,
        Happening::DeploymentStart => Mode::Deploying,
        Happening::Slack => Mode::Slack,
    }
}

fn planar_sample(i: &swing::Instant, taut_elevation_m: f64) -> Sample {
    let [across, up] = i.velocity_m_per_s;
    Sample {
        time_s: i.time_s,
        travel_m: taut_elevation_m - i.at.elevation_m,
        speed_m_per_s: -up,
        force_n: i.force_n,
        line_elongation_m: i.elongation_m[0],
        other_elongation_m: i.elongation_m[1],
        deployed_m: i.deployed_m,
        mode: Mode::of(i.mode),
        plane: Some(PlanePoint {
            offset_m: i.at.offset_m,
            elevation_m: i.at.elevation_m,
            speed_m_per_s: across.hypot(up),
            angle_rad: i.angle_rad,
        }),
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

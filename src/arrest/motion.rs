//! The motion over time, exact at any instant.
use super::mode::{Mode, Stretch};

/// What the mass and its path do at one instant. Times run from the start of the fall.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Instant {
    /// Time, s.
    pub time_s: f64,
    /// Travel past taut, m; negative before.
    pub travel_m: f64,
    /// Downward speed, m/s.
    pub speed_m_per_s: f64,
    /// Line force, N.
    pub force_n: f64,
    /// Stretch of the line and of everything else, m.
    pub elongation_m: [f64; 2],
    /// Deployed length, m.
    pub deployed_m: f64,
    /// The mode; none during the free fall before taut.
    pub mode: Option<Mode>,
}

/// The whole motion.
#[derive(Clone, Debug)]
pub struct Motion {
    pub(super) gravity_m_per_s2: f64,
    pub(super) free_fall_m: f64,
    pub(super) stretches: Vec<Stretch>,
}

impl Motion {
    /// The modes in order, each with its exact solution.
    #[must_use]
    pub fn stretches(&self) -> &[Stretch] {
        &self.stretches
    }

    /// Time of first taut, s.
    #[must_use]
    pub fn taut_s(&self) -> f64 {
        self.stretches.first().map_or(0.0, |s| s.start_s)
    }

    /// End of the motion, s.
    #[must_use]
    pub fn end_s(&self) -> f64 {
        self.stretches.last().map_or(0.0, |s| s.start_s + s.length_s)
    }

    /// The state at a time, clamped to the motion; at a change of mode, just after it.
    #[must_use]
    pub fn at(&self, time_s: f64) -> Instant {
        let time_s = time_s.clamp(0.0, self.end_s());
        match self.stretches.partition_point(|s| s.start_s <= time_s) {
            0 => self.falling(time_s),
            n => Self::within(&self.stretches[n - 1], time_s),
        }
    }

    /// The state at a time, clamped to the motion; at a change of mode, just before it.
    #[must_use]
    pub fn just_before(&self, time_s: f64) -> Instant {
        let time_s = time_s.clamp(0.0, self.end_s());
        match self.stretches.partition_point(|s| s.start_s < time_s) {
            0 => self.falling(time_s),
            n => Self::within(&self.stretches[n - 1], time_s),
        }
    }

    /// The state at a time within one stretch.
    #[must_use]
    pub fn within(stretch: &Stretch, time_s: f64) -> Instant {
        let t = time_s - stretch.start_s;
        let state = stretch.state(t);
        Instant {
            time_s,
            travel_m: state.x,
            speed_m_per_s: state.v,
            force_n: stretch.force.value(t),
            elongation_m: state.e,
            deployed_m: state.s,
            mode: Some(stretch.mode),
        }
    }

    /// The state in the free fall before taut.
    #[must_use]
    pub fn falling(&self, time_s: f64) -> Instant {
        let speed = self.gravity_m_per_s2 * time_s;
        Instant {
            time_s,
            travel_m: 0.5 * speed * time_s - self.free_fall_m,
            speed_m_per_s: speed,
            force_n: 0.0,
            elongation_m: [0.0; 2],
            deployed_m: 0.0,
            mode: None,
        }
    }
}

//! The motion over time, at any instant.
use super::law::{Force, Law};
use super::plane::{Plane, Point};
use super::poly::{Poly, value, value_slope};
use super::series::{Body, Series};
use crate::arrest::Mode;

/// What the mass and its path do at one instant. Times run from the start of the fall.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Instant {
    /// Time, s.
    pub time_s: f64,
    /// Where the attachment is.
    pub at: Point,
    /// Horizontal and upward velocity, m/s.
    pub velocity_m_per_s: [f64; 2],
    /// Line force, N.
    pub force_n: f64,
    /// Angle of the line from the plumb line through the pivot, rad, positive on the side of larger offsets.
    pub angle_rad: f64,
    /// Stretch of the line and of everything else, m.
    pub elongation_m: [f64; 2],
    /// Deployed length, m.
    pub deployed_m: f64,
    /// The mode; none during the free fall before taut.
    pub mode: Option<Mode>,
}

/// One step: polynomials over its unit interval.
#[derive(Clone, Debug)]
pub struct Step {
    pub start_s: f64,
    /// Length of the unit interval, s.
    pub unit_s: f64,
    /// Share of it in force.
    pub share: f64,
    pub x: Poly,
    pub z: Poly,
    pub a: [Poly; 2],
    pub law: Law,
    /// Before the line first comes taut.
    pub is_free_fall: bool,
}

impl Step {
    pub fn new(start_s: f64, unit_s: f64, share: f64, series: &Series, law: &Law, is_free_fall: bool) -> Self {
        Self { start_s, unit_s, share, x: series.x, z: series.z, a: series.a, law: *law, is_free_fall }
    }

    pub fn end_s(&self) -> f64 {
        self.start_s + self.unit_s * self.share
    }
}

/// The whole motion.
#[derive(Clone, Debug)]
pub struct Trajectory {
    pub(super) steps: Vec<Step>,
    pub(super) pivot: Point,
    pub(super) body: Body,
}

impl Trajectory {
    pub(super) fn new(plane: &Plane) -> Self {
        let body = Body { mass: plane.mass_kg, gravity: plane.gravity_m_per_s2 };
        Self { steps: Vec::with_capacity(64), pivot: plane.pivot, body }
    }

    /// Time at which it ends, s.
    #[must_use]
    pub fn end_s(&self) -> f64 {
        self.steps.last().map_or(0.0, Step::end_s)
    }

    /// The state at a time, clamped to the motion; at a change of mode, just after it.
    #[must_use]
    pub fn at(&self, time_s: f64) -> Instant {
        let time_s = time_s.clamp(0.0, self.end_s());
        match self.steps[..].partition_point(|s| s.start_s <= time_s) {
            0 => self.nowhere(time_s),
            n => {
                let step = &self.steps[n - 1];
                let share = ((time_s - step.start_s) / step.unit_s).clamp(0.0, step.share);
                self.within(step, share)
            }
        }
    }

    /// `count` instants evenly spread from the start of the fall to the end, both included; at least two.
    pub fn instants(&self, count: usize) -> impl Iterator<Item = Instant> {
        let count = u32::try_from(count.max(2)).unwrap_or(u32::MAX);
        (0..count).map(move |i| self.at(self.end_s() * f64::from(i) / f64::from(count - 1)))
    }

    fn nowhere(&self, time_s: f64) -> Instant {
        Instant {
            time_s,
            at: self.pivot,
            velocity_m_per_s: [0.0; 2],
            force_n: 0.0,
            angle_rad: 0.0,
            elongation_m: [0.0; 2],
            deployed_m: 0.0,
            mode: None,
        }
    }

    pub(super) fn within(&self, step: &Step, share: f64) -> Instant {
        let ((x, dx), (z, dz)) = (value_slope(&step.x, share), value_slope(&step.z, share));
        let velocity = [dx / step.unit_s, dz / step.unit_s];
        let a = [value(&step.a[0], share), value(&step.a[1], share)];
        let rho = x.hypot(z);
        let rate = (x * velocity[0] + z * velocity[1]) / rho;
        let law = &step.law;
        let force_n = match law.force {
            Force::Slack => 0.0,
            Force::Along(force) => force.value(rho, rate, a),
            Force::Held(radius) => {
                let square = velocity[0] * velocity[0] + velocity[1] * velocity[1];
                self.body.mass * (square - self.body.gravity * z) / radius
            }
        };
        Instant {
            time_s: step.start_s + share * step.unit_s,
            at: Point::new(self.pivot.offset_m + x, self.pivot.elevation_m + z),
            velocity_m_per_s: velocity,
            force_n,
            angle_rad: x.atan2(-z),
            elongation_m: [law.e[0].value(rho, 0.0, a), law.e[1].value(rho, 0.0, a)],
            deployed_m: law.s.value(rho, 0.0, a),
            mode: (!step.is_free_fall).then_some(law.mode),
        }
    }
}

//! What comes out of a planar arrest.
use super::plane::Point;
use super::trajectory::Trajectory;
use crate::arrest::{EnergyAccount, Happening};

/// A largest value and when it was reached, s from the start of the fall.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Peak {
    /// The value, SI.
    pub value: f64,
    /// When, s.
    pub time_s: f64,
}

/// How the run ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ended {
    /// At the first reversal of the horizontal velocity.
    Reversal,
    /// Straight above the pivot's plumb line: at the top of the first rebound after the lowest point.
    Rebound,
    /// The time limit came first.
    TimeLimit,
}

/// The deepest point up to the end.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lowest {
    /// Time from the start of the fall, s.
    pub time_s: f64,
    /// Where the attachment is.
    pub at: Point,
    /// Speed there, m/s.
    pub speed_m_per_s: f64,
}

/// A rigid path that comes taut with speed along it: that speed is lost at once and the force has no bound.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Impulse {
    /// Time from the start of the fall, s.
    pub time_s: f64,
    /// Speed lost, m/s.
    pub speed_m_per_s: f64,
    /// Energy lost, J.
    pub lost_j: f64,
}

/// First contact with an obstacle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strike {
    /// Time from the start of the fall, s.
    pub time_s: f64,
    /// Where the attachment is.
    pub at: Point,
    /// Speed, m/s.
    pub speed_m_per_s: f64,
    /// Height of a free fall to the same speed, `v^2 / 2g`, m.
    pub drop_equivalent_m: f64,
}

/// How near the body comes to an obstacle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Approach {
    /// Smallest gap while the body is beside (face) or above (level) it, m; negative when it reaches in. None when the
    /// body is never beside or above it.
    pub gap_m: Option<f64>,
    /// When, s from the start of the fall.
    pub time_s: Option<f64>,
    /// First contact; the motion goes on as if there had been none.
    pub strike: Option<Strike>,
}

/// How much work a solve took; equal input gives equal counts.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct WorkCount {
    /// Modes entered, pieces of tables counted apart.
    pub modes: u32,
    /// Steps taken.
    pub steps: u32,
}

/// Everything one planar arrest gives. Times run from the start of the fall.
#[derive(Clone, Debug)]
pub struct PlaneOutcome {
    /// Straight fall until taut, m.
    pub free_fall_m: f64,
    /// Time when the line first comes taut, s.
    pub time_taut_s: f64,
    /// Where the attachment is then.
    pub taut_at: Point,
    /// Speed then, m/s.
    pub speed_at_taut_m_per_s: f64,
    /// The part of it across the line, m/s: all that a rigid line leaves.
    pub tangential_speed_at_taut_m_per_s: f64,
    /// Largest line force, N; none when an impulse leaves it without a bound.
    pub peak_force: Option<Peak>,
    /// Largest line force outside impulses, N.
    pub peak_force_without_impulses: Peak,
    /// Impulses in a rigid path.
    pub impulses: Vec<Impulse>,
    /// Largest stretch of the line, m.
    pub line_elongation_peak_m: f64,
    /// Largest stretch of everything else, m.
    pub other_elongation_peak_m: f64,
    /// Final deployed length, m.
    pub deployed_m: f64,
    /// Whether the stroke was used up.
    pub stroke_used_up: bool,
    /// First time slack, s.
    pub time_first_slack_s: Option<f64>,
    /// Time above each level of the settings, from taut to the first slack or the end, s.
    pub time_above_s: [f64; 2],
    /// The deepest point up to the end.
    pub lowest: Lowest,
    /// Elevation at taut minus the lowest elevation, m.
    pub swing_drop_m: f64,
    /// How the run ended.
    pub ended: Ended,
    /// When, s.
    pub end_s: f64,
    /// Angle of the line from the plumb line through the pivot at taut, rad, in `0..=pi`.
    pub angle_at_taut_rad: f64,
    /// Angle at the end, rad; negative on the far side of the plumb line.
    pub angle_at_end_rad: f64,
    /// Largest horizontal distance from the start, m.
    pub reach_m: f64,
    /// How near each level came, in the order given.
    pub levels: Vec<Approach>,
    /// How near each face came, in the order given.
    pub faces: Vec<Approach>,
    /// The account at the lowest point.
    pub energy: EnergyAccount,
    /// Largest imbalance of the account over the run, as a share of `m g` times the height lost to the lowest point (at
    /// least a millionth of the free length).
    pub energy_residual: f64,
    /// Work done by the solver.
    pub work: WorkCount,
    /// Mode changes in order: time from the start of the fall in s, and what happened.
    pub happenings: Vec<(f64, Happening)>,
    /// The motion at any time.
    pub trajectory: Trajectory,
}

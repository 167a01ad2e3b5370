//! What goes into a vertical arrest and what comes out.
use super::motion::Motion;
use crate::physics::{SeriesPath, SpanError};

/// A mass falling onto a line.
#[derive(Clone, Debug, PartialEq)]
pub struct Fall {
    /// Mass, kg, `> 0`.
    pub mass_kg: f64,
    /// Gravity, m/s2, `>= 0` (0 only with `speed_at_taut_m_per_s`).
    pub gravity_m_per_s2: f64,
    /// Free-fall distance until the line begins to carry force, m, `>= 0`.
    pub free_fall_m: f64,
    /// Speed at taut where it is not `sqrt(2 g h)`: a thrown mass, or an impact without gravity.
    pub speed_at_taut_m_per_s: Option<f64>,
    /// What the mass hangs on.
    pub path: SeriesPath,
}

impl Fall {
    pub(crate) fn check(&self) -> Result<(), ArrestError> {
        let positive = |what, value: f64| {
            if value > 0.0 && value.is_finite() { Ok(()) } else { Err(ArrestError::Input { what, value }) }
        };
        let not_negative = |what, value: f64| {
            if value >= 0.0 && value.is_finite() { Ok(()) } else { Err(ArrestError::Input { what, value }) }
        };
        positive("mass", self.mass_kg)?;
        not_negative("free fall", self.free_fall_m)?;
        not_negative("gravity", self.gravity_m_per_s2)?;
        if self.free_fall_m > 0.0 {
            positive("gravity", self.gravity_m_per_s2)?;
        }
        if let Some(speed) = self.speed_at_taut_m_per_s {
            not_negative("speed at taut", speed)?;
        }
        for group in [&self.path.line, &self.path.other] {
            if let Some(piece) = group.elastic.piece(0) {
                positive("stiffness", piece.slope)?;
                not_negative("damping", group.damping_n_s_per_m)?;
            }
        }
        if let Some(absorber) = &self.path.absorber {
            positive("deployment force", absorber.force.value(0.0))?;
            positive("stroke", absorber.stroke_m)?;
            if absorber.onset_n.is_nan() || absorber.onset_n < absorber.force.value(0.0) {
                return Err(ArrestError::Input { what: "onset force", value: absorber.onset_n });
            }
        }
        Ok(())
    }
}

/// How far to solve.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Settings {
    /// Longest time from taut, s.
    pub time_limit_s: f64,
    /// The run is settled when the energy above the hang position is below this share of `m g (h + x)`.
    pub settled_share: f64,
    /// Force levels whose time above is measured, N.
    pub levels_n: [f64; 2],
}

impl Default for Settings {
    fn default() -> Self {
        Self { time_limit_s: 120.0, settled_share: 1e-3, levels_n: [4000.0, 6000.0] }
    }
}

/// How the run ended.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ended {
    /// Settled at this time from the start of the fall, s.
    Settled {
        /// Time, s.
        time_s: f64,
    },
    /// The time limit came first.
    TimeLimit,
}

/// The lowest point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lowest {
    /// Time from the start of the fall, s.
    pub time_s: f64,
    /// Travel past taut, m.
    pub travel_m: f64,
}

/// The energy account at the lowest point, J.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct EnergyAccount {
    /// Kinetic.
    pub kinetic_j: f64,
    /// Elastic energy of the line.
    pub line_j: f64,
    /// Elastic energy of everything else.
    pub other_j: f64,
    /// Work taken by the absorber.
    pub absorber_j: f64,
    /// Work taken by the absorber in line with a lifeline.
    pub span_absorber_j: f64,
    /// Work taken by the dampers.
    pub damper_j: f64,
}

/// What happened at an instant of the run.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Happening {
    /// The line comes taut, first or again.
    Taut,
    /// The slider starts.
    DeploymentStart,
    /// The slider stops.
    DeploymentEnd,
    /// The slider is at its stroke for good.
    StrokeUsedUp,
    /// The line goes slack.
    Slack,
    /// The absorber in line with a lifeline starts.
    SpanStarts,
    /// The absorber in line with a lifeline stops: the lifeline turns back.
    SpanStops,
    /// The absorber in line with a lifeline is at its stroke for good.
    SpanUsedUp,
}

/// What the absorber in line with a lifeline has done.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SpanGiven {
    /// Final deployed length, m.
    pub deployed_m: f64,
    /// Whether its stroke was used up.
    pub used_up: bool,
}

/// How much work a solve took; equal input gives equal counts.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct WorkCount {
    /// Modes entered.
    pub modes: u32,
    /// Evaluations of event functions.
    pub evaluations: u32,
}

/// Everything one vertical arrest gives. Times run from the start of the fall.
#[derive(Clone, Debug)]
pub struct Outcome {
    /// What was solved; with a lifeline that gives, its law at the end of the run.
    pub fall: Fall,
    /// Time when the line first comes taut, s.
    pub time_taut_s: f64,
    /// Speed then, m/s.
    pub speed_at_taut_m_per_s: f64,
    /// Largest line force, N.
    pub peak_force_n: f64,
    /// When, s.
    pub time_peak_force_s: f64,
    /// Deepest turning point; none when the motion creeps to rest, the deepest there.
    pub lowest: Option<Lowest>,
    /// Travel from taut to the lowest point (or to rest), m.
    pub arrest_distance_m: f64,
    /// Travel at rest, with the deployed length kept, m.
    pub hang_travel_m: f64,
    /// Rise from the lowest point to the next highest, m; none when settled before.
    pub rebound_rise_m: Option<f64>,
    /// When that highest point is reached, s.
    pub time_highest_s: Option<f64>,
    /// First time slack, s.
    pub time_first_slack_s: Option<f64>,
    /// Times the line went slack before it was settled.
    pub slack_episodes: u32,
    /// Final deployed length, m.
    pub deployed_m: f64,
    /// Whether the stroke was used up.
    pub stroke_used_up: bool,
    /// The absorber in line with a lifeline, where the run followed one.
    pub span: Option<SpanGiven>,
    /// Largest stretch of the line, m.
    pub line_elongation_peak_m: f64,
    /// Largest stretch of everything else, m.
    pub other_elongation_peak_m: f64,
    /// Time above each level of the settings, s.
    pub time_above_s: [f64; 2],
    /// How the run ended.
    pub ended: Ended,
    /// The account at the lowest point (at rest when the motion creeps there).
    pub energy: EnergyAccount,
    /// Largest imbalance of the account over the run, as a share of `m g (h + arrest_distance)`.
    pub energy_residual: f64,
    /// Work done by the solver.
    pub work: WorkCount,
    /// Mode changes in order: time from the start of the fall in s, and what happened.
    pub happenings: Vec<(f64, Happening)>,
    /// The motion, exact at any time.
    pub motion: Motion,
}

/// Why an arrest could not be solved.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum ArrestError {
    /// An input is out of range.
    #[error("{what} is `{value}`")]
    Input {
        /// Which input.
        what: &'static str,
        /// Its value, SI.
        value: f64,
    },
    /// Everything in the path is rigid: the force has no bound.
    #[error("nothing in the path can stretch after {time_s} s: the force has no bound")]
    Rigid {
        /// When, s.
        time_s: f64,
    },
    /// The law of a lifeline that gives has no table.
    #[error(transparent)]
    Span(#[from] SpanError),
    /// The account does not balance.
    #[error("the energy account is off by {residual:e} of the fall energy")]
    Energy {
        /// The imbalance.
        residual: f64,
    },
    /// More modes than any real arrest has.
    #[error("more than {modes} modes before the time limit")]
    TooManyModes {
        /// The bound.
        modes: u32,
    },
}

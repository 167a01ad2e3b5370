//! What goes into a planar arrest, and what is refused.
use crate::arrest::{ArrestError, Fall};
use crate::physics::SeriesPath;

/// A point of the plane: horizontal offset, and elevation above the datum.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Point {
    /// Horizontal offset, m, signed.
    pub offset_m: f64,
    /// Elevation, m, up positive.
    pub elevation_m: f64,
}

impl Point {
    /// A point.
    #[must_use]
    pub const fn new(offset_m: f64, elevation_m: f64) -> Self {
        Self { offset_m, elevation_m }
    }
}

/// A level surface that the lowest point of the body must not reach.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Level {
    /// Elevation of its top, m.
    pub top_m: f64,
    /// Left end, m; minus infinity when it has none.
    pub from_m: f64,
    /// Right end, m, `>= from_m`; infinity when it has none.
    pub to_m: f64,
}

/// A vertical face that the body must not reach sideways.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Face {
    /// Horizontal offset, m.
    pub offset_m: f64,
    /// Lower end, m; minus infinity when it has none.
    pub bottom_m: f64,
    /// Upper end, m, `>= bottom_m`; infinity when it has none.
    pub top_m: f64,
}

/// A mass that falls straight down from rest onto a line whose pivot may lie beside the fall line.
#[derive(Clone, Debug, PartialEq)]
pub struct Plane {
    /// Mass, kg, `> 0`.
    pub mass_kg: f64,
    /// Gravity, m/s2, `> 0`.
    pub gravity_m_per_s2: f64,
    /// Everything in series in the line path, one tension.
    pub path: SeriesPath,
    /// What the free part of the line turns about: the anchor or the edge.
    pub pivot: Point,
    /// Where the attachment starts, at rest.
    pub start: Point,
    /// Length from the pivot to the attachment when the line begins to carry force, m, `> 0`.
    pub free_length_m: f64,
    /// Lowest point of the body below the attachment, allowance included, m, `>= 0`.
    pub body_below_m: f64,
    /// Half of the body's width, m, `>= 0`.
    pub half_width_m: f64,
    /// Level obstacles; results come in the same order.
    pub levels: Vec<Level>,
    /// Vertical faces; results come in the same order.
    pub faces: Vec<Face>,
}

/// How far and how finely to solve.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Settings {
    /// Longest time from taut, s, `> 0`.
    pub time_limit_s: f64,
    /// Truncation error allowed in a step, relative to the weight and to the length, in `1e-15..=1e-6`.
    pub tolerance: f64,
    /// Most steps before the run is refused; a practical swing takes 10 to 6000.
    pub most_steps: u32,
    /// Force levels whose time above is measured, N.
    pub levels_n: [f64; 2],
}

impl Default for Settings {
    fn default() -> Self {
        Self { time_limit_s: 120.0, tolerance: 1e-14, most_steps: 50_000, levels_n: [4000.0, 6000.0] }
    }
}

/// Why a planar arrest could not be solved.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum SwingError {
    /// An input is out of range.
    #[error("{what} is `{value}`: give a number in its range")]
    Input {
        /// Which input.
        what: &'static str,
        /// Its value, SI.
        value: f64,
    },
    /// The attachment starts farther from the pivot than the line reaches.
    #[error(
        "the attachment is `{distance_m:.3}` m from the pivot but the line reaches only `{length_m:.3}` m: lengthen the line or move the anchor"
    )]
    LineTooShort {
        /// Distance from the pivot to the start, m.
        distance_m: f64,
        /// Free length, m.
        length_m: f64,
    },
    /// The line path is out of range.
    #[error(transparent)]
    Path(#[from] ArrestError),
    /// The account does not balance.
    #[error("the energy account is off by `{residual:e}` of the fall energy: the numbers of this run do not count")]
    Energy {
        /// The imbalance.
        residual: f64,
    },
    /// More steps than the run may take: some part of the path relaxes far faster than the swing.
    #[error(
        "more than `{steps}` steps up to `{time_s}` s: a part of the line path is far faster than the swing; take its damper out or make it rigid"
    )]
    TooManySteps {
        /// The bound.
        steps: u32,
        /// Time reached from the start of the fall, s.
        time_s: f64,
    },
}

/// A start this close to the free length counts as taut, m.
const TAUT_WITHIN_M: f64 = 1e-9;

impl Plane {
    /// Start relative to the pivot.
    pub(super) fn start_from_pivot(&self) -> [f64; 2] {
        [self.start.offset_m - self.pivot.offset_m, self.start.elevation_m - self.pivot.elevation_m]
    }

    /// Weight, N.
    pub(super) fn weight_n(&self) -> f64 {
        self.mass_kg * self.gravity_m_per_s2
    }

    /// Straight fall until the line is taut, m: `z0 - z_taut` with `z_taut = -sqrt(L^2 - d^2)` below the pivot.
    ///
    /// Above an edge the line does not bend over it yet: there only the offset must be within the free length.
    ///
    /// # Errors
    /// [`SwingError::LineTooShort`] when the start is out of reach.
    pub fn free_fall_m(&self) -> Result<f64, SwingError> {
        let [d, z] = self.start_from_pivot();
        let length_m = self.free_length_m;
        let distance_m = if z > 0.0 { d.abs() } else { d.hypot(z) };
        if distance_m > length_m + TAUT_WITHIN_M {
            return Err(SwingError::LineTooShort { distance_m, length_m });
        }
        if z <= 0.0 && (distance_m - length_m).abs() <= TAUT_WITHIN_M {
            return Ok(0.0);
        }
        let below = ((length_m - d.abs()) * (length_m + d.abs())).max(0.0).sqrt();
        Ok((z + below).max(0.0))
    }

    /// The same fall straight above the pivot, as the vertical core takes it.
    pub(super) fn fall(&self, free_fall_m: f64) -> Fall {
        Fall {
            mass_kg: self.mass_kg,
            gravity_m_per_s2: self.gravity_m_per_s2,
            free_fall_m,
            speed_at_taut_m_per_s: None,
            path: self.path.clone(),
        }
    }

    pub(super) fn check(&self, settings: &Settings) -> Result<(), SwingError> {
        let positive = [
            ("mass", self.mass_kg),
            ("gravity", self.gravity_m_per_s2),
            ("free length", self.free_length_m),
            ("time limit", settings.time_limit_s),
        ];
        let not_negative = [("body below the attachment", self.body_below_m), ("half width", self.half_width_m)];
        let finite = [
            ("offset of the pivot", self.pivot.offset_m),
            ("elevation of the pivot", self.pivot.elevation_m),
            ("offset of the start", self.start.offset_m),
            ("elevation of the start", self.start.elevation_m),
        ];
        refuse(&positive, |v| v > 0.0 && v.is_finite())?;
        refuse(&not_negative, |v| v >= 0.0 && v.is_finite())?;
        refuse(&finite, f64::is_finite)?;
        refuse(&[("tolerance", settings.tolerance)], |v| (1e-15..=1e-6).contains(&v))?;
        for level in &self.levels {
            refuse(&[("top of a level", level.top_m)], f64::is_finite)?;
            refuse(&[("right end of a level", level.to_m)], |v| v >= level.from_m)?;
        }
        for face in &self.faces {
            refuse(&[("offset of a face", face.offset_m)], f64::is_finite)?;
            refuse(&[("top of a face", face.top_m)], |v| v >= face.bottom_m)?;
        }
        Ok(())
    }
}

fn refuse(values: &[(&'static str, f64)], holds: impl Fn(f64) -> bool) -> Result<(), SwingError> {
    match values.iter().find(|(_, value)| !holds(*value)) {
        Some(&(what, value)) => Err(SwingError::Input { what, value }),
        None => Ok(()),
    }
}

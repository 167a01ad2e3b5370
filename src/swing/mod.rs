//! The planar solver: an arrest whose anchor is off the fall line.
//!
//! [`solve`] takes a [`Plane`] and gives a [`PlaneOutcome`]. While taut the motion `m r'' = m g - T n` is integrated by
//! power series of high order: each step is a polynomial in time, so that positions, velocities, the line force and
//! their derivatives are known at any instant, and events are zeros of polynomials, isolated without sampling.
mod approach;
mod change;
mod close;
mod event;
mod law;
mod outcome;
mod plane;
mod reading;
mod run;
mod series;
mod step;
mod trajectory;

use crate::arrest::poly;

pub use outcome::{Approach, Ended, Impulse, Lowest, Peak, PlaneOutcome, Strike, WorkCount};
pub use plane::{Face, Level, Plane, Point, Settings, SwingError};
pub use run::solve;
pub use trajectory::{Instant, Trajectory};

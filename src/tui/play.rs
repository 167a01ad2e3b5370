//! The play head and what History shows of the time.

/// A time axis that the mouse holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Scrubbing {
    /// The play bar.
    Bar,
    /// The plots of History.
    Plot,
}

/// The stretch of time that History shows.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Window {
    /// From the start to a while after the lowest point.
    #[default]
    FirstCatch,
    /// The whole motion.
    Whole,
}

/// The play head.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Play {
    /// Where it is, s from the start of the fall.
    pub time_s: f64,
    /// Whether it runs.
    pub running: bool,
    /// Index into [`Play::SPEEDS`].
    pub speed: usize,
}

impl Play {
    /// Seconds of the fall for each second of watching, with their names.
    pub const SPEEDS: [(f64, &'static str); 9] = [
        (0.01, "1/100"),
        (0.02, "1/50"),
        (0.05, "1/20"),
        (0.1, "1/10"),
        (0.2, "1/5"),
        (0.5, "1/2"),
        (1.0, "1/1"),
        (2.0, "2/1"),
        (5.0, "5/1"),
    ];

    /// Rate and name of the present speed.
    #[must_use]
    pub fn rate(&self) -> (f64, &'static str) {
        Self::SPEEDS[self.speed.min(Self::SPEEDS.len() - 1)]
    }
}

/// Which curves History shows of a swing where there is no room for all.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Curves {
    /// Travel and line force.
    #[default]
    TravelForce,
    /// Angle of the line and speed.
    AngleSpeed,
}

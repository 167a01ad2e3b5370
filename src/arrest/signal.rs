//! A scalar of one mode as a function of the time since the mode began, whatever the mode's law.
use super::drift::Drift;
use super::oscillator::Swing;
use super::roots::Passage;
use super::third::Wave;

/// A turning point of a signal.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Turn {
    /// When, s.
    pub time: f64,
    /// A maximum, or else a minimum.
    pub is_maximum: bool,
}

/// A scalar of one mode.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Signal {
    /// Second order.
    Swing(Swing),
    /// Constant acceleration with relaxations.
    Drift(Drift),
    /// Third order.
    Wave(Wave),
}

impl Signal {
    /// The same value for ever.
    #[must_use]
    pub fn constant(value: f64) -> Self {
        Self::Drift(Drift { c: [value, 0.0, 0.0], ..Drift::default() })
    }

    /// Value at `t`.
    #[must_use]
    pub fn value(&self, t: f64) -> f64 {
        match self {
            Self::Swing(s) => s.value(t),
            Self::Drift(s) => s.value(t),
            Self::Wave(s) => s.value(t),
        }
    }

    /// First passage of `level` in `(from, to]`.
    #[must_use]
    pub fn first_passage(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<f64> {
        match self {
            Self::Swing(s) => s.first_passage(level, passage, from, to),
            Self::Drift(s) => s.first_passage(level, passage, from, to),
            Self::Wave(s) => s.first_passage(level, passage, from, to),
        }
    }

    /// First maximum in `(from, to]`.
    #[must_use]
    pub fn first_maximum(&self, from: f64, to: f64) -> Option<f64> {
        match self {
            Self::Swing(s) => s.turns(from, to).find(|turn| turn.is_maximum).map(|turn| turn.time),
            Self::Drift(s) => s.turns(from, to).into_iter().flatten().find(|turn| turn.is_maximum).map(|t| t.time),
            Self::Wave(s) => s.derivative().first_passage(0.0, Passage::Down, from, to),
        }
    }

    /// A bound on `w` for all times from `t` on; infinite where the law gives none.
    #[must_use]
    pub fn upper_bound(&self, t: f64) -> f64 {
        match self {
            Self::Swing(s) => s.first_maximum_bound(t),
            Self::Drift(_) => f64::INFINITY,
            Self::Wave(s) => s.rest + s.distance_bound(t),
        }
    }

    /// `a w + b`.
    #[must_use]
    pub fn scaled(&self, a: f64, b: f64) -> Self {
        match self {
            Self::Swing(s) => Self::Swing(s.scaled(a, b)),
            Self::Drift(s) => Self::Drift(s.scaled(a, b)),
            Self::Wave(s) => Self::Wave(s.scaled(a, b)),
        }
    }
}

//! A scalar of one mode as a function of the time since the mode began, whatever the mode's law.
use super::drift::Drift;
use super::fourth::Series;
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
    /// One step of a fourth-order mode.
    Series(Series),
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
            Self::Series(s) => s.value(t),
        }
    }

    /// Value at `t`, where the swing pair of the mode is already known.
    #[must_use]
    pub fn value_with(&self, t: f64, pair: Option<(f64, f64)>) -> f64 {
        match (self, pair) {
            (Self::Swing(s), Some(pair)) => s.value_of_pair(pair),
            _ => self.value(t),
        }
    }

    /// First passage of `level` in `(from, to]`.
    #[must_use]
    pub fn first_passage(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<f64> {
        match self {
            Self::Swing(s) => s.first_passage(level, passage, from, to),
            Self::Drift(s) => s.first_passage(level, passage, from, to),
            Self::Wave(s) => s.first_passage(level, passage, from, to),
            Self::Series(s) => s.first_passage(level, passage, from, to),
        }
    }

    /// First maximum in `(from, to]`.
    #[must_use]
    pub fn first_maximum(&self, from: f64, to: f64) -> Option<f64> {
        match self {
            Self::Swing(s) => s.first_maximum(from, to),
            Self::Drift(s) => s.turns(from, to).into_iter().flatten().find(|turn| turn.is_maximum).map(|t| t.time),
            Self::Wave(s) => s.first_maximum(from, to),
            Self::Series(s) => s.first_maximum(from, to),
        }
    }

    /// The largest value over `0..length` and when it is reached.
    #[must_use]
    pub fn largest(&self, length: f64) -> (f64, f64) {
        let mut best = (self.value(0.0), 0.0);
        let mut offer = |t: f64| {
            let value = self.value(t);
            if value > best.0 {
                best = (value, t);
            }
            best.0
        };
        let Self::Wave(wave) = self else {
            // A swing's first maximum is its largest; a drift turns down at most twice.
            match self.first_maximum(0.0, length) {
                Some(top) => offer(top),
                None => offer(length),
            };
            if let Self::Series(_) = self {
                offer(length);
            }
            if let Self::Drift(drift) = self {
                drift.turns(0.0, length).into_iter().flatten().for_each(|turn| _ = offer(turn.time));
                offer(length);
            }
            return best;
        };
        let (mut from, mut value) = (0.0, offer(length));
        while wave.rest + wave.distance_bound(from) > value {
            let Some(top) = self.first_maximum(from, length).filter(|&top| top > from) else { break };
            value = offer(top);
            from = top;
        }
        best
    }

    /// `a w + b`.
    #[must_use]
    pub fn scaled(&self, a: f64, b: f64) -> Self {
        match self {
            Self::Swing(s) => Self::Swing(s.scaled(a, b)),
            Self::Drift(s) => Self::Drift(s.scaled(a, b)),
            Self::Wave(s) => Self::Wave(s.scaled(a, b)),
            Self::Series(s) => Self::Series(s.scaled(a, b)),
        }
    }
}

//! A scalar of one mode as a function of the time since the mode began, whatever the mode's law.
use super::drift::Drift;
use super::fourth::Series;
use super::oscillator::Swing;
use super::roots::{Passage, Passing};
use super::third::Wave;

/// A turning point of a signal.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Turn {
    /// When, s.
    pub time: f64,
    /// A maximum, or else a minimum.
    pub is_maximum: bool,
}

/// A time from the start of a mode, and the values there of the functions that the mode's signals are made of.
#[derive(Clone, Copy, Debug)]
pub struct Moment {
    /// Time, s.
    pub t: f64,
    basis: [f64; 3],
}

impl Moment {
    /// [`super::oscillator::Oscillator::pair`] at the moment; of a swing only.
    #[must_use]
    pub const fn pair(&self) -> (f64, f64) {
        (self.basis[0], self.basis[1])
    }
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

    /// A time, with what all signals of this one's roots share there.
    #[must_use]
    pub fn moment(&self, t: f64) -> Moment {
        let basis = match self {
            Self::Swing(s) => {
                let (c, s) = s.of.pair(t);
                [c, s, 0.0]
            }
            Self::Drift(_) | Self::Series(_) => [0.0; 3],
            Self::Wave(s) => s.of.basis(t),
        };
        Moment { t, basis }
    }

    /// Value at a moment of a signal of the same roots.
    #[must_use]
    pub fn value_at(&self, moment: &Moment) -> f64 {
        match self {
            Self::Swing(s) => s.value_of_pair(moment.pair()),
            Self::Drift(s) => s.value(moment.t),
            Self::Wave(s) => s.value_of_basis(moment.basis),
            Self::Series(s) => s.value(moment.t),
        }
    }

    /// The values at the start and at a moment, where the signal is known to be monotone between without a search.
    #[must_use]
    pub fn monotone_ends(&self, moment: &Moment) -> Option<[f64; 2]> {
        match self {
            Self::Swing(s) => s.monotone_ends(moment.t, moment.pair()),
            Self::Drift(s) => s.monotone_ends(moment.t),
            Self::Wave(_) | Self::Series(_) => None,
        }
    }

    /// Whether the signal is known never to rise above a level, without a search.
    #[must_use]
    pub fn stays_below(&self, level: f64) -> bool {
        match self {
            Self::Swing(s) => s.rest < level && s.stays_off(level),
            Self::Drift(s) => s.stays_below(level),
            Self::Wave(_) | Self::Series(_) => false,
        }
    }

    /// First passage of `level` in `(from, to]`.
    #[must_use]
    pub fn first_passage(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<f64> {
        self.first_passing(level, passage, from, to).map(|passing| passing.time)
    }

    /// First passage of `level` in `(from, to]`, and how far beyond it the signal goes at least.
    #[must_use]
    pub fn first_passing(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<Passing> {
        match self {
            Self::Swing(s) => s.first_passing(level, passage, from, to),
            Self::Drift(s) => s.first_passing(level, passage, from, to),
            Self::Wave(s) => s.first_passing(level, passage, from, to),
            // How far it goes beyond is not known without another search.
            Self::Series(s) => s.first_passage(level, passage, from, to).map(|time| Passing { time, beyond: 0.0 }),
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

    /// The largest value from the start to a moment and when it is reached.
    #[must_use]
    pub fn largest(&self, end: &Moment) -> (f64, f64) {
        let length = end.t;
        if let Some([first, last]) = self.monotone_ends(end) {
            return if last > first { (last, length) } else { (first, 0.0) };
        }
        let mut best = (self.value(0.0), 0.0);
        let mut offer = |t: f64| {
            let value = self.value(t);
            if value > best.0 {
                best = (value, t);
            }
        };
        match self {
            Self::Wave(wave) => return wave.largest(length),
            // A swing's first maximum is its largest.
            Self::Swing(swing) => offer(swing.first_maximum(0.0, length).unwrap_or(length)),
            Self::Series(series) => {
                series.first_maximum(0.0, length).into_iter().for_each(&mut offer);
                offer(length);
            }
            Self::Drift(drift) => {
                drift.turns(0.0, length).into_iter().flatten().for_each(|turn| offer(turn.time));
                offer(length);
            }
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

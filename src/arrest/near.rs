//! What a swing does nearby, found without its turning points.
//!
//! Two turning points of a swing are half a period apart, and a swing that does not oscillate has at most one. So on a
//! stretch shorter than half a period with slopes of one sign at both ends there is none: the swing is monotone there,
//! its largest and smallest value are at the ends, and it passes a level at most once. Where that does not hold nothing
//! is concluded and the search between turning points decides.
use super::oscillator::{Oscillator, Swing};
use super::roots::{Passage, Passing, count};
use std::f64::consts::PI;

/// Share of half a period taken as surely shorter than it.
const SHORT: f64 = 1.0 - 1e-9;
/// Change of the slope up to a passage, as a share of it, up to which the series is tried.
const BENT: f64 = 0.6;
/// A slope at a passage that is less than this share of the first may be near a turning point.
const STEEP: f64 = 0.1;

impl Swing {
    /// Slope at `t = 0`.
    fn first_slope(&self) -> f64 {
        self.q - self.of.decay * self.p
    }

    /// The longest time between which and the start there is at most one turning point, s.
    fn half_period(&self) -> f64 {
        if self.of.q > 0.0 { SHORT * PI / self.of.frequency } else { f64::INFINITY }
    }

    /// Square of a bound on the distance from rest, infinite unless underdamped: its envelope at the start.
    #[must_use]
    pub fn reach_square(&self) -> f64 {
        if self.of.q > 0.0 { self.p * self.p + self.q * self.q / self.of.q } else { f64::INFINITY }
    }

    /// Whether the envelope keeps the swing away from a level for good.
    #[must_use]
    pub fn stays_off(&self, level: f64) -> bool {
        (level - self.rest).powi(2) > (1.0 + 1e-9) * self.reach_square()
    }

    /// The values at the start and at `t`, where the swing is surely monotone between; `pair` is [`Oscillator::pair`]
    /// at `t`.
    #[must_use]
    pub fn monotone_ends(&self, t: f64, pair: (f64, f64)) -> Option<[f64; 2]> {
        let (value, slope) = self.value_slope_of_pair(pair);
        let same = slope * self.first_slope() > 0.0;
        (same && t < self.half_period()).then_some([self.rest + self.p, value])
    }

    /// First passage of a level that comes before the slope has changed much: Newton's steps from the series at the
    /// start. None where the passage cannot be told to be the first this way.
    #[must_use]
    pub fn near_passing(&self, level: f64, passage: Passage, to: f64) -> Option<Passing> {
        let first_slope = self.first_slope();
        let latest = to.min(self.half_period());
        let mut t =
            self.series_passage(level, first_slope).filter(|_| (first_slope > 0.0) == (passage == Passage::Up))?;
        for _ in 0..4 {
            if !(t > 0.0 && t < latest) {
                return None;
            }
            count(1);
            let (value, slope) = self.value_slope(t);
            if slope / first_slope < STEEP {
                return None;
            }
            let step = (level - value) / slope;
            let curve = (slope - first_slope).abs() / t;
            t += step;
            // The error of Newton's step is `w'' step^2 / 2 w'`.
            if curve * step * step <= 0.1 * f64::EPSILON * t * slope.abs() || step.abs() <= f64::EPSILON * t {
                return (t <= latest).then(|| Passing { time: t, beyond: self.goes_beyond(slope, to - t) });
            }
        }
        None
    }

    /// Time of a level by the series of the swing at its start turned round, to the fifth order.
    fn series_passage(&self, level: f64, slope: f64) -> Option<f64> {
        let Oscillator { decay, stiffness, .. } = self.of;
        // The value at the start as it is seen elsewhere, so that a start on the level is no passage.
        let y = (level - (self.rest + self.p)) / slope;
        // Each derivative follows from the two before it; all as shares of the first.
        let next = |w: f64, before: f64| -2.0 * decay * w - stiffness * before;
        let second = next(1.0, self.p / slope);
        let third = next(second, 1.0);
        let (b, c) = (second * y / 2.0, third * y * y / 6.0);
        if !(y > 0.0 && (2.0 * b).abs() < BENT && (3.0 * c).abs() < BENT) {
            return None;
        }
        let fourth = next(third, second);
        let (d, e) = (fourth * y.powi(3) / 24.0, next(fourth, third) * y.powi(4) / 120.0);
        let b2 = b * b;
        Some(
            y * (1.0 - b + 2.0 * b2 - c - 5.0 * b2 * b + 5.0 * b * c - d + 14.0 * b2 * b2 - 21.0 * b2 * c
                + 6.0 * b * d
                + 3.0 * c * c
                - e),
        )
    }

    /// How far a swing goes on at least in `room` s from a slope: at a curvature within its envelope the slope lasts
    /// for at least `slope / curvature`, half of it on average.
    fn goes_beyond(&self, slope: f64, room: f64) -> f64 {
        let curvature = self.derivative().derivative().reach_square().sqrt();
        0.5 * slope.abs() * room.min(slope.abs() / curvature)
    }
}

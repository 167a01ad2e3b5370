//! The damped oscillator `m x'' + c x' + k x = const` in its three regimes, and its envelope.
//!
//! One form serves all regimes: with `alpha = c/2m` and `q = k/m - alpha^2`,
//! `exp(-alpha t) (P C(t) + Q S(t))`, where `C' = -q S`, `S' = C`, that is `cos` and `sin/omega` for `q > 0`, `cosh`
//! and `sinh/delta` for `q < 0`. Nothing divides by the difference of the two roots, so no digits are lost near
//! critical damping.
use super::roots::{Passage, Passing, first_passing};
use std::f64::consts::PI;

/// The class of a damped oscillator.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Regime {
    /// `c^2 > 4 m k`: crosses rest at most once.
    Overdamped,
    /// `c^2 = 4 m k` within 1e-9 of the ratio.
    Critical,
    /// `c^2 < 4 m k`: swings inside its envelope.
    Underdamped,
}

/// Rates of a damped oscillator.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Oscillator {
    /// Decay `alpha = c/2m`, 1/s, `>= 0`.
    pub decay: f64,
    /// `q = k/m - alpha^2`, 1/s2: square of the damped frequency, negative when overdamped.
    pub q: f64,
    /// `sqrt(|q|)`, 1/s.
    pub frequency: f64,
    /// `k/m`, 1/s2.
    pub stiffness: f64,
}

impl Oscillator {
    /// From mass in kg (`> 0`), damping in N s/m (`>= 0`) and stiffness in N/m (`>= 0`).
    #[must_use]
    pub fn new(mass_kg: f64, damping_n_s_per_m: f64, stiffness_n_per_m: f64) -> Self {
        let decay = 0.5 * damping_n_s_per_m / mass_kg;
        let stiffness = stiffness_n_per_m / mass_kg;
        let q = stiffness - decay * decay;
        Self { decay, q, frequency: q.abs().sqrt(), stiffness }
    }

    /// Damping ratio `alpha / sqrt(k/m)`.
    #[must_use]
    pub fn ratio(&self) -> f64 {
        self.decay / self.stiffness.sqrt()
    }

    /// The regime; critical within 1e-9 of the ratio.
    #[must_use]
    pub fn regime(&self) -> Regime {
        let ratio = self.ratio();
        if (ratio - 1.0).abs() <= 1e-9 {
            Regime::Critical
        } else if ratio > 1.0 {
            Regime::Overdamped
        } else {
            Regime::Underdamped
        }
    }

    /// `exp(-alpha t) C(t)` and `exp(-alpha t) S(t)` for `t >= 0`, accurate to a few units in the last place of the
    /// larger of the two exponentials.
    #[must_use]
    pub fn pair(&self, t: f64) -> (f64, f64) {
        if t == 0.0 {
            return (1.0, 0.0);
        }
        let angle = self.frequency * t;
        if angle < 1e-3 {
            let z = -self.q * t * t;
            let e = (-self.decay * t).exp();
            return (e * (1.0 + z / 2.0 * (1.0 + z / 12.0)), e * t * (1.0 + z / 6.0 * (1.0 + z / 20.0)));
        }
        if self.q > 0.0 {
            let e = (-self.decay * t).exp();
            let (sin, cos) = angle.sin_cos();
            return (e * cos, e * sin / self.frequency);
        }
        let slow = (-t * self.stiffness / (self.decay + self.frequency)).exp();
        let ratio = (-2.0 * angle).exp();
        (0.5 * slow * (1.0 + ratio), -0.5 * slow * (-2.0 * angle).exp_m1() / self.frequency)
    }

    /// The envelope's amplitude `C = sqrt(u0^2 + ((v0 + alpha u0)/omega)^2)` of a start `u0` from rest position at
    /// speed `v0`; none unless underdamped.
    #[must_use]
    pub fn envelope_amplitude(&self, u0: f64, v0: f64) -> Option<f64> {
        (self.q > 0.0).then(|| u0.hypot((v0 + self.decay * u0) / self.frequency))
    }
}

/// `w(t) = rest + exp(-alpha t) (p C(t) + q S(t))`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Swing {
    /// The oscillator.
    pub of: Oscillator,
    /// Value it tends to.
    pub rest: f64,
    /// Coefficient of `C`.
    pub p: f64,
    /// Coefficient of `S`.
    pub q: f64,
}

impl Swing {
    /// From the distance to rest and the slope at `t = 0`.
    #[must_use]
    pub fn new(of: Oscillator, rest: f64, from_rest: f64, slope: f64) -> Self {
        Self { of, rest, p: from_rest, q: slope + of.decay * from_rest }
    }

    /// The time derivative.
    #[must_use]
    pub fn derivative(&self) -> Self {
        let Oscillator { decay, q, .. } = self.of;
        Self { of: self.of, rest: 0.0, p: self.q - decay * self.p, q: -decay * self.q - q * self.p }
    }

    /// `a w + b`.
    #[must_use]
    pub fn scaled(&self, a: f64, b: f64) -> Self {
        Self { of: self.of, rest: a * self.rest + b, p: a * self.p, q: a * self.q }
    }

    /// Value at `t`.
    #[must_use]
    pub fn value(&self, t: f64) -> f64 {
        self.value_of_pair(self.of.pair(t))
    }

    /// Value where [`Oscillator::pair`] is known.
    #[must_use]
    pub fn value_of_pair(&self, (c, s): (f64, f64)) -> f64 {
        self.rest + self.p * c + self.q * s
    }

    /// Value and slope at `t`.
    #[must_use]
    pub fn value_slope(&self, t: f64) -> (f64, f64) {
        self.value_slope_of_pair(self.of.pair(t))
    }

    /// Value and slope where [`Oscillator::pair`] is known.
    #[must_use]
    pub fn value_slope_of_pair(&self, (c, s): (f64, f64)) -> (f64, f64) {
        let Oscillator { decay, q, .. } = self.of;
        (self.rest + self.p * c + self.q * s, (self.q - decay * self.p) * c - (decay * self.q + q * self.p) * s)
    }

    /// Time of the first zero of `p C + q S` after `from`, and the distance between zeros (infinite when there is at
    /// most one).
    pub(super) fn first_zero(&self, from: f64) -> Option<(f64, f64)> {
        let frequency = self.of.frequency;
        if self.p == 0.0 && self.q == 0.0 {
            return None;
        }
        if self.of.q > 0.0 {
            let period = PI / frequency;
            // The angle in (0, pi), from a non-negative sine, so that a zero right at the start keeps its digits.
            let (sine, cosine) = (-self.p * frequency, self.q);
            let angle = if sine < 0.0 { (-sine).atan2(-cosine) } else { sine.atan2(cosine) };
            let mut first = if angle > 0.0 { angle / frequency } else { period };
            if first <= from {
                first += period * ((from - first) / period).floor();
                while first <= from {
                    first += period;
                }
            }
            return Some((first, period));
        }
        let u = -self.p / self.q * frequency;
        let t = if u < 1e-9 { -self.p / self.q } else { u.atanh() / frequency };
        (t.is_finite() && t > from).then_some((t, f64::INFINITY))
    }

    /// Times of the first turning point after `from` and the distance between turning points.
    fn first_turn(&self, from: f64) -> Option<(f64, f64)> {
        self.derivative().first_zero(from)
    }

    /// First maximum after `from` and before `to`: turning points alternate about the rest value.
    #[must_use]
    pub fn first_maximum(&self, from: f64, to: f64) -> Option<f64> {
        let rate = self.derivative();
        let (first, period) = rate.first_zero(from)?;
        // From the start, the slope there tells it; late in a decay only what is left of the value does.
        let is_maximum = if from == 0.0 && self.of.decay * first < 1.0 {
            rate.p > 0.0 || (rate.p == 0.0 && rate.q > 0.0)
        } else {
            self.value(first) > self.rest
        };
        let time = if is_maximum { first } else { first + period };
        (time < to).then_some(time)
    }

    fn turn_times(&self, from: f64, to: f64) -> impl Iterator<Item = f64> + use<> {
        let first = self.first_turn(from);
        (0..u32::MAX).map_while(move |n| {
            let (start, period) = first?;
            let t = if n == 0 { start } else { start + f64::from(n) * period };
            (t < to).then_some(t)
        })
    }

    /// First passage of `level` in `(from, to]`. See [`super::near`] for what is found or ruled out without a search.
    #[must_use]
    pub fn first_passing(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<Passing> {
        if self.stays_off(level) {
            return None;
        }
        let near = if from == 0.0 { self.near_passing(level, passage, to) } else { None };
        near.or_else(|| self.searched_passing(level, passage, from, to))
    }

    /// First passage of `level` in `(from, to]`, searched between turning points. They close in on the rest value from
    /// both sides, so after one of each without passage there is none.
    #[must_use]
    pub fn searched_passing(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<Passing> {
        let mut turns = [f64::INFINITY; 3];
        for (slot, turn) in turns.iter_mut().zip(self.turn_times(from, to)) {
            *slot = turn;
        }
        let end = if turns[2] < to { turns[2] } else { to };
        first_passing(
            |t| {
                let (w, slope) = self.value_slope(t);
                (w - level, slope)
            },
            passage,
            from,
            turns,
            end,
        )
    }

    /// Integral of `w^2` over `0..t` for a swing with rest value 0, relative accuracy about 1e-12; `pair` is
    /// [`Oscillator::pair`] at `t`.
    #[must_use]
    pub fn square_integral(&self, t: f64, pair: (f64, f64)) -> f64 {
        let Oscillator { decay, q, frequency, .. } = self.of;
        if q > 0.0 && frequency > 0.3 * decay {
            let (re, im) = (self.p, -self.q / frequency);
            let steady = 0.5 * (re * re + im * im) * decayed_time(2.0 * decay, t);
            // The exponential at twice the rate is the square of the one at hand.
            let (c, s) = (pair.0, pair.1 * frequency);
            let twice = (c * c - s * s, 2.0 * c * s);
            return steady + 0.5 * waving(re * re - im * im, 2.0 * re * im, 2.0 * decay, 2.0 * frequency, twice);
        }
        if q < 0.0 && frequency > 0.3 * decay {
            let slow = self.of.stiffness / (decay + frequency);
            let fast = decay + frequency;
            let a = 0.5 * (self.p + self.q / frequency);
            let b = 0.5 * (self.p - self.q / frequency);
            return a * a * decayed_time(2.0 * slow, t)
                + 2.0 * a * b * decayed_time(slow + fast, t)
                + b * b * decayed_time(2.0 * fast, t);
        }
        super::quadrature::integral(|time| self.value(time).powi(2), t, decay + frequency)
    }
}

/// Integral of `exp(-rate t)` over `0..t`.
pub(super) fn decayed_time(rate: f64, t: f64) -> f64 {
    if rate == 0.0 { t } else { -(-rate * t).exp_m1() / rate }
}

/// Integral of `Re((re + i im) exp((-rate + i frequency) t))` over `0..t`.
pub(super) fn waving_integral(re: f64, im: f64, rate: f64, frequency: f64, t: f64) -> f64 {
    let e = (-rate * t).exp();
    let (sin, cos) = (frequency * t).sin_cos();
    waving(re, im, rate, frequency, (e * cos, e * sin))
}

/// As [`waving_integral`], where the real and imaginary part of the exponential at `t` are known.
fn waving(re: f64, im: f64, rate: f64, frequency: f64, (cos, sin): (f64, f64)) -> f64 {
    // (exp(z t) - 1) / z with z = -rate + i frequency.
    let (nr, ni) = (cos - 1.0, sin);
    let norm = rate * rate + frequency * frequency;
    let (dr, di) = ((-rate * nr + frequency * ni) / norm, (-rate * ni - frequency * nr) / norm);
    re * dr - im * di
}

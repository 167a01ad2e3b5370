//! Fourth-order modes: the slider moves on a rising force between two damped parts. Solved by power series, step by
//! step; each step holds to the last digits.
use super::mode::{Mode, Stretch};
use super::poly::{self, Crossing, Poly, crossings};
use super::roots::Passage;
use super::signal::Signal;

/// Highest power: a scalar is then no larger than one of a third-order mode, which every stretch has room for.
const ORDER: usize = 9;
/// Coefficients of the powers, lowest first.
type Powers = [f64; ORDER + 1];
/// Length of a step over the shortest time of the system: `0.1^10 / 10!` is below the last digit.
const REACH: f64 = 0.1;
/// A speed of the slider this small beside the speeds it is the difference of is rounding.
const ROUNDING: f64 = 1e-13;

/// A scalar of one step: powers of the time over the length of the step.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Series {
    c: Powers,
    /// Length of the step, s.
    pub step_s: f64,
}

impl Series {
    /// Value at a time in s.
    #[must_use]
    pub fn value(&self, t: f64) -> f64 {
        let u = t / self.step_s;
        self.c.iter().rev().fold(0.0, |sum, c| sum * u + c)
    }

    /// The time derivative.
    #[must_use]
    pub fn derivative(&self) -> Self {
        let mut c = [0.0; ORDER + 1];
        let mut power = 1.0;
        for (to, from) in c.iter_mut().zip(&self.c[1..]) {
            *to = power * from / self.step_s;
            power += 1.0;
        }
        Self { c, ..*self }
    }

    /// `a w + b`.
    #[must_use]
    pub fn scaled(&self, a: f64, b: f64) -> Self {
        let mut c = self.c.map(|c| a * c);
        c[0] += b;
        Self { c, ..*self }
    }

    /// Integral of the square from 0 to a time in s.
    #[must_use]
    pub fn square_integral(&self, t: f64) -> f64 {
        let u = t / self.step_s;
        let mut power = u;
        let mut sum = 0.0;
        let mut next = 1.0;
        for k in 0..=2 * ORDER {
            let low = k.saturating_sub(ORDER);
            let coefficient: f64 = (low..=k.min(ORDER)).map(|i| self.c[i] * self.c[k - i]).sum();
            sum += coefficient * power / next;
            power *= u;
            next += 1.0;
        }
        sum * self.step_s
    }

    /// First passage of a level in `(from, to]`.
    #[must_use]
    pub fn first_passage(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<f64> {
        let up = passage == Passage::Up;
        let level_here = self.scaled(1.0, -level);
        let window = level_here.window(from, to);
        let before = if up && window[0] == 0.0 { -1 } else { 0 };
        let found = first(&window, before, up).map(|u| from + u * (to - from));
        // Both ends decide where rounding hides the change of sign.
        found.or_else(|| passage.shows(window[0], level_here.value(to)).then_some(to))
    }

    /// First maximum in `(from, to]`.
    #[must_use]
    pub fn first_maximum(&self, from: f64, to: f64) -> Option<f64> {
        first(&self.derivative().window(from, to), 0, false).map(|u| from + u * (to - from))
    }

    /// When it stops rising, having risen before.
    #[must_use]
    pub fn first_stop(&self, to: f64) -> Option<f64> {
        first(&self.derivative().window(0.0, to), 1, false).map(|u| u * to)
    }

    /// The same over the unit interval from one time to another, s.
    fn window(&self, from: f64, to: f64) -> Poly {
        let (shift, scale) = (from / self.step_s, (to - from) / self.step_s);
        let mut moved = self.c;
        if shift != 0.0 {
            for first in 0..ORDER {
                for k in (first..ORDER).rev() {
                    moved[k] += shift * moved[k + 1];
                }
            }
        }
        let mut wide = [0.0; poly::LEN];
        wide[..=ORDER].copy_from_slice(&moved);
        poly::stretched(&wide, scale)
    }
}

fn first(p: &Poly, before: i8, rising: bool) -> Option<f64> {
    let mut found = None;
    crossings(p, before, |Crossing { at, rising: is_rising }| {
        if is_rising == rising {
            found = Some(at);
        }
        found.is_some()
    });
    found
}

/// A damped part on its piece: force and stretch now, stiffness and damping.
#[derive(Clone, Copy, Debug)]
pub struct Damped {
    /// N.
    pub force: f64,
    /// m.
    pub stretch: f64,
    /// N/m.
    pub stiffness: f64,
    /// N s/m.
    pub damping: f64,
}

/// What moves while the slider moves.
#[derive(Clone, Copy, Debug)]
pub struct Sliding {
    /// kg.
    pub mass: f64,
    /// m/s2.
    pub gravity: f64,
    /// Travel, m.
    pub x: f64,
    /// Speed, m/s.
    pub v: f64,
    /// Deployed length, m.
    pub s: f64,
    /// Force of the slider, N.
    pub force: f64,
    /// Its rise with the deployed length, N/m.
    pub slope: f64,
    /// The two parts.
    pub parts: [Damped; 2],
}

impl Sliding {
    /// One step: `m x'' = m g - T`, `T = F + slope (s - s0)`, `s = x - e1 - e2`, `T = f(e) + c e'` in both parts.
    #[must_use]
    pub fn step(&self) -> Stretch {
        let [a, b] = self.parts;
        let relax = |part: Damped| (part.stiffness + self.slope) / part.damping;
        let fastest = relax(a).max(relax(b)).max((self.slope / self.mass).sqrt());
        let h = REACH / fastest;
        let mut x = [0.0; ORDER + 1];
        let (mut v, mut force, mut s, mut e) = (x, x, x, [x; 2]);
        (x[0], v[0], s[0], e[0][0], e[1][0]) = (self.x, self.v, self.s, a.stretch, b.stretch);
        let mut next = 1.0;
        for k in 0..=ORDER {
            if k > 0 {
                s[k] = x[k] - e[0][k] - e[1][k];
                if k == 1 && s[1].abs() <= ROUNDING * (x[1].abs() + e[0][1].abs() + e[1][1].abs()) {
                    s[1] = 0.0;
                }
            }
            force[k] = if k == 0 { self.force } else { self.slope * s[k] };
            if k == ORDER {
                break;
            }
            let weight = if k == 0 { self.gravity } else { 0.0 };
            x[k + 1] = h * v[k] / next;
            v[k + 1] = h * (weight - force[k] / self.mass) / next;
            for (e, part) in e.iter_mut().zip(self.parts) {
                let held = if k == 0 { part.force } else { part.stiffness * e[k] };
                e[k + 1] = h * (force[k] - held) / (part.damping * next);
            }
            next += 1.0;
        }
        let of = |c: Powers| Signal::Series(Series { c, step_s: h });
        Stretch {
            start_s: 0.0,
            length_s: h,
            mode: Mode::Sliding,
            x: of(x),
            v: of(v),
            force: of(force),
            e: e.map(of),
            s: of(s),
        }
    }
}

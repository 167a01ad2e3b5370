//! What is read off each step: peaks, the lowest point, times above a level.
use super::outcome::Peak;
use super::poly::{Poly, crossings, derivative, scaled, upper_bound, value};

/// A later peak replaces an earlier one only when larger by more than this share.
const LARGER: f64 = 1e-9;

impl Peak {
    /// No value yet.
    pub(super) const NONE: Self = Self { value: f64::NEG_INFINITY, time_s: 0.0 };

    fn must_pass(&self) -> f64 {
        if self.value == f64::NEG_INFINITY { self.value } else { self.value + LARGER * self.value.abs() }
    }

    /// Takes a later value in.
    pub(super) fn offer(&mut self, value: f64, time_s: f64) {
        if value > self.must_pass() {
            *self = Self { value, time_s };
        }
    }
}

/// The largest value of a signal that goes on from step to step.
#[derive(Clone, Copy, Debug)]
pub struct Largest {
    pub peak: Peak,
    slope: Carried,
}

impl Largest {
    /// No value yet.
    pub const NONE: Self = Self { peak: Peak::NONE, slope: Carried(0) };

    /// Takes in all of a polynomial over a part of its unit interval. Ends of steps are no peaks; ends of modes may be.
    pub fn scan(&mut self, p: &Poly, span: Span, mode: Ends) {
        if mode.begins {
            self.slope = Carried::default();
            self.peak.offer(p[0], span.start_s);
        }
        if upper_bound(p) > self.peak.must_pass() {
            let peak = &mut self.peak;
            self.slope.pass(&derivative(p), span.share, |at, rising| {
                if !rising {
                    peak.offer(value(p, at), span.time(at));
                }
            });
        } else {
            self.slope = Carried::default();
        }
        if mode.ends {
            self.peak.offer(value(p, span.share), span.time(span.share));
        }
    }
}

/// Whether a step is the first and the last of its mode.
#[derive(Clone, Copy, Debug)]
pub struct Ends {
    pub begins: bool,
    pub ends: bool,
}

/// Where a step lies in time and how much of it is in force.
#[derive(Clone, Copy, Debug)]
pub struct Span {
    pub start_s: f64,
    pub unit_s: f64,
    pub share: f64,
}

impl Span {
    pub fn time(&self, share: f64) -> f64 {
        self.start_s + self.unit_s * share
    }
}

/// Time that a polynomial spends strictly above a level.
pub fn time_above(p: &Poly, level: f64, span: Span) -> f64 {
    let above = scaled(p, 1.0, -level * (1.0 + LARGER));
    let mut since = (above[0] > 0.0).then_some(0.0);
    let mut total = 0.0;
    crossings(&above, 0, |crossing| {
        if crossing.at > span.share {
            return true;
        }
        match since.take() {
            Some(from) if !crossing.rising => total += crossing.at - from,
            _ => since = Some(crossing.at),
        }
        false
    });
    (total + since.map_or(0.0, |from| span.share - from)) * span.unit_s
}

/// The sign of a signal carried from step to step, so that a change exactly where two steps meet counts once.
#[derive(Clone, Copy, Debug, Default)]
pub struct Carried(i8);

impl Carried {
    /// First fall through zero within the step.
    pub fn first_fall(self, p: &Poly) -> Option<f64> {
        let mut found = None;
        crossings(p, self.0, |crossing| {
            if !crossing.rising {
                found = Some(crossing.at);
            }
            found.is_some()
        });
        found
    }

    /// Visits every change of sign up to `share` and remembers the last sign.
    pub fn pass(&mut self, p: &Poly, share: f64, mut visit: impl FnMut(f64, bool)) {
        if self.0 == 0 {
            self.0 = p.iter().find(|c| **c != 0.0).map_or(0, |c| if *c > 0.0 { 1 } else { -1 });
        }
        let mut last = self.0;
        crossings(p, last, |crossing| {
            if crossing.at > share {
                return true;
            }
            last = if crossing.rising { 1 } else { -1 };
            visit(crossing.at, crossing.rising);
            false
        });
        self.0 = last;
    }
}

//! Third-order modes: a damped and an undamped part in series, or two damped parts.
//!
//! Where the real root `lambda` is far from the pair, `w = rest + exp(mu t) (p C + q S) + r exp(lambda t)`, with the pair
//! `mu +- sqrt(-q)` in the form of [`Oscillator`]. Where roots meet that divides by next to nothing, and the last term is
//! `r f(t)` with `f` the divided difference of `exp(s t)` over all three roots.
use super::oscillator::{Oscillator, Swing, decayed_time, waving_integral};
use super::quadrature::integral_with_waves;
use super::roots::{Passage, Passing, monotone_zero};
use super::signal::Turn;

/// A real root and a pair (complex or real) of a cubic whose roots have negative real parts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spectrum {
    /// The real root farthest from the others, 1/s, negative.
    pub lambda: f64,
    /// The pair as an oscillator: decay `-mu`, and `q` of its sign.
    pub pair: Oscillator,
    /// `(lambda - mu)^2 + q`: product of the distances from `lambda` to the pair.
    pub apart: f64,
    /// Whether `lambda` is far from the pair.
    pub far: bool,
}

impl Spectrum {
    /// Roots of `s^3 + b2 s^2 + b1 s + b0` with all coefficients positive and `b2 b1 > b0` (a stable cubic).
    ///
    /// The residual of the cubic is a few units in the last place of its largest term.
    #[must_use]
    pub fn of_cubic(b2: f64, b1: f64, b0: f64) -> Self {
        let root = real_root(b2, b1, b0);
        let first = Self::deflated(root, b2, b1, b0);
        if first.pair.q >= 0.0 {
            return first;
        }
        // Three real roots: keep the lonely one apart, so that a near pair stays together.
        let (mu, delta) = (-first.pair.decay, first.pair.frequency);
        let mut roots = [root, mu - delta, -first.pair.stiffness / (first.pair.decay + delta)];
        roots.sort_by(f64::total_cmp);
        let lonely = if roots[1] - roots[0] < roots[2] - roots[1] { roots[2] } else { roots[0] };
        Self::deflated(lonely, b2, b1, b0)
    }

    /// Of a mass on two parts in series, each a spring (N/m) with a damper (N s/m); at least one damper works.
    ///
    /// `m C s^3 + (m K + c1 c2) s^2 + (k1 c2 + k2 c1) s + k1 k2 = 0` with `K = k1 + k2`, `C = c1 + c2`.
    #[must_use]
    pub fn in_series(mass_kg: f64, (k1, c1): (f64, f64), (k2, c2): (f64, f64)) -> Self {
        let c = c1 + c2;
        let mc = mass_kg * c;
        Self::of_cubic((k1 + k2) / c + c1 * c2 / mc, (k1 * c2 + k2 * c1) / mc, k1 * k2 / mc)
    }

    fn deflated(lambda: f64, b2: f64, b1: f64, b0: f64) -> Self {
        // s^2 + p s + r, with the better conditioned of the two ways to each coefficient.
        let r = -b0 / lambda;
        let p = if b2 * lambda.abs() < b1 { b2 + lambda } else { (b1 - r) / -lambda };
        let decay = 0.5 * p;
        let q = r - decay * decay;
        let pair = Oscillator { decay, q, frequency: q.abs().sqrt(), stiffness: r };
        let apart = (lambda + decay).powi(2) + q;
        Self { lambda, pair, apart, far: apart > 0.1 * (lambda * lambda + r) }
    }

    /// `exp(mu t) C`, `exp(mu t) S` and the third function at `t`.
    pub(super) fn basis(&self, t: f64) -> [f64; 3] {
        let (c, s) = self.pair.pair(t);
        if self.far {
            return [c, s, (self.lambda * t).exp()];
        }
        let d = -self.pair.decay - self.lambda;
        if (d.abs() + self.pair.frequency) * t < 0.5 {
            return [c, s, (self.lambda * t).exp() * self.divided_series(d, t)];
        }
        [c, s, ((self.lambda * t).exp() - c + d * s) / self.apart]
    }

    /// Divided difference of `exp(s t)` over 0 and the pair `d +- sqrt(-q)`, as a series for small `d t`.
    fn divided_series(&self, d: f64, t: f64) -> f64 {
        let product = d * d + self.pair.q;
        let (mut before, mut h) = (0.0, 1.0);
        let mut power = 0.5 * t * t;
        let mut sum = 0.0;
        for n in 3..22 {
            sum += h * power;
            (before, h) = (h, 2.0 * d * h - product * before);
            power *= t / f64::from(n);
        }
        sum
    }

    /// Smallest decay of the spectrum, 1/s.
    #[must_use]
    pub fn slowest(&self) -> f64 {
        let Self { lambda, pair, .. } = self;
        let slow = if pair.q < 0.0 { pair.stiffness / (pair.decay + pair.frequency) } else { pair.decay };
        slow.min(-lambda)
    }

    /// Largest rate of the spectrum, 1/s.
    #[must_use]
    pub fn fastest(&self) -> f64 {
        self.lambda.abs().max(self.pair.decay + self.pair.frequency)
    }
}

fn real_root(b2: f64, b1: f64, b0: f64) -> f64 {
    let cubic = |s: f64| (((s + b2) * s + b1) * s + b0, (3.0 * s + 2.0 * b2) * s + b1);
    // All real parts are negative and their sum is -b2, so a real root lies in (-b2, 0).
    let (mut lo, mut hi) = (-b2, 0.0);
    // Start where the cubic bends: from there Newton's step is monotone.
    let bend = -b2 / 3.0;
    if cubic(bend).0 > 0.0 {
        hi = bend;
    } else {
        lo = bend;
    }
    monotone_between_turns(cubic, lo, hi)
}

/// Zero of the cubic in `[lo, hi]`, negative at `lo` and positive at `hi`, where it may have a flat part.
fn monotone_between_turns(cubic: impl Fn(f64) -> (f64, f64), mut lo: f64, mut hi: f64) -> f64 {
    let mut s = 0.5 * (lo + hi);
    for _ in 0..200 {
        let (value, slope) = cubic(s);
        if value == 0.0 {
            return s;
        }
        if value > 0.0 {
            hi = s;
        } else {
            lo = s;
        }
        let newton = s - value / slope;
        let next = if newton > lo && newton < hi { newton } else { 0.5 * (lo + hi) };
        if (next - s).abs() <= f64::EPSILON * s.abs() {
            return next;
        }
        s = next;
    }
    s
}

/// A scalar of a third-order mode.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wave {
    /// The roots.
    pub of: Spectrum,
    /// Value it tends to.
    pub rest: f64,
    /// Coefficients of the basis.
    pub a: [f64; 3],
}

impl Wave {
    /// From the distance to rest at `t = 0`, and the values there of `w' - lambda w` (about rest) and
    /// `w'' - lambda w'`, which hold no more of `exp(lambda t)`.
    #[must_use]
    pub fn new(of: Spectrum, rest: f64, away: f64, without: [f64; 2]) -> Self {
        let Spectrum { lambda, pair, apart, far } = of;
        let shift = pair.decay + lambda;
        let (p, q) = (without[0], without[1] + pair.decay * without[0]);
        if far {
            let (cosine, sine) = (-(shift * p + q) / apart, (pair.q * p - shift * q) / apart);
            return Self { of, rest, a: [cosine, sine, away - cosine] };
        }
        let second = p + shift * away;
        Self { of, rest, a: [away, second, q + shift * second + pair.q * away] }
    }

    /// Value at `t`.
    #[must_use]
    pub fn value(&self, t: f64) -> f64 {
        self.value_of_basis(self.of.basis(t))
    }

    /// Value where the three functions are known.
    #[must_use]
    pub(super) fn value_of_basis(&self, [c, s, f]: [f64; 3]) -> f64 {
        self.rest + self.a[0] * c + self.a[1] * s + self.a[2] * f
    }

    /// The time derivative.
    #[must_use]
    pub fn derivative(&self) -> Self {
        let Spectrum { lambda, pair, .. } = self.of;
        let [p, q, r] = self.a;
        // (e^mu C)' = mu e^mu C - q e^mu S; (e^mu S)' = e^mu C + mu e^mu S; f' = lambda f + e^mu S.
        let a = [q - pair.decay * p, self.coupled() - pair.decay * q - pair.q * p, lambda * r];
        Self { of: self.of, rest: 0.0, a }
    }

    /// What the third function adds to `S` when differentiated.
    fn coupled(&self) -> f64 {
        if self.of.far { 0.0 } else { self.a[2] }
    }

    /// Coefficients of the three exponentials on their own: of `exp(lambda t)`, `C` and `S`.
    fn split(&self) -> (f64, f64, f64) {
        let [p, q, r] = self.a;
        if self.of.far {
            return (r, p, q);
        }
        let alone = r / self.of.apart;
        (alone, p - alone, q - alone * (self.of.pair.decay + self.of.lambda))
    }

    /// `a w + b`.
    #[must_use]
    pub fn scaled(&self, a: f64, b: f64) -> Self {
        Self { of: self.of, rest: a * self.rest + b, a: self.a.map(|x| a * x) }
    }

    /// A bound on `|w - rest|` for all times from `t` on.
    #[must_use]
    pub fn distance_bound(&self, t: f64) -> f64 {
        if self.of.far { self.split_bound(t) } else { self.split_bound(t).min(self.joint_bound(t)) }
    }

    /// From the three exponentials one by one: tight when the roots are apart.
    fn split_bound(&self, t: f64) -> f64 {
        let Spectrum { lambda, pair, .. } = self.of;
        let (alone, p, q) = self.split();
        let own = alone.abs() * (lambda * t).exp();
        if pair.q > 0.0 {
            return own + (-pair.decay * t).exp() * p.hypot(q / pair.frequency);
        }
        let (a, b) = (0.5 * (p + q / pair.frequency), 0.5 * (p - q / pair.frequency));
        let slow = pair.stiffness / (pair.decay + pair.frequency);
        own + a.abs() * (-slow * t).exp() + b.abs() * (-(pair.decay + pair.frequency) * t).exp()
    }

    /// From `|C| <= e^(delta t)`, `|S| <= t e^(delta t)`, `|f| <= t^2/2 e^(nu t)` with the slowest decay `nu`: tight
    /// when the roots meet.
    fn joint_bound(&self, t: f64) -> f64 {
        let nu = self.of.slowest();
        // t^n exp(-nu t) falls only after n/nu: take its largest value from t on.
        let largest = |n: f64| {
            let at = t.max(n / nu);
            at.powf(n) * (-nu * at).exp()
        };
        let [p, q, r] = self.a.map(f64::abs);
        p * largest(0.0) + q * largest(1.0) + 0.5 * r * largest(2.0)
    }

    /// Integral of `w^2` over `0..t` for a wave with rest value 0, relative accuracy about 1e-12.
    #[must_use]
    pub fn square_integral(&self, t: f64) -> f64 {
        let Spectrum { lambda, pair, far, .. } = self.of;
        if !(far && pair.q > 0.0 && pair.frequency > 0.3 * pair.decay) {
            let wave = if pair.q > 0.0 { pair.frequency } else { 0.0 };
            return integral_with_waves(|time| self.value(time).powi(2), t, self.of.fastest(), wave);
        }
        let (alone, p, q) = self.split();
        let (re, im) = (p, -q / pair.frequency);
        let steady = 0.5 * re.hypot(im).powi(2) * decayed_time(2.0 * pair.decay, t);
        alone * alone * decayed_time(-2.0 * lambda, t)
            + 2.0 * alone * waving_integral(re, im, pair.decay - lambda, pair.frequency, t)
            + steady
            + 0.5 * waving_integral(re * re - im * im, 2.0 * re * im, 2.0 * pair.decay, 2.0 * pair.frequency, t)
    }

    /// First passage of `level` in `(from, to]`, on the stretches between turning points.
    #[must_use]
    pub fn first_passing(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<Passing> {
        let away = |t: f64| self.value(t) - level;
        let mut turns = Turns::new(self, from, to);
        let (mut a, mut fa) = (from, away(from));
        loop {
            if self.never(level, passage, fa, a) {
                return None;
            }
            let turn = turns.next();
            let b = turn.map_or(turns.at, |turn| turn.time);
            let fb = away(b);
            if passage.shows(fa, fb) {
                let both = |t: f64| {
                    let basis = self.of.basis(t);
                    (self.value_of_basis(basis) - level, turns.rate.value_of_basis(basis))
                };
                let time = if fb == 0.0 { b } else { monotone_zero(both, a, fa, b, fb) };
                return Some(Passing { time, beyond: fb.abs() });
            }
            turn?;
            (a, fa) = (b, fb);
        }
    }

    /// Whether no passage can come after `t`, where the distance to the level is `away`.
    fn never(&self, level: f64, passage: Passage, away: f64, t: f64) -> bool {
        let bound = self.distance_bound(t);
        let (top, bottom) = (self.rest + bound, self.rest - bound);
        match passage {
            Passage::Up => top < level,
            Passage::Down => bottom > level || (away <= 0.0 && top < level),
        }
    }

    /// First maximum in `(from, to]`.
    #[must_use]
    pub fn first_maximum(&self, from: f64, to: f64) -> Option<f64> {
        Turns::new(self, from, to).find(|turn| turn.is_maximum).map(|turn| turn.time)
    }
}

impl Wave {
    /// The largest value over `0..length` and when it is reached. Maxima are looked at until no later one can be larger.
    #[must_use]
    pub fn largest(&self, length: f64) -> (f64, f64) {
        let larger = |best: (f64, f64), t: f64| {
            let value = self.value(t);
            if value > best.0 { (value, t) } else { best }
        };
        let mut best = larger((self.value(0.0), 0.0), length);
        for turn in Turns::new(self, 0.0, length) {
            if turn.is_maximum {
                best = larger(best, turn.time);
            }
            if self.rest + self.distance_bound(turn.time) <= best.0 {
                break;
            }
        }
        best
    }
}

/// Share of a motion's first size below which it is not looked at: rounding of the other exponentials is near.
const RESOLUTION: f64 = 1e-14;

/// Turning points of a wave, in order.
///
/// `w'' - lambda w'` holds no more of `exp(lambda t)`: it is a swing whose zeros are in closed form, and between two of
/// them `w' exp(-lambda t)` is monotone, so `w'` has at most one zero there.
struct Turns {
    rate: Wave,
    /// The next zero of the swing and the distance to the one after.
    bend: Option<(f64, f64)>,
    at: f64,
    slope: f64,
    to: f64,
    floor: f64,
}

impl Turns {
    fn new(wave: &Wave, from: f64, to: f64) -> Self {
        let rate = wave.derivative();
        let Spectrum { lambda, pair, .. } = wave.of;
        let [p, q, _] = rate.a;
        let shift = pair.decay + lambda;
        let swing = Swing { of: pair, rest: 0.0, p: q - shift * p, q: rate.coupled() - shift * q - pair.q * p };
        let floor = RESOLUTION * rate.distance_bound(0.0);
        Self { rate, bend: swing.first_zero(from), at: from, slope: rate.value(from), to, floor }
    }
}

impl Iterator for Turns {
    type Item = Turn;

    fn next(&mut self) -> Option<Turn> {
        while self.at < self.to {
            if self.rate.distance_bound(self.at) < self.floor {
                return None;
            }
            let (a, fa) = (self.at, self.slope);
            // Looking in at doubling times, too, tells a sign from what rounding leaves of it much later.
            let look = self.to.min(2.0 * a + 1.0 / self.rate.of.fastest());
            let b = match self.bend {
                Some((bend, gap)) if bend < look => {
                    self.bend = (gap.is_finite()).then_some((bend + gap, gap));
                    bend
                }
                _ => look,
            };
            let fb = self.rate.value(b);
            (self.at, self.slope) = (b, fb);
            let passage = [Passage::Up, Passage::Down].into_iter().find(|p| p.shows(fa, fb));
            if let Some(passage) = passage {
                let bend = self.rate.derivative();
                let time = monotone_zero(
                    |t| {
                        let basis = self.rate.of.basis(t);
                        (self.rate.value_of_basis(basis), bend.value_of_basis(basis))
                    },
                    a,
                    fa,
                    b,
                    fb,
                );
                return Some(Turn { time, is_maximum: passage == Passage::Down });
            }
        }
        None
    }
}

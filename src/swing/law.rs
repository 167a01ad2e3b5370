//! What the line path does in one mode: every quantity is affine in the distance from the pivot, its rate, and the
//! stretches that have a motion of their own.
use super::poly::{LEN, Poly};
use crate::arrest::Mode;
use crate::physics::{Group, Piece, SeriesPath};

/// `one + rho * distance + rate * distance' + a . stretches`.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Affine {
    pub one: f64,
    pub rho: f64,
    pub rate: f64,
    pub a: [f64; 2],
}

impl Affine {
    pub const fn constant(one: f64) -> Self {
        Self { one, rho: 0.0, rate: 0.0, a: [0.0; 2] }
    }

    const fn stretch(group: usize) -> Self {
        let mut a = [0.0; 2];
        a[group] = 1.0;
        Self { one: 0.0, rho: 0.0, rate: 0.0, a }
    }

    fn times(self, factor: f64) -> Self {
        Self { one: factor * self.one, rho: factor * self.rho, rate: factor * self.rate, a: self.a.map(|a| factor * a) }
    }

    fn plus(self, other: Self) -> Self {
        Self {
            one: self.one + other.one,
            rho: self.rho + other.rho,
            rate: self.rate + other.rate,
            a: [self.a[0] + other.a[0], self.a[1] + other.a[1]],
        }
    }

    fn minus(self, other: Self) -> Self {
        self.plus(other.times(-1.0))
    }

    fn shifted(self, by: f64) -> Self {
        Self { one: self.one + by, ..self }
    }

    /// Value for a distance, its rate and the stretches.
    pub fn value(&self, rho: f64, rate: f64, a: [f64; 2]) -> f64 {
        self.one + self.rho * rho + self.rate * rate + self.a[0] * a[0] + self.a[1] * a[1]
    }

    /// One coefficient of its power series; `factor` is `k + 1`.
    pub fn coefficient(&self, k: usize, factor: f64, rho: &Poly, a: &[Poly; 2]) -> f64 {
        let rate = if self.rate == 0.0 { 0.0 } else { self.rate * factor * rho[k + 1] };
        let own = if k == 0 { self.one } else { 0.0 };
        own + self.rho * rho[k] + rate + self.a[0] * a[0][k] + self.a[1] * a[1][k]
    }

    /// Its power series; without a rate.
    pub fn series(&self, rho: &Poly, a: &[Poly; 2]) -> Poly {
        let mut p = [0.0; LEN];
        for k in 0..LEN {
            p[k] = self.rho * rho[k] + self.a[0] * a[0][k] + self.a[1] * a[1][k];
        }
        p[0] += self.one;
        p
    }
}

/// Where the line force comes from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Force {
    /// No force.
    Slack,
    /// From the stretch.
    Along(Affine),
    /// What keeps a rigid line at its length, m.
    Held(f64),
}

/// Relaxation of a damped group without force: rest, m, and rate, 1/s.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Relaxation {
    pub rest: f64,
    pub rate: f64,
}

/// One mode on given straight pieces.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Law {
    pub mode: Mode,
    pub force: Force,
    /// Rates of the stretches that have a motion of their own.
    pub drift: [Affine; 2],
    /// Stretch of the groups.
    pub e: [Affine; 2],
    /// Deployed length.
    pub s: Affine,
    /// Rates of stretch of the damped groups.
    pub e_rate: [Affine; 2],
    /// Damping of the groups, 0 where none.
    pub damping: [f64; 2],
    /// Slack only.
    pub relaxation: [Relaxation; 2],
}

/// Pieces in force.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Pieces {
    pub group: [usize; 2],
    pub slider: usize,
}

impl Pieces {
    pub fn of(path: &SeriesPath, e: [f64; 2], s: f64) -> Self {
        Self {
            group: [path.line.elastic.piece_at(e[0]), path.other.elastic.piece_at(e[1])],
            slider: path.absorber.as_ref().map_or(0, |a| a.force.piece_at(s)),
        }
    }
}

/// An elastic group on its piece, `f = p + k e`.
#[derive(Clone, Copy)]
struct Part {
    p: f64,
    k: f64,
    c: f64,
}

impl Part {
    fn of(group: &Group, piece: usize) -> Option<Self> {
        let Piece { x0, y0, slope, .. } = group.elastic.piece(piece)?;
        let c = if group.is_damped() { group.damping_n_s_per_m } else { 0.0 };
        Some(Self { p: y0 - slope * x0, k: slope, c })
    }

    fn is_damped(&self) -> bool {
        self.c > 0.0
    }

    fn force(&self, e: Affine) -> Affine {
        e.times(self.k).shifted(self.p)
    }

    fn stretch(&self, force: Affine) -> Affine {
        force.shifted(-self.p).times(1.0 / self.k)
    }
}

/// A path on given pieces, ready for each mode.
pub struct Laws {
    parts: [Option<Part>; 2],
    length: f64,
}

impl Laws {
    pub fn new(path: &SeriesPath, pieces: Pieces, free_length_m: f64) -> Self {
        let parts = [Part::of(&path.line, pieces.group[0]), Part::of(&path.other, pieces.group[1])];
        Self { parts, length: free_length_m }
    }

    fn blank(&self, mode: Mode, force: Force, s: Affine) -> Law {
        let zero = [Affine::default(); 2];
        let damping = self.parts.map(|part| part.map_or(0.0, |p| p.c));
        let relaxation = [Relaxation::default(); 2];
        Law { mode, force, drift: zero, e: zero, s, e_rate: zero, damping, relaxation }
    }

    /// No force: damped groups relax on their own.
    pub fn slack(&self, s: f64) -> Law {
        let mut law = self.blank(Mode::Slack, Force::Slack, Affine::constant(s));
        for (i, part) in self.damped() {
            law.e[i] = Affine::stretch(i);
            law.relaxation[i] = Relaxation { rest: -part.p / part.k, rate: part.k / part.c };
        }
        law
    }

    fn damped(&self) -> impl Iterator<Item = (usize, Part)> {
        let parts = self.parts;
        (0..2).filter_map(move |i| Some((i, parts[i].filter(Part::is_damped)?)))
    }

    fn springs(&self) -> impl Iterator<Item = (usize, Part)> {
        let parts = self.parts;
        (0..2).filter_map(move |i| Some((i, parts[i].filter(|p| !p.is_damped())?)))
    }

    /// Taut, the slider held at `s`.
    pub fn stuck(&self, s: f64) -> Law {
        let mut law = self.blank(Mode::Stuck, Force::Held(self.length + s), Affine::constant(s));
        let total = Affine { rho: 1.0, ..Affine::constant(-self.length - s) };
        match self.parts {
            [None, None] => {}
            [Some(one), Some(two)] if one.is_damped() && two.is_damped() => Self::two_damped(&mut law, one, two, total),
            _ => match self.damped().next() {
                Some((d, part)) => self.one_damped(&mut law, d, part, total),
                None => self.undamped(&mut law, total),
            },
        }
        law
    }

    fn undamped(&self, law: &mut Law, total: Affine) {
        let compliance: f64 = self.springs().map(|(_, part)| 1.0 / part.k).sum();
        let preload: f64 = self.springs().map(|(_, part)| part.p / part.k).sum();
        let force = total.shifted(preload).times(1.0 / compliance);
        law.force = Force::Along(force);
        for (i, part) in self.springs() {
            law.e[i] = part.stretch(force);
        }
    }

    fn one_damped(&self, law: &mut Law, d: usize, part: Part, total: Affine) {
        match self.springs().next() {
            None => {
                let rate = Affine { rate: 1.0, ..Affine::default() };
                law.e[d] = total;
                law.e_rate[d] = rate;
                law.force = Force::Along(part.force(total).plus(rate.times(part.c)));
            }
            Some((u, spring)) => {
                let own = Affine::stretch(d);
                law.e[d] = own;
                law.e[u] = total.minus(own);
                let force = spring.force(law.e[u]);
                law.force = Force::Along(force);
                law.drift[d] = force.minus(part.force(own)).times(1.0 / part.c);
                law.e_rate[d] = law.drift[d];
            }
        }
    }

    fn two_damped(law: &mut Law, one: Part, two: Part, total: Affine) {
        let own = Affine::stretch(0);
        let rate = Affine { rate: 1.0, ..Affine::default() };
        law.e = [own, total.minus(own)];
        let difference = two.force(law.e[1]).minus(one.force(own)).plus(rate.times(two.c));
        law.drift[0] = difference.times(1.0 / (one.c + two.c));
        law.e_rate = [law.drift[0], rate.minus(law.drift[0])];
        law.force = Force::Along(one.force(own).plus(law.drift[0].times(one.c)));
    }

    /// Taut, the slider moving on a straight piece of its table: `T = F(s)`.
    pub fn sliding(&self, slider: Piece) -> Law {
        let mut law = self.blank(Mode::Sliding, Force::Slack, Affine::default());
        let at_zero = slider.y0 - slider.slope * slider.x0;
        let mut share = 1.0;
        let mut left = Affine { rho: 1.0, ..Affine::constant(-self.length) };
        for (i, _) in self.damped() {
            left = left.minus(Affine::stretch(i));
        }
        for (_, part) in self.springs() {
            share += slider.slope / part.k;
            left = left.shifted(-(at_zero - part.p) / part.k);
        }
        law.s = left.times(1.0 / share);
        let force = law.s.times(slider.slope).shifted(at_zero);
        law.force = Force::Along(force);
        for (i, part) in self.springs() {
            law.e[i] = part.stretch(force);
        }
        for (i, part) in self.damped() {
            law.e[i] = Affine::stretch(i);
            law.drift[i] = force.minus(part.force(law.e[i])).times(1.0 / part.c);
            law.e_rate[i] = law.drift[i];
        }
        law
    }
}

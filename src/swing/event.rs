//! The first event in a step.
use super::law::{Law, Pieces};
use super::poly::{self, Poly, deflated, derivative, first_fall, scaled};
use super::series::Series;
use crate::arrest::Mode;
use crate::physics::SeriesPath;

/// Relative size of a passage that is told from touching a level.
const TOUCH: f64 = 1e-11;
/// Rounding of a difference of two numbers of size 1.
const ROUNDING: f64 = 32.0 * f64::EPSILON;

/// What ends a step before its length.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum End {
    Slack,
    Taut,
    Onset,
    SliderStops,
    StrokeUsedUp,
    SliderKnot,
    /// Which group, and whether upward.
    Knot(usize, bool),
    /// The horizontal velocity turns; straight below the pivot: the first rebound is over.
    Reversal,
}

/// What the search needs to know besides the series.
pub struct Sight<'a> {
    pub path: &'a SeriesPath,
    pub law: &'a Law,
    pub pieces: Pieces,
    pub free_length: f64,
    /// The mode has just begun.
    pub fresh: bool,
    /// Force that moves the slider, if any can.
    pub moving_force: Option<f64>,
    pub weight: f64,
}

/// Stretch and deployed length over the unit interval.
pub struct Lengths {
    pub e: [Poly; 2],
    pub s: Poly,
}

impl Lengths {
    pub fn of(law: &Law, series: &Series) -> Self {
        let of = |affine: &super::law::Affine| affine.series(&series.rho, &series.a);
        Self { e: [of(&law.e[0]), of(&law.e[1])], s: of(&law.s) }
    }
}

struct Earliest(Option<(f64, End)>);

impl Earliest {
    fn offer(&mut self, at: Option<f64>, end: End) {
        if let Some(at) = at.filter(|&t| self.0.is_none_or(|(best, _)| t < best)) {
            self.0 = Some((at, end));
        }
    }
}

impl Sight<'_> {
    /// First end of the path's mode, as a share of the step.
    pub fn first(&self, series: &Series, lengths: &Lengths) -> Option<(f64, End)> {
        let mut first = Earliest(None);
        match self.law.mode {
            Mode::Stuck => self.stuck(series, &mut first),
            Mode::Sliding => self.sliding(lengths, series, &mut first),
            Mode::Slack => first.offer(self.taut_again(series, lengths), End::Taut),
        }
        self.knots(lengths, series.rho[0], &mut first);
        first.0
    }

    /// Rounding of the force: it is a stiffness times a small difference of lengths.
    fn force_noise(&self, rho: f64) -> f64 {
        match self.law.force {
            super::law::Force::Along(force) => ROUNDING * force.rho.abs() * rho,
            _ => 0.0,
        }
    }

    fn stuck(&self, series: &Series, first: &mut Earliest) {
        let noise = self.force_noise(series.rho[0]);
        let scale = self.weight.max(series.force[0].abs());
        if let Some(level) = self.moving_force {
            let above = self.above(level, series.rho[0]);
            first.offer(first_fall(&scaled(&series.force, -1.0, above)), End::Onset);
        }
        first.offer(first_fall(&scaled(&series.force, 1.0, TOUCH * scale + noise)), End::Slack);
    }

    /// A level and what counts as passing it.
    pub fn above(&self, level: f64, rho: f64) -> f64 {
        level * (1.0 + TOUCH) + self.force_noise(rho)
    }

    fn sliding(&self, lengths: &Lengths, series: &Series, first: &mut Earliest) {
        let Some(absorber) = &self.path.absorber else { return };
        let rate = derivative(&lengths.s);
        first.offer(self.stops(rate, series), End::SliderStops);
        let knot = absorber.force.piece(self.pieces.slider).x1;
        let (level, end) =
            if knot < absorber.stroke_m { (knot, End::SliderKnot) } else { (absorber.stroke_m, End::StrokeUsedUp) };
        first.offer(first_fall(&scaled(&lengths.s, -1.0, level)), end);
    }

    /// When the slider stops. A damped line alone starts it at no speed at all: then its acceleration decides.
    fn stops(&self, mut rate: Poly, series: &Series) -> Option<f64> {
        let travel = series.rho[1].abs();
        let jitter: f64 = self.law.e_rate.iter().map(|e| e.a[0].abs().max(e.a[1].abs())).sum::<f64>() * series.rho[0];
        if !self.fresh || rate[0] > TOUCH * travel + ROUNDING * jitter * series.x[1].hypot(series.z[1]) {
            return first_fall(&rate);
        }
        rate[0] = 0.0;
        let slope = deflated(&rate, 1);
        if slope[0] > 0.0 { first_fall(&slope) } else { Some(0.0) }
    }

    /// When a slack path is taut again: `(L + s + e1 + e2)^2 - x^2 - z^2` falls through zero. Where the path has just let
    /// go it starts at a zero that is simple with a spring, double with dampers only, threefold when rigid.
    fn taut_again(&self, series: &Series, lengths: &Lengths) -> Option<f64> {
        let mut reach = lengths.s;
        for e in &lengths.e {
            for (sum, c) in reach.iter_mut().zip(e) {
                *sum += c;
            }
        }
        reach[0] += self.free_length;
        let mut gap = [0.0; poly::LEN];
        for (k, c) in gap.iter_mut().enumerate() {
            *c = square(&reach, k) - square(&series.x, k) - square(&series.z, k);
        }
        if self.fresh {
            // Rounding must not close what has only just begun to open.
            gap[..self.zeros()].iter_mut().for_each(|c| *c = c.max(0.0));
        }
        first_fall(&gap)
    }

    fn zeros(&self) -> usize {
        let groups = [&self.path.line, &self.path.other];
        if groups.iter().all(|g| g.is_rigid()) {
            3
        } else if groups.iter().all(|g| g.is_rigid() || g.is_damped()) {
            2
        } else {
            1
        }
    }

    fn knots(&self, lengths: &Lengths, rho: f64, first: &mut Earliest) {
        for (i, law) in [&self.path.line.elastic, &self.path.other.elastic].into_iter().enumerate() {
            let Some(piece) = law.piece(self.pieces.group[i]) else { continue };
            let hair = TOUCH * piece.x0 + ROUNDING * rho;
            if piece.x1.is_finite() {
                first.offer(first_fall(&scaled(&lengths.e[i], -1.0, piece.x1 + hair)), End::Knot(i, true));
            }
            if self.pieces.group[i] > 0 {
                first.offer(first_fall(&scaled(&lengths.e[i], 1.0, hair - piece.x0)), End::Knot(i, false));
            }
        }
    }
}

fn square(p: &Poly, k: usize) -> f64 {
    p[..=k].iter().zip(p[..=k].iter().rev()).map(|(a, b)| a * b).sum()
}

//! Constant acceleration with relaxing dampers: slack flight, and deployment at a constant force.
use super::roots::{Passage, Passing, first_passing, monotone_zero};
use super::signal::Turn;

/// `w(t) = c0 + c1 t + c2 t^2 + sum of E exp(-r t)` over at most two relaxations with `r > 0`.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Drift {
    /// Polynomial coefficients.
    pub c: [f64; 3],
    /// Amplitude and rate of each relaxation; amplitude 0 where there is none.
    pub relax: [(f64, f64); 2],
}

/// Turning points, at most three, in order.
type Turns = [Option<Turn>; 3];

impl Drift {
    fn exponentials(&self, t: f64) -> [(f64, f64); 2] {
        self.relax.map(|(e, r)| if e == 0.0 { (0.0, 0.0) } else { (e * (-r * t).exp(), r) })
    }

    /// Value, slope and curvature at `t`.
    fn jet(&self, t: f64) -> [f64; 3] {
        let [c0, c1, c2] = self.c;
        let mut jet = [c0 + t * (c1 + t * c2), c1 + 2.0 * c2 * t, 2.0 * c2];
        for (e, r) in self.exponentials(t) {
            jet[0] += e;
            jet[1] -= r * e;
            jet[2] += r * r * e;
        }
        jet
    }

    /// Value at `t`.
    #[must_use]
    pub fn value(&self, t: f64) -> f64 {
        self.jet(t)[0]
    }

    /// Value and slope at `t`.
    #[must_use]
    pub fn value_slope(&self, t: f64) -> (f64, f64) {
        let jet = self.jet(t);
        (jet[0], jet[1])
    }

    /// The time derivative.
    #[must_use]
    pub fn derivative(&self) -> Self {
        let [_, c1, c2] = self.c;
        Self { c: [c1, 2.0 * c2, 0.0], relax: self.relax.map(|(e, r)| (-e * r, r)) }
    }

    /// `a w + b`.
    #[must_use]
    pub fn scaled(&self, a: f64, b: f64) -> Self {
        let [c0, c1, c2] = self.c;
        Self { c: [a * c0 + b, a * c1, a * c2], relax: self.relax.map(|(e, r)| (a * e, r)) }
    }

    /// Amplitude and rate where it does nothing but relax, in one go; amplitude 0 where it never changes.
    fn only_relaxation(&self) -> Option<(f64, f64)> {
        let [first, second] = self.relax;
        let still = self.c[1] == 0.0 && self.c[2] == 0.0;
        match (first.0 == 0.0, second.0 == 0.0) {
            (_, true) if still => Some(first),
            (true, false) if still => Some(second),
            _ => None,
        }
    }

    /// The values at the start and at `t`, where it is monotone between for a plain reason: it only relaxes, or is a
    /// parabola whose slope has one sign at both ends.
    #[must_use]
    pub fn monotone_ends(&self, t: f64) -> Option<[f64; 2]> {
        let [_, c1, c2] = self.c;
        let parabola = self.relax.iter().all(|(e, _)| *e == 0.0) && c1 * (c1 + 2.0 * c2 * t) > 0.0;
        (parabola || self.only_relaxation().is_some()).then(|| [self.value(0.0), self.value(t)])
    }

    /// Whether it only relaxes, from and to values that are not above a level.
    #[must_use]
    pub fn stays_below(&self, level: f64) -> bool {
        self.only_relaxation().is_some_and(|(e, _)| self.c[0] + e.max(0.0) <= level)
    }

    /// First passage of `c0 + E exp(-r t)` in closed form.
    fn relaxed_passing(
        &self,
        (e, r): (f64, f64),
        level: f64,
        passage: Passage,
        (from, to): (f64, f64),
    ) -> Option<Passing> {
        let at = |t: f64| self.value(t) - level;
        let (start, end) = (at(from), at(to));
        if e == 0.0 || !passage.shows(start, end) {
            return None;
        }
        // exp(-r t) = (level - c0)/E = 1 - (value at 0 - level)/E.
        let time = -(-(self.c[0] + e - level) / e).ln_1p() / r;
        Some(Passing { time: time.clamp(from, to), beyond: end.abs() })
    }

    /// With a single relaxation, where the curvature `2 c2 + E r^2 exp(-r t)` is zero, or not a number where it never
    /// is.
    fn only_bend(&self) -> Option<f64> {
        let [(e1, r1), (e2, r2)] = self.relax;
        let (e, r) = if e2 == 0.0 { (e1, r1) } else { (e2, r2) };
        (e1 == 0.0 || e2 == 0.0).then(|| (-e * r * r / (2.0 * self.c[2])).ln() / r)
    }

    /// Where the third derivative is zero: at most once.
    fn third_derivative_zero(&self) -> Option<f64> {
        let [(e1, r1), (e2, r2)] = self.relax;
        let t = (-(e1 * r1.powi(3)) / (e2 * r2.powi(3))).ln() / (r1 - r2);
        (t.is_finite() && t > 0.0).then_some(t)
    }

    /// Turning points in `(from, to]`, by the chain of derivatives: the third derivative has at most one zero, so the
    /// curvature has at most two, so the slope at most three.
    #[must_use]
    pub fn turns(&self, from: f64, to: f64) -> Turns {
        let mut turns = [None; 3];
        let slope = self.derivative();
        let flat = self.relax.iter().all(|(e, _)| *e == 0.0);
        if flat {
            let time = -self.c[1] / (2.0 * self.c[2]);
            if time > from && time <= to {
                turns[0] = Some(Turn { time, is_maximum: self.c[2] < 0.0 });
            }
            return turns;
        }
        let curvature = slope.derivative();
        let bends = match self.only_bend() {
            Some(bend) => [Some(bend).filter(|&t| t > from && t < to), None, None],
            None => {
                crossings(&curvature, from, self.third_derivative_zero().into_iter(), to).map(|b| b.map(|(t, _)| t))
            }
        };
        let found = crossings(&slope, from, bends.into_iter().flatten(), to);
        for (slot, (time, passage)) in turns.iter_mut().zip(found.into_iter().flatten()) {
            *slot = Some(Turn { time, is_maximum: passage == Passage::Down });
        }
        turns
    }

    /// First passage of `level` in `(from, to]`.
    #[must_use]
    pub fn first_passing(&self, level: f64, passage: Passage, from: f64, to: f64) -> Option<Passing> {
        if let Some(relaxation) = self.only_relaxation() {
            return self.relaxed_passing(relaxation, level, passage, (from, to));
        }
        let turns = self.turns(from, to);
        first_passing(
            |t| {
                let (w, slope) = self.value_slope(t);
                (w - level, slope)
            },
            passage,
            from,
            turns.into_iter().flatten().map(|turn| turn.time),
            to,
        )
    }
}

fn crossings(
    f: &Drift,
    from: f64,
    monotone_between: impl Iterator<Item = f64>,
    to: f64,
) -> [Option<(f64, Passage)>; 3] {
    let mut found = [None; 3];
    let mut count = 0;
    let (mut a, mut fa) = (from, f.value(from));
    for b in monotone_between.filter(|&t| t > from && t < to).chain(std::iter::once(to)) {
        let fb = f.value(b);
        let passage = [Passage::Up, Passage::Down].into_iter().find(|p| p.shows(fa, fb));
        if let Some(passage) = passage.filter(|_| count < 3) {
            found[count] = Some((monotone_zero(|t| f.value_slope(t), a, fa, b, fb), passage));
            count += 1;
        }
        (a, fa) = (b, fb);
    }
    found
}

//! The equations of one mode, written down from the force balance of the series path.
use super::case::{Case, Law, Part};
use ode_solvers::{Dop853, OutputType, SVector, System};

/// Travel, speed, two stretches, deployed length, work of dampers, work of the slider, gap.
pub type State = SVector<f64, 8>;
pub const X: usize = 0;
pub const V: usize = 1;
pub const E: [usize; 2] = [2, 3];
pub const S: usize = 4;
pub const DAMPER_WORK: usize = 5;
pub const SLIDER_WORK: usize = 6;
pub const GAP: usize = 7;

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mode {
    Stuck,
    Sliding,
    Slack,
}

/// Everything that follows from a state at an instant.
#[derive(Clone, Copy, Debug, Default)]
pub struct View {
    pub stretch: [f64; 2],
    pub stretch_rate: [f64; 2],
    pub slide_rate: f64,
    pub force: f64,
    pub force_rate: f64,
    pub acceleration: f64,
}

/// Piece of a knot table that holds `x`: left knot and slope; the last slope goes on.
fn piece(knots: &[(f64, f64)], x: f64) -> ((f64, f64), f64) {
    let last = knots.len() - 2;
    let i = knots[1..].iter().position(|knot| x < knot.0).unwrap_or(last).min(last);
    let slope = (knots[i + 1].1 - knots[i].1) / (knots[i + 1].0 - knots[i].0);
    (knots[i], slope)
}

pub fn interpolate(knots: &[(f64, f64)], x: f64) -> f64 {
    let (left, slope) = piece(knots, x);
    left.1 + slope * (x - left.0)
}

impl Law {
    pub fn force(&self, stretch: f64) -> f64 {
        match self {
            Self::Rigid => 0.0,
            Self::Linear(k) => k * stretch,
            Self::Curve(knots) => interpolate(knots, stretch),
        }
    }

    pub fn slope(&self, stretch: f64) -> f64 {
        match self {
            Self::Rigid => f64::INFINITY,
            Self::Linear(k) => *k,
            Self::Curve(knots) => piece(knots, stretch).1,
        }
    }

    pub fn stretch(&self, force: f64) -> f64 {
        match self {
            Self::Rigid => 0.0,
            Self::Linear(k) => force / k,
            Self::Curve(knots) => {
                let turned: Vec<_> = knots.iter().map(|knot| (knot.1, knot.0)).collect();
                interpolate(&turned, force)
            }
        }
    }

    pub fn energy(&self, stretch: f64) -> f64 {
        match self {
            Self::Rigid => 0.0,
            Self::Linear(k) => 0.5 * k * stretch * stretch,
            Self::Curve(knots) => {
                let mut sum = 0.0;
                let mut at = (0.0, 0.0);
                for knot in knots.iter().skip(1).filter(|knot| knot.0 < stretch) {
                    sum += 0.5 * (at.1 + knot.1) * (knot.0 - at.0);
                    at = *knot;
                }
                sum + 0.5 * (at.1 + self.force(stretch)) * (stretch - at.0)
            }
        }
    }

    /// Both in series: stretches add at equal force.
    fn series(&self, other: &Self) -> Self {
        match (self, other) {
            (Self::Rigid, law) | (law, Self::Rigid) => law.clone(),
            (Self::Linear(a), Self::Linear(b)) => Self::Linear(a * b / (a + b)),
            _ => {
                let mut forces: Vec<f64> = [self, other].iter().flat_map(|law| law.knot_forces()).collect();
                forces.sort_by(f64::total_cmp);
                forces.dedup();
                Self::Curve(forces.iter().map(|f| (self.stretch(*f) + other.stretch(*f), *f)).collect())
            }
        }
    }

    fn knot_forces(&self) -> Vec<f64> {
        match self {
            Self::Curve(knots) => knots.iter().map(|knot| knot.1).collect(),
            _ => vec![0.0, 1e9],
        }
    }
}

impl Part {
    pub fn is_damped(&self) -> bool {
        self.law != Law::Rigid && self.damping > 0.0
    }

    fn is_spring(&self) -> bool {
        self.law != Law::Rigid && self.damping == 0.0
    }
}

/// The equations of motion in one mode.
pub struct Flow<'a> {
    pub case: &'a Case,
    pub mode: Mode,
    /// Both springs without damper in series, if there is any.
    pub springs: Law,
    pub relative_tolerance: f64,
}

impl<'a> Flow<'a> {
    pub fn new(case: &'a Case, relative_tolerance: f64) -> Self {
        let law = |part: &Part| if part.is_spring() { part.law.clone() } else { Law::Rigid };
        let springs = law(&case.line).series(&law(&case.other));
        Self { case, mode: Mode::Stuck, springs, relative_tolerance }
    }

    pub fn parts(&self) -> [&'a Part; 2] {
        [&self.case.line, &self.case.other]
    }

    pub fn slider_force(&self, deployed: f64) -> f64 {
        self.case.slider.as_ref().map_or(f64::INFINITY, |slider| interpolate(&slider.force, deployed))
    }

    /// Relaxation of the damped parts under a given line force.
    fn relax(&self, y: &State, view: &mut View) {
        for (i, part) in self.parts().into_iter().enumerate().filter(|(_, part)| part.is_damped()) {
            view.stretch[i] = y[E[i]];
            view.stretch_rate[i] = (view.force - part.law.force(y[E[i]])) / part.damping;
        }
    }

    fn slide(&self, y: &State, view: &mut View) {
        let slider = self.case.slider.as_ref().expect("a slider");
        let slope = piece(&slider.force, y[S]).1;
        view.force = self.slider_force(y[S]);
        self.relax(y, view);
        let mut share = 1.0;
        for (i, part) in self.parts().into_iter().enumerate().filter(|(_, part)| part.is_spring()) {
            view.stretch[i] = part.law.stretch(view.force);
            share += slope / part.law.slope(view.stretch[i]);
        }
        let free = y[V] - view.stretch_rate.iter().sum::<f64>();
        view.slide_rate = free / share;
        view.force_rate = slope * view.slide_rate;
        for (i, part) in self.parts().into_iter().enumerate().filter(|(_, part)| part.is_spring()) {
            view.stretch_rate[i] = view.force_rate / part.law.slope(view.stretch[i]);
        }
    }

    fn hold(&self, y: &State, view: &mut View) {
        let total = y[X] - y[S];
        let parts = self.parts();
        let damped: Vec<usize> = (0..2).filter(|i| parts[*i].is_damped()).collect();
        if self.springs != Law::Rigid {
            let strain = total - damped.iter().map(|i| y[E[*i]]).sum::<f64>();
            view.force = self.springs.force(strain);
            self.relax(y, view);
            view.force_rate = self.springs.slope(strain) * (y[V] - view.stretch_rate.iter().sum::<f64>());
            for (i, part) in parts.into_iter().enumerate().filter(|(_, part)| part.is_spring()) {
                view.stretch[i] = part.law.stretch(view.force);
                view.stretch_rate[i] = view.force_rate / part.law.slope(view.stretch[i]);
            }
            return;
        }
        if let [i] = damped[..] {
            view.stretch[i] = total;
            view.stretch_rate[i] = y[V];
            view.force = parts[i].law.force(total) + parts[i].damping * y[V];
        } else {
            let (c1, c2) = (parts[0].damping, parts[1].damping);
            view.stretch = [y[E[0]], total - y[E[0]]];
            let (f1, f2) = (parts[0].law.force(view.stretch[0]), parts[1].law.force(view.stretch[1]));
            let rate = (f2 - f1 + c2 * y[V]) / (c1 + c2);
            view.stretch_rate = [rate, y[V] - rate];
            view.force = f1 + c1 * rate;
        }
    }

    /// `dT/dt` where only dampers carry the jump in acceleration.
    fn held_force_rate(&self, view: &View) -> f64 {
        let parts = self.parts();
        let slope = |i: usize| parts[i].law.slope(view.stretch[i]) * view.stretch_rate[i];
        match (parts[0].is_damped(), parts[1].is_damped()) {
            (true, true) => {
                let (c1, c2) = (parts[0].damping, parts[1].damping);
                (c2 * slope(0) + c1 * slope(1) + c1 * c2 * view.acceleration) / (c1 + c2)
            }
            (true, false) => slope(0) + parts[0].damping * view.acceleration,
            _ => slope(1) + parts[1].damping * view.acceleration,
        }
    }

    pub fn look(&self, y: &State) -> View {
        let mut view = View::default();
        match self.mode {
            Mode::Slack => self.relax(y, &mut view),
            Mode::Sliding => self.slide(y, &mut view),
            Mode::Stuck => self.hold(y, &mut view),
        }
        view.acceleration = self.case.gravity - view.force / self.case.mass;
        if self.mode == Mode::Stuck && self.springs == Law::Rigid {
            view.force_rate = self.held_force_rate(&view);
        }
        view
    }

    /// The state `span` later in the same mode.
    pub fn advance(&self, y: &State, span: f64) -> State {
        if span <= 0.0 {
            return *y;
        }
        let tolerance = self.relative_tolerance;
        let mut stepper = Dop853::from_param(
            Equations(self),
            0.0,
            span,
            span,
            *y,
            tolerance,
            0.1 * tolerance,
            0.9,
            0.0,
            0.333,
            6.0,
            span,
            span,
            10_000_000,
            u32::MAX,
            OutputType::Sparse,
        );
        stepper.integrate().expect("the reference integrates");
        *stepper.y_out().last().expect("a last state")
    }

    /// Energy above the hang position for the length deployed so far, J.
    pub fn energy_above_hang(&self, y: &State, view: &View) -> f64 {
        let weight = self.case.mass * self.case.gravity;
        let mut sum = 0.5 * self.case.mass * y[V] * y[V] - weight * (y[X] - y[S]);
        for (part, stretch) in self.parts().into_iter().zip(view.stretch) {
            let hang = part.law.stretch(weight);
            sum += part.law.energy(stretch) - part.law.energy(hang) + weight * hang;
        }
        sum
    }
}

struct Equations<'a, 'b>(&'a Flow<'b>);

impl System<f64, State> for Equations<'_, '_> {
    fn system(&self, _: f64, y: &State, dy: &mut State) {
        let view = self.0.look(y);
        dy[X] = y[V];
        dy[V] = view.acceleration;
        dy[S] = view.slide_rate;
        dy[SLIDER_WORK] = view.force * view.slide_rate;
        dy[DAMPER_WORK] = 0.0;
        dy[GAP] = y[V];
        for (i, part) in self.0.parts().into_iter().enumerate() {
            dy[E[i]] = view.stretch_rate[i];
            dy[GAP] -= view.stretch_rate[i];
            dy[DAMPER_WORK] += part.damping * view.stretch_rate[i] * view.stretch_rate[i];
        }
        if self.0.mode != Mode::Slack {
            dy[GAP] = 0.0;
        }
    }
}

//! An independent planar run: the equations of the path from the force balance, a general-purpose integrator of order
//! eight, fine looks for events and false position on repeated integrations.
use super::planes::Setup;
use crate::support::flow::{self, E, Flow, Mode, S, V, View, X};
use crate::support::reference::root;
use ode_solvers::{Dop853, OutputType, SVector, System};

/// Offset, elevation, their rates, two stretches, deployed length.
pub type State = SVector<f64, 7>;

/// What a run gives; times from taut.
#[derive(Clone, Debug, Default)]
pub struct Record {
    pub peak: (f64, f64),
    pub lowest: Option<(f64, State)>,
    pub end: Option<(f64, State)>,
    pub first_slack: Option<f64>,
    pub used_up: bool,
    pub stretch: [f64; 2],
    pub looks: usize,
}

struct Run<'a> {
    setup: &'a Setup,
    flow: Flow<'a>,
    longest: f64,
    now: f64,
    state: State,
    locked: bool,
    begun: bool,
    span: f64,
    record: Record,
}

struct Equations<'a, 'b>(&'a Flow<'b>, f64);

fn radius(y: &State) -> f64 {
    y[0].hypot(y[1])
}

fn look(flow: &Flow, length: f64, y: &State) -> View {
    let r = radius(y);
    let mut along = flow::State::zeros();
    along[X] = r - length;
    along[V] = (y[0] * y[2] + y[1] * y[3]) / r;
    along[E[0]] = y[4];
    along[E[1]] = y[5];
    along[S] = y[6];
    flow.look(&along)
}

impl System<f64, State> for Equations<'_, '_> {
    fn system(&self, _: f64, y: &State, dy: &mut State) {
        let view = look(self.0, self.1, y);
        let pull = view.force / (self.0.case.mass * radius(y));
        dy[0] = y[2];
        dy[1] = y[3];
        dy[2] = -pull * y[0];
        dy[3] = -pull * y[1] - self.0.case.gravity;
        dy[4] = view.stretch_rate[0];
        dy[5] = view.stretch_rate[1];
        dy[6] = view.slide_rate;
    }
}

/// Runs a setup to its first reversal of the horizontal velocity, or the limit.
pub fn run(setup: &Setup, relative_tolerance: f64, look: f64, time_limit: f64) -> Record {
    let mut run = Run::new(setup, relative_tolerance, look);
    run.catch();
    while run.record.end.is_none() && run.now < time_limit {
        run.step();
    }
    run.record.used_up = run.locked;
    run.record
}

/// The state so long after taut in the taut mode, in one integration without a look.
pub fn one_go(setup: &Setup, relative_tolerance: f64, span: f64) -> State {
    let mut run = Run::new(setup, relative_tolerance, 1.0);
    run.flow.mode = Mode::Stuck;
    run.at(span)
}

impl<'a> Run<'a> {
    fn new(setup: &'a Setup, relative_tolerance: f64, look: f64) -> Self {
        let flow = Flow::new(&setup.case, relative_tolerance);
        let stiffest = |i: usize| {
            let law = &flow.parts()[i].law;
            (0..200).map(|n| law.slope(f64::from(n) * 0.05)).fold(0.0, f64::max)
        };
        let fall = setup.case.speed_at_taut() + 1.0;
        let natural = (setup.case.mass / stiffest(0).min(stiffest(1))).sqrt();
        let longest = look * natural.min(setup.length / fall);
        let mut state = State::zeros();
        state[0] = setup.offset;
        state[1] = -setup.depth_at_taut();
        state[3] = -setup.case.speed_at_taut();
        Self {
            setup,
            flow,
            longest,
            now: 0.0,
            state,
            locked: false,
            begun: false,
            span: longest,
            record: Record::default(),
        }
    }

    fn limit(&self) -> f64 {
        match &self.setup.case.slider {
            Some(slider) if !self.locked => {
                if self.begun {
                    self.flow.slider_force(self.state[6])
                } else {
                    slider.onset
                }
            }
            _ => f64::INFINITY,
        }
    }

    fn look(&self, y: &State) -> View {
        look(&self.flow, self.setup.length, y)
    }

    fn at(&self, span: f64) -> State {
        if span <= 0.0 {
            return self.state;
        }
        let tolerance = self.flow.relative_tolerance;
        let mut stepper = Dop853::from_param(
            Equations(&self.flow, self.setup.length),
            0.0,
            span,
            span,
            self.state,
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

    fn root(&self, high: f64, f: impl Fn(&State, &View) -> f64) -> f64 {
        root(0.0, high, |span| {
            let y = self.at(span);
            f(&y, &self.look(&y))
        })
    }

    fn enter(&mut self, mode: Mode) {
        let view = self.look(&self.state);
        for i in 0..2 {
            let keeps = mode != Mode::Slack || self.flow.parts()[i].is_damped();
            self.state[4 + i] = if keeps { view.stretch[i] } else { 0.0 };
        }
        self.flow.mode = mode;
        self.span = 1e-5 * self.longest;
        let force = self.look(&self.state).force;
        self.note(self.now, force);
    }

    fn note(&mut self, time: f64, force: f64) {
        // Looks end anywhere on a flat top: only rounding is no larger peak.
        if force > self.record.peak.1 * (1.0 + 1e-13) {
            self.record.peak = (time, force);
        }
    }

    fn catch(&mut self) {
        self.flow.mode = Mode::Stuck;
        if self.look(&self.state).force > self.limit() { self.give_way() } else { self.enter(Mode::Stuck) }
    }

    fn give_way(&mut self) {
        let limit = self.limit();
        self.note(self.now, limit);
        let first = !self.begun;
        self.begun = true;
        if first && limit > self.flow.slider_force(self.state[6]) {
            self.snap_back(limit);
        }
        if !self.locked {
            self.enter(Mode::Sliding);
        }
    }

    fn snap_back(&mut self, onset: f64) {
        let view = self.look(&self.state);
        for (i, part) in self.flow.parts().into_iter().enumerate().filter(|(_, part)| part.is_damped()) {
            debug_assert!(part.is_damped());
            self.state[4 + i] = view.stretch[i];
        }
        let springs = self.flow.springs.clone();
        let strain = springs.stretch(onset);
        let left = self.setup.case.slider.as_ref().map_or(0.0, |slider| slider.stroke) - self.state[6];
        let excess = |given: f64| self.flow.slider_force(self.state[6] + given) - springs.force(strain - given);
        if strain == 0.0 {
            return;
        }
        let used_up = excess(left) < 0.0;
        self.state[6] += if used_up { left } else { root(0.0, left.min(strain), excess) };
        if used_up {
            self.locked = true;
            self.enter(Mode::Stuck);
        }
    }

    fn step(&mut self) {
        let span = self.span.min(self.longest);
        self.span = 2.0 * span;
        let last = self.at(span);
        let view = self.look(&last);
        let (next, at) = match self.flow.mode {
            Mode::Stuck => self.while_stuck(span, &view),
            Mode::Sliding => self.while_sliding(span, &last, &view),
            Mode::Slack => {
                let gap =
                    |y: &State, view: &View| radius(y) - self.setup.length - y[6] - view.stretch[0] - view.stretch[1];
                let met = gap(&last, &view) >= 0.0;
                (met.then_some(Next::Taut), if met { self.root_after(span, gap) } else { span })
            }
        };
        self.keep(at);
        match next {
            Some(Next::Taut) => self.catch(),
            Some(Next::Slack) => {
                self.record.first_slack.get_or_insert(self.now);
                self.enter(Mode::Slack);
            }
            Some(Next::Starts) => self.give_way(),
            Some(Next::Stops) => self.enter(Mode::Stuck),
            Some(Next::UsedUp) => {
                self.locked = true;
                self.enter(Mode::Stuck);
            }
            None => {}
        }
    }

    /// A root that is not the one the span starts at.
    fn root_after(&self, span: f64, f: impl Fn(&State, &View) -> f64) -> f64 {
        root(1e-9 * span, span, |span| {
            let y = self.at(span);
            f(&y, &self.look(&y))
        })
    }

    fn while_stuck(&self, span: f64, last: &View) -> (Option<Next>, f64) {
        let weight = self.setup.case.mass * self.setup.case.gravity;
        let limit = self.limit();
        let first = self.look(&self.state).force;
        if last.force < -1e-9 * weight.max(1e-3 * self.record.peak.1) {
            let at = if first > 0.0 { self.root(span, |_, view| view.force) } else { 0.0 };
            return (Some(Next::Slack), at);
        }
        if last.force > limit * (1.0 + 1e-11) && last.force > first {
            let at = if first < limit { self.root(span, |_, view| view.force - limit) } else { 0.0 };
            return (Some(Next::Starts), at);
        }
        (None, span)
    }

    fn while_sliding(&self, span: f64, last: &State, view: &View) -> (Option<Next>, f64) {
        let stroke = self.setup.case.slider.as_ref().map_or(0.0, |slider| slider.stroke);
        let stops = view.slide_rate < 0.0;
        let high = if stops { self.root(span, |_, view| view.slide_rate) } else { span };
        let reached = if stops { self.at(high)[6] } else { last[6] };
        if reached >= stroke {
            return (Some(Next::UsedUp), self.root(high, |y, _| y[6] - stroke));
        }
        (stops.then_some(Next::Stops), high)
    }

    /// Where a quantity is largest inside a span.
    fn top(&self, span: f64, f: &dyn Fn(&Self, &State) -> f64) -> Option<f64> {
        let dt = 1e-4 * span;
        let slope = |mid: f64| f(self, &self.at(mid + dt)) - f(self, &self.at(mid - dt));
        let turns = span > 0.0 && slope(dt) > 0.0 && slope(span - dt) < 0.0;
        turns.then(|| root(dt, span - dt, slope))
    }

    /// Takes the step, up to the reversal if that comes first, and notes peaks and turning points on the way.
    fn keep(&mut self, span: f64) {
        let first = self.state;
        let inward = -self.setup.offset.signum();
        let over = inward * first[2] > 0.0 && inward * self.at(span)[2] <= 0.0;
        let span = if over { root(0.0, span, |t| self.at(t)[2]) } else { span };
        let last = self.at(span);
        let force = |run: &Self, y: &State| run.look(y).force;
        if let Some(at) = self.top(span, &force) {
            self.note(self.now + at, force(self, &self.at(at)));
        }
        self.note(self.now + span, force(self, &last));
        for i in 0..2 {
            let stretch = |run: &Self, y: &State| run.look(y).stretch[i];
            let most = self.top(span, &stretch).map_or(0.0, |at| stretch(self, &self.at(at)));
            let ends = stretch(self, &last).max(stretch(self, &first));
            self.record.stretch[i] = most.max(ends).max(self.record.stretch[i]);
        }
        if first[3] < 0.0 && last[3] >= 0.0 {
            let at = root(0.0, span, |t| self.at(t)[3]);
            self.note_lowest(self.now + at, self.at(at));
        }
        self.now += span;
        self.state = last;
        self.record.looks += 1;
        if over {
            self.note_lowest(self.now, last);
            self.record.end = Some((self.now, last));
        }
    }

    fn note_lowest(&mut self, time: f64, state: State) {
        if self.record.lowest.is_none_or(|old| state[1] < old.1[1] - 1e-9 * self.setup.length) {
            self.record.lowest = Some((time, state));
        }
    }
}

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Next {
    Taut,
    Starts,
    Stops,
    UsedUp,
    Slack,
}

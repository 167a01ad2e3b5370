//! The reference run: a general-purpose integrator with event location of its own on top.
use super::case::Case;
use super::flow::{DAMPER_WORK, E, Flow, GAP, Mode, S, SLIDER_WORK, State, V, View, X};

/// How fine the reference works.
#[derive(Clone, Copy, Debug)]
pub struct Fineness {
    pub relative_tolerance: f64,
    /// Longest step between looks for events, in units of the shortest natural time.
    pub look: f64,
    /// First look after a change of mode, as a share of the longest; doubles from look to look.
    pub first_look: f64,
    pub time_limit: f64,
    pub most_looks: usize,
}

impl Default for Fineness {
    fn default() -> Self {
        Self { relative_tolerance: 1e-12, look: 0.15, first_look: 1e-5, time_limit: 120.0, most_looks: 60_000 }
    }
}

/// A stretch of the run between two looks.
#[derive(Clone, Copy, Debug)]
pub struct Piece {
    /// From taut, s.
    pub start: f64,
    pub span: f64,
    pub mode: Mode,
    pub state: State,
    pub first: View,
    pub last: View,
    /// Where the force turns inside the piece.
    pub turn: Option<f64>,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Event {
    Taut,
    Starts,
    Stops,
    UsedUp,
    Slack,
}

/// What a run gives; times from taut.
#[derive(Clone, Debug)]
pub struct Record {
    pub pieces: Vec<Piece>,
    pub events: Vec<(f64, Event)>,
    pub peak: (f64, f64),
    /// Every instant at which the mass turns from down to up: time, state, stretches.
    pub lows: Vec<(f64, State, View)>,
    /// Every instant at which it turns from up to down: time, travel.
    pub highs: Vec<(f64, f64)>,
    pub stretch_peak: [f64; 2],
    /// End of the piece that holds each.
    pub stretch_peak_time: [f64; 2],
    pub end: State,
    pub used_up: bool,
    /// The run went on until nothing of interest was left.
    pub complete: bool,
}

struct Run<'a> {
    flow: Flow<'a>,
    fineness: Fineness,
    longest: f64,
    span: f64,
    now: f64,
    state: State,
    locked: bool,
    begun: bool,
    falling: bool,
    record: Record,
}

/// Runs a case until it is at rest for all purposes, or the limit.
pub fn run(case: &Case, fineness: Fineness) -> Record {
    let mut run = Run::new(case, fineness);
    run.catch();
    while run.record.pieces.len() < fineness.most_looks && run.now < fineness.time_limit {
        run.step();
        if run.at_rest() {
            run.record.complete = true;
            break;
        }
    }
    run.record.end = run.state;
    run.record.used_up = run.locked;
    run.record
}

/// Root of `f` on `[low, high]`, where it changes sign: false position kept honest by bisection.
pub fn root(mut low: f64, mut high: f64, f: impl Fn(f64) -> f64) -> f64 {
    let (mut at_low, mut at_high) = (f(low), f(high));
    if at_low == 0.0 {
        return low;
    }
    if at_high == 0.0 {
        return high;
    }
    if at_low.signum() == at_high.signum() {
        return if at_low.abs() < at_high.abs() { low } else { high };
    }
    for round in 0..120 {
        let width = high - low;
        if width <= 1e-15 * high.abs() {
            break;
        }
        let guess = if round % 3 == 2 { 0.5 * (low + high) } else { low + width * at_low / (at_low - at_high) };
        let guess = if guess <= low || guess >= high { 0.5 * (low + high) } else { guess };
        if guess <= low || guess >= high {
            break;
        }
        let at = f(guess);
        if at == 0.0 {
            return guess;
        }
        if at.signum() == at_low.signum() {
            (low, at_low) = (guess, at);
        } else {
            (high, at_high) = (guess, at);
        }
    }
    high
}

impl<'a> Run<'a> {
    fn new(case: &'a Case, fineness: Fineness) -> Self {
        let flow = Flow::new(case, fineness.relative_tolerance);
        let stiffest = |i: usize| {
            let law = &flow.parts()[i].law;
            (0..200).map(|n| law.slope(f64::from(n) * 0.05)).fold(0.0, f64::max)
        };
        let soft = stiffest(0).min(stiffest(1));
        let longest = fineness.look / (soft / case.mass).sqrt();
        let mut state = State::zeros();
        state[V] = case.speed_at_taut();
        let record = Record {
            pieces: Vec::new(),
            events: Vec::new(),
            peak: (0.0, 0.0),
            lows: Vec::new(),
            highs: Vec::new(),
            stretch_peak: [0.0; 2],
            stretch_peak_time: [0.0; 2],
            end: state,
            used_up: false,
            complete: false,
        };
        let (now, span) = (0.0, longest);
        Self { flow, fineness, longest, span, now, state, locked: false, begun: false, falling: true, record }
    }

    fn weight(&self) -> f64 {
        self.flow.case.mass * self.flow.case.gravity
    }

    /// Force at which the slider gives way now.
    fn limit(&self) -> f64 {
        match &self.flow.case.slider {
            Some(slider) if !self.locked => {
                if self.begun {
                    self.flow.slider_force(self.state[S])
                } else {
                    slider.onset
                }
            }
            _ => f64::INFINITY,
        }
    }

    fn enter(&mut self, mode: Mode, event: Event) {
        let view = self.flow.look(&self.state);
        for (i, slot) in E.into_iter().enumerate() {
            let keeps = mode != Mode::Slack || self.flow.parts()[i].is_damped();
            self.state[slot] = if keeps { view.stretch[i] } else { 0.0 };
        }
        self.state[GAP] = 0.0;
        self.flow.mode = mode;
        self.span = self.fineness.first_look * self.longest;
        self.record.events.push((self.now, event));
        self.note_force();
    }

    fn note_force(&mut self) {
        self.note_peak(self.now, self.flow.look(&self.state).force);
    }

    fn note_peak(&mut self, time: f64, force: f64) {
        if force > self.record.peak.1 * (1.0 + 1e-9) {
            self.record.peak = (time, force);
        }
    }

    /// The line comes taut; the jump of a damper is judged at once.
    fn catch(&mut self) {
        self.flow.mode = Mode::Stuck;
        let force = self.flow.look(&self.state).force;
        if force > self.limit() {
            self.record.events.push((self.now, Event::Taut));
            self.give_way();
        } else {
            self.enter(Mode::Stuck, Event::Taut);
        }
    }

    /// The slider starts; once only, the force drops from its onset to the deployment force.
    fn give_way(&mut self) {
        let limit = self.limit();
        self.note_peak(self.now, limit);
        let first = !self.begun;
        self.begun = true;
        if first && limit > self.flow.slider_force(self.state[S]) && self.snap_back(limit) {
            return;
        }
        self.enter(Mode::Sliding, Event::Starts);
    }

    /// Springs without damper give back a little at the onset; true when that uses the stroke up.
    fn snap_back(&mut self, onset: f64) -> bool {
        let springs = self.flow.springs.clone();
        let view = self.flow.look(&self.state);
        for (i, part) in self.flow.parts().into_iter().enumerate() {
            if part.is_damped() {
                self.state[E[i]] = view.stretch[i];
            }
        }
        let strain = springs.stretch(onset);
        let stroke = self.flow.case.slider.as_ref().map_or(0.0, |slider| slider.stroke);
        let excess = |given: f64| self.flow.slider_force(self.state[S] + given) - springs.force(strain - given);
        let left = stroke - self.state[S];
        let used_up = excess(left) < 0.0;
        let given = if strain == 0.0 {
            0.0
        } else if used_up {
            left
        } else {
            root(0.0, left.min(strain), excess)
        };
        self.state[SLIDER_WORK] += springs.energy(strain) - springs.energy(strain - given);
        self.state[S] += given;
        if used_up {
            self.record.events.push((self.now, Event::Starts));
            self.locked = true;
            self.enter(Mode::Stuck, Event::UsedUp);
        }
        used_up
    }

    fn at(&self, span: f64) -> (State, View) {
        let state = self.flow.advance(&self.state, span);
        let view = self.flow.look(&state);
        (state, view)
    }

    fn root(&self, low: f64, high: f64, f: impl Fn(&State, &View) -> f64) -> f64 {
        root(low, high, |span| {
            let (state, view) = self.at(span);
            f(&state, &view)
        })
    }

    fn step(&mut self) {
        let span = self.span.min(self.longest).min(self.fineness.time_limit - self.now + 1e-9);
        let first = self.flow.look(&self.state);
        let (end, last) = self.at(span);
        let (event, at, turn) = match self.flow.mode {
            Mode::Stuck => self.event_while_stuck(span, &first, &last),
            Mode::Sliding => self.event_while_sliding(span, &end, &last),
            Mode::Slack => {
                let met = end[GAP] >= 0.0;
                let at = if met { self.root(1e-9 * span, span, |y, _| y[GAP]) } else { span };
                (met.then_some(Event::Taut), at, None)
            }
        };
        let (end, last) = if at == span { (end, last) } else { self.at(at) };
        self.keep(at, first, turn, end, last);
        self.span *= 2.0;
        match event {
            Some(Event::Taut) => self.catch(),
            Some(Event::Slack) => self.enter(Mode::Slack, Event::Slack),
            Some(Event::Starts) => self.give_way(),
            Some(Event::Stops) => self.enter(Mode::Stuck, Event::Stops),
            Some(Event::UsedUp) => {
                self.locked = true;
                self.enter(Mode::Stuck, Event::UsedUp);
            }
            None => {}
        }
    }

    fn event_while_stuck(&self, span: f64, first: &View, last: &View) -> (Option<Event>, f64, Option<f64>) {
        let turns = first.force_rate.signum() != last.force_rate.signum();
        let turn = turns.then(|| self.root(0.0, span, |_, view| view.force_rate));
        let mut low = (0.0, first.force);
        let limit = self.limit();
        for high in turn.into_iter().chain([span]) {
            let force = if high == span { last.force } else { self.at(high).1.force };
            if force < -1e-9 * self.weight().max(1e-3 * self.record.peak.1) {
                let at = if low.1 > 0.0 { self.root(low.0, high, |_, view| view.force) } else { low.0 };
                return (Some(Event::Slack), at, turn.filter(|turn| *turn < at));
            }
            if force > limit * (1.0 + 1e-11) && force > low.1 {
                let at = if low.1 < limit { self.root(low.0, high, |_, view| view.force - limit) } else { low.0 };
                return (Some(Event::Starts), at, turn.filter(|turn| *turn < at));
            }
            low = (high, force);
        }
        (None, span, turn)
    }

    fn event_while_sliding(&self, span: f64, end: &State, last: &View) -> (Option<Event>, f64, Option<f64>) {
        let stroke = self.flow.case.slider.as_ref().map_or(0.0, |slider| slider.stroke);
        let stops = last.slide_rate < 0.0;
        let high = if stops { self.root(0.0, span, |_, view| view.slide_rate) } else { span };
        let reached = if stops { self.at(high).0[S] } else { end[S] };
        if reached >= stroke {
            return (Some(Event::UsedUp), self.root(0.0, high, |y, _| y[S] - stroke), None);
        }
        (stops.then_some(Event::Stops), high, None)
    }

    /// Takes the step and notes peaks and turning points on the way.
    fn keep(&mut self, span: f64, first: View, turn: Option<f64>, end: State, last: View) {
        let piece = Piece { start: self.now, span, mode: self.flow.mode, state: self.state, first, last, turn };
        if let Some(turn) = turn {
            let force = self.at(turn).1.force;
            self.note_peak(self.now + turn, force);
        }
        self.note_peak(self.now + span, last.force);
        for i in 0..2 {
            let turned = first.stretch_rate[i] > 0.0 && last.stretch_rate[i] < 0.0;
            let mut most = last.stretch[i].max(first.stretch[i]);
            if turned {
                let at = self.root(0.0, span, |_, view| view.stretch_rate[i]);
                most = most.max(self.at(at).1.stretch[i]);
            }
            if most > self.record.stretch_peak[i] * (1.0 + 1e-9) {
                self.record.stretch_peak[i] = most;
                self.record.stretch_peak_time[i] = self.now + span;
            }
        }
        let turned = if self.falling { end[V] <= 0.0 } else { end[V] > 0.0 };
        if turned {
            let at = self.root(0.0, span, |y, _| y[V]);
            let (state, view) = self.at(at);
            if self.falling {
                self.record.lows.push((self.now + at, state, view));
            } else {
                self.record.highs.push((self.now + at, state[X]));
            }
            self.falling = !self.falling;
        }
        self.record.pieces.push(piece);
        self.now += span;
        self.state = end;
    }

    /// Nothing of interest can follow.
    fn at_rest(&self) -> bool {
        let undamped = !self.flow.parts().into_iter().any(super::case::Part::is_damped);
        let deepest = self.record.lows.iter().map(|low| low.1[X]).fold(0.0, f64::max);
        if undamped {
            let catches = self.record.events.iter().filter(|event| event.1 == Event::Taut).count();
            return self.record.highs.len() >= 2 && (catches >= 3 || self.now > 300.0 * self.longest);
        }
        let view = self.flow.look(&self.state);
        let above = self.flow.energy_above_hang(&self.state, &view);
        let all = self.weight() * (self.flow.case.free_fall + deepest.max(self.state[X]));
        let hang: f64 = self.flow.parts().into_iter().map(|part| part.law.stretch(self.weight())).sum();
        if !self.record.highs.is_empty() && deepest > self.state[S] + hang {
            return self.flow.mode != Mode::Sliding && above < 2e-4 * all;
        }
        let off = (self.state[X] - self.state[S] - hang).abs() + self.state[V].abs() * self.longest;
        self.flow.mode != Mode::Sliding && off < 1e-10 * self.state[X]
    }
}

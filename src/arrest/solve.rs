//! From event to event until settled.
use super::give::SpanState;
use super::ledger::Work;
use super::mode::{Mode, Path, Pieces, State, Stretch};
use super::motion::Motion;
use super::next::{End, Ending, Slider, TOUCH, moving_force};
use super::onset::give_back;
use super::outcome::{ArrestError, Ended, EnergyAccount, Fall, Happening, Outcome, Settings, WorkCount};
use super::record::{Record, times_above_s};
use super::roots::take_evaluations;
use super::settle;
use super::signal::{Moment, Signal};
use std::borrow::Cow;

/// More modes than any real arrest has: 120 s of rebounds ten times a second, with knots.
const MODES: u32 = 100_000;

/// Largest imbalance of the energy account over the fall energy with which a run counts as computed.
const BALANCE: f64 = 1e-9;

/// Solves a vertical arrest from the moment the line is taut until it is settled or the time limit.
///
/// # Errors
/// [`ArrestError`] for an input out of range, a path that cannot stretch, or an account that does not balance.
///
/// # Reference
/// The solution of each mode is in closed form; see the modules `oscillator`, `drift` and `third`.
pub fn solve(fall: &Fall, settings: &Settings) -> Result<Outcome, ArrestError> {
    fall.check()?;
    take_evaluations();
    let mut run = Run::new(Cow::Borrowed(fall), *settings);
    run.all()?;
    run.outcome()
}

/// The end of a stretch.
pub(super) struct Close {
    pub at: Moment,
    pub state: State,
    /// Kinetic and elastic energy there, J.
    pub held_j: f64,
}

impl Close {
    fn of(fall: &Fall, stretch: &Stretch, at: Moment, pieces: Pieces) -> Self {
        let state = stretch.state_at(&at);
        Self { at, state, held_j: fall.held_j(pieces, &state) }
    }
}

/// A run in progress.
pub(super) struct Run<'a> {
    pub fall: Cow<'a, Fall>,
    /// A lifeline that gives, as group 2; its travel and stretch count from where it is just taut.
    pub span: Option<SpanState>,
    pub settings: Settings,
    pub state: State,
    pub before: State,
    pub time_s: f64,
    taut_s: f64,
    speed_m_per_s: f64,
    slider: Slider,
    mode: Mode,
    pub work: Work,
    account: Option<EnergyAccount>,
    imbalance_j: f64,
    pub record: Record,
    /// Elastic energy less the weight's at the hang position, J.
    pub hang_j: f64,
    pub stretches: Vec<Stretch>,
    happenings: Vec<(f64, Happening)>,
    ended: Option<Ended>,
    /// When settled, s, and the travel its level was taken from, m.
    settled: Option<(f64, f64)>,
    modes: u32,
}

impl<'a> Run<'a> {
    pub fn new(fall: Cow<'a, Fall>, settings: Settings) -> Self {
        let g = fall.gravity_m_per_s2;
        let h = fall.free_fall_m;
        let taut_s = if h > 0.0 { (2.0 * h / g).sqrt() } else { 0.0 };
        let speed_m_per_s = fall.speed_at_taut_m_per_s.unwrap_or_else(|| (2.0 * g * h).sqrt());
        let state = State { v: speed_m_per_s, ..State::default() };
        Self {
            hang_j: fall.hang_j(),
            fall,
            span: None,
            settings,
            state,
            before: state,
            time_s: taut_s,
            taut_s,
            speed_m_per_s,
            slider: Slider { started: false, locked: false },
            mode: Mode::Stuck,
            work: Work::default(),
            account: None,
            imbalance_j: 0.0,
            record: Record::new(),
            stretches: Vec::with_capacity(32),
            happenings: Vec::with_capacity(16),
            ended: None,
            settled: None,
            modes: 0,
        }
    }

    pub fn all(&mut self) -> Result<(), ArrestError> {
        self.taut()?;
        let limit_s = self.taut_s + self.settings.time_limit_s;
        while self.ended.is_none() {
            if self.modes >= MODES {
                return Err(ArrestError::TooManyModes { modes: MODES });
            }
            self.modes += 1;
            let pieces = self.pieces();
            let mut stretch = self.path().stretch(self.mode, pieces, &self.state, self.time_s);
            let left_s = limit_s - self.time_s;
            let horizon = left_s.min(stretch.length_s);
            let Ending { at, end } = self.path().first_end(&stretch, pieces, self.slider, horizon);
            let end = end.map(|end| (at.t, end)).or((horizon < left_s).then_some((horizon, End::StepEnds)));
            let end = self.or_turned(&stretch, end, horizon);
            stretch.length_s = end.map_or(horizon, |(t, _)| t);
            let at = if stretch.length_s == at.t { at } else { stretch.moment(stretch.length_s) };
            let mut close = Close::of(&self.fall, &stretch, at, pieces);
            let reach = close.at;
            // Only a third-order mode can come to a deeper point after its first.
            let deepest_known =
                self.record.lowest.is_some() && !matches!(stretch.x, Signal::Wave(_) | Signal::Series(_));
            self.settled = self.settled.or_else(|| settle::time(self, &stretch, &close, end.is_none()));
            // What is settled while the slider still moves goes on until the slider stops.
            if let Some((time_s, _)) = self.settled.filter(|_| self.mode != Mode::Sliding) {
                self.ended = Some(Ended::Settled { time_s });
                let lowest_s =
                    if deepest_known { None } else { self.record.new_lowest_s(&self.shown(&stretch), &reach) };
                let needed_s = lowest_s.map_or(time_s, |t| time_s.max(t));
                stretch.length_s = (needed_s - stretch.start_s).clamp(0.0, reach.t);
                close = Close::of(&self.fall, &stretch, stretch.moment(stretch.length_s), pieces);
            } else if end.is_none() {
                self.ended = Some(Ended::TimeLimit);
            }
            let turns_to = if deepest_known { close.at } else { reach };
            self.pass(&stretch, &close, &turns_to);
            if let (None, Some((_, end))) = (self.ended, end) {
                self.after(end, pieces)?;
            }
        }
        Ok(())
    }

    /// Takes in one finished stretch; turning points count up to `reach`.
    fn pass(&mut self, stretch: &Stretch, close: &Close, reach: &Moment) {
        let shown = self.shown(stretch);
        let before = State { e: [self.before.e[0], self.before.e[1] + self.shift_m()], ..self.before };
        self.record.read(&shown, &close.at, &before);
        if self.record.lowest.is_some() {
            self.record.first_highest(&shown, &close.at);
        }
        let mut lowest = None;
        self.record.turnings(&shown, reach, |t| lowest = Some(t));
        if let Some(t) = lowest {
            let moment = stretch.moment(t);
            let state = stretch.state_at(&moment);
            let account = self.fall.account(&state, self.work + self.fall.work_in(stretch, &moment));
            self.account = Some(self.split(account, state.e[1]));
        }
        self.work += self.fall.work_in(stretch, &close.at);
        self.time_s = stretch.start_s + stretch.length_s;
        self.state = close.state;
        self.before = close.state;
        let put_in = self.fall_energy_j(self.state.x + self.shift_m());
        let out = close.held_j + self.work.total_j();
        self.imbalance_j = self.imbalance_j.max((put_in - out).abs());
        self.stretches.push(shown);
    }

    /// Kinetic energy at taut, J.
    fn start_j(&self) -> f64 {
        0.5 * self.fall.mass_kg * self.speed_m_per_s * self.speed_m_per_s
    }

    /// `m g (h + x)`, J.
    pub fn fall_energy_j(&self, travel_m: f64) -> f64 {
        self.start_j() + self.fall.weight_n() * travel_m
    }

    pub fn happened(&mut self, what: Happening) {
        self.happenings.push((self.time_s, what));
    }

    fn path(&self) -> Path<'_> {
        Path::new(&self.fall)
    }

    fn pieces(&self) -> Pieces {
        self.path().pieces(&self.state)
    }

    fn after(&mut self, end: End, pieces: Pieces) -> Result<(), ArrestError> {
        match end {
            End::Slack => {
                self.go_slack();
                Ok(())
            }
            End::Taut => self.taut(),
            End::Onset => self.slide(),
            End::SpanTurns => self.turn_span(),
            End::StepEnds => Ok(()),
            End::SliderStops => {
                self.happened(Happening::DeploymentEnd);
                self.mode = Mode::Stuck;
                Ok(())
            }
            End::StrokeUsedUp => self.lock(),
            End::SliderKnot | End::Knot(..) => {
                self.snap(end, pieces);
                Ok(())
            }
        }
    }

    /// Puts the state exactly on the knot at the end of its piece, on the side it goes to.
    fn snap(&mut self, end: End, pieces: Pieces) {
        let path = &self.fall.path;
        match end {
            End::Knot(group, up) => {
                let law = [&path.line.elastic, &path.other.elastic][group];
                if let Some(piece) = law.piece(pieces.group[group]) {
                    self.state.e[group] = if up { piece.x1 } else { piece.x0.next_down() };
                }
                if group == 1 && up {
                    self.span_knot();
                }
            }
            End::SliderKnot => {
                if let Some(absorber) = &path.absorber {
                    self.state.s = absorber.force.piece(pieces.slider).x1;
                }
            }
            _ => {}
        }
    }

    fn go_slack(&mut self) {
        self.happened(Happening::Slack);
        self.record.first_slack_s.get_or_insert(self.time_s);
        let path = &self.fall.path;
        for (e, group) in self.state.e.iter_mut().zip([&path.line, &path.other]) {
            if !group.is_damped() {
                *e = 0.0;
            }
        }
        self.mode = Mode::Slack;
    }

    /// The path is taut, first or again: the force right after decides whether the slider moves.
    fn taut(&mut self) -> Result<(), ArrestError> {
        self.happened(Happening::Taut);
        self.mode = Mode::Stuck;
        let s = self.state.s;
        let level = moving_force(&self.fall, self.slider, s);
        let path = &self.fall.path;
        if path.line.is_rigid() && path.other.is_rigid() && self.state.v > 0.0 {
            let Some(level) = level else { return Err(ArrestError::Rigid { time_s: self.time_s }) };
            self.record.force.offer(level, self.time_s);
            return self.slide();
        }
        let stuck = self.path().stretch(Mode::Stuck, self.pieces(), &self.state, self.time_s);
        if let Some(level) = level.filter(|l| stuck.force.value(0.0) > l * (1.0 + TOUCH)) {
            self.record.force.offer(level, self.time_s);
            return self.slide();
        }
        Ok(())
    }

    fn slide(&mut self) -> Result<(), ArrestError> {
        self.happened(Happening::DeploymentStart);
        if !self.slider.started && self.span.as_ref().is_some_and(|span| span.gives_at(self.state.e[1])) {
            // The drop from the onset force takes the span back as well.
            self.turn_span()?;
        }
        let lost_j = give_back(&self.fall, &mut self.state, self.slider);
        self.slider.started = true;
        self.work.absorber_j += lost_j;
        self.mode = Mode::Sliding;
        let stroke = self.fall.path.absorber.as_ref().map_or(f64::INFINITY, |a| a.stroke_m);
        if self.state.s >= stroke {
            self.state.s = stroke;
            self.slider.locked = true;
            self.mode = Mode::Stuck;
            self.happened(Happening::StrokeUsedUp);
        }
        Ok(())
    }

    fn lock(&mut self) -> Result<(), ArrestError> {
        self.happened(Happening::StrokeUsedUp);
        self.slider.locked = true;
        self.mode = Mode::Stuck;
        let path = &self.fall.path;
        if let Some(absorber) = &path.absorber {
            self.state.s = absorber.stroke_m;
        }
        if path.line.is_rigid() && path.other.is_rigid() {
            return Err(ArrestError::Rigid { time_s: self.time_s });
        }
        Ok(())
    }

    pub fn outcome(self) -> Result<Outcome, ArrestError> {
        let hang_travel_m = self.hang_travel_m();
        let deepest = self.record.lowest.filter(|l| l.travel_m >= hang_travel_m * (1.0 - 1e-9));
        let arrest_distance_m = deepest.map_or(hang_travel_m, |l| l.travel_m);
        let total_j = self.fall_energy_j(arrest_distance_m);
        let energy_residual = if total_j > 0.0 { self.imbalance_j / total_j } else { self.imbalance_j };
        if energy_residual.is_nan() || energy_residual > BALANCE {
            return Err(ArrestError::Energy { residual: energy_residual });
        }
        let ended = self.ended(arrest_distance_m);
        let end_s = if let Ended::Settled { time_s } = ended { time_s } else { f64::INFINITY };
        let highest = deepest.and(self.record.highest).filter(|&(time_s, _)| time_s <= end_s);
        let slack = self.happenings.iter().filter(|(time_s, what)| *what == Happening::Slack && *time_s <= end_s);
        let energy = match (deepest, self.account) {
            (Some(_), Some(account)) => account,
            _ => self.account_at_rest(),
        };
        let (span, fall) = (self.span_given(), self.fall.into_owned());
        Ok(Outcome {
            time_taut_s: self.taut_s,
            speed_at_taut_m_per_s: self.speed_m_per_s,
            peak_force_n: self.record.force.value,
            time_peak_force_s: self.record.force.time_s,
            lowest: deepest,
            arrest_distance_m,
            hang_travel_m,
            rebound_rise_m: highest.map(|(_, travel_m)| arrest_distance_m - travel_m),
            time_highest_s: highest.map(|(time_s, _)| time_s),
            time_first_slack_s: self.record.first_slack_s,
            slack_episodes: u32::try_from(slack.count()).unwrap_or(u32::MAX),
            deployed_m: self.state.s,
            stroke_used_up: self.slider.locked,
            span,
            line_elongation_peak_m: self.record.stretch[0].value,
            other_elongation_peak_m: self.record.stretch[1].value,
            time_above_s: times_above_s(&self.stretches, self.settings.levels_n, end_s),
            ended,
            energy,
            energy_residual,
            work: WorkCount { modes: self.modes, evaluations: take_evaluations() },
            happenings: self.happenings,
            motion: Motion {
                gravity_m_per_s2: fall.gravity_m_per_s2,
                free_fall_m: fall.free_fall_m,
                stretches: self.stretches,
            },
            fall,
        })
    }

    /// How the run ended: a level taken from a turning point that was not the deepest is taken again.
    fn ended(&self, arrest_distance_m: f64) -> Ended {
        let Some((time_s, travel_m)) = self.settled else { return Ended::TimeLimit };
        if (arrest_distance_m - travel_m).abs() <= 1e-12 * arrest_distance_m.abs() {
            return Ended::Settled { time_s };
        }
        let again = settle::first(self, self.hidden(), arrest_distance_m);
        Ended::Settled { time_s: again.unwrap_or(time_s) }
    }

    /// The account at rest, where what is still above the hang position has gone into the dampers.
    fn account_at_rest(&self) -> EnergyAccount {
        let rest = State { e: self.fall.hang_elongation_m(), v: 0.0, ..self.state };
        let mut work = self.work;
        work.damper_j += self.fall.energy_above_j(&self.state, self.hang_j);
        self.split(self.fall.account(&rest, work), rest.e[1])
    }

    /// Travel at rest with all that has been deployed, m.
    pub fn hang_travel_m(&self) -> f64 {
        self.fall.hang_travel_m(self.state.s) + self.shift_m()
    }
}

//! From event to event until the swing turns.
use super::event::{End, Lengths, Sight};
use super::law::{Force, Law, Laws, Pieces};
use super::outcome::{Ended, Impulse, Lowest, PlaneOutcome};
use super::plane::{Plane, Settings, SwingError};
use super::poly::{Poly, scaled};
use super::reading::{Carried, Ends, Largest, Span, time_above};
use super::series::{Body, Series, State};
use super::step::{self, Scales};
use super::trajectory::{Step, Trajectory};
use crate::arrest::{self, EnergyAccount, Fall, Happening, Mode, Slider};
use crate::physics::Group;

/// Speed along a rigid path that counts as an impulse, m/s.
const IMPULSE_M_PER_S: f64 = 1e-9;
/// Solves a planar arrest: straight fall until taut, then the elastic pendulum until the horizontal velocity turns.
///
/// Straight above or below the pivot nothing swings; such a run ends at the top of the first rebound after the lowest
/// point. With the default tolerance the energy account closes to about 1e-11 of the fall energy, and the numbers agree
/// with an independent integration to about 1e-8.
///
/// # Errors
/// [`SwingError`] for an input out of range, a start out of the line's reach, a path far faster than the swing, or an
/// account that does not balance.
///
/// # Reference
/// The series of each step: see `series`; the search for events: see `poly`.
pub fn solve(plane: &Plane, settings: &Settings) -> Result<PlaneOutcome, SwingError> {
    plane.check(settings)?;
    let free_fall_m = plane.free_fall_m()?;
    let fall = plane.fall(free_fall_m);
    fall.check()?;
    let mut run = Run::new(plane, &fall, *settings);
    run.fall_free();
    run.all()?;
    run.outcome()
}

/// A run in progress.
pub(super) struct Run<'a> {
    pub plane: &'a Plane,
    pub fall: &'a Fall,
    pub settings: Settings,
    pub body: Body,
    pub scales: Scales,
    /// Towards the pivot: 1, -1, or 0 when there is no offset.
    pub toward: f64,
    pub state: State,
    pub time_s: f64,
    pub taut_s: f64,
    pub taut_state: State,
    pub mode: Mode,
    pub pieces: Pieces,
    pub slider: Slider,
    pub fresh: bool,
    pub force: Largest,
    pub stretch: [Largest; 2],
    pub above_s: [f64; 2],
    pub first_slack_s: Option<f64>,
    pub impulses: Vec<Impulse>,
    pub absorber_j: f64,
    pub lost_j: f64,
    pub start_j: f64,
    pub imbalance_j: f64,
    pub turn: Carried,
    pub rise: Carried,
    pub lowest: Option<(Lowest, EnergyAccount)>,
    pub trajectory: Trajectory,
    pub happenings: Vec<(f64, Happening)>,
    pub ended: Option<Ended>,
    pub modes: u32,
    pub steps: u32,
}

impl<'a> Run<'a> {
    fn new(plane: &'a Plane, fall: &'a Fall, settings: Settings) -> Self {
        let mut position = plane.start_from_pivot();
        if fall.free_fall_m == 0.0 {
            // Within a nanometre of taut counts as taut.
            let distance = position[0].hypot(position[1]);
            position = position.map(|c| c * (plane.free_length_m / distance));
        }
        let body = Body { mass: plane.mass_kg, gravity: plane.gravity_m_per_s2 };
        let weight = plane.weight_n();
        let stretch = |group: &Group| if group.is_rigid() { 1.0 } else { group.elastic.elongation_m(weight) };
        let scales = Scales {
            tolerance: settings.tolerance,
            length: plane.free_length_m,
            force: weight,
            stretch: [stretch(&plane.path.line), stretch(&plane.path.other)],
        };
        let state = State { position, ..State::default() };
        Self {
            plane,
            fall,
            settings,
            body,
            scales,
            toward: if position[0] == 0.0 { 0.0 } else { -position[0].signum() },
            state,
            time_s: 0.0,
            taut_s: 0.0,
            taut_state: state,
            mode: Mode::Slack,
            pieces: Pieces::default(),
            slider: Slider { started: false, locked: false },
            fresh: true,
            force: Largest::NONE,
            stretch: [Largest::NONE; 2],
            above_s: [0.0; 2],
            first_slack_s: None,
            impulses: Vec::new(),
            absorber_j: 0.0,
            lost_j: 0.0,
            start_j: weight * position[1],
            imbalance_j: 0.0,
            turn: Carried::default(),
            rise: Carried::default(),
            lowest: None,
            trajectory: Trajectory::new(plane),
            happenings: Vec::with_capacity(8),
            ended: None,
            modes: 0,
            steps: 0,
        }
    }

    /// The straight fall until taut.
    fn fall_free(&mut self) {
        let h = self.fall.free_fall_m;
        if h > 0.0 {
            let g = self.body.gravity;
            let time_s = (2.0 * h / g).sqrt();
            let law = self.laws().slack(0.0);
            let series = Series::slack(&law, self.body, &self.state).over(time_s);
            self.trajectory.steps.push(Step::new(0.0, time_s, 1.0, &series, &law, true));
            self.state.position[1] -= h;
            self.state.velocity[1] = -(2.0 * g * h).sqrt();
            self.time_s = time_s;
        }
        self.taut_s = self.time_s;
        self.taut_state = self.state;
    }

    fn all(&mut self) -> Result<(), SwingError> {
        self.taut();
        let limit_s = self.taut_s + self.settings.time_limit_s;
        while self.ended.is_none() {
            let steps = self.settings.most_steps;
            if self.steps >= steps || self.modes >= steps {
                return Err(SwingError::TooManySteps { steps, time_s: self.time_s });
            }
            self.steps += 1;
            let left_s = limit_s - self.time_s;
            if left_s > 0.0 { self.step(left_s) } else { self.ended = Some(Ended::TimeLimit) }
        }
        Ok(())
    }

    fn laws(&self) -> Laws {
        Laws::new(&self.plane.path, self.pieces, self.plane.free_length_m)
    }

    pub fn law(&self) -> Law {
        let laws = self.laws();
        match (self.mode, &self.plane.path.absorber) {
            (Mode::Slack, _) => laws.slack(self.state.s),
            (Mode::Sliding, Some(absorber)) => laws.sliding(absorber.force.piece(self.pieces.slider)),
            _ => laws.stuck(self.state.s),
        }
    }

    /// The law of the present mode, and the longest step of its series.
    fn motion(&mut self) -> (Law, Series, f64) {
        let mut law = self.law();
        if self.mode == Mode::Slack {
            for (e, relaxation) in self.state.e.iter_mut().zip(&mut law.relaxation) {
                if (*e - relaxation.rest).abs() < step::AT_REST_M {
                    *e = relaxation.rest;
                    relaxation.rate = 0.0;
                }
            }
            let unit_s = step::slack(&law);
            return (law, Series::slack(&law, self.body, &self.state), unit_s);
        }
        let series = Series::taut(&law, self.body, &self.state);
        let unit_s = step::taut(&series, &self.scales);
        (law, series, unit_s)
    }

    fn step(&mut self, left_s: f64) {
        let (law, series, longest_s) = self.motion();
        let unit_s = longest_s.min(left_s);
        let series = series.over(unit_s);
        let lengths = Lengths::of(&law, &series);
        let end = self.first_end(&law, &series, &lengths);
        let share = end.map_or(1.0, |(at, _)| at);
        let span = Span { start_s: self.time_s, unit_s, share };
        let mode = Ends { begins: self.fresh, ends: end.is_some() || unit_s >= left_s };
        self.read(&law, &series, &lengths, span, mode);
        let next = series.state(&law, share);
        self.absorber_j += self.absorbed_j(next.s);
        if share > 0.0 {
            self.trajectory.steps.push(Step::new(self.time_s, unit_s, share, &series, &law, false));
            self.fresh = false;
        }
        self.state = next;
        self.time_s = span.time(share);
        self.imbalance_j = self.imbalance_j.max((self.start_j - self.total_j(&self.state, 0.0)).abs());
        if let Some((_, end)) = end {
            self.apply(end);
        }
    }

    fn first_end(&self, law: &Law, series: &Series, lengths: &Lengths) -> Option<(f64, End)> {
        let sight = Sight {
            path: &self.plane.path,
            law,
            pieces: self.pieces,
            free_length: self.plane.free_length_m,
            fresh: self.fresh,
            moving_force: self.moving_force(),
            weight: self.plane.weight_n(),
        };
        let first = sight.first(series, lengths);
        let over = if self.toward == 0.0 {
            self.rise.first_fall(&series.vz)
        } else {
            self.turn.first_fall(&self.toward_pivot(&series.vx))
        };
        match (first, over) {
            (Some((at, _)), Some(turn)) if turn >= at => first,
            (_, Some(turn)) => Some((turn, End::Reversal)),
            _ => first,
        }
    }

    fn toward_pivot(&self, vx: &Poly) -> Poly {
        scaled(vx, self.toward, 0.0)
    }

    /// Force that moves the slider; none when there is none or it is locked.
    pub fn moving_force(&self) -> Option<f64> {
        let absorber = self.plane.path.absorber.as_ref().filter(|_| !self.slider.locked)?;
        Some(if self.slider.started { absorber.force.value(self.state.s) } else { absorber.onset_n })
    }

    fn read(&mut self, law: &Law, series: &Series, lengths: &Lengths, span: Span, mode: Ends) {
        if law.force != Force::Slack {
            self.force.scan(&series.force, span, mode);
            if self.first_slack_s.is_none() {
                for (above, level) in self.above_s.iter_mut().zip(self.settings.levels_n) {
                    *above += time_above(&series.force, level, span);
                }
            }
        }
        for (peak, e) in self.stretch.iter_mut().zip(&lengths.e) {
            peak.scan(e, span, mode);
        }
        let mut turn = self.turn;
        turn.pass(&self.toward_pivot(&series.vx), span.share, |_, _| {});
        self.turn = turn;
        let mut rise = self.rise;
        rise.pass(&series.vz, span.share, |at, rising| {
            if rising {
                self.offer_lowest(&series.state(law, at), span.time(at));
            }
        });
        self.rise = rise;
    }

    /// A force reached for an instant only.
    pub fn touched(&mut self, force_n: f64) {
        self.force.peak.offer(force_n, self.time_s);
    }

    pub fn happened(&mut self, what: Happening) {
        self.happenings.push((self.time_s, what));
    }

    pub fn enter(&mut self, mode: Mode) {
        self.mode = mode;
        self.modes += 1;
        self.fresh = true;
        self.pieces = Pieces::of(&self.plane.path, self.state.e, self.state.s);
    }

    pub fn end(&mut self) {
        self.ended = Some(if self.toward == 0.0 { Ended::Rebound } else { Ended::Reversal });
    }
}

/// The drop from the onset force, as in the vertical core. Energy lost, J.
pub(super) fn give_back(fall: &Fall, state: &mut State, slider: Slider) -> f64 {
    let mut vertical = arrest::State { x: 0.0, v: 0.0, e: state.e, s: state.s };
    let lost_j = arrest::give_back(fall, &mut vertical, slider);
    (state.e, state.s) = (vertical.e, vertical.s);
    lost_j
}

pub(super) const fn is_impulse(speed_m_per_s: f64) -> bool {
    speed_m_per_s > IMPULSE_M_PER_S
}
